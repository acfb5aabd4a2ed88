"""XLS and ODS, read by calamine in a process of its own that is limited in memory and time."""

from __future__ import annotations

import datetime as dt
import json
import subprocess
import sys
import zipfile
from pathlib import Path
from typing import Any
from xml.etree.ElementTree import ParseError

from checker.intake.records import LONGEST_CELL, MOST_COLUMNS, MOST_ROWS
from checker.intake.texts import shown
from checker.intake.workbook import limits
from checker.intake.workbook.cell_texts import (
    MOST_FIGURES,
    When,
    beyond_figures,
    date_sentence,
    date_text,
    figures_sentence,
    number_text,
)
from checker.intake.workbook.open_document import odd_cells
from checker.intake.workbook.package import checked_archive, refuse
from checker.intake.workbook.raw import BLANK, HEAD, Merged, RawSheet, SheetName

__all__ = ["OtherBook"]

SECONDS = 40
_CHILD = Path(__file__).with_name("calamine_child.py")
_AS_XLSX = "Open it in the program that made it and save it as XLSX, or save the sheet as CSV."
_ENCRYPTED = b"encryption-data"
_PER_CENT = b'value-type="percentage"'


_UNSEEN = {
    "xls": "In XLS cells struck through, hidden rows and columns, errors, comments, number formats (a unit, per "
    "cent, thousands left out, leading zeros) and raised digits cannot be seen: save as XLSX if the list has any.",
    "ods": "In ODS cells struck through, merged cells, hidden rows and columns, comments and leading zeros cannot be "
    "seen: save as XLSX if the list has any.",
}


def _run(content: bytes, file: str) -> dict[str, Any]:
    """Return what the child process read of a workbook; a crash, an abort and a time limit are refusals."""
    try:
        ended = subprocess.run(
            [sys.executable, "-I", str(_CHILD)], input=content, capture_output=True, timeout=SECONDS, check=False
        )
    except subprocess.TimeoutExpired as error:
        raise refuse(file, f"the workbook could not be read within {SECONDS} s.", _AS_XLSX) from error
    except OSError as error:
        raise refuse(file, f"no process could be started to read the workbook ({error.strerror}).", _AS_XLSX) from error
    if ended.returncode != 0:
        what = f"the workbook could not be read within its limits of memory and time (status {ended.returncode})."
        raise refuse(file, what, _AS_XLSX)
    try:
        found: dict[str, Any] = json.loads(ended.stdout)
    except ValueError as error:
        raise refuse(file, "what was read of the workbook could not be understood.", _AS_XLSX) from error
    if "refused" in found:
        what = f"the workbook is not read, it is damaged or too large ({shown(found['refused'])[1:-1]})."
        raise refuse(file, what, _AS_XLSX)
    return found


class OtherBook:
    """An XLS or ODS workbook.

    Parameters
    ----------
    content : bytes
        The workbook.
    file : str
        Its name, for messages.
    kind : str
        ``xls`` or ``ods``.
    """

    def __init__(self, content: bytes, file: str, kind: str) -> None:
        self._file = file
        self._archive: zipfile.ZipFile | None = None
        if kind == "ods":
            self._archive = self._check_open_document(content)
        elif len(content) > limits.MOST_BYTES:
            raise refuse(file, f"the workbook is larger than {limits.MOST_BYTES} bytes.", _AS_XLSX)
        self._found: list[dict[str, Any]] = _run(content, file)["sheets"]
        self.sheets = tuple(SheetName(str(sheet["name"]), bool(sheet["visible"])) for sheet in self._found)
        self._per_cent = kind == "xls"
        self.notes: tuple[str, ...] = (_UNSEEN[kind],)

    def _check_open_document(self, content: bytes) -> zipfile.ZipFile:
        archive = checked_archive(content, self._file)
        manifest = "META-INF/manifest.xml"
        if manifest in archive.namelist() and _ENCRYPTED in archive.read(manifest):
            raise refuse(self._file, "the workbook is encrypted.", "Save it without a password.")
        if "content.xml" in archive.namelist() and _PER_CENT in archive.read("content.xml"):
            what = "cells of the workbook are shown in per cent, which in ODS cannot be told from other numbers."
            raise refuse(self._file, what, "Save it as XLSX.")
        return archive

    def head(self, index: int) -> RawSheet:
        """Return the first rows of a sheet."""
        return self._read(index, HEAD)

    def whole(self, index: int) -> RawSheet:
        """Return a sheet, read whole."""
        raw = self._read(index, 0)
        raw.per_cent_unseen = self._per_cent
        if self._archive is not None:
            self._mark_odd(raw, self._archive, str(self._found[index]["name"]))
        return raw

    def _mark_odd(self, raw: RawSheet, archive: zipfile.ZipFile, name: str) -> None:
        """Let cells that show something else than their number show it, and be no number."""
        try:
            with archive.open("content.xml") as stream:
                for odd in odd_cells(stream, name):
                    for row in range(odd.row, min(odd.row + odd.rows, len(raw.rows))):
                        cells = raw.rows[row]
                        for column in range(odd.column, min(odd.column + odd.columns, len(cells))):
                            cells[column] = odd.text or cells[column]
                            if odd.sentence:
                                raw.no_numbers[row, column] = odd.sentence
                                raw.as_shown.add((row, column))
        except (ParseError, KeyError) as error:
            raise refuse(self._file, "the content of the workbook is damaged.", _AS_XLSX) from error

    def _read(self, index: int, most_rows: int) -> RawSheet:
        found = self._found[index]
        label = f"{self._file}, sheet {shown(str(found['name']))}"
        raw = RawSheet(merged=[Merged(*map(int, corners)) for corners in found["merged"]])
        if len(found["rows"]) > MOST_ROWS:
            raise refuse(label, f"the sheet has more than {MOST_ROWS} rows.", "Split the list by unit or area.")
        for number, values in enumerate(found["rows"][: most_rows or None]):
            if values:
                _add_row(raw, number, _texts(raw, number, values), label)
        return raw


def _texts(raw: RawSheet, row: int, values: list[Any]) -> list[str]:
    texts = []
    for column, value in enumerate(values):
        if isinstance(value, dict):
            when = _when(value)
            text = str(value.get("time", "")) if when is None else date_text(when)
            raw.no_numbers[row, column] = date_sentence(when or dt.timedelta(), text)
        elif isinstance(value, bool):
            text = "TRUE" if value else "FALSE"
        else:
            text = value if isinstance(value, str) else number_text(repr(value))
            if not isinstance(value, str) and len(text) > MOST_FIGURES and beyond_figures(text):
                raw.no_numbers[row, column] = figures_sentence(text)
        texts.append(text)
    return texts


def _when(value: dict[str, str]) -> When | None:
    return dt.datetime.fromisoformat(value["date"]) if "date" in value else None


def _add_row(raw: RawSheet, number: int, texts: list[str], label: str) -> None:
    if len(texts) > MOST_COLUMNS:
        what = f"a cell is written in column {len(texts)}, beyond {MOST_COLUMNS}: {shown(texts[-1])}."
        raise refuse(label, what, "Delete what stands outside the table.", number + 1)
    if max(map(len, texts)) > LONGEST_CELL:
        raise refuse(label, f"a cell has more than {LONGEST_CELL} characters.", "Shorten it.", number + 1)
    raw.rows.extend([BLANK] * (number - len(raw.rows)))
    raw.rows.append(texts)
