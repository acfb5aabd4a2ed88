"""What could not be judged, and why: outcomes of one rule and one kind of reason together."""

from __future__ import annotations

import re
from collections.abc import Callable

import numpy as np

from checker.evaluation.values import Values
from checker.outcome_rows import reason_for
from checker.review_model import NotCheckedGroup
from checker.ruling.contract import Outcome, Rule
from checker.ruling.run import Judged, Judgement

__all__ = ["not_checked_groups"]

_PLACE = re.compile(r" \([^()]*, row \d+, column '[^']*'\)")
_CELL = re.compile(r" \('[^']*'\)")


def _kind_of(reason: str) -> str:
    """Return a reason without the place and the text of the one cell it names."""
    return _CELL.sub("", _PLACE.sub("", reason))


def not_checked_groups(
    judgement: Judgement, values: Values, judged: Callable[[Rule], Judged]
) -> tuple[NotCheckedGroup, ...]:
    """Return the outcomes `not checked`, grouped by rule and reason, the most frequent first."""
    counts: dict[tuple[str, str], int] = {}
    lines: dict[tuple[str, str], dict[str, None]] = {}
    examples: dict[tuple[str, str], str] = {}
    line_list = values.line_list
    for index, rule in enumerate(judgement.rules):
        said = judged(rule)
        for line_case in np.flatnonzero(judgement.outcome[index] == Outcome.NOT_CHECKED):
            applies = int(said.applies[line_case])
            reason = reason_for(rule, values, int(line_case), applies=applies, fault=said.fault)
            key = (rule.id, _kind_of(reason))
            counts[key] = counts.get(key, 0) + 1
            number = line_list.line_number[int(line_list.line[line_case])]
            lines.setdefault(key, {}).setdefault(number)
            examples.setdefault(key, reason)
    groups = [NotCheckedGroup(*key, counts[key], tuple(lines[key]), examples[key]) for key in counts]
    return tuple(sorted(groups, key=lambda group: (-group.count, group.rule, group.reason)))
