"""Service texts and patterns, folded so that case, blanks and punctuation do not matter."""

from __future__ import annotations

import unicodedata

__all__ = ["fits", "fold_pattern", "fold_text"]

LONGEST_TEXT = 300


def fold_text(text: str) -> str:
    """Return the letters and digits of a text, without case: ``H.P. Steam`` and ``HP STEAM`` are one."""
    plain = unicodedata.normalize("NFKC", text[:LONGEST_TEXT]).casefold()
    return "".join(character for character in plain if character.isalnum())


def fold_pattern(pattern: str) -> str:
    """Return a pattern folded like a text, its ``*`` kept and runs of them made one."""
    pieces = [fold_text(piece) for piece in pattern[:LONGEST_TEXT].split("*")]
    inner = [piece for piece in pieces[1:-1] if piece]
    return "*".join([pieces[0], *inner, pieces[-1]]) if len(pieces) > 1 else pieces[0]


def fits(text: str, pattern: str) -> bool:
    """Return whether a folded text fits a folded pattern, in time that grows with their lengths only."""
    first, *inner = pattern.split("*")
    if not inner:
        return text == first
    last = inner.pop()
    if len(text) < len(first) + len(last) or not text.startswith(first) or not text.endswith(last):
        return False
    start, end = len(first), len(text) - len(last)
    for piece in inner:
        found = text.find(piece, start, end)
        if found < 0:
            return False
        start = found + len(piece)
    return True
