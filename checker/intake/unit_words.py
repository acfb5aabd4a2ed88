"""Units as headers and cells write them: what reads, what is refused, and what a pressure still has to say."""

from __future__ import annotations

import csv
from functools import cache, lru_cache

from checker.unit_spelling import fold_unit
from checker.units import TABLE, Unit, UnitRefusedError, read_unit

__all__ = ["is_unit_text", "settled_by", "size_basis", "unit_in_cell", "unit_or_refusal"]

_SIZE_WORDS = {
    "nps": "NPS", "in": "NPS", "inch": "NPS", "inches": "NPS", '"': "NPS", "''": "NPS", "ins": "NPS",
    "dn": "DN", "mm": "DN", "nb": "DN", "nbmm": "DN", "mmnb": "DN", "dnmm": "DN", "npsin": "NPS", "npsinch": "NPS",
}  # fmt: skip


@cache
def _spellings() -> frozenset[tuple[str, str]]:
    with TABLE.open(encoding="utf-8", newline="") as handle:
        return frozenset((row["dimension"], row["spelling"].casefold()) for row in csv.DictReader(handle))


@cache
def _any_spelling() -> frozenset[str]:
    return frozenset(spelling for _, spelling in _spellings() if spelling)


def size_basis(text: str) -> str:
    """Return ``NPS`` or ``DN`` where a text names the basis of nominal sizes, else an empty text."""
    return _SIZE_WORDS.get(fold_unit(text).casefold(), "")


def is_unit_text(text: str) -> bool:
    """Return whether a text is a known spelling of a unit of any dimension, or a basis of sizes."""
    return bool(size_basis(text)) or fold_unit(text).casefold() in _any_spelling()


@lru_cache(maxsize=4096)
def unit_or_refusal(text: str, dimension: str) -> Unit | str:
    """Return the unit a header names for a dimension, or the sentence that says why it cannot be read."""
    try:
        return read_unit(text, dimension)
    except UnitRefusedError as error:
        return str(error)


@lru_cache(maxsize=4096)
def unit_in_cell(text: str, dimension: str) -> Unit | str:
    """Return the unit a single cell names: known spellings only, so that a cell costs no search."""
    if (dimension, fold_unit(text).casefold()) not in _spellings():
        return f"'{text[:40]}' is not a unit of {dimension} that is understood here."
    return unit_or_refusal(text, dimension)


def settled_by(bare: str, stated: str) -> Unit | None:
    """Return the unit that settles a pressure whose header says neither gauge nor absolute.

    The criteria may state ``barg`` for a list that writes ``bar``; a unit of another size settles nothing.
    """
    asked, answer = unit_or_refusal(f"{fold_unit(bare)}a", "pressure"), unit_or_refusal(stated, "pressure")
    if isinstance(asked, str) or isinstance(answer, str):
        return None
    return answer if asked.scale == answer.scale else None
