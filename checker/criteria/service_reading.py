"""The services of a criteria file: its `[[service]]` tables become records."""

from __future__ import annotations

import math
from collections.abc import Mapping, Sequence
from itertools import pairwise
from typing import Any

from checker.criteria.criteria import LIMIT_DIMENSION, Limit, Service
from checker.criteria.places import PathPart, ProblemList, shown
from checker.criteria.quantities import read_size, read_value
from checker.criteria.structure import conforms, criteria_schema
from checker.criteria.text_folding import fold_pattern, fold_text

__all__ = ["NO_LIMIT", "RELIEF_CASE", "read_services", "same_name"]

NO_LIMIT = "none"
RELIEF_CASE = "relief"
_MAY_BE_ZERO = ("npsh_margin_minimum", "velocity_minimum")


def _written(value: str | float) -> str:
    return value.strip() if isinstance(value, str) else f"{value:g}"


def _limit_value(value: str | float, key: str, path: Sequence[PathPart], problems: ProblemList) -> float:
    number = read_value(value, LIMIT_DIMENSION[key], path, problems)
    if number < 0.0 or (number == 0.0 and key not in _MAY_BE_ZERO):
        problems.add(path, f"{shown(value)}: a limit is more than zero.", f"Write a positive {key}.")
        return math.nan
    return number


def _upper(
    band: Mapping[str, Any], by: str, path: Sequence[PathPart], problems: ProblemList, atmosphere: float
) -> float:
    if "up_to" not in band:
        return math.inf
    if by == "size":
        return read_size(band["up_to"], [*path, "up_to"], problems)
    return read_value(band["up_to"], "pressure", [*path, "up_to"], problems, atmosphere=atmosphere)


def _check_ascending(uppers: Sequence[float], path: Sequence[PathPart], problems: ProblemList) -> None:
    if not math.isinf(uppers[-1]):
        problems.add(
            path,
            "the last band ends at an up_to: nothing holds above it.",
            "Add a last band { value = ... } without up_to.",
        )
    for index, (lower, upper) in enumerate(pairwise(uppers)):
        if not math.isnan(lower) and not math.isnan(upper) and upper <= lower:
            remedy = "Write the bands in ascending order of up_to; only the last has none."
            problems.add([*path, index + 1], "the bands do not ascend here.", remedy)


def _band_text(band: Mapping[str, Any]) -> str:
    where = f"up to {band['up_to']}" if "up_to" in band else "above"
    return f"{where}: {_written(band['value'])}"


def _banded(
    key: str, raw: Mapping[str, Any], path: Sequence[PathPart], problems: ProblemList, atmosphere: float
) -> Limit:
    bands, place = raw["bands"], [*path, "bands"]
    uppers = tuple(_upper(band, raw["by"], [*place, index], problems, atmosphere) for index, band in enumerate(bands))
    _check_ascending(uppers, place, problems)
    values = tuple(
        _limit_value(band["value"], key, [*place, index, "value"], problems) for index, band in enumerate(bands)
    )
    texts = tuple(_written(band["value"]) for band in bands)
    return Limit(key, "; ".join(map(_band_text, bands)), raw["by"], uppers, values, texts)


def _limit(
    key: str, raw: Any, service: Mapping[str, Any], path: Sequence[PathPart], problems: ProblemList, atmosphere: float
) -> Limit | None:
    """Return one limit; None where the service says ``none``."""
    table = raw if isinstance(raw, dict) else {"value": raw}
    if "bands" in table:
        limit = _banded(key, table, path, problems, atmosphere)
    elif isinstance(table["value"], str) and table["value"].strip().casefold() == NO_LIMIT:
        return None
    else:
        text = _written(table["value"])
        limit = Limit(key, text, "", (math.inf,), (_limit_value(table["value"], key, path, problems),), (text,))
    return Limit(
        limit.key,
        limit.text,
        limit.by,
        limit.uppers,
        limit.values,
        limit.texts,
        source=table.get("source", service.get("source", "")),
        basis=table.get("basis", service.get("basis", "")),
        confirmed=str(table.get("confirmed", service.get("confirmed", ""))).strip(),
    )


def _well_shaped(raw: Mapping[str, Any]) -> dict[str, Any]:
    """Return a service's keys without the limits whose shape is wrong; the schema speaks of those."""
    shapes = criteria_schema()["$defs"]["service"]["properties"]
    return {key: value for key, value in raw.items() if key not in LIMIT_DIMENSION or conforms(value, shapes[key])}


def _limits(
    raw: Mapping[str, Any], path: Sequence[PathPart], problems: ProblemList, atmosphere: float
) -> dict[str, Limit]:
    limits = {
        key: _limit(key, raw[key], raw, [*path, key], problems, atmosphere) for key in LIMIT_DIMENSION if key in raw
    }
    return {key: limit for key, limit in limits.items() if limit is not None}


def _check_patterns(matches: Sequence[str], path: Sequence[PathPart], problems: ProblemList) -> None:
    for index, pattern in enumerate(matches):
        if not fold_pattern(pattern).strip("*"):
            problems.add(
                [*path, "matches", index],
                f"{shown(pattern)} would match every service or none.",
                "Write a code or a word; for all others mark a row general = true.",
            )


def _check_minimum(limits: Mapping[str, Limit], path: Sequence[PathPart], problems: ProblemList) -> None:
    least, most = limits.get("velocity_minimum"), limits.get("velocity_maximum")
    if least and most and not least.by and not most.by and least.values[0] > most.values[0]:
        problems.add(
            [*path, "velocity_minimum"],
            f"the minimum {least.text} is above the maximum {most.text}.",
            "Correct one of the two.",
        )


def _texts(value: object) -> tuple[str, ...]:
    return tuple(text for text in value if isinstance(text, str)) if isinstance(value, list) else ()


def _text(raw: Mapping[str, Any], key: str) -> str:
    value = raw.get(key, "")
    return value if isinstance(value, str) else ""


def _relief_case(raw: Mapping[str, Any], path: Sequence[PathPart], problems: ProblemList) -> str:
    case = raw.get("relief_case", RELIEF_CASE)
    if isinstance(case, str) and case and not case.strip():
        problems.add([*path, "relief_case"], "the text names no case.", f'Write a case such as "{RELIEF_CASE}".')
    return " ".join(case.split()) if isinstance(case, str) else ""


def _service(raw: Mapping[str, Any], path: Sequence[PathPart], problems: ProblemList, atmosphere: float) -> Service:
    matches = _texts(raw.get("matches"))
    limits = _limits(raw, path, problems, atmosphere)
    _check_patterns(matches, path, problems)
    _check_minimum(limits, path, problems)
    if raw.get("general") is True and "phase" not in raw:
        problems.add(path, "a general row names no phase.", 'Write phase = "liquid", "gas" or "two-phase".')
    force = raw.get("force")
    return Service(
        name=_text(raw, "name"),
        matches=matches,
        phase=_text(raw, "phase"),
        general=raw.get("general") is True,
        steam=raw.get("steam") is True,
        pump_suction=raw.get("pump_suction") is True,
        solids_free=raw.get("solids_free") is True,
        relief=raw.get("relief") is True,
        relief_case=_relief_case(raw, path, problems),
        pressure_basis=_text(raw, "pressure_basis"),
        limits=limits,
        force=dict(force) if isinstance(force, dict) else {},
        source=_text(raw, "source"),
        basis=_text(raw, "basis"),
        confirmed=_text(raw, "confirmed").strip(),
        note=_text(raw, "note"),
    )


def same_name(name: object) -> str:
    """Return a service's name as it is compared: case, blanks and punctuation aside."""
    return fold_text(name) if isinstance(name, str) else ""


def _check_unique(services: Sequence[Service], problems: ProblemList) -> None:
    names: dict[str, int] = {}
    phases: dict[str, str] = {}
    for index, service in enumerate(services):
        first = names.setdefault(same_name(service.name), index)
        if first != index and service.name:
            what = f"the name is used before, by service number {first + 1}."
            problems.add(["service", index, "name"], what, "Give each service its own name, or write one table.")
        if service.general and phases.setdefault(service.phase, service.name) != service.name:
            what = f"the general row for {service.phase} is {phases[service.phase]!r} already."
            problems.add(["service", index, "general"], what, "Mark one row of each phase general.")


def read_services(
    raw: object, problems: ProblemList, *, atmosphere: float, shape_is_good: bool = False
) -> tuple[Service, ...]:
    """Return the services of a document and note everything that is wrong with them.

    Parameters
    ----------
    raw : object
        The `service` entry of the document; parts whose shape is wrong are passed over, the schema speaks of them.
    atmosphere : float
        Atmospheric pressure of the site, Pa: gauge pressures of bands rest on it.
    shape_is_good : bool
        True for a document that is known to fit the schema: looking again costs time at every start.
    """
    tables = [table if isinstance(table, dict) else {} for table in raw] if isinstance(raw, list) else []
    tables = tables if shape_is_good else [_well_shaped(table) for table in tables]
    services = tuple(_service(table, ["service", index], problems, atmosphere) for index, table in enumerate(tables))
    _check_unique(services, problems)
    return services
