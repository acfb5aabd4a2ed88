"""Is the liquid a liquid: pressure against vapour pressure."""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

from checker.model import Phase
from checker.ruling.contract import Source, rule
from checker.ruling.tristate import TriState, all_of, is_code

FloatArray = NDArray[np.float64]


def _liquid_with_vapour_pressure(*, phase: NDArray[np.int8], vapour_pressure_given: TriState) -> TriState:
    return all_of(is_code(phase, Phase.LIQUID), vapour_pressure_given)


@rule(
    id="phase-change",
    title="Liquid above its bubble point",
    force="shall",
    sense="at most",
    source=Source("phase equilibrium", clause="a liquid boils where its pressure is below its vapour pressure"),
    applies=_liquid_with_vapour_pressure,
    calculation="p_v = {vapour_pressure}; at most the line's lowest pressure {pressure_lowest} (stated {pressure})",
    unit="bara",
    dimension="pressure",
)
def phase_change(*, vapour_pressure: FloatArray, pressure_lowest: FloatArray) -> tuple[FloatArray, FloatArray]:
    """Hold the true vapour pressure against the lowest pressure of a line that the list calls liquid.

    Both ends count where the list gives lengths; where it has no such column, the stated end alone.
    """
    return vapour_pressure, pressure_lowest
