"""Stored values of cells become the texts that a careful reader would write for them."""

from __future__ import annotations

import datetime as dt
import math
from pathlib import Path
from typing import Any

import pytest
from books import given as values_of
from books import line, reason, saved, sheet_of
from hypothesis import given
from hypothesis import strategies as st

from checker.intake import read_line_list
from checker.intake.workbook.cell_texts import date_sentence, date_text, number_text
from checker.intake.workbook.number_formats import Style, style_of


@pytest.mark.parametrize(
    ("stored", "text"),
    [
        ("5", "5"), ("5.0", "5"), ("0", "0"), ("-0", "0"), ("0.10000000000000001", "0.1"), ("1E-3", "0.001"),
        ("1.5500000000000000E+9", "1550000000"), ("-45", "-45"), ("007", "7"), ("1E300", "1e+300"),
        ("123456789012345678", "123456789012345678"), ("1.2345678901234568E+17", "123456789012345680"),
        ("nan", "nan"), ("1e999", "1e999"), ("1_000", "1_000"), ("\u0665", "\u0665"), ("5,0", "5,0"),
    ],
)  # fmt: skip
def test_stored_number(stored: str, text: str) -> None:
    assert number_text(stored) == text


@given(st.floats(allow_nan=False, allow_infinity=False))
def test_a_stored_number_stays_the_same_number(number: float) -> None:
    assert float(number_text(repr(number))) == number
    assert float(number_text(f"{number:.17g}")) == number


@given(st.text(max_size=12))
def test_any_stored_text_gives_a_text(stored: str) -> None:
    text = number_text(stored)
    assert text == stored or math.isfinite(float(text))


@pytest.mark.parametrize(
    ("code", "style"),
    [
        ("General", Style()),
        ("0.00", Style()),
        ("#,##0.00", Style()),
        ("_-* #,##0.00_-;-* #,##0.00_-;_-* 0_-", Style()),
        ("0;[Red](0)", Style()),
        ("General;-General", Style()),
        ("# ?/?", Style()),
        ("0.00E+00", Style()),
        ("#,##0.00 [$kg/h-409]", Style(after="kg/h")),
        ('0" m3/h"', Style(after=" m3/h")),
        ('0"%"', Style(after="%")),
        ('0"0"', Style(kind="added", code='0"0"')),
        ('"-"0', Style(kind="sign", code='"-"0')),
        ("00-000", Style(kind="inlaid", code="00-000")),
        (";;;", Style(kind="words", code=";;;")),
        ("[$-409]0", Style()),
        ("0000", Style(digits=4)),
        ('"P-"0000', Style(digits=4, before="P-")),
        ('0.0" barg"', Style(after=" barg")),
        ("0\\ \\b\\a\\r", Style(after=" bar")),
        ('0.0" - "', Style()),
        ('"<"0', Style(before="<")),
        ('0\\"', Style(after='"')),
        ("0%", Style(kind="per cent")),
        ("0,", Style(kind="scaled")),
        ("0.0,,", Style(kind="scaled")),
        ("d-mmm", Style(kind="date")),
        ("yyyy/mm/dd hh:mm", Style(kind="date")),
        ("[h]:mm", Style(kind="duration")),
        ('0.0" days"', Style(after=" days")),
        ('0" kg;h"', Style(after=" kg;h")),
    ],
)
def test_number_format(code: str, style: Style) -> None:
    assert style_of(code, struck=False) == style


@pytest.mark.parametrize(
    ("value", "code", "text"),
    [
        (5, "General", "5"), (5.0, "0.00", "5"), (4.567, "0", "4.567"), (600, "0000", "0600"), (600.5, "0000", "600.5"),
        (4.5, '0.0" barg"', "4.5 barg"), (6, '0\\"', '6"'), (5, '"<"0', "<5"), (0.25, "0%", "25 %"),
        (0.07, "0%", "7 %"), (True, "General", "TRUE"), (False, "General", "FALSE"), ("0600", "@", "0600"),
        ("=1", "@", "=1"), ("#N/A", "General", "#N/A"), (dt.datetime(2026, 1, 2), "d-mmm", "2-Jan-2026"),
        (dt.datetime(2026, 1, 2, 6, 30), "d-mmm h:mm", "2-Jan-2026 06:30:00"), (dt.time(6, 30), "h:mm", "06:30:00"),
        (dt.timedelta(hours=30), "[h]:mm", "1 day, 6:00:00"), ("a\nb", "General", "a\nb"),
        ("a_x000D_\nb", "General", "a\r\nb"), (-45, "General", "-45"), (1e-6, "General", "1e-06"),
    ],
)  # fmt: skip
def test_cell(tmp_path: Path, value: Any, code: str, text: str) -> None:
    def change(sheet: Any) -> None:
        cell = sheet.cell(2, 7, value)
        cell.number_format = code
        if isinstance(value, str) and not value.startswith("#"):
            cell.data_type = "s"

    assert sheet_of(saved(tmp_path, line("P-1001"), change=change)).rows[1][6] == text


@pytest.mark.parametrize(
    ("when", "originals"),
    [
        (dt.datetime(2026, 1, 2), ("'1-1/2'", "'1-2'", "'1/2'")),
        (dt.datetime(2026, 2, 1), ("'1-1/2'", "'1-2'")),
        (dt.datetime(2026, 7, 5), ("'5-7'",)),
        (dt.datetime(2026, 5, 7), ("'5-7'",)),
        (dt.datetime(2002, 1, 2), ("'2-1/2'",)),
        (dt.datetime(2002, 2, 1), ("'2-1/2'",)),
        (dt.datetime(2004, 1, 3), ("'3-1/4'", "'1-3/4'")),
        (dt.time(1, 30), ("time",)),
        (None, ("is none",)),
    ],
)
def test_a_date_names_what_was_probably_typed(when: dt.datetime | None, originals: tuple[str, ...]) -> None:
    sentence = date_sentence(when, "-" if when is None else date_text(when))
    for original in originals:
        assert original in sentence


def test_dates_are_refused_as_numbers_and_sizes_and_read_as_texts(tmp_path: Path) -> None:
    second, day = dt.datetime(2026, 1, 2), dt.datetime(2026, 7, 5)
    path = saved(tmp_path, line("P-1001", size=second, flow_mass=day, remarks=second), line("P-1002"))
    read = read_line_list(path)
    assert values_of(read, "size") == [None, 6.0]
    assert "'1-1/2'" in reason(read, 2, "Size (NPS)")
    assert "'5-7'" in reason(read, 2, "Flow [kg/h]")
    assert read.texts["remarks"].text(0) == "2-Jan-2026"


def test_a_line_number_that_is_a_date_is_asked_for(tmp_path: Path) -> None:
    read = read_line_list(saved(tmp_path, line("P-1001"), [dt.datetime(2026, 2, 10), *line("")[1:]]))
    assert read.line_number == ("P-1001", "10-Feb-2026")
    assert "'2-10'" in reason(read, 3, "Line No")


def test_dates_counted_from_1904(tmp_path: Path) -> None:
    def change(sheet: Any) -> None:
        sheet.parent.epoch = dt.datetime(1904, 1, 1)
        sheet.cell(2, 7, dt.datetime(2026, 1, 2)).number_format = "d-mmm"

    assert sheet_of(saved(tmp_path, line("P-1001"), change=change)).rows[1][6] == "2-Jan-2026"


def test_formulas_give_their_stored_value_or_a_refusal(tmp_path: Path) -> None:
    read = read_line_list(saved(tmp_path, line("P-1001", flow_mass="=25000*2"), line("P-1002")))
    assert values_of(read, "flow_mass") == [None, values_of(read, "flow_mass")[1]]
    assert "'=25000*2' is a formula without a stored value" in reason(read, 2, "Flow [kg/h]")
    assert any("Cells with a formula: 1" in note for note in read.notes)


def test_a_line_number_that_is_not_calculated_takes_its_row_out(tmp_path: Path) -> None:
    read = read_line_list(saved(tmp_path, line("P-1001"), ["=A2", *line("")[1:]]))
    assert values_of(read, "flow_mass")[1] is None
    assert values_of(read, "pressure")[1] is None
    assert "the line number of the row is not known" in reason(read, 3, "Line No")


def test_a_unit_in_the_number_format_is_read(tmp_path: Path) -> None:
    def change(sheet: Any) -> None:
        sheet["D1"] = "Oper Press"
        sheet["D2"].number_format = '0.0" barg"'

    read = read_line_list(saved(tmp_path, line("P-1001"), line("P-1002"), change=change))
    pressures = values_of(read, "pressure")
    assert pressures[0] == pytest.approx(101_325.0 + 450_000.0)
    assert pressures[1] is None


@pytest.mark.parametrize(
    ("value", "code", "words"),
    [
        (1000, '0"0"', "shows further digits"),
        (40, '0"/60"', "shows further digits"),
        (40, '0"\u00bd"', "shows further digits"),
        (40, '0"e3"', "shows further digits"),
        (40, '"1"0', "shows further digits"),
        (5, '0"."0', "shows signs among its digits"),
        (0, '0;0;"-"', "shows '-' in its place"),
        (0, '_-* #,##0_-;-* #,##0_-;_-* "-"??_-', "shows '-' in its place"),
        (0, "#,###", "does not show it"),
        (40, ";;;", "does not show it"),
        (-40, '0;"AMB"', "shows 'AMB' in its place"),
        (40, '[>4]"HOLD";0', "shows 'HOLD' in its place"),
        (-40, "0;0", "with another sign"),
        (40, '"-"0', "with another sign"),
        (1e17, "0.0", "keeps 15 figures"),
    ],
)
def test_a_format_that_shows_something_else(tmp_path: Path, value: float, code: str, words: str) -> None:
    def change(sheet: Any) -> None:
        sheet["E2"] = value
        sheet["E2"].number_format = code

    read = read_line_list(saved(tmp_path, line("P-1001"), line("P-1002"), change=change))
    assert [given is None for given in values_of(read, "temperature")] == [True, False]
    assert words in reason(read, 2, "Oper Temp [degC]")


@pytest.mark.parametrize(
    ("value", "code", "kelvin"),
    [
        (0, "0;-0;0", 273.15), (-40, "0;[Red]-0", 233.15), (-40, "0_);(0)", 233.15), (40, '[>99]"HOLD";0', 313.15),
        (0, "0.0", 273.15), (40, '0;-0;"-"', 313.15), (40, '0" (Note 2)"', 313.15), (40, "0 [$degC-409]", 313.15),
    ],
)  # fmt: skip
def test_a_format_that_shows_the_number(tmp_path: Path, value: float, code: str, kelvin: float) -> None:
    def change(sheet: Any) -> None:
        sheet["E2"] = value
        sheet["E2"].number_format = code

    read = read_line_list(saved(tmp_path, line("P-1001"), change=change))
    assert values_of(read, "temperature") == [pytest.approx(kelvin)]


def test_a_line_number_by_its_format(tmp_path: Path) -> None:
    def change(sheet: Any) -> None:
        sheet["A2"].number_format = '"P2-"0000"-1A"'

    read = read_line_list(saved(tmp_path, line(7), line("P-1002"), change=change))  # type: ignore[arg-type]
    assert read.line_number[0] == "P2-0007-1A"
    assert not reason(read, 2, "Line No")


def test_a_line_number_that_has_lost_figures(tmp_path: Path) -> None:
    read = read_line_list(saved(tmp_path, line("P-1001"), line(123456789012345678)))  # type: ignore[arg-type]
    assert read.line_number[1].isdigit()
    assert values_of(read, "pressure")[1] is None
    assert "keeps 15 figures" in reason(read, 3, "Line No")
