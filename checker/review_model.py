"""The result of one review: what the report, the commands and the Python interface show."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass

from checker.model import Source

__all__ = ["AssumptionItem", "CautionItem", "CellValue", "NotCheckedGroup", "OutcomeRow", "RuleSummary", "ServiceMatch"]


@dataclass(frozen=True, slots=True)
class CellValue:
    """One value that went into a result: the field, the number as shown, and where it came from.

    `origin` is an address (``marrowquay_rev_a.csv, row 12, column 'Flow Max [kg/h]'``), or the criteria, class file or
    table that supplied it; `written` is the cell's text as written, empty where no cell gave it.
    """

    field: str
    meaning: str
    shown: str
    written: str
    origin: str


@dataclass(frozen=True, slots=True)
class OutcomeRow:
    """What one rule says of one line case.

    `value` and `limit` are SI (NaN where there is none); `value_shown` and `limit_shown` carry the unit in words.
    `calculation` is the equation with the numbers put in. `rests_on` names the assumptions behind the result.
    """

    line_number: str
    case: str
    service: str
    rule: str
    title: str
    force: str
    outcome: str
    value: float
    limit: float
    utilisation: float
    unit: str
    value_shown: str
    limit_shown: str
    limit_origin: str
    reason: str
    calculation: str
    source: str
    cells: tuple[CellValue, ...]
    rests_on: tuple[str, ...]
    composite: bool
    line_case: int


@dataclass(frozen=True, slots=True)
class NotCheckedGroup:
    """Outcomes that could not be judged for one and the same kind of reason; the example names its cell."""

    rule: str
    reason: str
    count: int
    lines: tuple[str, ...]
    example: str = ""


@dataclass(frozen=True, slots=True)
class AssumptionItem:
    """A value that the tool supplied for a line, with its source."""

    line_number: str
    case: str
    field: str
    shown: str
    source: str


@dataclass(frozen=True, slots=True)
class CautionItem:
    """A note of a local code or of safety, to take up with licensed practice."""

    scope: str
    text: str
    source: str


@dataclass(frozen=True, slots=True)
class RuleSummary:
    """One rule and how often it gave each outcome."""

    rule: str
    title: str
    force: str
    source: str
    calculation: str
    origin: str
    counts: Mapping[str, int]


@dataclass(frozen=True, slots=True)
class ServiceMatch:
    """How one service text of the list was matched to the criteria."""

    written: str
    matched: str
    lines: int


@dataclass(frozen=True, slots=True)
class Basis:
    """What the review rests on."""

    inputs: tuple[Source, ...]
    versions: tuple[tuple[str, str], ...]
    methods: tuple[tuple[str, str, str], ...]
    differences: tuple[str, ...]
    adopted: tuple[tuple[str, str, str], ...]
