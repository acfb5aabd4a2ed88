"""The recommendation on a list, promise by promise."""

from __future__ import annotations

import numpy as np
import pytest

from checker.recommendation import coverage_of, recommend
from checker.ruling.contract import FORCES, Outcome, Rule, Source
from checker.ruling.run import Judgement

M, F, N, A, D = (
    Outcome.MEETS,
    Outcome.DOES_NOT_MEET,
    Outcome.NOT_CHECKED,
    Outcome.NOT_APPLICABLE,
    Outcome.APPROVED_DEVIATION,
)


def judged(*outcomes: Outcome, force: str = "should", used: float = 1.1) -> Judgement:
    made = Rule(
        "r", "R", "should", "at most", Source("s"), "", "", "", lambda: None, (), (), None, (), None, "", "tests"
    )  # fmt: skip
    row = np.array([outcomes], dtype=np.int8)
    return Judgement(
        (made,), row, np.full(row.shape, FORCES.index(force), dtype=np.int8), np.where(row == F, used, 0.5), {}
    )


def word(judgement: Judgement, open_items: int = 0) -> str:
    return recommend(judgement, gross_factor=1.25, coverage_minimum=0.9, open_items={"HOLDs": open_items}).word


@pytest.mark.parametrize(
    ("judgement", "open_items", "expected"),
    [
        (judged(M, M), 0, "no comments"),
        (judged(M, M), 1, "comments"),
        (judged(*[M] * 19, N), 0, "comments"),
        (judged(M, D), 0, "no comments"),
        (judged(M, F), 0, "comments"),
        (judged(M, F, used=1.25), 0, "comments"),
        (judged(M, F, used=1.2500001), 0, "revise and resubmit"),
        (judged(M, F, used=np.inf), 0, "revise and resubmit"),
        (judged(M, F, force="shall", used=1.001), 0, "revise and resubmit"),
        (judged(M, F, force="note", used=9.0), 0, "comments"),
        (judged(*[M] * 8, N), 0, "incomplete"),
        (judged(F, N, N, N, force="shall"), 0, "revise and resubmit"),
        (judged(A, A), 0, "incomplete"),
        (judged(N, N), 0, "incomplete"),
    ],
)
def test_recommendation(judgement: Judgement, open_items: int, expected: str) -> None:
    assert word(judgement, open_items) == expected


def test_coverage_leaves_out_what_does_not_apply() -> None:
    assert coverage_of(judged(M, F, D, N, A, A)) == pytest.approx(0.75)
    assert coverage_of(judged(A)) == 0.0


def test_a_condition_of_force_should_is_never_gross_by_a_missing_number() -> None:
    assert word(judged(M, F, used=np.nan)) == "comments"


def test_tally_adds_up() -> None:
    tally = judged(M, F, D, N, A, A).tally()
    assert sum(tally.values()) == 6
    assert tally == {"meets": 1, "does not meet": 1, "not checked": 1, "not applicable": 2, "approved deviation": 1}
