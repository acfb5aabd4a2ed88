"""The ways to part one header into its name and its unit."""

from __future__ import annotations

import re
from collections.abc import Iterator
from dataclasses import dataclass

from checker.intake.texts import fold_words
from checker.intake.unit_words import is_unit_text

__all__ = ["Split", "brackets", "holds_several", "splits", "without_marks"]

_OPENING, _CLOSING = "[(", "])"
_NOTE = re.compile(r"(see )?notes?\b.*|[0-9*]{0,2}|refer .*")
_RAISED = re.compile(r"[*\u2020\u2021]+|(?<=[^\W\d_]{3})[\u00b9\u00b2\u00b3\u2074-\u2079]+")
_MARK = re.compile(r"[*\u2020\u2021\u00b9\u00b2\u00b3\u2074-\u2079]|[(\[]\s*(?:see |notes?|refer|\d)", re.IGNORECASE)
_REFERENCE = {"g": "g", "gauge": "g", "a": "a", "abs": "a", "absolute": "a"}
_LONGEST_UNIT_WORDS = 4
_MOST_WORDS = 14
_PRESSURE_WORDS = frozenset({"p", "press", "pressure", "pres"})
_TEMPERATURE_WORDS = frozenset({"t", "temp", "temperature"})
_KINDS = {
    "oper": "operating", "op": "operating", "opr": "operating", "operating": "operating", "design": "design",
    "des": "design", "test": "test", "hydrotest": "test", "mech": "mechanical", "mechanical": "mechanical",
}  # fmt: skip
_BESIDE_QUANTITIES = frozenset({"and", "max", "min", "norm", "normal", "condition", "conditions", "line"})
_PARTING = re.compile(r"[/&+,;\r\n]|\band\b", re.IGNORECASE)


@dataclass(frozen=True, slots=True)
class Split:
    """One way to part a header: name, unit, whether brackets or a comma part them, and the bracketed words left out."""

    name: str
    unit: str
    bracketed: bool
    dropped: tuple[str, ...] = ()


def brackets(header: str) -> tuple[str, list[tuple[str, str]]]:
    """Return the text outside brackets, and each outermost bracket's sign and content."""
    outside, contents, depth, start = "", [], 0, 0
    for position, character in enumerate(header):
        if character in _OPENING:
            start = position if depth == 0 else start
            depth += 1
        elif character in _CLOSING and depth:
            depth -= 1
            if depth == 0:
                contents.append((header[start], header[start + 1 : position].strip()))
                outside += " "
        elif depth == 0:
            outside += character
    return outside, contents


def holds_several(header: str) -> bool:
    """Return whether a header names several values in one column: ``Design P & T``, ``Oper/Des/Test pressure``."""
    name = brackets(header)[0]
    if not _PARTING.search(name):
        return False
    words = [word for word in fold_words(name).split() if not is_unit_text(word) or word in ("p", "t")]
    known = _PRESSURE_WORDS | _TEMPERATURE_WORDS | _BESIDE_QUANTITIES | frozenset(_KINDS)
    if not known.issuperset(words):
        return False
    both = not _PRESSURE_WORDS.isdisjoint(words) and not _TEMPERATURE_WORDS.isdisjoint(words)
    return both or len({_KINDS[word] for word in words if word in _KINDS}) > 1


def _with_reference(contents: list[tuple[str, str]]) -> list[tuple[str, str]]:
    """Return the brackets with ``(gauge)`` or ``(abs)`` joined to the unit beside it."""
    said = [text for _, text in contents if fold_words(text) in _REFERENCE]
    others = [(sign, text) for sign, text in contents if text not in said]
    units = [text for _, text in others if is_unit_text(text)]
    if len(said) != 1 or len(units) != 1:
        return contents
    letter = _REFERENCE[fold_words(said[0])]
    return [(sign, f"{text}({letter})" if text == units[0] else text) for sign, text in others]


def _bracket_splits(header: str) -> Iterator[Split]:
    outside, contents = brackets(header)
    contents = [(sign, text) for sign, text in contents if not _NOTE.fullmatch(fold_words(text)) or is_unit_text(text)]
    contents = _with_reference(contents)
    units = [text for sign, text in contents if is_unit_text(text)] or [text for sign, text in contents if sign == "["]
    words = [text for sign, text in contents if text not in units]
    unit = units[0] if units else ""
    yield Split(" ".join([outside, *words, *units[1:]]), unit, True)
    yield Split(outside, unit or next(iter(words), ""), True, tuple(words if unit else words[1:]))


def _signs(header: str) -> Iterator[Split]:
    """Yield the splits at units that are mere signs (``%``, an inch mark), which folding would drop unseen."""
    words = header.split()
    for position, word in enumerate(words[1:], start=1):
        if word[0] not in _OPENING and not fold_words(word) and is_unit_text(word):
            yield Split(" ".join(words[:position] + words[position + 1 :]), word, False)


def _bare(unit: str) -> str:
    return unit[1:-1].strip() if unit[:1] == "[" and unit[-1:] == "]" else unit


def without_marks(header: str) -> str:
    """Return a header without footnote marks: stars, ``(Note 4)``, small raised digits behind a word."""
    if not _MARK.search(header):
        return header
    plain = _RAISED.sub("", header)
    for _, text in brackets(plain)[1]:
        if _NOTE.fullmatch(fold_words(text)) and not is_unit_text(text):
            plain = plain.replace(f"({text})", " ").replace(f"[{text}]", " ")
    return " ".join(plain.split())


def splits(header: str) -> Iterator[Split]:
    """Yield every way to part a header into its name and its unit, the likeliest first."""
    _, contents = brackets(header)
    yield from _signs(header)
    if not any(sign == "[" or is_unit_text(text) for sign, text in contents):
        yield Split(header, "", False)
    if contents:
        yield from _bracket_splits(header)
    if "," in header:
        name, _, unit = header.rpartition(",")
        yield Split(name, unit.strip(), True)
    words = header.split()
    if len(words) > _MOST_WORDS:
        return
    for count in range(1, _LONGEST_UNIT_WORDS + 1):
        for start in range(len(words) - count, 0, -1):
            unit = _bare(" ".join(words[start : start + count]).strip(",;:"))
            if is_unit_text(unit):
                yield Split(" ".join(words[:start] + words[start + count :]), unit, False)
