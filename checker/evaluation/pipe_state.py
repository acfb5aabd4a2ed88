"""Providers: outside diameter, wall, bore and roughness of each line, from the list, the class or the tables."""

from __future__ import annotations

from typing import Any

import numpy as np
from numpy.typing import NDArray

from checker.criteria.classes import Classes, ClassValues
from checker.criteria.criteria import Criteria
from checker.evaluation.gaps import asked_for, is_open
from checker.evaluation.provider import provider
from checker.model import Coded, Gap, Source
from checker.pipe.roughness import roughness_by_material
from checker.pipe.sizes import look_up, normalised_schedule

__all__ = ["PROVIDERS", "SCHEDULE_CLASS", "SCHEDULE_LISTED", "SCHEDULE_NONE", "SCHEDULE_NOT_KNOWN"]

FloatArray = NDArray[np.float64]
BoolArray = NDArray[np.bool_]
CodeArray = NDArray[np.int8]
Named = dict[str, Any]

SCHEDULE_LISTED, SCHEDULE_CLASS, SCHEDULE_NONE, SCHEDULE_NOT_KNOWN = 0, 1, 2, -1
NO_CLASSES = Classes(Source("no class file", ""), ())
OUTSIDE_TOLERANCE = 0.15
BORE_TOLERANCE = 0.02
LEAST_LINED_BORE = 0.8
WALL_TOLERANCE = 0.125
STANDARD_WALL = "STD"
STAINLESS_WALL = "40S"
STAINLESS_WORDS = ("stainless", "ss", "a312", "304", "316", "duplex")


def class_values(*, classes: Classes | None, piping_class_listed: Coded, size: FloatArray) -> ClassValues:
    """Return what the class file says of each line case."""
    used = NO_CLASSES if classes is None else classes
    return used.look_up(piping_class=piping_class_listed, size=size)


def merged(first: Coded, second: Coded) -> Coded:
    """Return the first text where there is one, else the second."""
    texts = first.texts + second.texts
    codes = np.where(first.codes >= 0, first.codes, np.where(second.codes >= 0, second.codes + len(first.texts), -1))
    return Coded(codes.astype(np.int32), texts)


def _blank_where(coded: Coded, where: BoolArray) -> Coded:
    return Coded(np.where(where, -1, coded.codes).astype(np.int32), coded.texts)


def material_used(
    *, material_listed: Coded, material_gap: CodeArray, piping_class_gap: CodeArray, class_values: ClassValues
) -> Named:
    """Return the material: the list's, else the class's."""
    from_class = _blank_where(class_values.material, is_open(material_gap) | is_open(piping_class_gap))
    return {"material_used": merged(material_listed, from_class)}


def _is_stainless(coded: Coded) -> BoolArray:
    def says(text: str) -> bool:
        words = text.casefold().replace("-", " ").split()
        return any(word.startswith(mark) for word in words for mark in STAINLESS_WORDS)

    return coded.where([says(text) for text in coded.texts])


def schedule_used(
    *,
    schedule_listed: Coded,
    schedule_gap: CodeArray,
    piping_class_gap: CodeArray,
    wall_thickness_gap: CodeArray,
    class_values: ClassValues,
    material_used: Coded,
) -> Named:
    """Return the schedule to look up: the list's, else the class's, else STD (40S for stainless) as an assumption.

    The class gives the schedule where the row does not: most lists carry none. A HOLD or unreadable schedule, class
    or wall lets nothing stand in.
    """
    barred = is_open(schedule_gap) | is_open(piping_class_gap)
    from_class = _blank_where(class_values.schedule, barred)
    listed_or_class = merged(schedule_listed, from_class)
    wall_by_class = np.isfinite(class_values.wall_thickness) & (schedule_listed.codes < 0) & ~barred
    nothing = (listed_or_class.codes < 0) & ~barred & ~wall_by_class & (wall_thickness_gap != Gap.GIVEN)
    default = Coded(np.where(_is_stainless(material_used), 1, 0).astype(np.int32), (STANDARD_WALL, STAINLESS_WALL))
    schedule = merged(listed_or_class, _blank_where(default, ~nothing))
    listed = schedule_listed.codes >= 0
    choices = [listed, from_class.codes >= 0, wall_by_class | (wall_thickness_gap == Gap.GIVEN)]
    state = np.select(choices, [SCHEDULE_LISTED, SCHEDULE_CLASS, SCHEDULE_NONE], SCHEDULE_NOT_KNOWN)
    state = np.where(is_open(schedule_gap), SCHEDULE_NOT_KNOWN, state)
    return {
        "schedule_used": schedule,
        "schedule_used_assumed": nothing,
        "schedule_state": state.astype(np.int8),
        "wall_by_class": np.where(wall_by_class, class_values.wall_thickness, np.nan),
    }


def _understood(schedule: Coded) -> BoolArray:
    """Return True where a schedule is one that the tables know, whatever the size."""
    return schedule.where([bool(normalised_schedule(text)) for text in schedule.texts])


def _contradictory(
    *,
    inside: FloatArray,
    bore: FloatArray,
    outside: FloatArray,
    wall: FloatArray,
    size_outside: FloatArray,
    schedule_wall: FloatArray,
) -> BoolArray:
    """Return True where the bore is no smaller than the pipe, or diameter and wall are not those of size and schedule.

    An explicit value wins over a looked-up one, but within reason: an outside diameter within 15 % of that of the
    size (pipe of other standards), a wall within the mill's 12.5 % of that of a schedule given beside it, a bore from
    2 % above that of diameter and wall down to 0.8 of it (lined pipe).
    """
    with np.errstate(invalid="ignore"):
        too_wide = (inside >= outside) | (inside > bore * (1.0 + BORE_TOLERANCE))
        too_narrow = inside < bore * LEAST_LINED_BORE
        other_size = np.abs(outside - size_outside) > OUTSIDE_TOLERANCE * size_outside
        other_wall = np.abs(wall - schedule_wall) > WALL_TOLERANCE * schedule_wall
    return too_wide | too_narrow | other_size | other_wall


def pipe(
    *,
    size: FloatArray,
    outside_diameter_listed: FloatArray,
    outside_diameter_gap: CodeArray,
    wall_thickness_listed: FloatArray,
    wall_thickness_gap: CodeArray,
    inside_diameter_listed: FloatArray,
    inside_diameter_gap: CodeArray,
    schedule_used: Coded,
    schedule_used_assumed: BoolArray,
    wall_by_class: FloatArray,
) -> Named:
    """Return outside diameter, wall and bore; an explicit bore or wall wins over the schedule."""
    found = look_up(nps=size, schedule_code=schedule_used.codes, schedule_names=list(schedule_used.texts))
    no_diameter = is_open(outside_diameter_gap)
    outside = np.where(np.isfinite(outside_diameter_listed), outside_diameter_listed, found.outside_diameter)
    outside = np.where(no_diameter, np.nan, outside)
    wall = np.where(np.isfinite(wall_by_class), wall_by_class, found.wall_thickness)
    wall = np.where(np.isfinite(wall_thickness_listed), wall_thickness_listed, wall)
    wall = np.where(is_open(wall_thickness_gap), np.nan, wall)
    bore = outside - 2.0 * wall
    inside = np.where(np.isfinite(inside_diameter_listed), inside_diameter_listed, bore)
    inside = np.where(is_open(inside_diameter_gap), np.nan, inside)
    contradictory = _contradictory(
        inside=inside,
        bore=np.where(np.isnan(wall_thickness_listed) & schedule_used_assumed, np.nan, bore),
        outside=outside,
        wall=wall,
        size_outside=found.outside_diameter,
        schedule_wall=np.where(schedule_used_assumed, np.nan, found.wall_thickness),
    )
    inside = np.where(contradictory | ~(inside > 0.0), np.nan, inside)
    by_schedule = np.isnan(inside_diameter_listed) & np.isnan(wall_thickness_listed) & np.isfinite(inside)
    return {
        "outside_diameter": outside,
        "wall_thickness": wall,
        "inside_diameter": inside,
        "pipe_contradictory": contradictory,
        "inside_diameter_assumed": by_schedule & schedule_used_assumed,
        "schedule_exists": np.where(np.isfinite(size) & _understood(schedule_used), found.exists, -1).astype(np.int8),
    }


def roughness(
    *,
    criteria: Criteria,
    roughness_listed: FloatArray,
    roughness_gap: CodeArray,
    class_values: ClassValues,
    piping_class_gap: CodeArray,
    material_used: Coded,
) -> Named:
    """Return the roughness: the list's, else the class's, else the adopted value of the material.

    Where the list has a roughness of its own for other lines and leaves this one blank, that is an assumption.
    """
    from_class = np.where(is_open(piping_class_gap), np.nan, class_values.roughness)
    adopted = roughness_by_material(material=material_used, adopted=criteria.roughness)
    other = np.where(np.isfinite(from_class), from_class, adopted)
    value = np.where(np.isfinite(roughness_listed), roughness_listed, np.where(is_open(roughness_gap), np.nan, other))
    from_elsewhere = np.isnan(roughness_listed) & np.isfinite(value)
    assumed = from_elsewhere & asked_for(roughness_gap)
    return {"roughness": value, "roughness_assumed": assumed}


PROVIDERS = (
    provider(class_values),
    provider(material_used),
    provider(schedule_used, "schedule_used", "schedule_used_assumed", "schedule_state", "wall_by_class"),
    provider(
        pipe,
        "outside_diameter",
        "wall_thickness",
        "inside_diameter",
        "inside_diameter_assumed",
        "pipe_contradictory",
        "schedule_exists",
    ),
    provider(roughness, "roughness", "roughness_assumed"),
)
