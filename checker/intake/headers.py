"""What one header says: the fields it may carry, its unit and its case."""

from __future__ import annotations

import re
from collections.abc import Iterator
from dataclasses import dataclass
from functools import cache, lru_cache

from checker.fields import Field, all_fields
from checker.intake.case_names import split_case, split_mechanical_case
from checker.intake.planned import FLOWS
from checker.intake.texts import fold_words, key_of
from checker.intake.unit_words import is_unit_text, size_basis, unit_or_refusal

__all__ = ["HeaderReading", "read_header", "says_reid", "unit_in_header", "unit_of_name", "units_in_header"]

LONGEST_HEADER = 120
_IMPLIED = {"nps": "NPS", "dn": "DN", "sg": "SG", "spgr": "SG", "specificgravity": "SG"}
_OPENING, _CLOSING = "[(", "])"
_NOTE = re.compile(r"(see )?notes?\b.*|[0-9*]{0,2}|refer .*")
_REID = re.compile(r"\b(?:reid|rvp|rvpe|r v p)\b")
_LONGEST_UNIT_WORDS = 4
_MOST_WORDS = 14


@dataclass(frozen=True, slots=True)
class HeaderReading:
    """One header as understood.

    Attributes
    ----------
    fields : tuple of Field
        Fields it may carry, more than one where only the unit can tell (a bare ``Flow``).
    unit : str
        Unit as written, empty where the header names none.
    case : str
        Case it names in canonical words, empty where it names none.
    """

    fields: tuple[Field, ...]
    unit: str
    case: str


@dataclass(frozen=True, slots=True)
class _Split:
    name: str
    unit: str
    bracketed: bool


@cache
def _spellings() -> dict[str, tuple[Field, ...]]:
    found: dict[str, tuple[Field, ...]] = {}
    for field in all_fields():
        for key in dict.fromkeys(key_of(text) for text in (field.name, *field.spellings)):
            found[key] = (*found.get(key, ()), field)
    return found


def _brackets(header: str) -> tuple[str, list[tuple[str, str]]]:
    """Return the text outside brackets, and each outermost bracket's sign and content."""
    outside, contents, depth, start = "", [], 0, 0
    for position, character in enumerate(header):
        if character in _OPENING:
            start = position if depth == 0 else start
            depth += 1
        elif character in _CLOSING and depth:
            depth -= 1
            if depth == 0:
                contents.append((header[start], header[start + 1 : position]))
                outside += " "
        elif depth == 0:
            outside += character
    return outside, contents


def _bracket_splits(header: str) -> Iterator[_Split]:
    outside, contents = _brackets(header)
    contents = [(sign, text.strip()) for sign, text in contents]
    contents = [(sign, text) for sign, text in contents if not _NOTE.fullmatch(fold_words(text)) or is_unit_text(text)]
    units = [text for sign, text in contents if is_unit_text(text)] or [text for sign, text in contents if sign == "["]
    words = [text for sign, text in contents if text not in units]
    unit = units[0] if units else ""
    yield _Split(" ".join([outside, *words, *units[1:]]), unit, True)
    yield _Split(outside, unit or next(iter(words), ""), True)


def _signs(header: str) -> Iterator[_Split]:
    """Yield the splits at units that are mere signs (``%``, an inch mark), which folding would drop unseen."""
    words = header.split()
    for position, word in enumerate(words[1:], start=1):
        if word[0] not in _OPENING and not fold_words(word) and is_unit_text(word):
            yield _Split(" ".join(words[:position] + words[position + 1 :]), word, False)


def _splits(header: str) -> Iterator[_Split]:
    """Yield every way to part a header into its name and its unit, the likeliest first."""
    _, contents = _brackets(header)
    yield from _signs(header)
    if not any(sign == "[" or is_unit_text(text) for sign, text in contents):
        yield _Split(header, "", False)
    if contents:
        yield from _bracket_splits(header)
    if "," in header:
        name, _, unit = header.rpartition(",")
        yield _Split(name, unit.strip(), True)
    words = header.split()
    if len(words) > _MOST_WORDS:
        return
    for count in range(1, _LONGEST_UNIT_WORDS + 1):
        for start in range(len(words) - count, 0, -1):
            unit = " ".join(words[start : start + count]).strip(",;:")
            if is_unit_text(unit):
                yield _Split(" ".join(words[:start] + words[start + count :]), unit, False)


def _has_cases(field: Field) -> bool:
    return field.per_case and field.name != "case"


def says_reid(header: str) -> bool:
    """Return whether a header names a Reid vapour pressure, which is no true vapour pressure."""
    return _REID.search(fold_words(header)) is not None


def _named(name: str) -> tuple[tuple[Field, ...], str]:
    """Return the fields and the case that the words of a header name."""
    words = fold_words(name)
    fields = _spellings().get(words.replace(" ", ""), ())
    if fields or not words:
        return fields, ""
    for case, rest in split_case(words):
        fields = tuple(field for field in _spellings().get(rest.replace(" ", ""), ()) if _has_cases(field))
        if fields:
            return fields, case
    for case, rest in split_mechanical_case(words):
        fields = tuple(field for field in _spellings().get(rest.replace(" ", ""), ()) if field.name in FLOWS)
        if fields:
            return fields, case
    return (), ""


def _per_length(name: str, unit: str, field: Field) -> str:
    """Return the gradient's unit where the header says ``per 100 m`` in its words and only the pressure in brackets."""
    match = re.search(r"(?:per )?(100 ?m|100 ?ft|km)$", fold_words(name))
    if field.dimension != "pressure gradient" or not unit or match is None:
        return unit
    whole = isinstance(unit_or_refusal(unit, "pressure difference"), str)
    return unit if whole else f"{unit}/{match[1].replace(' ', '')}"


def _fits(field: Field, unit: str) -> bool:
    if not unit:
        return True
    if field.kind == "size":
        return bool(size_basis(unit))
    if field.kind == "text":
        return False
    reading = unit_or_refusal(unit, field.dimension)
    return not isinstance(reading, str) or "gauge or absolute" in reading


def _understood(split: _Split) -> HeaderReading | None:
    fields, case = _named(split.name)
    unit = split.unit or _IMPLIED.get(key_of(split.name), "")
    for field in fields:
        mine = _per_length(split.name, unit, field)
        if mine and _fits(field, mine):
            return HeaderReading((field,), mine, case)
    fitting = tuple(field for field in fields if _fits(field, unit))
    return HeaderReading(fitting, unit, case) if fitting else None


@lru_cache(maxsize=8192)
def read_header(header: str) -> HeaderReading | None:
    """Return what a header says, None where no field claims it.

    A name is matched whole before a case word is split off it, so that ``Min. Design Temp`` stays one field. A unit in
    brackets that no field of that name can have is kept as written: its column is refused, not guessed. A header that
    says Reid is claimed by no field.
    """
    if not header.strip() or len(header) > LONGEST_HEADER or says_reid(header):
        return None
    doubtful: HeaderReading | None = None
    for split in _splits(header):
        reading = _understood(split)
        if reading is not None:
            return reading
        fields, case = _named(split.name) if split.bracketed else ((), "")
        if fields and doubtful is None:
            texts = all(field.kind == "text" for field in fields)
            doubtful = HeaderReading(fields, "" if texts else split.unit, case)
    return doubtful


def unit_in_header(header: str, field: Field) -> str:
    """Return the unit that a header names for a field which the criteria give it, else an empty text."""
    if len(header) > LONGEST_HEADER:
        return ""
    units = [split.unit for split in _splits(header) if split.unit]
    fitting = [unit for unit in units if _fits(field, unit)]
    bracketed = [split.unit for split in _splits(header) if split.unit and split.bracketed]
    return next(iter(fitting or bracketed), "")


def unit_of_name(header: str) -> str:
    """Return the unit that the name of a column itself implies (``SG``, ``NPS``, ``DN``), else an empty text."""
    return _IMPLIED.get(key_of(header), "")


def units_in_header(header: str, *, bracketed: bool = False) -> list[str]:
    """Return every text of a header that may be its unit, the likeliest first; only those in brackets if asked."""
    if len(header) > LONGEST_HEADER:
        return []
    return [split.unit for split in _splits(header) if split.unit and (split.bracketed or not bracketed)]
