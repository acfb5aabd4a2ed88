"""Line lists made in memory, a few line cases long."""

from __future__ import annotations

from typing import Any

import numpy as np

from checker.criteria.load import load_criteria
from checker.evaluation.values import Values
from checker.model import CaseKind, Coded, Gap, LineList, Source


def coded(texts: list[str]) -> Coded:
    """Return texts as codes; an empty one is missing."""
    distinct = tuple(dict.fromkeys(text for text in texts if text))
    return Coded(np.array([distinct.index(text) if text else -1 for text in texts], dtype=np.int32), distinct)


def line_list(
    count: int, *, numbers: dict[str, Any] | None = None, texts: dict[str, list[str]] | None = None
) -> LineList:
    """Return a list of so many lines, one case each; NaN and empty texts count as blank cells."""
    values = {name: np.asarray(given, dtype=np.float64) for name, given in (numbers or {}).items()}
    words = {name: coded(given) for name, given in (texts or {}).items()}
    gaps = {name: np.where(np.isnan(array), Gap.BLANK, Gap.GIVEN).astype(np.int8) for name, array in values.items()}
    gaps |= {name: np.where(each.codes < 0, Gap.BLANK, Gap.GIVEN).astype(np.int8) for name, each in words.items()}
    return LineList(
        source=Source("small.csv", "0" * 64),
        columns=(),
        unmatched=(),
        notes=(),
        line_number=tuple(f"L-{index}" for index in range(count)),
        row=np.arange(2, count + 2, dtype=np.int32),
        line=np.arange(count, dtype=np.int32),
        case=coded(["normal"] * count),
        case_kind=np.full(count, CaseKind.CONTINUOUS, dtype=np.int8),
        composite=np.zeros(count, dtype=np.bool_),
        numbers=values,
        texts=words,
        gaps=gaps,
    )


def values_of(count: int, **fields: Any) -> Values:
    """Return the fields of such a list under the bundled criteria."""
    listed = line_list(count, numbers=fields.pop("numbers", None), texts=fields.pop("texts", None))
    return Values(line_list=listed, criteria=load_criteria(None), classes=None, overrides=fields or None)
