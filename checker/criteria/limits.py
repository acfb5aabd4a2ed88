"""Limits of the criteria over all line cases, and the force with which a rule holds there."""

from __future__ import annotations

import math
from collections.abc import Sequence
from enum import IntEnum
from typing import NamedTuple

import numpy as np
from numpy.typing import NDArray

from checker.criteria.criteria import FORCES, LIMIT_DIMENSION, Criteria, Limit, Service

__all__ = ["LIMIT_DIMENSION", "LimitState", "force_codes", "limit_origin", "limit_values"]

FloatArray = NDArray[np.float64]
CodeArray = NDArray[np.int8]
IntArray = NDArray[np.int32]

TOLERANCE = 1e-9
_BY = {"": 0, "size": 1, "pressure": 2}


class LimitState(IntEnum):
    """Whether the criteria set a limit for a line case."""

    SET = 0
    NO_LIMIT = 1
    UNKNOWN = 2


class _Tables(NamedTuple):
    """One key of the criteria as dense tables; the last row, which code -1 reads, holds nothing."""

    by: CodeArray
    uppers: FloatArray
    values: FloatArray
    has: NDArray[np.bool_]


def _tables(criteria: Criteria, key: str) -> _Tables:
    limits = [service.limits.get(key) for service in criteria.services]
    rows, bands = len(limits) + 1, max((len(limit.values) for limit in limits if limit), default=1)
    by, has = np.zeros(rows, dtype=np.int8), np.zeros(rows, dtype=np.bool_)
    uppers, values = np.full((rows, bands), np.inf), np.full((rows, bands), np.nan)
    for row, limit in enumerate(limits):
        if limit is not None:
            by[row], has[row] = _BY[limit.by], True
            uppers[row, : len(limit.uppers)] = limit.uppers
            values[row, : len(limit.values)] = limit.values
    return _Tables(by, uppers, values, has)


def _band(uppers: FloatArray, coordinate: FloatArray) -> NDArray[np.intp]:
    """Return the band of each coordinate; its upper end belongs to a band, within 1e-9. NaN counts to band 0."""
    band = np.zeros(coordinate.shape, dtype=np.intp)
    for column in range(uppers.shape[-1] - 1):
        band += coordinate > uppers[:, column] * (1.0 + TOLERANCE)
    return band


def limit_values(
    *, criteria: Criteria, key: str, service: IntArray, size: FloatArray, pressure: FloatArray
) -> tuple[FloatArray, CodeArray]:
    """Return a limit of the criteria for every line case.

    Parameters
    ----------
    criteria : Criteria
        The design criteria.
    key : str
        One of `LIMIT_DIMENSION`.
    service : int32 array, shape (n,)
        Codes of `checker.criteria.services.service_codes`.
    size : float array, shape (n,)
        Nominal size, NPS inches.
    pressure : float array, shape (n,)
        Operating pressure, Pa absolute.

    Returns
    -------
    value : float array, shape (n,)
        SI; NaN unless the state is `LimitState.SET`.
    state : int8 array, shape (n,)
        0 set; 1 the criteria set no such limit for this service; 2 not known: the service is -1, or the limit goes by
        a size or a pressure that is missing, not finite or not positive.

    Raises
    ------
    KeyError
        If there is no such key.
    """
    if key not in LIMIT_DIMENSION:
        raise KeyError(f"{key!r} is no limit of the criteria; known: {', '.join(LIMIT_DIMENSION)}")
    tables = _tables(criteria, key)
    known = (service >= 0) & (service < len(criteria.services))
    row = np.where(known, service, -1)
    with np.errstate(all="ignore"):
        coordinate = np.choose(tables.by[row], (np.ones(row.shape), size, pressure))
        usable = np.isfinite(coordinate) & (coordinate > 0.0)
        value = tables.values[row, _band(tables.uppers[row], coordinate)]
    state = np.where(tables.has[row], np.where(usable, LimitState.SET, LimitState.UNKNOWN), LimitState.NO_LIMIT)
    state = np.where(known, state, LimitState.UNKNOWN).astype(np.int8)
    return np.where(state == LimitState.SET, value, np.nan), state


def _value_text(limit: Limit, size: float, pressure: float) -> str:
    """Return the value that holds at a size or a pressure, as written, with its band in words."""
    if not limit.by:
        return limit.text
    coordinate = size if limit.by == "size" else pressure
    if not math.isfinite(coordinate):
        return f"by {limit.by}, which is not known ({limit.text})"
    band = sum(coordinate > upper * (1.0 + TOLERANCE) for upper in limit.uppers[:-1])
    return f"{limit.texts[band]} at this {limit.by} ({limit.text})"


def limit_origin(criteria: Criteria, key: str, service_index: int, size: float, pressure: float) -> str:
    """Return one limit in a sentence: ``cooling water: 3.0 m/s; API RP 14E (read), confirmed ...``.

    Empty where the service is not known or has no such limit.
    """
    if not 0 <= service_index < len(criteria.services):
        return ""
    service = criteria.services[service_index]
    limit = service.limits.get(key)
    if limit is None:
        return ""
    origin = "; ".join(part for part in (limit.source, limit.basis) if part)
    confirmed = f"; confirmed: {limit.confirmed}" if limit.confirmed else ""
    return f"{service.name}: {_value_text(limit, size, pressure)}" + (f" [{origin}{confirmed}]" if origin else "")


def _force(service: Service, rule_id: str, default_force: str, keys: Sequence[str]) -> int:
    """Return the force of a rule for one service; a limit from memory is at most ``should``."""
    force = FORCES.index(service.force.get(rule_id, default_force))
    recalled = any(key in service.limits and service.limits[key].from_memory for key in keys)
    return min(force, FORCES.index("should")) if recalled else force


def force_codes(
    *, criteria: Criteria, rule_id: str, default_force: str, service: IntArray, keys: Sequence[str]
) -> CodeArray:
    """Return the force of a rule for every line case.

    Parameters
    ----------
    criteria : Criteria
        The design criteria.
    rule_id : str
        Id of the rule; the criteria may set its force by service.
    default_force : str
        The rule's own force: ``note``, ``should`` or ``shall``.
    service : int32 array, shape (n,)
        Codes of `checker.criteria.services.service_codes`; -1 takes the rule's own force.
    keys : sequence of str
        Limits of the criteria that the rule reads, of `LIMIT_DIMENSION`; empty where it reads none.

    Returns
    -------
    int8 array, shape (n,)
        0 note, 1 should, 2 shall. Where a limit that the rule reads is from memory and not confirmed, at most 1.
    """
    forces = [_force(each, rule_id, default_force, keys) for each in criteria.services]
    table = np.array([*forces, FORCES.index(default_force)], dtype=np.int8)
    known = (service >= 0) & (service < len(criteria.services))
    return table[np.where(known, service, -1)]
