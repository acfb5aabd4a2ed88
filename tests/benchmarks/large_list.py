"""A long line list for the benchmarks: the example's lines again and again, numbers varied, some cells spoiled."""

from __future__ import annotations

import csv
import random
from collections.abc import Iterator
from pathlib import Path

EXAMPLE = Path(__file__).parents[2] / "example_linelists" / "marrowquay_rev_a.csv"
ODD_CELLS = ("HOLD", "TBC", "-")
ODD_SHARE = 0.015
KEPT_COLUMNS = 40


def _varied(cell: str, chance: random.Random) -> str:
    """Return a number a little off, in as many figures; a text as it is."""
    try:
        value = float(cell)
    except ValueError:
        return cell
    if value == 0.0 or (cell.isdigit() and len(cell) < 3):
        return cell
    return f"{value * chance.uniform(0.97, 1.03):.5g}"


def large_rows(lines: int, seed: int) -> Iterator[list[str]]:
    """Yield the header and so many lines; 1.5 % of the numeric cells are HOLD, TBC or a dash."""
    chance = random.Random(seed)
    with EXAMPLE.open(encoding="utf-8-sig", newline="") as handle:
        header, *rows = list(csv.reader(handle))
    numeric = [index for index, title in enumerate(header) if "[" in title or title in ("Z", "Cp/Cv")]
    yield header[:KEPT_COLUMNS]
    for index in range(lines):
        row = list(rows[index % len(rows)])
        row[0] = f"{row[0]}-{index:06d}"
        for column in numeric:
            odd = row[column] and chance.random() < ODD_SHARE
            row[column] = chance.choice(ODD_CELLS) if odd else _varied(row[column], chance)
        yield row[:KEPT_COLUMNS]


def write_large_list(path: Path, *, lines: int, seed: int = 1) -> None:
    """Write a list of so many lines x 3 cases as CSV."""
    with path.open("w", encoding="utf-8", newline="") as handle:
        csv.writer(handle).writerows(large_rows(lines, seed))


def write_large_workbook(path: Path, *, lines: int, seed: int = 1) -> None:
    """Write the same as a workbook, numbers as numbers."""
    import xlsxwriter

    with xlsxwriter.Workbook(str(path), {"constant_memory": True, "strings_to_numbers": True}) as book:
        sheet = book.add_worksheet("Line list")
        for number, row in enumerate(large_rows(lines, seed)):
            sheet.write_row(number, 0, row)
