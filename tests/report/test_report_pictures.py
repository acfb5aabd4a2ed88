"""The pictures: steady, bounded, truthful at their edges."""

from __future__ import annotations

import numpy as np
import pytest
from fake_review import FakeUtilisation, FakeVelocity, make_review

from checker.report.charts import draw_pictures, utilisation_picture, velocity_picture


def test_same_points_same_drawing() -> None:
    assert draw_pictures(make_review()) == draw_pictures(make_review())


@pytest.mark.parametrize("points", [50_000])
def test_many_points_are_binned(points: int) -> None:
    for picture in draw_pictures(make_review(points=points)):
        assert len(picture.wide) < 400_000
        assert "The darker a cell, the more line cases stand in it." in picture.caption


def test_counts_beneath_the_picture() -> None:
    points = FakeUtilisation(np.array([0.5, 0.95, 1.0, 1.5, 3.0]), np.zeros(5, dtype=np.int32), ("liquid-velocity",))
    picture = utilisation_picture(points, {"liquid-velocity": "Liquid velocity"})
    assert picture.rows == (("Liquid velocity", "5", "2", "2", "3.00"),)
    assert "1 above 2.0 stand at the right edge" in picture.caption


def test_nothing_to_draw_is_said() -> None:
    empty = np.array([])
    assert utilisation_picture(FakeUtilisation(empty, empty.astype(int), ("a",)), {}).wide == ""
    missing = FakeVelocity(np.array([np.nan]), np.array([3.0]), np.array([0], dtype=np.int8))
    assert "nothing to draw" in velocity_picture(missing).caption


def test_a_title_is_never_read_as_mathematics() -> None:
    points = FakeUtilisation(np.array([0.5]), np.zeros(1, dtype=np.int32), ("odd",))
    assert "$x_{1}$ &lt;b&gt;" in utilisation_picture(points, {"odd": "$x_{1}$ <b>"}).wide


def test_colours_of_the_screen_follow_the_page() -> None:
    picture = draw_pictures(make_review())[0]
    assert "var(--fails)" in picture.wide
    assert "#a3282d" in picture.printed
    assert "#a3282d" not in picture.wide


def test_a_few_fast_lines_do_not_rule_the_scale_of_the_velocities() -> None:
    velocity, limit = np.array([1.0, 2.9, 400.0]), np.array([3.0, 3.0, 150.0])
    picture = velocity_picture(FakeVelocity(velocity, limit, np.zeros(3, dtype=np.int8)))
    assert "Liquid; 1 above 2.0" in picture.wide
    assert picture.head[-1] == "Highest velocity / limit"
    assert picture.rows == (("Liquid", "3", "1", "1", "2.67"),)
