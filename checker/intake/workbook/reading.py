"""`read_sheet`: the one sheet of a workbook that holds the line list."""

from __future__ import annotations

import hashlib
from collections.abc import Mapping
from pathlib import Path

from checker.intake.sheet import Sheet
from checker.intake.texts import shown
from checker.intake.workbook import limits
from checker.intake.workbook.choice import choose_sheet
from checker.intake.workbook.container import container_of, name_says
from checker.intake.workbook.other_formats import OtherBook
from checker.intake.workbook.package import refuse
from checker.intake.workbook.raw import Book
from checker.intake.workbook.table import sheet_of
from checker.intake.workbook.xlsx import XlsxBook

__all__ = ["read_sheet"]


def _content(path: Path) -> bytes:
    with path.open("rb") as handle:
        content = handle.read(limits.MOST_BYTES + 1)
    if len(content) > limits.MOST_BYTES:
        what = f"the workbook is larger than {limits.MOST_BYTES} bytes."
        raise refuse(path.name, what, "Copy the sheet with the line list into a workbook of its own.")
    return content


def _open(path: Path, content: bytes) -> tuple[Book, str]:
    found = container_of(content)
    if found.kind == "refused":
        raise refuse(path.name, found.what, found.remedy)
    if found.kind in ("xls", "ods"):
        return OtherBook(content, path.name, found.kind), found.kind
    return XlsxBook(content, path.name), found.kind


def read_sheet(path: Path, *, sheet: str | None, hints: Mapping[str, str]) -> Sheet:
    """Return the sheet that was asked for, else the one that looks like a line list.

    Stored values are read; no formula is calculated, no macro run, no link followed.

    Parameters
    ----------
    path : Path
        The workbook.
    sheet : str or None
        Name of the sheet to read.
    hints : mapping of str to str
        Field of each header key that the criteria explain.

    Returns
    -------
    Sheet
        Its rows as texts, as wide as the table, with the cells that must not be read and the lines struck through.

    Raises
    ------
    InputError
        If the workbook cannot be read, exceeds a limit, has no such sheet, or several sheets look like a line list.
    """
    content = _content(path)
    book, kind = _open(path, content)
    index, choice = choose_sheet(book, asked=sheet, hints=hints, file=path.name)
    name = book.sheets[index].name
    return sheet_of(
        book.whole(index),
        name=name,
        sha256=hashlib.sha256(content).hexdigest(),
        file=f"{path.name}, sheet {shown(name)}",
        hints=hints,
        notes=[note for note in (name_says(path, kind), choice, *book.notes) if note],
    )
