"""Assess machines whose parts keep turning after the power is off.

::

    assessment file ──► statement ──► facts ──► rules ──► assessment ──► worksheet, JSON, terminal
                        what is       named      what is    one frozen
                        stated        quantities flagged    result
                                        ▲
                                    mechanics (formulas)

>>> from spinhazard import assess, assessment_from_text
>>> reading = assessment_from_text('''
... format = 1
... machine = { tag = "W-1", kind = "flywheel" }
... [[shaft]]
... id = "wheel"
... speed = "300 rpm"
... [[shaft.part]]
... shape = "ring"
... outer_diameter = "1.6 m"
... inner_diameter = "1.2 m"
... mass = "900 kg"
... ''', name="wheel")
>>> result = assess(reading, best_estimate=True)
>>> round(result.fact("stored_energy").best)
222066
"""

from typing import TYPE_CHECKING, Any

__all__ = [
    "Assessment",
    "InputError",
    "OutputError",
    "Policy",
    "as_json",
    "assess",
    "assessment_from_text",
    "read_assessment",
    "read_policy",
]

if TYPE_CHECKING:
    from spinhazard.assessment import Assessment, as_json, assess
    from spinhazard.errors import InputError, OutputError
    from spinhazard.statement.policy import Policy
    from spinhazard.statement.reading import assessment_from_text, read_assessment, read_policy

_HOME = {
    "Assessment": "assessment", "as_json": "assessment", "assess": "assessment", "InputError": "errors", "OutputError": "errors",
    "Policy": "statement.policy", "assessment_from_text": "statement.reading", "read_assessment": "statement.reading",
    "read_policy": "statement.reading",
}  # fmt: skip


def __getattr__(name: str) -> Any:
    """Load a name of the public API when it is asked for, so that ``spinhazard --help`` stays quick."""
    if name not in _HOME:
        raise AttributeError(f"module 'spinhazard' has no attribute {name!r}")
    from importlib import import_module  # noqa: PLC0415

    return getattr(import_module(f"spinhazard.{_HOME[name]}"), name)
