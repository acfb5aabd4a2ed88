"""Data rules: design against operating values, test against design, minimum, normal and maximum."""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

from checker.model import CaseKind, Coded
from checker.ruling.contract import Source, rule
from checker.ruling.tristate import TriState, all_of

FloatArray = NDArray[np.float64]
BoolArray = NDArray[np.bool_]


def _pressures_ranked(*, pressure_ranked: TriState, state_told: TriState) -> TriState:
    return all_of(pressure_ranked, state_told)


def _temperatures_ranked(*, temperature_ranked: TriState, state_told: TriState) -> TriState:
    return all_of(temperature_ranked, state_told)


def _flows_ordered(*, flows_ordered: TriState) -> TriState:
    return flows_ordered


def _liquid_test(*, liquid_test_by_code: TriState, first_of_row: TriState) -> TriState:
    return all_of(liquid_test_by_code, first_of_row)


def _lasting(case_kind: NDArray[np.int8]) -> BoolArray:
    return np.isin(case_kind, (CaseKind.CONTINUOUS, CaseKind.NO_FLOW))


def _design_pressure_passed(
    *, value: FloatArray, pressure_design_passed: BoolArray, case_kind: NDArray[np.int8]
) -> BoolArray:
    return pressure_design_passed & _lasting(case_kind)


def _design_temperature_passed(
    *, value: FloatArray, temperature_design_passed: BoolArray, case_kind: NDArray[np.int8]
) -> BoolArray:
    return temperature_design_passed & _lasting(case_kind)


@rule(
    id="pressure-rank",
    title="Rank of pressures",
    on_data=True,
    force="should",
    sense="condition",
    source=Source("common practice", clause="design at least maximum, normal, minimum; below operating is a shall"),
    applies=_pressures_ranked,
    calculation="{pressure_rank_said}: {pressure_first} against {pressure_second}",
    shall_where=_design_pressure_passed,
)
def pressure_rank(*, pressure_rank_broken: FloatArray, pressure_rank_said: Coded) -> FloatArray:
    """Contradict where an operating pressure is outside the design pressures, or columns of a quantity out of order.

    A lasting case above the design pressure is a `shall`; a relief, start-up or other occasional one is a `should`, for
    codes allow a variation with the owner's approval (ASME B31.3, 302.2.4). Minimum, normal and maximum are held
    against each other only where columns of pressure name them: a row for maximum flow owes pressure no order.
    """
    return pressure_rank_broken


@rule(
    id="temperature-rank",
    title="Rank of temperatures",
    on_data=True,
    force="should",
    sense="condition",
    source=Source("common practice", clause="design at least maximum, normal, minimum; outside design is a shall"),
    applies=_temperatures_ranked,
    calculation="{temperature_rank_said}: {temperature_first} against {temperature_second}",
    shall_where=_design_temperature_passed,
)
def temperature_rank(*, temperature_rank_broken: FloatArray, temperature_rank_said: Coded) -> FloatArray:
    """Contradict where an operating temperature is outside the design temperatures, or the columns out of order.

    As for pressures: a lasting case outside is a `shall`, an occasional one a `should`.
    """
    return temperature_rank_broken


@rule(
    id="test-pressure-rank",
    title="Test pressure against design pressure",
    on_data=True,
    force="should",
    sense="at least",
    source=Source("ASME B31.3", "2022", "345.4.2; ratio of allowable stresses not counted"),
    applies=_liquid_test,
    calculation="P_test = {pressure_test_gauge} gauge; at least 1.5 P_design = {pressure_test_least} gauge",
    unit="bar",
    dimension="pressure difference",
)
def pressure_of_test(
    *, pressure_test_gauge: FloatArray, pressure_test_least: FloatArray
) -> tuple[FloatArray, FloatArray]:
    """Hold a liquid test pressure against 1.5 times the design pressure, both gauge.

    The least that the code can ask: the ratio of allowable stresses at test and design temperature is 1 or more.
    """
    return pressure_test_gauge, pressure_test_least


@rule(
    id="case-order",
    title="Order of minimum, normal and maximum flow",
    on_data=True,
    force="shall",
    sense="condition",
    source=Source("common practice", clause="a maximum is not below normal, a minimum not above it"),
    applies=_flows_ordered,
    calculation="maximum at least normal, normal at least minimum: {case_order_said}",
)
def case_order(*, case_order_broken: FloatArray, case_order_said: Coded) -> FloatArray:
    """Contradict where a maximum flow is below the line's normal or minimum flow, or a minimum above them."""
    return case_order_broken
