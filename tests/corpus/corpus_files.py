"""Write the list of a corpus file as the contractor would have sent it: a text in its encoding, or a workbook."""

from __future__ import annotations

import re
from pathlib import Path
from typing import Any

__all__ = ["written"]


def written(entry: dict[str, Any], folder: Path) -> Path:
    """Write the list of a corpus entry into a folder and return its path."""
    if "sheet" in entry:
        return _workbook(entry, folder / entry.get("name", "list.xlsx"))
    path = folder / entry.get("name", "list.csv")
    text = entry["text"].replace("\n", entry.get("newline", "\n"))
    path.write_bytes(
        entry.get("mark", "").encode(entry.get("encoding", "utf-8")) + text.encode(entry.get("encoding", "utf-8"))
    )
    return path


def _workbook(entry: dict[str, Any], path: Path) -> Path:
    from openpyxl import Workbook
    from openpyxl.styles import Font

    book = Workbook()
    book.remove(book.active)
    for says in entry["sheet"]:
        sheet = book.create_sheet(says["name"])
        for row, cells in enumerate(says["rows"], start=1):
            for column, value in enumerate(cells, start=1):
                if value != "":
                    sheet.cell(row, column).value = value
        for place, number_format in says.get("formats", {}).items():
            sheet[place].number_format = number_format
        for span in says.get("merged", ()):
            sheet.merge_cells(span)
        for place in says.get("struck", ()):
            for cell in _cells(sheet, place):
                cell.font = Font(strike=True)
        for row in says.get("hidden_rows", ()):
            sheet.row_dimensions[row].hidden = True
        sheet.sheet_state = says.get("state", "visible")
    book.save(path)
    return path


def _cells(sheet: Any, place: str) -> list[Any]:
    if re.fullmatch(r"\d+", place):
        return list(sheet[int(place)])
    return [sheet[place]]
