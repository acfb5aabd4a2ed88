"""Providers of data rules: do the flows of a row agree, and is a row that flows or does not what it is called."""

from __future__ import annotations

import re
from collections.abc import Callable
from typing import Any

import numpy as np
from numpy.typing import NDArray

from checker.criteria.criteria import Criteria
from checker.evaluation.contradictions import MAXIMUM, MINIMUM, NORMAL, asked, case_is, contradiction, said
from checker.evaluation.gaps import is_open
from checker.evaluation.list_facts import STATE_FIELDS
from checker.evaluation.provider import provider
from checker.intake.placeholders import NO_FLOW, word_of
from checker.model import Coded, Gap, Phase
from checker.ruling.tristate import NO, UNKNOWN, YES, all_of, is_code

__all__ = ["PROVIDERS"]

FloatArray = NDArray[np.float64]
BoolArray = NDArray[np.bool_]
CodeArray = NDArray[np.int8]
IntArray = NDArray[np.int32]
Named = dict[str, Any]

FLOWS_DIFFER_GROSSLY = 0.10
#: m3/kmol from 0 degC to 20 degC at one atmosphere (and a little of rounding): 22.414, 23.645 at 15 degC, 24.055.
STANDARD_MOLAR_VOLUME = (22.3, 24.2)
PURGE_SHARE = 0.05
_IDLE_WORDS = frozenset({"flare", "flares", "relief", "drain", "drains", "nnf"})
#: May flow in normal operation or never: nothing is said of them.
_EITHER_WORDS = frozenset({"vent", "vents", "blowdown", "bypass", "spare", "startup", "purge", "start", "flushing"})
_WORD = re.compile(r"[a-z]+")


def _two_given(*gaps: CodeArray) -> CodeArray:
    """Return 1 where two or more cells are given, 0 where not; -1 while one on HOLD or unread may make it two."""
    given = np.sum([gap == Gap.GIVEN for gap in gaps], axis=0)
    perhaps = np.sum([is_open(gap) for gap in gaps], axis=0)
    return np.where(given >= 2, YES, np.where((perhaps > 0) & (given + perhaps >= 2), UNKNOWN, NO)).astype(np.int8)


def flows_of_a_row(
    *,
    flow_mass_listed: FloatArray,
    flow_mass_gap: CodeArray,
    flow_volume_listed: FloatArray,
    flow_volume_gap: CodeArray,
    flow_standard_listed: FloatArray,
    flow_standard_gap: CodeArray,
    density_stated: FloatArray,
    molar_mass: FloatArray,
) -> Named:
    """Return by how much the flows of one row differ: mass, volume x density, standard volume x molar mass.

    The difference is taken of the mass flow, where the row states none, or zero, of the larger of the others; flows
    that are all zero do not differ.
    """
    flows = np.stack([flow_mass_listed, flow_volume_listed * density_stated, flow_standard_listed * molar_mass])
    gaps = np.stack([flow_mass_gap, flow_volume_gap, flow_standard_gap])
    given = gaps == Gap.GIVEN
    lost = (given & np.isnan(flows)).any(axis=0) | is_open(flow_mass_gap, flow_volume_gap, flow_standard_gap)
    least = np.where(given, flows, np.inf).min(axis=0)
    most = np.where(given, flows, -np.inf).max(axis=0)
    with np.errstate(all="ignore"):
        of = np.where(given[0], flow_mass_listed, most)
        from_mass = np.maximum(np.abs(most - of), np.abs(of - least))
        share = np.where(most == least, 0.0, from_mass / np.where(of == 0.0, most, of))
    return {
        "flows_stated_twice": _two_given(flow_mass_gap, flow_volume_gap, flow_standard_gap),
        "flow_difference": np.where(lost, np.nan, share),
        "flow_least": np.where(lost, np.nan, least),
        "flow_most": np.where(lost, np.nan, most),
    }


def standard_volume(
    *,
    phase: CodeArray,
    flow_mass_listed: FloatArray,
    flow_mass_gap: CodeArray,
    flow_volume_listed: FloatArray,
    flow_volume_gap: CodeArray,
    density_stated: FloatArray,
    molar_mass: FloatArray,
    molar_mass_gap: CodeArray,
) -> Named:
    """Return whether a gas's volume flow is the standard volume of its mass flow, written as the actual one.

    Then Q M / m is the molar volume at 0 to 20 degC and one atmosphere, 22.4 to 24.1 m3/kmol, while Q rho is not m.
    """
    with np.errstate(all="ignore"):
        volume = 1000.0 * flow_volume_listed * molar_mass / flow_mass_listed
        apart = np.abs(flow_volume_listed * density_stated / flow_mass_listed - 1.0) > FLOWS_DIFFER_GROSSLY
        pattern = (volume >= STANDARD_MOLAR_VOLUME[0]) & (volume <= STANDARD_MOLAR_VOLUME[1])
        nothing = (flow_mass_listed == 0.0) & (flow_volume_listed == 0.0)
    unknown = ~np.isfinite(volume) | (pattern & np.isnan(density_stated))
    both = all_of(_two_given(flow_mass_gap, flow_volume_gap), asked(molar_mass_gap), ~nothing)
    return {
        "standard_may_be_taken": all_of(is_code(phase, Phase.GAS), both),
        "standard_taken_for_actual": contradiction(pattern & apart, unknown),
        "molar_volume_of_flows": volume,
    }


def _says(words: frozenset[str]) -> Callable[[str], bool]:
    def said_by(text: str) -> bool:
        return bool(set(_WORD.findall(text.casefold())) & words)

    return said_by


def _normally_no_flow(text: str) -> bool:
    return _says(_IDLE_WORDS)(text) or word_of(text) in NO_FLOW


def _extreme(flows: FloatArray, group: IntArray, chosen: BoolArray) -> FloatArray:
    """Return a line's greatest flow in the chosen cases, NaN where one is missing, minus infinity where none is."""
    greatest = np.full(int(group.max(initial=-1)) + 1, -np.inf)
    with np.errstate(invalid="ignore"):
        np.maximum.at(greatest, group[chosen], flows[chosen])
    return greatest[group]


def zero_flow(
    *,
    criteria: Criteria,
    case: Coded,
    case_group: IntArray,
    first_of_row: CodeArray,
    service_listed: Coded,
    service_code: IntArray,
    service_code_assumed: BoolArray,
    flow_mass_listed: FloatArray,
    flow_mass_gap: CodeArray,
    flow_volume_listed: FloatArray,
    flow_volume_gap: CodeArray,
    flow_standard_listed: FloatArray,
    flow_standard_gap: CodeArray,
) -> Named:
    """Return whether a flare, relief or drain line flows in normal operation, or a process line in none of its cases.

    A purge of at most 5 % of the line's greatest flow is none; a vent may do either. Of a service that matches nothing
    nothing is said: it may be a relief line or not.
    """
    gaps = np.stack([flow_mass_gap, flow_volume_gap, flow_standard_gap])
    values = np.stack([flow_mass_listed, flow_volume_listed, flow_standard_listed])
    # Each line is looked at in one way of stating a flow: the first that it uses.
    used = _first_used(gaps, case_group)
    flows = np.take_along_axis(values, used[np.newaxis], axis=0)[0]
    every = np.ones(flows.shape, dtype=np.bool_)
    greatest = _extreme(flows, case_group, every)
    normal = _extreme(flows, case_group, case_is(case, NORMAL))
    relief = np.array([*(service.relief for service in criteria.services), False])[service_code]
    idle = relief | service_listed.where([_normally_no_flow(text) for text in service_listed.texts])
    either = service_listed.where([_says(_EITHER_WORDS)(text) for text in service_listed.texts])
    with np.errstate(all="ignore"):
        share = normal / greatest
        runs = idle & (normal > PURGE_SHARE * greatest)
        never = ~idle & ~either & (greatest == 0.0)
        some = ~idle & _any_above_zero(flows, case_group)
        purge_or_not = np.isnan(normal) | ((normal > 0.0) & np.isnan(greatest))
    open_service = service_code < 0
    unknown = open_service | np.where(idle, purge_or_not, np.isnan(greatest) & ~some)
    return {
        "flow_normal_share": np.where(np.isfinite(share), share, np.nan),
        "flow_asked_of_row": all_of(first_of_row, (gaps != Gap.NO_COLUMN).any(axis=0), ~service_code_assumed),
        "zero_flow_contradicts": contradiction((runs | never) & ~open_service, unknown),
        "zero_flow_said": said(
            "as it is called",
            (runs, "a line that normally does not flow states a flow for normal operation"),
            (never, "a line that should flow states zero in every case"),
        ),
    }


def _first_used(gaps: NDArray[np.int8], group: IntArray) -> NDArray[np.intp]:
    """Return for each line case which of the ways of stating a flow its line uses first: 0, 1 or 2."""
    uses = np.zeros((len(gaps), int(group.max(initial=-1)) + 1), dtype=np.bool_)
    for way, gap in enumerate(gaps):
        uses[way, group[~np.isin(gap, (Gap.NO_COLUMN, Gap.BLANK, Gap.NOT_APPLICABLE))]] = True
    return np.asarray(uses.argmax(axis=0)[group], dtype=np.intp)


def _any_above_zero(flows: FloatArray, group: IntArray) -> BoolArray:
    above = np.zeros(int(group.max(initial=-1)) + 1, dtype=np.bool_)
    with np.errstate(invalid="ignore"):
        above[group[flows > 0.0]] = True
    return above[group]


def composite_case(*, composite: BoolArray, case: Coded, case_columns: frozenset[tuple[str, str]]) -> Named:
    """Return whether a case of its own flow borrows its state, in a list that states some of it case by case.

    A list whose pressure, temperature and properties hold for all cases says so once, in its notes.
    """
    named = {text for field, text in case_columns if field in STATE_FIELDS}
    told = ~case_is(case, NORMAL) & bool(named & {MAXIMUM, MINIMUM} or len(named) > 1)
    return {
        "state_by_case": told.astype(np.int8),
        "composite_state": np.where(composite, 1.0, 0.0),
    }


PROVIDERS = (
    provider(flows_of_a_row, "flows_stated_twice", "flow_difference", "flow_least", "flow_most"),
    provider(standard_volume, "standard_may_be_taken", "standard_taken_for_actual", "molar_volume_of_flows"),
    provider(zero_flow, "flow_normal_share", "flow_asked_of_row", "zero_flow_contradicts", "zero_flow_said"),
    provider(composite_case, "state_by_case", "composite_state"),
)
