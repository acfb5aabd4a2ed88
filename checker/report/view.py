"""What the templates show: the review put into sections, groups and bounds. No markup and no numbers of its own."""

from __future__ import annotations

import math
from collections.abc import Iterable, Mapping, Sequence
from dataclasses import dataclass

from checker.model import Source
from checker.report.breaches import Breach, breaches_of, counted_both_ways
from checker.report.charts import Picture
from checker.report.numbers import percentage
from checker.report.reading_view import Reading, reading_of
from checker.report.review_contract import ResultLike, ReviewLike
from checker.report.states import TALLY_ORDER, State, state_of
from checker.report.wording import no_exceptions
from checker.review_model import AssumptionItem, CellValue

__all__ = ["ON_PAPER", "ON_SCREEN", "AssumptionGroup", "Bounds", "LineExceptions", "Section", "View", "build_view"]


@dataclass(frozen=True, slots=True)
class Bounds:
    """How much of a long list is written out; what is left out is always counted and its place named.

    Attributes
    ----------
    details : int
        Exceptions (a rule on a line) written out in full; the others stand in a compact table.
    compact : int
        Rows of that compact table.
    results : int
        Lines in the results of every line.
    rows : int
        Rows of any other table.
    names : int
        Line numbers named at once before the rest is folded away (screen) or counted (paper).
    """

    details: int
    compact: int
    results: int
    rows: int
    names: int


NO_BOUND = 10**9
ON_SCREEN = Bounds(details=500, compact=2_000, results=2_000, rows=NO_BOUND, names=24)
ON_PAPER = Bounds(details=150, compact=500, results=1_000, rows=1_000, names=60)
HTML = "exceptions.html"
WORST_STATES_FIRST = ("does not meet", "not checked", "near limit", "approved deviation", "meets")

RECOMMENDATION_STATES = {
    "no comments": "meets",
    "comments": "near limit",
    "revise and resubmit": "does not meet",
    "incomplete": "not checked",
}


@dataclass(frozen=True, slots=True)
class Section:
    """One numbered section and the template that fills it."""

    number: int
    anchor: str
    title: str
    template: str


@dataclass(frozen=True, slots=True)
class LineExceptions:
    """Exceptions of one line, each with its rank in the whole list (1 is the worst).

    `cells` holds every number that went into them once, with the ranks of the exceptions that rest on it.
    """

    line_number: str
    service: str
    breaches: tuple[Breach, ...]
    cells: tuple[tuple[CellValue, tuple[int, ...]], ...]


@dataclass(frozen=True, slots=True)
class AssumptionGroup:
    """One and the same assumption, and every line that it was made for in the same cases (empty: not by case)."""

    field: str
    shown: str
    source: str
    cases: str
    lines: tuple[str, ...]
    count: int


@dataclass(frozen=True, slots=True)
class TallyEntry:
    """One outcome of the tally: how many, and its share of the applicable outcomes as a number for the bar."""

    state: State
    count: int
    share: float
    share_text: str


@dataclass(frozen=True, slots=True)
class View:
    """Everything the templates read."""

    review: ReviewLike
    pictures: tuple[Picture, ...]
    reading: Reading
    sections: tuple[Section, ...]
    bounds: Bounds
    paged: bool
    recommendation: str
    state: State
    tally: tuple[TallyEntry, ...]
    outcomes_in_all: int
    exceptions_text: str
    lines: tuple[LineExceptions, ...]
    compact: tuple[Breach, ...]
    all_exceptions_in: str
    assumptions: tuple[AssumptionGroup, ...]
    results: Sequence[ResultLike]
    results_count: int
    all_results_in: str
    line_list: Source | None
    other_inputs: str
    revisions: tuple[str, ...]
    titles: Mapping[str, str]
    approvals: tuple[Mapping[str, str], ...]


def build_view(review: ReviewLike, pictures: tuple[Picture, ...], *, paged: bool) -> View:
    """Return what the templates show of a review, for the screen or for paper."""
    bounds = ON_PAPER if paged else ON_SCREEN
    breaches = breaches_of(review.exceptions)
    results = review.results().rows
    inputs = review.basis.inputs
    return View(
        review=review,
        pictures=pictures,
        reading=reading_of(review),
        sections=_sections(review),
        bounds=bounds,
        paged=paged,
        recommendation=_first_letter_large(review.recommendation_text),
        state=state_of(RECOMMENDATION_STATES.get(review.recommendation, "not checked")),
        tally=_tally(review),
        outcomes_in_all=sum(review.tally.values()),
        exceptions_text=_exceptions_text(review, breaches),
        lines=_by_line(breaches[: bounds.details]),
        compact=breaches[bounds.details :],
        all_exceptions_in=HTML if len(breaches) <= ON_SCREEN.details + ON_SCREEN.compact else "outcomes.json",
        assumptions=_assumption_groups(review.assumption_items),
        results=_most_telling(results, bounds.results),
        results_count=len(results),
        all_results_in=HTML if len(results) <= ON_SCREEN.results else "hydraulics.csv and outcomes.json",
        line_list=inputs[0] if inputs else None,
        other_inputs=", ".join(source.name for source in inputs[1:]),
        revisions=tuple(getattr(review, "revisions", ())),
        titles={summary.rule: summary.title for summary in review.rule_summaries},
        approvals=_approvals(review),
    )


def _first_letter_large(text: str) -> str:
    return text[:1].upper() + text[1:]


def _sections(review: ReviewLike) -> tuple[Section, ...]:
    entries = [
        ("recommendation", "Recommendation and coverage", "recommendation"),
        ("pictures", "The list at a glance", "pictures"),
        ("reading", "How the list was read", "reading"),
        ("completeness", "Completeness against the drawings", "completeness"),
        ("exceptions", "Exceptions by line: what must be done", "exceptions"),
        ("approved", "Approved deviations", "approved"),
        ("not-checked", "What was not checked, and why", "not_checked"),
        ("unread", "Rows and cells not read", "unread"),
        ("holds", "HOLD register", "holds"),
        ("assumptions", "Assumptions", "assumptions"),
        ("cautions", "Cautions", "cautions"),
        ("basis", "Basis", "basis"),
        ("rules", "Rules and how often each gave which outcome", "rules"),
        ("results", "Results of every line", "results"),
    ]
    needless = set() if review.approved or len(review.deviations) else {"approved"}
    needless |= {"completeness"} if review.completeness is None else set()
    shown = [entry for entry in entries if entry[0] not in needless]
    return tuple(
        Section(number, anchor, title, f"section_{template}.html.j2")
        for number, (anchor, title, template) in enumerate(shown, start=1)
    )


def _approvals(review: ReviewLike) -> tuple[Mapping[str, str], ...]:
    """Return every approval of the deviations file and what became of it, as texts."""
    records = review.deviations.to_dict("records")
    return tuple({str(name): str(value) for name, value in record.items()} for record in records)


def _tally(review: ReviewLike) -> tuple[TallyEntry, ...]:
    applicable = sum(number for word, number in review.tally.items() if word != "not applicable")
    entries = []
    for word in TALLY_ORDER:
        number = review.tally.get(word, 0)
        counted = word != "not applicable"
        share = number / applicable if applicable and counted else 0.0
        text = percentage(number, applicable) if counted else ""
        entries.append(TallyEntry(state_of(word), number, share, text))
    return tuple(entries)


def _exceptions_text(review: ReviewLike, breaches: Sequence[Breach]) -> str:
    outcomes = len(review.exceptions)
    return f"{counted_both_ways(outcomes, len(breaches))}." if outcomes else no_exceptions(review)


def _most_telling(rows: Sequence[ResultLike], most: int) -> Sequence[ResultLike]:
    """Return all rows in the order of the list, or as many as may be shown, the worst states first."""
    if len(rows) <= most:
        return rows
    places = {state: place for place, state in enumerate(WORST_STATES_FIRST)}

    def standing(row: ResultLike) -> tuple[int, float]:
        used = -1.0 if math.isnan(row.utilisation) else row.utilisation
        return places.get(row.state, len(places)), -used

    return sorted(rows, key=standing)[:most]


def _by_line(breaches: Iterable[Breach]) -> tuple[LineExceptions, ...]:
    groups: dict[str, list[Breach]] = {}
    for breach in breaches:
        groups.setdefault(breach.worst.line_number, []).append(breach)
    return tuple(
        LineExceptions(line, members[0].worst.service, tuple(members), _cells_once(members))
        for line, members in groups.items()
    )


def _cells_once(members: Iterable[Breach]) -> tuple[tuple[CellValue, tuple[int, ...]], ...]:
    ranks: dict[CellValue, list[int]] = {}
    for breach in members:
        for cell in dict.fromkeys(cell for row in breach.rows for cell in row.cells):
            ranks.setdefault(cell, []).append(breach.rank)
    return tuple((cell, tuple(mine)) for cell, mine in ranks.items())


def _assumption_groups(items: Iterable[AssumptionItem]) -> tuple[AssumptionGroup, ...]:
    cases_of: dict[tuple[str, str, str, str], list[str]] = {}
    for item in items:
        cases_of.setdefault((item.field, item.shown, item.source, item.line_number), []).append(item.case)
    groups: dict[tuple[str, str, str, tuple[str, ...]], list[str]] = {}
    for (field, shown, source, line), cases in cases_of.items():
        groups.setdefault((field, shown, source, tuple(cases)), []).append(line)
    return tuple(
        AssumptionGroup(field, shown, source, ", ".join(filter(None, cases)), tuple(lines), len(lines) * len(cases))
        for (field, shown, source, cases), lines in groups.items()
    )
