"""Workbooks for the tests, written by openpyxl, and how a test reads them."""

from __future__ import annotations

from collections.abc import Callable, Sequence
from pathlib import Path
from typing import Any

import pytest
import xlsxwriter
from openpyxl import Workbook

from checker.errors import InputError
from checker.intake import read_line_list
from checker.intake.sheet import Sheet
from checker.intake.workbook import read_sheet
from checker.model import Gap, LineList

HEADERS = (
    "Line No", "Size (NPS)", "Flow [kg/h]", "Oper Press [barg]", "Oper Temp [degC]", "Density [kg/m3]", "Remarks",
)  # fmt: skip
ROW = ("P-1001", 6, 50000, 4.5, 60, 983, "normal")
FIELDS = ("size", "flow_mass", "pressure", "temperature", "density")


def line(number: str, **changed: Any) -> list[Any]:
    """Return a row of the list with another line number and some other cells, by field."""
    row = [number, *ROW[1:]]
    for name, value in changed.items():
        row[(*FIELDS, "remarks").index(name) + 1] = value
    return row


def saved(
    folder: Path, *rows: Sequence[Any], change: Callable[[Any], None] | None = None, name: str = "list.xlsx"
) -> Path:
    """Write a workbook of one sheet, headers first, and return its path."""
    book = Workbook()
    sheet = book.active
    assert sheet is not None
    sheet.title = "Line List"
    for row in (HEADERS, *rows):
        sheet.append(list(row))
    if change is not None:
        change(sheet)
    path = folder / name
    book.save(path)
    return path


def shared(folder: Path, *rows: Sequence[Any], name: str = "list.xlsx") -> Path:
    """Write a workbook whose texts are shared, as most programs do; a list in a cell is a text in pieces.

    A piece is a text and whether it is struck through.
    """
    path = folder / name
    with xlsxwriter.Workbook(str(path)) as book:
        sheet = book.add_worksheet("Line List")
        fonts = {True: book.add_format({"font_strikeout": True}), False: book.add_format({"bold": True})}
        for number, row in enumerate((HEADERS, *rows)):
            for column, value in enumerate(row):
                if isinstance(value, list):
                    pieces = [part for text, struck in value for part in (fonts[struck], text)]
                    sheet.write_rich_string(number, column, *pieces)
                elif value is not None:
                    sheet.write(number, column, value)
    return path


def sheet_of(path: Path, sheet: str | None = None) -> Sheet:
    """Return the sheet of a workbook as the intake takes it over."""
    return read_sheet(path, sheet=sheet, hints={})


def refusal(path: Path, sheet: str | None = None) -> str:
    """Return the message with which a workbook is refused."""
    with pytest.raises(InputError) as caught:
        read_line_list(path, sheet=sheet)
    assert caught.value.status == 2
    assert str(caught.value).startswith(path.name)
    return str(caught.value)


def reason(read: LineList, row: int, header: str) -> str:
    """Return why a cell was refused; empty where it was not."""
    found = [item.reason for item in read.unread if item.address.row == row and item.address.column == header]
    return found[0] if found else ""


def given(read: LineList, field: str) -> list[float | None]:
    """Return the numbers of a field, None where a line has none."""
    values, gaps = read.numbers[field], read.gaps[field]
    return [float(v) if gap == Gap.GIVEN else None for v, gap in zip(values, gaps, strict=True)]
