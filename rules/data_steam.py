"""Data rule: steam and water against the saturation line."""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

from checker.model import Coded
from checker.ruling.contract import Source, rule
from checker.ruling.tristate import TriState, all_of


def _steam_or_water(*, saturation_asked: TriState, state_told: TriState) -> TriState:
    return all_of(saturation_asked, state_told)


@rule(
    id="steam-saturation",
    title="Steam and water against saturation",
    on_data=True,
    force="should",
    sense="condition",
    source=Source("IAPWS R7-97", "2012", "equation 31; 3 K is common practice"),
    applies=_steam_or_water,
    calculation=(
        "T = {temperature} at {pressure} (saturation {saturation_temperature}), design {temperature_design} at"
        " {pressure_design} (saturation {saturation_temperature_design}): {saturation_said}"
    ),
)
def steam_saturation(*, saturation_contradicts: NDArray[np.float64], saturation_said: Coded) -> NDArray[np.float64]:
    """Contradict where steam is colder than it boils, saturated steam is off the line, or water would be steam."""
    return saturation_contradicts
