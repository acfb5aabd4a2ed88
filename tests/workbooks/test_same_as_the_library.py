"""The pass over the cells of a sheet gives what openpyxl's own reading of each cell gives: the library is the rule."""

from __future__ import annotations

import datetime as dt
import io
import tempfile
from pathlib import Path
from typing import Any

import openpyxl
from hypothesis import given, settings
from hypothesis import strategies as st

from checker.intake.workbook.cell_texts import date_text, number_text
from checker.intake.workbook.xlsx import XlsxBook

_SIGNS = st.characters(min_codepoint=32, max_codepoint=0xFFFD, exclude_categories=("Cs", "Cn", "Co"))
_TEXTS = st.text(_SIGNS, max_size=12).filter(lambda text: not text.startswith(("=", "#")) and "_x" not in text)
_DAYS = st.datetimes(dt.datetime(1901, 1, 1), dt.datetime(2099, 12, 31)).map(lambda when: when.replace(microsecond=0))
_VALUES = st.one_of(
    st.none(), st.booleans(), st.integers(-(10**15), 10**15), st.floats(-1e300, 1e300),
    _TEXTS, _DAYS,
)  # fmt: skip
_TABLES = st.lists(st.lists(_VALUES, max_size=6), min_size=1, max_size=6)


def as_text(value: Any) -> str:
    """Return what a careful reader writes for a value as openpyxl gives it."""
    if value is None:
        return ""
    if isinstance(value, bool):
        return "TRUE" if value else "FALSE"
    if isinstance(value, dt.datetime):
        return date_text(value)
    return value if isinstance(value, str) else number_text(repr(value))


def even(rows: list[list[str]]) -> list[list[str]]:
    """Return rows without blanks at their ends and without blank rows at the end."""
    for row in rows:
        while row and not row[-1]:
            row.pop()
    while rows and not rows[-1]:
        rows.pop()
    return rows


@settings(max_examples=60, deadline=None)
@given(_TABLES)
def test_cells_are_those_of_the_library(table: list[list[Any]]) -> None:
    book = openpyxl.Workbook()
    sheet = book.active
    assert sheet is not None
    for row in table:
        sheet.append(row)
    with tempfile.TemporaryDirectory() as folder:
        path = Path(folder) / "list.xlsx"
        book.save(path)
        content = path.read_bytes()
    read = openpyxl.load_workbook(io.BytesIO(content), read_only=True, data_only=True).worksheets[0]
    expected = even([[as_text(value) for value in row] for row in read.iter_rows(values_only=True)])
    assert even([list(row) for row in XlsxBook(content, "list.xlsx").whole(0).rows]) == expected
