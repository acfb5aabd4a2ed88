"""From a file to rows: a delimited text or a sheet of a workbook, both as blocks of rows of texts."""

from __future__ import annotations

from collections.abc import Callable, Iterator, Mapping
from dataclasses import dataclass, field
from pathlib import Path

from checker.errors import InputError, Problem
from checker.intake.decoding import read_text
from checker.intake.layout import ROWS_SEARCHED
from checker.intake.records import ROWS_BENEATH, Block, Form, read_blocks, read_form
from checker.intake.texts import place, shown
from checker.intake.workbook import is_workbook, name_says, read_sheet

__all__ = ["Opened", "open_table"]

HEAD_ROWS = ROWS_SEARCHED + ROWS_BENEATH
MOST_HEAD_COLUMNS = 2_000


@dataclass(frozen=True)
class Opened:
    """A file opened: its rows, and what was understood of its form.

    Attributes
    ----------
    label : str
        File, and sheet where it is a workbook, as every message and address names them.
    sha256 : str
        SHA-256 of the file's bytes.
    form : Form
        Delimiter, decimal commas and the first rows; a workbook has no delimiter.
    blocks : callable
        Yields the rows in blocks.
    notes : tuple of str
        Encoding, delimiter, sheet: what was understood.
    refused, no_numbers : mapping of int to mapping of int to str
        Sentence for each cell that must not be read at all, or not as a number or a size: by column, then by row, both
        counted from 0.
    struck, hidden : frozenset of int
        Rows (counted from 0) struck through, and hidden rows.
    """

    label: str
    sha256: str
    form: Form
    blocks: Callable[[], Iterator[Block]]
    notes: tuple[str, ...]
    refused: Mapping[int, Mapping[int, str]] = field(default_factory=dict)
    no_numbers: Mapping[int, Mapping[int, str]] = field(default_factory=dict)
    struck: frozenset[int] = frozenset()
    hidden: frozenset[int] = frozenset()


def open_table(path: Path, *, sheet: str | None, hints: Mapping[str, str]) -> Opened:
    """Open a file by what it is, whatever its name says.

    Parameters
    ----------
    path : Path
        The file.
    sheet : str or None
        Sheet of a workbook to read; None takes the one that looks like a line list.
    hints : mapping of str to str
        Field of each header key that the criteria explain.

    Raises
    ------
    InputError
        If the file cannot be read, or a sheet is asked of a file that has none.
    """
    if is_workbook(path):
        return _open_workbook(path, sheet, hints)
    if sheet is not None:
        what = f"the sheet {shown(sheet)} is asked for, but this file is a text and has no sheets."
        raise InputError(Problem(what, where=place(path.name), remedy="Leave --sheet out, or give the workbook."))
    decoded = read_text(path)
    form = read_form(decoded.pieces, hints=hints, file=path.name)
    return Opened(
        label=path.name,
        sha256=decoded.sha256,
        form=form,
        blocks=lambda: read_blocks(_let_go(decoded.pieces), delimiter=form.delimiter, file=path.name),
        notes=tuple(note for note in (name_says(path), *decoded.notes, *form.notes) if note),
    )


def _let_go(pieces: list[str]) -> Iterator[str]:
    """Yield pieces in turn and keep none: the rows made of them need the room."""
    pieces.reverse()
    while pieces:
        yield pieces.pop()


def _open_workbook(path: Path, sheet: str | None, hints: Mapping[str, str]) -> Opened:
    found = read_sheet(path, sheet=sheet, hints=hints)
    head = tuple(tuple(row[:MOST_HEAD_COLUMNS]) for row in found.rows[:HEAD_ROWS])
    return Opened(
        label=f"{path.name}, sheet {shown(found.name)}",
        sha256=found.sha256,
        form=Form("", False, head, found.notes),
        blocks=found.blocks,
        notes=found.notes,
        refused=_by_column(found.refused),
        no_numbers=_by_column(found.no_numbers),
        struck=found.struck,
        hidden=found.hidden,
    )


def _by_column(marked: Mapping[tuple[int, int], str]) -> dict[int, dict[int, str]]:
    columns: dict[int, dict[int, str]] = {}
    for (row, column), sentence in marked.items():
        columns.setdefault(column, {})[row] = sentence
    return columns
