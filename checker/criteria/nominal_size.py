"""Nominal pipe sizes as people write them, read into NPS inches.

The pairs of NPS and DN stand in `tables/nominal_sizes.csv` (ASME B36.10M-2018, table 1; DN by ISO 6708).
"""

from __future__ import annotations

import math
import re
import unicodedata
from collections.abc import Mapping
from functools import cache
from typing import NamedTuple

from checker.tables.reading import read_table
from checker.unit_spelling import LOOK_ALIKES

__all__ = ["CODED", "SIZE_BASES", "WrittenSize", "nominal_sizes", "read_nominal_size", "size_of_dn", "written_size"]

LONGEST_SIZE = 24
CODED = "NPS x 100"
"""Basis of sizes written as codes: inches x 100, so that 0600 is NPS 6."""
SIZE_BASES = {
    "NPS": "nps in inch inches ins npsin npsinch npsinches nominalinch nominalinches \" ''",
    "DN": "dn mm nb nd nbmm mmnb dnmm mmdn millimetre millimetres",
    CODED: "npsx100 inchesx100 inchx100 inx100 nps*100 inches*100 inch*100 in*100",
}
"""Words by which a header, a units row or the criteria name the basis of sizes: folded, in small letters."""
_DIAMETERS = str.maketrans(dict.fromkeys("\u2300\u00f8\u2205\u03c6\u03a6", "\u00d8"))
_VULGAR = re.compile(r"(?<=\d)\s*-?\s*(?=[¼½¾⅛⅜⅝⅞])")
_MARK = r"(?:\"|INCH(?:ES)?\.?|INS?\.?|ZOLL|PULG\.?)"
_NUMBER = (
    r"(?:(?P<whole>\d{1,2})\s*[-.\s\"]\s*(?P<upper>\d{1,2})\s*/\s*(?P<lower>\d{1,2})"
    r"|(?P<top>\d{1,2})\s*/\s*(?P<bottom>\d{1,2})|(?P<number>\d{1,4}(?:[.,]\d{1,4})?|\.\d{1,4}))"
)
_INCHES = re.compile(
    rf"(?P<prefix>NPS\s*[-.=:]?\s*|NB\s*|Ø\s*)?{_NUMBER}(?:\s*-?\s*(?P<mark>{_MARK}))?(?:\s*(?P<suffix>NPS|NB))?",
    re.IGNORECASE | re.ASCII,
)
_METRIC = re.compile(
    r"(?P<before>DN|ND|NB|Ду|Ø)\s*[-.=:_]?\s*(?P<first>[0-9]{1,4})(?:\s*MM)?"
    r"|(?P<second>[0-9]{1,4}(?:[.][0-9]{1,3}(?=\s*MM))?)\s*-?\s*(?P<after>MM\s*NB|NB\s*MM|NB|MM|DN|ND|A)",
    re.IGNORECASE,
)
_BOTTOMS = (2, 4, 8)


class WrittenSize(NamedTuple):
    """A size as a text states it: its number, and its basis: ``NPS``, ``DN`` or empty where the text names none.

    `sign` is the word that names a metric basis (``DN``, ``NB``, ``A``, ``Ø`` ...), `comma` is True where the number
    has a decimal comma.
    """

    number: float
    basis: str
    sign: str = ""
    comma: bool = False


@cache
def nominal_sizes() -> Mapping[float, int]:
    """Return the DN of every nominal size, by its NPS in inches, ascending."""
    return {float(row["nps"]): int(row["dn"]) for row in read_table("nominal_sizes")}


@cache
def size_of_dn() -> Mapping[float, float]:
    """Return the NPS in inches of every nominal size, by its DN."""
    return {float(dn): nps for nps, dn in nominal_sizes().items()}


def _folded(text: str) -> str:
    """Return the text with its vulgar fractions and look-alike signs written in plain characters."""
    signs = _VULGAR.sub(" ", text.translate(LOOK_ALIKES).translate(_DIAMETERS))
    plain = unicodedata.normalize("NFKC", signs).replace("\u2044", "/").replace("''", '"')
    return " ".join(plain.split())


def _fraction(match: re.Match[str]) -> float:
    """Return the inches of a fraction in its lowest terms, NaN where it is none that pipes have."""
    top, bottom = int(match["upper"] or match["top"]), int(match["lower"] or match["bottom"])
    if bottom not in _BOTTOMS or not top < bottom or top % 2 == 0:
        return math.nan
    return float(match["whole"] or 0) + top / bottom


def _in_inches(match: re.Match[str]) -> WrittenSize | None:
    number, prefix = match["number"], (match["prefix"] or "").strip().upper()
    marked = bool(match["mark"] or prefix.startswith("NPS") or (match["suffix"] or "").upper() == "NPS")
    if number is None:
        size = _fraction(match)
        return None if math.isnan(size) else WrittenSize(size, "NPS")
    if not marked and (prefix or match["suffix"]):
        return None
    return WrittenSize(float(number.replace(",", ".")), "NPS" if marked else "", comma="," in number)


def written_size(text: str) -> WrittenSize | None:
    """Return what a text says of a nominal size, whether there is such a size or not.

    Parameters
    ----------
    text : str
        ``6"``, ``6-inch``, ``NPS 6``, ``DN 150``, ``150NB``, ``80A`` (JIS), ``Ø80``, ``1-1/2"``, ``1½``,
        ``1.5``, ``6``.

    Returns
    -------
    WrittenSize or None
        None where the text is not one size in one of these forms. A fraction is one of inches.
    """
    plain = _folded(text) if len(text) <= LONGEST_SIZE else ""
    metric = _METRIC.fullmatch(plain)
    if metric and plain.isascii() | ("Ø" in plain) | plain[:2].upper().startswith("ДУ"):
        sign = (metric["before"] or metric["after"]).upper().replace(" ", "")
        return WrittenSize(float(metric["first"] or metric["second"]), "DN", sign)
    imperial = _INCHES.fullmatch(plain)
    return _in_inches(imperial) if imperial else None


def read_nominal_size(text: str) -> float:
    """Return the NPS, in inches, that a text names.

    Parameters
    ----------
    text : str
        ``6"``, ``6 in``, ``NPS 6``, ``DN150``, ``150 mm``, ``1-1/2"``, ``1½``, ``1.5`` and the like. A bare number is
        an NPS: whether a bare 20 were a DN cannot be told.

    Returns
    -------
    float
        NPS in inches; NaN where the text is no nominal size of ASME B36.10M (1/8 to 80).

    Examples
    --------
    >>> read_nominal_size("DN 150"), read_nominal_size('1-1/2"'), read_nominal_size("7 in")
    (6.0, 1.5, nan)
    """
    written = written_size(text)
    if written is None or written.comma or written.sign in ("A", "Ø"):
        return math.nan
    if written.basis == "DN":
        return size_of_dn().get(written.number, math.nan)
    return written.number if written.number in nominal_sizes() else math.nan
