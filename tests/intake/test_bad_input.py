"""Bad input: what refuses the file, what refuses a line alone, and the place named in each message."""

from __future__ import annotations

import gc
import hashlib
import itertools
from pathlib import Path

import numpy as np
import pytest
from hypothesis import HealthCheck, given, settings
from hypothesis import strategies as st
from lists import HEADER, ROW, read, write

from checker.errors import InputError
from checker.intake import read_line_list
from checker.intake import records as records_module
from checker.model import Gap

TABLE = f"{HEADER}\n{ROW}\n"


def refused(folder: Path, text: str | bytes, name: str = "list.csv") -> str:
    with pytest.raises(InputError) as caught:
        read(folder, text, name=name)
    assert caught.value.status == 2
    message = str(caught.value)
    assert message.startswith(name)
    assert message.isprintable() or "\n" in message
    return message


def test_missing_file(tmp_path: Path) -> None:
    with pytest.raises(InputError, match=r"nowhere\.csv: There is no such file"):
        read_line_list(tmp_path / "nowhere.csv")
    with pytest.raises(InputError, match="cannot be read"):
        read_line_list(tmp_path)


@pytest.mark.parametrize("content", [b"", b"\xef\xbb\xbf", b"   \r\n\t\r\n", b"\xff\xfe"])
def test_empty_file(tmp_path: Path, content: bytes) -> None:
    assert "The file is empty: no table found" in refused(tmp_path, content)


@pytest.mark.parametrize(
    "text",
    [
        ",,,\n,,,\n", "LINE LIST\nRev,A\nSheet,1 of 3\n", "P-1,6,E-102,water,50000\n", "nothing at all",
        "LINE NO         SIZE  FROM\nP-1001          6     P-101\n",
    ],
)  # fmt: skip
def test_no_table(tmp_path: Path, text: str) -> None:
    assert "no table found" in refused(tmp_path, text)


def test_header_only_is_never_in_order(tmp_path: Path) -> None:
    assert refused(tmp_path, HEADER + "\n").startswith("list.csv, row 1: no lines")
    assert "no lines" in refused(tmp_path, f"{HEADER}\n,inch,kg/h,barg,degC,kg/m3,\n")
    assert "no lines" in refused(tmp_path, f"{ROW}\n{HEADER}\n")
    assert "no lines" in refused(tmp_path, f"{HEADER}\n,,,,,,\n\nTOTAL,,50000,,,,\n")


def test_no_line_number_column(tmp_path: Path) -> None:
    message = refused(tmp_path, "title\nSize [in],Flow [kg/h],Press [barg]\n6,1,1\n")
    assert message.startswith("list.csv, row 2: no line-number column among the headers 'Size [in]', 'Flow [kg/h]'")


def test_nothing_could_be_read(tmp_path: Path) -> None:
    message = refused(tmp_path, "Line No,Flow,Press [bar]\nP-1,5,5\n")
    assert "not one number of the list could be read" in message
    assert "list.csv, row 1, column 'Flow': no unit" in message
    assert "column 'Press [bar]'" in message
    assert "gauge or absolute" in message
    assert "list.csv, row 3, column 'Press [barg]': '5 psi'" in refused(
        tmp_path, "Line No,Press [barg]\nP-1,\nP-2,5 psi\nP-3,6 psi\n"
    )
    assert "list.csv, row 2, column 'Size': the row has 4 cells" in refused(tmp_path, "Line No,Size\nP-1,6,1,2\n")


def test_rows_whose_line_number_is_a_placeholder_are_lines_of_their_own(tmp_path: Path) -> None:
    rows = ["HOLD,1", "HOLD,2", "TBC,3", "N/A,4", "-,5", "-,6", "-,", "---,-"]
    listed = read(tmp_path, "Line No,Temp [K]\n" + "\n".join(rows) + "\n")
    assert listed.line_number == ("HOLD", "HOLD", "TBC", "N/A", "-", "-")
    assert listed.line.tolist() == [0, 1, 2, 3, 4, 5]
    assert listed.number("temperature").tolist() == [1, 2, 3, 4, 5, 6]
    assert [item.line_number for item in listed.holds] == ["HOLD", "HOLD", "TBC"]
    assert [item.address.row for item in listed.unread] == [8, 9]


def test_a_row_without_a_line_number_says_how_much_is_left_unread(tmp_path: Path) -> None:
    listed = read(tmp_path, "Line No,Temp [K],rho [kg/m3]\nP-1,1,2\n,3,\n,4,-\n,5,6\n")
    reasons = [item.reason for item in listed.unread]
    assert [reason.rpartition(": ")[2].partition(";")[0] for reason in reasons] == [
        "1 value left unread",
        "1 value left unread",
        "2 values left unread",
    ]
    assert all(reason.endswith("repeat the line number there.") for reason in reasons)


@pytest.mark.parametrize(
    ("content", "words"),
    [
        (b"PK\x03\x04rest", "workbook"), (b"\xd0\xcf\x11\xe0\xa1\xb1", "old binary"), (b"%PDF-1.7", "PDF"),
        (b"\x1f\x8b\x08\x00", "gzip"), (b"<html><table>", "web page"), (b"\xef\xbb\xbf<?xml version='1.0'?>", "web page"),
        (b'{"lines": []}', "JSON"), (b'\n[ {"line": "P-1"} ]', "JSON"), (b"{\\rtf1 x", "rich-text"), (b"Rar!\x1a\x07\x00", "RAR"),
    ],
)  # fmt: skip
def test_other_containers(tmp_path: Path, content: bytes, words: str) -> None:
    message = refused(tmp_path, content)
    assert words in message
    assert "CSV" in message or "XLSX" in message


def test_content_decides_not_the_name(tmp_path: Path) -> None:
    assert read(tmp_path, TABLE, name="list.xlsx").line_number == ("P-1001",)
    assert "lock file" in refused(tmp_path, TABLE, name="~$list.csv")


# Encodings


@pytest.mark.parametrize(
    ("encoding", "note"),
    [
        ("utf-8", "Encoding UTF-8."), ("utf-8-sig", "byte-order mark"), ("utf-16", "UTF-16"), ("utf-32", "UTF-32"),
        ("cp1252", "Windows-1252"),
    ],
)  # fmt: skip
def test_encoding(tmp_path: Path, encoding: str, note: str) -> None:
    content = TABLE.replace("degC", "°C").encode(encoding)
    listed = read(tmp_path, content)
    assert any(note in text for text in listed.notes)
    assert listed.number("temperature")[0] == pytest.approx(333.15)
    assert listed.source.sha256 == hashlib.sha256(content).hexdigest()
    assert note in listed.source.form


@pytest.mark.parametrize("encoding", ["utf-16-le", "utf-16-be", "utf-32-le", "utf-32-be"])
def test_wide_encodings_without_a_mark(tmp_path: Path, encoding: str) -> None:
    listed = read(tmp_path, TABLE.replace("degC", "°C").encode(encoding))
    assert listed.number("temperature")[0] == pytest.approx(333.15)
    assert f"Encoding {encoding.upper()} without a byte-order mark, told by its NUL bytes." in listed.notes
    odd = TABLE.encode(encoding) + b"x"
    assert f"not {encoding.upper()}" in refused(tmp_path, odd)


def test_undecodable_bytes(tmp_path: Path) -> None:
    message = refused(tmp_path, TABLE.encode() + b"P-\x9d,6\n")
    assert "Byte 117 (0x9d, text row 3) is neither UTF-8 nor Windows-1252" in message or "0x9d, text row 3" in message


def test_two_marks_and_double_encoding(tmp_path: Path) -> None:
    listed = read(tmp_path, b"\xef\xbb\xbf\xef\xbb\xbf" + TABLE.encode())
    assert listed.columns[0].header == "Line No"
    assert any("second byte-order mark" in note for note in listed.notes)
    twice = TABLE.replace("degC", "°C").encode().decode("cp1252").encode()
    assert any("encoded twice" in note for note in read(tmp_path, twice).notes)


def test_nul_and_control_characters(tmp_path: Path) -> None:
    message = refused(tmp_path, f"{HEADER}\nP-1,6,1,\0,60,983,\n")
    assert "text row 2, character 9 of it" in message
    assert "text row 1, character 1 of it" in refused(tmp_path, "\0" * 512 + TABLE)
    listed = read(tmp_path, f"{HEADER}\nP-\x1b[31m,6,50\x1a,1,60,983,\x07bell\n")
    assert "\\x1a" in listed.refusals["flow_mass", 0]
    assert listed.text("remarks").text(0) == "\x07bell"


# Delimiters, quotation marks, line breaks


@pytest.mark.parametrize(("delimiter", "word"), [(",", "comma"), (";", "semicolon"), ("\t", "tab"), ("|", "pipe")])
def test_delimiter_is_found_and_said(tmp_path: Path, delimiter: str, word: str) -> None:
    listed = read(tmp_path, TABLE.replace(",", delimiter))
    assert f"Cells parted by {word}." in listed.notes
    assert listed.number("pressure")[0] == 550_000.0


def test_sep_line(tmp_path: Path) -> None:
    listed = read(tmp_path, "sep=;\r\nLine No;DN;Flow (kg/h)\r\nP-1;150;50,5\r\n")
    assert listed.number("flow_mass")[0] == pytest.approx(50.5 / 3600)
    assert listed.row.tolist() == [3]


@pytest.mark.parametrize("ending", ["\n", "\r\n", "\r", "\n\r"])
def test_line_endings(tmp_path: Path, ending: str) -> None:
    listed = read(tmp_path, f"{HEADER}\n{ROW}\n{ROW}".replace("\n", ending))
    assert listed.line_number == ("P-1001", "P-1001")


@pytest.mark.parametrize("breaker", ["\x0b", "\x0c", "\x1e"])
def test_control_breaks_do_not_merge_rows_silently(tmp_path: Path, breaker: str) -> None:
    listed = read(tmp_path, f"{HEADER}\n{ROW}{breaker}{ROW}\n{ROW}\n")
    assert len(listed.line_number) == 2
    assert listed.gap("flow_mass").tolist() == [Gap.REFUSED, Gap.GIVEN]
    assert "control character that breaks lines" in listed.refusals["flow_mass", 0]


def test_line_break_inside_a_line_number_is_joined_and_said(tmp_path: Path) -> None:
    listed = read(tmp_path, f'{HEADER}\n"P-1301-\nA1A",6,1,1,60,983,"HOLD 1\nHOLD 2"\n{ROW}\n')
    assert listed.line_number == ("P-1301- A1A", "P-1001")
    assert any("joined by one blank: rows 2" in note for note in listed.notes)
    assert listed.row.tolist() == [2, 3]
    assert len(listed.holds) == 1


def test_unclosed_quotation_mark(tmp_path: Path) -> None:
    rows = "\n".join(f'"6""-P-{number}",6,50000,4.5,60,983,' for number in range(200))
    message = refused(tmp_path, f'{HEADER}\n{ROW}\n"6-P-open,6,1,1,60,983,\n{rows}\n')
    assert message.startswith("list.csv, row 3: a quotation mark opened in this row (text row 3) is not closed")
    at_the_end = refused(tmp_path, f'{HEADER}\n{ROW}\nP-2,6,1,1,60,983,"open\n')
    assert at_the_end.startswith("list.csv, row 3: a quotation mark opened in this row")


def test_quotation_mark_that_a_later_one_closes(tmp_path: Path) -> None:
    rows = f"{ROW}\n" * 5
    message = refused(tmp_path, f'{HEADER}\n{ROW}\nP-2,6,1,1,60,983,"open\n{rows}P-3,6,1,1,60,983,shut"\n{ROW}\n')
    assert message.startswith("list.csv, row 3: a quotation mark opened in this row swallows 6 line breaks")
    many = "note\n" * 30
    assert "swallows 30 line breaks" in refused(tmp_path, f'{HEADER}\nP-2,6,1,1,60,983,"{many}"\n')


def test_inch_mark_that_is_not_doubled_refuses_its_line_alone(tmp_path: Path) -> None:
    listed = read(tmp_path, f'{HEADER}\n"6"-P-1002-A1A",6",50000,4.5,60,983,\n{ROW}\n6"-P-3,6",1,1,60,983,\n')
    assert listed.row.tolist() == [2, 3, 4]
    assert listed.gap("flow_mass").tolist() == [Gap.REFUSED, Gap.GIVEN, Gap.GIVEN]
    assert "quotation marks contradict each other" in listed.refusals["flow_mass", 0]
    assert listed.line_number[2] == '6"-P-3'
    assert [item.address.row for item in listed.unread] == [2]


def test_damaged_header(tmp_path: Path) -> None:
    message = refused(tmp_path, 'Line No,"Size" NPS,Flow [kg/h],Press [barg]\nP-1,6,1,1\n')
    assert message.startswith("list.csv, row 1: quotation marks contradict each other")


# Rows


def test_ragged_rows(tmp_path: Path) -> None:
    rows = [
        ROW, "P-short,6", f"{ROW},extra,extra2", "", '""', ",,,,,,", ",,,,,,,,,,,,,,", "P-77",
        "NOTES: 1. HOLD on this line", 'P-2,6,"50,000",4.5,60,983', f"{ROW}unquoted, comma in remark", ",6,1,1,60,983,no number",
        "TOTAL,,100000,,,,", "Line No,Size (NPS),Flow [kg/h],Oper Press [barg],Oper Temp [degC],Density [kg/m3],Remarks",
        "Page 3 of 12", f"{ROW},,,", "-,6,1,1,60,983,",
    ]  # fmt: skip
    listed = read(tmp_path, "\n".join([HEADER, *rows]) + "\n")
    assert listed.row.tolist() == [2, 3, 4, 9, 11, 12, 17, 18]
    assert listed.gap("density").tolist() == [0, Gap.BLANK, Gap.REFUSED, Gap.BLANK, 0, Gap.REFUSED, 0, 0]
    assert (
        "the row has 9 cells where the header has 7 columns (cell 8 and on: 'extra')" in listed.refusals["density", 2]
    )
    assert listed.refusals["density", 2].startswith("list.csv, row 4, column 'Density [kg/m3]': ")
    assert listed.number("flow_mass")[4] == pytest.approx(50_000.0 / 3600.0)
    assert any(note.startswith("Rows shorter than the header, the rest taken as blank: 3, 9") for note in listed.notes)
    unread = {item.address.row: item.reason for item in listed.unread}
    assert sorted(unread) == [4, 10, 12, 13, 14, 15, 16]
    assert "is not checked: 6 values left unread; " in unread[13]
    for row, words in (
        (10, "note"),
        (13, "no line number"),
        (14, "total"),
        (15, "repeats the header"),
        (16, "foot of a page"),
    ):
        assert words in unread[row]
        assert f"Row {row}" in unread[row]


def test_rows_in_an_odd_list_keep_their_row_numbers(tmp_path: Path) -> None:
    text = (
        "title,,\n\n"
        + "Line No,T [K],rho [kg/m3]\n"
        + "".join(f"\nP-{index},{index},998\n" for index in range(1, 1200))
    )
    listed = read(tmp_path, text)
    assert len(listed.line_number) == 1199
    assert listed.number("temperature").tolist() == [float(index) for index in range(1, 1200)]
    assert listed.row.tolist() == list(range(5, 5 + 2 * 1199, 2))
    assert listed.cell("temperature", 1100) == "1101"


# Caps


def test_caps(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    wide = ",".join(["Line No", "T [K]", *(f"x{index}" for index in range(2_000))])
    assert "the row has 2002 columns, more than 2000" in refused(tmp_path, f"{wide}\nP-1,300\n")
    long_cell = refused(tmp_path, f"{HEADER}\nP-1,6,1,1,60,983,{'x' * 40_000}\n")
    assert long_cell.startswith("list.csv, row 2: cell 7 has 40000 characters, more than 32767: 'xxx")
    assert len(long_cell) < 300
    assert "longer than 32767" in refused(tmp_path, f"{HEADER}\nP-1,6,1,1,60,983,{'x' * 10_000_000}\n")
    monkeypatch.setattr(records_module, "MOST_ROWS", 1000)
    assert "more than 1000 rows" in refused(tmp_path, f"{HEADER}\n" + f"{ROW}\n" * 1100)
    monkeypatch.setattr("checker.intake.decoding.MAXIMUM_BYTES", 100)
    assert "larger than 100 bytes" in refused(tmp_path, TABLE * 10)


def test_the_file_is_never_changed_and_the_collector_is_left_as_it_was(tmp_path: Path) -> None:
    path = write(tmp_path, TABLE)
    before = (path.read_bytes(), path.stat().st_mtime_ns)
    gc.enable()
    read_line_list(path)
    assert gc.isenabled()
    assert (path.read_bytes(), path.stat().st_mtime_ns) == before
    gc.disable()
    try:
        read_line_list(path)
        assert not gc.isenabled()
    finally:
        gc.enable()


def test_formulas_are_texts(tmp_path: Path) -> None:
    cells = ["=1+1", "@SUM(1+1)", "+1+1", "-1+1", "\t=1+1", '=HYPERLINK("x")', "=cmd|' /C echo'!A0"]
    rows = "".join(f'"{cell.replace(chr(34), chr(34) * 2)}",6,50000,4.5,60,983,x\n' for cell in cells)
    listed = read(tmp_path, f"{HEADER}\n{rows}")
    assert listed.line_number == tuple(cell.strip() for cell in cells)
    assert (listed.number("flow_mass") == 50000 / 3600).all()


@settings(max_examples=60, deadline=None, suppress_health_check=[HealthCheck.function_scoped_fixture])
@given(st.binary(max_size=300))
def test_any_bytes_read_or_refuse(tmp_path: Path, content: bytes) -> None:
    for head in (b"", f"{HEADER}\n{ROW}\n".encode()):
        try:
            listed = read(tmp_path, head + content)
        except InputError:
            continue
        assert listed.line_cases > 0
        for name, values in listed.numbers.items():
            assert np.array_equal(np.isfinite(values), listed.gaps[name] == Gap.GIVEN)


def test_every_refused_value_has_its_sentence(tmp_path: Path) -> None:
    odd = ["", "HOLD", "N/A", "5-7", "1 furlong", "<5", "x", "12", "1e400", "-5"]
    header = "Line No,Flow Min [kg/h],Flow Max [m],Press [bar],Temp,DP [bar],Phase,Size"
    rows = "".join(
        f"P-{number},{','.join(cells)}\n"
        for number, cells in enumerate(itertools.product(odd, odd[:4], ["4"], odd, ["1"], ["L", "S"], ["6"]))
    )
    listed = read(tmp_path, header + "\n" + rows)
    expected = {
        (name, int(index)) for name, gaps in listed.gaps.items() for index in np.flatnonzero(gaps == Gap.REFUSED)
    }
    assert set(listed.refusals) == expected
    assert all(sentence.startswith("list.csv") for sentence in listed.refusals.values())
    for name, gaps in listed.gaps.items():
        given = gaps == Gap.GIVEN
        if name in listed.numbers:
            assert np.array_equal(np.isfinite(listed.numbers[name]), given)
        else:
            assert np.array_equal(listed.texts[name].codes >= 0, given)


@pytest.mark.parametrize(
    ("header", "row", "words"),
    [
        ("Line No,Size (NPS),Phase,Op press, barg,Flow (kg/h),Temp (C)", "P-1,6,L,5,1000,40", "'Op press' and ' barg'"),
        ("Line No,Size (NPS),Phase,Op press,barg,Flow (kg/h),Temp (C)", "P-1,6,L,5,1000,40", "'Op press' and 'barg'"),
        ("Line No,Op press (barg), normal,Temp (C),Design temp (C)", "P-1,5,40,80", "'Op press (barg)' and ' normal'"),
        ("Line No,From, To,Flow (kg/h),Temp (C)", "P-1,V-1 to V-2,10,40", "'From' and ' To'"),
        ("Line No,From,To,Flow (kg/h),Temp (C)", "P-1,V-1 to V-2,10,40", "'From' and 'To'"),
    ],
)
def test_a_delimiter_that_stands_unquoted_in_the_header_refuses_the_file(
    tmp_path: Path, header: str, row: str, words: str
) -> None:
    with pytest.raises(InputError) as refusal:
        read(tmp_path, f"{header}\n{row}\n{row.replace('P-1', 'P-2')}\n")
    cells = header.count(",") + 1
    assert f"the header row has {cells} cells and the rows have {cells - 1}: the cells {words}" in str(refusal.value)


def test_columns_trimmed_in_every_row_are_read_and_asked_about(tmp_path: Path) -> None:
    listed = read(tmp_path, "Line No,Size (NPS),Flow (kg/h),Temp (C),Remarks\nP-1,6,1000,40\nP-2,8,2000,50\n")
    assert listed.number("flow_mass").tolist() == pytest.approx([1000 / 3600, 2000 / 3600])
    (item,) = listed.unread
    assert "nearly all rows have 4 cells where the header has 5 (rows 2, 3)" in item.reason
    assert "put that header in quotation marks" in item.reason


def test_some_short_rows_are_only_noted(tmp_path: Path) -> None:
    listed = read(tmp_path, "Line No,Flow (kg/h),Temp (C),Remarks\nP-1,1000,40\nP-2,2000,50,x\n")
    assert not listed.unread
    assert any("Rows shorter than the header" in note for note in listed.notes)


@pytest.mark.parametrize("group", ["000", "050"])
def test_a_comma_between_thousands_that_moves_a_full_row_refuses_it(tmp_path: Path, group: str) -> None:
    header = "Line No,Size (NPS),Phase,Flow (kg/h),Press (barg),Temp (C)"
    listed = read(tmp_path, f"{header}\nP-1,6,L,1,{group},5\nP-2,6,L,1000,5,40\n")
    assert listed.gap("flow_mass").tolist() == [Gap.REFUSED, Gap.GIVEN]
    assert f"may be one number with a comma between its thousands (1,{group})" in listed.refusals["temperature", 0]


@pytest.mark.parametrize("cell", ["000", " 00 ", "0000"])
def test_noughts_alone_are_no_zero(tmp_path: Path, cell: str) -> None:
    listed = read(tmp_path, f"Line No;Flow (kg/h);Temp (C)\nP-1;10;{cell}\nP-2;10;0\n")
    assert listed.gap("temperature").tolist() == [Gap.REFUSED, Gap.GIVEN]
    assert "write 0, or the whole number" in listed.refusals["temperature", 0]


@pytest.mark.parametrize(("cells", "asked"), [(("5 barg", "6 barg"), False), (("5 barg", "6"), True)])
def test_a_header_without_a_unit_is_asked_about_only_for_a_bare_number(
    tmp_path: Path, cells: tuple[str, ...], asked: bool
) -> None:
    rows = "".join(f"P-{index},10,{cell}\n" for index, cell in enumerate(cells))
    listed = read(tmp_path, f"Line No,Flow (kg/h),Press\n{rows}")
    assert any("no unit" in item.reason for item in listed.unread) is asked


def test_refused_cells_leave_nothing_behind_that_only_the_collector_could_free(tmp_path: Path) -> None:
    rows = "".join(f"P-{index},10,{index} to x{index}\n" for index in range(300))
    path = write(tmp_path, f"Line No,Flow (kg/h),Press (barg)\n{rows}")
    gc.collect()
    gc.disable()
    try:
        listed = read_line_list(path)
        freed = gc.collect()
    finally:
        gc.enable()
    assert (listed.gap("pressure") == Gap.REFUSED).all()
    assert freed < 300
