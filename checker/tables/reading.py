"""Reads the CSV tables that lie beside this module; each once, on demand."""

from __future__ import annotations

import csv
from functools import cache
from pathlib import Path

__all__ = ["read_table"]


@cache
def read_table(name: str) -> tuple[dict[str, str], ...]:
    """Return the rows of a table as mappings from column header to text.

    Parameters
    ----------
    name : str
        File name without ``.csv``.

    Returns
    -------
    tuple of dict
        One mapping a row, in the order of the file.
    """
    path = Path(__file__).with_name(f"{name}.csv")
    with path.open(encoding="utf-8", newline="") as file:
        return tuple(csv.DictReader(file))
