"""Data rules told once a row: open items and their age, impossible values, the basis of a size."""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

from checker.model import Coded
from checker.ruling.contract import Source, rule
from checker.ruling.tristate import TriState, all_of

FloatArray = NDArray[np.float64]
BoolArray = NDArray[np.bool_]


def _temperatures(*, temperature_stated: TriState, state_told: TriState) -> TriState:
    return all_of(temperature_stated, state_told)


def _on_hold(*, row_on_hold: TriState) -> TriState:
    return row_on_hold


def _on_hold_with_revision(*, hold_with_revision: TriState) -> TriState:
    return hold_with_revision


def _sizes_with_diameter(*, size_told: TriState) -> TriState:
    return size_told


def _of_another_size(*, value: FloatArray, size_is_another: BoolArray) -> BoolArray:
    return size_is_another


@rule(
    id="impossible-value",
    title="Impossible values",
    on_data=True,
    force="shall",
    sense="condition",
    source=Source("common practice", clause="no line of a line list is above 1 000 degC"),
    applies=_temperatures,
    calculation="operating {temperature}, design {temperature_design}; at most 1 000 degC",
)
def impossible_value(*, impossible: FloatArray) -> FloatArray:
    """Contradict where a temperature is above 1 000 degC.

    What cannot be at all (below absolute zero, no pressure, no density, a negative flow) is refused when it is read:
    this rule then has no value and is `not checked`, with the cell.
    """
    return impossible


@rule(
    id="standing-hold",
    title="Open items of the row",
    on_data=True,
    force="should",
    sense="condition",
    source=Source("common practice", clause="HOLD, to be confirmed, vendor to advise"),
    applies=_on_hold,
    calculation="on HOLD, to be confirmed or left to others: {hold_fields}",
)
def standing_hold(*, hold_fields: Coded) -> NDArray[np.bool_]:
    """Tell every row that the originator has left open in some cell or by its remarks; it cannot be `meets`."""
    return np.greater_equal(hold_fields.codes, 0)


@rule(
    id="aged-hold",
    title="Age of open items",
    on_data=True,
    force="should",
    sense="condition",
    source=Source("common practice", clause="revisions A, B ... before 0, 1 ..."),
    applies=_on_hold_with_revision,
    calculation="{hold_fields} on HOLD at revision {revision}; the newest of the list is {newest_revision}",
)
def aged_hold(*, hold_older: FloatArray, hold_fields: Coded) -> FloatArray:
    """Tell every row on HOLD that was last revised before the newest revision of the list; it cannot be `meets`."""
    return hold_older


@rule(
    id="nominal-size-basis",
    title="Basis of the nominal size",
    on_data=True,
    force="should",
    sense="condition",
    source=Source(
        "ASME B36.10M", "2004", "outside diameter by NPS and DN; within 1 % or 0.5 mm, ISO 4200 too, common practice"
    ),
    applies=_sizes_with_diameter,
    calculation=(
        "size {size} ({outside_diameter_of_size} outside) beside outside diameter {outside_diameter_listed}:"
        " {size_basis_said}"
    ),
    shall_where=_of_another_size,
)
def nominal_size_basis(*, size_basis_contradicts: FloatArray, size_basis_said: Coded) -> FloatArray:
    """Contradict where the outside diameter of the row is not that of its nominal size, or that of the other basis.

    A mistaken basis, or a diameter more than 3 % from that of the size, is a `shall`; what is nearer may be pipe of
    another standard. Without an outside diameter a size that stands on both bases cannot be told apart here; the
    intake refuses columns of mixed bases.
    """
    return size_basis_contradicts
