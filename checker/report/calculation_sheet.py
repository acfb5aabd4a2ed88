"""The calculation sheet of one line, for the terminal: laid out as a hand calculation is."""

from __future__ import annotations

from collections.abc import Iterable, Iterator
from typing import TypeVar

import numpy as np

from checker.errors import InputError, Problem
from checker.model import HoldItem, RangeItem, UnreadItem
from checker.report.cell_record_text import read_as, si_text
from checker.report.numbers import MISSING, NARROW_SPACE, in_shown_unit, utilisation
from checker.report.review_contract import ReviewLike
from checker.report.safe_text import shortened, visible_line
from checker.report.states import state_of
from checker.report.text_lines import WIDTH, wrapped
from checker.report.wording import listed_meaning
from checker.review_model import CellValue, OutcomeRow
from checker.shown import meaning_of, shown_value

__all__ = ["CAUTION", "calculation_sheet"]

_Item = TypeVar("_Item", HoldItem, RangeItem, UnreadItem)

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
        _section("Inputs", _inputs(review, rows)),
        *(_section(heading, iter(body)) for heading, body in _said_of_cells(review, line_number) if body),
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


def _inputs(review: ReviewLike, rows: tuple[OutcomeRow, ...]) -> Iterator[str]:
    cells: dict[CellValue, int] = {}
    for row in rows:
        for cell in row.cells:
            cells.setdefault(cell, row.line_case)
    if not cells:
        yield "  none were read"
    for cell, line_case in cells.items():
        yield from _input(cell, read_as(review.record(cell.field, line_case), cell.field))


def _input(cell: CellValue, read: str) -> Iterator[str]:
    label = f"{cell.meaning or cell.field}:"
    yield from wrapped(f"{label:<44} {shortened(cell.shown)}", first="  ", indent="    ")
    written = f"written {visible_line(shortened(cell.written))!r}" if cell.written else ""
    said = (cell.field, written, f"read as {read}" if read else "", cell.origin)
    yield from wrapped(", ".join(text for text in said if text), indent=" " * 6)


def _said_of_cells(review: ReviewLike, line_number: str) -> Iterator[tuple[str, list[str]]]:
    """Yield what else stands in the cells of a line: two values, open items, and what was refused."""
    wanted = line_number.strip().casefold()

    def mine(items: Iterable[_Item]) -> list[_Item]:
        return [item for item in items if item.line_number.casefold() == wanted]

    ranges = [
        f"{listed_meaning(item.field)}: written {shortened(item.text)!r}, from {shown_value(item.field, item.low)} "
        f"({si_text((item.low,), item.field)}) to {shown_value(item.field, item.high)} "
        f"({si_text((item.high,), item.field)}), {item.address}"
        for item in mine(review.range_items)
    ]
    holds = [
        f"{listed_meaning(item.field)}: written {shortened(item.text)!r}, {item.address}"
        for item in mine(review.hold_items)
    ]
    refused = [f"{item.reason} ({item.address})" for item in mine(review.unread_items)]
    yield "Cells with two values: each end is a case of its own", _listed(ranges)
    yield "Open items (HOLD)", _listed(holds)
    yield "Cells that were refused", _listed(refused)


def _listed(sentences: Iterable[str]) -> list[str]:
    return [line for sentence in sentences for line in wrapped(sentence, first="  ", indent="      ")]


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
