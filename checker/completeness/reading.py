"""`read_drawing_lines`: a file of the lines on the drawings, one line number a row, with its drawing."""

from __future__ import annotations

import os
from pathlib import Path

from checker.completeness.record import DrawingLines
from checker.errors import InputError, Problem
from checker.intake.headers import read_header
from checker.intake.layout import Layout, find_layout, line_number_columns
from checker.intake.lines import Lines, find_lines
from checker.intake.opening import Opened, open_table
from checker.intake.texts import place, shown
from checker.model import Address, Source, UnreadItem

__all__ = ["read_drawing_lines"]

_HEADER = "Line No"
_REMEDY = (
    "Give one line number a row under the header 'Line No' with its drawing under 'Drawing', or line numbers alone "
    "in one column."
)


def _filled(row: tuple[str, ...]) -> list[int]:
    return [index for index, cell in enumerate(row) if cell.strip()]


def _has_digit(text: str) -> bool:
    return any(map(str.isdigit, text))


def _alone(opened: Opened) -> Layout | None:
    """Return the layout of a file of one column without a header that is understood; None for any other file."""
    filled = [(index, row[places[0]], places) for index, row in enumerate(opened.form.head) if (places := _filled(row))]
    columns = {column for _, _, places in filled for column in places}
    if columns != {0}:
        return None
    numbers = sum(_has_digit(text) for _, text, _ in filled)
    first_index, first_text, _ = filled[0]
    headed = not _has_digit(first_text)
    if numbers < max(1, len(filled) - 1) * 0.5:
        return None
    if headed:
        note = f"The one column, headed {shown(first_text)}, is taken for line numbers; no drawings are named."
        return Layout((first_text.strip(),), ("",), first_index + 1, first_index + 2, (note,))
    note = "The one column has no header and is taken for line numbers; no drawings are named."
    return Layout((_HEADER,), ("",), 0, 1, (note,))


def _layout(opened: Opened) -> Layout:
    try:
        return find_layout(opened.form.head, file=opened.label, hints={})
    except InputError as error:
        found = _alone(opened)
        if found is None:
            problems = [Problem(problem.what, problem.where, _REMEDY) for problem in error.problems]
            raise InputError(problems) from error
        return found


def _drawing_column(layout: Layout, line_column: int, file: str) -> int | None:
    mine = []
    for index, header in enumerate(layout.headers):
        reading = None if index == line_column else read_header(header)
        if reading is not None and "drawing" in {field.name for field in reading.fields}:
            mine.append(index)
    if len(mine) > 1:
        names = " and ".join(shown(layout.headers[index]) for index in mine)
        what = f"two columns name the drawing: {names}."
        raise InputError(Problem(what, place(file, layout.header_row), "Keep the one in which the line is shown."))
    return mine[0] if mine else None


def _refuse_broken(lines: Lines, file: str) -> None:
    """Refuse a file some of whose rows cannot be told: a line left out here would be missed unseen."""
    if lines.broken:
        raise InputError(
            [
                Problem(reason, place(file, int(lines.row[index])), "Correct the row: every line counts here.")
                for index, reason in list(lines.broken.items())[:5]
            ]
        )


def _refused_cells(opened: Opened, lines: Lines, layout: Layout, column: int) -> dict[int, UnreadItem]:
    """Return the lines whose number must not be read: an uncalculated formula, a text half struck out."""
    marked = opened.refused.get(column, {})
    row_of = {int(row) - 1: index for index, row in enumerate(lines.row)} if marked else {}
    items = {}
    for row, reason in marked.items():
        if row in row_of:
            index = row_of[row]
            address = Address(opened.label, row + 1, layout.headers[column])
            items[index] = UnreadItem(lines.numbers[index], lines.numbers[index], reason, address)
    return items


def read_drawing_lines(path: str | os.PathLike[str], *, sheet: str | None = None) -> DrawingLines:
    """Read the lines on the drawings from a delimited text or a workbook.

    Parameters
    ----------
    path : path
        The file: a line-number column and, where it has one, a drawing column; headers as in a line list. Line
        numbers alone in one column need no header. A line may stand on several drawings, one a row.
    sheet : str, optional
        Sheet of a workbook.

    Raises
    ------
    InputError
        If the file cannot be read, holds no line numbers, or a row in it cannot be told.
    """
    opened = open_table(Path(path), sheet=sheet, hints={})
    layout = _layout(opened)
    line_column = (line_number_columns(layout.headers, {}) or [0])[0]
    drawing_column = _drawing_column(layout, line_column, opened.label)
    lines = find_lines(
        opened.blocks(),
        opened.form,
        layout,
        file=opened.label,
        line_column=line_column,
        number_columns=frozenset(),
        struck=opened.struck,
    )
    _refuse_broken(lines, opened.label)
    refused = _refused_cells(opened, lines, layout, line_column)
    keep = [index for index in range(len(lines.numbers)) if index not in refused]
    if not keep:
        raise InputError(Problem("not one line number could be read.", place(opened.label), _REMEDY))
    drawings = None if drawing_column is None else lines.columns[drawing_column]
    unread = (*lines.unread, *lines.deleted, *refused.values())
    no_drawings = () if drawings is not None or len(layout.headers) == 1 else ("No column names the drawings.",)
    return DrawingLines(
        source=Source(opened.label, opened.sha256, " ".join(opened.notes)),
        numbers=tuple(lines.numbers[index] for index in keep),
        drawings=tuple("" if drawings is None else " ".join(drawings[index].split()) for index in keep),
        row=lines.row[keep],
        notes=(*opened.notes, *layout.notes, *lines.notes, *no_drawings),
        unread=tuple(sorted(unread, key=lambda item: item.address.row)),
    )
