"""Approved deviations: up to their value, in their case, until their day, and no further."""

from __future__ import annotations

from datetime import date
from pathlib import Path
from typing import Any

import pytest

import checker
from checker.errors import InputError

EXAMPLE = Path(__file__).parents[2] / "example_linelists"
LINE = '4"-CWS-3110-B1A'
QUOTED = '"' + LINE.replace('"', '""') + '"'
HEADER = "line_number,case,rule,approved_value,approved_by,reference,until\n"
TODAY = date(2026, 6, 1)


def reviewed(folder: Path, *rows: str, today: date = TODAY) -> Any:
    path = folder / "deviations.csv"
    path.write_text(HEADER + "\n".join(rows) + "\n", encoding="utf-8")
    return checker.review(
        EXAMPLE / "marrowquay_rev_a.csv",
        criteria=EXAMPLE / "criteria.toml",
        classes=EXAMPLE / "classes.csv",
        deviations=path,
        today=today,
    )


def outcome(done: Any, rule: str, case: str) -> str:
    frame = done.outcomes
    mine = frame[(frame["line_number"] == LINE) & (frame["rule"] == rule) & (frame["case"] == case)]
    return str(mine["outcome"].iloc[0])


def test_an_approval_covers_its_value_and_its_case(tmp_path: Path) -> None:
    done = reviewed(tmp_path, f"{QUOTED},maximum,liquid-velocity,4 m/s,A. Checker,MQ-DEV-001,2027-01-01")
    assert outcome(done, "liquid-velocity", "maximum") == "approved deviation"
    assert outcome(done, "pressure-gradient", "maximum") == "does not meet"
    assert done.tally["approved deviation"] == 1
    assert done.deviations["state"].tolist() == ["applied"]
    assert sum(done.tally.values()) == done.line_cases * done.rules_count


@pytest.mark.parametrize(
    ("row", "today", "state"),
    [
        ("{line},maximum,liquid-velocity,3.01 m/s,A. Checker,,2027-01-01", TODAY, "exceeded"),
        ("{line},maximum,liquid-velocity,4 m/s,A. Checker,,2026-05-31", TODAY, "run out"),
        ("{line},maximum,liquid-velocity,4 m/s,A. Checker,,2026-06-01", date(2026, 6, 2), "run out"),
        ("{line},minimum,liquid-velocity,4 m/s,A. Checker,,2027-01-01", TODAY, "stale"),
        ("NO-SUCH-LINE,,liquid-velocity,4 m/s,A. Checker,,2027-01-01", TODAY, "stale"),
    ],
)
def test_beyond_its_value_its_day_or_its_case_it_covers_nothing(
    tmp_path: Path, row: str, today: date, state: str
) -> None:
    done = reviewed(tmp_path, row.format(line=QUOTED), today=today)
    assert outcome(done, "liquid-velocity", "maximum") == "does not meet"
    assert done.tally["approved deviation"] == 0
    assert done.deviations["state"].iloc[0].startswith(state)


def test_on_its_last_day_it_still_holds(tmp_path: Path) -> None:
    row = f"{QUOTED},maximum,liquid-velocity,4 m/s,A. Checker,,2026-06-01"
    assert outcome(reviewed(tmp_path, row), "liquid-velocity", "maximum") == "approved deviation"


def test_every_problem_of_the_file_is_told_with_its_row(tmp_path: Path) -> None:
    rows = [
        f"{QUOTED},,liquid-velocity,4,A. Checker,,2027-01-01",
        f"{QUOTED},,no-such-rule,4 m/s,A. Checker,,2027-01-01",
        f"{QUOTED},,liquid-velocity,4 m/s,,,soon",
    ]
    with pytest.raises(InputError) as caught:
        reviewed(tmp_path, *rows)
    said = str(caught.value)
    for word in ("row 2", "no unit", "row 3", "no-such-rule", "row 4", "approved_by", "soon"):
        assert word in said, word
