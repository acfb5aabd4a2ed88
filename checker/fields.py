"""The one table of fields: intake, conversion, rules, docs and report read it.

The table itself is `tables/fields.csv`: a row a field, its spellings parted by `; `.
"""

from __future__ import annotations

import csv
from dataclasses import dataclass
from functools import cache
from pathlib import Path

__all__ = ["Field", "all_fields", "field_named"]

TABLE = Path(__file__).parent / "tables" / "fields.csv"


@dataclass(frozen=True, slots=True)
class Field:
    """One field of a line list.

    Attributes
    ----------
    name : str
        Canonical name, also the parameter name by which a rule asks for it.
    group : str
        Part of the list it belongs to: identity, duty, route, stated, limits, suction or mechanical.
    kind : str
        How a cell is read: ``text``, ``number`` or ``size``.
    dimension : str
        Physical dimension of a number (see `checker.units`); empty for texts.
    unit : str
        The unit in which reports show it.
    above, below : float
        SI bounds; a value at or outside them is impossible and is refused.
    per_case : bool
        True where the value belongs to a case of the line (flow, pressure ...).
    one_case : bool
        True where a value that names no case belongs to one case only (the contractor's stated results).
    meaning : str
        One sentence for people.
    spellings : tuple of str
        Header spellings understood besides the name: lower case, no punctuation.
    """

    name: str
    group: str
    kind: str
    dimension: str
    unit: str
    above: float
    below: float
    per_case: bool
    one_case: bool
    meaning: str
    spellings: tuple[str, ...]


def _field(row: dict[str, str]) -> Field:
    return Field(
        name=row["name"],
        group=row["group"],
        kind=row["kind"],
        dimension=row["dimension"],
        unit=row["unit"],
        above=float(row["above_SI"] or "-inf"),
        below=float(row["below_SI"] or "inf"),
        per_case=row["per_case"] == "yes",
        one_case=row["one_case"] == "yes",
        meaning=row["meaning"],
        spellings=tuple(part.strip() for part in row["spellings"].split(";") if part.strip()),
    )


@cache
def all_fields() -> tuple[Field, ...]:
    """Return every field of the table, in its order."""
    with TABLE.open(encoding="utf-8", newline="") as handle:
        return tuple(_field(row) for row in csv.DictReader(handle))


@cache
def _by_name() -> dict[str, Field]:
    return {field.name: field for field in all_fields()}


def field_named(name: str) -> Field:
    """Return the field of that canonical name.

    Raises
    ------
    KeyError
        If the table holds no such field.
    """
    return _by_name()[name]
