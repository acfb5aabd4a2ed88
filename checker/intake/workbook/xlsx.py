"""XLSX and XLSM: opened by openpyxl for sheets and shared texts; nothing is calculated, run or followed."""

from __future__ import annotations

import io
import posixpath
import re
import warnings
import zipfile
import zlib
from collections.abc import Iterator
from contextlib import contextmanager
from typing import Any
from xml.etree.ElementTree import ParseError

from checker.intake.texts import shown
from checker.intake.workbook.package import checked_archive, refuse
from checker.intake.workbook.raw import HEAD, RawSheet, SheetName
from checker.intake.workbook.rich_texts import shared_texts
from checker.intake.workbook.sheet_xml import SheetReader
from checker.intake.workbook.styles import Styles

__all__ = ["XlsxBook"]

_DAMAGED = (
    ArithmeticError, AssertionError, AttributeError, EOFError, LookupError, NotImplementedError, OSError, ParseError,
    RecursionError, TypeError, ValueError, zipfile.BadZipFile, zlib.error,
)  # fmt: skip
_ANEW = "Open it in a spreadsheet program and save it anew as XLSX, or save the sheet as CSV."
_LEFT_OUT = ("xl/styles.xml", "xl/theme/", "docProps/")
_STRICT = b"purl.oclc.org/ooxml"
_SHEET = re.compile(rb"<(?:\w+:)?sheet\s")
_COMMENT = re.compile(rb"<(?:\w+:)?(?:comment|threadedComment)\s")
_COMMENTS = re.compile(rb"Target\s*=\s*[\"']([^\"']*[cC]omment[^\"']*\.xml)[\"']")


@contextmanager
def _readable(file: str) -> Iterator[None]:
    """Turn whatever a damaged workbook makes its readers raise into a sentence."""
    try:
        with warnings.catch_warnings():
            warnings.simplefilter("ignore")
            yield
    except _DAMAGED as error:
        reason = " ".join(f"{type(error).__name__}: {error}".split())
        raise refuse(
            file, f"the workbook is damaged or not as the standard has it ({shown(reason)}).", _ANEW
        ) from error


class _Bare(zipfile.ZipFile):
    """The container as openpyxl sees it: without styles, theme and properties, for which it would refuse a workbook."""

    def namelist(self) -> list[str]:
        """Return the names of the parts that carry sheets, cells and texts."""
        return [name for name in super().namelist() if not name.startswith(_LEFT_OUT)]

    def read(self, name: str | zipfile.ZipInfo, pwd: bytes | None = None) -> bytes:
        """Return a part.

        Raises
        ------
        KeyError
            If the part is left out.
        """
        if isinstance(name, str) and name.startswith(_LEFT_OUT):
            raise KeyError(name)
        return super().read(name, pwd)


def _load(content: bytes) -> Any:
    """Open a workbook by openpyxl: sheets, their states, shared texts and the day from which dates count."""
    from openpyxl.reader.excel import ExcelReader

    reader: Any = ExcelReader(io.BytesIO(content), read_only=True, data_only=True, keep_links=False, rich_text=True)
    reader.archive = _Bare(io.BytesIO(content))
    reader.valid_files = reader.archive.namelist()
    reader.read()
    return reader.wb


class XlsxBook:
    """An XLSX or XLSM workbook, opened within its limits.

    Parameters
    ----------
    content : bytes
        The workbook.
    file : str
        Its name, for messages.
    """

    def __init__(self, content: bytes, file: str) -> None:
        self._file = file
        self._archive = checked_archive(content, file)
        self._check_workbook_part()
        with _readable(file):
            opened = _load(content)
            self._sheets: list[Any] = opened.worksheets
            self._epoch = opened.epoch
            self._styles = Styles(self._part("xl/styles.xml"))
            self._texts = shared_texts(self._sheets[0]._shared_strings) if self._sheets else []
        self.sheets = tuple(SheetName(sheet.title, sheet.sheet_state == "visible") for sheet in self._sheets)
        self._check_all_there(len(opened.sheetnames))
        self.notes = self._macro_notes()

    def _part(self, name: str) -> bytes:
        return self._archive.read(name) if name in self._archive.namelist() else b""

    def _check_workbook_part(self) -> None:
        if _STRICT in self._part("xl/workbook.xml")[:4000]:
            what = "the workbook is saved in the strict variant of its format, which is not read."
            raise refuse(self._file, what, "Save it as the usual XLSX.")

    def _check_all_there(self, loaded: int) -> None:
        named = len(_SHEET.findall(self._part("xl/workbook.xml")))
        if named and named != loaded:
            what = f"the workbook names {named} sheets, but holds {loaded} of them."
            raise refuse(self._file, what, _ANEW)

    def _macro_notes(self) -> tuple[str, ...]:
        macros = any(name.casefold().endswith("vbaproject.bin") for name in self._archive.namelist())
        return ("The workbook carries macros: none is run.",) if macros else ()

    def head(self, index: int) -> RawSheet:
        """Return the first rows of a sheet."""
        return self._read(index, HEAD)

    def whole(self, index: int) -> RawSheet:
        """Return a sheet, read whole."""
        sheet = self._read(index, 0)
        sheet.comments = self._comments(index)
        return sheet

    def _read(self, index: int, most_rows: int) -> RawSheet:
        sheet = self._sheets[index]
        label = f"{self._file}, sheet {shown(sheet.title)}"
        with _readable(label), self._archive.open(sheet._worksheet_path) as stream:
            return SheetReader(label, self._texts, self._styles, self._epoch).read(stream, most_rows=most_rows)

    def _comments(self, index: int) -> int:
        """Return how many cells of a sheet carry a comment; the comments themselves are not read."""
        part = str(self._sheets[index]._worksheet_path)
        relations = posixpath.join(posixpath.dirname(part), "_rels", f"{posixpath.basename(part)}.rels")
        names = set(self._archive.namelist())
        if relations not in names:
            return 0
        counts = [0]
        with _readable(self._file):
            for target in _COMMENTS.findall(self._archive.read(relations)):
                name = posixpath.normpath(posixpath.join(posixpath.dirname(part), target.decode("utf-8", "replace")))
                name = name.lstrip("/")
                counts.append(len(_COMMENT.findall(self._archive.read(name))) if name in names else 0)
        return max(counts)
