"""One column that will be read: its field, case and unit."""

from __future__ import annotations

from dataclasses import dataclass

from checker.fields import Field
from checker.units import Unit

__all__ = ["FLOWS", "PlannedColumn"]

FLOWS = ("flow_mass", "flow_volume", "flow_standard")


@dataclass(frozen=True, slots=True)
class PlannedColumn:
    """One column that will be read.

    `unit` is the unit as written, `reading` the unit understood (None for texts and sizes, and where `refusal` says why
    bare numbers cannot be read), `basis` the basis of bare sizes, `hinted` whether the criteria name the column.
    """

    index: int
    header: str
    field: Field
    case: str = ""
    unit: str = ""
    reading: Unit | None = None
    refusal: str = ""
    basis: str = ""
    hinted: bool = False
