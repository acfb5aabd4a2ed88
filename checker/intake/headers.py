"""What one header says: the fields it may carry, its unit and its case."""

from __future__ import annotations

import re
from dataclasses import dataclass
from functools import cache, lru_cache

from checker.fields import Field, all_fields, field_named
from checker.intake.case_names import split_case, split_mechanical_case
from checker.intake.header_splits import Split, holds_several, splits, without_marks
from checker.intake.planned import FLOWS
from checker.intake.texts import fold_words, key_of
from checker.intake.unit_words import is_unit_text, size_basis, unit_in_cell, unit_or_refusal

__all__ = ["HeaderReading", "read_header", "says_reid", "unit_in_header", "unit_of_name", "units_in_header"]

LONGEST_HEADER = 120
MOST_LANGUAGES = 3
_IMPLIED = {
    "nps": "NPS", "dn": "DN", "nd": "DN", "nb": "DN", "sg": "SG", "spgr": "SG", "spgravity": "SG", "specgravity": "SG",
    "specgrav": "SG", "specificgravity": "SG", "ду": "DN", "api": "degAPI", "degapi": "degAPI",
    "apigravity": "degAPI", "gravityapi": "degAPI",
}  # fmt: skip
_SHORT_FORMS = {
    "mop": "max operating pressure",
    "pmo": "max operating pressure",
    "mot": "max operating temperature",
    "nop": "normal operating pressure",
}
_GLUED = {
    "pmax": ("pressure", "pressure_design"),
    "pmin": ("pressure", "pressure_design_minimum"),
    "tmax": ("temperature", "temperature_design"),
    "tmin": ("temperature", "temperature_design_minimum"),
}
_REID = re.compile(r"\b(?:reid|rvp|rvpe|r v p)\b")
_CAMEL = re.compile(r"(?<=[a-z])(?=[A-Z])")
_BETWEEN_LANGUAGES = re.compile(r"\s*[/|\r\n\u2028]+\s*|\s+[-\u2013\u2014]\s+")
_EAST_ASIAN = "\u3040-\u30ff\u3400-\u9fff\uac00-\ud7af"
_BETWEEN_SCRIPTS = re.compile(rf"(?<=[{_EAST_ASIAN}])\s*(?=[A-Za-z])|(?<=[A-Za-z.])\s*(?=[{_EAST_ASIAN}])")
_LOST_DEGREE = re.compile(r"(temp|temperature|t)[\s.]*0 ?([cf])", re.IGNORECASE)
_CASE_SIGNS = re.compile(r"(\u6700\u5927|\u6700\u5c0f|\u6700\u9ad8|\u6700\u4f4e|\u6b63\u5e38)")
_HARMLESS = frozenset(
    {"line", "calc", "calculated", "est", "estimated", "operating", "oper", "op", "flowing", "actual", "rev", "new"}
)


@dataclass(frozen=True, slots=True)
class HeaderReading:
    """One header as understood.

    Attributes
    ----------
    fields : tuple of Field
        Fields it may carry, more than one where only the unit can tell (a bare ``Flow``, ``DP``).
    unit : str
        Unit as written, empty where the header names none.
    case : str
        Case it names in canonical words, empty where it names none.
    """

    fields: tuple[Field, ...]
    unit: str
    case: str


@cache
def _spellings() -> dict[str, tuple[Field, ...]]:
    found: dict[str, tuple[Field, ...]] = {}
    for field in all_fields():
        for key in dict.fromkeys(key_of(text) for text in (field.name, *field.spellings)):
            found[key] = (*found.get(key, ()), field)
    return found


def _has_cases(field: Field) -> bool:
    return field.per_case and field.name != "case"


def says_reid(header: str) -> bool:
    """Return whether a header names a Reid vapour pressure, which is no true vapour pressure."""
    return _REID.search(fold_words(header)) is not None


def _of_words(words: str) -> tuple[tuple[Field, ...], str]:
    """Return the fields and the case that folded words name; the whole is looked up before a case is split off."""
    if words in _GLUED:
        return tuple(field_named(name) for name in _GLUED[words]), ""
    words = _SHORT_FORMS.get(words.replace(" ", ""), words)
    fields = _spellings().get(words.replace(" ", ""), ())
    if fields or not words:
        return fields, ""
    words = " ".join(_CASE_SIGNS.sub(r" \1 ", words).split())
    for case, rest in split_case(words):
        fields = tuple(field for field in _spellings().get(rest.replace(" ", ""), ()) if _has_cases(field))
        if fields:
            return fields, case
    for case, rest in split_mechanical_case(words):
        fields = tuple(field for field in _spellings().get(rest.replace(" ", ""), ()) if field.name in FLOWS)
        if fields:
            return fields, case
    return (), ""


def _of_languages(name: str) -> tuple[tuple[Field, ...], str]:
    """Return what a name says that stands in two languages (``Press. / Druck``): what both of them name."""
    parts = [part for part in _BETWEEN_LANGUAGES.split(name) if part.strip()]
    parts = parts if len(parts) > 1 else [part for part in _BETWEEN_SCRIPTS.split(name) if part.strip()]
    if not 2 <= len(parts) <= MOST_LANGUAGES:
        return (), ""
    readings = [_of_words(fold_words(part)) for part in parts]
    fields = tuple(field for field in readings[0][0] if all(field in others for others, _ in readings[1:]))
    cases = {case for _, case in readings if case}
    return (fields, next(iter(cases), "")) if len(cases) <= 1 else ((), "")


def _named(name: str) -> tuple[tuple[Field, ...], str]:
    """Return the fields and the case that a name means: as it stands, with CamelCase parted, or in two languages."""
    named = _of_words(fold_words(name))
    if not named[0] and _CAMEL.search(name):
        named = _of_words(fold_words(_CAMEL.sub(" ", name)))
    return named if named[0] else _of_languages(name)


def _per_length(name: str, unit: str, field: Field) -> str:
    """Return the gradient's unit where the header says ``per 100 m`` in its words and only the pressure in brackets."""
    match = re.search(r"(?:per )?(100 ?m|100 ?ft|km)$", fold_words(name))
    if field.dimension != "pressure gradient" or not unit or match is None:
        return unit
    whole = isinstance(unit_or_refusal(unit, "pressure difference"), str)
    return unit if whole else f"{unit}/{match[1].replace(' ', '')}"


def _fits(field: Field, unit: str, *, in_table: bool = False) -> bool:
    """Return whether a field may have a unit; with `in_table` only spellings of the table count, without a search."""
    if not unit:
        return True
    if field.kind == "size":
        return bool(size_basis(unit))
    if field.kind == "text":
        return False
    reading = (unit_in_cell if in_table else unit_or_refusal)(unit, field.dimension)
    return not isinstance(reading, str) or "gauge or absolute" in reading


def _leaves_out_meaning(split: Split, fields: tuple[Field, ...]) -> bool:
    """Return whether bracketed words that a split leaves out may change what the rest means (``(shut-off)``)."""
    if all(field.kind == "text" for field in fields):
        return False
    return not all(
        fold_words(words) in _HARMLESS or is_unit_text(words) or set(fields) & set(_named(words)[0])
        for words in split.dropped
    )


def _understood(split: Split) -> HeaderReading | None:
    fields, case = _named(split.name)
    if not fields or _leaves_out_meaning(split, fields):
        return None
    unit = split.unit or _IMPLIED.get(key_of(split.name), "")
    mine = {field.name: _per_length(split.name, unit, field) for field in fields}
    for field in fields:
        if mine[field.name] != unit and _fits(field, mine[field.name]):
            return HeaderReading((field,), mine[field.name], case)
    fitting = tuple(field for field in fields if _fits(field, unit, in_table=True))
    fitting = fitting or tuple(field for field in fields if _fits(field, unit))
    return HeaderReading(fitting, unit, case) if fitting else None


def _with_percent(reading: HeaderReading, header: str) -> HeaderReading:
    """Return a fraction's reading with the percent sign that is glued to a word of its header."""
    if "%" not in header or "%" in reading.unit or reading.fields[0].dimension != "fraction":
        return reading
    return HeaderReading(reading.fields, "%", reading.case)


@lru_cache(maxsize=8192)
def read_header(header: str) -> HeaderReading | None:
    """Return what a header says, None where no field claims it.

    A name is matched whole before a case word is split off it, so that ``Min. Design Temp`` stays one field. A unit in
    brackets that no field of that name can have is kept as written: its column is refused, not guessed. A header that
    says Reid is claimed by no field, nor is one whose bracketed words are not understood.
    """
    stripped = header.strip()
    if (
        not stripped
        or len(header) > LONGEST_HEADER
        or says_reid(header)
        or stripped in ("a", "A")
        or holds_several(header)
    ):
        return None
    header = without_marks(header)
    doubtful: HeaderReading | None = None
    for split in splits(header):
        reading = _understood(split)
        if reading is not None:
            return _with_percent(reading, header)
        fields, case = _named(split.name) if split.bracketed else ((), "")
        if fields and doubtful is None and not _leaves_out_meaning(split, fields):
            texts = all(field.kind == "text" for field in fields)
            doubtful = HeaderReading(fields, "" if texts else split.unit, case)
    lost = _LOST_DEGREE.fullmatch(header.strip())
    if doubtful is None and lost:
        return HeaderReading(_spellings()["temperature"], f"0{lost[2]}", "")
    return doubtful


def unit_in_header(header: str, field: Field) -> str:
    """Return the unit that a header names for a field which the criteria give it, else an empty text."""
    if len(header) > LONGEST_HEADER:
        return ""
    units = [split.unit for split in splits(header) if split.unit]
    fitting = [unit for unit in units if _fits(field, unit)]
    bracketed = [split.unit for split in splits(header) if split.unit and split.bracketed]
    return next(iter(fitting or bracketed), "")


def unit_of_name(header: str) -> str:
    """Return the unit that the name of a column itself implies (``SG``, ``NPS``, ``DN``), else an empty text."""
    return _IMPLIED.get(key_of(header), "")


def units_in_header(header: str, *, bracketed: bool = False) -> list[str]:
    """Return every text of a header that may be its unit, the likeliest first; only those in brackets if asked."""
    if len(header) > LONGEST_HEADER:
        return []
    return [split.unit for split in splits(header) if split.unit and (split.bracketed or not bracketed)]
