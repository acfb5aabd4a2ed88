"""Numbers that look like something else: stand-ins for an unknown value, and ranges that have lost their mark."""

from __future__ import annotations

import re

import numpy as np

from checker.fields import Field
from checker.intake.texts import shown, tidy
from checker.model import BoolArray, FloatArray
from checker.units import Unit, to_si

__all__ = ["doubt_of", "is_stand_in", "stand_in_reason", "stand_ins"]

# Not 999.9 and the like: water has that density.
_NINES = np.array([float(f"{'9' * before}{mark}") for before in range(4, 10) for mark in ("", ".9", ".99", ".999")])
_STATE = frozenset(
    {
        "pressure", "temperature", "density", "viscosity", "molar_mass", "liquid_density", "liquid_viscosity",
        "vapour_density", "vapour_viscosity", "vapour_pressure", "source_pressure", "pressure_design",
        "pressure_design_minimum", "temperature_design", "temperature_design_minimum", "pressure_test",
        "pressure_drop_allowed", "pressure_drop_stated", "pressure_gradient_stated", "velocity_allowed",
        "velocity_stated", "npsh_required", "static_head",
    }
)  # fmt: skip
_UNKNOWN = re.compile(r"[-+]?(?:0(?:[.,]0*)?|9{3,12}(?:[.,]9{1,6})?)", re.ASCII)
_JOINED = re.compile(r"(-?)(\d{3,8})", re.ASCII)
_ADVICE = "leave the cell blank or write HOLD if the value is not known."


def stand_ins(numbers: FloatArray, field: Field) -> BoolArray:
    """Return where numbers as written are four or more nines, a common stand-in for *unknown*.

    They are refused in the state of the fluid, the design values, differences and gradients of pressure, velocities
    and heads even where they lie within the bounds, and below zero in every field.

    Parameters
    ----------
    numbers : float array
        Numbers as the cells write them, before any unit; NaN where there is none.
    field : Field
        Field of the column.
    """
    found = np.zeros(numbers.shape, dtype=np.bool_)
    large = np.flatnonzero(np.abs(numbers) >= _NINES[0] if field.name in _STATE else numbers <= -_NINES[0])
    if large.size:
        found[large] = np.isin(np.abs(numbers[large]), _NINES)
    return found


def is_stand_in(number: float, field: Field) -> bool:
    """Return whether one number as written is a stand-in for *unknown* (see `stand_ins`)."""
    return (number <= -9999.0 or (number >= 9999.0 and field.name in _STATE)) and abs(number) in _NINES


def stand_in_reason(text: str) -> str:
    """Return the sentence that refuses a stand-in."""
    return f"{shown(text)} looks like a stand-in for an unknown value: write the value, or {_ADVICE}"


def _splits(text: str, field: Field, unit: Unit, atmosphere: float) -> list[tuple[int, int]]:
    """Return the one or two most even ways in which an impossible whole number parts into two plausible ones."""
    match = _JOINED.fullmatch(text)
    if match is None:
        return []
    sign, digits = match[1], match[2]
    places = [place for place in range(1, len(digits)) if digits[place] != "0"]
    pairs = [(int(sign + digits[:place]), int(digits[place:])) for place in places]
    likely = [
        (abs(len(str(abs(low))) - len(str(high))), low, high)
        for low, high in pairs
        if low < high
        and all(field.above < to_si(end, unit, atmosphere=atmosphere) < field.below for end in (low, high))
    ]
    return [(low, high) for uneven, low, high in likely if uneven == min(likely)[0]][:2]


def doubt_of(text: str, field: Field, unit: Unit | None, atmosphere: float) -> str:
    """Return a sentence to append to the refusal of an impossible number, with a leading blank; else an empty text.

    It says that 0 or 9999 looks like a stand-in, or that ``-46100`` may have been ``-46 to 100``.

    Parameters
    ----------
    text : str
        The cell as written.
    field, unit, atmosphere : Field, Unit or None, float
        Field and unit of the column, and the site's atmospheric pressure, Pa.
    """
    plain = tidy(text[:100])
    if _UNKNOWN.fullmatch(plain):
        return f" It looks like a stand-in for an unknown value: {_ADVICE}"
    splits = [] if unit is None or len(text) > 20 else _splits(plain, field, unit, atmosphere)
    names = " or ".join(f"{low} to {high}" for low, high in splits)
    return f" A range mark may have been lost: was it {names}?" if names else ""
