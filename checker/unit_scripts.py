"""Units typed with letters of another script: read by a table of known ones, never half by one and half by the other.

`tables/unit_letters.csv` decides, and nothing else. Russian symbols of units (GOST 8.417, *from memory*) are whole
spellings; letters that look like Latin ones are put in their place one by one. A text that still holds another letter
stays as it is, so that no table knows it and `strange_letters` can name what stands in it.
"""

from __future__ import annotations

import csv
import unicodedata
from collections.abc import Mapping
from functools import cache
from pathlib import Path

__all__ = ["in_latin", "strange_letters"]

TABLE = Path(__file__).parent / "tables" / "unit_letters.csv"
_KNOWN_LETTERS = frozenset("\u00b5\u00fc\u00dc")
"""The micro sign, and the u with two dots of the German gauge pressure."""


@cache
def _table(kind: str) -> Mapping[str, str]:
    """Return the Latin form of whole units, of words for gauge and absolute, or of letters."""
    with TABLE.open(encoding="utf-8", newline="") as handle:
        return {row["written"]: row["latin"] for row in csv.DictReader(handle) if row["kind"] == kind}


def _russian(text: str) -> str:
    units = _table("unit")
    if text in units:
        return units[text]
    for word, suffix in _table("reference").items():
        unit = text.removesuffix(word).removesuffix("-")
        if text.endswith(word) and unit in units:
            return units[unit] + suffix
    return ""


def _is_strange(character: str) -> bool:
    return character.isalpha() and not character.isascii() and character not in _KNOWN_LETTERS


def in_latin(folded: str) -> str:
    """Return a folded unit in Latin letters, or as it stands where a letter of another script is not in the table."""
    if folded.isascii():
        return folded
    latin = _russian(folded) or "".join(_table("letter").get(character, character) for character in folded)
    return folded if any(map(_is_strange, latin)) else latin


def strange_letters(text: str) -> str:
    """Return the letters of other scripts in a unit with their names, empty where there are none."""
    strange = dict.fromkeys(filter(_is_strange, text))
    return ", ".join(f"U+{ord(letter):04X} {unicodedata.name(letter, 'no name').lower()}" for letter in strange)
