"""The same list as comma text, as semicolon text with decimal commas and as a workbook gives the same outcomes."""

from __future__ import annotations

import csv
import re
from collections.abc import Callable
from datetime import date
from pathlib import Path

import numpy as np
import pytest
from example_rows import EXAMPLE, LIST

import checker
from checker.review_record import Review

TODAY = date(2026, 1, 1)
NUMBER = re.compile(r"-?\d+(\.\d+)?([eE][-+]?\d+)?")
UNITLESS = ("Z", "Cp/Cv", "Vap. Fraction (mass)")
POINT = re.compile(r"(?<=\d)\.(?=\d)")


def _rows() -> list[list[str]]:
    with LIST.open(encoding="utf-8-sig", newline="") as handle:
        return list(csv.reader(handle))


def _number_columns(header: list[str]) -> set[int]:
    return {index for index, title in enumerate(header) if "[" in title or title in UNITLESS}


def _decimal_commas(path: Path) -> None:
    """Write the example with semicolons and decimal commas, those of ranges among them."""
    header, *rows = _rows()
    numbers = _number_columns(header)
    commas = [[POINT.sub(",", cell) if index in numbers else cell for index, cell in enumerate(row)] for row in rows]
    with path.open("w", encoding="utf-8", newline="") as handle:
        csv.writer(handle, delimiter=";").writerows([header, *commas])


def _workbook(path: Path) -> None:
    """Write the example as a workbook with native numbers beneath a title block, a cover sheet before it."""
    from openpyxl import Workbook

    book = Workbook()
    book.active.title = "Cover"
    book.active.append(["Marrowquay terminal", "line list"])
    sheet = book.create_sheet("Line list")
    header, *rows = _rows()
    numbers = _number_columns(header)
    sheet.append(["Marrowquay terminal"])
    sheet.append(header)
    for row in rows:
        sheet.append(
            [
                float(cell) if index in numbers and NUMBER.fullmatch(cell) else cell or None
                for index, cell in enumerate(row)
            ]
        )
    book.save(path)


def _reviewed(path: Path) -> Review:
    return checker.review(path, criteria=EXAMPLE / "criteria.toml", classes=EXAMPLE / "classes.csv", today=TODAY)


@pytest.fixture(scope="module")
def as_comma_text() -> Review:
    return _reviewed(LIST)


@pytest.mark.parametrize(("name", "write"), [("list.csv", _decimal_commas), ("list.xlsx", _workbook)])
def test_outcomes_are_those_of_the_comma_text(
    tmp_path: Path, as_comma_text: Review, name: str, write: Callable[[Path], None]
) -> None:
    write(tmp_path / name)
    other = _reviewed(tmp_path / name)
    assert other.tally == as_comma_text.tally
    assert np.array_equal(other.judgement.outcome, as_comma_text.judgement.outcome)
    assert np.array_equal(other.judgement.utilisation, as_comma_text.judgement.utilisation, equal_nan=True)
    mine, theirs = other.values.line_list, as_comma_text.values.line_list
    assert mine.line_number == theirs.line_number
    assert set(mine.numbers) == set(theirs.numbers)
    for field, values in theirs.numbers.items():
        assert np.array_equal(mine.numbers[field], values, equal_nan=True), field
        assert np.array_equal(mine.gaps[field], theirs.gaps[field]), field
