"""From bytes to text: the byte-order mark decides, else strict UTF-8, else Windows-1252 and a note that says so."""

from __future__ import annotations

import codecs
import hashlib
import re
from dataclasses import dataclass
from pathlib import Path

from checker.errors import InputError, Problem
from checker.intake.texts import place

__all__ = ["MAXIMUM_BYTES", "Decoded", "read_text"]

MAXIMUM_BYTES = 200_000_000
_SAVE_AS_CSV = "Open it in the program that made it and save the sheet with the line list as CSV (UTF-8)."
_CONTAINERS = (
    (b"PK\x03\x04", "a workbook or another zip container", _SAVE_AS_CSV),
    (b"PK\x05\x06", "an empty zip container", _SAVE_AS_CSV),
    (b"\xd0\xcf\x11\xe0", "an old binary or an encrypted office document", _SAVE_AS_CSV),
    (b"%PDF", "a PDF document", "Ask the originator for the list as CSV."),
    (b"\x1f\x8b", "a gzip archive", "Unpack it and give the CSV file itself."),
)
_MARKS = (
    (codecs.BOM_UTF8, "utf-8"),
    (codecs.BOM_UTF32_LE, "utf-32"),
    (codecs.BOM_UTF32_BE, "utf-32"),
    (codecs.BOM_UTF16_LE, "utf-16"),
    (codecs.BOM_UTF16_BE, "utf-16"),
)
_TWICE_ENCODED = re.compile("[\u00c2\u00c3][\u0080-\u00bf]|\u00ef\u00bb\u00bf")


@dataclass(frozen=True, slots=True)
class Decoded:
    """The text of a file, the SHA-256 of its bytes, its encoding, and what should be said about it."""

    text: str
    sha256: str
    encoding: str
    notes: tuple[str, ...]


def _refuse(path: Path, what: str, remedy: str) -> InputError:
    return InputError(Problem(what, where=place(path.name), remedy=remedy))


def _bytes_of(path: Path) -> bytes:
    if path.name.startswith("~$"):
        raise _refuse(path, "This is the lock file of an open workbook.", "Give the list itself.")
    try:
        with path.open("rb") as handle:
            content = handle.read(MAXIMUM_BYTES + 1)
    except FileNotFoundError as error:
        raise _refuse(path, "There is no such file.", "Check the path.") from error
    except OSError as error:
        raise _refuse(path, f"The file cannot be read ({error.strerror or error}).", "Check the path.") from error
    if len(content) > MAXIMUM_BYTES:
        raise _refuse(path, f"The file is larger than {MAXIMUM_BYTES} bytes.", "Split the list by unit or area.")
    return content


def _refuse_containers(path: Path, content: bytes) -> None:
    for signature, name, remedy in _CONTAINERS:
        if content.startswith(signature):
            raise _refuse(path, f"The file is {name}; this release reads CSV only.", remedy)
    head = content[:512].lstrip(b"\xef\xbb\xbf \t\r\n").lower()
    if head.startswith((b"<!doctype", b"<html", b"<?xml", b"<table")):
        raise _refuse(path, "The file is a web page or XML; this release reads CSV only.", _SAVE_AS_CSV)


def _undecodable(path: Path, error: UnicodeDecodeError, encoding: str) -> InputError:
    row = error.object.count(b"\n", 0, error.start) + 1
    what = f"Byte {error.start} (0x{error.object[error.start]:02x}, text row {row}) is {encoding}."
    return _refuse(path, what, "Save the list as CSV in UTF-8.")


def _decode(path: Path, content: bytes) -> tuple[str, str, str]:
    """Return text, encoding and a note."""
    for mark, encoding in _MARKS:
        if content.startswith(mark):
            try:
                text = content[len(mark) :].decode("utf-8") if encoding == "utf-8" else content.decode(encoding)
            except UnicodeDecodeError as error:
                raise _undecodable(path, error, f"not {encoding.upper()}") from error
            return text, encoding, f"Encoding {encoding.upper()}, stated by the file's byte-order mark."
    try:
        return content.decode("utf-8"), "utf-8", "Encoding UTF-8."
    except UnicodeDecodeError as utf_8_error:
        position = utf_8_error.start
    damaged = _damaged_utf_8(content, position)
    if damaged is not None:
        return damaged
    try:
        text = content.decode("cp1252")
    except UnicodeDecodeError as error:
        raise _undecodable(path, error, "neither UTF-8 nor Windows-1252") from error
    note = f"Not UTF-8 (byte {position}): read as Windows-1252; check signs such as the degree sign, or save as UTF-8."
    return text, "cp1252", note


def _damaged_utf_8(content: bytes, position: int) -> tuple[str, str, str] | None:
    """Return the text of a file that is UTF-8 but for a few bytes, each shown as the replacement character.

    A file with more such bytes than good signs beyond ASCII is no UTF-8: None.
    """
    text = content.decode("utf-8", "replace")
    bad = text.count("\ufffd")
    good = len(text) - len(text.encode("ascii", "ignore")) - bad
    if bad > good:
        return None
    row = content.count(b"\n", 0, position) + 1
    word = "byte is" if bad == 1 else "bytes are"
    note = (
        f"Encoding UTF-8, but {bad} {word} not (the first is byte {position}, text row {row}): shown as \ufffd, "
        "and no number is read from a cell that holds one."
    )
    return text, "utf-8", note


def _refuse_nul(path: Path, text: str) -> None:
    position = text.find("\0")
    if position >= 0:
        row = text.count("\n", 0, position) + 1
        column = position - (text.rfind("\n", 0, position) + 1) + 1
        what = f"NUL character at character {position + 1} (text row {row}, character {column} of it)."
        raise _refuse(
            path, what, "The file is damaged or is UTF-16 without a byte-order mark: save it as CSV in UTF-8."
        )


def read_text(path: Path) -> Decoded:
    """Read a file as text.

    Raises
    ------
    InputError
        If the file is missing, too large, empty, no text, holds a NUL, or is a container such as a workbook.
    """
    content = _bytes_of(path)
    _refuse_containers(path, content)
    text, encoding, note = _decode(path, content)
    _refuse_nul(path, text)
    notes = [note]
    if text.startswith("\ufeff"):
        text = text.lstrip("\ufeff")
        notes.append("A second byte-order mark before the first header was left out.")
    if not text.isascii() and any(sign in text for sign in "\u00c2\u00c3\u00ef") and _TWICE_ENCODED.search(text):
        notes.append("Some texts look as if they were encoded twice (such as '\u00c2\u00b0C'): check the export.")
    if not text.strip():
        raise _refuse(path, "The file is empty: no table found.", "Give a CSV file with a header row and lines.")
    return Decoded(text, hashlib.sha256(content).hexdigest(), encoding, tuple(notes))
