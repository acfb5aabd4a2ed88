"""What the cells of an ODS show, read from its XML: errors, and numbers shown as something else than they are."""

from __future__ import annotations

import re
from collections.abc import Iterator
from decimal import Decimal
from typing import IO, Any, NamedTuple
from xml.etree.ElementTree import Element, XMLPullParser

from checker.intake.texts import shown
from checker.intake.workbook.rich_texts import lifted

__all__ = ["OddCell", "odd_cells"]

_TABLE = "{urn:oasis:names:tc:opendocument:xmlns:table:1.0}"
_OFFICE = "{urn:oasis:names:tc:opendocument:xmlns:office:1.0}"
_TEXT = "{urn:oasis:names:tc:opendocument:xmlns:text:1.0}"
_STYLE = "{urn:oasis:names:tc:opendocument:xmlns:style:1.0}"
_PARAGRAPH = f"{_TEXT}p"
_CELLS = (f"{_TABLE}table-cell", f"{_TABLE}covered-table-cell")
_CHUNK = 1 << 16
_ERROR = re.compile(r"#[A-Z]|Err:", re.IGNORECASE)
_TOO_NARROW = re.compile(r"#+")
_NUMBER = re.compile(r"([-\u2212(+]?)\s*(\d[\d.,'\u2019\s]*|[.,]\d+)(?:E([+-]?\d{1,3}))?\)?", re.IGNORECASE)
_FRACTION = re.compile(r"(?:(\d{1,9}) )?(\d{1,9})/(\d{1,9})")
LONGEST_COUNT = 10
LONGEST_NUMBER = 200
_COARSEST_FRACTION = Decimal("0.26")


class OddCell(NamedTuple):
    """A run of equal cells that show something else than is stored: place from 0, text, and why it is no number.

    The sentence is empty where only raised or lowered signs were made such.
    """

    row: int
    column: int
    rows: int
    columns: int
    text: str
    sentence: str


def odd_cells(stream: IO[bytes], sheet: str) -> Iterator[OddCell]:
    """Yield the cells of a sheet that store a number and show an error, other digits or a word.

    Parameters
    ----------
    stream : binary file
        The part ``content.xml``.
    sheet : str
        Name of the sheet.

    Raises
    ------
    ParseError
        If the part is no well-formed XML.
    """
    number = 0
    heights: dict[str, str] = {}
    for row in _rows(stream, sheet, heights):
        repeated = _count(row, "rows-repeated")
        yield from _odd_of_row(row, number, repeated, heights)
        number += repeated


def _rows(stream: IO[bytes], sheet: str, heights: dict[str, str]) -> Iterator[Element]:
    """Yield the rows of a sheet, one in memory at a time; tables within tables are none.

    The names of styles that raise or lower a text are put into `heights` before the first row.
    """
    parser: Any = XMLPullParser(("start", "end"))
    names: list[str | None] = []
    while chunk := stream.read(_CHUNK):
        parser.feed(chunk)
        for event, element in parser.read_events():
            if element.tag == f"{_TABLE}table":
                if event == "start":
                    names.append(element.get(f"{_TABLE}name"))
                else:
                    names.pop()
                    element.clear()
            elif event == "end" and element.tag == f"{_TABLE}table-row" and len(names) == 1:
                if names == [sheet]:
                    yield element
                element.clear()
            elif event == "end" and element.tag == f"{_STYLE}style" and not names:
                _note_height(element, heights)
    parser.close()


def _note_height(style: Element, heights: dict[str, str]) -> None:
    for properties in style.iter(f"{_STYLE}text-properties"):
        position = properties.get(f"{_STYLE}text-position", "").strip()
        name = style.get(f"{_STYLE}name")
        if name and position and not position.startswith(("0%", "0 ")):
            heights[name] = "subscript" if position.startswith(("sub", "-")) else "superscript"


def _count(element: Element, what: str) -> int:
    stated = element.get(f"{_TABLE}number-{what}", "1")
    return max(int(stated), 1) if stated.isdecimal() and len(stated) < LONGEST_COUNT else 1


def _lifted(cell: Element, heights: dict[str, str]) -> str:
    """Return the text of a cell of which a part is raised or lowered, empty where none is."""
    spans = [span for span in cell.iter(f"{_TEXT}span") if span.get(f"{_TEXT}style-name") in heights]
    for span in spans:
        text = lifted("".join(span.itertext()), heights[span.get(f"{_TEXT}style-name", "")])
        del span[:]
        span.text = text
    return "\n".join("".join(part.itertext()) for part in cell if part.tag == _PARAGRAPH) if spans else ""


def _odd_of_row(row: Element, number: int, repeated: int, heights: dict[str, str]) -> Iterator[OddCell]:
    column = 0
    for cell in row:
        if cell.tag not in _CELLS:
            continue
        columns, stored = _count(cell, "columns-repeated"), cell.get(f"{_OFFICE}value")
        if stored is None and heights:
            text = _lifted(cell, heights)
            if text:
                yield OddCell(number, column, repeated, columns, text, "")
        elif stored is not None:
            paragraphs = ["".join(part.itertext()) for part in cell if part.tag == _PARAGRAPH]
            if paragraphs and paragraphs != [stored]:
                text = "\n".join(paragraphs).strip()
                sentence = _sentence(stored, text)
                if sentence:
                    yield OddCell(number, column, repeated, columns, text, sentence)
        column += columns


def _sentence(stored: str, text: str) -> str:
    """Return why a number is not read as it is stored, empty where what is shown agrees with it."""
    if _TOO_NARROW.fullmatch(text) or agrees(stored, text):
        return ""
    if _ERROR.match(text):
        return f"the cell shows the error {shown(text)} of the spreadsheet: write the value."
    shows = f"shows {shown(text)}" if text else "shows nothing"
    return f"the cell holds {shown(stored)}, but {shows}: write the value as it is meant, in a plain format."


def agrees(stored: str, text: str) -> bool:
    """Return whether a text shows a stored number, rounded or grouped, with a point or a comma, or as a fraction."""
    try:
        return len(stored) + len(text) < LONGEST_NUMBER and _agrees(Decimal(stored), text)
    except ArithmeticError:
        return False


def _agrees(value: Decimal, text: str) -> bool:
    if not value.is_finite():
        return False
    fraction = _FRACTION.fullmatch(text.lstrip("-\u2212").strip())
    if fraction:
        whole, above, below = (Decimal(part or 0) for part in fraction.groups())
        return bool(below) and abs(abs(value) - whole - above / below) < min(_COARSEST_FRACTION, 1 / below)
    found = _NUMBER.fullmatch(text)
    if not found or (found[1] in ("-", "\u2212", "(")) != (value < 0):
        return bool(found) and not any(sign in "123456789" for sign in text) and abs(value) < 1
    return any(_shows(abs(value), found[2], mark, int(found[3] or 0)) for mark in ("", ".", ","))


def _shows(value: Decimal, body: str, mark: str, exponent: int) -> bool:
    if mark and body.count(mark) != 1:
        return False
    whole, _, part = body.partition(mark) if mark else (body, "", "")
    digits, decimals = re.sub(r"\D", "", whole), re.sub(r"\D", "", part)
    half = Decimal("0.5000001").scaleb(exponent - len(decimals))
    return abs(value - Decimal(f"{digits or 0}.{decimals or 0}").scaleb(exponent)) <= half
