"""Which sheet of a workbook holds the line list: the one asked for, else the only one that looks like it."""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from dataclasses import dataclass

from checker.errors import InputError
from checker.intake.layout import LINE_NUMBER_WEIGHT, find_layout, header_score
from checker.intake.texts import shown
from checker.intake.workbook.header_marks import take_out_marks
from checker.intake.workbook.package import refuse
from checker.intake.workbook.raw import HEAD, Book

__all__ = ["choose_sheet"]

NAMED_SHEETS = 20
SURE = LINE_NUMBER_WEIGHT + 2
_SAY_WHICH = "Say which with --sheet NAME."


@dataclass(frozen=True, slots=True)
class _Look:
    """How much a sheet looks like a line list, and the row that looks most like its headers."""

    score: int
    row: int
    cells: tuple[str, ...]


def _look(rows: Sequence[Sequence[str]], hints: Mapping[str, str]) -> _Look:
    scores = [header_score(row, hints) for row in rows]
    best = max(range(len(rows)), key=scores.__getitem__, default=-1)
    if best < 0:
        return _Look(0, 0, ())
    score = scores[best]
    if score >= LINE_NUMBER_WEIGHT:
        try:
            score = max(score, header_score(find_layout(rows, file="", hints=hints).headers, hints))
        except InputError:
            pass
    return _Look(score, best + 1, tuple(rows[best]))


def _named(book: Book, indices: Sequence[int]) -> str:
    names = [
        shown(book.sheets[index].name) + ("" if book.sheets[index].visible else " (hidden)")
        for index in indices[:NAMED_SHEETS]
    ]
    more = f" and {len(indices) - NAMED_SHEETS} more" if len(indices) > NAMED_SHEETS else ""
    return ", ".join(names) + more


def _asked(book: Book, sheet: str, file: str) -> int:
    """Return the sheet of a name: as written, else but for capitals and blanks."""
    names = [known.name for known in book.sheets]
    if sheet in names:
        return names.index(sheet)
    folded = [" ".join(name.split()).casefold() for name in names]
    alike = [index for index, name in enumerate(folded) if name == " ".join(sheet.split()).casefold()]
    if len(alike) == 1:
        return alike[0]
    if alike:
        raise refuse(file, f"more than one sheet is named {shown(sheet)}: {_named(book, alike)}.", _SAY_WHICH)
    listed = _named(book, range(len(names)))
    raise refuse(file, f"there is no sheet {shown(sheet)}; the sheets are {listed}.", "Give one of these names.")


def _rows(book: Book, index: int) -> str:
    return f"{shown(book.sheets[index].name)} ({len(book.whole(index).rows)} rows)"


def _head(book: Book, index: int, hints: Mapping[str, str]) -> list[list[str]]:
    raw = book.head(index)
    take_out_marks(raw, hints)
    return raw.rows[:HEAD]


def _looks_like_it(book: Book, hints: Mapping[str, str], visible: bool) -> tuple[list[int], dict[int, _Look]]:
    looks = {
        index: _look(_head(book, index, hints), hints)
        for index, known in enumerate(book.sheets)
        if known.visible == visible
    }
    sure = [index for index, look in looks.items() if look.score >= SURE]
    return sure or [index for index, look in looks.items() if look.score >= LINE_NUMBER_WEIGHT], looks


def _none(book: Book, looks: Mapping[int, _Look], hints: Mapping[str, str], file: str) -> InputError:
    hidden, _ = _looks_like_it(book, hints, visible=False)
    if hidden:
        what = f"no visible sheet looks like a line list, but a hidden one does: {_named(book, hidden)}."
        return refuse(file, what, _SAY_WHICH)
    best = max(looks, key=lambda index: looks[index].score, default=-1)
    nearest = ""
    if best >= 0 and looks[best].score:
        cells = ", ".join(shown(cell) for cell in looks[best].cells if cell.strip())
        nearest = f" The nearest is row {looks[best].row} of {shown(book.sheets[best].name)}: {cells[:300]}."
    looked = _named(book, list(looks)) or "none is visible"
    what = f"no table found: no sheet has a header row with a line-number column (sheets looked at: {looked}).{nearest}"
    return refuse(file, what, "Head that column 'Line No', or name its header in [columns] of the criteria.")


def choose_sheet(book: Book, *, asked: str | None, hints: Mapping[str, str], file: str) -> tuple[int, str]:
    """Return the index of the sheet to read, and the note that says which it is and which are not read.

    Parameters
    ----------
    book : Book
        The workbook.
    asked : str or None
        Name of the sheet that was asked for.
    hints : mapping of str to str
        Field of each header key that the criteria explain.
    file : str
        Name of the workbook, for messages.

    Raises
    ------
    InputError
        If there is no such sheet, no sheet looks like a line list, or several do: a list read in part must never look
        like the whole.
    """
    if asked is not None:
        index = _asked(book, asked, file)
    else:
        likely, looks = _looks_like_it(book, hints, visible=True)
        if not likely:
            raise _none(book, looks, hints, file)
        if len(likely) > 1:
            counted = ", ".join(_rows(book, index) for index in likely[:NAMED_SHEETS])
            raise refuse(file, f"{len(likely)} sheets look like a line list: {counted}.", _SAY_WHICH)
        index = likely[0]
    others = [other for other in range(len(book.sheets)) if other != index]
    left = f" Sheets not read: {_named(book, others)}." if others else ""
    return index, f"Sheet {_named(book, [index])} read.{left}"
