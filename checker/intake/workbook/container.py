"""What a file is by its content: a workbook of some kind, another container, or none."""

from __future__ import annotations

import io
from dataclasses import dataclass
from pathlib import Path
from typing import TYPE_CHECKING, Literal

from checker.intake.workbook import limits

if TYPE_CHECKING:
    import zipfile

__all__ = ["Container", "container_of", "is_workbook", "name_says"]

Kind = Literal["xlsx", "xlsm", "ods", "xls", "refused"]

_ZIP = (b"PK\x03\x04", b"PK\x05\x06", b"PK\x07\x08")
_COMPOUND = b"\xd0\xcf\x11\xe0\xa1\xb1\x1a\xe1"
_RAW_BINARY = (b"\x09\x00\x04\x00", b"\x09\x02\x06\x00", b"\x09\x04\x06\x00", b"\x09\x08\x08\x00", b"\x09\x08\x10\x00")
_AS_XLSX = "Open it in the program that made it and save the sheet as XLSX, or as CSV."
_ODS_TYPE = b"application/vnd.oasis.opendocument.spreadsheet"
_ENDINGS = {"xlsx": (".xlsx",), "xlsm": (".xlsm",), "ods": (".ods",), "xls": (".xls",)}
_LONGEST_END = 70_000
_NO_PASSWORD = "Open it with its password, save it without one, and give that file."


@dataclass(frozen=True, slots=True)
class Container:
    """What a file is: its kind, and for one that is refused what it is and what to do instead."""

    kind: Kind
    what: str = ""
    remedy: str = ""


def _refused(what: str, remedy: str = _AS_XLSX) -> Container:
    return Container("refused", what, remedy)


def _utf_16(name: str) -> bytes:
    return name.encode("utf-16-le")


def _compound(content: bytes) -> Container:
    """Tell compound files apart by the names of their streams."""
    if _utf_16("EncryptedPackage") in content:
        return _refused("The workbook is encrypted: it opens with a password only.", _NO_PASSWORD)
    if _utf_16("WordDocument") in content:
        return _refused("The file is an old word-processor document, not a workbook.")
    if _utf_16("PowerPoint Document") in content:
        return _refused("The file is an old presentation, not a workbook.")
    if _utf_16("__substg1.0_") in content:
        return _refused("The file is an e-mail message.", "Save the list attached to it, and give that file.")
    if _utf_16("Workbook") in content or _utf_16("Book") in content:
        return Container("xls")
    return _refused("The file is an old binary office document (an OLE compound file) without a workbook in it.")


def _directory_bytes(content: bytes) -> int:
    """Return how long a zip container says its directory is (APPNOTE.TXT, 4.3.14 and 4.3.16)."""
    end = content.rfind(b"PK\x05\x06", max(0, len(content) - _LONGEST_END))
    size = int.from_bytes(content[end + 12 : end + 16], "little") if end >= 0 else 0
    long_end = content.rfind(b"PK\x06\x06", max(0, len(content) - _LONGEST_END))
    if long_end >= 0:
        size = max(size % 0xFFFFFFFF, int.from_bytes(content[long_end + 40 : long_end + 48], "little"))
    return size


def _zipped(content: bytes) -> Container:
    """Tell zip containers apart by the names of their members, which are read and never unpacked."""
    if _directory_bytes(content) > limits.MOST_DIRECTORY:
        return _refused(
            f"The file is a container of too many parts: its directory is longer than {limits.MOST_DIRECTORY} bytes.",
            "Copy the sheet with the line list into a workbook of its own.",
        )
    import zipfile

    try:
        with zipfile.ZipFile(io.BytesIO(content)) as archive:
            names = frozenset(archive.namelist())
            mimetype = archive.read("mimetype")[:200] if "mimetype" in names and _small(archive, "mimetype") else b""
    except (zipfile.BadZipFile, OSError, ValueError, EOFError, NotImplementedError, RuntimeError, KeyError):
        return _refused(
            "The file begins as a workbook or another zip container, but it is damaged or cut short.",
            "Ask for the file again, or open it in the program that made it and save it anew as XLSX.",
        )
    if mimetype.startswith(_ODS_TYPE):
        return Container("ods")
    return _office(names)


def _small(archive: zipfile.ZipFile, name: str) -> bool:
    return archive.getinfo(name).file_size < 1000


def _office(names: frozenset[str]) -> Container:
    if "xl/workbook.bin" in names:
        return _refused("The file is a binary workbook (XLSB), which is not read.")
    if "[Content_Types].xml" in names and any(name.startswith("xl/") for name in names):
        macros = any(name.casefold().endswith("vbaproject.bin") for name in names)
        return Container("xlsm" if macros else "xlsx")
    if any(name.startswith("word/") for name in names):
        return _refused("The file is a word-processor document (DOCX), not a workbook.")
    if any(name.startswith("ppt/") for name in names):
        return _refused("The file is a presentation (PPTX), not a workbook.")
    if any(name.endswith(".iwa") for name in names):
        return _refused("The file is a spreadsheet in a form that is not read.", "Export it as XLSX or CSV.")
    if not names:
        return _refused("The file is an empty zip container.", "Give the list itself.")
    return _refused("The file is a zip container, but no workbook.", "Unpack it and give the list that is in it.")


def is_workbook(path: Path) -> bool:
    """Return whether a file is a workbook, or a container that might be taken for one, by its first bytes alone.

    Such a file goes to `read_sheet`, which reads it or says what it is; any other is a text.
    The lock file of an open workbook is none, and neither is a file that cannot be read: reading it as a text says so.
    """
    if path.name.startswith("~$"):
        return False
    try:
        with path.open("rb") as handle:
            return handle.read(8).startswith((*_ZIP, _COMPOUND, *_RAW_BINARY))
    except OSError:
        return False


def container_of(content: bytes) -> Container:
    """Return what the bytes of a container are, by their beginning and the names inside."""
    if content.startswith(_ZIP):
        return _zipped(content)
    if content.startswith(_COMPOUND):
        return _compound(content)
    if content.startswith(_RAW_BINARY):
        return _refused("The file is a worksheet in a form older than 1997, which is not read.")
    return _refused("The file is no workbook.", "Give the line list as XLSX or CSV.")


def name_says(path: Path, kind: str = "") -> str:
    """Return the sentence for a name that says another kind of file than the content, empty where they agree.

    Parameters
    ----------
    path : Path
        The file.
    kind : str
        Kind of workbook it is; empty for a text.
    """
    ending = path.suffix.casefold()
    if not kind:
        spreadsheet = ending in {".xlsx", ".xlsm", ".xls", ".ods", ".xlsb"}
        return f"The name ends in {ending}, but the file is a text: read as text." if spreadsheet else ""
    if ending in _ENDINGS[kind]:
        return ""
    return f"The file is a workbook ({kind.upper()}) by its content, whatever its name says."
