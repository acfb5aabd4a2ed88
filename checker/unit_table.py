"""The tables of units, `tables/units.csv` and `tables/unit_questions.csv`, and how a spelling finds its row."""

from __future__ import annotations

import csv
from collections.abc import Mapping
from functools import cache
from pathlib import Path
from typing import NamedTuple

from checker.unit_spelling import fold_unit, in_plain_words

__all__ = [
    "QUESTIONS",
    "TABLE",
    "Unit",
    "dimensions_knowing",
    "forms_of",
    "is_known_spelling",
    "known_spelling",
    "question_of",
]

TABLE = Path(__file__).parent / "tables" / "units.csv"
QUESTIONS = TABLE.with_name("unit_questions.csv")
_NO_PREFIX = ("mass", "mol", "met", "min", "mil", "mic")
"""Words whose first letter is no milli and no mega, in any case."""


class Unit(NamedTuple):
    """One unit of one dimension: ``SI = number * scale + offset`` (+ the site's atmosphere when gauge).

    Degrees API (`reference` ``API``) alone are no line: ``SI = scale / (number + offset)``, the density at 60 degF.
    """

    spelling: str
    dimension: str
    scale: float
    offset: float
    reference: str


@cache
def _table() -> Mapping[tuple[str, str], Unit]:
    with TABLE.open(encoding="utf-8", newline="") as handle:
        return {
            (row["dimension"], row["spelling"]): Unit(
                row["spelling"],
                row["dimension"],
                float(row["scale_to_SI"]),
                float(row["offset_to_SI"]),
                row["reference"],
            )
            for row in csv.DictReader(handle)
        }


@cache
def _questions() -> Mapping[tuple[str, str], str]:
    with QUESTIONS.open(encoding="utf-8", newline="") as handle:
        return {(row["dimension"], row["spelling"]): row["sentence"] for row in csv.DictReader(handle)}


@cache
def _any_case() -> Mapping[tuple[str, str], tuple[Unit, ...]]:
    units: dict[tuple[str, str], tuple[Unit, ...]] = {}
    for (dimension, spelling), unit in _table().items():
        key = (dimension, spelling.casefold())
        units[key] = (*units.get(key, ()), unit)
    return units


@cache
def _questions_any_case() -> Mapping[tuple[str, str], tuple[str, ...]]:
    spellings: dict[tuple[str, str], tuple[str, ...]] = {}
    for dimension, spelling in _questions():
        key = (dimension, spelling.casefold())
        spellings[key] = (*spellings.get(key, ()), spelling)
    return spellings


def _same_prefix(folded: str, spelling: str) -> bool:
    """Return whether the case of the first letter, on which milli and mega hang, says the same, or is no prefix."""
    return folded[0] == spelling[0] or folded[0] not in "mM" or folded.casefold().startswith(_NO_PREFIX)


def _in_any_case(folded: str, dimension: str) -> Unit | None:
    """Return the unit whose spelling differs by case only, where no prefix hangs on that case."""
    candidates = [
        unit for unit in _any_case().get((dimension, folded.casefold()), ()) if _same_prefix(folded, unit.spelling)
    ]
    meanings = {(unit.scale, unit.offset, unit.reference) for unit in candidates}
    return candidates[0] if len(meanings) == 1 else None


def question_of(folded: str, dimension: str) -> str:
    """Return what is asked of a spelling, empty where nothing is."""
    for spelling in _questions_any_case().get((dimension, folded.casefold()), ()):
        if _same_prefix(folded, spelling):
            return _questions()[dimension, spelling]
    return ""


def forms_of(folded: str) -> tuple[str, ...]:
    """Return the forms of a folded spelling under which it may be known: its own, and with words as symbols."""
    if not folded:
        return ()
    plain = in_plain_words(folded)
    return (folded,) if plain == folded else (folded, plain)


def known_spelling(folded: str, dimension: str) -> Unit | str | None:
    """Return the unit a folded spelling is known for, the question it raises, None where it is in no table."""
    if not folded:
        return _table().get((dimension, ""))
    for form in forms_of(folded):
        found = _table().get((dimension, form)) or question_of(form, dimension) or _in_any_case(form, dimension)
        if found:
            return found
    return None


def is_known_spelling(text: str, dimension: str = "") -> bool:
    """Return whether a table holds this spelling, case aside, as a unit or as a question; in any dimension if none."""
    for form in forms_of(fold_unit(text)):
        known = _spelling_dimensions().get(form.casefold(), frozenset())
        if dimension in known or (known and not dimension):
            return True
    return False


@cache
def _spelling_dimensions() -> Mapping[str, frozenset[str]]:
    found: dict[str, set[str]] = {}
    for dimension, spelling in (*_table(), *_questions()):
        if spelling:
            found.setdefault(spelling.casefold(), set()).add(dimension)
    return {spelling: frozenset(dimensions) for spelling, dimensions in found.items()}


def dimensions_knowing(text: str) -> tuple[str, ...]:
    """Return the dimensions whose table holds this spelling, case aside."""
    forms = forms_of(fold_unit(text))
    candidates = sorted({dimension for form in forms for dimension in _spelling_dimensions().get(form.casefold(), ())})
    return tuple(
        dimension
        for dimension in candidates
        if any((dimension, form) in _table() or _in_any_case(form, dimension) is not None for form in forms)
    )
