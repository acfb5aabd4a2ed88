"""Array types, constants and the small numerical helpers that the hydraulics functions share."""

from __future__ import annotations

from functools import cache

import numpy as np
from numpy.typing import ArrayLike, NDArray

FloatArray = NDArray[np.float64]
BoolArray = NDArray[np.bool_]
CodeArray = NDArray[np.int8]
IndexArray = NDArray[np.intp]

__all__ = [
    "GRAVITY",
    "ArrayLike",
    "BoolArray",
    "CodeArray",
    "FloatArray",
    "IndexArray",
    "expm1_ratio",
    "floats",
    "gauss_legendre",
    "log1p_ratio",
    "positive",
]

#: Standard acceleration of gravity, m/s2 (3rd CGPM, 1901; exact).
GRAVITY = 9.80665


def floats(values: ArrayLike) -> FloatArray:
    """Return the values as a float64 array (no copy when they already are one)."""
    return np.asarray(values, dtype=np.float64)


def positive(values: ArrayLike) -> FloatArray:
    """Return the values with everything that is not above zero, or not finite, made NaN."""
    array = floats(values)
    return np.where((array > 0.0) & np.isfinite(array), array, np.nan)


def log1p_ratio(values: FloatArray) -> FloatArray:
    """Return ln(1 + y) / y, which is 1 at y = 0, without cancellation."""
    ratio: FloatArray = np.log1p(values) / values
    return np.where(values == 0.0, 1.0, ratio)


def expm1_ratio(values: FloatArray) -> FloatArray:
    """Return (exp(y) - 1) / y, which is 1 at y = 0, without cancellation."""
    ratio: FloatArray = np.expm1(values) / values
    return np.where(values == 0.0, 1.0, ratio)


@cache
def gauss_legendre(points: int) -> tuple[tuple[float, float], ...]:
    """Return (node, weight) pairs of Gauss-Legendre quadrature on the interval 0 to 1."""
    nodes, weights = np.polynomial.legendre.leggauss(points)
    return tuple(zip((0.5 * (nodes + 1.0)).tolist(), (0.5 * weights).tolist(), strict=True))
