"""Rules and fields as text for the terminal."""

from __future__ import annotations

import difflib
import inspect
import textwrap

from checker.errors import InputError, Problem
from checker.fields import all_fields
from checker.ruling.contract import Rule

__all__ = ["all_rules_text", "fields_text", "one_rule_text"]

WIDTH = 100


def all_rules_text(rules: tuple[Rule, ...]) -> str:
    """Return one line a rule: id, force, sense, source and origin."""
    widest = max(len(rule.id) for rule in rules)
    lines = [f"{rule.id:<{widest}}  {rule.force:<6}  {rule.sense:<9}  {rule.source}  [{rule.origin}]" for rule in rules]
    return "\n".join([*lines, "", f"{len(rules)} rules. `linelist rules ID` prints one in full."])


def _paragraph(label: str, text: str) -> str:
    body = textwrap.wrap(text, WIDTH - 16) or ["-"]
    return "\n".join([f"{label:<15} {body[0]}", *(f"{'':<15} {line}" for line in body[1:])])


def one_rule_text(rules: tuple[Rule, ...], rule_id: str) -> str:
    """Return one rule in full.

    Raises
    ------
    InputError
        If there is no such rule.
    """
    found = next((rule for rule in rules if rule.id == rule_id), None)
    if found is None:
        close = difflib.get_close_matches(rule_id, [rule.id for rule in rules], n=3)
        remedy = f"Did you mean {' or '.join(close)}?" if close else "`linelist rules` lists them."
        raise InputError(Problem(f"there is no rule {rule_id!r}.", "", remedy))
    parts = (
        ("rule", found.id),
        ("title", found.title),
        ("force", f"{found.force} (the criteria may set another by service)"),
        ("holds", f"the value is {found.sense} the limit" if found.sense != "condition" else "no contradiction"),
        ("calculation", found.calculation),
        ("what it says", inspect.cleandoc(found.function.__doc__ or "-").replace("\n", " ")),
        ("needs", ", ".join(found.required)),
        ("may use", ", ".join(found.optional) or "nothing more"),
        ("applies by", ", ".join(found.applies_parameters) or "everywhere"),
        ("assumptions", ", ".join(found.conservative) or "none may support `meets`"),
        ("criteria key", found.limit_key or "none: the row or the standard gives the limit"),
        ("unit shown", found.unit or "-"),
        ("source", str(found.source)),
        ("origin", found.origin),
    )
    return "\n".join(_paragraph(label, text) for label, text in parts)


def fields_text() -> str:
    """Return every field: its name, unit, meaning and the header spellings understood."""
    blocks = []
    for field in all_fields():
        unit = f" [{field.dimension}, shown in {field.unit}]" if field.dimension else ""
        case = " May name a case (min, norm, max ...)." if field.per_case else ""
        spellings = ", ".join(field.spellings) or "its own name only"
        body = f"{field.meaning[:1].upper()}{field.meaning[1:]}.{case} Headers: {spellings}."
        blocks.append(f"{field.name}{unit}\n" + textwrap.indent("\n".join(textwrap.wrap(body, WIDTH - 4)), "    "))
    closing = (
        "A header may carry its unit in [ ], in ( ) or after the name; letters' case and punctuation do not matter."
    )
    return "\n".join([*blocks, "", closing])
