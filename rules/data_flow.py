"""Data rules: do the flows of a row agree, is it a row that flows, and whose state stands beside its flow."""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

from checker.model import Coded
from checker.ruling.contract import Source, rule
from checker.ruling.tristate import TriState

FloatArray = NDArray[np.float64]
BoolArray = NDArray[np.bool_]
FLOWS_DIFFER, FLOWS_DIFFER_GROSSLY = 0.02, 0.10


def _stated_twice(*, flows_stated_twice: TriState) -> TriState:
    return flows_stated_twice


def _may_be_standard(*, standard_may_be_taken: TriState) -> TriState:
    return standard_may_be_taken


def _rows_with_flow(*, flow_asked_of_row: TriState) -> TriState:
    return flow_asked_of_row


def _states_by_case(*, state_by_case: TriState) -> TriState:
    return state_by_case


def _gross(*, value: FloatArray, flow_difference: FloatArray) -> BoolArray:
    with np.errstate(invalid="ignore"):
        return np.asarray(flow_difference > FLOWS_DIFFER_GROSSLY * (1.0 + 1e-9), dtype=np.bool_)


@rule(
    id="mass-against-volume-flow",
    title="Mass flow against volume flow",
    on_data=True,
    force="should",
    sense="condition",
    source=Source("common practice", clause="|m - Q rho| / m at most 2 %; above 10 % a shall"),
    applies=_stated_twice,
    calculation=(
        "m, Q rho and standard volume x M of the row are {flow_least} and {flow_most}, {flow_difference} of the mass"
        " flow apart (of the other where it is zero); at most 0.02"
    ),
    shall_where=_gross,
)
def mass_against_volume_flow(*, flow_difference: FloatArray) -> FloatArray:
    """Contradict where mass flow, volume flow times density and standard flow times molar mass differ by over 2 %."""
    with np.errstate(invalid="ignore"):
        over = flow_difference > FLOWS_DIFFER * (1.0 + 1e-9)
    return np.where(np.isnan(flow_difference), np.nan, over)


@rule(
    id="standard-taken-for-actual",
    title="Standard volume flow taken for the actual one",
    on_data=True,
    force="shall",
    sense="condition",
    source=Source("common practice", clause="Q M / m of 22.4 to 24.1 m3/kmol is a standard volume"),
    applies=_may_be_standard,
    calculation=(
        "Q M / m = {molar_volume_of_flows} m3/kmol, 22.4 to 24.1 at 0 to 20 degC and one atmosphere: Q ="
        " {flow_volume_listed} beside m = {flow_mass_listed} is the volume at standard, not at flowing conditions"
    ),
)
def standard_taken_for_actual(*, standard_taken_for_actual: FloatArray) -> FloatArray:
    """Contradict where a gas's volume flow is its standard volume and differs by over 10 % from the flowing one."""
    return standard_taken_for_actual


@rule(
    id="zero-flow-row",
    title="Rows that flow or do not",
    on_data=True,
    force="should",
    sense="condition",
    source=Source("common practice", clause="flare, relief and drain lines; purge at most 5 % of the greatest flow"),
    applies=_rows_with_flow,
    calculation="{zero_flow_said}: service {service_listed}, normal flow by the greatest {flow_normal_share}",
)
def zero_flow_row(*, zero_flow_contradicts: FloatArray, zero_flow_said: Coded) -> FloatArray:
    """Contradict where a flare, relief or drain line flows in normal operation, or a process line in no case."""
    return zero_flow_contradicts


@rule(
    id="composite-case",
    title="Cases with another case's state",
    on_data=True,
    force="note",
    sense="condition",
    source=Source("common practice", clause="a case has its own flow, pressure, temperature and properties"),
    applies=_states_by_case,
    calculation="this case's flow stands beside a pressure, temperature or property of another case",
)
def composite_case(*, composite_state: FloatArray) -> FloatArray:
    """Note where a list states some of its state case by case and leaves the rest of a case to another."""
    return composite_state
