"""Providers of data rules: design against operating values, test against design, minimum, normal and maximum."""

from __future__ import annotations

from typing import Any

import numpy as np
from numpy.typing import NDArray

from checker.criteria.criteria import Criteria
from checker.evaluation.contradictions import (
    MAXIMUM,
    MINIMUM,
    Order,
    above,
    asked,
    below,
    contradiction,
    order_of_cases,
    said,
)
from checker.evaluation.gaps import is_open
from checker.evaluation.provider import provider
from checker.model import CaseKind, Coded, Gap
from checker.ruling.tristate import NO, UNKNOWN, YES

__all__ = ["PROVIDERS"]

FloatArray = NDArray[np.float64]
BoolArray = NDArray[np.bool_]
CodeArray = NDArray[np.int8]
IntArray = NDArray[np.int32]
Named = dict[str, Any]

TEST_FACTOR = 1.5
#: Unit in which a flow is named, and what turns its SI value into it: mass, volume, standard volume (0 degC).
_FLOW_UNITS = (("kg/h", 3600.0), ("m3/h", 3600.0), ("Nm3/h", 3600.0 * 0.0224139696))
_LIQUID_TESTS = frozenset({"h", "hydro", "hydrostatic", "hydrotest", "hydraulic", "water", "wet", "hydro test"})
_OTHER_TESTS = frozenset(
    {"p", "pneumatic", "air", "nitrogen", "s", "service", "o", "none", "in service", "initial service", "vacuum"}
)


def _order_by_columns(
    field: str, values: FloatArray, case: Coded, case_columns: frozenset[tuple[str, str]], line: IntArray
) -> Order:
    """Return the order of a quantity where its own columns name the cases, else that nothing is compared.

    Rows that describe cases (maximum flow, say) owe no order to pressure or temperature: a pump gives its lowest
    pressure at its highest flow.
    """
    if not {(field, MAXIMUM), (field, MINIMUM)} & case_columns:
        nothing = np.zeros(values.shape, dtype=np.bool_)
        return Order(nothing, nothing, nothing, np.full(values.shape, np.nan))
    return order_of_cases(values, case, line)


def pressure_rank(
    *,
    criteria: Criteria,
    pressure: FloatArray,
    pressure_gap: CodeArray,
    pressure_design: FloatArray,
    pressure_design_gap: CodeArray,
    pressure_design_minimum: FloatArray,
    pressure_design_minimum_gap: CodeArray,
    case: Coded,
    case_kind: CodeArray,
    case_columns: frozenset[tuple[str, str]],
    line: IntArray,
) -> Named:
    """Return whether an operating pressure is outside the design pressures, or minimum, normal, maximum out of order.

    Every case of a line is held against its design pressures but those of a test or of the design itself. A lowest
    design pressure is owed only below atmospheric pressure: blank there it leaves the rank open, elsewhere it does not.
    """
    judged = case_kind != CaseKind.MECHANICAL_ONLY
    held = asked(pressure_gap, pressure_design_gap) & judged
    stated = (pressure_design_minimum_gap == Gap.GIVEN) | is_open(pressure_design_minimum_gap)
    owed = stated | below(pressure, np.full(pressure.shape, criteria.atmosphere))
    low = asked(pressure_gap, pressure_design_minimum_gap) & judged & owed
    order = _order_by_columns("pressure", pressure, case, case_columns, line)
    under = held & below(pressure_design, pressure)
    vacuum = low & below(pressure, pressure_design_minimum)
    crossed = judged & below(pressure_design, pressure_design_minimum)
    outside = under | vacuum | crossed
    unknown = (held & np.isnan(pressure + pressure_design)) | order.unknown
    unknown |= low & np.isnan(pressure + pressure_design_minimum)
    return {
        "pressure_ranked": (held | low | crossed | order.compared).astype(np.int8),
        "pressure_rank_broken": contradiction(outside | order.found, unknown),
        "pressure_design_passed": outside,
        "pressure_first": np.select(
            [under, vacuum | crossed, order.found],
            [pressure_design, pressure_design_minimum, pressure],
            pressure_design,
        ),
        "pressure_second": np.select(
            [under | vacuum, crossed, order.found], [pressure, pressure_design, order.reference], pressure
        ),
        "pressure_rank_said": said(
            "in order",
            (under, "the design pressure is below the operating pressure"),
            (vacuum, "the lowest design pressure is above the operating pressure"),
            (crossed, "the lowest design pressure is above the design pressure"),
            (order.found, "minimum, normal and maximum are out of order, this case and the one beside it"),
        ),
    }


def temperature_rank(
    *,
    temperature: FloatArray,
    temperature_gap: CodeArray,
    temperature_design: FloatArray,
    temperature_design_gap: CodeArray,
    temperature_design_minimum: FloatArray,
    temperature_design_minimum_gap: CodeArray,
    case: Coded,
    case_kind: CodeArray,
    case_columns: frozenset[tuple[str, str]],
    line: IntArray,
) -> Named:
    """Return whether a temperature is outside the design temperatures, or minimum, normal and maximum out of order."""
    judged = case_kind != CaseKind.MECHANICAL_ONLY
    hot = asked(temperature_gap, temperature_design_gap) & judged
    cold = asked(temperature_gap, temperature_design_minimum_gap) & judged
    both = asked(temperature_design_gap, temperature_design_minimum_gap)
    order = _order_by_columns("temperature", temperature, case, case_columns, line)
    too_hot = hot & below(temperature_design, temperature)
    too_cold = cold & above(temperature_design_minimum, temperature)
    crossed = both & above(temperature_design_minimum, temperature_design)
    unknown = (hot & np.isnan(temperature + temperature_design)) | order.unknown
    unknown |= cold & np.isnan(temperature + temperature_design_minimum)
    return {
        "temperature_ranked": (hot | cold | order.compared).astype(np.int8),
        "temperature_rank_broken": contradiction(too_hot | too_cold | crossed | order.found, unknown),
        "temperature_design_passed": too_hot | too_cold | crossed,
        "temperature_first": np.select(
            [too_hot, too_cold | crossed, order.found],
            [temperature_design, temperature_design_minimum, temperature],
            temperature_design,
        ),
        "temperature_second": np.select(
            [too_hot | too_cold, crossed, order.found], [temperature, temperature_design, order.reference], temperature
        ),
        "temperature_rank_said": said(
            "in order",
            (too_hot, "the design temperature is below the operating temperature"),
            (too_cold, "the minimum design temperature is above the operating temperature"),
            (crossed, "the minimum design temperature is above the design temperature"),
            (order.found, "minimum, normal and maximum are out of order, this case and the one beside it"),
        ),
    }


def case_order(
    *,
    flow_mass_listed: FloatArray,
    flow_mass_gap: CodeArray,
    flow_volume_listed: FloatArray,
    flow_volume_gap: CodeArray,
    flow_standard_listed: FloatArray,
    flow_standard_gap: CodeArray,
    case: Coded,
    case_group: IntArray,
) -> Named:
    """Return whether a line's flows are out of order: a maximum below normal, a minimum above it, or crossed.

    Each way of stating a flow is held against its own kind. One kind that a line states in all the cases it needs is
    enough, unless another is on HOLD or unread.
    """
    ways = (
        (flow_mass_listed, flow_mass_gap),
        (flow_volume_listed, flow_volume_gap),
        (flow_standard_listed, flow_standard_gap),
    )
    shape = case.codes.shape
    compared, found, told, held = (np.zeros(shape, dtype=np.bool_) for _ in range(4))
    sentences = Coded(np.full(shape, -1, dtype=np.int32), ())
    for (flows, gap), (unit, factor) in zip(ways, _FLOW_UNITS, strict=True):
        order = order_of_cases(flows, case, case_group)
        mine = order.compared & _in_group(gap != Gap.NO_COLUMN, np.isfinite(flows) | is_open(gap), case_group)
        compared |= mine
        found |= mine & order.found
        told |= mine & ~order.unknown
        held |= mine & is_open(gap)
        sentences = _flows_in_words(sentences, mine & order.found, flows * factor, order.reference * factor, unit)
    return {
        "flows_ordered": compared.astype(np.int8),
        "case_order_broken": contradiction(found, ~told | held),
        "case_order_said": Coded(
            np.where(sentences.codes < 0, len(sentences.texts), sentences.codes).astype(np.int32),
            (*sentences.texts, "in order"),
        ),
    }


def _pair_of_flows(mine: float, other: float, unit: str) -> str:
    """Return two flows in words with as many figures as tell them apart."""
    figures = next((each for each in (4, 6, 9) if f"{mine:.{each}g}" != f"{other:.{each}g}"), 15)
    first, second = (f"{float(f'{flow:.{figures}g}'):.{figures}g}" for flow in (mine, other))
    word = "below" if mine < other else "above"
    return f"this case's flow of {first} {unit} is {word} the {second} {unit} of the case beside it"


def _flows_in_words(before: Coded, found: BoolArray, flows: FloatArray, others: FloatArray, unit: str) -> Coded:
    """Add a sentence for every pair of flows that is out of order and has none yet."""
    codes = before.codes.copy()
    places = np.flatnonzero(found & (codes < 0))
    if not places.size:
        return before
    pairs, kind = np.unique(np.column_stack((flows[places], others[places])), axis=0, return_inverse=True)
    codes[places] = kind.ravel() + len(before.texts)
    return Coded(codes, before.texts + tuple(_pair_of_flows(mine, other, unit) for mine, other in pairs.tolist()))


def _in_group(column: BoolArray, stated: BoolArray, group: IntArray) -> BoolArray:
    """Return True where the list has a column and some case of the line states a value in it."""
    there = np.zeros(int(group.max(initial=-1)) + 1, dtype=np.bool_)
    there[group[column & stated]] = True
    return there[group]


def _test_medium(text: str) -> int:
    words = " ".join(text.casefold().replace("-", " ").replace(".", " ").split())
    return YES if words in _LIQUID_TESTS else NO if words in _OTHER_TESTS else UNKNOWN


def _process_piping(text: str) -> int:
    return YES if "31.3" in text else NO


def _by_text(coded: Coded, meaning: Any) -> CodeArray:
    table = np.array([*(meaning(text) for text in coded.texts), UNKNOWN], dtype=np.int8)
    return table[coded.codes]


def pressure_of_test(
    *,
    criteria: Criteria,
    pressure_test: FloatArray,
    pressure_test_gap: CodeArray,
    pressure_design: FloatArray,
    design_code: Coded,
    design_code_gap: CodeArray,
    test_medium: Coded,
    test_medium_gap: CodeArray,
) -> Named:
    """Return the gauge test pressure and 1.5 times the gauge design pressure of a line tested with liquid by B31.3.

    Code and medium decide what is asked: a list that has no column for them has nothing to be held against. A test
    medium in other words is not known, and a test pressure that is not applicable is a gap where the line is tested
    with liquid. A line designed for vacuum alone is no matter of this factor.
    """
    columns = asked(pressure_test_gap, design_code_gap, test_medium_gap)
    test = np.where(pressure_test_gap == Gap.GIVEN, YES, UNKNOWN)
    states = np.stack([test, _by_text(design_code, _process_piping), _by_text(test_medium, _test_medium)])
    no = (states == NO).any(axis=0) | ~columns | (pressure_design <= criteria.atmosphere)
    known = (states == YES).all(axis=0)
    return {
        "liquid_test_by_code": np.where(no, NO, np.where(known, YES, UNKNOWN)).astype(np.int8),
        "pressure_test_gauge": pressure_test - criteria.atmosphere,
        "pressure_test_least": TEST_FACTOR * (pressure_design - criteria.atmosphere),
    }


PROVIDERS = (
    provider(
        pressure_rank,
        "pressure_ranked",
        "pressure_rank_broken",
        "pressure_design_passed",
        "pressure_first",
        "pressure_second",
        "pressure_rank_said",
    ),
    provider(
        temperature_rank,
        "temperature_ranked",
        "temperature_rank_broken",
        "temperature_design_passed",
        "temperature_first",
        "temperature_second",
        "temperature_rank_said",
    ),
    provider(case_order, "flows_ordered", "case_order_broken", "case_order_said"),
    provider(pressure_of_test, "liquid_test_by_code", "pressure_test_gauge", "pressure_test_least"),
)
