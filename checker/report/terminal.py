"""The end of a review in the terminal: coverage first, then the recommendation, the worst exceptions, the files."""

from __future__ import annotations

import math
import textwrap
from collections.abc import Iterator

from checker.report.numbers import NARROW_SPACE, count, utilisation
from checker.report.review_contract import ReviewLike
from checker.report.safe_text import visible_line
from checker.report.states import TALLY_ORDER
from checker.report.write import WrittenFiles
from checker.review_model import OutcomeRow

__all__ = ["WIDTH", "summary", "wrapped"]

WIDTH = 100
WORST = 5


def summary(review: ReviewLike, files: WrittenFiles | None) -> str:
    """Return the summary of a review as plain text, 100 wide.

    Parameters
    ----------
    review : ReviewLike
        The review.
    files : WrittenFiles or None
        What was written; None where nothing was asked for.
    """
    lines = [*_head(review), *_counts(review), *_worst(review)]
    if files is not None:
        lines += _files(files)
    return "\n".join(lines)


def wrapped(text: str, *, indent: str = "", first: str | None = None) -> list[str]:
    """Return a text on lines of at most 100 characters, nothing hidden in it."""
    plain = visible_line(text.replace("\n", " ").replace(NARROW_SPACE, " "))
    start = indent if first is None else first
    lines = textwrap.wrap(plain, WIDTH, initial_indent=start, subsequent_indent=indent, break_on_hyphens=False)
    return lines or [start.rstrip()]


def _head(review: ReviewLike) -> Iterator[str]:
    yield from wrapped(review.coverage_text)
    yield from wrapped(review.recommendation_text, first="Recommendation: ", indent="  ")
    for reason in review.reasons:
        yield from wrapped(reason, first="  - ", indent="    ")
    for fault in review.faults:
        yield from wrapped(f"A rule failed; what it judges is not checked: {fault}", first="  - ", indent="    ")
    yield ""


def _counts(review: ReviewLike) -> Iterator[str]:
    extent = f"{count(review.lines_count)} lines, {count(review.line_cases)} line cases, {review.rules_count} rules"
    outcomes = ", ".join(f"{word} {count(review.tally.get(word, 0))}" for word in TALLY_ORDER)
    yield from wrapped(f"{extent}: {outcomes}", indent="  ")
    yield ""


def _worst(review: ReviewLike) -> Iterator[str]:
    total = len(review.exceptions)
    if not total:
        yield "No exceptions."
        yield ""
        return
    heading = "The exception" if total == 1 else f"The {min(WORST, total)} worst of {count(total)} exceptions"
    yield from wrapped(heading)
    for place, row in enumerate(review.exceptions[:WORST], start=1):
        yield from wrapped(_exception(row), first=f"  {place}. ", indent="     ")
    yield ""


def _exception(row: OutcomeRow) -> str:
    case = row.case or "no case named"
    against = f"{row.value_shown} against {row.limit_shown}" if row.limit_shown else row.value_shown
    used = "" if math.isnan(row.utilisation) else f"utilisation {utilisation(row.utilisation)}"
    return "; ".join(part for part in (f"{row.line_number}, {case}", row.title, against, used, row.force) if part)


def _files(files: WrittenFiles) -> Iterator[str]:
    yield "Written"
    for path in files.paths:
        yield f"  {visible_line(str(path))}"
    if files.pdf_problem:
        yield from wrapped(files.pdf_problem)
