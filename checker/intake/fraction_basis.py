"""Vapour fractions by mass and by mole: only one that says mass is read as the mass fraction it must be."""

from __future__ import annotations

import re
from collections.abc import Sequence
from dataclasses import replace
from itertools import islice

from checker.intake.column_fields import UNSETTLED
from checker.intake.planned import PlannedColumn
from checker.intake.texts import fold_words, shown
from checker.intake.unit_words import unit_in_cell

__all__ = ["with_fraction_basis"]

FRACTIONS = ("vapour_fraction", "vapour_fraction_outlet")
CELLS_LOOKED_AT = 20_000
_MASS = re.compile(
    r"\b(?:mass\w*|wt|weight|quality|dryness|x mass|masica|massica|массовая)\b|\u8cea\u91cf|\u8d28\u91cf"
)
_MOLE = re.compile(r"\b(?:mol|mols|mole|moles|molar|molaire|molare?|kmol)\b")
_MASS_UNIT = re.compile(r"kg/kg|wt|mass|w/w|weight|w%|%w|ppmw")
_MOLE_UNIT = re.compile(r"mol")
MOLE = (
    "a mole fraction is not a mass fraction, and only the mass fraction is read: give the vapour fraction by mass, or "
    "name the column in [columns] with the unit 'kg/kg' or 'wt%' if it holds one."
)
NEITHER = (
    "does not say whether the vapour fraction is by mass or by mole: write (mass) in the header, or name the column in "
    "[columns] with the unit 'kg/kg' or 'wt%' if it holds the mass fraction."
)


def _cells_say_mass(column: PlannedColumn, cells: Sequence[str]) -> bool:
    """Return whether every cell that carries a unit says by mass, so that those cells can be read one by one."""
    for cell in dict.fromkeys(islice(cells, CELLS_LOOKED_AT)):
        unit = cell.strip().lstrip("+-0123456789.,eE ")
        known = bool(unit) and not isinstance(unit_in_cell(unit, column.field.dimension), str)
        if known and not _MASS_UNIT.search(unit.casefold()):
            return False
    return True


def with_fraction_basis(column: PlannedColumn, cells: Sequence[str]) -> PlannedColumn:
    """Return a vapour fraction's column, refused where neither header, unit nor criteria say that it is by mass.

    Parameters
    ----------
    column : PlannedColumn
        A column with its unit read.
    cells : sequence of str
        Its cells: some may say ``wt%`` themselves.
    """
    if column.field.name not in FRACTIONS or column.hinted or column.header.strip().casefold() == column.field.name:
        return column
    words, unit = fold_words(column.header), column.unit.casefold()
    if _MOLE.search(words) or _MOLE_UNIT.search(unit):
        return replace(column, reading=None, refusal=f"{shown(column.header)}: {MOLE}")
    if _MASS.search(words) or _MASS_UNIT.search(unit):
        return column
    field = column.field
    if not _cells_say_mass(column, cells):
        field = replace(field, dimension=UNSETTLED)  # a bare % in a cell would say mass otherwise
    return replace(column, field=field, reading=None, refusal=f"{shown(column.header)} {NEITHER}")
