"""How the list was read, for the terminal: at most a screen; what asks for an answer is never left out."""

from __future__ import annotations

from collections.abc import Iterable, Iterator, Sequence

from checker.model import HeaderMatch, UnreadItem
from checker.report.numbers import count
from checker.report.reading_view import Reading, reading_of
from checker.report.review_contract import ReviewLike
from checker.report.safe_text import shortened, visible_line
from checker.report.text_lines import WIDTH, wrapped
from checker.report.wording import plural

__all__ = ["reading_summary"]

MOST_NOTES = 8
MOST_PAIRS = 20
MOST_NAMES = 6
LONGEST_NAME = 60
LONGEST_NOTE = 320
CELL = WIDTH // 2 - 2


def reading_summary(review: ReviewLike) -> Iterator[str]:
    """Yield how the list was read: its form, the headers and their fields, the questions, and the counts."""
    reading = reading_of(review)
    yield "How the list was read"
    yield from _notes(review)
    yield from _columns(reading)
    yield from _questions(reading.questions)
    yield from _unmatched(reading)
    yield from _counts(review, reading)
    yield ""


def _notes(review: ReviewLike) -> Iterator[str]:
    """Yield what was understood, short sentences beside each other, the file's name before them."""
    inputs = review.basis.inputs
    notes = [f"{inputs[0].name}:"] if inputs else []
    for note in review.understood:
        if notes and len(notes[-1]) + len(note) < WIDTH - 3:
            notes[-1] += f" {note}"
        else:
            notes.append(note)
    for note in notes[:MOST_NOTES]:
        yield from wrapped(shortened(note, LONGEST_NOTE), first="  ", indent="    ")
    if len(notes) > MOST_NOTES:
        yield "  There is more to say of it: the report, 'How the list was read', says all."


def _columns(reading: Reading) -> Iterator[str]:
    matched = reading.matched
    yield f"  Columns read: {len(matched)} (header -> field, unit, case)"
    shown = [_match(match) for match in matched[: 2 * MOST_PAIRS]]
    half = (len(shown) + 1) // 2
    for left, right in zip(shown[:half], [*shown[half:], ""], strict=False):
        yield f"    {left:<{CELL}}{right}".rstrip()
    if len(matched) > 2 * MOST_PAIRS:
        yield f"    and {len(matched) - 2 * MOST_PAIRS} more, in the report under 'How the list was read'"


def _match(match: HeaderMatch) -> str:
    said = ", ".join(text for text in (match.field, match.unit, match.case) if text)
    room = max(CELL - len(said) - 6, 10)
    header = visible_line(match.header)
    header = header if len(header) <= room else f"{header[: room - 1].rstrip()}\u2026"
    return _cut(f"{header} -> {visible_line(said)}", CELL - 2)


def _cut(text: str, longest: int) -> str:
    return text if len(text) <= longest else f"{text[: longest - 1]}\u2026"


def _questions(questions: Sequence[UnreadItem]) -> Iterator[str]:
    if questions:
        yield f"  Columns refused, or that ask a question: {len(questions)}"
    for item in questions:
        named = item.reason.startswith(f"'{item.text}")
        said = item.reason if named else f"{shortened(item.text, LONGEST_NAME)}: {item.reason}"
        yield from wrapped(said, first="  ? ", indent="    ")


def _unmatched(reading: Reading) -> Iterator[str]:
    """Yield the columns that are not read, those of which the same is said together."""
    asked = {item.text for item in reading.questions}
    said: dict[str, list[str]] = {}
    for match in reading.unmatched:
        if match.header not in asked:
            said.setdefault(match.remark, []).append(match.header)
    for remark, headers in said.items():
        if remark.startswith(f"'{headers[0][:20]}"):
            yield from wrapped(remark, first="  ? ", indent="    ")
        else:
            start = f"Columns not read, {remark}" if remark else "Columns not read"
            yield from wrapped(f"{start}: {_names(headers)}", first="  ", indent="    ")


def _names(names: Sequence[str]) -> str:
    first = ", ".join(shortened(name, LONGEST_NAME) for name in names[:MOST_NAMES])
    return f"{first} and {len(names) - MOST_NAMES} more" if len(names) > MOST_NAMES else first


def _counts(review: ReviewLike, reading: Reading) -> Iterator[str]:
    parts = [plural(review.lines_count, "line"), plural(review.line_cases, "line case")]
    parts += _where_any(
        (len(review.deleted_items), "deleted line"),
        (reading.rows_aside, "row that is no line", "rows that are no lines"),
        (reading.cells_refused, "cell refused", "cells refused"),
        (len(review.range_items), "cell with two values", "cells with two values"),
        (len(review.hold_items), "HOLD"),
    )
    yield from wrapped(f"Read: {', '.join(parts)}.", first="  ", indent="    ")
    deleted = [item.line_number or item.text for item in review.deleted_items]
    if deleted:
        said = f"Deleted by their originator, so listed and not checked: {_names(deleted)}."
        yield from wrapped(said, first="  ", indent="    ")


def _where_any(*counted: tuple[int, str] | tuple[int, str, str]) -> Iterable[str]:
    for number, one, *many in counted:
        if number:
            several = many[0] if many else f"{one}s"
            yield f"{count(number)} {one if number == 1 else several}"
