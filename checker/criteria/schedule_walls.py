"""Whether a wall that stands beside a schedule is the wall of that schedule."""

from __future__ import annotations

import numpy as np

from checker.criteria.nominal_size import nominal_sizes
from checker.pipe.sizes import look_up

__all__ = ["MILL_TOLERANCE", "differing_walls"]

MILL_TOLERANCE = 0.125
_EQUAL_WITHIN = 1e-9


def differing_walls(
    *, schedule: str, wall_thickness: float, size_from: float, size_to: float
) -> list[tuple[float, float]]:
    """Return the standard sizes at which a wall is not that of a schedule, ascending, with the schedule's own wall.

    Parameters
    ----------
    schedule : str
        As written; one that is not known differs nowhere.
    wall_thickness : float
        m; NaN differs nowhere.
    size_from, size_to : float
        First and last size, NPS inches, both looked at; NaN leaves no size.

    Returns
    -------
    list of (float, float)
        NPS inches and wall of the schedule in m, where the two are more than 12.5 % apart. A size that has no such
        schedule is passed over.

    References
    ----------
    .. [1] ASME B36.10M and ASTM A530/A530M: a wall may be 12.5 % below its nominal.
    """
    sizes = np.array([size for size in nominal_sizes() if size_from <= size <= size_to], dtype=np.float64)
    walls = look_up(nps=sizes, schedule_code=np.zeros(sizes.shape, dtype=np.intp), schedule_names=[schedule])
    nominal = walls.wall_thickness
    with np.errstate(all="ignore"):
        differs = np.abs(wall_thickness - nominal) > MILL_TOLERANCE * nominal * (1.0 + _EQUAL_WITHIN)
    return list(zip(sizes[differs].tolist(), nominal[differs].tolist(), strict=True))
