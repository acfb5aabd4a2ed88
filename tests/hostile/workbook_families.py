"""Families of hostile workbooks: damaged, lying, swollen, or laid out as real ones are and no reader likes.

Each family states what must come of it: the list is read, or refused, and words that the messages must then hold. The
traits were put together from what reading libraries do with such files (from memory and from trying them).
"""

from __future__ import annotations

from collections.abc import Callable

import numpy as np
from handmade_workbooks import (
    HEADERS,
    MAIN,
    OFFICE,
    ROW,
    SHEET,
    compound,
    lying,
    open_document,
    open_document_row,
    packed,
    parts_of,
    row,
    rows,
    sheet,
    styles,
    swollen,
    workbook,
)
from text_families import Expectation, Family

from checker.model import LineList

__all__ = ["groups"]


def _look_lines(*numbers: str) -> Callable[[LineList], None]:
    """Return a look at a list that must hold lines of these numbers, each with the pressure of the common row."""

    def look(listed: LineList) -> None:
        assert listed.line_number == numbers
        assert np.allclose(listed.numbers["pressure"], 551_325.0)

    return look


_ONE_LINE = _look_lines("P-1001")


def _reads(
    name: str,
    content: bytes,
    *words: str,
    suffix: str = ".xlsx",
    look: Callable[[LineList], None] | None = _ONE_LINE,
) -> Family:
    return Family(name, lambda: content, f"list{suffix}", Expectation("reads", words, look))


def _refused(name: str, content: bytes, *words: str, suffix: str = ".xlsx") -> Family:
    return Family(name, lambda: content, f"list{suffix}", Expectation("refused", words))


PLAIN = rows(HEADERS, ROW)


def sheet_names() -> list[Family]:
    """Markup, paths and signs in the name of the sheet."""
    names = ("<b>x</b>\"&'", "../../etc/passwd", "CON", "=cmd|' /C calc'!A0", "{{7*7}}", "\u202egnp.tsiL")
    return [_reads(f"sheet named {name!r}", workbook(PLAIN, name=name)) for name in names]


def swollen_containers() -> list[Family]:
    """A gigabyte of blanks in a megabyte, sizes that are not so, thousands of parts."""
    return [
        _refused("zip bomb", swollen(1 << 30), "unpacks to", "more than 600000000"),
        _refused("smaller zip bomb", swollen(1 << 27), "which no real sheet does"),
        _refused("size stated too small", lying(10), "sheet1.xml", "damaged"),
        _refused("size stated too large", lying(100_000), "sheet1.xml", "damaged"),
        _reads("two thousand parts", _with_parts({f"xl/media/i{k}.bin": b"" for k in range(2_000)})),
        _refused("six thousand parts", _with_parts({f"xl/media/i{k}.bin": b"" for k in range(6_000)}), "parts"),
    ]


def _with_parts(more: dict[str, bytes]) -> bytes:
    return packed(parts_of({"Line List": sheet(PLAIN)}) | more)


def _prefixed() -> bytes:
    """Return a workbook whose sheet writes every tag with a prefix."""
    body = sheet(PLAIN)
    for tag in ("worksheet", "sheetData", "row", "c", "v", "is", "t"):
        for mark in ("<", "</"):
            for end in (" ", ">"):
                body = body.replace(f"{mark}{tag}{end}", f"{mark}x:{tag}{end}")
    parts = parts_of({"Line List": sheet("")})
    parts[SHEET] = body.replace("xmlns=", "xmlns:x=").encode()
    return packed(parts)


def container_names() -> list[Family]:
    """Members that would be written outside, and one that comes twice."""
    parts = parts_of({"Line List": sheet(PLAIN)})
    other = sheet(rows(HEADERS, ("P-9999", *ROW[1:]))).encode()
    return [
        _reads("tags with a prefix", _prefixed()),
        _reads("members outside", packed(parts | {"../../../../tmp/escape.txt": b"x", "/absolute.txt": b"x"})),
        _refused("a sheet twice", packed([*parts.items(), (SHEET.upper(), other)]), "twice"),
        _refused("cut short", packed(parts)[:-200], "damaged"),
        _refused("no sheet in it", packed({name: part for name, part in parts.items() if name != SHEET}), "sheets"),
    ]


def links() -> list[Family]:
    """Cells from other workbooks and programs, with their stored values; a workbook with macros."""
    cells = (
        "P-1001",
        '<c r="B2"><f>[1]Sheet1!A1</f><v>6</v></c>',
        "<c r=\"C2\"><f>cmd|' /C echo'!A0</f><v>50000</v></c>",
        "<c r=\"D2\"><f>'file:///etc/[x.xlsx]S'!A1</f><v>4.5</v></c>",
        '<c r="E2"><f>[1]Flows!B2</f><v>60</v></c>',
        983,
        '<c r="G2" t="str"><f>HYPERLINK("http://example.invalid","V-101")</f><v>V-101</v></c>',
    )
    parts = parts_of({"Line List": sheet(rows(HEADERS, cells))})
    relation = f'<Relationship Id="rId8" Type="{OFFICE}/externalLink" Target="externalLinks/externalLink1.xml"/></R'
    name = "xl/_rels/workbook.xml.rels"
    parts[name] = parts[name].replace(b"</R", relation.encode())
    parts["xl/externalLinks/externalLink1.xml"] = (
        f'<externalLink xmlns="{MAIN}"><ddeLink ddeService="cmd" ddeTopic="/C echo"><ddeItems><ddeItem name="A0"/>'
        "</ddeItems></ddeLink></externalLink>"
    ).encode()
    return [
        _reads("links to other files", packed(parts), "takes 4 cells from other files", "stored values are used"),
        _reads("macros", _with_parts({"xl/vbaProject.bin": b"\xd0\xcf"}), "macros: none is run", suffix=".xlsm"),
    ]


def empty_workbooks() -> list[Family]:
    """Nothing in the file, nothing in the sheet, nothing beneath the headers."""
    return [
        _refused("no bytes", b"", "empty"),
        _refused("no rows", workbook(""), "no table found", "'Line List'"),
        _refused("headers only", workbook(rows(HEADERS)), "no lines"),
        _refused("title block only", workbook(rows(("MARROWQUAY TERMINAL",), ("Rev", "B"))), "no table found"),
        _refused("no zip", b"this is no workbook\n", "no table found"),
    ]


def hostile_xml() -> list[Family]:
    """Entities, nesting and damage in the XML of a sheet."""
    laughs = '<!DOCTYPE w [<!ENTITY a "ha"><!ENTITY b "&a;&a;&a;&a;">]>'
    outside = '<!DOCTYPE w [<!ENTITY x SYSTEM "file:///etc/hostname">]>'
    body = rows(HEADERS, ROW)
    truncated = parts_of({"Line List": sheet(body)})
    truncated[SHEET] = truncated[SHEET][: len(truncated[SHEET]) // 2]
    wide = parts_of({"Line List": sheet(body)})
    wide[SHEET] = sheet(body, prolog=laughs).replace("UTF-8", "UTF-16").encode("utf-16")
    renamed = parts_of({"Line List": sheet(body).replace('encoding="UTF-8"', 'encoding="cp037"')})
    deep = "<a>" * 5_000 + "</a>" * 5_000
    cells = "".join(f'<c n="{index}"/>' for index in range(600_000))
    return [
        _refused("entities that grow", workbook(body, prolog=laughs), "declares a document type"),
        _refused("entity from outside", workbook(body, prolog=outside), "declares a document type"),
        _refused("entities in UTF-16", packed(wide), "declares a document type"),
        _refused("unusual encoding", packed(renamed), "'cp037'"),
        _refused("nested 5000 deep", workbook(body + deep), "nests its tags"),
        _refused("XML cut short", packed(truncated), "damaged"),
        _refused("a row without end", workbook(f"{body}<row>{cells}</row>", before='<dimension ref="A1"/>'), "one row"),
    ]


def absurd_references() -> list[Family]:
    """Used ranges and references that lie."""
    blanks = "".join(f'<row r="{k}"/>' for k in range(3, 200_001))
    far = '<row r="1048576"><c r="XFD1048576"><v>1</v></c></row>'
    wide = row(2, ROW).replace("</row>", '<c r="XFD2"><v>1</v></c></row>')
    return [
        _reads("used range too large", workbook(PLAIN, before='<dimension ref="A1:XFD1048576"/>')),
        _reads("used range too small", workbook(PLAIN, before='<dimension ref="A1:B1"/>')),
        _reads("blank rows down the sheet", workbook(PLAIN + blanks)),
        _reads("blank cell in the last place", workbook(PLAIN + far.replace("<v>1</v>", ""))),
        _refused("value in the last place", workbook(PLAIN + far), "row 1048576", "beyond"),
        _refused("value in the last column", workbook(row(1, HEADERS) + wide), "row 2", "beyond 2000"),
        _refused("cell of another row", workbook(PLAIN.replace('r="C2"', 'r="C7"')), "row 2", "'C7'"),
        _refused("row twice", workbook(PLAIN + row(2, ROW)), "row 2", "twice"),
        _refused("cell twice", workbook(PLAIN.replace('r="C2"', 'r="B2"')), "row 2", "twice"),
        _reads("merged to the end", workbook(PLAIN, after='<mergeCells><mergeCell ref="A2:A1048576"/></mergeCells>')),
        _reads("merged all over", workbook(PLAIN, after='<mergeCells><mergeCell ref="A1:XFD1048576"/></mergeCells>')),
        _refused("bad merged range", workbook(PLAIN, after='<mergeCells><mergeCell ref="?"/></mergeCells>'), "damaged"),
        _refused("bad shared text", workbook(PLAIN + '<row r="3"><c r="A3" t="s"><v>9</v></c></row>'), "damaged"),
        _refused("bad style", workbook(PLAIN + '<row r="3"><c r="A3" s="99"><v>9</v></c></row>'), "damaged"),
        _refused("33000 characters", workbook(rows(HEADERS, (*ROW[:6], "x" * 33_000))), "row 2", "33000 characters"),
    ]


def _look_types(listed: LineList) -> None:
    assert listed.line_number == ("P-1001", "P-1002", "P-1003", "0600")
    given = {name: np.isfinite(listed.numbers[name]).tolist() for name in ("size", "flow_mass", "pressure", "density")}
    assert given == {
        "size": [False, True, True, True],
        "flow_mass": [True, False, False, False],
        "pressure": [True, True, True, True],
        "density": [True, False, True, True],
    }


def stored_types() -> list[Family]:
    """What a spreadsheet program stores where something else was meant."""
    style = styles(("d-mmm", False), ("0000", False), ('0.0" barg"', False), ("0%", False), ("0.0,", False))
    pieces = "<![CDATA[" + "<<<<" * 100 + "]]>"
    verbatim = PLAIN.replace("<t>normal", f"<t>{pieces}")
    odd = styles(("0", False)).replace("<border/>", '<border><x w="?"/></border>').replace("<fill>", "<fill/><fill>")
    texts = (
        ("P-1001", '<c r="B2" s="1"><v>46024</v></c>', 50000, '<c r="D2" s="3"><v>4.5</v></c>', 60, 983),
        ("P-1002", "6", '<c r="C3" s="1"><v>46208</v></c>', 4.5, "60", '<c r="F3" t="e"><v>#N/A</v></c>'),
        ("P-1003", 6, '<c r="C4"><f>C2*2</f></c>', '<c r="D4"><f>D2</f><v>4.5</v></c>', True, 983),
        ('<c r="A5" s="2"><v>600</v></c>', 6, '<c r="C5" s="5"><v>50000</v></c>', 4.567, 60, 983),
    )
    return [
        _reads(
            "types",
            workbook(rows(HEADERS, *texts), style=style),
            "'2-Jan-2026'",
            "'1-1/2'",
            "'5-Jul-2026'",
            "'5-7'",
            "'#N/A'",
            "formula without a stored value",
            "divided by a thousand",
            look=_look_types,
        ),
        _refused(
            "nothing but formulas without stored values",
            workbook(rows(HEADERS, ("P-1001", *(f'<c r="{c}2"><f>1+1</f></c>' for c in "BCDEF")))),
            "not one number",
            "formula without a stored value",
        ),
        _reads("signs of markup as they are", workbook(verbatim)),
        _reads("styles that no reader knows", workbook(PLAIN, style=odd)),
        _reads("numbers as the standard allows", workbook(rows(HEADERS, (*ROW[:2], "<c><v>5.0E4</v></c>", *ROW[3:])))),
    ]


def layouts() -> list[Family]:
    """Cover sheet, title, merged headers, units, struck and hidden rows, totals: one sheet that has them all."""
    head = ("Line No", "Size", "Flow", "Operating", None, "Density", "Remarks")
    under = (None, None, None, "Press", "Temp", None, None)
    units = (None, "NPS", "kg/h", "barg", "degC", "kg/m3", None)
    half = "<c r='B10' t='inlineStr'><is><r><rPr><strike/></rPr><t>6</t></r><r><t> 8</t></r></is></c>"
    struck = [f'<c r="{c}9" s="1" t="str"><v>{v}</v></c>' for c, v in zip("ABCDEFG", ROW, strict=True)]
    white = ('<c r="A16" s="0" t="str"><v>P-1006</v></c>', *ROW[1:])
    body = "".join(
        [
            row(1, ("PIPING LINE LIST",)),
            row(3, head), row(4, under), row(5, units), row(6, range(1, 8)),
            row(7, ("AREA 20",)),
            row(8, ROW), row(9, struck),
            row(10, ("P-1003", half, *ROW[2:])),
            row(11, ("P-1004", *ROW[1:])), row(12, (None, *ROW[1:])), row(13, (None, *ROW[1:])),
            row(14, head),
            row(15, ("P-1005", *ROW[1:]), ' hidden="1"'),
            row(16, white),
            row(17, ("TOTAL", None, 300000)),
            row(18, ("Notes:",)), row(19, ("1. All pressures are to be confirmed",)),
        ]
    )  # fmt: skip
    after = (
        '<autoFilter ref="A3:G16"/><mergeCells><mergeCell ref="A1:G1"/><mergeCell ref="D3:E3"/>'
        '<mergeCell ref="A3:A4"/><mergeCell ref="A7:G7"/><mergeCell ref="A11:A13"/></mergeCells>'
    )
    before = '<cols><col min="6" max="6" width="9" hidden="1"/></cols>'
    list_sheet = sheet(body, before=before, after=after)
    cover = sheet(rows(("MARROWQUAY TERMINAL",), ("Revision", "B", "For review")))
    sheets = {"Cover": cover, "Line List": list_sheet, "Rev A": sheet(PLAIN), "Lists": sheet(rows(("a",)))}
    states = ("visible", "visible", "hidden", "veryHidden")
    style = styles(("General", True))
    return [
        _reads(
            "everything a real sheet has",
            packed(parts_of(sheets, states=states, style=style)),
            "Sheet 'Line List' read",
            "'Cover', 'Rev A' (hidden), 'Lists' (hidden)",
            "struck through, so it is taken as deleted",
            "'6' is struck, '8' stands",
            "Hidden rows, read all the same: 15",
            "Hidden columns, read all the same: F",
            "A filter is set",
            look=_look_lines("P-1001", "P-1003", "P-1004", "P-1004", "P-1004", "P-1005", "P-1006"),
        ),
        _refused(
            "two sheets that look like the list",
            packed(parts_of({"Unit 10": sheet(PLAIN), "Unit 20": sheet(PLAIN)})),
            "2 sheets look like a line list",
            "'Unit 10' (2 rows)",
            "--sheet",
        ),
        _refused(
            "the list is hidden",
            packed(parts_of({"Cover": cover, "Line List": sheet(PLAIN)}, states=("visible", "hidden"))),
            "'Line List' (hidden)",
            "--sheet",
        ),
    ]


def other_containers() -> list[Family]:
    """Files that are not what their name says."""
    table = ",".join(HEADERS) + "\n" + ",".join(map(str, ROW)) + "\n"
    parts = parts_of({"Line List": sheet(PLAIN)})
    binary = packed(parts | {"xl/workbook.bin": b""})
    return [
        _reads("text named as a workbook", table.encode(), "the file is a text"),
        _reads("workbook named as a text", packed(parts), "is a workbook (XLSX)", suffix=".csv"),
        _reads("workbook named as an old one", packed(parts), "is a workbook (XLSX)", suffix=".xls"),
        _refused("web page named as a workbook", b"<html><table><tr><td>Line No", "web page", suffix=".xls"),
        _refused("encrypted workbook", compound("EncryptedPackage", "EncryptionInfo"), "encrypted", "password"),
        _refused("old document", compound("WordDocument"), "word-processor", suffix=".xls"),
        _refused("old workbook without content", compound("Workbook"), "not read", "XLSX", suffix=".xls"),
        _refused("binary workbook", binary, "XLSB", "save the sheet as XLSX", suffix=".xlsb"),
        _refused("document", packed({"[Content_Types].xml": b"", "word/document.xml": b""}), "DOCX"),
        _refused("zip with a list in it", packed({"list.csv": table.encode()}), "no workbook", "Unpack"),
        _refused("very old worksheet", b"\x09\x08\x10\x00\x00\x06\x05\x00" + bytes(60), "1997", suffix=".xls"),
        _refused("PDF", b"%PDF-1.7\n", "PDF"),
        _refused("gzip", b"\x1f\x8b\x08\x00", "gzip"),
    ]


def open_documents() -> list[Family]:
    """ODS workbooks: one that is sound, and those that repeat cells without end."""
    sound = open_document_row(HEADERS) + open_document_row(ROW)
    repeated = '<table:table-row table:number-rows-repeated="1048570">'
    cells = '<table:table-cell table:number-columns-repeated="16384"'
    locked = "<manifest:encryption-data/>"
    endless = f'{repeated}{cells} office:value-type="float" office:value="1"/></table:table-row>'
    return [
        _reads("ODS", open_document(sound), "save as XLSX", suffix=".ods"),
        _reads("ODS, blank to the end", open_document(f"{sound}{repeated}{cells}/></table:table-row>"), suffix=".ods"),
        _refused("ODS, endless cells", open_document(sound + endless), "not read", suffix=".ods"),
        _refused("ODS, encrypted", open_document(sound, manifest=locked), "encrypted", suffix=".ods"),
        _refused(
            "ODS, per cent",
            open_document(sound.replace('"float" office:value="983"', '"percentage" office:value="0.983"')),
            "shown in per cent",
            suffix=".ods",
        ),
        _refused("ODS, cut short", open_document(sound)[:-60], "damaged", suffix=".ods"),
    ]


def groups() -> dict[str, list[Family]]:
    """Return every family of hostile workbooks, by group; always the same bytes."""
    return {
        "workbook containers": [*swollen_containers(), *container_names(), *other_containers(), *open_documents()],
        "workbook sheets": [*hostile_xml(), *absurd_references(), *empty_workbooks()],
        "workbook cells": [*sheet_names(), *links(), *stored_types(), *layouts()],
    }
