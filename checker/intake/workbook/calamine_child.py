"""Reads an XLS or ODS workbook from standard input and writes its cells as JSON: run as a process of its own.

The library that reads these formats can end its whole process on a hostile file, so it never runs beside the program.
This script imports nothing of the program; it limits its own memory and time before it reads a byte.
"""

from __future__ import annotations

import datetime as dt
import io
import json
import sys
from typing import Any

MEMORY = 2_000_000_000
SECONDS = 20
MOST_CELLS = 5_000_000
MOST_TEXT = 150_000_000


def limit() -> None:
    """Limit memory and processor time, where the system can."""
    try:
        import resource
    except ImportError:
        return
    for kind, most in ((resource.RLIMIT_AS, MEMORY), (resource.RLIMIT_CPU, SECONDS)):
        hard = resource.getrlimit(kind)[1]
        bound = most if hard == resource.RLIM_INFINITY else min(most, hard)
        resource.setrlimit(kind, (bound, hard))


def plain(value: Any) -> Any:
    """Return a cell as JSON can hold it: dates and times under a key of their own."""
    if isinstance(value, dt.datetime | dt.date):
        return {"date": value.isoformat()}
    if isinstance(value, dt.time | dt.timedelta):
        return {"time": str(value)}
    return value


class Budget:
    """How much may still be written."""

    def __init__(self) -> None:
        self.cells, self.text = MOST_CELLS, MOST_TEXT

    def row(self, values: list[Any]) -> list[Any]:
        """Return a row without the blanks at its end, or end the process where too much has come."""
        while values and values[-1] == "":
            values.pop()
        self.cells -= len(values)
        self.text -= sum(len(value) for value in values if isinstance(value, str))
        if self.cells < 0 or self.text < 0:
            raise OverflowError
        return [plain(value) for value in values]


def sheet_of(book: Any, index: int, budget: Budget) -> dict[str, Any]:
    """Return one sheet: its rows from the first one on, and its merged ranges."""
    sheet = book.get_sheet_by_index(index)
    return {
        "rows": [budget.row(row) for row in sheet.to_python(skip_empty_area=False)],
        "merged": [[*first, *last] for first, last in (sheet.merged_cell_ranges or [])],
    }


def read(content: bytes) -> dict[str, Any]:
    """Return every sheet of a workbook, or why it is not read."""
    import python_calamine as calamine

    budget = Budget()
    try:
        with calamine.CalamineWorkbook.from_filelike(io.BytesIO(content)) as book:
            sheets = []
            for index, known in enumerate(book.sheets_metadata):
                if known.typ == calamine.SheetTypeEnum.WorkSheet:
                    about = {"name": known.name, "visible": known.visible == calamine.SheetVisibleEnum.Visible}
                    sheets.append(about | sheet_of(book, index, budget))
            return {"sheets": sheets}
    except calamine.PasswordError:
        return {"refused": "opens with a password only"}
    except OverflowError:
        return {"refused": f"more than {MOST_CELLS} cells"}
    except (calamine.CalamineError, OSError, ValueError) as error:
        return {"refused": f"{type(error).__name__}: {error}"[:200]}


if __name__ == "__main__":
    limit()
    sys.stdout.write(json.dumps(read(sys.stdin.buffer.read())))
