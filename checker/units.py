"""The one door at which units become SI.

Common spellings stand in `tables/units.csv`, whose factors come from pint and are tested against it; those that could
be read in two ways, or that are no such unit, stand in `tables/unit_questions.csv`, each with what to write instead.
A spelling that neither holds is offered to pint itself, once a column, after a strict look at its characters. Inside
the program there are only SI floats.
"""

from __future__ import annotations

import re

import numpy as np
from numpy.typing import NDArray

from checker.unit_pint import unit_of_pint
from checker.unit_scripts import strange_letters
from checker.unit_spelling import fold_unit
from checker.unit_table import (
    QUESTIONS,
    TABLE,
    Unit,
    dimensions_knowing,
    forms_of,
    is_known_spelling,
    known_spelling,
    question_of,
)

__all__ = [
    "API",
    "QUESTIONS",
    "STANDARD_ATMOSPHERE",
    "TABLE",
    "Unit",
    "UnitRefusedError",
    "dimensions_knowing",
    "from_si",
    "is_known_spelling",
    "read_quantity",
    "read_unit",
    "to_si",
]

STANDARD_ATMOSPHERE = 101_325.0
API = "API"
"""Reference of degrees API, whose density holds at 60 degF."""
FloatArray = NDArray[np.float64]

LONGEST_SHOWN = 60
_FLOWS = ("mass flow", "volume flow", "standard flow")


def _shown(text: str) -> str:
    """Return a unit as a message may show it: shortened, unprintable characters escaped."""
    head = text[:LONGEST_SHOWN] + ("..." if len(text) > LONGEST_SHOWN else "")
    return repr(head) if head.isprintable() else f"'{head.encode('unicode_escape').decode('ascii')}'"


class UnitRefusedError(ValueError):
    """A unit that cannot be read for this dimension; the text says why and what to write."""


def read_unit(text: str, dimension: str) -> Unit:
    """Return the unit that a text names for a dimension.

    Parameters
    ----------
    text : str
        The unit as a header, a units row, a cell or the criteria write it.
    dimension : str
        A dimension of `tables/units.csv`, such as ``pressure`` or ``mass flow``.

    Raises
    ------
    UnitRefusedError
        If the text names no unit of that dimension, or names one that could be read in two ways.
    """
    folded = fold_unit(text)
    unit = known_spelling(folded, dimension)
    if isinstance(unit, str):
        raise UnitRefusedError(f"unit {_shown(text)}: {unit}")
    if unit is None and folded:
        unit = unit_of_pint(folded, dimension)
    if unit is None:
        raise UnitRefusedError(
            f"unit {_shown(text)} is not a unit of {dimension} that is understood here.{_hint(text)}"
        )
    if unit.reference == "?" or (dimension == "pressure" and not unit.reference):
        gauge, absolute = _with_reference(unit)
        raise UnitRefusedError(f"unit {_shown(text)} does not say gauge or absolute: write {gauge} or {absolute}.")
    return unit


def _hint(text: str) -> str:
    """Return what else is known of a unit that is none of its dimension."""
    strange = strange_letters(fold_unit(text))
    if strange:
        return f" It holds {strange}."
    others = dimensions_knowing(text)
    if others:
        return f" It is a unit of {others[0]}."
    asked = ((dimension, form) for form in forms_of(fold_unit(text)) for dimension in _FLOWS)
    question = next(filter(None, (question_of(form, dimension) for dimension, form in asked)), "")
    return f" Of a flow: {question}" if question else ""


def _with_reference(unit: Unit) -> tuple[str, str]:
    """Return a bare pressure unit as gauge and as absolute, as people write it."""
    spelling = "psi" if unit.spelling.startswith("#") else unit.spelling
    if spelling.endswith(("g", "a", "O", "C")) and not spelling.endswith("Pa"):
        return f"{spelling}(g)", f"{spelling}(a)"
    return f"{spelling}g", f"{spelling}a"


def to_si(numbers: FloatArray | float, unit: Unit, *, atmosphere: float = STANDARD_ATMOSPHERE) -> FloatArray:
    """Convert numbers of a unit to SI; a gauge pressure rests on the site's atmosphere (Pa)."""
    if unit.reference == API:
        return _of_degrees_api(numbers, unit)
    shift = unit.offset + (atmosphere if unit.reference == "gauge" else 0.0)
    return np.asarray(numbers, dtype=np.float64) * unit.scale + shift


def from_si(values: FloatArray | float, unit: Unit, *, atmosphere: float = STANDARD_ATMOSPHERE) -> FloatArray:
    """Convert SI values back to numbers of a unit."""
    if unit.reference == API:
        with np.errstate(divide="ignore"):
            return np.divide(unit.scale, np.asarray(values, dtype=np.float64)) - unit.offset
    shift = unit.offset + (atmosphere if unit.reference == "gauge" else 0.0)
    return (np.asarray(values, dtype=np.float64) - shift) / unit.scale


def _of_degrees_api(numbers: FloatArray | float, unit: Unit) -> FloatArray:
    """Return the density at 60 degF, kg/m3, by the definition of API MPMS 11.1: SG 60/60 = 141.5 / (API + 131.5)."""
    with np.errstate(divide="ignore"):
        return np.divide(unit.scale, np.asarray(numbers, dtype=np.float64) + unit.offset)


_QUANTITY = re.compile(r"\s*([-+]?(?:\d+\.?\d*|\.\d+)(?:[eE][-+]?\d{1,3})?)\s*(.*?)\s*", re.ASCII)


def read_quantity(text: str, dimension: str, *, atmosphere: float = STANDARD_ATMOSPHERE) -> float:
    """Read one quantity such as ``3.0 m/s`` or ``0.45 bar / 100 m`` and return its SI value.

    Raises
    ------
    UnitRefusedError
        If the text is no number with a unit of that dimension (a dimensionless number needs no unit).
    """
    match = _QUANTITY.fullmatch(text) if len(text) <= 80 else None
    if match is None:
        raise UnitRefusedError(f"{text[:80]!r} is not a number with a unit of {dimension}.")
    if not match[2] and dimension in ("dimensionless", "fraction"):
        return float(match[1])
    if not match[2]:
        raise UnitRefusedError(f"{text!r} has no unit: write one of {dimension}.")
    value = float(to_si(float(match[1]), read_unit(match[2], dimension), atmosphere=atmosphere))
    if not np.isfinite(value):
        raise UnitRefusedError(f"{text!r} is not a finite number.")
    return value
