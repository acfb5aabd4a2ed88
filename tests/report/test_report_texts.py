"""Texts made harmless, numbers as shown, the terminal's summary and the calculation sheet."""

from __future__ import annotations

import math
import re
from pathlib import Path

import pytest
from fake_review import HOSTILE, make_review

from checker.errors import InputError
from checker.report.calculation_sheet import calculation_sheet
from checker.report.numbers import count, in_shown_unit, percentage, significant, utilisation
from checker.report.safe_text import harmless_cell, visible, visible_line
from checker.report.terminal import summary
from checker.report.text_lines import WIDTH
from checker.report.write import WrittenFiles

HIDDEN = re.compile(r"[\x00-\x09\x0b-\x1f\x7f-\x9f\u202a-\u202e\u2066-\u2069\ud800-\udfff]")


@pytest.mark.parametrize(
    ("text", "shown"),
    [
        ("=1+1", "'=1+1"),
        ("+cmd", "'+cmd"),
        ("-cmd", "'-cmd"),
        ("@SUM(A1)", "'@SUM(A1)"),
        ("\t=1", "'\t=1"),
        ("\r=1", "'\r=1"),
        (" =1", "' =1"),
        ("\uff1d1", "'\uff1d1"),
        ("-12.5", "-12.5"),
        ("+3e5", "+3e5"),
        ("-12,5", "-12,5"),
        ("-1-2", "'-1-2"),
        ("6-CWS-1001", "6-CWS-1001"),
        ("", ""),
        ("a\x1b[0m", "a\\x1b[0m"),
    ],
)
def test_no_text_begins_like_a_formula(text: str, shown: str) -> None:
    assert harmless_cell(text) == shown


@pytest.mark.parametrize(
    ("text", "shown"),
    [
        ("a\x00b", "a\\x00b"),
        ("\u202etxt", "\\u202etxt"),
        ("a\u200bb", "a\\u200bb"),
        ("\ufeffa", "\\ufeffa"),
        ("\udc80", "\\udc80"),
        ("\U000e0041", "\\U000e0041"),
        ("Rohrleitung Ø 20 °C µm", "Rohrleitung Ø 20 °C µm"),
        ("配管\n二行", "配管\n二行"),
    ],
)
def test_what_hides_or_steers_is_written_out(text: str, shown: str) -> None:
    assert visible(text) == shown


def test_one_line_stays_one_line() -> None:
    assert visible_line("a\nb\tc") == "a\\x0ab\\x09c"


@pytest.mark.parametrize(
    ("value", "shown"),
    [
        (math.nan, "\u2013"),
        (math.inf, "infinite"),
        (0.0, "0"),
        (3.0, "3.000"),
        (-0.012346, "-0.01235"),
        (9.99996, "10.00"),
        (9_999.6, "10\u202f000"),
        (123_456.0, "123\u202f500"),
        (1_234_567.0, "1.235 \u00d7 10\u2076"),
        (0.00012346, "1.235 \u00d7 10\u207b\u2074"),
    ],
)
def test_four_significant_figures(value: float, shown: str) -> None:
    assert significant(value) == shown


@pytest.mark.parametrize(
    ("value", "shown"),
    [
        (1.4142, "1.41"),
        (1.0, "1.00"),
        (1.0 + 1e-12, "1.00"),
        (1.0004, "1.0004"),
        (0.9996, "0.9996"),
        (1.00000002, "1.000000020"),
        (math.inf, "infinite"),
        (math.nan, "\u2013"),
    ],
)
def test_utilisation_never_stands_on_a_limit_it_is_not_on(value: float, shown: str) -> None:
    assert utilisation(value) == shown


@pytest.mark.parametrize(
    ("part", "whole", "shown"),
    [(1, 8, "12.5 %"), (9999, 10_000, "over 99.9 %"), (1, 10_000, "under 0.1 %"), (5, 5, "100.0 %"), (0, 0, "\u2013")],
)
def test_percentage_is_never_all_or_nothing_where_it_is_only_near(part: int, whole: int, shown: str) -> None:
    assert percentage(part, whole) == shown


def test_shown_units() -> None:
    assert in_shown_unit("pressure_gradient", "Pa/m", 450.0) == "0.4500 bar/100 m"
    assert in_shown_unit("dp_total", "Pa", 1e5) == "1.000 bar"
    assert in_shown_unit("wall_shear_stress", "Pa", 12.0) == "12.00 Pa"
    assert in_shown_unit("mach", "", 0.25) == "0.2500"
    assert count(9_999) == "9999"


def test_summary_begins_with_the_coverage() -> None:
    review = make_review()
    files = WrittenFiles(Path("review"), (Path("review/exceptions.html"),), "exceptions.pdf was not written: because.")
    lines = summary(review, files).splitlines()
    assert lines[0] == "checked 93.1 %, not checked 6.9 %"
    assert lines.index("How the list was read") < lines.index("Recommendation: revise and resubmit")
    assert max(map(len, lines)) <= WIDTH
    text = " ".join(" ".join(lines).split())
    assert "40 outcomes do not meet: 40 times a rule on a line. The 5 worst:" in text
    for row in review.exceptions[:5]:
        assert f"{row.line_number} ({row.case}); {row.title}; {row.value_shown} against {row.limit_shown}" in text
    assert "does not meet 40" in text
    assert "exceptions.pdf was not written" in text


def test_summary_of_a_list_without_exceptions() -> None:
    text = summary(make_review(exceptions=0), None)
    assert "No exceptions: none among the 92.7 % that could be checked." in text


def test_terminal_texts_carry_no_control_characters() -> None:
    review = make_review(lines=len(HOSTILE), hostile=True)
    assert not HIDDEN.search(summary(review, None))
    for line_number in review.line_numbers:
        assert not HIDDEN.search(calculation_sheet(review, line_number))
    assert "\\x1b" in calculation_sheet(review, review.line_numbers[4])


def test_calculation_sheet_reads_like_a_hand_calculation() -> None:
    review = make_review()
    sheet = calculation_sheet(review, review.line_numbers[2])
    places = [
        sheet.index(part)
        for part in (
            "CALCULATION SHEET  12-ME-1002",
            "\nInputs\n",
            "\nBalance from end to end\n",
            "\nCase normal: hydraulic results\n",
            "\nCase normal: rules\n",
            "\nCase maximum: hydraulic results\n",
            "\nCaution\n",
        )
    ]
    assert places == sorted(places)
    assert max(map(len, sheet.splitlines())) <= WIDTH
    row = next(row for row in review.outcome_rows(review.line_numbers[2]) if row.outcome == "does not meet")
    assert all(line in sheet for line in row.calculation.splitlines())
    words = " ".join(sheet.split())
    assert all(cell.shown in words and cell.origin in words for cell in row.cells)
    assert "local codes prevail" in words


def test_calculation_sheet_of_an_unknown_line_says_so() -> None:
    with pytest.raises(InputError, match=r"the list has no line 'nowhere'\. Write the line number as the list does"):
        calculation_sheet(make_review(), "nowhere")
