"""One key of a line number for comparison, and a looser one under which look-alikes are equal.

Both take a whole list at once: the numbers are joined, folded in a few passes over one text, and parted again.
"""

from __future__ import annotations

import re
import unicodedata
from collections.abc import Sequence

from checker.line_numbers.look_alikes import HYPHENS, IN_LATIN, INCH_MARKS, INVISIBLE

__all__ = ["LONGEST_NUMBER", "folded_key", "folded_keys", "looser_key", "looser_keys", "plain_numbers"]

#: What stands beyond is not parsed: no line number is that long. Keys hold the whole of it.
LONGEST_NUMBER = 200
_PARTING = "\n"
_MOST_PASSES = 6
_SIGNS = str.maketrans({**dict.fromkeys(HYPHENS, "-"), **dict.fromkeys(INCH_MARKS, '"'), "\u2044": "/", "\u2215": "/"})
_CONTROLS = [chr(code) for code in (*range(9), *range(14, 28), 127)]
_ASCII_BLANKS = " \t\r\x0b\x0c\x1c\x1d\x1e\x1f"
_BLANKS = re.compile(r"[^\S\n]+")
_BLANK_AT_EDGE = re.compile(r"\A |(?<=[-/_.\n]) | (?=[-/_.\n]|\Z)")
_REVISION = re.compile(
    r"(?:[ _]{0,3}[\[(] ?REV(?:ISION)?[ .:-]{0,3}[A-Z0-9]{1,3} ?[\])]|[-_ ]{1,3}REV[ .:]{0,3}[A-Z0-9]{1,3})(?=\n|\Z)"
)
_KEPT_BLANK = re.compile(r" (?=\d)(?<=\d )| (?=[^\W\d_])(?<=[^\W\d_] )")


def _joined(texts: Sequence[str]) -> str:
    joined = _PARTING.join(texts)
    if joined.count(_PARTING) == max(0, len(texts) - 1):
        return joined
    return _PARTING.join(" ".join(text.split()) for text in texts)


def _in_plain_signs(text: str) -> str:
    """Return a text in Latin letters and plain signs, without what cannot be seen; its letters keep their case."""
    if text.isascii():
        seen = INVISIBLE.sub("", text) if any(sign in text for sign in _CONTROLS) else text
        return seen.replace("'", '"').replace("`", '"')
    for _ in range(_MOST_PASSES):
        before = text
        seen = INVISIBLE.sub("", text.translate(_SIGNS)).translate(IN_LATIN)
        text = unicodedata.normalize("NFKC", seen)
        if text == before:
            break
    return text


def _tidy_blanks(text: str) -> str:
    """Return a text with one blank where there are several, and none beside a delimiter or at an end."""
    if text.isascii() and not any(sign in text for sign in _ASCII_BLANKS):
        return text
    return _BLANK_AT_EDGE.sub("", _BLANKS.sub(" ", text))


def _parted(text: str, count: int) -> list[str]:
    return text.split(_PARTING) if count else []


def plain_numbers(texts: Sequence[str]) -> list[str]:
    """Return line numbers in capitals, Latin letters and plain signs, without a trailing revision.

    Inch marks are ``"``, hyphens of every kind ``-``; blanks beside a delimiter are gone.
    """
    longest = max(map(len, texts), default=0)
    text = _joined(texts if longest <= LONGEST_NUMBER else [text[:LONGEST_NUMBER] for text in texts])
    signs = _in_plain_signs(text).upper()
    plain = _tidy_blanks(signs if signs.isascii() else _in_plain_signs(signs))
    while '""' in plain:
        plain = plain.replace('""', '"')
    return _parted(_without_revision(plain), len(texts))


def _without_revision(text: str) -> str:
    return _REVISION.sub("", text) if "REV" in text else text


def _folded(text: str) -> str:
    for _ in range(_MOST_PASSES):
        before = text
        text = _in_plain_signs(text).casefold().replace('"', "")
        text = _tidy_blanks(text)
        if " " in text:
            text = _keep_blanks(text)
        if text == before or (text.isascii() and before.isascii() and " " not in text):
            break
    return text


def _keep_blanks(text: str) -> str:
    """Return a text whose blanks are gone but between two digits or two letters, where they part two words."""
    return _KEPT_BLANK.sub("\0", text).replace(" ", "").replace("\0", " ")


def folded_keys(texts: Sequence[str]) -> list[str]:
    """Return the key under which each line number is compared.

    Case, blanks, inch and quotation marks, and what cannot be seen do not count; hyphens of every kind are one; a
    Cyrillic or Greek letter is the Latin one it looks like. A blank between two digits or two letters stays: ``P 1 11``
    is not ``P 11 1``. Folding a key again changes nothing.
    """
    return _parted(_folded(_joined(texts)), len(texts))


def folded_key(text: str) -> str:
    """Return the key of one line number, as `folded_keys` does."""
    return folded_keys((text,))[0]


_LOOSE = (("O", "0"), ("I", "1"), ("|", "1"), (" ", ""), ('"', ""))


def _small_l_as_one(text: str) -> str:
    """Return a text whose small l is a one where all its other letters are capitals."""
    others = text.replace("l", "")
    return text.replace("l", "1") if "l" in text and others == others.upper() else text


def _without_accents(text: str) -> str:
    if text.isascii():
        return text
    return "".join(mark for mark in unicodedata.normalize("NFKD", text) if not unicodedata.combining(mark))


def looser_keys(texts: Sequence[str]) -> list[str]:
    """Return a key under which line numbers that look alike are equal.

    As `folded_keys`, and O and 0, I and 1 (and a small l among capitals) are one, accents and blanks do not count,
    and a trailing revision such as ``(Rev B)`` is left off. A capital L looks like neither: ``IA`` is not ``LA``.
    """
    signs = _in_plain_signs(_joined(texts))
    if "l" in signs:
        signs = _PARTING.join(map(_small_l_as_one, signs.split(_PARTING)))
    plain = _tidy_blanks(_in_plain_signs(_without_accents(signs).upper()))
    for _ in range(_MOST_PASSES):
        before = plain
        plain = _in_plain_signs(_without_accents(_without_revision(plain))).upper()
        for sign, alike in _LOOSE:
            plain = plain.replace(sign, alike)
        if plain == before:
            break
    return _parted(plain, len(texts))


def looser_key(text: str) -> str:
    """Return the looser key of one line number, as `looser_keys` does."""
    return looser_keys((text,))[0]
