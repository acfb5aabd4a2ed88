"""Texts of a list made harmless: every cell is taken for hostile until it has passed here."""

from __future__ import annotations

import re
import unicodedata

__all__ = ["LONGEST_CELL", "LONGEST_PROSE", "harmless_cell", "shortened", "visible", "visible_line"]

LONGEST_CELL = 200
LONGEST_PROSE = 2_000

# Categories that show nothing, or steer what stands beside them: controls, formats, surrogates, unassigned, private
# use, and the separators of lines and paragraphs.
_HIDDEN_CATEGORIES = frozenset({"Cc", "Cf", "Cs", "Cn", "Co", "Zl", "Zp"})
_PLAIN_SPACING = "\n\t"
_FORMULA_STARTS = frozenset("=+-@\t\r\n\uff1d\uff0b\uff0d\uff20")
_PLAIN_NUMBER = re.compile(r"[+-]?(\d+([.,]\d*)?|[.,]\d+)([eE][+-]?\d+)?")
_ASCII_PLAIN = re.compile(r"[\x20-\x7e]*")


def visible(text: str, *, keep: str = _PLAIN_SPACING) -> str:
    """Return a text with every character that hides or steers written out, as in ``\\x1b`` or ``\\u202e``.

    Parameters
    ----------
    text : str
        Any text.
    keep : str
        Control characters left as they are; line feed and tab unless told otherwise.
    """
    if _ASCII_PLAIN.fullmatch(text):
        return text
    return "".join(_written_out(character) if _hides(character, keep) else character for character in text)


def visible_line(text: str) -> str:
    """Return a text on one line: line feeds and tabs are written out too."""
    return visible(text, keep="")


def shortened(text: str, longest: int = LONGEST_CELL) -> str:
    """Return a text, cut where it is too long to show: an ellipsis and its whole length then follow."""
    if len(text) <= longest:
        return text
    return f"{text[:longest].rstrip()}\u2026 ({len(text)} characters)"


def harmless_cell(text: str) -> str:
    """Return a text that no spreadsheet takes for a formula.

    A text that begins like a formula gets an apostrophe in front, unless it is a plain number. Characters that hide
    or steer are written out; line feed, carriage return and tab stay, since a CSV field may hold them.
    """
    shown = visible(text, keep="\n\t\r")
    begins = shown.lstrip(" \u00a0")
    if begins[:1] not in _FORMULA_STARTS or not begins or _PLAIN_NUMBER.fullmatch(shown):
        return shown
    return f"'{shown}"


def _hides(character: str, keep: str) -> bool:
    return character not in keep and unicodedata.category(character) in _HIDDEN_CATEGORIES


def _written_out(character: str) -> str:
    code = ord(character)
    if code < 0x100:
        return f"\\x{code:02x}"
    return f"\\u{code:04x}" if code < 0x10000 else f"\\U{code:08x}"
