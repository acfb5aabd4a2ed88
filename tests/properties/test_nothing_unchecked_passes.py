"""The promise the whole tool stands on: what is missing, open or unreadable never becomes `meets`."""

from __future__ import annotations

import random

import pytest
from example_rows import (
    Outcomes,
    by_base_case,
    contradicting_lines,
    copied_rows,
    example_outcomes,
    header_and_rows,
    outcomes_of,
    reviewed,
)
from hypothesis import Phase, given, settings
from hypothesis import strategies as st

HEADER, ROWS = header_and_rows()
LINE_COLUMN = HEADER.index("Line No.")
CHANGEABLE = [column for column in range(len(HEADER)) if column != LINE_COLUMN]
FILLINGS = ("", "HOLD", "TBC", "-", "abc", "nan", "inf", "1e999", "=1+1", "?")


def newly_met(after: Outcomes, before: Outcomes) -> dict[tuple[str, str, str], str]:
    """Return the outcomes that meet now and did not before, lines that contradict themselves left out."""
    once = by_base_case(before)
    return {
        key: once[key]
        for key, word in by_base_case(after).items()
        if word == "meets" and once[key] != "meets" and key[0] not in contradicting_lines()
    }


def test_the_example_has_few_lines_that_contradict_themselves() -> None:
    """Two densities and two volume flows that are not those of their rows (deliberate_faults.csv)."""
    assert len(contradicting_lines()) <= 4


@pytest.mark.parametrize("column", CHANGEABLE, ids=lambda column: HEADER[column])
def test_blanking_a_cell_never_makes_a_line_meet(column: int) -> None:
    """Every cell of one column is blanked in one go: lines do not touch each other (tested beside this)."""
    rows = copied_rows()
    for row in rows:
        row[column] = ""
    assert newly_met(outcomes_of(reviewed(rows)), example_outcomes()) == {}


@pytest.mark.parametrize("column", CHANGEABLE, ids=lambda column: HEADER[column])
@pytest.mark.parametrize("filling", ["HOLD", "abc"])
def test_a_hold_or_an_unreadable_cell_never_makes_a_line_meet(column: int, filling: str) -> None:
    rows = copied_rows()
    for row in rows:
        row[column] = filling
    assert newly_met(outcomes_of(reviewed(rows)), example_outcomes()) == {}


def spoil(rows: list[list[str]], seed: int, *, most: int) -> None:
    """Spoil some cells of each line in the ways a list has."""
    chance = random.Random(seed)
    for row in rows:
        for column in chance.sample(CHANGEABLE, chance.randint(0, most)):
            row[column] = chance.choice(FILLINGS)


@settings(max_examples=60, deadline=None, phases=[Phase.explicit, Phase.generate])
@given(seed=st.integers(0, 2**32 - 1))
def test_any_set_of_spoiled_cells_never_makes_a_line_meet(seed: int) -> None:
    """Several cells of each line are spoiled at once."""
    rows = copied_rows()
    spoil(rows, seed, most=4)
    done = reviewed(rows)
    assert newly_met(outcomes_of(done), example_outcomes()) == {}
    assert sum(done.tally.values()) == done.line_cases * done.rules_count


@settings(max_examples=20, deadline=None, phases=[Phase.explicit, Phase.generate])
@given(seed=st.integers(0, 2**32 - 1))
def test_the_tally_adds_up_and_every_unchecked_outcome_says_why(seed: int) -> None:
    chance = random.Random(seed)
    rows = [list(ROWS[index]) for index in chance.sample(range(len(ROWS)), 12)]
    spoil(rows, seed, most=6)
    done = reviewed(rows)
    assert sum(done.tally.values()) == done.line_cases * done.rules_count
    frame = done.outcomes
    unchecked = frame[frame["outcome"] == "not checked"]
    assert unchecked["reason"].str.len().gt(10).all()
    assert sum(group.count for group in done.not_checked_groups) == done.tally["not checked"]
    met = frame[frame["outcome"] == "meets"]
    judged = met[met["rule"] != "schedule-exists"]
    assert judged[["value", "limit"]].notna().all(axis=None)
