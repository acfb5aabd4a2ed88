"""What a number format says that the stored number does not: a unit, per cent, leading zeros, a date."""

from __future__ import annotations

import re
from collections.abc import Callable
from dataclasses import dataclass, replace
from operator import eq, ge, gt, le, lt, ne

__all__ = ["ODD_KINDS", "PLAIN", "Style", "style_of"]

_TOKEN = re.compile(r'"([^"]*)"|\\(.)|_.|\*.|\[\$([^\]-]*)[^\]]*\]|\[[^\]]*\]|(.)', re.DOTALL)
_PLACEHOLDERS = frozenset("0#?")
_SCALED = re.compile(r"[0#?.],+(?![0#?,])")
_TELLING = re.compile('[^\\W\\d_]|[<>~\u2264\u2265\u00b1\u00b0"\u2033%\u2030]')
_POWER = re.compile(r"\s*[eExX\u00d7*^]\s*\d")
_CONDITION = re.compile(r"\[(<=|>=|<>|<|>|=)\s*(-?\d+(?:\.\d*)?)\]")
_INLAID = re.compile(r"[0#?][-:/][0#?]")
_GENERAL = re.compile(r'("[^"]*"|\\.)|general|@', re.IGNORECASE)
_SIGN_AHEAD = re.compile(r"(?<![^\W_])[-(\u2212]")
_TESTS: dict[str, Callable[[float, float], bool]] = {"<": lt, ">": gt, "<=": le, ">=": ge, "<>": ne, "=": eq}
_SIGNED = (((">=", float("-inf")),), ((">=", 0.0), ("<", 0.0)), ((">", 0.0), ("<", 0.0), ("=", 0.0)))

ODD_KINDS = frozenset({"words", "added", "inlaid", "sign"})
"""Kinds of formats that show something else than the number: words alone, further digits, another sign."""
_SECTION = re.compile(r'"[^"]*"|\\.|(;)')


@dataclass(frozen=True, slots=True)
class Style:
    """How a cell is shown.

    Attributes
    ----------
    struck : bool
        Whether its font is struck through.
    kind : str
        ``plain``, ``date``, ``duration``, ``per cent``, ``scaled`` (shown in thousands of what is stored), ``by value``
        (see `sections`), ``words`` (shows `before` and no number), ``added`` (literals with digits of their own),
        ``inlaid`` (literals among the digits) or ``sign`` (a minus added or left out).
    digits : int
        Digits to which a whole number is filled with zeros.
    before, after : str
        Literal texts that stand around the number: a unit, a letter, a sign.
    code : str
        The format itself, for the kinds that show something else than the number.
    sections : tuple of (str, float, Style)
        Comparison, bound and style of each section, where they differ.
    """

    struck: bool = False
    kind: str = "plain"
    digits: int = 0
    before: str = ""
    after: str = ""
    code: str = ""
    sections: tuple[tuple[str, float, Style], ...] = ()

    def of(self, number: float) -> Style:
        """Return the style in which a number is shown."""
        for comparison, bound, style in self.sections:
            if _TESTS[comparison](number, bound):
                return style
        return Style(self.struck, "words", code=self.code) if self.sections else self


PLAIN = Style()


def _sections(code: str) -> list[str]:
    """Return the sections of a format that are for numbers, at most three."""
    ends = [found.start(1) for found in _SECTION.finditer(code) if found[1]]
    starts = [0, *(end + 1 for end in ends)]
    return [code[start:end] for start, end in zip(starts, [*ends, len(code)], strict=True)][:3]


def _parts(code: str) -> tuple[str, str, str]:
    """Return the literal text before the digits of a format, the digits, and the literal text after them.

    A literal between two digits leaves a zero sign among them.
    """
    before, core, after = "", "", ""
    for found in _TOKEN.finditer(code):
        quoted, escaped, currency, bare = found.groups()
        literal = next((part for part in (quoted, escaped, currency) if part is not None), "")
        if bare is not None:
            core += "\0" + bare if after.strip() and bare in _PLACEHOLDERS else bare
        elif _PLACEHOLDERS.intersection(core):
            after += literal
        else:
            before += literal
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
    style = _of_sections(code)
    sections = tuple((name, bound, replace(part, struck=struck)) for name, bound, part in style.sections)
    return replace(style, struck=struck, sections=sections)


def _of_sections(code: str) -> Style:
    parts = _sections(code)
    stated = [_CONDITION.search(part) for part in parts]
    tests = list(_SIGNED[len(parts) - 1])
    if any(stated):
        tests = [(found[1], float(found[2])) if found else (">=", float("-inf")) for found in stated]
    styles = [_of_section(part, negative=tests[place] == ("<", 0.0), code=code) for place, part in enumerate(parts)]
    sections = [(*test, style) for test, style in zip(tests, styles, strict=True)]
    at_zero = next((place for place, (name, bound) in enumerate(tests) if _TESTS[name](0.0, bound)), -1)
    if at_zero >= 0 and _hides_zero(parts[at_zero]):
        sections.insert(0, ("=", 0.0, _words(parts[at_zero], code)))
    elif all(style == styles[0] for style in styles) and not any(stated):
        return styles[0]
    return Style(kind="by value", code=code, sections=tuple(sections))


def _plain_parts(part: str) -> tuple[str, str, str]:
    """Return the parts of a section, the word General in it as a digit."""
    return _parts(_GENERAL.sub(lambda found: found[1] or "0", part))


def _hides_zero(part: str) -> bool:
    _, core, _ = _plain_parts(part)
    return bool(_PLACEHOLDERS.intersection(core)) and not {"0", "/"}.intersection(core)


def _words(part: str, code: str) -> Style:
    """Return the style of a section that shows its literals and no number."""
    before, core, after = _plain_parts(part)
    return Style(kind="words", before=f"{before}{re.sub('[0#?,.]', '', core)}{after}".strip(), code=code)


def _of_section(part: str, *, negative: bool, code: str) -> Style:
    """Return the style of one section of a format."""
    before, core, after = _plain_parts(part)
    odd = _odd_kind(before, core, after, negative)
    if odd == "words":
        return _words(part, code)
    kind = odd or ("per cent" if "%" in core else "scaled" if _SCALED.search(core) else "plain")
    bare = core.strip()
    digits = len(bare) if re.fullmatch("0{2,}", bare) else 0
    return Style(False, kind, digits, _told(before), _told(after), code if odd else "")


def _odd_kind(before: str, core: str, after: str, negative: bool) -> str:
    """Return in which way a section shows something else than the number, empty where it does not."""
    if not _PLACEHOLDERS.intersection(core):
        return "words"
    if _INLAID.search(core.replace("?/?", "")) or "\0" in core:
        return "inlaid"
    ahead = before + core[: min(core.index(sign) for sign in _PLACEHOLDERS.intersection(core))]
    if bool(_SIGN_AHEAD.search(ahead)) != negative:
        return "sign"
    first = next((sign for sign in after if sign.isalpha() or sign.isnumeric()), "")
    added = any(map(str.isnumeric, before)) or first.isnumeric()
    return "added" if added or _POWER.match(after) else ""
