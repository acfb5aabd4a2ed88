"""Numbers of ODS and XLS that are shown as something else than they are stored."""

from __future__ import annotations

import zipfile
from collections.abc import Sequence
from pathlib import Path
from xml.sax.saxutils import escape

import pytest
from books import HEADERS, given, reason

from checker.intake import read_line_list
from checker.intake.workbook.open_document import agrees
from checker.intake.workbook.per_cent import refuse_per_cent
from checker.intake.workbook.raw import RawSheet

_SPACES = " ".join(
    f'xmlns:{name}="urn:oasis:names:tc:opendocument:xmlns:{name}:1.0"' for name in ("office", "table", "text")
)
_STYLE = "urn:oasis:names:tc:opendocument:xmlns:style:1.0"
_KIND = "application/vnd.oasis.opendocument.spreadsheet"


def cell(value: str | tuple[str, str | None], repeated: int = 1) -> str:
    """Return a cell: a text, or a stored number and what is shown of it."""
    run = f' table:number-columns-repeated="{repeated}"' if repeated > 1 else ""
    if isinstance(value, str):
        return f'<table:table-cell office:value-type="string"{run}><text:p>{escape(value)}</text:p></table:table-cell>'
    stored, text = value
    inside = "" if text is None else f"<text:p>{escape(text)}</text:p>"
    return f'<table:table-cell office:value-type="float" office:value="{stored}"{run}>{inside}</table:table-cell>'


def document(folder: Path, rows: Sequence[str]) -> Path:
    """Write an ODS of one sheet from the XML of the cells of its rows."""
    lines = "".join(f"<table:table-row>{row}</table:table-row>" for row in ("".join(map(cell, HEADERS)), *rows))
    sheet = f'<table:table table:name="Line List">{lines}</table:table>'
    content = f"<office:body><office:spreadsheet>{sheet}</office:spreadsheet></office:body>"
    path = folder / "list.ods"
    with zipfile.ZipFile(path, "w") as archive:
        archive.writestr("mimetype", _KIND)
        archive.writestr(
            "META-INF/manifest.xml",
            '<manifest:manifest xmlns:manifest="urn:oasis:names:tc:opendocument:xmlns:manifest:1.0">'
            f'<manifest:file-entry manifest:full-path="/" manifest:media-type="{_KIND}"/></manifest:manifest>',
        )
        archive.writestr("content.xml", f"<office:document-content {_SPACES}>{content}</office:document-content>")
    return path


@pytest.mark.parametrize(
    ("shown", "words"),
    [
        ("#DIV/0!", "shows the error '#DIV/0!'"),
        ("Err:502", "shows the error 'Err:502'"),
        ("40 degF", "shows '40 degF'"),
        ("40/60", "shows '40/60'"),
        ("400", "shows '400'"),
        ("-", "shows '-'"),
        ("", "shows nothing"),
        ("40", ""),
        ("40.00", ""),
        ("40,0", ""),
        ("4.0E+01", ""),
        ("###", ""),
        (None, ""),
    ],
)
def test_what_an_open_document_shows(tmp_path: Path, shown: str | None, words: str) -> None:
    row = "".join(map(cell, ("P-1001", ("6", "6"), ("50000", "50,000"), ("4.5", "4.5"), ("40", shown), ("983", "983"))))
    read = read_line_list(document(tmp_path, [row, row.replace("P-1001", "P-1002")]))
    assert given(read, "flow_mass") == [pytest.approx(50000 / 3600)] * 2
    assert given(read, "temperature") == [None if words else pytest.approx(313.15)] * 2
    assert words in reason(read, 2, "Oper Temp [degC]")


def test_raised_digits_of_an_open_document_are_no_part_of_a_number(tmp_path: Path) -> None:
    row = "".join(map(cell, ("P-1001", ("6", "6"), "50000", "5@2~", "60", "983")))
    path = document(tmp_path, [row])
    with zipfile.ZipFile(path) as archive:
        parts = {name: archive.read(name) for name in archive.namelist()}
    styles = (
        f'<office:automatic-styles xmlns:style="{_STYLE}"><style:style style:name="T1" style:family="text">'
        '<style:text-properties style:text-position="super 58%"/></style:style></office:automatic-styles><office:body>'
    )
    content = parts["content.xml"].decode().replace("<office:body>", styles)
    parts["content.xml"] = (
        content.replace("@", '<text:span text:style-name="T1">').replace("~", "</text:span>").encode()
    )
    with zipfile.ZipFile(path, "w") as archive:
        for name, part in parts.items():
            archive.writestr(name, part)
    assert given(read_line_list(path), "pressure") == [pytest.approx(601_325.0)]


def test_runs_of_equal_cells_are_marked_whole(tmp_path: Path) -> None:
    rows = [f"{cell(name)}{cell(('6', '6'))}{cell(('5', '5 x'), 3)}{cell(('983', '983'))}" for name in ("P-1", "P-2")]
    read = read_line_list(document(tmp_path, rows))
    for field in ("flow_mass", "pressure", "temperature"):
        assert given(read, field) == [None, None]
    assert given(read, "density") == [pytest.approx(983.0)] * 2


@pytest.mark.parametrize(
    ("stored", "text", "same"),
    [
        ("1234567.891", "1,234,567.89", True), ("1234567.891", "1.234.567,89", True), ("1234.5", "1 235", True),
        ("-40", "-40", True), ("-40", "(40)", True), ("-40", "40", False), ("40", "-40", False),
        ("1000000", "1,000", False), ("1", "1,000", True), ("0.5", "50", False), ("1.5", "1 1/2", True),
        ("0.333", "1/3", True), ("40", "40/60", False), ("0.5", "500E-3", True), ("-0.001", "0.0", True),
        ("nan", "nan", False), ("1e999999", "1", False), ("5", "5 psig", False), ("5", "5/0", False),
    ],
)  # fmt: skip
def test_a_shown_number_agrees_with_the_stored_one(stored: str, text: str, same: bool) -> None:
    assert agrees(stored, text) == same


def test_numbers_of_a_column_in_per_cent_are_asked_about_where_formats_are_unseen() -> None:
    rows = [["Line No", "Vapour fraction (%)", "Flow"], ["", "", "t/h"], ["P-1", "0.5", "7"], ["P-2", "0", "8"]]
    rows += [["P-3", "50%", "9"], ["P-4"]]
    raw = RawSheet(rows=rows)
    refuse_per_cent(raw, 0, 2, 3)
    assert list(raw.no_numbers) == [(2, 1)]
    assert "save as XLSX" in raw.no_numbers[2, 1]
