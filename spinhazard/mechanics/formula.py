"""How a formula says what it is: equation, unit, symbols, source and range, written once beside the code."""

from __future__ import annotations

import re
from collections.abc import Callable, Mapping
from dataclasses import dataclass, field
from typing import Any, TypeVar

Function = TypeVar("Function", bound=Callable[..., Any])
_ATTRIBUTE = "formula"


@dataclass(frozen=True)
class Formula:
    """Record of one formula.

    Attributes
    ----------
    name : str
        Module and function, ``inertia.disk_inertia``.
    equation : str
        ``LHS = RHS`` in plain characters, or ``see method: NAME`` for an algorithm.
    unit : str
        SI unit of the result.
    symbols : mapping
        Parameter to symbol in the equation.
    source : str
        "id place" in the bibliography.
    valid : mapping
        Parameter, or "one/other", to the range (low, high) of the method.
    """

    name: str
    equation: str
    unit: str
    symbols: Mapping[str, str]
    source: str
    valid: Mapping[str, tuple[float, float]] = field(default_factory=dict)

    def range_breaches(self, arguments: Mapping[str, float]) -> tuple[str, ...]:
        """Ranges of the method that the arguments leave.

        Parameters
        ----------
        arguments : mapping
            Parameter to value [SI].

        Returns
        -------
        tuple of str
            One part of a sentence for each.
        """
        breaches = []
        for quantity, (low, high) in self.valid.items():
            above, _, below = quantity.partition("/")
            value = arguments[above] / arguments[below] if below else arguments[above]
            if value < low or value > high:
                breaches.append(f"{quantity} = {value:.3g}, outside {low:g} to {high:g}")
        return tuple(breaches)


REGISTRY: dict[str, Formula] = {}


def formula(
    *,
    equation: str,
    unit: str,
    symbols: Mapping[str, str],
    source: str,
    valid: Mapping[str, tuple[float, float]] | None = None,
) -> Callable[[Function], Function]:
    """Attach a record to a function, which is returned unchanged.

    Parameters
    ----------
    equation, unit, symbols, source, valid
        As in :class:`Formula`.

    Returns
    -------
    callable
        Decorator.
    """

    def attach(function: Function) -> Function:
        name = f"{function.__module__.rpartition('.')[2]}.{function.__name__}"
        made = Formula(
            name=name, equation=equation, unit=unit, symbols=dict(symbols), source=source, valid=dict(valid or {})
        )
        setattr(function, _ATTRIBUTE, made)
        REGISTRY[name] = made
        return function

    return attach


def record(function: Callable[..., Any]) -> Formula:
    """Record of a formula.

    Parameters
    ----------
    function : callable
        Function declared with :func:`formula`.

    Returns
    -------
    Formula
        Its record.
    """
    found: Formula = getattr(function, _ATTRIBUTE)
    return found


_GREEK = {
    "omega": "ω", "rho": "ρ", "sigma": "σ", "theta": "θ", "mu": "µ", "nu": "ν", "pi": "π", "Delta": "Δ", "alpha": "α", "eta": "η",
    "phi": "φ",
}  # fmt: skip
_SUPERSCRIPT = str.maketrans("0123456789-", "⁰¹²³⁴⁵⁶⁷⁸⁹⁻")
_SUBSCRIPT = str.maketrans("0123456789", "₀₁₂₃₄₅₆₇₈₉")
_NAME = re.compile(r"[A-Za-z][A-Za-z0-9]*(?:_[A-Za-z0-9]+)*")
_TOKEN = re.compile(r"\*\*|[-+*/(),=]|[A-Za-z][A-Za-z0-9]*(?:_[A-Za-z0-9]+)*|\d+(?:\.\d+)?(?:[eE][+-]?\d+)?")


def _symbol(name: str) -> str:
    head, _, tail = name.partition("_")
    head = _GREEK.get(head, head)
    if not tail:
        return head
    return head + (tail.translate(_SUBSCRIPT) if tail.isdigit() else f"_{tail}")


def printed(equation: str) -> str:
    """An equation as an engineer prints it.

    Parameters
    ----------
    equation : str
        Plain characters, as in :class:`Formula`.

    Returns
    -------
    str
        With Greek letters, powers raised, halves as ½.

    Examples
    --------
    >>> printed("E = J*omega**2/2"), printed("v = omega*r"), printed("r_c = 2*(R**3 - r**3)/3")
    ('E = ½ J ω²', 'v = ω r', 'r_c = 2 (R³ − r³)/3')
    """
    if equation.startswith("see "):
        return equation
    left, equals, right = equation.partition(" = ")
    if not equals:
        return _raised(equation, " ", _symbol)
    return f"{_raised(left, ' ', _symbol)} = {_raised(_leading_half(right), ' ', _symbol)}"


def _leading_half(text: str) -> str:
    """``J*omega**2/2`` as ``½*J*omega**2``; only where the whole right side is one product."""
    if text.endswith("/2") and not re.search(r"[-+]", re.sub(r"\([^()]*\)", "", text)) and "/" not in text[:-2]:
        return f"½*{text[:-2]}"
    return text


def _raised(text: str, product: str, name: Callable[[str], str]) -> str:
    out: list[str] = []
    pieces = re.findall(r"½|" + _TOKEN.pattern, text)
    index = 0
    while index < len(pieces):
        piece = pieces[index]
        if piece == "**":
            index += 1
            out.append(_exponent(pieces[index:]))
            index += _exponent_length(pieces[index:]) - 1
        elif piece == "*":
            out.append(product)
        elif piece in {"+", "-"}:
            unary = not out or out[-1].rstrip() in {"(", "", "=", ","} or out[-1].endswith("(")
            sign = "−" if piece == "-" else "+"
            out.append(sign if unary else f" {sign} ")
        elif piece == ",":
            out.append(", ")
        elif piece == "sqrt":
            out.append("√")
        elif _NAME.fullmatch(piece):
            out.append(name(piece))
        else:
            out.append(piece)
        index += 1
    return "".join(out)


def _exponent_length(pieces: list[str]) -> int:
    return pieces.index(")") + 1 if pieces[0] == "(" else 1


def _exponent(pieces: list[str]) -> str:
    if pieces[0] == "(":
        return "^(" + "".join(pieces[1 : pieces.index(")")]).replace("-", "−") + ")"
    return pieces[0].translate(_SUPERSCRIPT)


def with_numbers(formula: Formula, texts: Mapping[str, str]) -> str:
    """The right side of an equation with every symbol replaced by its value.

    Parameters
    ----------
    formula : Formula
        The record.
    texts : mapping
        Parameter to text of its value, with unit.

    Returns
    -------
    str
        Such as ``½ × (1.9 kg m²) × (1480 rpm)²``.

    Examples
    --------
    >>> kinetic = Formula("energy.e", "E = J*omega**2/2", "J", {"inertia": "J", "speed": "omega"}, "x")
    >>> with_numbers(kinetic, {"inertia": "1.9 kg m²", "speed": "155 rad/s"})
    '½ × (1.9 kg m²) × (155 rad/s)²'
    """
    _, equals, right = formula.equation.partition(" = ")
    if not equals:
        return ""
    by_symbol = {symbol: texts[parameter] for parameter, symbol in formula.symbols.items() if parameter in texts}

    def value(name: str) -> str:
        text = by_symbol.get(name)
        if text is None:
            return _symbol(name)
        return f"({text})" if " " in text or text.startswith("-") else text

    return _raised(_leading_half(right), " × ", value)
