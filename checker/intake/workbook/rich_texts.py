"""Texts of which a part may be struck through, raised or lowered."""

from __future__ import annotations

import re
from dataclasses import dataclass
from typing import Any, NamedTuple
from xml.etree.ElementTree import Element

__all__ = ["NAMESPACE", "Rich", "inline_text", "is_struck", "lifted", "shared_texts"]

NAMESPACE = "{http://schemas.openxmlformats.org/spreadsheetml/2006/main}"
_TEXT, _RUN, _STRIKE, _HEIGHT = (NAMESPACE + tag for tag in ("t", "r", "strike", "vertAlign"))
_NO = ("0", "false", "off")
_RAISED = "superscript"
_SIGNS = "0123456789+-\u2212()"
_LIFTED = {_RAISED: str.maketrans(_SIGNS, "⁰¹²³⁴⁵⁶⁷⁸⁹⁺⁻⁻⁽⁾"), "subscript": str.maketrans(_SIGNS, "₀₁₂₃₄₅₆₇₈₉₊₋₋₍₎")}
_DEGREES = ("o", "O", "\u00b0", "\u00ba")
_FRACTION = re.compile(r"(\d?)([⁰¹²³⁴⁵⁶⁷⁸⁹]+)[/\u2044]([₀₁₂₃₄₅₆₇₈₉]+)")
_LEVEL = str.maketrans("⁰¹²³⁴⁵⁶⁷⁸⁹₀₁₂₃₄₅₆₇₈₉", "01234567890123456789")
_POWER = re.compile(r"(?:^|[^A-Za-z])(?:[mck]?m|ft|in|s)$")


class _Piece(NamedTuple):
    """A piece of a text: whether it is struck through (None where the font of the cell decides), and raised."""

    text: str
    struck: bool | None = None
    raised: bool = False


@dataclass(frozen=True, slots=True)
class Rich:
    """A text in pieces, each struck through or not, raised or not."""

    pieces: tuple[_Piece, ...]

    @property
    def text(self) -> str:
        """Return the whole text; raised digits over lowered ones are a fraction."""
        return _FRACTION.sub(_fraction, "".join(piece.text for piece in self.pieces))

    @property
    def unmarked(self) -> str:
        """Return the text without its raised marks; powers of units stay."""
        kept = ""
        for piece in self.pieces:
            if not piece.raised or "\u00b0" in piece.text or _POWER.search(kept):
                kept += piece.text
        return kept

    def parted(self, cell_struck: bool) -> tuple[str, str]:
        """Return the struck part of the text and the part that stands."""
        gone = [(cell_struck if piece.struck is None else piece.struck, piece.text) for piece in self.pieces]
        return "".join(text for struck, text in gone if struck), "".join(text for struck, text in gone if not struck)


def _fraction(found: re.Match[str]) -> str:
    whole, above, below = found.groups()
    return f"{whole}{' ' if whole else ''}{above.translate(_LEVEL)}/{below.translate(_LEVEL)}"


def lifted(text: str, height: str | None) -> str:
    """Return a raised or lowered piece in signs that say so, so that no digit of it is glued to a number.

    Digits, plus, minus and brackets have such signs; a raised o is a degree; other words are put in brackets.
    """
    bare = text.strip()
    if height not in _LIFTED or not any(map(str.isalnum, bare)):
        return text
    if height == _RAISED and bare in _DEGREES:
        return text.replace(bare, "\u00b0")
    if not any(map(str.isalpha, bare)):
        return text.translate(_LIFTED[height])
    lettered = height != _RAISED and not any(map(str.isdigit, bare))
    return text if lettered else text.replace(bare, f" ({bare})")


def _plain(text: str) -> str:
    """Return a text with the escape that some programs write for a carriage return made one."""
    return text.replace("_x000D_", "\r") if "_x" in text else text


def _one(pieces: list[_Piece]) -> str | Rich:
    """Return pieces as a plain text where the font of the cell decides for all of them and none is raised."""
    rich = Rich(tuple(pieces))
    plain = all(piece.struck is None and not piece.raised for piece in pieces)
    return rich.text if plain else rich


def shared_texts(strings: list[Any]) -> list[str | Rich]:
    """Return the shared texts of a workbook as openpyxl reads them, those in pieces as `Rich`."""
    return [_plain(text) if type(text) is str else _one([_piece(part) for part in text]) for text in strings]


def _piece(part: Any) -> _Piece:
    if isinstance(part, str):
        return _Piece(_plain(part))
    height = part.font.vertAlign
    return _Piece(lifted(_plain(str(part.text)), height), bool(part.font.strike), height == _RAISED)


def inline_text(element: Element | None) -> str | Rich:
    """Return the text that is written in a cell itself."""
    if element is None:
        return ""
    pieces: list[_Piece] = []
    for child in element:
        if child.tag == _TEXT:
            pieces.append(_Piece(_plain(child.text or "")))
        elif child.tag == _RUN:
            pieces.append(_run(child))
    return _one(pieces)


def _run(run: Element) -> _Piece:
    text, font = _plain(run.findtext(_TEXT) or ""), run.find(NAMESPACE + "rPr")
    if font is None:
        return _Piece(text)
    mark = font.find(_HEIGHT)
    height = None if mark is None else mark.get("val")
    return _Piece(lifted(text, height), is_struck(font), height == _RAISED)


def is_struck(font: Element) -> bool:
    """Return whether a font strikes its text through."""
    mark = font.find(_STRIKE)
    return mark is not None and mark.get("val", "1").lower() not in _NO
