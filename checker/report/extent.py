"""How much a report holds, said before the long steps of making it."""

from __future__ import annotations

import math

from checker.report.breaches import breaches_of
from checker.report.numbers import count
from checker.report.review_contract import ReviewLike
from checker.report.view import ON_PAPER
from checker.report.wording import plural

__all__ = ["pages_worth", "what_is_prepared"]

# Counted on printed reports: pages without lists, and how many entries of each list fill a page.
FIXED_PAGES = 9
CARDS_A_PAGE = 2.0
RESULTS_A_PAGE = 33
COMPACT_A_PAGE = 25
ROWS_A_PAGE = 15


def pages_worth(review: ReviewLike) -> int:
    """Return about how many pages the PDF will have."""
    breaches = len(breaches_of(review.exceptions))
    cards = min(breaches, ON_PAPER.details)
    compact = min(breaches - cards, ON_PAPER.compact)
    others = (
        review.not_checked_groups,
        review.hold_items,
        review.unread_items,
        review.approved,
        review.range_items,
        review.deleted_items,
        review.matching,
        () if review.completeness is None else review.completeness.items,
    )
    rows = sum(min(len(table), ON_PAPER.rows) for table in others)
    results = min(review.lines_count, ON_PAPER.results)
    lists = cards / CARDS_A_PAGE + compact / COMPACT_A_PAGE + rows / ROWS_A_PAGE + results / RESULTS_A_PAGE
    return FIXED_PAGES + math.ceil(lists)


def what_is_prepared(review: ReviewLike) -> str:
    """Return how many exceptions, lines and line cases the page, the JSON and the CSV are made from."""
    breaches = len(breaches_of(review.exceptions))
    exceptions = f"{count(len(review.exceptions))} not met in {plural(breaches, 'exception')}"
    return f"{exceptions}, {plural(review.lines_count, 'line')}, {plural(review.line_cases, 'line case')}"
