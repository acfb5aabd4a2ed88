"""How the list was read, as the terminal, the page and the JSON tell it."""

from __future__ import annotations

import json
import re
from typing import Any

import jsonschema
import pytest
from bs4 import BeautifulSoup
from fake_review import FILE, HOSTILE, make_review

from checker.model import Address, CellRecord, HeaderMatch, RangeItem, UnreadItem
from checker.report.cell_record_text import read_as
from checker.report.html import render_html
from checker.report.json_file import SCHEMA_FILE, outcomes_json
from checker.report.reading_view import reading_of
from checker.report.terminal import summary
from checker.report.text_lines import WIDTH

HIDDEN = re.compile(r"[\x00-\x09\x0b-\x1f\x7f-\x9f\u200b-\u200f\u202a-\u202e]")
ADDRESS = Address(FILE, 3, "P [bar]")
QUESTION = UnreadItem("", "P [bar]", "unit 'bar' does not say gauge or absolute: write barg or bara.", ADDRESS)
CELL = UnreadItem("10-AM-1000", "<5", "'<5' is a limit, not a value.", Address(FILE, 9, "Flow [kg/h]"))
ROW = UnreadItem("", "TOTAL", "Row 99 'TOTAL': it is a total, not a line.", Address(FILE, 99, "Line No."))


def small(**changes: Any) -> Any:
    """Return a small review."""
    return make_review(lines=3, exceptions=2, points=0, **changes)


def terminal(review: Any) -> str:
    return summary(review, None)


def in_words(text: str) -> str:
    return " ".join(text.split())


def test_the_terminal_tells_header_field_unit_and_case() -> None:
    text = terminal(small())
    assert "Flow Max [kg/h] -> flow_mass, kg/h, maximum" in text
    assert "Line No. -> line_number" in text
    assert text.index("How the list was read") < text.index("Recommendation:")


def test_a_long_list_of_columns_is_shortened_and_counted_but_no_question_is_left_out() -> None:
    matches = tuple(HeaderMatch(k, f"Header {k} [m]", "length", "", "m", "") for k in range(1, 301))
    questions = tuple(
        UnreadItem("", f"Column {k}", f"could be two things, {k}.", Address(FILE, 3, f"Column {k}")) for k in range(30)
    )
    closest = HeaderMatch(301, "Pres.", "", "", "", "'Pres.' is not matched; the closest field is pressure.")
    text = terminal(small(matching=(*matches, closest), unread_items=questions))
    assert "Columns read: 300" in text
    assert "and 260 more, in the report" in text
    assert all(f"could be two things, {k}." in text for k in range(30))
    assert "? 'Pres.' is not matched; the closest field is pressure." in text
    assert len(text.splitlines()) < 30 + 60


def test_the_terminal_counts_what_is_no_line_and_names_deleted_lines() -> None:
    deleted = tuple(UnreadItem(f"L-{k}", f"L-{k}", "struck through", ADDRESS) for k in range(8))
    text = in_words(terminal(small(unread_items=(QUESTION, CELL, ROW), deleted_items=deleted, hold_items=())))
    assert "3 lines, 6 line cases, 8 deleted lines, 1 row that is no line, 1 cell refused, 3 cells with two" in text
    assert "listed and not checked: L-0, L-1, L-2, L-3, L-4, L-5 and 2 more." in text
    assert "(8 deleted lines aside)" in text


def test_rows_columns_and_cells_are_told_apart() -> None:
    reading = reading_of(small(unread_items=(QUESTION, CELL, ROW)))
    assert (reading.questions, reading.rows_aside, reading.cells_refused) == ((QUESTION,), 1, 1)


def test_without_a_record_of_every_header_the_columns_are_told() -> None:
    columns = (("Rho", "density", "", "kg/m3"),)
    reading = reading_of(small(matching=(), columns_matched=columns, columns_unmatched=("Paint",)))
    assert [(match.header, match.field) for match in reading.every] == [("Rho", "density"), ("Paint", "")]


@pytest.mark.parametrize("hostile", [False, True])
def test_the_terminal_is_narrow_and_hides_nothing(*, hostile: bool) -> None:
    review = make_review(lines=len(HOSTILE), hostile=hostile)
    matches = tuple(HeaderMatch(k, text, "remarks", text, text, text) for k, text in enumerate(HOSTILE, start=1))
    review.matching = matches if hostile else review.matching
    text = terminal(review)
    assert not HIDDEN.search(text)
    assert max(map(len, text.splitlines())) <= WIDTH


def test_the_page_shows_every_header_both_ends_of_ranges_and_deleted_lines() -> None:
    ends = (RangeItem("10-AM-1000", "temperature", "20 to 30", 293.15, 303.15, ADDRESS),)
    review = small(range_items=ends, unread_items=(QUESTION, CELL, ROW))
    soup = BeautifulSoup(render_html(review), "html.parser")
    rows = [[cell.get_text(" ") for cell in row("td")] for row in soup.select("#reading .columns-table tbody tr")]
    assert [row[1] for row in rows] == [match.header for match in review.matching]
    assert rows[1][3:5] == ["maximum", "kg/h"]
    assert "not read" in rows[2][2]
    assert "closest is the field" in rows[2][5]
    low_high = [cell.get_text() for cell in soup.select("#reading .ranges-table tbody td")][3:5]
    assert low_high == ["20 degC", "30 degC"]
    assert len(soup.select("#reading .deleted-table tbody tr")) == len(review.deleted_items)
    assert "gauge or absolute" in soup.select_one("#reading .questions-table").get_text()


def test_deleted_lines_are_in_no_tally() -> None:
    plain, with_deleted = small(deleted_items=()), small(deleted_items=(QUESTION,) * 5)
    for review in (plain, with_deleted):
        soup = BeautifulSoup(render_html(review), "html.parser")
        counts = [row("td")[1].get_text() for row in soup.select(".tally tbody tr")]
        assert sum(map(int, counts)) == 3 * 2 * 14


def test_the_json_says_how_the_list_was_read() -> None:
    document = json.loads(outcomes_json(small()))
    jsonschema.validate(document, json.loads(SCHEMA_FILE.read_text(encoding="utf-8")))
    assert document["counts"]["deleted_lines"] == 3
    assert document["reading"]["columns"][1] == {
        "position": 2, "header": "Flow Max [kg/h]", "field": "flow_mass", "case": "maximum", "unit": "kg/h",
        "remark": "",
    }  # fmt: skip
    assert [item["row"] for item in document["reading"]["deleted"]] == [17, 17, 17]


@pytest.mark.parametrize(
    ("record", "field", "said"),
    [
        (CellRecord("50", (50.0,), "m3/h", (50 / 3600,)), "flow_volume", "50 m3/h = 0.0138889 m3/s"),
        (CellRecord("4.5", (4.5,), "barg", (551_325.0,)), "pressure", "4.5 barg = 551325 Pa absolute"),
        (CellRecord("20-30", (20.0, 30.0), "degC", (293.15, 303.15)), "temperature",
         "20 and 30 degC = 293.15 and 303.15 K"),
        (CellRecord("997", (997.0,), "kg/m3", (997.0,)), "density", "997 kg/m3"),
        (CellRecord("0.97", (0.97,), "-", (0.97,)), "compressibility", "0.97"),
        (CellRecord("12", (12.0,), "", ()), "pressure", "12"),
        (CellRecord("TBC"), "pressure", ""),
        (None, "velocity_maximum", ""),
    ],
)  # fmt: skip
def test_a_cell_is_told_as_number_unit_and_si(record: CellRecord | None, field: str, said: str) -> None:
    assert read_as(record, field) == said


def test_cases_that_differ_by_the_ends_of_ranges_are_counted_not_listed() -> None:
    review = make_review(lines=1, exceptions=4, points=0)
    named = ("maximum, with low pressure", "maximum, with high pressure", "normal", "maximum, with low temperature")
    from dataclasses import replace

    from checker.report.breaches import breaches_of

    rows = [replace(row, rule="r", case=case) for row, case in zip(review.exceptions, named, strict=True)]
    assert [breach.cases for breach in breaches_of(rows)] == ["maximum in 3 combinations of its ranges, normal"]
