"""The tables of a criteria file besides its services: site, methods, defaults, recommendation, units, columns."""

from __future__ import annotations

import math
from collections.abc import Mapping
from dataclasses import dataclass
from difflib import get_close_matches
from functools import cache
from typing import Any

from checker.criteria.hints import ColumnHint
from checker.criteria.nominal_size import SIZE_BASES
from checker.criteria.places import LONGEST_SHOWN, ProblemList, shown
from checker.criteria.quantities import LARGEST_ROUGHNESS, read_atmosphere, read_number, read_value
from checker.fields import all_fields, field_named
from checker.unit_spelling import fold_unit
from checker.units import STANDARD_ATMOSPHERE, UnitRefusedError, read_unit

__all__ = ["Settings", "read_settings"]

_SIZE_UNITS = frozenset(word for words in SIZE_BASES.values() for word in words.split())
_TableOf = Mapping[str, Any]


@dataclass(frozen=True, slots=True)
class Settings:
    """What a criteria file says besides its services; fields as in `checker.criteria.criteria.Criteria`."""

    title: str
    document: str
    jurisdictions: tuple[str, ...]
    atmosphere: float
    ambient_minimum: float
    ambient_maximum: float
    gas_method: str
    two_phase_method: str
    fittings_method: str
    downhill_recovery: bool
    units: Mapping[str, str]
    columns: Mapping[str, ColumnHint]
    gross_factor: float
    coverage_minimum: float
    stated_values_tolerance: float
    fittings_allowance: float
    roughness: Mapping[str, float]


def _table(document: _TableOf, name: str) -> _TableOf:
    table = document.get(name)
    return table if isinstance(table, dict) else {}


def _text(table: _TableOf, key: str, otherwise: str = "") -> str:
    value = table.get(key, otherwise)
    return value if isinstance(value, str) else otherwise


def _quantity(document: _TableOf, table: str, key: str, dimension: str, problems: ProblemList) -> float:
    value = _table(document, table).get(key)
    return read_value(value, dimension, [table, key], problems) if isinstance(value, str) else math.nan


def _number(document: _TableOf, table: str, key: str, otherwise: float, problems: ProblemList) -> float:
    value = _table(document, table).get(key)
    if not isinstance(value, int | float) or isinstance(value, bool):
        return otherwise
    return read_number(value, [table, key], problems)


def _atmosphere(document: _TableOf, problems: ProblemList) -> float:
    text = _table(document, "site").get("atmospheric_pressure")
    value = read_atmosphere(text, ["site", "atmospheric_pressure"], problems) if isinstance(text, str) else math.nan
    return STANDARD_ATMOSPHERE if math.isnan(value) else value


@cache
def _dimensions() -> tuple[str, ...]:
    return tuple(sorted({field.dimension for field in all_fields() if field.kind == "number"}))


def _closest(word: str, known: tuple[str, ...]) -> str:
    close = get_close_matches(word, known, n=1, cutoff=0.5) if len(word) <= LONGEST_SHOWN else []
    return f"The closest known one is {close[0]!r}." if close else f"Known: {', '.join(known)}."


def _units(document: _TableOf, problems: ProblemList) -> dict[str, str]:
    units: dict[str, str] = {}
    for key, unit in _table(document, "units").items():
        dimension = key.replace("_", " ")
        if dimension in ("size", "nominal size"):
            if isinstance(unit, str) and _size_unit_is_read(unit, ["units", key], problems):
                units["size"] = unit
        elif dimension not in _dimensions():
            problems.add(["units", key], f"{shown(key)} is no dimension of a line list.", _closest(key, _dimensions()))
        elif isinstance(unit, str) and _unit_is_read(unit, dimension, ["units", key], problems):
            units[dimension] = unit
    return units


def _unit_is_read(unit: str, dimension: str, path: list[str | int], problems: ProblemList) -> bool:
    try:
        read_unit(unit, dimension)
    except UnitRefusedError as error:
        problems.add(path, str(error), f"Write a unit of {dimension}.")
        return False
    return True


def _size_unit_is_read(unit: str, path: list[str | int], problems: ProblemList) -> bool:
    read = fold_unit(unit).casefold() in _SIZE_UNITS
    if not read:
        what = f"{shown(unit)} is no unit of a nominal size."
        problems.add(path, what, 'Write "NPS" or "DN", or "inches x 100" for codes such as 0600.')
    return read


def _check_column_unit(field: str, unit: str, path: list[str | int], problems: ProblemList) -> None:
    described = field_named(field)
    if described.kind == "number":
        _unit_is_read(unit, described.dimension, path, problems)
    elif described.kind == "size":
        _size_unit_is_read(unit, path, problems)
    elif described.kind == "text":
        problems.add(path, f"field {field!r} is a text and takes no unit.", "Leave the unit away.")


def _columns(document: _TableOf, problems: ProblemList) -> dict[str, ColumnHint]:
    known = tuple(field.name for field in all_fields())
    columns: dict[str, ColumnHint] = {}
    for header, raw in _table(document, "columns").items():
        hint = raw if isinstance(raw, dict) else {}
        field, unit = _text(hint, "field"), _text(hint, "unit")
        if field and field not in known:
            problems.add(["columns", header, "field"], f"{shown(field)} is no field.", _closest(field, known))
        elif field:
            if unit:
                _check_column_unit(field, unit, ["columns", header, "unit"], problems)
            columns[header] = ColumnHint(field, unit, _text(hint, "case"))
    return columns


def _roughness(document: _TableOf, problems: ProblemList) -> dict[str, float]:
    table = _table(document, "defaults").get("roughness")
    roughness: dict[str, float] = {}
    for material, text in (table if isinstance(table, dict) else {}).items():
        if isinstance(text, str):
            path: list[str | int] = ["defaults", "roughness", material]
            value = read_value(text, "diameter", path, problems)
            if value < 0.0:
                problems.add(path, f"{shown(text)}: a roughness is not negative.", "Write zero or more.")
            elif value > LARGEST_ROUGHNESS:
                what = f"{shown(text)}: no pipe is rougher than {LARGEST_ROUGHNESS * 1e3:g} mm."
                problems.add(path, what, "Check the unit: steel has some 0.05 mm.")
            roughness[" ".join(material.casefold().split())] = value
    return roughness


def _check_ambient(least: float, most: float, problems: ProblemList) -> None:
    if least > most:
        what = "the ambient minimum is above the maximum."
        problems.add(["site", "ambient_minimum"], what, "Correct one of the two.")
    for key, value in (("ambient_minimum", least), ("ambient_maximum", most)):
        if value <= 0.0:
            problems.add(["site", key], "the temperature is below absolute zero.", "Correct it.")


def read_settings(document: _TableOf, problems: ProblemList) -> Settings:
    """Return what a document says besides its services and note everything that is wrong with it.

    Parts whose shape is wrong are passed over: the schema speaks of them.
    """
    project, methods = _table(document, "project"), _table(document, "methods")
    jurisdictions = project.get("jurisdictions")
    ambient_minimum = _quantity(document, "site", "ambient_minimum", "temperature", problems)
    ambient_maximum = _quantity(document, "site", "ambient_maximum", "temperature", problems)
    _check_ambient(ambient_minimum, ambient_maximum, problems)
    return Settings(
        title=_text(project, "title"),
        document=_text(project, "document"),
        jurisdictions=tuple(filter(None, map(str, jurisdictions))) if isinstance(jurisdictions, list) else (),
        atmosphere=_atmosphere(document, problems),
        ambient_minimum=ambient_minimum,
        ambient_maximum=ambient_maximum,
        gas_method=_text(methods, "gas", "isothermal"),
        two_phase_method=_text(methods, "two_phase", "beggs-brill"),
        fittings_method=_text(methods, "fittings", "crane"),
        downhill_recovery=methods.get("downhill_recovery") is True,
        units=_units(document, problems),
        columns=_columns(document, problems),
        gross_factor=_number(document, "recommendation", "gross_factor", 1.25, problems),
        coverage_minimum=_number(document, "recommendation", "coverage_minimum", 0.9, problems),
        stated_values_tolerance=_number(document, "defaults", "stated_values_tolerance", 0.1, problems),
        fittings_allowance=_number(document, "defaults", "fittings_allowance", math.nan, problems),
        roughness=_roughness(document, problems),
    )
