"""From bytes to text: the byte-order mark decides, else strict UTF-8, else what `encodings` tells and a note on it."""

from __future__ import annotations

import codecs
import hashlib
import re
from collections.abc import Iterator
from dataclasses import dataclass
from pathlib import Path

from checker.errors import InputError, Problem
from checker.intake.encodings import tell_encoding, unmarked_wide_encoding
from checker.intake.texts import place

__all__ = ["MAXIMUM_BYTES", "Decoded", "read_text"]

MAXIMUM_BYTES = 200_000_000
PIECE = 200_000
_SAVE_AS_CSV = "Open it in the program that made it and save the sheet with the line list as CSV (UTF-8)."
_CONTAINERS = (
    (b"PK\x03\x04", "a workbook or another zip container", _SAVE_AS_CSV),
    (b"PK\x05\x06", "an empty zip container", _SAVE_AS_CSV),
    (b"\xd0\xcf\x11\xe0", "an old binary or an encrypted office document", _SAVE_AS_CSV),
    (b"%PDF", "a PDF document", "Ask the originator for the list as CSV."),
    (b"\x1f\x8b", "a gzip archive", "Unpack it and give the CSV file itself."),
    (b"7z\xbc\xaf\x27\x1c", "a 7z archive", "Unpack it and give the CSV file itself."),
    (b"Rar!\x1a\x07", "a RAR archive", "Unpack it and give the CSV file itself."),
    (b"{\\rtf", "a rich-text document", _SAVE_AS_CSV),
)
_MARKS = (
    (codecs.BOM_UTF8, "utf-8"),
    (codecs.BOM_UTF32_LE, "utf-32"),
    (codecs.BOM_UTF32_BE, "utf-32"),
    (codecs.BOM_UTF16_LE, "utf-16"),
    (codecs.BOM_UTF16_BE, "utf-16"),
)
_JSON = re.compile(rb"\{\s*[\"}]|\[\s*[\[{\]\"]")
_TWICE_ENCODED = re.compile("[\u00c2\u00c3][\u0080-\u00bf]|\u00ef\u00bb\u00bf")


@dataclass(frozen=True, slots=True)
class Decoded:
    """The text of a file in pieces that end where a line ends, the SHA-256 of its bytes, its encoding, and notes."""

    pieces: list[str]
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
            raise _refuse(path, f"The file is {name}, not a text with a table.", remedy)
    head = content[:512].lstrip(b"\xef\xbb\xbf \t\r\n").lower()
    if head.startswith((b"<!doctype", b"<html", b"<?xml", b"<table")):
        raise _refuse(path, "The file is a web page or XML, not a text with a table.", _SAVE_AS_CSV)
    if _JSON.match(head):
        raise _refuse(path, "The file is JSON, not a text with a table.", "Ask the originator for the list as CSV.")


def _undecodable(path: Path, error: UnicodeDecodeError, encoding: str) -> InputError:
    row = error.object.count(b"\n", 0, error.start) + 1
    what = f"Byte {error.start} (0x{error.object[error.start]:02x}, text row {row}) is {encoding}."
    return _refuse(path, what, "Save the list as CSV in UTF-8.")


def _strictly(path: Path, content: bytes, encoding: str, name: str) -> list[str]:
    """Return the text in pieces; a line feed is no part of another sign in any encoding of single bytes or pairs."""
    try:
        if encoding.startswith(("utf-16", "utf-32")):
            text = content.decode(encoding)
            return [text[start:end] for start, end in _spans(text, "\n")]
        return [content[start:end].decode(encoding) for start, end in _spans(content, b"\n")]
    except UnicodeDecodeError:
        pass
    try:
        return [content.decode(encoding)]
    except UnicodeDecodeError as error:
        raise _undecodable(path, error, name) from error


def _spans(content: str | bytes, end_of_line: str | bytes) -> Iterator[tuple[int, int]]:
    """Yield where each piece begins and ends."""
    start = 0
    while start < len(content):
        end = content.find(end_of_line, start + PIECE) + 1 or len(content)  # type: ignore[arg-type]
        yield start, end
        start = end


def _decode(path: Path, content: bytes) -> tuple[list[str], str, str]:
    """Return text in pieces, encoding and a note."""
    for mark, encoding in _MARKS:
        if content.startswith(mark):
            body = content[len(mark) :] if encoding == "utf-8" else content
            pieces = _strictly(path, body, encoding, f"not {encoding.upper()}")
            return pieces, encoding, f"Encoding {encoding.upper()}, stated by the file's byte-order mark."
    wide = unmarked_wide_encoding(content)
    if wide:
        pieces = _strictly(path, content, wide, f"not {wide.upper()}")
        return pieces, wide, f"Encoding {wide.upper()} without a byte-order mark, told by its NUL bytes."
    try:
        return [content[start:end].decode() for start, end in _spans(content, b"\n")], "utf-8", "Encoding UTF-8."
    except UnicodeDecodeError:
        position = _first_undecodable(content)
    damaged = _damaged_utf_8(content, position)
    if damaged is not None:
        return damaged
    encoding, note = tell_encoding(content, position)
    return _strictly(path, content, encoding, "neither UTF-8 nor Windows-1252"), encoding, note


def _first_undecodable(content: bytes) -> int:
    try:
        content.decode()
    except UnicodeDecodeError as error:
        return error.start
    return 0


def _damaged_utf_8(content: bytes, position: int) -> tuple[list[str], str, str] | None:
    """Return the text of a file that is UTF-8 but for a few bytes, each shown as the replacement character.

    A file with more such bytes than good signs beyond ASCII is no UTF-8: None. With up to four times as many it is,
    if the good ones are all of the Latin-1 supplement: no other encoding makes just degree signs and accents by chance.
    """
    text = content.decode("utf-8", "replace")
    bad = text.count("\ufffd")
    good = len(text) - len(text.encode("ascii", "ignore")) - bad
    latin = len(text) - len(text.replace("\ufffd", "").encode("latin-1", "ignore")) == bad
    if bad > (4 * good if latin else good):
        return None
    row = content.count(b"\n", 0, position) + 1
    word = "byte is" if bad == 1 else "bytes are"
    note = (
        f"Encoding UTF-8, but {bad} {word} not (the first is byte {position}, text row {row}): shown as \ufffd, "
        "and no number is read from a cell that holds one."
    )
    return [text[start:end] for start, end in _spans(text, "\n")], "utf-8", note


def _refuse_nul(path: Path, pieces: list[str]) -> None:
    row, before = 1, 0
    for piece in pieces:
        position = piece.find("\0")
        if position >= 0:
            row += piece.count("\n", 0, position)
            column = position - (piece.rfind("\n", 0, position) + 1) + 1
            what = f"NUL character at character {before + position + 1} (text row {row}, character {column} of it)."
            raise _refuse(path, what, "The file is damaged: save it again as CSV in UTF-8.")
        row, before = row + piece.count("\n"), before + len(piece)


def _twice_encoded(piece: str) -> bool:
    return (
        not piece.isascii()
        and any(sign in piece for sign in "\u00c2\u00c3\u00ef")
        and _TWICE_ENCODED.search(piece) is not None
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
    pieces, encoding, note = _decode(path, content)
    _refuse_nul(path, pieces)
    notes = [note]
    if pieces and pieces[0].startswith("\ufeff"):
        pieces[0] = pieces[0].lstrip("\ufeff")
        notes.append("A second byte-order mark before the first header was left out.")
    if any(map(_twice_encoded, pieces)):
        notes.append("Some texts look as if they were encoded twice (such as '\u00c2\u00b0C'): check the export.")
    if all(not piece or piece.isspace() for piece in pieces):
        raise _refuse(path, "The file is empty: no table found.", "Give a CSV file with a header row and lines.")
    return Decoded(pieces, hashlib.sha256(content).hexdigest(), encoding, tuple(notes))
