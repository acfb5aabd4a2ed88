"""Does the pipe exist: size and schedule in the standards' tables."""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

from checker.model import Coded
from checker.ruling.contract import Source, rule
from checker.ruling.tristate import TriState

BoolArray = NDArray[np.bool_]


def _scheduled(*, schedule_given: TriState) -> TriState:
    return schedule_given


@rule(
    id="schedule-exists",
    title="Schedule exists for the size",
    force="shall",
    sense="condition",
    source=Source("ASME B36.10M and B36.19M", "2022"),
    applies=_scheduled,
    calculation="{size}, schedule {schedule_used}, looked up in the tables of both standards",
)
def schedule_exists(*, size: NDArray[np.float64], schedule_used: Coded, schedule_exists: NDArray[np.int8]) -> BoolArray:
    """Contradict where the standards' tables hold no such schedule for the size."""
    return np.equal(schedule_exists, 0)
