"""Small line lists for the tests of the intake."""

from __future__ import annotations

from collections.abc import Mapping
from pathlib import Path

from checker.criteria.hints import ColumnHint
from checker.intake import read_line_list
from checker.model import LineList

SITE_ATMOSPHERE = 100_000.0
HEADER = "Line No,Size (NPS),Flow [kg/h],Oper Press [barg],Oper Temp [degC],Density [kg/m3],Remarks"
ROW = "P-1001,6,50000,4.5,60,983,"


def write(folder: Path, text: str | bytes, name: str = "list.csv") -> Path:
    """Write a list and return its path."""
    path = folder / name
    path.write_bytes(text if isinstance(text, bytes) else text.encode("utf-8"))
    return path


def read(
    folder: Path,
    text: str | bytes,
    *,
    units: Mapping[str, str] | None = None,
    columns: Mapping[str, ColumnHint] | None = None,
    name: str = "list.csv",
) -> LineList:
    """Write a list and read it with a site atmosphere that is not the standard one."""
    path = write(folder, text, name)
    return read_line_list(path, units=units or {}, columns=columns or {}, atmosphere=SITE_ATMOSPHERE)


def one_column(header: str, *cells: str, delimiter: str = ",") -> str:
    """Return a list with one column of interest beside a readable density."""
    lines = [delimiter.join(("Line No", quoted(header), "rho [kg/m3]"))]
    lines += [delimiter.join((f"P-{index}", quoted(cell), "998")) for index, cell in enumerate(cells, start=1)]
    return "\n".join(lines) + "\n"


def quoted(cell: str) -> str:
    """Return a cell quoted for CSV."""
    return '"' + cell.replace('"', '""') + '"'
