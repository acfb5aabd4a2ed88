"""What a comma and a point mean: decided by the cells that leave no choice, asked where none do."""

from __future__ import annotations

from pathlib import Path

import pytest
from lists import read
from number_columns import assert_refused, assert_values, reading

from checker.intake.decimal_marks import (
    DECIMAL,
    THOUSANDS,
    Evidence,
    Marks,
    decide,
    evidence_of,
    marks_without_evidence,
    together,
)
from checker.model import Gap

NOTHING = evidence_of([])
COLUMNS = [
    (["10,5", "11,5"], ",", DECIMAL, ""), (["0,83"], ",", DECIMAL, ""), (["12,3456"], ",", DECIMAL, ""),
    ([",5"], ",", DECIMAL, ""), (["1 234,5"], ",", DECIMAL, ""), (["1.234,5"], ",", DECIMAL, THOUSANDS),
    (["10,5 barg", "12,5-14,5 barg"], ",", DECIMAL, ""), (["1,234,567"], ",", THOUSANDS, DECIMAL),
    (["12,345.6"], ",", THOUSANDS, DECIMAL), (["1,87,000"], ",", THOUSANDS, DECIMAL), (["1,234"], ",", "", ""),
    (["10,5"], ",", "", ""), (["10,5"], ";", DECIMAL, ""), (["1,234", "5,678"], ";", "", ""),
    (["1.234.567"], ";", DECIMAL, THOUSANDS), (["12,5", "12.5"], ";", "", ""), (["10,5", "1,234,567"], ";", "", ""),
    (["1.234,5", "12.5"], ";", "", ""), (["12.5", "1,234"], ";", "", DECIMAL), (["HOLD", "5-7", "-"], ";", "", ""),
    (["1,5 2,5"], ",", "", ""), (["5, 7"], ",", "", ""), (["120.000", "95.500"], ";", "", ""),
    (["120.000", "95.500"], ",", "", ""), (["120.000", "1250.000"], ";", "", DECIMAL), (["120.000", "0.85"], ",", THOUSANDS, DECIMAL),
    (["120.000"], "", "", DECIMAL),
]  # fmt: skip


@pytest.mark.parametrize(("texts", "delimiter", "comma", "point"), COLUMNS)
def test_a_column_decides_for_itself(texts: list[str], delimiter: str, comma: str, point: str) -> None:
    mine = evidence_of(texts)
    assert decide(mine, mine, comma=delimiter == ";", delimiter=delimiter)[:2] == (comma, point)
    assert decide(mine, NOTHING, comma=delimiter == ";", delimiter=delimiter)[:2] == (comma, point)


def test_the_list_decides_where_the_column_does_not() -> None:
    decimal, thousands = evidence_of(["10,5", "0,83"]), evidence_of(["1,234,567"])
    assert decide(NOTHING, decimal, comma=True, delimiter=";").comma == DECIMAL
    assert decide(NOTHING, thousands, comma=False, delimiter=",").comma == THOUSANDS
    assert decide(thousands, decimal, comma=True, delimiter=";")[:2] == (THOUSANDS, DECIMAL)
    assert decide(NOTHING, together([decimal, thousands]), comma=True, delimiter=";")[:2] == ("", "")
    assert decide(evidence_of(["12.5"]), decimal, comma=False, delimiter=",")[:2] == ("", DECIMAL)
    assert decide(evidence_of(["10,5"]), evidence_of(["10,5", "3,2"]), comma=False, delimiter=",").comma == DECIMAL


def test_the_decision_is_told_with_a_cell_that_shows_it() -> None:
    assert decide(evidence_of(["0,83"]), NOTHING, comma=False, delimiter=",").note == (
        "a comma is the decimal mark, as '0,83' shows."
    )
    assert "as '1,234,567' shows" in decide(NOTHING, evidence_of(["1,234,567"]), comma=False, delimiter=",").note
    assert "two ways" in decide(evidence_of(["0,83", "1,234,567"]), NOTHING, comma=False, delimiter=",").note
    assert decide(NOTHING, NOTHING, comma=False, delimiter=",").note == ""
    assert decide(evidence_of(["120.000"]), evidence_of(["4.5"]), comma=False, delimiter="\t").point == DECIMAL
    assert decide(evidence_of(["0,83"]), NOTHING, comma=True, delimiter=";").note == ""


def test_evidence_is_bounded_and_keeps_two_examples() -> None:
    found = evidence_of([f"{number},5" for number in range(20_000)])
    assert found.cells == {("comma", DECIMAL): ("0,5", "1,5")}
    assert together([found, found]) == found
    assert together([]) == Evidence({}, frozenset())
    assert evidence_of(["," * 30_000, "9" * 30_000 + ",5"]).certain <= {("comma", DECIMAL)}


CELLS = [
    ("1,234", Marks(DECIMAL, ""), 1.234), ("1,234", Marks(THOUSANDS), 1234.0), ("12.345", Marks(DECIMAL, THOUSANDS), 12345.0),
    ("12.345", Marks("", DECIMAL), 12.345), ("10,5", Marks(DECIMAL, ""), 10.5), ("1.234,5", Marks(DECIMAL, ""), 1234.5),
    ("12,345-13,456", Marks(THOUSANDS), None), ("1.234.567", Marks(DECIMAL, ""), 1234567.0), ("1.5", Marks(DECIMAL, ""), 1.5),
    ("0,500", Marks(DECIMAL, ""), 0.5), ("1 234,567", Marks(DECIMAL, ""), 1234.567), ("1,5E+3", Marks(DECIMAL, ""), 1500.0),
    ("2,98x10-6", Marks(DECIMAL, ""), 2.98e-6), ("0.123", Marks(DECIMAL, ""), 0.123), ("1234.567", Marks(DECIMAL, ""), 1234.567),
]  # fmt: skip


@pytest.mark.parametrize(("cell", "marks", "number"), CELLS)
def test_marks_read_a_cell(cell: str, marks: Marks, number: float | None) -> None:
    found = reading("elevation", cell, marks=marks)
    if number is None:
        assert_values(found, 12345.0, 13456.0)
    else:
        assert_values(found, number)


ASKED = [
    ("1,234", Marks(), ",", "reads as 1.234 or as 1234"), ("1,234", Marks("", ""), ";", "reads as 1.234 or as 1234"),
    ("100.000", Marks(DECIMAL, ""), ";", "reads as 100.000 or as 100000"), ("10,5", Marks(), ",", "write 10.5 if that"),
    ("10,5", Marks(THOUSANDS), ";", "decimal comma where commas part thousands"), ("1,2,3", Marks(DECIMAL), ";", "not one"),
    ("1.2.3", Marks(DECIMAL, ""), ";", "not one number"), ("10,5-11,5", Marks(), ",", "decimal comma"),
    ("-1,234", Marks(), ",", "reads as"),
]  # fmt: skip


@pytest.mark.parametrize(("cell", "marks", "delimiter", "words"), ASKED)
def test_doubtful_mark_is_asked_about(cell: str, marks: Marks, delimiter: str, words: str) -> None:
    assert_refused(reading("elevation", cell, marks=marks, delimiter=delimiter), cell, words)


def test_without_evidence_only_clear_cells_are_read() -> None:
    assert marks_without_evidence(comma=True) == Marks("", "")
    assert marks_without_evidence(comma=False) == Marks("", DECIMAL)
    assert_values(reading("elevation", "10,5", delimiter=";", comma=True), 10.5)
    assert_values(reading("elevation", "1.5", delimiter=";", comma=True), 1.5)
    for cell in ("1,234", "1.234"):
        assert_refused(reading("elevation", cell, delimiter=";", comma=True), cell, "reads as")


MIXED_LISTS = [
    (
        'Line No,Flow [kg/h],P [barg],Density [kg/m3],Viscosity [cP]\nP-1,"12,500",5.5,998,0.997\n'
        'P-2,"1,200",5.5,"0,995",0.5\n',
        "flow_mass",
        2,
    ),
    ('Line No,Flow [kg/h],P [barg],Visc [cP]\nP-1,"12,500",5.5,"1,2345"\nP-2,"1,200",5.5,0.5\n', "flow_mass", 2),
    (
        "Line No;Flow [kg/h];P [barg];Density [kg/m3];Visc [cP]\nP-1;12,500;10,5;995;1.5\nP-2;121,200;7.25;995;1\n",
        "flow_mass",
        2,
    ),
    ('Line No,Flow [kg/h],P [barg]\nP-1,1.234,5\nP-2,2.345,5\nP-3,"10,5",5\n', "flow_mass", 3),
    ('Line No,Flow [kg/h],P [barg]\nP-1,12.345,5.5\nP-2,"10,55",5.5\n', "flow_mass", 2),
]


@pytest.mark.parametrize(("text", "field", "refused"), MIXED_LISTS)
def test_a_list_that_shows_both_marks_as_decimals_is_asked(tmp_path: Path, text: str, field: str, refused: int) -> None:
    found = read(tmp_path, text)
    assert [int(gap) for gap in found.gap(field)] == [Gap.REFUSED] * refused
    assert "reads as" in next(sentence for (name, _), sentence in found.refusals.items() if name == field)


def test_unanimous_columns_keep_their_mark_beside_others() -> None:
    both = together([evidence_of(["0,995"]), evidence_of(["5.5"])])
    assert decide(evidence_of(["0,995"]), both, comma=False, delimiter=",")[:2] == (DECIMAL, "")
    assert decide(evidence_of(["5.5"]), both, comma=False, delimiter=",")[:2] == ("", DECIMAL)
    assert decide(evidence_of(["1,234,567"]), both, comma=False, delimiter=",")[:2] == (THOUSANDS, DECIMAL)
    assert decide(NOTHING, both, comma=False, delimiter=",")[:2] == ("", "")
    assert decide(NOTHING, both, comma=False, delimiter="")[:2] == ("", DECIMAL)
