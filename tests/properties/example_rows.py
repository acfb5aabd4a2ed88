"""The example list as rows that a test may change, and its outcomes as a mapping."""

from __future__ import annotations

import csv
import io
import tempfile
from collections.abc import Iterable
from functools import cache
from pathlib import Path
from typing import Any

import checker
from checker.model import base_case

EXAMPLE = Path(__file__).parents[2] / "example_linelists"
LIST = EXAMPLE / "marrowquay_rev_a.csv"
Outcomes = dict[tuple[str, str, str], str]
Rows = list[list[str]]


@cache
def header_and_rows() -> tuple[tuple[str, ...], tuple[tuple[str, ...], ...]]:
    """Return the example's header and rows as written."""
    with LIST.open(encoding="utf-8-sig", newline="") as handle:
        rows = list(csv.reader(handle))
    return tuple(rows[0]), tuple(tuple(row) for row in rows[1:])


def copied_rows() -> Rows:
    """Return the example's rows, free to be changed."""
    return [list(row) for row in header_and_rows()[1]]


def reviewed(rows: Iterable[Iterable[str]], *, header: Iterable[str] | None = None, **options: Any) -> Any:
    """Review rows under the example's criteria and classes."""
    text = io.StringIO(newline="")
    writer = csv.writer(text, lineterminator="\r\n")
    writer.writerow(header_and_rows()[0] if header is None else header)
    writer.writerows(rows)
    with tempfile.TemporaryDirectory() as folder:
        path = Path(folder) / "list.csv"
        path.write_text(text.getvalue(), encoding="utf-8", newline="")
        given = {"criteria": EXAMPLE / "criteria.toml", "classes": EXAMPLE / "classes.csv"} | options
        return checker.review(path, **given)


def outcomes_of(done: Any) -> Outcomes:
    """Return the outcome of every line case and rule, `not applicable` included."""
    words = ("not applicable", "meets", "does not meet", "not checked", "approved deviation")
    labels = done.line_case_labels()
    return {
        (*labels[case], rule.id): words[int(done.judgement.outcome[index, case])]
        for index, rule in enumerate(done.judgement.rules)
        for case in range(len(labels))
    }


_GRAVEST_LAST = ("not applicable", "meets", "approved deviation", "not checked", "does not meet")


def by_base_case(outcomes: Outcomes) -> Outcomes:
    """Return the gravest outcome of the ends of a range together, by the case as the list names it.

    A cell that is no range any more leaves one line case where there were two.
    """
    gravest: Outcomes = {}
    for (line, case, rule), word in outcomes.items():
        key = (line, base_case(case), rule)
        gravest[key] = max(word, gravest.get(key, word), key=_GRAVEST_LAST.index)
    return gravest


@cache
def contradicting_lines() -> frozenset[str]:
    """Return the lines whose own values contradict each other: take one of the two away and nothing contradicts."""
    frame = reviewed(header_and_rows()[1]).outcomes
    contradicts = frame["reason"].str.contains("differs by more than|contradict")
    return frozenset(frame.loc[contradicts, "line_number"])


@cache
def example_outcomes() -> Outcomes:
    """Return the outcomes of the example as it stands."""
    return outcomes_of(reviewed(header_and_rows()[1]))
