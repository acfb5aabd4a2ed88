"""The end of a review in the terminal: coverage first, then the recommendation, the worst exceptions, the files."""

from __future__ import annotations

import math
import textwrap
from collections.abc import Iterator

from checker.report.breaches import Breach, breaches_of, counted_both_ways
from checker.report.numbers import NARROW_SPACE, count, utilisation
from checker.report.review_contract import ReviewLike
from checker.report.safe_text import LONGEST_PROSE, shortened, visible_line
from checker.report.states import TALLY_ORDER
from checker.report.wording import no_exceptions, plural
from checker.report.write import WrittenFiles

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
    plain = visible_line(shortened(text, LONGEST_PROSE).replace("\n", " ").replace(NARROW_SPACE, " "))
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
    extent = ", ".join(
        (plural(review.lines_count, "line"), plural(review.line_cases, "line case"), plural(review.rules_count, "rule"))
    )
    outcomes = ", ".join(f"{word} {count(review.tally.get(word, 0))}" for word in TALLY_ORDER)
    yield from wrapped(f"{extent}: {outcomes}", indent="  ")
    yield ""


def _worst(review: ReviewLike) -> Iterator[str]:
    breaches = breaches_of(review.exceptions)
    if not breaches:
        yield from wrapped(no_exceptions(review))
        yield ""
        return
    yield from wrapped(f"{counted_both_ways(len(review.exceptions), len(breaches))}.{_heading(len(breaches))}")
    for breach in breaches[:WORST]:
        yield from wrapped(_exception(breach), first=f"  {breach.rank}. ", indent="     ")
    yield ""


def _heading(total: int) -> str:
    return f" The {WORST} worst:" if total > WORST else ""


def _exception(breach: Breach) -> str:
    row = breach.worst
    against = f"{row.value_shown} against {row.limit_shown}" if row.limit_shown else row.value_shown
    used = "" if math.isnan(row.utilisation) else f"utilisation {utilisation(row.utilisation)}"
    line = f"{shortened(row.line_number)} ({shortened(breach.cases) or 'no case named'})"
    return "; ".join(part for part in (line, row.title, against, used, row.force) if part)


def _files(files: WrittenFiles) -> Iterator[str]:
    yield "Written"
    for path in files.paths:
        yield f"  {visible_line(str(path))}"
    if files.pdf_problem:
        yield from wrapped(files.pdf_problem)
