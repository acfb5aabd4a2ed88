"""Nominal pipe sizes as people write them, read into NPS inches.

The pairs of NPS and DN stand in `tables/nominal_sizes.csv` (ASME B36.10M-2018, table 1; DN by ISO 6708).
"""

from __future__ import annotations

import math
import re
import unicodedata
from collections.abc import Mapping
from fractions import Fraction
from functools import cache

from checker.tables.reading import read_table

__all__ = ["nominal_sizes", "read_nominal_size"]

LONGEST_SIZE = 24
_NUMBER = r"(?P<number>\d{1,4}(?:\.\d{1,4})?|(?:\d{1,2}[- ])?\d{1,2}/\d{1,2})"
_INCHES = re.compile(rf"(?:NPS\s*)?{_NUMBER}\s*(?:\"|''|IN|IN\.|INCH|INCHES|NPS)?", re.IGNORECASE)
_MILLIMETRES = re.compile(r"(?:DN\s*(\d{1,4})(?:\s*MM)?|(\d{1,4})\s*(?:DN|MM|NB|MM NB))", re.IGNORECASE)


def _inches(text: str) -> float:
    """Return 1.5 for ``1.5``, ``1-1/2`` or ``1 1/2``; NaN for a fraction that is none."""
    whole, _, part = text.replace("-", " ").rpartition(" ")
    try:
        return float(Fraction(whole or "0") + Fraction(part))
    except (ValueError, ZeroDivisionError):
        return math.nan


@cache
def nominal_sizes() -> Mapping[float, int]:
    """Return the DN of every nominal size, by its NPS in inches, ascending."""
    return {float(row["nps"]): int(row["dn"]) for row in read_table("nominal_sizes")}


@cache
def _by_dn() -> Mapping[int, float]:
    return {dn: nps for nps, dn in nominal_sizes().items()}


def _folded(text: str) -> str:
    """Return the text with its vulgar fractions and look-alike quotes written in plain characters."""
    plain = re.sub(r"(?<=\d)(?=[¼½¾⅛⅜⅝⅞])", " ", text.replace("″", '"').replace("”", '"'))
    return " ".join(unicodedata.normalize("NFKC", plain).replace("\u2044", "/").split())


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
    plain = _folded(text) if len(text) <= LONGEST_SIZE else ""
    metric = _MILLIMETRES.fullmatch(plain)
    if metric:
        return _by_dn().get(int(metric[1] or metric[2]), math.nan)
    imperial = _INCHES.fullmatch(plain)
    size = _inches(imperial["number"]) if imperial else math.nan
    return size if size in nominal_sizes() else math.nan
