"""The columns of an equipment list: their meaning, unit and spellings, and the kinds of equipment."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass
from functools import cache

from checker.fields import Field
from checker.intake.texts import key_of
from checker.tables.reading import read_table

__all__ = ["KINDS", "EquipmentField", "equipment_fields", "field_of_key", "kind_of"]

#: Kinds of equipment, and other words that lists use for each.
KINDS = {
    "vessel": "drum; separator; tank; column; tower; reactor; sphere; knock-out drum",
    "pump": "centrifugal pump",
    "reciprocating pump": "plunger pump; piston pump; diaphragm pump; metering pump",
    "exchanger": "heat exchanger; cooler; condenser; heater; reboiler; air cooler",
    "control valve": "level control valve; flow control valve; pressure control valve",
    "relief valve": "safety valve; safety relief valve; pressure safety valve; PSV",
    "filter": "strainer",
    "tie-in": "tie-in point; battery limit",
}


@dataclass(frozen=True, slots=True)
class EquipmentField:
    """One column of an equipment list.

    Attributes
    ----------
    field : Field
        Name, kind of cell, dimension, bounds and spellings, as of a line list's field.
    examples : tuple of str
        A cell of each example row of the blank equipment list.
    """

    field: Field
    examples: tuple[str, ...]


def _field(row: Mapping[str, str]) -> Field:
    return Field(
        name=row["name"],
        group="equipment",
        kind=row["kind"],
        dimension=row["dimension"],
        unit=row["unit"],
        above=float(row["above_SI"] or "-inf"),
        below=float(row["below_SI"] or "inf"),
        per_case=False,
        one_case=False,
        meaning=row["meaning"],
        spellings=tuple(part.strip() for part in row["spellings"].split(";")),
    )


@cache
def equipment_fields() -> tuple[EquipmentField, ...]:
    """Return every column of an equipment list, in its order."""
    return tuple(
        EquipmentField(_field(row), (row["example_vessel"], row["example_pump"]))
        for row in read_table("equipment_fields")
    )


@cache
def field_of_key() -> Mapping[str, Field]:
    """Return the field of each header spelling, folded."""
    found: dict[str, Field] = {}
    for each in equipment_fields():
        found.update({key_of(text): each.field for text in (each.field.name, *each.field.spellings)})
    return found


@cache
def _kinds() -> Mapping[str, str]:
    return {key_of(text): kind for kind, others in KINDS.items() for text in (kind, *others.split(";"))}


def kind_of(text: str) -> str:
    """Return the kind of equipment that a cell names, empty where it names none that is known."""
    return _kinds().get(key_of(text), "")
