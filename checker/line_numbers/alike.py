"""In which characters two line numbers that look alike differ, by name."""

from __future__ import annotations

import unicodedata
from difflib import SequenceMatcher

__all__ = ["why_alike"]

LONGEST_COMPARED = 120
MOST_NAMED = 3
MOST_PLACES = 6
_NAMES = {
    "0": "a zero", "1": "a one", "O": "a capital O", "o": "a small o", "I": "a capital I", "i": "a small i",
    "l": "a small l", "L": "a capital L", "|": "a vertical bar", "-": "a hyphen", '"': "an inch mark", " ": "a blank",
    "'": "an apostrophe", "\t": "a tab",
}  # fmt: skip


def _name(character: str) -> str:
    if character in _NAMES:
        return _NAMES[character]
    if character.isascii() and character.isprintable():
        return f"'{character}'"
    return f"U+{ord(character):04X} {unicodedata.name(character, 'control character')}"


def _names(characters: str) -> str:
    kinds = list(dict.fromkeys(map(_name, characters[:8])))
    return f"{', '.join(kinds)}{' and more' if len(characters) > 8 else ''}"


def _difference(first: str, second: str, position: int, places: tuple[str, str]) -> list[str]:
    if not second or not first:
        names, where = (_names(first), places[0]) if first else (_names(second), places[1])
        return [f"{names} after character {position} stands {where} only"]
    if len(first) != len(second):
        return [f"from character {position + 1} on, {_names(first)} {places[0]}, {_names(second)} {places[1]}"]
    pairs = enumerate(zip(first, second, strict=True), start=position + 1)
    return [
        f"character {place} is {_name(one)} {places[0]} and {_name(other)} {places[1]}" for place, (one, other) in pairs
    ]


def _only_in_case(one: str, other: str) -> bool:
    return len(one) == len(other) and one.casefold() == other.casefold()


def _differing(one: str, other: str) -> list[tuple[int, int, int, int]]:
    """Return the stretches in which two texts differ: place by place where few places do, else by what they share."""
    if len(one) == len(other):
        places = [place for place, (a, b) in enumerate(zip(one, other, strict=True)) if a != b]
        if len(places) <= MOST_PLACES:
            return [(place, place + 1, place, place + 1) for place in places]
    codes = SequenceMatcher(None, one, other, autojunk=False).get_opcodes()
    return [(a, b, c, d) for kind, a, b, c, d in codes if kind != "equal"]


def why_alike(first: str, second: str, *, places: tuple[str, str] = ("in the first", "in the second")) -> str:
    """Return a sentence on the characters in which two line numbers differ, each by its name; empty where in none.

    Parameters
    ----------
    first, second : str
        Line numbers as written.
    places : (str, str)
        Words for where each of them stands.

    Examples
    --------
    >>> why_alike("P-1O42", "P-1042")
    'character 4 is a capital O in the first and a zero in the second'
    """
    one, other = first[:LONGEST_COMPARED], second[:LONGEST_COMPARED]
    if first == second:
        return ""
    if one == other:
        return f"they differ beyond character {LONGEST_COMPARED}"
    if _only_in_case(one, other):
        return "they differ in capital and small letters only"
    found: list[str] = []
    for start, end, begin, stop in _differing(one, other):
        if not _only_in_case(one[start:end], other[begin:stop]):
            found += _difference(one[start:end], other[begin:stop], start, places)
    more = f" and {len(found) - MOST_NAMED} more" if len(found) > MOST_NAMED else ""
    return "; ".join(found[:MOST_NAMED]) + more
