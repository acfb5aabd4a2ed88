"""Workbooks written part by part, so that they can say what no spreadsheet program would write."""

from __future__ import annotations

import io
import struct
import zipfile
import zlib
from collections.abc import Iterable, Mapping, Sequence
from xml.sax.saxutils import escape, quoteattr

HEADERS = (
    "Line No", "Size (NPS)", "Flow [kg/h]", "Oper Press [barg]", "Oper Temp [degC]", "Density [kg/m3]", "Remarks",
)  # fmt: skip
ROW = ("P-1001", 6, 50000, 4.5, 60, 983, "normal")
DECLARATION = '<?xml version="1.0" encoding="UTF-8" standalone="yes"?>\n'
MAIN = "http://schemas.openxmlformats.org/spreadsheetml/2006/main"
OFFICE = "http://schemas.openxmlformats.org/officeDocument/2006/relationships"
PACKAGE = "http://schemas.openxmlformats.org/package/2006"
SHEET = "xl/worksheets/sheet1.xml"
_TYPE = "application/vnd.openxmlformats-officedocument.spreadsheetml"
_ODS = "urn:oasis:names:tc:opendocument:xmlns"


def letters(column: int) -> str:
    """Return the letters of a column counted from 1."""
    text = ""
    while column:
        column, rest = divmod(column - 1, 26)
        text = chr(65 + rest) + text
    return text


def cell(reference: str, value: object) -> str:
    """Return the XML of one cell; a text that begins with ``<c`` is taken as it is."""
    if isinstance(value, str) and value.startswith("<c"):
        return value
    if value is None:
        return ""
    if isinstance(value, bool):
        return f'<c r="{reference}" t="b"><v>{int(value)}</v></c>'
    if isinstance(value, int | float):
        return f'<c r="{reference}"><v>{value!r}</v></c>'
    return f'<c r="{reference}" t="inlineStr"><is><t>{escape(str(value))}</t></is></c>'


def row(number: int, values: Sequence[object], attributes: str = "") -> str:
    """Return the XML of one row."""
    cells = "".join(cell(f"{letters(column)}{number}", value) for column, value in enumerate(values, 1))
    return f'<row r="{number}"{attributes}>{cells}</row>'


def rows(*lists: Sequence[object]) -> str:
    """Return the XML of rows from row 1 on."""
    return "".join(row(number, values) for number, values in enumerate(lists, 1))


def sheet(body: str, *, before: str = "", after: str = "", prolog: str = "") -> str:
    """Return the XML of a sheet."""
    return (
        f'{DECLARATION}{prolog}<worksheet xmlns="{MAIN}" xmlns:r="{OFFICE}">{before}<sheetData>{body}</sheetData>'
        f"{after}</worksheet>"
    )


def styles(*cells: tuple[str, bool]) -> str:
    """Return the XML of styles 1, 2 ...: a number format, and whether the font is struck through; style 0 is plain."""
    formats = "".join(
        f'<numFmt numFmtId="{164 + index}" formatCode={quoteattr(code)}/>' for index, (code, _) in enumerate(cells)
    )
    used = "".join(
        f'<xf numFmtId="{164 + index}" fontId="{int(struck)}" fillId="0" borderId="0" xfId="0"/>'
        for index, (_, struck) in enumerate(cells)
    )
    return (
        f'{DECLARATION}<styleSheet xmlns="{MAIN}"><numFmts count="{len(cells)}">{formats}</numFmts>'
        '<fonts count="2"><font/><font><strike/></font></fonts>'
        '<fills count="1"><fill><patternFill patternType="none"/></fill></fills>'
        '<borders count="1"><border/></borders><cellStyleXfs count="1"><xf/></cellStyleXfs>'
        f'<cellXfs count="{len(cells) + 1}"><xf numFmtId="0" fontId="0" fillId="0" borderId="0" xfId="0"/>{used}'
        "</cellXfs></styleSheet>"
    )


def parts_of(sheets: Mapping[str, str], *, states: Sequence[str] = (), style: str = "") -> dict[str, bytes]:
    """Return the parts of a workbook with these sheets: name to XML."""
    count = range(1, len(sheets) + 1)
    overrides = "".join(
        f'<Override PartName="/xl/worksheets/sheet{k}.xml" ContentType="{_TYPE}.worksheet+xml"/>' for k in count
    )
    shown = [*states, *["visible"] * len(sheets)]
    named = "".join(
        f'<sheet name={quoteattr(name)} sheetId="{k}" state="{shown[k - 1]}" r:id="rId{k}"/>'
        for k, name in enumerate(sheets, 1)
    )
    relations = "".join(
        f'<Relationship Id="rId{k}" Type="{OFFICE}/worksheet" Target="worksheets/sheet{k}.xml"/>' for k in count
    )
    if style:
        overrides += f'<Override PartName="/xl/styles.xml" ContentType="{_TYPE}.styles+xml"/>'
        relations += f'<Relationship Id="rId900" Type="{OFFICE}/styles" Target="styles.xml"/>'
    parts = {
        "[Content_Types].xml": f'{DECLARATION}<Types xmlns="{PACKAGE}/content-types"><Default Extension="rels" '
        'ContentType="application/vnd.openxmlformats-package.relationships+xml"/><Default Extension="xml" '
        'ContentType="application/xml"/><Override PartName="/xl/workbook.xml" '
        f'ContentType="{_TYPE}.sheet.main+xml"/>{overrides}</Types>',
        "_rels/.rels": f'{DECLARATION}<Relationships xmlns="{PACKAGE}/relationships"><Relationship Id="rId1" '
        f'Type="{OFFICE}/officeDocument" Target="xl/workbook.xml"/></Relationships>',
        "xl/workbook.xml": f'{DECLARATION}<workbook xmlns="{MAIN}" xmlns:r="{OFFICE}"><sheets>{named}</sheets>'
        "</workbook>",
        "xl/_rels/workbook.xml.rels": f'{DECLARATION}<Relationships xmlns="{PACKAGE}/relationships">{relations}'
        "</Relationships>",
    }
    if style:
        parts["xl/styles.xml"] = style
    parts |= {f"xl/worksheets/sheet{k}.xml": xml for k, xml in enumerate(sheets.values(), 1)}
    return {name: text.encode() for name, text in parts.items()}


def packed(parts: Mapping[str, bytes] | Iterable[tuple[str, bytes]]) -> bytes:
    """Return parts as a zip container; always the same bytes."""
    pairs = parts.items() if isinstance(parts, Mapping) else parts
    buffer = io.BytesIO()
    with zipfile.ZipFile(buffer, "w") as archive:
        for name, content in pairs:
            member = zipfile.ZipInfo(name)
            member.compress_type = zipfile.ZIP_STORED if name == "mimetype" else zipfile.ZIP_DEFLATED
            archive.writestr(member, content)
    return buffer.getvalue()


def workbook(body: str, *, name: str = "Line List", style: str = "", **of_sheet: str) -> bytes:
    """Return an XLSX workbook of one sheet."""
    return packed(parts_of({name: sheet(body, **of_sheet)}, style=style))


def swollen(size: int) -> bytes:
    """Return a workbook whose sheet unpacks to so many blanks: a zip bomb, made without writing it out."""
    chunk = 1 << 20
    press = zlib.compressobj(9, zlib.DEFLATED, -15)
    piece = press.compress(b" " * chunk) + press.flush(zlib.Z_FULL_FLUSH)
    count, checksum = size // chunk, 0
    for _ in range(count):
        checksum = zlib.crc32(b" " * chunk, checksum)
    data = piece * count + press.flush(zlib.Z_FINISH)
    return _with_member(packed(_without_sheet()), SHEET, data, checksum, count * chunk)


def lying(declared: int) -> bytes:
    """Return a workbook whose sheet states another size than it has."""
    content = parts_of({"Line List": sheet(rows(HEADERS, ROW))})[SHEET]
    press = zlib.compressobj(9, zlib.DEFLATED, -15)
    data = press.compress(content) + press.flush()
    return _with_member(packed(_without_sheet()), SHEET, data, zlib.crc32(content), declared)


def _without_sheet() -> dict[str, bytes]:
    return {name: content for name, content in parts_of({"Line List": ""}).items() if name != SHEET}


def _with_member(archive: bytes, name: str, data: bytes, checksum: int, size: int) -> bytes:
    """Return a zip container with one more member, its checksum and size as given (APPNOTE.TXT, 4.3.7 and 4.3.12)."""
    end = archive.rindex(b"PK\x05\x06")
    count, length, offset = struct.unpack("<HLL", archive[end + 10 : end + 20])
    fields = struct.pack("<HHHHHLLLHH", 20, 0, 8, 0, 33, checksum, len(data), size, len(name), 0)
    local = b"PK\x03\x04" + fields + name.encode() + data
    central = b"PK\x01\x02" + struct.pack("<H", 20) + fields + struct.pack("<HHHLL", 0, 0, 0, 0, offset) + name.encode()
    directory = archive[offset : offset + length] + central
    tail = struct.pack("<HHHHLLH", 0, 0, count + 1, count + 1, len(directory), offset + len(local), 0)
    return archive[:offset] + local + directory + b"PK\x05\x06" + tail


def open_document(body: str, *, manifest: str = "") -> bytes:
    """Return an ODS workbook of one sheet from the XML of its rows."""
    content = (
        f'{DECLARATION}<office:document-content xmlns:office="{_ODS}:office:1.0" xmlns:table="{_ODS}:table:1.0" '
        f'xmlns:text="{_ODS}:text:1.0" office:version="1.2"><office:body><office:spreadsheet><table:table '
        f'table:name="Line List">{body}</table:table></office:spreadsheet></office:body></office:document-content>'
    )
    listed = f'{DECLARATION}<manifest:manifest xmlns:manifest="{_ODS}:manifest:1.0">{manifest}</manifest:manifest>'
    return packed(
        {
            "mimetype": b"application/vnd.oasis.opendocument.spreadsheet",
            "content.xml": content.encode(),
            "META-INF/manifest.xml": listed.encode(),
        }
    )


def open_document_row(values: Sequence[object], attributes: str = "") -> str:
    """Return the XML of one row of an ODS sheet."""
    return f"<table:table-row{attributes}>{''.join(map(_open_document_cell, values))}</table:table-row>"


def _open_document_cell(value: object) -> str:
    if value is None:
        return "<table:table-cell/>"
    text = f"<text:p>{escape(str(value))}</text:p></table:table-cell>"
    if isinstance(value, int | float):
        return f'<table:table-cell office:value-type="float" office:value="{value}">{text}'
    return f'<table:table-cell office:value-type="string">{text}'


def compound(*streams: str) -> bytes:
    """Return the first sectors of an OLE compound file with streams of these names, enough to tell what it is."""
    head = b"\xd0\xcf\x11\xe0\xa1\xb1\x1a\xe1".ljust(512, b"\0")
    return head + b"".join(name.encode("utf-16-le").ljust(128, b"\0") for name in ("Root Entry", *streams))
