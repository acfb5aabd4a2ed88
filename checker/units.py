"""The one door at which units become SI.

Common spellings stand in `tables/units.csv`, whose factors come from pint and are tested against it; a spelling the
table does not hold is offered to pint itself, once a column, after a strict look at its characters. Inside the
program there are only SI floats.
"""

from __future__ import annotations

import csv
import re
from collections.abc import Mapping
from functools import cache
from pathlib import Path
from typing import TYPE_CHECKING, NamedTuple

import numpy as np
from numpy.typing import NDArray

from checker.unit_spelling import fold_unit

if TYPE_CHECKING:
    import pint as pint_types

__all__ = [
    "STANDARD_ATMOSPHERE",
    "Unit",
    "UnitRefusedError",
    "dimensions_knowing",
    "from_si",
    "read_quantity",
    "read_unit",
    "to_si",
]

STANDARD_ATMOSPHERE = 101_325.0
TABLE = Path(__file__).parent / "tables" / "units.csv"
FloatArray = NDArray[np.float64]

_PINT_DIMENSION = {
    "pressure": "[pressure]",
    "pressure difference": "[pressure]",
    "stress": "[pressure]",
    "pressure gradient": "[pressure]/[length]",
    "temperature": "[temperature]",
    "mass flow": "[mass]/[time]",
    "volume flow": "[volume]/[time]",
    "density": "[mass]/[volume]",
    "viscosity": "[viscosity]",
    "molar mass": "[mass]/[substance]",
    "length": "[length]",
    "diameter": "[length]",
    "velocity": "[speed]",
    "surface tension": "[force]/[length]",
    "time": "[time]",
    "momentum flux": "[pressure]",
}
_PLAIN_UNIT = re.compile(r"[A-Za-zµ_]{1,24}[23]?([/*][A-Za-zµ_]{1,24}[23]?){0,3}")
_SHORT = ("kg", "lb", "ft", "in", "yd", "mi", "m", "s", "h", "d", "N", "J", "W")
_AMBIGUOUS = ("ton", "tons", "Ton", "Tons", "TON", "TONS", "cwt", "gallon", "gal", "barrel")
_QUESTIONS = {
    ("viscosity", "MPas"): "megapascal seconds are no viscosity of a fluid: write mPa.s if that is meant.",
    ("mass flow", "MLB/H"): "M is a thousand to some and a million to others: write klb/h or lb/h.",
    ("mass flow", "MLB/HR"): "M is a thousand to some and a million to others: write klb/h or lb/h.",
    ("standard flow", "MSCFD"): "M is a thousand to some and a million to others: write MMSCFD or scf/d.",
    ("density", "degAPI"): "degrees API are not linear in density: give kg/m3.",
    ("density", "API"): "degrees API are not linear in density: give kg/m3.",
    ("fraction", "mol"): "a mole fraction is not a mass fraction: give the mass fraction.",
    ("fraction", "mol%"): "a mole fraction is not a mass fraction: give the mass fraction.",
    ("fraction", "mole"): "a mole fraction is not a mass fraction: give the mass fraction.",
}


class UnitRefusedError(ValueError):
    """A unit that cannot be read for this dimension; the text says why and what to write."""


class Unit(NamedTuple):
    """One unit of one dimension: ``SI = number * scale + offset`` (+ the site's atmosphere when gauge)."""

    spelling: str
    dimension: str
    scale: float
    offset: float
    reference: str


@cache
def _table() -> Mapping[tuple[str, str], Unit]:
    with TABLE.open(encoding="utf-8", newline="") as handle:
        return {
            (row["dimension"], row["spelling"]): Unit(
                row["spelling"],
                row["dimension"],
                float(row["scale_to_SI"]),
                float(row["offset_to_SI"]),
                row["reference"],
            )
            for row in csv.DictReader(handle)
        }


@cache
def _any_case() -> Mapping[tuple[str, str], tuple[Unit, ...]]:
    units: dict[tuple[str, str], tuple[Unit, ...]] = {}
    for (dimension, spelling), unit in _table().items():
        key = (dimension, spelling.casefold())
        units[key] = (*units.get(key, ()), unit)
    return units


def _in_any_case(folded: str, dimension: str) -> Unit | None:
    """Return the unit whose spelling differs by case only, where no prefix hangs on that case."""
    candidates = [
        unit
        for unit in _any_case().get((dimension, folded.casefold()), ())
        if folded[0] == unit.spelling[0] or folded[0] not in "mM"
    ]
    meanings = {(unit.scale, unit.offset, unit.reference) for unit in candidates}
    return candidates[0] if len(meanings) == 1 else None


def _plain_names(folded: str, registry: pint_types.UnitRegistry[float]) -> bool:
    """Return whether no name is read through a prefix but kilo: ``nm3/h`` and ``mt/h`` are no nano and no milli."""
    names = [re.sub(r"[23]$", "", name) for name in re.split(r"[/*]", folded)]
    return all(
        name not in _AMBIGUOUS
        and any(prefix in ("", "kilo") for prefix, _, _ in registry.parse_unit_name(name))
        and (len(name) > 2 or name in _SHORT)
        for name in names
    )


@cache
def _registry() -> pint_types.UnitRegistry[float]:
    import pint

    return pint.UnitRegistry()


def _from_pint(folded: str, dimension: str) -> Unit | None:
    """Ask pint for a spelling the table does not hold; None where pint does not know it either."""
    if dimension not in _PINT_DIMENSION or not _PLAIN_UNIT.fullmatch(folded):
        return None
    import pint

    registry = _registry()
    if not _plain_names(folded, registry):
        return None
    try:
        one, two = (registry.Quantity(number, re.sub(r"([23])", r"**\1", folded)) for number in (1.0, 2.0))
        if not one.check(_PINT_DIMENSION[dimension]):
            return None
        scale = float(one.to_base_units().magnitude)
        return Unit(folded, dimension, scale, 0.0, "") if two.to_base_units().magnitude == 2.0 * scale else None
    except (pint.errors.PintError, AttributeError, TypeError, ValueError):
        return None


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
    unit = _table().get((dimension, folded))
    if unit is None and (dimension, folded) in _QUESTIONS:
        raise UnitRefusedError(f"unit {text!r}: {_QUESTIONS[dimension, folded]}")
    if unit is None and folded:
        unit = _in_any_case(folded, dimension) or _from_pint(folded, dimension)
    if unit is None:
        raise UnitRefusedError(f"unit {text!r} is not a unit of {dimension} that is understood here.")
    if unit.reference == "?" or (dimension == "pressure" and not unit.reference):
        raise UnitRefusedError(f"unit {text!r} does not say gauge or absolute: write {folded}g or {folded}a.")
    return unit


def dimensions_knowing(text: str) -> tuple[str, ...]:
    """Return the dimensions whose table holds this spelling, case aside."""
    folded = fold_unit(text)
    if not folded:
        return ()
    return tuple(
        sorted(
            {
                dimension
                for dimension, _ in _any_case()
                if (dimension, folded) in _table() or _in_any_case(folded, dimension) is not None
            }
        )
    )


def to_si(numbers: FloatArray | float, unit: Unit, *, atmosphere: float = STANDARD_ATMOSPHERE) -> FloatArray:
    """Convert numbers of a unit to SI; a gauge pressure rests on the site's atmosphere (Pa)."""
    shift = unit.offset + (atmosphere if unit.reference == "gauge" else 0.0)
    return np.asarray(numbers, dtype=np.float64) * unit.scale + shift


def from_si(values: FloatArray | float, unit: Unit, *, atmosphere: float = STANDARD_ATMOSPHERE) -> FloatArray:
    """Convert SI values back to numbers of a unit."""
    shift = unit.offset + (atmosphere if unit.reference == "gauge" else 0.0)
    return (np.asarray(values, dtype=np.float64) - shift) / unit.scale


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
