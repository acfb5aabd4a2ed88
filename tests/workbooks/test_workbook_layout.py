"""What only a workbook says of its rows: deleted lines, merged cells, hidden rows, comments, filters."""

from __future__ import annotations

from pathlib import Path
from typing import Any

import pytest
import xlsxwriter
from books import HEADERS, given, line, reason, saved, shared, sheet_of
from openpyxl.cell.rich_text import CellRichText, TextBlock
from openpyxl.cell.text import InlineFont
from openpyxl.comments import Comment
from openpyxl.styles import Font

from checker.intake import read_line_list

STRUCK = Font(strike=True)
LINES = [line(f"P-100{number}") for number in range(1, 6)]


def strike(sheet: Any, row: int, columns: str) -> None:
    for letter in columns:
        sheet[f"{letter}{row}"].font = STRUCK


def rich(*pieces: tuple[str, bool]) -> CellRichText:
    return CellRichText(*(TextBlock(InlineFont(strike=struck), text) for text, struck in pieces))


@pytest.mark.parametrize("columns", ["ABCDEFG", "ABCDE"])
def test_a_struck_row_is_a_deleted_line(tmp_path: Path, columns: str) -> None:
    read = read_line_list(saved(tmp_path, *LINES, change=lambda sheet: strike(sheet, 4, columns)))
    assert read.line_number == ("P-1001", "P-1002", "P-1004", "P-1005")
    assert [item.line_number for item in read.deleted] == ["P-1003"]
    assert read.deleted[0].address.row == 4


def test_a_struck_cell_alone_is_refused_and_asked(tmp_path: Path) -> None:
    read = read_line_list(saved(tmp_path, *LINES, change=lambda sheet: strike(sheet, 3, "C")))
    assert not read.deleted
    assert given(read, "flow_mass")[1] is None
    assert "'50000' is struck through" in reason(read, 3, "Flow [kg/h]")
    assert given(read, "pressure")[1] is not None


def test_a_struck_line_number_alone_leaves_no_value_of_its_row(tmp_path: Path) -> None:
    read = read_line_list(saved(tmp_path, *LINES, change=lambda sheet: strike(sheet, 3, "A")))
    assert not read.deleted
    for field in ("size", "flow_mass", "pressure", "temperature", "density"):
        assert given(read, field)[1] is None
        assert given(read, field)[0] is not None
    assert "is it deleted?" in reason(read, 3, "Line No")


@pytest.mark.parametrize(
    ("pieces", "outcome"),
    [
        ([("6", True), (" 8", False)], "asked"),
        ([("8 ", False), ("6", True)], "asked"),
        ([("8", True)], "struck"),
        ([("8", True), (" ", False)], "struck"),
        ([("8", False)], "read"),
        ([("8", False), (" ", True)], "read"),
    ],
)
def test_a_text_struck_in_part(tmp_path: Path, pieces: list[tuple[str, bool]], outcome: str) -> None:
    path = saved(tmp_path, *LINES, change=lambda sheet: sheet.__setitem__("B3", rich(*pieces)))
    read = read_line_list(path)
    why = reason(read, 3, "Size (NPS)")
    assert given(read, "size")[1] == (8.0 if outcome == "read" else None)
    assert ("'6' is struck, '8' stands" in why) == (outcome == "asked")
    assert ("is struck through: write the value" in why) == (outcome == "struck")


@pytest.mark.parametrize(
    ("pieces", "struck", "stands"),
    [([("6", True), (" 8", False)], "'6'", "'8'"), ([("8", False), (" 6", True), (" NPS", False)], "'6'", "'8 NPS'")],
)
def test_a_shared_text_struck_in_part(tmp_path: Path, pieces: list[tuple[str, bool]], struck: str, stands: str) -> None:
    read = read_line_list(shared(tmp_path, *LINES[:1], line("P-1002", size=pieces), line("P-1003", size='8"')))
    assert given(read, "size") == [6.0, None, 8.0]
    assert f"{struck} is struck, {stands} stands" in reason(read, 3, "Size (NPS)")


def test_shared_texts_in_pieces_without_a_strike_are_read(tmp_path: Path) -> None:
    path = shared(tmp_path, line("P-1001", remarks=[("see ", False), ("note", False)]))
    sheet = sheet_of(path)
    assert sheet.rows[1][6] == "see note"
    assert not sheet.refused


def test_pieces_without_a_font_follow_their_cell(tmp_path: Path) -> None:
    def change(sheet: Any) -> None:
        sheet["B3"] = CellRichText("6", TextBlock(InlineFont(b=True), " 8"))
        strike(sheet, 3, "B")

    assert "'6' is struck, '8' stands" in reason(
        read_line_list(saved(tmp_path, *LINES, change=change)), 3, "Size (NPS)"
    )


def test_a_struck_header_is_named(tmp_path: Path) -> None:
    read = read_line_list(saved(tmp_path, *LINES, change=lambda sheet: strike(sheet, 1, "F")))
    assert any("Headers struck through" in note and "'Density [kg/m3]'" in note for note in read.notes)


def test_other_styles_change_nothing(tmp_path: Path) -> None:
    def change(sheet: Any) -> None:
        for cell in sheet[3]:
            cell.font = Font(color="FFFFFFFF", bold=True)

    styled, plain = (sheet_of(saved(tmp_path, *LINES, change=how)) for how in (change, None))
    assert styled.rows == plain.rows
    assert not styled.refused


def test_a_line_number_merged_over_its_cases(tmp_path: Path) -> None:
    def change(sheet: Any) -> None:
        sheet.merge_cells("A3:A5")

    read = read_line_list(saved(tmp_path, *LINES, change=change))
    assert read.line_number == ("P-1001", "P-1002", "P-1002", "P-1002", "P-1005")
    assert any("Merged cells" in note for note in read.notes)


def test_a_number_merged_over_the_rows_of_one_line_holds_for_each(tmp_path: Path) -> None:
    def change(sheet: Any) -> None:
        sheet["D3"] = 7
        sheet.merge_cells("D3:D4")
        sheet.merge_cells("A3:A4")

    read = read_line_list(saved(tmp_path, *LINES, change=change))
    pressures = given(read, "pressure")
    assert pressures[1] == pressures[2] == pytest.approx(801_325.0)
    assert pressures[3] == pytest.approx(551_325.0)
    filled = "(2 cells filled): 'Line No' rows 3 to 4, 'Oper Press [barg]' rows 3 to 4."
    assert any(note.endswith(filled) for note in read.notes)


def test_a_number_merged_over_different_lines_is_asked_about(tmp_path: Path) -> None:
    def change(sheet: Any) -> None:
        sheet["D3"], sheet["G3"] = 7, "drain at low point"
        sheet.merge_cells("D3:D4")
        sheet.merge_cells("G3:G4")

    read = read_line_list(saved(tmp_path, *LINES, change=change))
    assert [value is None for value in given(read, "pressure")] == [False, True, True, False, False]
    assert read.texts["remarks"].text(2) == "drain at low point"
    for row in (3, 4):
        assert "'7' is merged over the lines 'P-1002', 'P-1003'" in reason(read, row, "Oper Press [barg]")


def raised(*pieces: tuple[str, str]) -> CellRichText:
    """Return a text in pieces, each with its height: empty, ``superscript`` or ``subscript``."""
    return CellRichText(*(TextBlock(InlineFont(vertAlign=height or None), text) for text, height in pieces))


UP, DOWN = "superscript", "subscript"


@pytest.mark.parametrize(
    ("pieces", "text"),
    [
        ([("5", ""), ("2", UP)], "5\u00b2"),
        ([("5", ""), ("(1)", UP)], "5\u207d\u00b9\u207e"),
        ([("2.5x10", ""), ("-3", UP)], "2.5x10\u207b\u00b3"),
        ([("CO", ""), ("2", DOWN)], "CO\u2082"),
        ([("60 ", ""), ("o", UP), ("C", "")], "60 \u00b0C"),
        ([("5", ""), ("note 2", UP)], "5 (note 2)"),
        ([("5", ""), ("2a", DOWN)], "5 (2a)"),
        ([("P", ""), ("max", DOWN)], "Pmax"),
        ([("5", ""), ("*", UP)], "5*"),
        ([("1", ""), ("1", UP), ("/", ""), ("2", DOWN)], "1 1/2"),
        ([("1", UP), ("/", ""), ("2", DOWN)], "1/2"),
    ],
)
def test_raised_and_lowered_pieces(tmp_path: Path, pieces: list[tuple[str, str]], text: str) -> None:
    path = saved(tmp_path, *LINES, change=lambda sheet: sheet.__setitem__("G3", raised(*pieces)))
    assert sheet_of(path).rows[2][6] == text


def test_raised_digits_are_never_part_of_a_number(tmp_path: Path) -> None:
    def change(sheet: Any) -> None:
        sheet["D3"] = raised(("5", ""), ("2", UP))
        sheet["A4"] = raised(("P-1", ""), ("2", UP))
        sheet["E3"] = raised(("6", ""), ("0", DOWN))
        sheet["B3"] = raised(("1", ""), ("1", UP), ("/", ""), ("2", DOWN))

    read = read_line_list(saved(tmp_path, *LINES, change=change))
    assert given(read, "pressure")[1] == pytest.approx(601_325.0)
    assert given(read, "temperature")[1] is None
    assert given(read, "size")[1] == 1.5
    assert read.line_number[2] == "P-1\u00b2"


def test_a_shared_text_with_a_raised_digit(tmp_path: Path) -> None:
    path = tmp_path / "list.xlsx"
    with xlsxwriter.Workbook(str(path)) as book:
        sheet = book.add_worksheet("Line List")
        for number, row in enumerate((HEADERS, line("P-1001"))):
            sheet.write_row(number, 0, row)
        sheet.write_rich_string(1, 3, "5", book.add_format({"font_script": 1}), "2", " ")
    assert sheet_of(path).rows[1][3].strip() == "5\u00b2"


def test_headers_are_known_without_their_raised_marks(tmp_path: Path) -> None:
    def change(sheet: Any) -> None:
        sheet["A1"] = raised(("Line No", ""), ("1", UP))
        sheet["D1"] = raised(("Oper Press", ""), ("2)", UP), (" [barg]", ""))
        sheet["F1"] = raised(("Density [kg/m", ""), ("3", UP), ("]", ""))

    read = read_line_list(saved(tmp_path, *LINES, change=change))
    assert given(read, "pressure") == [pytest.approx(551_325.0)] * 5
    assert given(read, "density") == [pytest.approx(983.0)] * 5
    assert any(note.startswith("Headers read without their raised marks: 'Line No") for note in read.notes)


def test_only_merged_headers_are_spread(tmp_path: Path) -> None:
    def change(sheet: Any) -> None:
        sheet.insert_rows(1)
        sheet["A1"], sheet["D1"], sheet["F1"] = "General", "Operating", "Properties"
        sheet.merge_cells("D1:E1")
        sheet["F4"] = None
        sheet.merge_cells("E4:F4")

    sheet = sheet_of(saved(tmp_path, *LINES, change=change))
    assert sheet.rows[0] == ["General", "", "", "Operating", "Operating", "Properties", ""]
    assert sheet.rows[3][4:6] == ["60", ""]


def test_a_merged_cell_fills_no_row_that_is_blank_otherwise(tmp_path: Path) -> None:
    def change(sheet: Any) -> None:
        sheet.merge_cells("A6:A900")

    read = read_line_list(saved(tmp_path, *LINES, change=change))
    assert len(read.line_number) == 5


def test_marks_of_a_merged_cell_hold_for_each_of_its_rows(tmp_path: Path) -> None:
    def change(sheet: Any) -> None:
        strike(sheet, 3, "C")
        sheet.merge_cells("C3:C4")

    read = read_line_list(saved(tmp_path, *LINES, change=change))
    assert [value is None for value in given(read, "flow_mass")] == [False, True, True, False, False]


def test_a_number_merged_sideways_is_used_once(tmp_path: Path) -> None:
    def change(sheet: Any) -> None:
        sheet.merge_cells("D3:E3")

    read = read_line_list(saved(tmp_path, *LINES, change=change))
    assert given(read, "pressure")[1] == pytest.approx(551_325.0)
    assert given(read, "temperature")[1] is None
    assert "merged with the one that holds '4.5'" in reason(read, 3, "Oper Temp [degC]")


def test_an_area_heading_merged_over_the_table_is_no_question(tmp_path: Path) -> None:
    def change(sheet: Any) -> None:
        sheet.insert_rows(3)
        sheet["A3"] = "AREA 20"
        sheet.merge_cells("A3:G3")

    sheet = sheet_of(saved(tmp_path, *LINES, change=change))
    assert not sheet.no_numbers


def test_a_group_name_holds_over_its_merged_columns(tmp_path: Path) -> None:
    def change(sheet: Any) -> None:
        sheet.insert_rows(1)
        for column, text in enumerate(HEADERS, 1):
            sheet.cell(1, column, text)
            sheet.cell(2, column).value = None
            if column not in (4, 5):
                sheet.merge_cells(start_row=1, end_row=2, start_column=column, end_column=column)
        sheet["D1"], sheet["E1"], sheet["D2"], sheet["E2"] = "Operating", None, "Press [barg]", "Temp [degC]"
        sheet.merge_cells("D1:E1")

    path = saved(tmp_path, *LINES, change=change)
    assert sheet_of(path).rows[0][3:5] == ["Operating", "Operating"]
    read = read_line_list(path)
    assert given(read, "pressure") == [pytest.approx(551_325.0)] * 5
    assert given(read, "temperature") == [pytest.approx(333.15)] * 5


def test_a_header_that_comes_again_is_spread_as_the_first(tmp_path: Path) -> None:
    def change(sheet: Any) -> None:
        for row in (1, 5):
            sheet.insert_rows(row)
            for column, text in enumerate(HEADERS, 1):
                sheet.cell(row, column, text if column != 5 else None)
            sheet.cell(row, 4, "Operating")
            sheet.merge_cells(start_row=row, end_row=row, start_column=4, end_column=5)
        for column in range(1, 8):
            sheet.cell(2, column).value = {4: "Press [barg]", 5: "Temp [degC]"}.get(column)

    sheet = sheet_of(saved(tmp_path, *LINES, change=change))
    assert sheet.rows[4] == sheet.rows[0]
    assert sheet.rows[0][3:5] == ["Operating", "Operating"]


def test_a_title_merged_above_stays_a_title(tmp_path: Path) -> None:
    def change(sheet: Any) -> None:
        sheet.insert_rows(1)
        sheet["A1"] = "PIPING LINE LIST"
        sheet.merge_cells("A1:G1")

    sheet = sheet_of(saved(tmp_path, *LINES, change=change))
    assert sheet.rows[0] == ["PIPING LINE LIST", *[""] * 6]


def test_hidden_rows_and_columns_are_read_and_named(tmp_path: Path) -> None:
    def change(sheet: Any) -> None:
        sheet.row_dimensions[3].hidden = True
        sheet.column_dimensions["F"].hidden = True
        sheet.auto_filter.ref = "A1:G6"

    path = saved(tmp_path, *LINES, change=change)
    assert sheet_of(path).hidden == {2}
    read = read_line_list(path)
    assert len(read.line_number) == 5
    assert given(read, "density")[1] == pytest.approx(983.0)
    for words in ("Hidden rows, read all the same: 3.", "Hidden columns, read all the same: F 'Density", "A filter"):
        assert any(words in note for note in read.notes)


def test_comments_are_counted(tmp_path: Path) -> None:
    def change(sheet: Any) -> None:
        sheet["C2"].comment = Comment("was 40000", "checker")
        sheet["C3"].comment = Comment("was 30000", "checker")

    sheet = sheet_of(saved(tmp_path, *LINES, change=change))
    assert any("comments are not read: 2" in note for note in sheet.notes)


def test_rows_are_those_of_the_sheet(tmp_path: Path) -> None:
    def change(sheet: Any) -> None:
        sheet.insert_rows(1, amount=3)
        sheet.insert_rows(6, amount=10)

    read = read_line_list(saved(tmp_path, *LINES, change=change))
    assert read.row.tolist() == [5, 16, 17, 18, 19]


def test_cells_beside_the_table_are_named(tmp_path: Path) -> None:
    def change(sheet: Any) -> None:
        sheet["K3"] = "see sketch"

    read = read_line_list(saved(tmp_path, *LINES, change=change))
    assert given(read, "flow_mass")[1] is not None
    assert any("to the right of the last header are not read: rows 3" in note for note in read.notes)


def test_a_table_that_begins_elsewhere(tmp_path: Path) -> None:
    def change(sheet: Any) -> None:
        sheet.insert_cols(1)
        sheet.insert_rows(1, amount=2)

    read = read_line_list(saved(tmp_path, *LINES, change=change))
    assert len(read.line_number) == 5
    assert given(read, "size") == [6.0] * 5
