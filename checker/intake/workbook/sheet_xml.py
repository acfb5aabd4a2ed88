"""One pass over the XML of a sheet: cells as texts, and what openpyxl's read-only mode leaves out.

That mode drops merged ranges, hidden rows and columns, formulas without a stored value and pieces of texts written in
the cell, and leaves out rows that come twice; so openpyxl gives the sheets and the shared texts, and the cells are
taken here, row by row, as they are parsed.
"""

from __future__ import annotations

import datetime as dt
import re
from collections.abc import Callable, Iterator, Mapping, Sequence
from typing import IO, Any
from xml.etree.ElementTree import Element, XMLPullParser

from checker.intake.records import LONGEST_CELL, MOST_COLUMNS, MOST_ROWS
from checker.intake.texts import shown
from checker.intake.workbook import limits
from checker.intake.workbook.cell_texts import (
    MOST_FIGURES,
    as_date,
    beyond_figures,
    date_sentence,
    date_text,
    figures_sentence,
    number_text,
    odd_sentence,
    styled_text,
)
from checker.intake.workbook.number_formats import ODD_KINDS, PLAIN, Style
from checker.intake.workbook.package import refuse
from checker.intake.workbook.raw import BLANK, HEAD, Merged, RawSheet
from checker.intake.workbook.rich_texts import NAMESPACE, Rich, inline_text

__all__ = ["SheetReader"]

_ROW, _VALUE, _FORMULA, _INLINE = (NAMESPACE + tag for tag in ("row", "v", "f", "is"))
_COLUMN, _MERGED, _FILTER = (NAMESPACE + tag for tag in ("col", "mergeCell", "autoFilter"))
_DIGITS = "0123456789"
_CHUNK = 1 << 16
_NUMERIC = (None, "n")
_TRUE = ("1", "true")
_ELSEWHERE = re.compile(r"\[\d+\]|\[[^\]]+\.xl\w*\]|\|.*!|file://|\\\\", re.IGNORECASE)
_ANEW = "Open it in a spreadsheet program and save it anew as XLSX."
_FEWER = "Delete what stands outside the table, or copy the table to a sheet of its own."


class _Columns(dict[str, int]):
    """Column (from 0) by its letters."""

    def __missing__(self, letters: str) -> int:
        from openpyxl.utils import column_index_from_string

        index = self[letters] = column_index_from_string(letters) - 1
        return index


class SheetReader:
    """Reads the XML of one sheet.

    Parameters
    ----------
    file : str
        Workbook and sheet, for messages.
    texts : sequence of str or Rich
        Shared texts of the workbook.
    styles : mapping of str or None to Style
        Style by the number that cells carry.
    epoch : datetime
        Day 0 of the workbook's dates.
    """

    def __init__(
        self, file: str, texts: Sequence[str | Rich], styles: Mapping[str | None, Style], epoch: dt.datetime
    ) -> None:
        self._file = file
        self._texts = texts
        self._styles = styles
        self._epoch = epoch
        self._columns = _Columns()
        self._sheet = RawSheet()
        self._last = -1

    def read(self, stream: IO[bytes], *, most_rows: int = 0) -> RawSheet:
        """Return the sheet; with `most_rows` only about as many of its first rows.

        Raises
        ------
        InputError
            If the sheet is too large, its rows come out of order, or a cell says that it stands elsewhere.
        """
        takers: dict[str, Callable[[Element], None]] = {
            _ROW: self._take_row,
            _COLUMN: self._take_column,
            _MERGED: self._take_merged,
            _FILTER: self._take_filter,
        }
        for element in self._elements(stream, takers):
            takers[element.tag](element)
            if most_rows and self._last + 1 >= most_rows:
                break
        return self._sheet

    def _elements(self, stream: IO[bytes], wanted: Mapping[str, Any]) -> Iterator[Element]:
        """Yield the elements that matter, while only some pieces of the XML are in memory."""
        parser: Any = XMLPullParser(("end",))
        since_row = 0
        while chunk := stream.read(_CHUNK):
            parser.feed(chunk)
            since_row += len(chunk)
            for _, element in parser.read_events():
                if element.tag in wanted:
                    yield element
                    since_row = 0
            if since_row > limits.LARGEST_ROW:
                what = f"the XML of one row (after row {self._last + 1}) takes more than {limits.LARGEST_ROW} bytes."
                raise refuse(self._file, what, _ANEW)
        parser.close()

    def _take_row(self, element: Element) -> None:
        stated = element.get("r")
        number = int(stated) - 1 if stated else self._last + 1
        if number <= self._last:
            what = f"row {number + 1} is written twice or out of order, so the sheet has two readings."
            raise refuse(self._file, what, _ANEW)
        self._last = number
        cells, hidden = self._cells(element, number), element.get("hidden") in _TRUE
        element.clear()
        if not cells:
            return
        rows = self._sheet.rows
        if number >= MOST_ROWS:
            raise refuse(
                self._file, f"a cell is written beyond row {MOST_ROWS}: {shown(cells[-1])}.", _FEWER, number + 1
            )
        if number > len(rows):
            rows.extend([BLANK] * (number - len(rows)))
        rows.append(cells)
        if hidden:
            self._sheet.hidden_rows.add(number)

    def _cells(self, row: Element, number: int) -> list[str]:
        texts, styles, columns, label = self._texts, self._styles, self._columns, str(number + 1)
        cells: list[str] = []
        column = -1
        for cell in row:
            reference = cell.get("r")
            if reference is None:
                column += 1
            else:
                letters = reference.rstrip(_DIGITS)
                if reference[len(letters) :] != label:
                    raise refuse(self._file, f"a cell in this row says it is {shown(reference)}.", _ANEW, number + 1)
                column = columns[letters]
            if not len(cell):
                continue
            stored, kind, style = cell.findtext(_VALUE), cell.get("t"), styles[cell.get("s")]
            if style is not PLAIN or not stored or len(cell) > 1:
                text = self._odd(cell, kind, stored, style, (number, column))
            elif kind == "s":
                shared = texts[int(stored)]
                text = shared if type(shared) is str else self._odd(cell, kind, stored, style, (number, column))
            elif kind in _NUMERIC and len(stored) <= MOST_FIGURES and "+" not in stored:
                text = number_text(stored)
            else:
                text = self._odd(cell, kind, stored, style, (number, column))
            if text:
                if column != len(cells) or column >= MOST_COLUMNS or len(text) > LONGEST_CELL:
                    self._make_room(cells, number, column, text)
                cells.append(text)
        return cells

    def _make_room(self, cells: list[str], number: int, column: int, text: str) -> None:
        """Fill a row with blanks up to the column of its next text, or refuse a text that cannot be placed."""
        if column >= MOST_COLUMNS:
            what = f"a cell is written in column {column + 1}, beyond {MOST_COLUMNS}: {shown(text)}."
            raise refuse(self._file, what, _FEWER, number + 1)
        if len(text) > LONGEST_CELL:
            what = f"cell {column + 1} has {len(text)} characters, more than {LONGEST_CELL}: {shown(text)}."
            raise refuse(self._file, what, "Shorten it.", number + 1)
        if column < len(cells):
            what = f"column {column + 1} is written twice or out of order, so the row has two readings."
            raise refuse(self._file, what, _ANEW, number + 1)
        cells.extend([""] * (column - len(cells)))

    def _odd(self, cell: Element, kind: str | None, stored: str | None, style: Style, at: tuple[int, int]) -> str:
        """Return the text of a cell that is more than a plain number or a plain text."""
        formula = cell.find(_FORMULA)
        if formula is not None:
            self._sheet.formulas += 1
            self._sheet.external += bool(_ELSEWHERE.search(formula.text or ""))
            if (stored is None) if kind == "str" else not stored and kind != "inlineStr":
                return self._uncalculated(formula.text or "", at)
        text = self._value(cell, kind, stored or "", style, at)
        if isinstance(text, Rich):
            return self._parted(text, style, at)
        if style.struck and text.strip():
            self._sheet.struck.setdefault(at[0], []).append(at[1])
        return text

    def _value(self, cell: Element, kind: str | None, stored: str, style: Style, at: tuple[int, int]) -> str | Rich:
        if kind == "inlineStr":
            return inline_text(cell.find(_INLINE))
        if kind == "s":
            return self._texts[int(stored)] if stored else ""
        if kind == "b":
            return "TRUE" if stored in _TRUE else "FALSE"
        if kind == "d":
            return self._iso_date(stored, at)
        if kind in _NUMERIC and stored:
            return self._number(stored, style, at)
        return stored

    def _number(self, stored: str, style: Style, at: tuple[int, int]) -> str:
        if style.sections:
            style = self._section(stored, style)
        if style.kind in ("date", "duration"):
            when = as_date(stored, style, self._epoch)
            text = number_text(stored) if when is None else date_text(when)
            self._sheet.no_numbers[at] = date_sentence(when, text)
            return text
        if style.kind == "scaled":
            self._sheet.no_numbers[at] = (
                f"the cell holds {shown(number_text(stored))} but its number format shows it divided by a thousand or "
                "more: write the number as it is meant, in a plain format."
            )
            return number_text(stored)
        if style.kind in ODD_KINDS:
            self._sheet.no_numbers[at] = odd_sentence(stored, style)
            if style.kind == "added":
                self._sheet.as_shown.add(at)
            return style.before if style.kind == "words" and style.before.strip() else styled_text(stored, style)
        self._check_figures(number_text(stored), at)
        return styled_text(stored, style)

    def _check_figures(self, text: str, at: tuple[int, int]) -> None:
        if beyond_figures(text):
            self._sheet.no_numbers[at] = figures_sentence(text)

    @staticmethod
    def _section(stored: str, style: Style) -> Style:
        try:
            return style.of(float(stored))
        except ValueError:
            return style

    def _iso_date(self, stored: str, at: tuple[int, int]) -> str:
        try:
            when = dt.datetime.fromisoformat(stored)
        except ValueError:
            self._sheet.no_numbers[at] = date_sentence(None, stored)
            return stored
        self._sheet.no_numbers[at] = date_sentence(when, date_text(when))
        return date_text(when)

    def _uncalculated(self, formula: str, at: tuple[int, int]) -> str:
        text = f"={formula or '(as the cell above)'}"
        self._sheet.refused[at] = (
            f"{shown(text)} is a formula without a stored value: open the workbook in a spreadsheet program, let it "
            "calculate, and save it."
        )
        return text

    def _parted(self, rich: Rich, style: Style, at: tuple[int, int]) -> str:
        gone, left = rich.parted(style.struck)
        if not gone.strip() or not left.strip():
            if gone.strip():
                self._sheet.struck.setdefault(at[0], []).append(at[1])
            if at[0] < HEAD and rich.unmarked != rich.text:
                self._sheet.unmarked[at] = rich.unmarked
            return rich.text
        self._sheet.refused[at] = (
            f"a part of the cell is struck through: {shown(gone.strip())} is struck, {shown(left.strip())} stands. "
            f"Is {shown(left.strip())} the value? Write it alone, not struck."
        )
        return left.strip()

    def _take_column(self, element: Element) -> None:
        if element.get("hidden") in _TRUE:
            first, last = int(element.get("min", "1")) - 1, int(element.get("max", "1")) - 1
            self._sheet.hidden_columns.append((first, last))

    def _take_merged(self, element: Element) -> None:
        from openpyxl.utils import range_boundaries

        if len(self._sheet.merged) >= limits.MOST_MERGED:
            raise refuse(self._file, f"the sheet has more than {limits.MOST_MERGED} merged ranges.", _FEWER)
        corners = [0 if corner is None else corner - 1 for corner in range_boundaries(element.get("ref", ""))]
        left, top, right, bottom = corners
        self._sheet.merged.append(Merged(top, left, bottom, right))

    def _take_filter(self, element: Element) -> None:
        self._sheet.filtered = True
