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
    assert "the units in row 5 differ from those of the header (column 4: 'kg' against 'kg/m3')" in reasons(listed)[5]


SIX = "Line No,Size (NPS),Phase,Flow (kg/h),Press (barg),Temp (C)"
SIX_ROW = "P-1,6,L,1000,5,40"


@pytest.mark.parametrize(
    ("again", "words"),
    [
        ("Line No,Size (NPS),Phase,Flow (kg/h),Temp (C),Press (barg)", "column 5: 'Temp (C)' against 'Press (barg)'"),
        ("Line No,Size (NPS),Phase,Flow (t/h),Press (barg),Temp (C)", "column 4: 'Flow (t/h)' against 'Flow (kg/h)'"),
        ("Line No,Size (DN),Phase,Flow (kg/h),Press (barg),Temp (C)", "column 2: 'Size (DN)' against 'Size (NPS)'"),
        ("Line number,Size (NPS),Phase,Flow (kg/h),Press (barg),Temp (C)", "column 1: 'Line number' against 'Line No'"),
        (",,,kg/h,psig,", "row 4 holds units in the middle of the list ('kg/h' in column 'Flow (kg/h)')"),
        ("Tag,Kind,Duty,Head,Power,Rev", "column 1: 'Tag' against 'Line No'"),
        ("Tag,Service,Phase,Flow (kg/h),,", "column 1: 'Tag' against 'Line No'"),
    ],
)
def test_values_beneath_another_header_are_not_read(tmp_path: Path, again: str, words: str) -> None:
    beneath = "P-2,6,L,1,50,100\nArea 2,,,,,\nP-3,6,L,1,50,100\n"
    listed = read(tmp_path, f"{SIX}\n{SIX_ROW}\n,,,,,\n{again}\n{beneath}{SIX}\nP-4,6,L,2000,5,40\n")
    assert listed.line_number == ("P-1", "P-2", "P-3", "P-4")
    for name in ("size", "flow_mass", "pressure", "temperature", "phase"):
        assert listed.gap(name).tolist() == [Gap.GIVEN, Gap.REFUSED, Gap.REFUSED, Gap.GIVEN], name
        assert words in listed.refusals[name, 1]
    assert "give each table a sheet or file of its own, with one header." in listed.refusals["flow_mass", 2]
    assert words in reasons(listed)[4]
    assert words in reasons(listed)[5]


def test_a_repeat_in_other_capitals_and_blanks_is_one(tmp_path: Path) -> None:
    listed = read(tmp_path, f"{SIX}\n{SIX_ROW}\n{SIX.upper().replace(' ', '  ')}\nP-2,6,L,2000,5,40\n")
    assert listed.gap("flow_mass").tolist() == [Gap.GIVEN, Gap.GIVEN]
    assert "it repeats the header." in reasons(listed)[3]


def test_only_the_whole_header_ends_what_other_units_began(tmp_path: Path) -> None:
    header, units = "Line No,Size,Phase,Flow,Press,Temp", ",NPS,,kg/h,barg,C"
    pages = [header, ",NPS,,t/h,psig,F", "P-2,6,L,1,50,100", header, "P-3,6,L,1,50,100", header, units, SIX_ROW]
    listed = read(tmp_path, "\n".join([header, units, SIX_ROW, *pages, ""]))
    assert listed.gap("flow_mass").tolist() == [Gap.GIVEN, Gap.REFUSED, Gap.REFUSED, Gap.GIVEN]
    assert "the units in row 5 differ" in listed.refusals["flow_mass", 2]


@pytest.mark.parametrize("groups", [",Normal,,Max,", ",Max,,Normal,"])
def test_groups_that_change_places_make_another_header(tmp_path: Path, groups: str) -> None:
    header, row = "Line No,Flow (kg/h),Temp (C),Flow (kg/h),Temp (C)", "P-1,1000,40,2000,50"
    listed = read(tmp_path, f",Normal,,Max,\n{header}\n{row}\n{groups}\n{header}\n{row.replace('1,', '2,')}\n")
    moved = groups != ",Normal,,Max,"
    assert listed.gap("flow_mass")[2:].tolist() == [Gap.REFUSED if moved else Gap.GIVEN] * 2


@pytest.mark.parametrize("row", ["FLARE MAIN,6,G,by vendor,HOLD,TBC", "P-2,6,L,see note,by client,hot", "X,Y,Z,,,"])
def test_words_for_values_begin_no_table(tmp_path: Path, row: str) -> None:
    listed = read(tmp_path, f"{SIX}\n{SIX_ROW}\n{row}\nP-3,6,L,2000,5,40\n")
    assert listed.gap("flow_mass")[-1] == Gap.GIVEN


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


@pytest.mark.parametrize("word", ["DELETED", "Not Used", "VOID", "Cancelled", "CANCELED", "*** deleted ***"])
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


@pytest.mark.parametrize(
    ("service", "status", "remark"),
    [
        ("CW", "", "spare"), ("CW", "", "DELETED - see P-4"), ("CW", "", "Line deleted in rev B"), ("DELETED", "", ""),
        ("CW", "Del.", ""), ("CW", "D", ""), ("CW", "Demolished", ""), ("CW", "", "Cancelled; replaced by P-10"),
    ],
)  # fmt: skip
def test_a_line_with_values_that_may_be_deleted_is_asked_about(
    tmp_path: Path, service: str, status: str, remark: str
) -> None:
    listed = read(tmp_path, f"Line No,Service,Flow (kg/h),Status,Remarks\nP-1,{service},1000,{status},{remark}\n")
    assert listed.gap("flow_mass").tolist() == [Gap.GIVEN]
    assert not listed.deleted
    said = remark or status or service
    assert f"says '{said}': is the line deleted? It is checked as it stands" in reasons(listed)[2]


@pytest.mark.parametrize(
    ("status", "remark"), [("IFC", "not used in summer"), ("", "spare connection"), ("DELETED", "")]
)
def test_a_plain_word_raises_no_question(tmp_path: Path, status: str, remark: str) -> None:
    listed = read(tmp_path, f"Line No,Flow (kg/h),Status,Remarks\nP-1,1000,{status},{remark}\nP-2,1000,IFC,x\n")
    assert not listed.unread
    assert len(listed.deleted) == (status == "DELETED")


@pytest.mark.parametrize("number", ["#REF!", "#N/A", "TRUE", "false", "0"])
def test_what_can_be_no_line_number_refuses_its_row(tmp_path: Path, number: str) -> None:
    listed = read(tmp_path, f"{HEADER}\n{ROW}\n{number},6,50000,4.5,60,983,\n")
    assert listed.gap("flow_mass").tolist() == [Gap.GIVEN, Gap.REFUSED]
    assert f"the line number '{number}' is " in reasons(listed)[3]


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


def test_a_page_repeat_may_differ_in_stops_and_blanks(tmp_path: Path) -> None:
    text = (
        "Line No,NPS,Flow (kg/h),Op Press (barg)\nP-1,6,50,5\nLINE NO.,NPS,Flow  (kg/h),Op Press (barg)\nP-2,2,60,6\n"
    )
    listed = read(tmp_path, text)
    assert listed.number("flow_mass").tolist() == pytest.approx([50.0 / 3600.0, 60.0 / 3600.0])
