"""Named quantities with their trace: statement and mechanics to facts. Importing the package fills the registry."""

from spinhazard.facts import access, braking, containment, drag, lockout, measured, records, rotor, stopping, strength
from spinhazard.facts.fact import FACTS, Fact
from spinhazard.facts.sheet import FactSheet

__all__ = ["FACTS", "Fact", "FactSheet"]

# on paper the facts stand in the order in which one works them out, not in the order of the alphabet
_ORDER = [
    module.__name__
    for module in (rotor, strength, drag, stopping, braking, measured, access, containment, lockout, records)
]
_declared = sorted(FACTS.items(), key=lambda entry: _ORDER.index(entry[1].function.__module__))
FACTS.clear()
FACTS.update(_declared)
