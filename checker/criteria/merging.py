"""A project's criteria laid over the bundled default: the project's keys win."""

from __future__ import annotations

from collections.abc import Mapping
from typing import Any

from checker.criteria.criteria import LIMIT_DIMENSION
from checker.criteria.service_reading import same_name

__all__ = ["laid_over", "with_origins"]

_KEY_BY_KEY = ("site", "methods", "recommendation", "units", "columns")
PROJECT_BASIS = "project criteria"
Document = Mapping[str, Any]


def with_origins(service: Document, *, source: str, basis: str) -> dict[str, Any]:
    """Return a service each of whose limits says where it comes from.

    After the merge a service may hold figures of two files; written beside each limit, source and basis stay true.
    """
    origin = {"source": service.get("source", source), "basis": service.get("basis", basis)}
    stamped = dict(service)
    for key in LIMIT_DIMENSION:
        if key in stamped:
            limit = stamped[key] if isinstance(stamped[key], dict) else {"value": stamped[key]}
            stamped[key] = {**origin, **limit}
    return stamped


def _merged_service(default: Document, mine: Document) -> dict[str, Any]:
    """Return a default's service with the project's keys over it; rule forces are merged one by one."""
    force = {**default.get("force", {}), **mine.get("force", {})}
    return {**default, **mine, "name": default["name"], **({"force": force} if force else {})}


def _services(default: Document, mine: Document, source: str) -> list[dict[str, Any]]:
    """Return the project's own services first, so that their matches win, then the default's.

    A default's service that the project changes keeps its place unless the project says its matches.
    """
    inherited = {
        same_name(service["name"]): with_origins(service, source="", basis="") for service in default["service"]
    }
    in_front: list[dict[str, Any]] = []
    for service in mine.get("service", []):
        stamped = with_origins(service, source=source, basis=PROJECT_BASIS)
        name = same_name(service["name"])
        if name not in inherited:
            in_front.append({"source": source, "basis": PROJECT_BASIS, **stamped})
        elif "matches" in service:
            in_front.append(_merged_service(inherited.pop(name), stamped))
        else:
            inherited[name] = _merged_service(inherited[name], stamped)
    general = {service["phase"] for service in in_front if service.get("general")}
    kept = [row for row in inherited.values() if not (row.get("general") and row["phase"] in general)]
    return in_front + kept


def laid_over(default: Document, mine: Document, *, source: str) -> dict[str, Any]:
    """Return one document: the project's keys over the default's.

    Parameters
    ----------
    default, mine : mapping
        Documents of the schema's shape.
    source : str
        What a limit of the project's file that names no source of its own is said to come from.
    """
    merged: dict[str, Any] = {**default, **mine}
    for table in _KEY_BY_KEY:
        merged[table] = {**default.get(table, {}), **mine.get(table, {})}
    old, new = default.get("defaults", {}), mine.get("defaults", {})
    merged["defaults"] = {**old, **new, "roughness": {**old.get("roughness", {}), **new.get("roughness", {})}}
    merged["service"] = _services(default, mine, source)
    return merged
