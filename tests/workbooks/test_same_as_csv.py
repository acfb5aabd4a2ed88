"""The same list as CSV and as XLSX gives the same lines, numbers, texts and gaps."""

from __future__ import annotations

import csv
from pathlib import Path

import numpy as np
import pytest
import xlsxwriter

from checker.criteria.load import load_criteria
from checker.intake import read_line_list
from checker.model import LineList

EXAMPLE = Path(__file__).parents[2] / "example_linelists"


def as_number(cell: str) -> float | None:
    """Return the number of a cell that a spreadsheet program would store as one."""
    try:
        return float(cell) if cell.isascii() and "_" not in cell and cell[0] not in "nNiI" else None
    except ValueError:
        return None


def as_workbook(source: Path, path: Path) -> Path:
    """Write a CSV file as XLSX, its numbers as numbers, and return its path."""
    with source.open(encoding="utf-8-sig", newline="") as handle:
        rows = list(csv.reader(handle))
    book = xlsxwriter.Workbook(str(path))
    sheet = book.add_worksheet("Line list")
    for number, row in enumerate(rows):
        for column, cell in enumerate(row):
            value = as_number(cell) if cell and number else None
            if value is not None:
                sheet.write_number(number, column, value)
            elif cell:
                sheet.write_string(number, column, cell)
    book.close()
    return path


def read(path: Path) -> LineList:
    criteria = load_criteria(EXAMPLE / "criteria.toml")
    return read_line_list(path, units=criteria.units, columns=criteria.columns)


@pytest.fixture(scope="module")
def both(tmp_path_factory: pytest.TempPathFactory) -> tuple[LineList, LineList]:
    source = EXAMPLE / "marrowquay_rev_a.csv"
    path = as_workbook(source, tmp_path_factory.mktemp("same") / "list.xlsx")
    return read(source), read(path)


def test_lines_and_cases(both: tuple[LineList, LineList]) -> None:
    text, book = both
    assert text.line_number == book.line_number
    for name in ("row", "line", "case_kind", "composite"):
        assert np.array_equal(getattr(text, name), getattr(book, name))
    count = text.line.size
    assert [text.case.text(index) for index in range(count)] == [book.case.text(index) for index in range(count)]


def test_numbers_texts_and_gaps(both: tuple[LineList, LineList]) -> None:
    text, book = both
    assert text.numbers.keys() == book.numbers.keys()
    for name, values in text.numbers.items():
        assert np.array_equal(values, book.numbers[name], equal_nan=True), name
    assert text.texts.keys() == book.texts.keys()
    for name, coded in text.texts.items():
        count = coded.codes.size
        assert [coded.text(i) for i in range(count)] == [book.texts[name].text(i) for i in range(count)], name
    for name, gaps in text.gaps.items():
        assert np.array_equal(gaps, book.gaps[name]), name
    assert text.refusals.keys() == book.refusals.keys()
    for at, sentence in text.refusals.items():
        assert sentence.replace(text.source.name, book.source.name) == book.refusals[at]


def test_what_is_left_open(both: tuple[LineList, LineList]) -> None:
    text, book = both
    for name in ("holds", "unread", "deleted", "ranges"):
        mine, theirs = getattr(text, name), getattr(book, name)
        assert [(item.line_number, item.text) for item in mine] == [(item.line_number, item.text) for item in theirs]
    assert text.unmatched == book.unmatched
