"""NPSH of pump suctions."""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

from checker.model import Phase
from checker.ruling.contract import Source, rule
from checker.ruling.tristate import TriState, all_of, any_of, is_code

FloatArray = NDArray[np.float64]


def _pump_draws(
    *, phase: NDArray[np.int8], flowing: TriState, pump_suction: TriState, npsh_required_given: TriState
) -> TriState:
    return all_of(is_code(phase, Phase.LIQUID), flowing, any_of(pump_suction, npsh_required_given))


def _below_required(*, value: FloatArray, npsh_required_at_flow: FloatArray) -> NDArray[np.bool_]:
    with np.errstate(invalid="ignore"):
        return value < npsh_required_at_flow


@rule(
    id="npsh-margin",
    title="NPSH margin",
    force="should",
    sense="at least",
    source=Source("ANSI/HI 9.6.1", "2012 (summary)", "margin and ratio by application; from the criteria"),
    applies=_pump_draws,
    calculation=(
        "NPSHA = (p_s - p_v) / (rho g) + h - dp_f / (rho g), p_s = {source_pressure}, p_v = {vapour_pressure},"
        " rho = {density}, h = {static_head}, dp_f = {dp_friction} + {dp_fittings};"
        " at least max({npsh_ratio_minimum} NPSHR, NPSHR + {npsh_margin_minimum}), NPSHR = {npsh_required_at_flow}"
    ),
    unit="m",
    dimension="length",
    shall_where=_below_required,
    limit_key="npsh_margin_minimum",
)
def npsh_margin(
    *,
    npsh_available: FloatArray,
    npsh_required_at_flow: FloatArray,
    npsh_ratio_minimum: FloatArray,
    npsh_margin_minimum: FloatArray,
) -> tuple[FloatArray, FloatArray]:
    """Hold NPSH available against NPSH required with its margin, whichever of ratio and margin asks for more.

    NPSH required belongs to a flow: a case above the quoted flow is not judged. Below NPSH required it is a `shall`.
    """
    asked = np.maximum(npsh_ratio_minimum * npsh_required_at_flow, npsh_required_at_flow + npsh_margin_minimum)
    return npsh_available, asked
