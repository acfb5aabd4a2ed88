"""The tables of a review as DataFrames; pandas is imported here and nowhere on the way to an outcome."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import asdict, fields
from typing import TYPE_CHECKING, Any

import numpy as np

from checker.deviations import Deviation
from checker.model import HoldItem, UnreadItem
from checker.outcome_rows import calculation_text, exceeded, reason_for
from checker.ruling.contract import FORCES, Outcome, Rule
from checker.ruling.run import Judged
from checker.shown import si_unit_of_dimension

if TYPE_CHECKING:
    import pandas as pd

    from checker.review_record import Review

__all__ = ["deviations_frame", "holds_frame", "items_frame", "outcomes_frame", "unread_frame"]

MOST_CALCULATIONS = 50_000
COLUMNS = (
    "line_number", "case", "rule", "force", "outcome", "value", "limit", "utilisation", "unit", "reason", "calculation",
)  # fmt: skip


def _texts(
    done: Review, rule: Rule, judged: Judged, cases: np.ndarray, outcome: np.ndarray, full: bool
) -> dict[str, Any]:
    """Return reason and calculation of the chosen line cases; in a long table only where something is amiss."""
    values = done.values
    reasons, calculations = [], []
    for line_case in cases:
        index = int(line_case)
        unchecked = outcome[index] == Outcome.NOT_CHECKED
        applies = int(judged.applies[index])
        if unchecked:
            reasons.append(reason_for(rule, values, index, applies=applies, fault=judged.fault))
        else:
            reasons.append(exceeded(rule, judged, values, index) if outcome[index] != Outcome.MEETS else "")
        wanted = full or outcome[index] == Outcome.DOES_NOT_MEET
        calculations.append(calculation_text(rule, values, index) if wanted and not judged.fault else "")
    return {"reason": reasons, "calculation": calculations}


def _of_rule(done: Review, index: int, full: bool) -> pd.DataFrame:
    import pandas as pd

    rule, outcome = done.judgement.rules[index], done.judgement.outcome[index]
    judged = done.judged(rule)
    cases = np.flatnonzero(outcome != Outcome.NOT_APPLICABLE)
    line_list = done.values.line_list
    numbers = np.array(line_list.line_number, dtype=object)[line_list.line[cases]]
    case_words = np.array([*line_list.case.texts, ""], dtype=object)[line_list.case.codes[cases]]
    return pd.DataFrame(
        {
            "line_number": numbers,
            "case": case_words,
            "rule": rule.id,
            "force": np.array(FORCES, dtype=object)[judged.force[cases]],
            "outcome": np.array([each.words for each in Outcome], dtype=object)[outcome[cases]],
            "value": judged.value[cases],
            "limit": judged.limit[cases],
            "utilisation": judged.utilisation[cases],
            "unit": si_unit_of_dimension(rule.dimension),
            **_texts(done, rule, judged, cases, outcome, full),
            "line_case": cases,
        }
    )


def outcomes_frame(done: Review) -> pd.DataFrame:
    """Return every line case and rule but the `not applicable` ones; value and limit SI.

    A table of more than 50 000 rows has its calculation filled in where a line does not meet, and no more.
    """
    import pandas as pd

    full = int((done.judgement.outcome != Outcome.NOT_APPLICABLE).sum()) <= MOST_CALCULATIONS
    parts = [_of_rule(done, index, full) for index in range(done.rules_count)]
    frame = pd.concat([part for part in parts if len(part)], ignore_index=True) if any(map(len, parts)) else parts[0]
    ordered = frame.sort_values(["line_case", "rule"], kind="stable", ignore_index=True)
    return ordered[list(COLUMNS)]


def items_frame(items: Sequence[Any], record: type[Any]) -> pd.DataFrame:
    """Return records as a table with a column a field, empty tables included."""
    import pandas as pd

    return pd.DataFrame([asdict(item) for item in items], columns=[each.name for each in fields(record)])


def holds_frame(items: Sequence[HoldItem]) -> pd.DataFrame:
    """Return the HOLD register: line, field, text, file, row, column."""
    import pandas as pd

    rows = [
        (item.line_number, item.field, item.text, item.address.file, item.address.row, item.address.column)
        for item in items
    ]
    return pd.DataFrame(rows, columns=["line_number", "field", "text", "file", "row", "column"])


def unread_frame(items: Sequence[UnreadItem]) -> pd.DataFrame:
    """Return refused rows and cells: line, text, reason, file, row, column."""
    import pandas as pd

    rows = [
        (item.line_number, item.text, item.reason, item.address.file, item.address.row, item.address.column)
        for item in items
    ]
    return pd.DataFrame(rows, columns=["line_number", "text", "reason", "file", "row", "column"])


def deviations_frame(items: Sequence[tuple[Deviation, str]]) -> pd.DataFrame:
    """Return approvals and what became of each."""
    import pandas as pd

    columns = [each.name for each in fields(Deviation)]
    rows = [{**asdict(deviation), "state": state} for deviation, state in items]
    return pd.DataFrame(rows, columns=[*columns, "state"])
