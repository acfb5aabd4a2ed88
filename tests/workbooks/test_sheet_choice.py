"""Which sheet is read: the one asked for, else the only one that looks like a line list, and said either way."""

from __future__ import annotations

from collections.abc import Sequence
from pathlib import Path
from typing import Any

import pytest
from books import HEADERS, line, refusal, sheet_of
from openpyxl import Workbook

from checker.intake import read_line_list

LIST = [HEADERS, line("P-1001"), line("P-1002")]
COVER = [("MARROWQUAY TERMINAL",), ("Revision", "B", "For review")]


def book(folder: Path, *sheets: tuple[str, Sequence[Sequence[Any]], str]) -> Path:
    """Write a workbook of sheets, each with its name, rows and state, and return its path."""
    made = Workbook()
    made.remove(made.worksheets[0])
    for name, rows, state in sheets:
        sheet = made.create_sheet(name)
        sheet.sheet_state = state
        for row in rows:
            sheet.append(list(row))
    made.active = next((index for index, known in enumerate(sheets) if known[2] == "visible"), 0)
    path = folder / "list.xlsx"
    made.save(path)
    return path


def test_the_one_that_looks_like_a_line_list_is_read_and_the_others_are_named(tmp_path: Path) -> None:
    path = book(
        tmp_path,
        ("Cover", COVER, "visible"),
        ("Lines", LIST, "visible"),
        ("Rev A", LIST, "hidden"),
        ("Lists", [("a",)], "veryHidden"),
    )
    sheet = sheet_of(path)
    assert sheet.name == "Lines"
    assert "Sheet 'Lines' read. Sheets not read: 'Cover', 'Rev A' (hidden), 'Lists' (hidden)." in sheet.notes
    assert read_line_list(path).source.name == "list.xlsx, sheet 'Lines'"


@pytest.mark.parametrize("asked", ["Unit 20", "unit 20", "  UNIT   20 "])
def test_the_sheet_asked_for(tmp_path: Path, asked: str) -> None:
    path = book(tmp_path, ("Unit 10", LIST, "visible"), ("Unit 20", LIST[:2], "visible"))
    read = read_line_list(path, sheet=asked)
    assert read.line_number == ("P-1001",)
    assert any("Sheet 'Unit 20' read. Sheets not read: 'Unit 10'." in note for note in read.notes)


def test_a_hidden_sheet_may_be_asked_for(tmp_path: Path) -> None:
    path = book(tmp_path, ("Cover", COVER, "visible"), ("Rev A", LIST, "veryHidden"))
    assert len(read_line_list(path, sheet="Rev A").line_number) == 2


def test_an_unknown_sheet_is_answered_with_the_names(tmp_path: Path) -> None:
    path = book(tmp_path, ("Unit 10", LIST, "visible"), ("Rev A", LIST, "hidden"))
    message = refusal(path, "Unit 30")
    assert "no sheet 'Unit 30'" in message
    assert "'Unit 10', 'Rev A' (hidden)" in message


def test_names_alike_but_for_capitals_are_asked(tmp_path: Path) -> None:
    path = book(tmp_path, ("Lines ", LIST, "visible"), (" lines", LIST, "visible"))
    assert "more than one sheet is named" in refusal(path, "LINES")
    assert len(read_line_list(path, sheet=" lines").line_number) == 2


def test_several_line_lists_are_never_read_in_part(tmp_path: Path) -> None:
    path = book(tmp_path, ("Unit 10", LIST, "visible"), ("Unit 20", LIST[:2], "visible"), ("Cover", COVER, "visible"))
    message = refusal(path)
    assert "2 sheets look like a line list: 'Unit 10' (3 rows), 'Unit 20' (2 rows)" in message
    assert "--sheet" in message


def test_a_legend_that_only_explains_the_headers_is_no_second_list(tmp_path: Path) -> None:
    legend = [("Column", "Meaning"), ("Line No", "number of the line on the drawing")]
    path = book(tmp_path, ("Legend", legend, "visible"), ("Lines", LIST, "visible"))
    assert sheet_of(path).name == "Lines"


def test_only_a_hidden_sheet_looks_like_a_list(tmp_path: Path) -> None:
    message = refusal(book(tmp_path, ("Cover", COVER, "visible"), ("Lines", LIST, "hidden")))
    assert "a hidden one does: 'Lines' (hidden)" in message
    assert "--sheet" in message


def test_no_sheet_looks_like_a_list(tmp_path: Path) -> None:
    rows = [("Tag", "Pressure [barg]", "Temperature [degC]"), ("V-101", 5, 60)]
    message = refusal(book(tmp_path, ("Cover", COVER, "visible"), ("Vessels", rows, "visible")))
    assert "no table found" in message
    assert "'Cover', 'Vessels'" in message
    assert "The nearest is row 1 of 'Vessels'" in message


def test_criteria_may_name_the_line_number_column(tmp_path: Path) -> None:
    from checker.criteria.hints import ColumnHint

    rows = [("Ident code", *HEADERS[1:]), line("P-1001")]
    path = book(tmp_path, ("Cover", COVER, "visible"), ("Lines", rows, "visible"))
    assert "no table found" in refusal(path)
    read = read_line_list(path, columns={"Ident code": ColumnHint(field="line_number")})
    assert read.line_number == ("P-1001",)


def test_messages_name_file_sheet_row_and_column(tmp_path: Path) -> None:
    rows = [HEADERS, line("P-1001", flow_mass="plenty"), line("P-1002")]
    read = read_line_list(book(tmp_path, ("Cover", COVER, "visible"), ("Lines", rows, "visible")))
    address = next(item.address for item in read.unread if item.text == "plenty")
    assert (address.file, address.row, address.column) == ("list.xlsx, sheet 'Lines'", 2, "Flow [kg/h]")


def test_a_text_has_no_sheets(tmp_path: Path) -> None:
    path = tmp_path / "list.csv"
    path.write_text(",".join(HEADERS) + "\nP-1001,6,50000,4.5,60,983,\n")
    assert "has no sheets" in refusal(path, "Lines")
