"""What a number format says that the stored number does not: a unit, per cent, leading zeros, a date."""

from __future__ import annotations

import re
from dataclasses import dataclass

__all__ = ["PLAIN", "Style", "style_of"]

_TOKEN = re.compile(r'"([^"]*)"|\\(.)|_.|\*.|\[[^\]]*\]|(.)', re.DOTALL)
_PLACEHOLDERS = frozenset("0#?")
_SCALED = re.compile(r"[0#?.],+(?![0#?,])")
_TELLING = re.compile('[^\\W\\d_]|[<>~\u2264\u2265\u00b1\u00b0"\u2033]')
_SECTION = re.compile(r'"[^"]*"|\\.|(;)')


@dataclass(frozen=True, slots=True)
class Style:
    """How a cell is shown.

    Attributes
    ----------
    struck : bool
        Whether its font is struck through.
    kind : str
        ``plain``, ``date``, ``duration``, ``per cent`` or ``scaled`` (shown in thousands of what is stored).
    digits : int
        Digits to which a whole number is filled with zeros.
    before, after : str
        Literal texts that stand around the number: a unit, a letter, a sign.
    """

    struck: bool = False
    kind: str = "plain"
    digits: int = 0
    before: str = ""
    after: str = ""


PLAIN = Style()


def _first_section(code: str) -> str:
    for found in _SECTION.finditer(code):
        if found[1]:
            return code[: found.start(1)]
    return code


def _parts(code: str) -> tuple[str, str, str]:
    """Return the literal text before the digits of a format, the digits, and the literal text after them."""
    before, core, after = "", "", ""
    for found in _TOKEN.finditer(code):
        literal = found[1] if found[1] is not None else found[2]
        if literal is None and found[3] is not None:
            core += found[3]
        elif literal and not _PLACEHOLDERS.intersection(core):
            before += literal
        elif literal:
            after += literal
    return before, core, after


def _told(literal: str) -> str:
    """Return a literal that says something of the number, empty for blanks, brackets and dashes."""
    return literal if _TELLING.search(literal) else ""


def style_of(code: str, *, struck: bool) -> Style:
    """Return what a number format and a font say of a cell.

    Parameters
    ----------
    code : str
        Number format as the workbook writes it, such as ``0.0" barg"``.
    struck : bool
        Whether the font is struck through.
    """
    from openpyxl.styles.numbers import is_date_format, is_timedelta_format

    if code in ("General", "@", ""):
        return Style(struck)
    if is_timedelta_format(code):
        return Style(struck, "duration")
    if is_date_format(code):
        return Style(struck, "date")
    before, core, after = _parts(_first_section(code))
    kind = "per cent" if "%" in core else "scaled" if _SCALED.search(core) else "plain"
    bare = core.strip()
    digits = len(bare) if re.fullmatch("0{2,}", bare) else 0
    return Style(struck, kind, digits, _told(before), _told(after))
