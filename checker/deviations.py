"""Approved deviations: a line may exceed a rule up to a value, in a case, until a date."""

from __future__ import annotations

import csv
import hashlib
import io
from collections.abc import Iterator
from dataclasses import dataclass
from datetime import date
from pathlib import Path

import numpy as np
from numpy.typing import NDArray

from checker.errors import InputError, Problem
from checker.evaluation.values import Values
from checker.intake.case_names import canonical_case
from checker.model import Source, base_case
from checker.ruling.contract import Outcome, Rule
from checker.ruling.run import EQUAL_WITHIN, Judged
from checker.units import UnitRefusedError, read_quantity

__all__ = ["COLUMNS", "Deviation", "DeviationFile", "load_deviations", "where_approved"]

COLUMNS = ("line_number", "case", "rule", "approved_value", "approved_by", "reference", "until")
_NEEDED = ("line_number", "rule", "approved_value", "approved_by", "until")
LARGEST_FILE = 5_000_000
_PLACEHOLDERS = ("", "-", "--", "?", "hold", "tbc", "tba", "tbd", "n/a", "na", "none", "later", "pending")


@dataclass(frozen=True, slots=True)
class Deviation:
    """One written approval. `case` is empty where it holds in every case; `approved_value` is SI."""

    line_number: str
    case: str
    rule: str
    approved_value: float
    written: str
    approved_by: str
    reference: str
    until: date
    row: int


@dataclass(frozen=True, slots=True)
class DeviationFile:
    """The approvals of one file and the file itself."""

    source: Source
    deviations: tuple[Deviation, ...]


def _rows(path: Path) -> tuple[bytes, list[dict[str, str]]]:
    where, remedy = str(path), f"Write a CSV with the columns {', '.join(COLUMNS)}."
    try:
        content = path.read_bytes()
        text = content.decode("utf-8-sig")
    except (OSError, UnicodeDecodeError) as error:
        raise InputError(Problem(f"the deviations cannot be read: {error}.", where, remedy)) from error
    if len(content) > LARGEST_FILE:
        raise InputError(Problem("is larger than 5 MB.", where, remedy))
    reader = csv.DictReader(io.StringIO(text, newline=""), restkey="surplus", restval="")
    missing = [name for name in _NEEDED if name not in (reader.fieldnames or [])]
    if missing:
        raise InputError(Problem(f"lacks the columns {', '.join(missing)}.", where, remedy))
    return content, [{key: str(cell or "").strip() for key, cell in row.items()} for row in reader]


def _problems(row: dict[str, str], place: str, rules: dict[str, Rule]) -> Iterator[Problem]:
    for name in _NEEDED:
        if row.get(name, "").casefold() in _PLACEHOLDERS:
            yield Problem(
                f"{name} is blank or open.", place, "An approval names all five: line, rule, value, approver, last day."
            )
    if row.get("surplus"):
        yield Problem("has more cells than the header.", place, "Quote cells that hold a comma.")
    rule = rules.get(row.get("rule", ""))
    if rule is None:
        yield Problem(f"rule {row.get('rule', '')!r} is not known.", place, "`linelist rules` lists the ids.")
    elif rule.sense == "condition":
        yield Problem(f"rule {rule.id!r} has no value to approve up to.", place, "Ask for the list to be corrected.")
    else:
        try:
            read_quantity(row["approved_value"], rule.dimension or "dimensionless")
        except UnitRefusedError as error:
            yield Problem(str(error), place, f"Write the value with its unit, such as 3.2 {rule.unit}.")
    try:
        date.fromisoformat(row.get("until", ""))
    except ValueError:
        yield Problem(f"until {row.get('until', '')!r} is no date.", place, "Write it as 2027-06-30.")


def _case_of(text: str) -> str:
    """Return a case as the list's own cases are named; empty, or ``all``, where the approval holds in every case."""
    return "" if text.casefold() in ("", "all", "every case") else canonical_case(text)


def load_deviations(path: Path, *, rules: tuple[Rule, ...], atmosphere: float) -> DeviationFile:
    """Read the approvals, every problem at once.

    Raises
    ------
    InputError
        If the file cannot be read or a row is incomplete, names no known rule, or has a value without unit.
    """
    known = {rule.id: rule for rule in rules}
    content, rows = _rows(path)
    problems = [
        problem
        for number, row in enumerate(rows, start=2)
        for problem in _problems(row, f"{path.name}, row {number}", known)
    ]
    if problems:
        raise InputError(problems)
    deviations = tuple(
        Deviation(
            line_number=row["line_number"],
            case=_case_of(row.get("case", "")),
            rule=row["rule"],
            approved_value=read_quantity(
                row["approved_value"], known[row["rule"]].dimension or "dimensionless", atmosphere=atmosphere
            ),
            written=row["approved_value"],
            approved_by=row["approved_by"],
            reference=row.get("reference", ""),
            until=date.fromisoformat(row["until"]),
            row=number,
        )
        for number, row in enumerate(rows, start=2)
    )
    return DeviationFile(Source(path.name, hashlib.sha256(content).hexdigest(), "approved deviations"), deviations)


def where_approved(
    deviation: Deviation, *, rule: Rule, judged: Judged, values: Values, today: date
) -> tuple[NDArray[np.bool_], NDArray[np.bool_]]:
    """Return the line cases a deviation speaks of that do not meet the rule, and those of them that it approves.

    It approves up to its value and to its last day; beyond either the outcome stays `does not meet`.
    """
    line_list = values.line_list
    wanted = deviation.line_number.casefold()
    mine = np.array([number.casefold() == wanted for number in line_list.line_number], dtype=np.bool_)[line_list.line]
    if deviation.case:
        mine &= line_list.case.where([deviation.case in (text, base_case(text)) for text in line_list.case.texts])
    spoken_of = mine & (judged.outcome == Outcome.DOES_NOT_MEET)
    slack = EQUAL_WITHIN * abs(deviation.approved_value)
    with np.errstate(invalid="ignore"):
        if rule.sense == "at least":
            within = judged.value >= deviation.approved_value - slack
        else:
            within = judged.value <= deviation.approved_value + slack
    return spoken_of, spoken_of & within & (today <= deviation.until)
