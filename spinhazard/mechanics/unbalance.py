"""Torque by which static unbalance can turn a stopped rotor."""

from __future__ import annotations

from numpy.typing import ArrayLike

from spinhazard.mechanics.arrays import Array, not_negative
from spinhazard.mechanics.formula import formula

STANDARD_GRAVITY = 9.80665
"""[m/s²], by definition (NIST SP 811)."""


@formula(equation="T_u = 9.80665*U", unit="N m", symbols={"unbalance": "U"}, source="openstax-up1 §10.6")
def unbalance_torque(unbalance: ArrayLike) -> Array:
    """Largest torque of static unbalance on a horizontal shaft, with the heavy side level with the axis.

    Parameters
    ----------
    unbalance : array_like
        Mass times distance of its centre from the axis [kg m], >= 0.

    Returns
    -------
    ndarray
        Torque [N m].

    Raises
    ------
    ValueError
        The unbalance is negative.

    Examples
    --------
    >>> print(unbalance_torque(2.0))
    19.6133
    """  # noqa: DOC502
    return STANDARD_GRAVITY * not_negative("unbalance", unbalance, "kg m")
