"""outcomes.json: what was not met and what was not checked, for programs; its schema is shipped beside this module."""

from __future__ import annotations

import json
import math
from collections.abc import Iterator
from dataclasses import asdict
from pathlib import Path
from typing import Any

from checker import __version__
from checker.report.reading_view import reading_of
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
        "counts": {
            "lines": review.lines_count,
            "line_cases": review.line_cases,
            "rules": review.rules_count,
            "deleted_lines": len(review.deleted_items),
        },
        "tally": {word: int(number) for word, number in review.tally.items()},
        "reading": _reading(review),
        "completeness": _completeness(review),
    }


def _completeness(review: ReviewLike) -> dict[str, Any] | None:
    """Return what list and drawings do not agree on; null where no drawings were given."""
    found = review.completeness
    if found is None:
        return None
    return {
        "source": {"name": found.source.name, "sha256": found.source.sha256, "form": found.source.form},
        "listed": found.listed,
        "drawn": found.drawn,
        "both": found.both,
        "counts": dict(found.counts),
        "items": [asdict(item) for item in found.items],
        "rows_not_read": len(found.unread),
    }


def _reading(review: ReviewLike) -> dict[str, Any]:
    """Return how the list was read: notes, columns, and the lines that are listed but not checked."""
    return {
        "notes": list(review.understood),
        "columns": [asdict(match) for match in reading_of(review).every],
        "deleted": [
            {"line_number": item.line_number, "row": item.address.row, "reason": item.reason}
            for item in review.deleted_items
        ],
        "cells_with_two_values": len(review.range_items),
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
