"""Which rows are lines: repeats, headings, deleted lines, two tags in one cell, and every row accounted for."""

from __future__ import annotations

import re
from pathlib import Path

import pytest
from hypothesis import HealthCheck, given, settings
from hypothesis import strategies as st
from lists import HEADER, ROW, read

from checker.errors import InputError
from checker.intake.row_kinds import deleted_word, heading_test, two_tags
from checker.model import Gap, LineList

TWO_ROWS = "Line No,Oper,,Density\n,Press,Temp,\n,barg,degC,kg/m3\n"


def reasons(listed: LineList) -> dict[int, str]:
    return {item.address.row: item.reason for item in listed.unread}


def test_a_header_of_two_rows_and_its_units_row_repeat_on_every_page(tmp_path: Path) -> None:
    rows = "P-1,1,20,998\n"
    listed = read(tmp_path, f"Marrowquay terminal,,,\n{TWO_ROWS}{rows}Marrowquay terminal,,,\n{TWO_ROWS}{rows}")
    assert listed.row.tolist() == [5, 10]
    found = reasons(listed)
    assert "repeats a row above the header" in found[6]
    assert all("repeats the header" in found[row] for row in (7, 8, 9))
    assert listed.number("temperature").tolist() == [293.15, 293.15]


def test_a_line_that_differs_from_the_units_row_is_no_repeat(tmp_path: Path) -> None:
    listed = read(tmp_path, f"{TWO_ROWS}P-1,1,20,998\n,barg,degC,kg\n")
    assert "it has no line number" in reasons(listed)[5]


@pytest.mark.parametrize(
    "heading",
    ["UNIT 10 - FEED", "Area 200", "COOLING WATER", "SECTION: Tank farm", "FEED SECTION 100"],
)
def test_a_heading_is_listed_and_is_no_line(tmp_path: Path, heading: str) -> None:
    listed = read(tmp_path, f"{HEADER}\n{ROW}\n{heading}\nP-1002,6,1,1,60,983,\n{heading},,,-,,,\n")
    assert listed.line_number == ("P-1001", "P-1002")
    assert reasons(listed).keys() == {3, 5}
    assert "it is a heading, not a line." in reasons(listed)[3]


@pytest.mark.parametrize("number", ["P-1003", "HOLD", "1003", "TBC", '6"-P-1003-A1A'])
def test_a_line_number_that_stands_alone_stays_a_line(tmp_path: Path, number: str) -> None:
    quoted = '"' + number.replace('"', '""') + '"'
    listed = read(tmp_path, f"{HEADER}\n{ROW}\nP-1002,6,1,1,60,983,\n{quoted},,,,,,\n")
    assert listed.line_number[2] == number
    assert listed.gap("flow_mass")[2] == Gap.BLANK


def test_line_numbers_of_words_are_no_headings() -> None:
    assert not heading_test(["feed water main", "steam main", "air main"])("flare main")
    assert not heading_test([])("anything")


def test_one_text_without_a_line_number_is_a_heading_or_a_note(tmp_path: Path) -> None:
    listed = read(tmp_path, f"{HEADER}\n,,,,,,continued from sheet 2\n{ROW}\n,,4,,,,\n")
    assert "a heading or a note" in reasons(listed)[2]
    assert "1 value left unread; if it belongs to the line above" in reasons(listed)[4]


@pytest.mark.parametrize("word", ["DELETED", "Not Used", "VOID", "Cancelled", "CANCELED", "spare", "*** deleted ***"])
def test_deleted_lines_are_listed_and_not_checked(tmp_path: Path, word: str) -> None:
    listed = read(tmp_path, f"{HEADER}\n{ROW}\n{word},6,1,1,60,983,\nP-9,6,1,1,60,983,{word}\nP-10,6,1,1,60,983,x\n")
    assert listed.line_number == ("P-1001", "P-10")
    assert [(item.line_number, item.address.row) for item in listed.deleted] == [(word, 3), ("P-9", 4)]
    assert (
        f"the line number says '{word}', so the line is taken as deleted and is not checked."
        in listed.deleted[0].reason
    )
    assert f"column 'Remarks' says '{word}'" in listed.deleted[1].reason
    assert not listed.unread


def test_a_word_in_any_cell_deletes_a_line_that_says_nothing_else(tmp_path: Path) -> None:
    rows = ["P-2,NOT USED,,,,,", "P-3,-,,VOID,,void,", "P-4,spare,100,,,,", "P-5,,,,SPARE,20,"]
    listed = read(tmp_path, "\n".join([HEADER, ROW, *rows, ""]))
    assert listed.line_number == ("P-1001", "P-4", "P-5")
    assert [item.line_number for item in listed.deleted] == ["P-2", "P-3"]
    assert "column 'Size (NPS)' says 'NOT USED'" in listed.deleted[0].reason


def test_a_list_of_deleted_lines_only_has_no_lines(tmp_path: Path) -> None:
    with pytest.raises(InputError, match="no lines"):
        read(tmp_path, f"{HEADER}\nP-9,6,1,1,60,983,DELETED\n")


@pytest.mark.parametrize(
    "text", ["deleted in rev B, now P-12", "spare connection", "not used in summer", "", "avoid", "voids", "P-1"]
)
def test_a_remark_that_says_more_deletes_nothing(text: str) -> None:
    assert deleted_word([text, "DELETED"]) == [False, True]


@pytest.mark.parametrize(
    ("written", "two"),
    [
        ('6"-P-1042-A1A\n6"-P-1043-A1A', True), ("P-1001\r\nP-1002", True), ("P-1001\nP-1002\nP-1003", True),
        ("P-1301-\nA1A", False), ('6"-P-1042\n-A1A', False), ('6"-P-1042\nA1A', False), ("P-1001", False),
        ("HOLD\nHOLD", False), ("", False), ("\n\n", False),
    ],
)  # fmt: skip
def test_two_tags_in_one_cell(written: str, two: bool) -> None:
    assert two_tags(written) is two


def test_two_line_numbers_against_one_set_of_values_refuse_the_row(tmp_path: Path) -> None:
    listed = read(tmp_path, f'{HEADER}\n"P-1001\nP-1002",6,50000,4.5,60,983,\n{ROW}\n')
    assert listed.line_number == ("P-1001 P-1002", "P-1001")
    assert listed.gap("flow_mass").tolist() == [Gap.REFUSED, Gap.GIVEN]
    assert "holds two line numbers against one set of values" in listed.refusals["flow_mass", 0]


@pytest.mark.parametrize("mark", ["DITTO", "-do-", '"', "same as above", "\u2193"])
def test_a_mark_that_repeats_the_cell_above_is_never_filled(tmp_path: Path, mark: str) -> None:
    quoted = '"' + mark.replace('"', '""') + '"'
    text = f"Line No,Service,Phase,Temp [K],Remarks\nP-1,water,L,300,x\nP-2,{','.join([quoted] * 4)}\n"
    listed = read(tmp_path, text)
    assert listed.gap("temperature").tolist() == [Gap.GIVEN, Gap.REFUSED]
    for name in ("temperature", "service", "phase"):
        assert "repeats the cell above" in listed.refusals[name, 1]
    assert listed.gap("remarks")[1] == Gap.GIVEN


@pytest.mark.parametrize("mark", ["DITTO", "-do-", '"', "same as above", "\u2193"])
def test_a_line_number_that_repeats_the_one_above_is_asked_for(tmp_path: Path, mark: str) -> None:
    quoted = '"' + mark.replace('"', '""') + '"'
    listed = read(tmp_path, f"Line No,Case,Temp [K]\nP-1,normal,300\n{quoted},rated,310\n")
    assert listed.line_number == ("P-1",)
    assert "repeats the one above, so it is not checked: write it on every row." in reasons(listed)[3]


def test_a_number_given_only_in_the_first_of_several_rows_is_asked_for(tmp_path: Path) -> None:
    listed = read(tmp_path, "Line No,Case,Temp [K]\nP-1,normal,300\n,rated,310\n,turndown,290\n")
    assert listed.line_number == ("P-1",)
    assert all("repeat the line number there" in reason for reason in reasons(listed).values())
    assert len(listed.unread) == 2


KINDS = st.sampled_from(
    [
        "P-1,300,998,", "P-2,,,", "P-3,HOLD,998,DELETED", "NOT USED,,,", ",,,", "", "   ", "TOTAL,,1,", "NOTES: general,,,", "1. see,,,",
        "Page 2 of 3,,,", "Line No,Temp [K],rho [kg/m3],Remarks", ",1,2,", ",,,continued", "UNIT 20 FEED,,,", "-,,,",
        "P-4,1,2,x,5,6", '"P-5\nP-6",1,2,', '"6"-P-7",1,2,', "P-8", '"P-9-\nA",1,2,', "-,1,2,", "HOLD,1,2,",
    ]
)  # fmt: skip


@settings(max_examples=150, deadline=None, suppress_health_check=[HealthCheck.function_scoped_fixture])
@given(st.lists(KINDS, max_size=12))
def test_every_row_beneath_the_header_is_accounted_for(tmp_path: Path, rows: list[str]) -> None:
    listed = read(tmp_path, "\n".join(["Line No,Temp [K],rho [kg/m3],Remarks", "P-0,300,998,", *rows, ""]))
    note = next(note for note in listed.notes if note.startswith("Rows beneath the header: "))
    total, lines, deleted, others, blank = map(int, re.findall(r"\d+", note))
    assert total == len(rows) + 1
    assert lines == len(listed.line_number)
    assert deleted == len(listed.deleted)
    assert others == len([item for item in listed.unread if item.reason.startswith("Row ")])
    assert total == lines + deleted + others + blank
    assert blank == sum(not row.strip(" ,") for row in rows)
    seen = {*listed.row.tolist(), *(item.address.row for item in (*listed.deleted, *listed.unread))}
    assert seen == {index for index, row in enumerate(["x", *rows], start=2) if row.strip(" ,")}
