"""In which characters two line numbers that look alike differ, by name."""

from __future__ import annotations

import unicodedata
from difflib import SequenceMatcher

__all__ = ["why_alike"]

LONGEST_COMPARED = 120
MOST_NAMED = 3
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


def _difference(first: str, second: str, position: int) -> list[str]:
    if not second:
        return [f"{_names(first)} after character {position} stands in the first only"]
    if not first:
        return [f"{_names(second)} after character {position} stands in the second only"]
    if len(first) != len(second):
        return [f"from character {position + 1} on, {_names(first)} stand against {_names(second)}"]
    pairs = enumerate(zip(first, second, strict=True), start=position + 1)
    return [
        f"character {place} is {_name(one)} in the first and {_name(other)} in the second"
        for place, (one, other) in pairs
    ]


def _only_in_case(one: str, other: str) -> bool:
    return len(one) == len(other) and one.casefold() == other.casefold()


def why_alike(first: str, second: str) -> str:
    """Return a sentence on the characters in which two line numbers differ, each by its name; empty where in none.

    Parameters
    ----------
    first, second : str
        Line numbers as written.

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
    for kind, a, b, c, d in SequenceMatcher(None, one, other, autojunk=False).get_opcodes():
        if kind != "equal" and not _only_in_case(one[a:b], other[c:d]):
            found += _difference(one[a:b], other[c:d], a)
    more = f" and {len(found) - MOST_NAMED} more" if len(found) > MOST_NAMED else ""
    return "; ".join(found[:MOST_NAMED]) + more
