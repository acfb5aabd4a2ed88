"""Columns in per cent of a workbook whose number formats cannot be seen: is 0.5 a half per cent or fifty?"""

from __future__ import annotations

import re

from checker.intake.texts import shown
from checker.intake.workbook.raw import RawSheet

__all__ = ["refuse_per_cent"]

_PER_CENT = re.compile(r"[%\u2030\uff05]|\bper ?cent|\bpct\b|\bprozent|\bpourcent|\bporcent|\bpercento", re.IGNORECASE)
_NUMBER = re.compile(r"-?\d+(?:\.\d+)?(?:e[-+]?\d+)?", re.IGNORECASE)


def refuse_per_cent(raw: RawSheet, header: int, first: int, width: int) -> None:
    """Refuse the numbers, other than 0, of columns whose header or unit says per cent.

    Parameters
    ----------
    raw : RawSheet
        The sheet; refusals are added to it.
    header, first, width : int
        Row of the headers and first row of lines, counted from 0, and number of columns of the table.
    """
    heads = raw.rows[max(header - 1, 0) : first]
    for column in range(width):
        if not any(column < len(row) and _PER_CENT.search(row[column]) for row in heads):
            continue
        for number, row in enumerate(raw.rows[first:], first):
            text = row[column].strip() if column < len(row) else ""
            if _NUMBER.fullmatch(text) and float(text):
                raw.no_numbers[number, column] = (
                    f"the column is in per cent and the cell holds {shown(text)}: an XLS does not let a number "
                    "shown in per cent be told from another, so it may be a hundred times as much; save as XLSX."
                )
