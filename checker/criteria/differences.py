"""Where a project's criteria differ from the bundled default, in sentences: old -> new."""

from __future__ import annotations

import math
from collections.abc import Iterator, Mapping

from checker.criteria.criteria import LIMIT_DIMENSION, Limit, Service
from checker.criteria.service_reading import same_name
from checker.criteria.settings import Settings
from checker.units import from_si, read_unit

__all__ = ["differences_between"]

_TOLERANCE = 1e-12
_SETTINGS = {
    "atmosphere": "[site] atmospheric_pressure",
    "ambient_minimum": "[site] ambient_minimum",
    "ambient_maximum": "[site] ambient_maximum",
    "gas_method": "[methods] gas",
    "two_phase_method": "[methods] two_phase",
    "fittings_method": "[methods] fittings",
    "downhill_recovery": "[methods] downhill_recovery",
    "gross_factor": "[recommendation] gross_factor",
    "coverage_minimum": "[recommendation] coverage_minimum",
    "stated_values_tolerance": "[defaults] stated_values_tolerance",
    "fittings_allowance": "[defaults] fittings_allowance",
}
_SHOWN_IN = {
    "atmosphere": ("bar", "pressure difference"),
    "ambient_minimum": ("degC", "temperature"),
    "ambient_maximum": ("degC", "temperature"),
}
_SERVICE_WORDS = (
    "phase",
    "general",
    "steam",
    "pump_suction",
    "solids_free",
    "relief",
    "relief_case",
    "pressure_basis",
    "confirmed",
)


def _word(value: object) -> str:
    if isinstance(value, bool):
        return "yes" if value else "no"
    if isinstance(value, float):
        return "none" if math.isnan(value) else f"{value:.6g}"
    return str(value) or "none"


def _same_numbers(old: tuple[float, ...], new: tuple[float, ...]) -> bool:
    return len(old) == len(new) and all(
        a == b or math.isclose(a, b, rel_tol=_TOLERANCE) for a, b in zip(old, new, strict=True)
    )


def _same_limit(old: Limit | None, new: Limit | None) -> bool:
    if old is None or new is None:
        return old is new
    if old.text == new.text:
        return True
    return old.by == new.by and _same_numbers(old.uppers, new.uppers) and _same_numbers(old.values, new.values)


def _limit_changes(old: Service, new: Service) -> Iterator[str]:
    for key in LIMIT_DIMENSION:
        before, after = old.limits.get(key), new.limits.get(key)
        if not _same_limit(before, after):
            texts = [limit.text if limit else "none" for limit in (before, after)]
            yield f"{new.name}: {key} {texts[0]} -> {texts[1]}"


def _service_changes(old: Service, new: Service) -> Iterator[str]:
    yield from _limit_changes(old, new)
    for word in _SERVICE_WORDS:
        before, after = getattr(old, word), getattr(new, word)
        if before != after:
            yield f"{new.name}: {word} {_word(before)} -> {_word(after)}"
    if old.matches != new.matches:
        yield f"{new.name}: matches {', '.join(old.matches) or 'none'} -> {', '.join(new.matches) or 'none'}"
    for rule in sorted({*old.force, *new.force}):
        before, after = old.force.get(rule, "the rule's own"), new.force.get(rule, "the rule's own")
        if before != after:
            yield f"{new.name}: force of {rule} {before} -> {after}"


def _mapping_changes(table: str, old: Mapping[str, float | str], new: Mapping[str, float | str]) -> Iterator[str]:
    for key in sorted({*old, *new}):
        before, after = _word(old.get(key, "")), _word(new.get(key, ""))
        if before != after:
            yield f"{table} {key}: {before} -> {after}"


def _setting(settings: Settings, field: str) -> str:
    value = getattr(settings, field)
    if field not in _SHOWN_IN or math.isnan(value):
        return _word(value)
    unit, dimension = _SHOWN_IN[field]
    return f"{float(from_si(value, read_unit(unit, dimension))):.6g} {unit}"


def _setting_changes(old: Settings, new: Settings) -> Iterator[str]:
    for field, label in _SETTINGS.items():
        before, after = _setting(old, field), _setting(new, field)
        if before != after:
            yield f"{label}: {before} -> {after}"
    yield from _mapping_changes("[units]", old.units, new.units)
    yield from _mapping_changes("[defaults] roughness of", old.roughness, new.roughness)


def _added(service: Service) -> str:
    limits = ", ".join(f"{key} {limit.text}" for key, limit in service.limits.items())
    return f"{service.name}: service added" + (f": {limits}" if limits else ", without limits")


def differences_between(
    *,
    old: tuple[Service, ...],
    new: tuple[Service, ...],
    old_settings: Settings,
    new_settings: Settings,
) -> tuple[str, ...]:
    """Return a sentence for every change, such as ``cooling water: velocity_maximum 3.7 m/s -> 3.0 m/s``."""
    before = {same_name(service.name): service for service in old}
    after = {same_name(service.name) for service in new}
    sentences = list(_setting_changes(old_settings, new_settings))
    for service in new:
        known = before.get(same_name(service.name))
        sentences += [_added(service)] if known is None else _service_changes(known, service)
    sentences += [f"{service.name}: service left out" for name, service in before.items() if name not in after]
    return tuple(sentences)
