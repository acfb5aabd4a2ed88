"""What had to be assumed for a line, and which results rest on it."""

from __future__ import annotations

from functools import cache

import numpy as np
from numpy.typing import NDArray

from checker.evaluation.dependencies import direct
from checker.evaluation.values import Values
from checker.model import Coded, Phase

__all__ = ["ASSUMABLE", "assumed_for", "assumptions_behind", "shown_assumption"]

ASSUMABLE: dict[str, str] = {
    "service_code": "service",
    "inside_diameter": "bore",
    "schedule_used": "schedule",
    "roughness": "roughness",
    "compressibility": "compressibility factor",
    "heat_capacity_ratio": "ratio of heat capacities",
}
_SOURCES = {
    "service_code": "the general row of the phase: the service matches none of the criteria",
    "schedule_used": "STD (40S for stainless): neither the list nor a class says",
    "inside_diameter": "from the assumed schedule, ASME B36.10M / B36.19M",
    "roughness": "class file or adopted roughness of the material; the list's own column is blank",
    "compressibility": "ideal gas below 10 bar absolute, common practice; upper bound of the velocity",
    "heat_capacity_ratio": "lower bound 1.0, so that the Mach number is an upper bound",
}


@cache
def assumptions_behind(name: str, phase: int) -> frozenset[str]:
    """Return the assumable fields a field rests on in a phase; what stands behind an assumable field is its own."""
    reached: set[str] = set()
    seen: set[str] = set()
    waiting = [name]
    while waiting:
        current = waiting.pop()
        if current in seen:
            continue
        seen.add(current)
        if current in ASSUMABLE:
            reached.add(current)
        else:
            waiting.extend(direct(current, phase))
    return frozenset(reached)


def assumed_for(values: Values, names: tuple[str, ...], *, conservative: tuple[str, ...] = ()) -> NDArray[np.bool_]:
    """Return True where one of the named fields rests on an assumption that is not among the conservative ones."""
    phase = values["phase"]
    assumed = np.zeros(phase.shape, dtype=np.bool_)
    for code in Phase:
        fields = frozenset().union(*(assumptions_behind(name, code) for name in names)) - set(conservative)
        for field in sorted(fields):
            assumed |= (phase == code) & values[f"{field}_assumed"]
    return assumed


def shown_assumption(values: Values, field: str, line_case: int) -> tuple[str, str]:
    """Return an assumption as people read it and its source."""
    held = values[field]
    if isinstance(held, Coded):
        return held.text(line_case), _SOURCES[field]
    if field == "service_code":
        return values.criteria.services[int(held[line_case])].name, _SOURCES[field]
    number = float(held[line_case])
    shown = f"{number * 1000.0:.4g} mm" if field in ("inside_diameter", "roughness") else f"{number:.4g}"
    return shown, _SOURCES[field]
