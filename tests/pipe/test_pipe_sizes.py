"""Pipe dimensions against fluids' tables, their order, the schedules' spellings, missing values."""

from __future__ import annotations

import numpy as np
import pytest
from fluids.piping import nearest_pipe

from checker.pipe.sizes import look_up, normalised_schedule, schedules
from checker.tables.reading import read_table

ROWS = read_table("pipe_dimensions")


def test_every_row_is_that_of_fluids() -> None:
    """ASME B36.10M and B36.19M as held by fluids; exact in mm."""
    for row in ROWS:
        _, inside, outside, wall = nearest_pipe(NPS=float(row["nps"]), schedule=row["schedule"])
        assert round(outside * 1e3, 6) == float(row["outside_diameter_mm"])
        assert round(wall * 1e3, 6) == float(row["wall_thickness_mm"])
        assert inside * 1e3 == pytest.approx(
            float(row["outside_diameter_mm"]) - 2.0 * float(row["wall_thickness_mm"]), abs=0.011
        )


def test_no_row_twice_and_diameters_grow_with_size() -> None:
    keys = [(row["nps"], row["schedule"]) for row in ROWS]
    assert len(set(keys)) == len(keys)
    for schedule in schedules():
        rows = sorted(
            (float(row["nps"]), float(row["outside_diameter_mm"]), float(row["wall_thickness_mm"]))
            for row in ROWS
            if row["schedule"] == schedule
        )
        outside, wall = np.array([row[1] for row in rows]), np.array([row[2] for row in rows])
        assert (np.diff(outside) > 0.0).all()
        assert (wall < outside / 2.0).all()


@pytest.mark.parametrize("series", [("5", "10", "20", "30", "40", "60", "80", "100", "120", "140", "160"),
                                    ("5S", "10S", "40S", "80S")])  # fmt: skip
def test_walls_grow_with_the_schedule(series: tuple[str, ...]) -> None:
    for size in {row["nps"] for row in ROWS}:
        walls = {row["schedule"]: float(row["wall_thickness_mm"]) for row in ROWS if row["nps"] == size}
        ordered = [walls[name] for name in series if name in walls]
        assert ordered == sorted(ordered)


def test_standard_weight_is_schedule_40_to_nps_10_and_thinner_from_12() -> None:
    """ASME B36.10M: STD = 40 to NPS 10, XS = 80 to NPS 8 (from memory); 40S keeps STD's wall."""
    for sizes, word, number in (([2, 6, 10], "STD", "40"), ([2, 4, 8], "XS", "80")):
        by_word, by_number = (look_up(nps=sizes, schedule_code=[0, 0, 0], schedule_names=[n]) for n in (word, number))
        assert by_word.wall_thickness.tolist() == by_number.wall_thickness.tolist()
    both = look_up(nps=[12, 12, 12], schedule_code=[0, 1, 2], schedule_names=["Sch 40", "40S", "STD"])
    assert both.wall_thickness == pytest.approx([0.01031, 0.00953, 0.00953], rel=1e-14)
    assert both.outside_diameter == pytest.approx([0.3238, 0.3239, 0.3238], rel=1e-14)


@pytest.mark.parametrize(("text", "schedule"), [
    ("Sch 40", "40"), ("SCH.40", "40"), ("40", "40"), ("S40", "40"), ("S-40", "40"), ("sched 80", "80"),
    ("schedule 160", "160"), ("STD", "STD"), ("std wt", "STD"), ("Std. Wt.", "STD"), ("Sch STD", "STD"),
    ("standard", "STD"), ("XS", "XS"), ("x.s.", "XS"), ("XH", "XS"), ("extra strong", "XS"), ("XXS", "XXS"),
    ("XXH", "XXS"), ("40S", "40S"), ("Sch 10S", "10S"), ("S10S", "10S"), ("10 S", "10S"), ("5S", "5S"), ("080", "80"),
    ("100", "100"), ("", ""), ("S", ""), ("45", ""), ("5.54 mm", ""), ("TBC", ""), ("40SS", ""), ("160S", ""),
])  # fmt: skip
def test_spellings_of_schedules(text: str, schedule: str) -> None:
    assert normalised_schedule(text) == schedule


def test_what_is_in_no_standard_has_no_wall() -> None:
    found = look_up(
        nps=[2, 2, 2, 22, 7, np.nan, np.inf, -2, 2.0001],
        schedule_code=[-1, 1, 5, 0, 0, 0, 0, 0, 0],
        schedule_names=["40", "whatever"],
    )
    assert not found.exists.any()
    assert np.isnan(found.wall_thickness).all()
    assert found.outside_diameter[:4].tolist() == [0.0603, 0.0603, 0.0603, 0.559]
    assert np.isnan(found.outside_diameter[4:]).all()


@pytest.mark.parametrize(("schedule", "sizes", "missing"), [
    ("40", (0.125, 24, 36), (22, 26, 28, 30, 48)), ("20", (8, 36), (6, 4)), ("60", (8, 24), (6, 30)),
    ("120", (4, 24), (3, 5 / 2)), ("160", (0.5, 24), (3.5, 0.25)), ("XXS", (0.5, 12), (3.5, 14)),
    ("STD", (0.125, 48), (7,)), ("40S", (0.125, 24), (22, 30)), ("10S", (0.125, 30), (26, 36)),
])  # fmt: skip
def test_which_schedules_exist(schedule: str, sizes: tuple[float, ...], missing: tuple[float, ...]) -> None:
    """Ranges of ASME B36.10M and B36.19M."""
    every = [*sizes, *missing]
    found = look_up(nps=every, schedule_code=np.zeros(len(every), dtype=int), schedule_names=[f"Sch {schedule}"])
    assert found.exists.tolist() == [True] * len(sizes) + [False] * len(missing)
