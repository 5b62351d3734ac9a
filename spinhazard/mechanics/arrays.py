"""Refusals shared by the formulas: an argument out of its range is named with value, unit and accepted range."""

from __future__ import annotations

import numpy as np
from numpy.typing import ArrayLike, NDArray

Array = NDArray[np.float64]


def not_negative(name: str, value: ArrayLike, unit: str) -> Array:
    """An argument that may be zero or more.

    Parameters
    ----------
    name, unit : str
        Name and unit, for the message.
    value : array_like
        The argument; NaN passes through.

    Returns
    -------
    ndarray
        The argument as float64.

    Raises
    ------
    ValueError
        An entry is negative.
    """
    array = np.asarray(value, dtype=np.float64)
    if array.item() < 0.0 if array.size == 1 else (array < 0.0).any():
        raise ValueError(f"{name} = {_worst(array, array < 0.0)} {unit}: accepted is 0 or more".replace(" :", ":"))
    return array


def positive(name: str, value: ArrayLike, unit: str) -> Array:
    """An argument that must be greater than zero.

    Parameters
    ----------
    name, unit : str
        Name and unit, for the message.
    value : array_like
        The argument; NaN passes through.

    Returns
    -------
    ndarray
        The argument as float64.

    Raises
    ------
    ValueError
        An entry is zero or negative.
    """
    array = np.asarray(value, dtype=np.float64)
    if array.item() <= 0.0 if array.size == 1 else (array <= 0.0).any():
        raise ValueError(f"{name} = {_worst(array, array <= 0.0)} {unit}: accepted is more than 0".replace(" :", ":"))
    return array


def below(name: str, value: ArrayLike, limit_name: str, limit: ArrayLike, unit: str) -> Array:
    """An argument that must be smaller than another one.

    Parameters
    ----------
    name, limit_name, unit : str
        Names and unit, for the message.
    value, limit : array_like
        The two arguments.

    Returns
    -------
    ndarray
        The first argument as float64.

    Raises
    ------
    ValueError
        An entry is as large as the limit or larger.
    """
    array, bound = np.asarray(value, dtype=np.float64), np.asarray(limit, dtype=np.float64)
    if (array >= bound).any():
        raise ValueError(f"{name} = {_worst(array, array >= bound)} {unit}: accepted is less than {limit_name}")
    return array


def _worst(array: Array, wrong: NDArray[np.bool_]) -> str:
    return f"{np.broadcast_to(array, wrong.shape)[wrong].flat[0]:.6g}"
