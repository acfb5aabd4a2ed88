"""outcomes.json: what was not met and what was not checked, for programs; its schema is shipped beside this module."""

from __future__ import annotations

import json
import math
from collections.abc import Iterator
from pathlib import Path
from typing import Any

from checker import __version__
from checker.report.review_contract import ReviewLike

__all__ = ["SCHEMA_FILE", "SCHEMA_NAME", "outcomes_json"]

SCHEMA_FILE = Path(__file__).parent / "outcomes.schema.json"
SCHEMA_NAME = "linelist-checker/outcomes/1"
LEFT_OUT = frozenset({"meets", "not applicable"})
TEXTS = ("line_number", "case", "rule", "force", "outcome", "unit", "reason")
NUMBERS = ("value", "limit", "utilisation")


def outcomes_json(review: ReviewLike) -> str:
    """Return the outcomes that are neither ``meets`` nor ``not applicable`` as JSON, one outcome a line of text.

    Numbers are SI and `unit` names their unit; a number that is not there is null, an infinite one the word
    ``infinite``. Every character outside ASCII is escaped.
    """
    head = json.dumps(_head(review), indent=1)
    outcomes = ",\n  ".join(json.dumps(outcome) for outcome in _outcomes(review))
    listed = f"[\n  {outcomes}\n ]" if outcomes else "[]"
    return f'{head[: head.rindex("}")].rstrip()},\n "outcomes": {listed}\n}}\n'


def _head(review: ReviewLike) -> dict[str, Any]:
    inputs = [{"name": source.name, "sha256": source.sha256, "form": source.form} for source in review.basis.inputs]
    return {
        "schema": SCHEMA_NAME,
        "tool": {"name": "linelist-checker", "version": __version__},
        "inputs": inputs,
        "title": review.title,
        "document": review.document,
        "recommendation": review.recommendation,
        "recommendation_text": review.recommendation_text,
        "reasons": list(review.reasons),
        "coverage": {"checked": _number(review.coverage), "text": review.coverage_text},
        "counts": {"lines": review.lines_count, "line_cases": review.line_cases, "rules": review.rules_count},
        "tally": {word: int(number) for word, number in review.tally.items()},
    }


def _outcomes(review: ReviewLike) -> Iterator[dict[str, Any]]:
    table = review.outcomes
    chosen = table[~table["outcome"].isin(LEFT_OUT)]
    columns = {name: chosen[name].astype(object).tolist() for name in (*TEXTS, *NUMBERS)}
    for values in zip(*columns.values(), strict=True):
        outcome = dict(zip(columns, values, strict=True))
        yield {name: _number(value) if name in NUMBERS else _text(value) for name, value in outcome.items()}


def _text(value: object) -> str:
    return value if isinstance(value, str) else ""


def _number(value: Any) -> float | str | None:
    if value is None or math.isnan(value):
        return None
    if math.isinf(value):
        return "infinite" if value > 0 else "minus infinite"
    return float(value)
