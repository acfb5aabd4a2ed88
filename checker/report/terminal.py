"""The end of a review in the terminal: coverage, how the list was read, recommendation, worst exceptions, files."""

from __future__ import annotations

import math
from collections.abc import Iterator

from checker.report.breaches import Breach, breaches_of, counted_both_ways
from checker.report.numbers import count, utilisation
from checker.report.reading_summary import reading_summary
from checker.report.review_contract import ReviewLike
from checker.report.safe_text import shortened, visible_line
from checker.report.states import TALLY_ORDER
from checker.report.text_lines import wrapped
from checker.report.wording import no_exceptions, plural
from checker.report.write import WrittenFiles

__all__ = ["summary"]

WORST = 5
LONGEST_REASON = 160
MOST_NAMED = 3


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


def _head(review: ReviewLike) -> Iterator[str]:
    yield from wrapped(review.coverage_text)
    yield ""
    yield from reading_summary(review)
    yield from _completeness(review)
    yield from wrapped(review.recommendation_text, first="Recommendation: ", indent="  ")
    for reason in review.reasons:
        yield from wrapped(reason, first="  - ", indent="    ")
    for fault in review.faults:
        yield from wrapped(f"A rule failed; what it judges is not checked: {fault}", first="  - ", indent="    ")
    yield ""


def _completeness(review: ReviewLike) -> Iterator[str]:
    """Yield what list and drawings do not agree on, the first of each kind by name."""
    found = review.completeness
    if found is None:
        return
    yield "Completeness against the drawings"
    yield from wrapped(found.sentence, first="  ", indent="    ")
    for kind, number in found.counts.items():
        items = found.of_kind(kind)[:MOST_NAMED]
        for item in items:
            yield from wrapped(item.sentence, first="  - ", indent="    ")
        if number > MOST_NAMED:
            yield f"    and {count(number - MOST_NAMED)} more {kind}"
    yield ""


def _counts(review: ReviewLike) -> Iterator[str]:
    extent = ", ".join(
        (plural(review.lines_count, "line"), plural(review.line_cases, "line case"), plural(review.rules_count, "rule"))
    )
    if review.deleted_items:
        extent += f" ({plural(len(review.deleted_items), 'deleted line')} aside)"
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
    against = shortened(row.reason, LONGEST_REASON) if row.limit_shown == "yes" else against
    used = "" if math.isnan(row.utilisation) else f"utilisation {utilisation(row.utilisation)}"
    line = f"{shortened(row.line_number)} ({shortened(breach.cases) or 'no case named'})"
    return "; ".join(part for part in (line, row.title, against, used, row.force) if part)


def _files(files: WrittenFiles) -> Iterator[str]:
    yield "Written"
    for path in files.paths:
        yield f"  {visible_line(str(path))}"
    if files.pdf_problem:
        yield from wrapped(files.pdf_problem)
