"""Sizes of a whole column: where some of its numbers prove the other basis, those that stand on both are asked."""

from __future__ import annotations

import re
from collections.abc import Iterator

import numpy as np

from checker.criteria.nominal_size import nominal_sizes, size_of_dn, written_size
from checker.intake.cells import CodedCells
from checker.intake.sizes import SizeReading, read_size, without_note
from checker.intake.texts import shown, tidy
from checker.model import Gap

__all__ = ["read_sizes"]

_NUMBER = re.compile(r"\s*\d{1,4}(?:[.,]\d{1,4})?\s*", re.ASCII)
_UNMARKED = re.compile(r"[\d\s./,\u00bc-\u00be\u215b-\u215e-]{1,12}", re.ASCII)
_CODE = re.compile(r"\s*(?:0\d+|\d{4})\s*", re.ASCII)
_MOST_NAMED = 2


def _only_on_other(text: str, basis: str) -> bool:
    """Return whether an unmarked size is none on the basis of its column, but one on the other basis."""
    text = without_note(text.strip())
    unmarked = _UNMARKED.fullmatch(text) and not _CODE.fullmatch(text)
    written = written_size(" ".join(tidy(text).split())) if unmarked else None
    if written is None:
        return False
    sizes, others = (nominal_sizes(), size_of_dn()) if basis == "NPS" else (size_of_dn(), nominal_sizes())
    return written.number not in sizes and written.number in others


def _in_use(cells: CodedCells) -> Iterator[str]:
    return (cells.texts[code] for code in np.unique(cells.codes).tolist())


def _asked(text: str, reading: SizeReading, basis: str, witnesses: list[str]) -> SizeReading:
    """Return a reading, refused with both sizes where its bare number is a size on both bases."""
    bare = without_note(text.strip())
    if reading.gap is not Gap.GIVEN or reading.basis or not _NUMBER.fullmatch(bare):
        return reading
    number = float(bare.replace(",", "."))
    if number not in nominal_sizes() or number not in size_of_dn():
        return reading
    other = "DN" if basis == "NPS" else "NPS"
    holds = " and ".join(shown(witness) for witness in witnesses[:_MOST_NAMED])
    reason = (
        f"{shown(text)} could be NPS {number:g} or DN {number:g}: its column is in {basis} but holds {holds}, {other} "
        f"only. Write 6\" or DN 150, or head the column 'Size ({other})'."
    )
    return SizeReading(float("nan"), Gap.REFUSED, reason, "")


def read_sizes(cells: CodedCells, basis: str, *, comma: bool) -> list[SizeReading]:
    """Read every distinct text of a size column.

    Parameters
    ----------
    cells : CodedCells
        The cells as written.
    basis : str
        Basis of the bare numbers of the column, see `checker.intake.sizes.read_size`. In a column of ``NPS`` a 25 or a
        150, in one of ``DN`` a 3 or a 1/2, shows that the other basis is in use: then a bare 20 is either.
    comma : bool
        Whether the list is written with decimal commas.
    """
    readings = [read_size(text, basis, comma) for text in cells.texts]
    if basis not in ("NPS", "DN"):
        return readings
    witnesses = sorted(text.strip() for text in _in_use(cells) if _only_on_other(text, basis))
    if not witnesses:
        return readings
    return [_asked(text, reading, basis, witnesses) for text, reading in zip(cells.texts, readings, strict=True)]
