"""XLS and ODS, read in a process of its own, and what happens when that process fails.

`list.xls` was written once by a library that the project does not need (xlwt 1.3): a sheet `Cover`; a sheet `Line
List` whose table begins at B2, with lines P-1001 to P-1003, the size of P-1003 stored as the date 2-Jan-2026, B5 and
B6 merged, a TRUE in H5; and a hidden sheet `Rev A`.
"""

from __future__ import annotations

import sys
from pathlib import Path

import pytest
from books import given, reason, refusal, sheet_of

from checker.intake import read_line_list
from checker.intake.workbook import calamine_child, other_formats

FIXTURE = Path(__file__).with_name("list.xls")


def test_an_old_workbook() -> None:
    read = read_line_list(FIXTURE)
    assert read.source.name == "list.xls, sheet 'Line List'"
    assert read.line_number == ("P-1001", "P-1002", "P-1003", "P-1003")
    assert read.row.tolist() == [3, 4, 5, 6]
    assert given(read, "size") == [6.0, 1.5, None, 4.0]
    assert given(read, "pressure") == [pytest.approx(551_325.0)] * 4
    assert "'1-1/2'" in reason(read, 5, "Size (NPS)")
    notes = "\n".join(read.notes)
    assert "Sheet 'Line List' read. Sheets not read: 'Cover', 'Rev A' (hidden)." in notes
    assert "save as XLSX" in notes


def test_the_texts_of_an_old_workbook() -> None:
    sheet = sheet_of(FIXTURE)
    assert sheet.rows[2] == ["", "P-1001", "6", "50000", "4.5", "60", "983", "normal"]
    assert sheet.rows[4][7] == "TRUE"


@pytest.mark.parametrize(
    ("script", "words"),
    [
        ("import os; os.abort()", "limits of memory and time (status"),
        ("raise SystemExit(3)", "limits of memory and time (status 3)"),
        ("import time; time.sleep(60)", "could not be read within 0.5 s"),
        ("print('no answer')", "could not be understood"),
    ],
)
def test_a_failing_process_is_a_refusal(
    tmp_path: Path, monkeypatch: pytest.MonkeyPatch, script: str, words: str
) -> None:
    child = tmp_path / "child.py"
    child.write_text(script)
    monkeypatch.setattr(other_formats, "_CHILD", child)
    monkeypatch.setattr(other_formats, "SECONDS", 0.5)
    message = refusal(FIXTURE)
    assert words in message
    assert "XLSX" in message


def test_no_process_at_all(monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.setattr(sys, "executable", "/nowhere/python")
    assert "no process could be started" in refusal(FIXTURE)


def test_what_the_process_answers() -> None:
    found = calamine_child.read(FIXTURE.read_bytes())
    assert [sheet["name"] for sheet in found["sheets"]] == ["Cover", "Line List", "Rev A"]
    assert [sheet["visible"] for sheet in found["sheets"]] == [True, True, False]
    assert found["sheets"][1]["merged"] == [[4, 1, 5, 1]]
    assert "refused" in calamine_child.read(b"no workbook")


def test_the_process_stops_at_its_limit_of_cells(monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.setattr(calamine_child, "MOST_CELLS", 10)
    assert calamine_child.read(FIXTURE.read_bytes()) == {"refused": "more than 10 cells"}
