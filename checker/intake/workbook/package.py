"""The container of a workbook, held against its limits before a single cell is parsed."""

from __future__ import annotations

import io
import math
import re
import zipfile
import zlib
from collections.abc import Iterator, Mapping

from checker.errors import InputError, Problem
from checker.intake.texts import place, shown
from checker.intake.workbook import limits

__all__ = ["checked_archive", "refuse"]

CHUNK = 1 << 14
CONTENT_TYPES = 5_000_000
_OVERLAP = 16
_SMALLER = "Copy the sheet with the line list into a workbook of its own, or save it as CSV."
_ANEW = "Ask where it comes from; open it in a spreadsheet program and save it anew as XLSX."
_DECLARED = re.compile(rb"<!(?:DOCTYPE|ENTITY)")
_VERBATIM = re.compile(rb"<!(?:\[CDATA\[|--)")
_ENCODING = re.compile(rb"<\?xml[^>]{0,200}?encoding\s*=\s*[\"']([^\"']{0,40})")
_ENCODINGS = frozenset({b"utf-8", b"utf8", b"utf-16", b"us-ascii", b"iso-8859-1"})
_OVERRIDE = re.compile(rb"<(?:\w+:)?Override\s[^>]{0,2000}>")
_PART_NAME = re.compile(rb"PartName\s*=\s*[\"']/([^\"'&]+)[\"']")
_NEVER_READ = (
    "xl/pivotCache/",
    "xl/pivotTables/",
    "xl/calcChain",
    "xl/drawings/",
    "xl/charts/",
    "xl/externalLinks/",
    "xl/comments",
    "xl/threadedComments/",
    "xl/tables/",
    "xl/queryTables/",
    "customXml/",
)
_SIXTEEN_BITS = (b"\xff\xfe", b"\xfe\xff", b"<\0", b"\0<")


def refuse(file: str, what: str, remedy: str, row: int | None = None) -> InputError:
    """Return the error for a workbook that is not read."""
    return InputError(Problem(what, where=place(file, row), remedy=remedy))


def _check_directory(file: str, members: list[zipfile.ZipInfo]) -> None:
    """Refuse by the central directory alone: nothing has been unpacked yet."""
    if len(members) > limits.MOST_PARTS:
        what = f"the workbook has {len(members)} parts, more than {limits.MOST_PARTS}."
        raise refuse(file, what, _SMALLER)
    total = sum(member.file_size for member in members)
    if total > limits.MOST_INFLATED:
        what = f"the workbook unpacks to {total} bytes, more than {limits.MOST_INFLATED}."
        raise refuse(file, what, _SMALLER)
    names: set[str] = set()
    for member in members:
        _check_member(file, member)
        if member.filename.casefold() in names:
            what = f"the workbook holds the part {shown(member.filename)} twice, so it has two readings."
            raise refuse(file, what, _ANEW)
        names.add(member.filename.casefold())


def _check_member(file: str, member: zipfile.ZipInfo) -> None:
    name, size = shown(member.filename), member.file_size
    if size > limits.MOST_PART_INFLATED:
        what = f"the part {name} unpacks to {size} bytes, more than {limits.MOST_PART_INFLATED}."
        raise refuse(file, what, _SMALLER)
    if size > limits.RATIO_FROM and size > limits.MOST_RATIO * max(member.compress_size, 1):
        what = f"the part {name} packs {size} bytes into {member.compress_size}, which no real sheet does."
        raise refuse(file, what, _ANEW)
    if member.flag_bits & 1:
        what = f"the part {name} is encrypted."
        raise refuse(file, what, "Save the workbook without a password.")
    if member.compress_type not in (zipfile.ZIP_STORED, zipfile.ZIP_DEFLATED):
        raise refuse(file, f"the part {name} is packed in a way workbooks do not use.", _ANEW)


def _chunks(archive: zipfile.ZipFile, name: str) -> Iterator[bytes]:
    with archive.open(name) as part:
        while chunk := part.read(CHUNK):
            yield chunk


def _tags(chunk: bytes) -> tuple[int, int]:
    """Return how many tags a piece of XML holds, and by how much it goes deeper."""
    every, ends = chunk.count(b"<"), chunk.count(b"</")
    asides = chunk.count(b"<?") + chunk.count(b"<!")
    return every, every - asides - 2 * ends - chunk.count(b"/>")


class _Scan:
    """One pass over the bytes of an XML part: declarations, number of tags and depth.

    The depth is not judged where signs of markup may stand in the text as they are.
    """

    def __init__(self, file: str, name: str, most_tags: float) -> None:
        self.file, self.name, self.most_tags = file, name, most_tags
        self._before, self._held = b"", b""
        self._tags, self._depth = 0, 0.0
        self._wide: bool | None = None

    def add(self, chunk: bytes) -> None:
        """Look at the next piece; a tag cut at its end is held for the piece that follows."""
        if self._wide is None:
            self._wide = chunk.startswith(_SIXTEEN_BITS)
            _check_encoding(self.file, self.name, _narrow(chunk[:800]) if self._wide else chunk[:400])
        piece = self._held + (_narrow(chunk) if self._wide else chunk)
        cut = 2 if piece.endswith(b"</") else 1 if piece.endswith((b"<", b"/")) else 0
        piece, self._held = piece[: len(piece) - cut], piece[len(piece) - cut :]
        if _DECLARED.search(self._before + piece):
            what = f"the part {shown(self.name)} declares a document type or entities, which no workbook needs."
            raise refuse(self.file, what, _ANEW)
        if _VERBATIM.search(self._before + piece):
            self._depth = -math.inf
        self._before = (self._before + piece)[-_OVERLAP:]
        self._count(piece)

    def _count(self, piece: bytes) -> None:
        tags, deeper = _tags(piece)
        self._tags, self._depth = self._tags + tags, self._depth + deeper
        if self._tags > self.most_tags:
            what = f"the part {shown(self.name)} holds more than {self.most_tags} tags."
            raise refuse(self.file, what, _SMALLER)
        if self._depth > limits.DEEPEST:
            what = f"the part {shown(self.name)} nests its tags more than {limits.DEEPEST} deep, which no sheet does."
            raise refuse(self.file, what, _ANEW)


def _narrow(chunk: bytes) -> bytes:
    """Return 16-bit text as if it were ASCII, enough to find the signs of markup."""
    return chunk.replace(b"\0", b"")


def _most_tags(archive: zipfile.ZipFile) -> dict[str, float]:
    """Return how many tags the sheets and the shared texts may hold, by name of the part."""
    most: dict[str, float] = {"content.xml": limits.MOST_TAGS}
    types = "[Content_Types].xml"
    listed = archive.read(types)[:CONTENT_TYPES] if types in archive.namelist() else b""
    for override in _OVERRIDE.findall(listed):
        name = _PART_NAME.search(override)
        if name and b"worksheet+xml" in override:
            most[name[1].decode("utf-8", "replace")] = limits.MOST_TAGS
        elif name and b"sharedStrings+xml" in override:
            most[name[1].decode("utf-8", "replace")] = limits.MOST_SHARED_TAGS
    return most


def _scan(file: str, archive: zipfile.ZipFile, name: str, most: Mapping[str, float]) -> None:
    """Unpack an XML part piece by piece, keeping none; its size and checksum must be those it states."""
    most_tags = most.get(name, math.inf if name.startswith(_NEVER_READ) else limits.MOST_OTHER_TAGS)
    scan, size, stated = _Scan(file, name, most_tags), 0, archive.getinfo(name).file_size
    for chunk in _chunks(archive, name):
        size += len(chunk)
        scan.add(chunk)
    if size != stated:
        raise zipfile.BadZipFile(f"{size} bytes instead of {stated}")


def _check_encoding(file: str, name: str, head: bytes) -> None:
    stated = _ENCODING.search(head)
    if stated and stated[1].lower() not in _ENCODINGS:
        encoding = shown(stated[1].decode("ascii", "replace"))
        raise refuse(file, f"the part {shown(name)} says it is written in {encoding}, which is not read.", _ANEW)


def checked_archive(content: bytes, file: str) -> zipfile.ZipFile:
    """Open the container of a workbook within its limits; nothing is ever written to disk.

    Parameters
    ----------
    content : bytes
        The workbook.
    file : str
        Its name, for messages.

    Raises
    ------
    InputError
        If it holds too many or too large parts, packs them too tightly, states sizes or checksums that are not so,
        is encrypted, or declares document types or entities.
    """
    if len(content) > limits.MOST_BYTES:
        raise refuse(file, f"the workbook is larger than {limits.MOST_BYTES} bytes.", _SMALLER)
    name = ""
    try:
        archive = zipfile.ZipFile(io.BytesIO(content))
        _check_directory(file, archive.infolist())
        most = _most_tags(archive)
        for name in archive.namelist():
            if name.casefold().endswith((".xml", ".rels")):
                _scan(file, archive, name, most)
    except (zipfile.BadZipFile, zlib.error, EOFError, OSError, ValueError, NotImplementedError, RuntimeError) as error:
        part = f"the part {shown(name)}" if name else "the container"
        what = f"{part} is damaged: its size or its checksum is not what it states ({shown(str(error))[1:-1]})."
        raise refuse(file, what, _ANEW) from error
    return archive
