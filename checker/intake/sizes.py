"""Nominal sizes as lists write them: NPS with fractions, DN, inch marks; held as NPS inches.

The pairs of NPS and DN are those of the criteria, after ASME B36.10M (DN as in ISO 6708).
"""

from __future__ import annotations

import re
from collections.abc import Iterable
from functools import cache, lru_cache
from typing import NamedTuple

from checker.criteria.nominal_size import nominal_sizes
from checker.intake.placeholders import placeholder
from checker.intake.texts import shown, tidy
from checker.model import Gap

__all__ = ["SizeReading", "column_basis", "read_size"]

NAN = float("nan")
_VULGAR = {"\u00bc": "1/4", "\u00bd": "1/2", "\u00be": "3/4", "\u215b": "1/8", "\u215c": "3/8"}
_DN = re.compile(
    r"(?:DN|ND)\s*[-.=:]?\s*(\d{1,4})(?:\s*mm)?|(\d{1,4})\s*(?:NB|mm|DN|mm\s*NB)", re.IGNORECASE | re.ASCII
)
_INCHES = re.compile(
    r"(NPS\s*)?(?:(\d{1,2})(?:\s*[-.\s]\s*)(\d)\s*/\s*(\d)|(\d)\s*/\s*(\d)|(\d{1,3}(?:[.,]\d{1,4})?|\.\d{1,4}))"
    r"\s*(\"|''|inch(?:es)?\.?|ins?\.?|NPS)?",
    re.IGNORECASE | re.ASCII,
)
_TWO_SIZES = re.compile(r".*\d.*[xX\u00d7/&+~].*\d.*|.*\d\s*(?:to|-|and)\s*\d.*")
_ASK_BASIS = "write 6\" or DN 150, head the column 'Size (NPS)' or 'Size (DN)', or set [units] size in the criteria."


class SizeReading(NamedTuple):
    """One size cell: NPS inches (NaN where there is none), its gap, the reason of a refusal, and its own basis."""

    nps: float
    gap: Gap
    reason: str
    basis: str


@cache
def _pairs() -> tuple[tuple[float, float], ...]:
    return tuple((nps, float(dn)) for nps, dn in nominal_sizes().items())


def _refused(text: str, reason: str, basis: str = "") -> SizeReading:
    return SizeReading(NAN, Gap.REFUSED, f"{shown(text)} {reason}", basis)


def _listed(number: float, basis: str, text: str, own: str) -> SizeReading:
    """Return the nominal size of a number on a basis, or a refusal that names the nearest ones."""
    if number <= 0.0:
        return _refused(text, 'is not above zero: a pipe needs a nominal size such as 6" or DN 150.', own)
    place = 0 if basis == "NPS" else 1
    for pair in _pairs():
        if pair[place] == number:
            return SizeReading(pair[0], Gap.GIVEN, "", own)
    nearest = sorted(sorted(_pairs(), key=lambda pair: abs(pair[place] - number))[:2])
    names = " and ".join(f"{basis} {pair[place]:g}" for pair in nearest)
    return _refused(text, f"is no nominal size of ASME B36.10M ({basis}); the nearest are {names}.", own)


def _inches(match: re.Match[str]) -> float | None:
    whole, upper, lower, upper_alone, lower_alone, number = match.group(2, 3, 4, 5, 6, 7)
    if number is not None:
        return float(number.replace(",", "."))
    top, bottom = int(upper or upper_alone), int(lower or lower_alone)
    return float(whole or 0) + top / bottom if bottom in (2, 4, 8) and top < bottom else None


def _in_inches(match: re.Match[str], *, text: str, basis: str, comma: bool) -> SizeReading:
    number, written = _inches(match), match[7]
    if number is None:
        return _refused(text, "names two sizes or no fraction of an inch: give one size a row.")
    if written is not None and "," in written and not comma:
        return _refused(text, "has a decimal comma in a list that is not written with one: write 1.5 or 1 1/2.")
    if written is not None and re.match(r"0\d", written):
        return _refused(text, 'looks like a coded size: write 6" or DN 150.')
    marked = bool(match[1] or match[8] or written is None)
    if not marked and not basis and number == int(number):
        return _refused(text, f"could be NPS or DN: {_ASK_BASIS}")
    return _listed(number, "NPS" if marked else basis or "NPS", text, "NPS" if marked else "")


@lru_cache(maxsize=8192)
def read_size(text: str, basis: str, comma: bool) -> SizeReading:
    """Read one size cell.

    Parameters
    ----------
    text : str
        The cell as written.
    basis : str
        ``NPS`` or ``DN`` where the column says which, else empty: then a bare whole number is refused.
    comma : bool
        Whether the list is written with decimal commas.
    """
    plain = tidy(text)
    for sign, fraction in _VULGAR.items():
        plain = plain.replace(sign, f" {fraction}")
    plain = " ".join(plain.split())
    gap = placeholder(plain, "size")
    if gap is not Gap.GIVEN:
        return SizeReading(NAN, gap, "", "")
    if len(plain) > 40:
        return _refused(text, 'is no size: write 6" or DN 150.')
    dn_match = _DN.fullmatch(plain)
    if dn_match:
        return _listed(float(dn_match[1] or dn_match[2]), "DN", text, "DN")
    if re.fullmatch(r"0[0-9]{2,4}|[0-9]{4}", plain) and basis != "DN":
        return _refused(text, 'looks like a coded size (inches x 100 or mm?): write 6" or DN 150.')
    if re.fullmatch(r"[0-9]{4}", plain):
        return _listed(float(plain), "DN", text, "")
    match = _INCHES.fullmatch(plain)
    if match:
        return _in_inches(match, text=text, basis=basis, comma=comma)
    if plain.startswith("-"):
        return _refused(text, 'is not above zero: a pipe needs a nominal size such as 6" or DN 150.')
    if _TWO_SIZES.fullmatch(plain):
        return _refused(text, "names two sizes: give one size a row.")
    return _refused(text, 'is no nominal size: write 6" or DN 150.')


def column_basis(cells: Iterable[str], comma: bool) -> str:
    """Return the basis that the marked cells of a bare size column agree on, where they outnumber the bare ones."""
    counts = {"NPS": 0, "DN": 0, "": 0}
    for cell in cells:
        reading = read_size(cell, "", comma)
        if reading.gap in (Gap.GIVEN, Gap.REFUSED):
            counts[reading.basis] += 1
    stated = [basis for basis in ("NPS", "DN") if counts[basis]]
    return stated[0] if len(stated) == 1 and counts[stated[0]] > counts[""] else ""
