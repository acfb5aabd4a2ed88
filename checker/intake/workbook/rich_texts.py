"""Texts of which a part may be struck through."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Any
from xml.etree.ElementTree import Element

__all__ = ["NAMESPACE", "Rich", "inline_text", "is_struck", "shared_texts"]

NAMESPACE = "{http://schemas.openxmlformats.org/spreadsheetml/2006/main}"
_TEXT, _RUN, _STRIKE = (NAMESPACE + tag for tag in ("t", "r", "strike"))
_NO = ("0", "false", "off")


@dataclass(frozen=True, slots=True)
class Rich:
    """A text in pieces, each struck through or not; None where the font of the cell decides."""

    pieces: tuple[tuple[str, bool | None], ...]

    def parted(self, cell_struck: bool) -> tuple[str, str]:
        """Return the struck part of the text and the part that stands."""
        gone = "".join(text for text, struck in self.pieces if (cell_struck if struck is None else struck))
        left = "".join(text for text, struck in self.pieces if not (cell_struck if struck is None else struck))
        return gone, left


def _plain(text: str) -> str:
    """Return a text with the escape that some programs write for a carriage return made one."""
    return text.replace("_x000D_", "\r") if "_x" in text else text


def _one(pieces: list[tuple[str, bool | None]]) -> str | Rich:
    """Return pieces as a plain text where the font of the cell decides for all of them."""
    if all(struck is None for _, struck in pieces):
        return "".join(text for text, _ in pieces)
    return Rich(tuple(pieces))


def shared_texts(strings: list[Any]) -> list[str | Rich]:
    """Return the shared texts of a workbook as openpyxl reads them, those in pieces as `Rich`."""
    return [_plain(text) if type(text) is str else _one([_piece(part) for part in text]) for text in strings]


def _piece(part: Any) -> tuple[str, bool | None]:
    if isinstance(part, str):
        return _plain(part), None
    return _plain(str(part.text)), bool(part.font.strike)


def inline_text(element: Element | None) -> str | Rich:
    """Return the text that is written in a cell itself."""
    if element is None:
        return ""
    pieces: list[tuple[str, bool | None]] = []
    for child in element:
        if child.tag == _TEXT:
            pieces.append((_plain(child.text or ""), None))
        elif child.tag == _RUN:
            pieces.append((_plain(child.findtext(_TEXT) or ""), _run_struck(child)))
    return _one(pieces)


def _run_struck(run: Element) -> bool | None:
    font = run.find(NAMESPACE + "rPr")
    return None if font is None else is_struck(font)


def is_struck(font: Element) -> bool:
    """Return whether a font strikes its text through."""
    mark = font.find(_STRIKE)
    return mark is not None and mark.get("val", "1").lower() not in _NO
