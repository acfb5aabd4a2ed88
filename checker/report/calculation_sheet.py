"""The calculation sheet of one line, for the terminal: laid out as a hand calculation is."""

from __future__ import annotations

from collections.abc import Iterable, Iterator

import numpy as np

from checker.errors import InputError, Problem
from checker.report.numbers import MISSING, NARROW_SPACE, in_shown_unit, utilisation
from checker.report.review_contract import ReviewLike
from checker.report.safe_text import shortened, visible_line
from checker.report.states import state_of
from checker.report.terminal import WIDTH, wrapped
from checker.review_model import CellValue, OutcomeRow
from checker.shown import meaning_of

__all__ = ["CAUTION", "calculation_sheet"]

CAUTION = (
    "A screening check: it does not replace the codes in force, hazard studies or the judgement of a licensed "
    "engineer; local codes prevail."
)


def calculation_sheet(review: ReviewLike, line_number: str) -> str:
    """Return the whole calculation of one line as text, 100 wide.

    Inputs with the cells they came from, the balance, the hydraulic results of each case, then every rule: equation
    with the numbers put in, limit, outcome, reason.

    Raises
    ------
    InputError
        The list has no such line.
    """
    rows = review.outcome_rows(line_number)
    if not rows:
        raise InputError(_no_such_line(review, line_number))
    ledger = [_plain(line) for line in review.ledger_text(line_number)]
    parts = [
        _title(review, line_number, rows),
        _section("Inputs", _inputs(rows)),
        _section("Balance from end to end", iter(ledger)) if ledger else iter(()),
        _cases(review, rows),
        _section("Caution", iter(wrapped(CAUTION))),
    ]
    return "\n".join(line.rstrip() for part in parts for line in part)


def _no_such_line(review: ReviewLike, line_number: str) -> Problem:
    where = review.basis.inputs[0].name if review.basis.inputs else ""
    return Problem(
        what=f"the list has no line {line_number!r}.",
        where=where,
        remedy="Write the line number as the list does; exceptions.html and hydraulics.csv hold all of them.",
    )


def _title(review: ReviewLike, line_number: str, rows: tuple[OutcomeRow, ...]) -> Iterator[str]:
    yield "=" * WIDTH
    yield from wrapped(f"CALCULATION SHEET  {line_number}")
    yield from wrapped(", ".join(text for text in (review.title, review.document) if text) or "No project named")
    yield from wrapped(f"Service: {rows[0].service or 'not stated'}")
    for source in review.basis.inputs:
        yield from wrapped(f"{source.name}  SHA-256 {source.sha256}", indent="  ")
    yield "=" * WIDTH


def _section(title: str, body: Iterable[str]) -> Iterator[str]:
    yield ""
    yield from wrapped(title)
    yield "-" * min(len(title), WIDTH)
    yield from body


def _inputs(rows: tuple[OutcomeRow, ...]) -> Iterator[str]:
    cells = dict.fromkeys(cell for row in rows for cell in row.cells)
    if not cells:
        yield "  none were read"
    for cell in cells:
        yield from _input(cell)


def _input(cell: CellValue) -> Iterator[str]:
    label = f"{cell.meaning or cell.field}:"
    written = f"written {visible_line(shortened(cell.written))!r}, " if cell.written else ""
    yield from wrapped(f"{label:<44} {shortened(cell.shown)}", first="  ", indent="    ")
    yield from wrapped(f"{cell.field}, {written}{cell.origin}", indent=" " * 6)


def _cases(review: ReviewLike, rows: tuple[OutcomeRow, ...]) -> Iterator[str]:
    cases: dict[int, list[OutcomeRow]] = {}
    for row in rows:
        cases.setdefault(row.line_case, []).append(row)
    for line_case, mine in cases.items():
        name = mine[0].case or "no case named"
        yield from _section(f"Case {name}: hydraulic results", _hydraulics(review, line_case, mine[0]))
        yield from _section(f"Case {name}: rules", _rules(mine))


def _hydraulics(review: ReviewLike, line_case: int, row: OutcomeRow) -> Iterator[str]:
    if row.composite:
        yield from wrapped("Composite case: flow of one case, pressure, temperature or properties of another.")
    for name, unit, values in review.hydraulics_columns():
        value = np.asarray(values)[line_case]
        shown = in_shown_unit(name, unit, float(value)) if np.asarray(values).dtype.kind in "iuf" else str(value)
        yield _plain(f"  {meaning_of(name):<44} {shown or MISSING:<20} {name}")
    regime = review.flow_regimes()[line_case] or MISSING
    yield _plain(f"  {meaning_of('flow_regime'):<44} {regime:<20} flow_regime")


def _rules(rows: list[OutcomeRow]) -> Iterator[str]:
    inapplicable = [row.title for row in rows if row.outcome == "not applicable"]
    for row in rows:
        if row.outcome != "not applicable":
            yield from _rule(row)
    if inapplicable:
        yield from wrapped(f"not applicable: {', '.join(inapplicable)}", first="  ", indent="    ")


def _rule(row: OutcomeRow) -> Iterator[str]:
    state = state_of(row.outcome)
    yield from wrapped(f"{state.shape} {row.title} ({row.force}): {row.outcome}", first="  ", indent="    ")
    for line in row.calculation.splitlines():
        yield from wrapped(line, first="      ", indent="        ")
    yield from _labelled("value", row.value_shown)
    yield from _labelled("limit", "  ".join(text for text in (row.limit_shown, _bracketed(row.limit_origin)) if text))
    yield from _labelled("utilisation", "" if np.isnan(row.utilisation) else utilisation(row.utilisation))
    yield from _labelled("reason", row.reason)
    yield from _labelled("rests on", "; ".join(row.rests_on))
    yield from _labelled("source", row.source)
    yield ""


def _labelled(label: str, text: str) -> Iterator[str]:
    if text:
        yield from wrapped(text, first=f"      {label:<12} ", indent=" " * 19)


def _bracketed(text: str) -> str:
    return f"({text})" if text else ""


def _plain(text: str) -> str:
    return visible_line(text).replace(NARROW_SPACE, " ")
