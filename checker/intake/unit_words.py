"""Units as headers and cells write them: what reads, what is refused, and what a pressure still has to say."""

from __future__ import annotations

from functools import lru_cache

from checker.criteria.nominal_size import SIZE_BASES
from checker.intake.texts import shown
from checker.unit_spelling import fold_unit
from checker.units import Unit, UnitRefusedError, dimensions_knowing, is_known_spelling, read_unit

__all__ = ["is_unit_text", "settled_by", "size_basis", "unit_in_cell", "unit_or_refusal"]

_SIZE_WORDS = {word: basis for basis, words in SIZE_BASES.items() for word in words.split()}


def size_basis(text: str) -> str:
    """Return ``NPS``, ``DN`` or ``NPS x 100`` where a text names the basis of nominal sizes, else an empty text."""
    return _SIZE_WORDS.get(fold_unit(text).casefold(), "")


def is_unit_text(text: str) -> bool:
    """Return whether a text is a known spelling of a unit of any dimension, or a basis of sizes.

    A spelling that raises a question (``MSCFD``, ``mol%``) is one too: its column is refused with the question.
    """
    return bool(size_basis(text)) or is_known_spelling(text)


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
    if is_known_spelling(text, dimension):
        return unit_or_refusal(text, dimension)
    others = dimensions_knowing(text)
    hint = f" It is a unit of {others[0]}." if others else ""
    return f"{shown(text)} is not a unit of {dimension} that is understood here.{hint}"


def settled_by(bare: str, stated: str) -> Unit | None:
    """Return the unit that settles a pressure whose header says neither gauge nor absolute.

    The criteria may state ``barg`` for a list that writes ``bar``; a unit of another size settles nothing.
    """
    asked, answer = unit_or_refusal(f"{fold_unit(bare)}a", "pressure"), unit_or_refusal(stated, "pressure")
    if isinstance(asked, str) or isinstance(answer, str):
        return None
    return answer if asked.scale == answer.scale else None
