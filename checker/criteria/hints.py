"""What the criteria say of one header of a contractor's list."""

from __future__ import annotations

from dataclasses import dataclass

__all__ = ["ColumnHint"]


@dataclass(frozen=True, slots=True)
class ColumnHint:
    """One header that the criteria's ``[columns]`` explain.

    Attributes
    ----------
    field : str
        Canonical field that the column carries.
    unit : str
        Unit of its numbers; empty where the header or the cells say it.
    case : str
        Case that the column names; empty where it belongs to every case.
    """

    field: str
    unit: str = ""
    case: str = ""
