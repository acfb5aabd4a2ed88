"""Rules and fields as text for the terminal."""

from __future__ import annotations

import difflib
import inspect
import textwrap

from checker.errors import InputError, Problem
from checker.fields import Field, all_fields
from checker.report.field_texts import (
    all_units,
    example_header,
    example_of,
    shown_unit_of,
    spellings_text,
    units_text,
    words_in,
)
from checker.ruling.contract import Rule

__all__ = ["all_rules_text", "fields_text", "one_field_text", "one_rule_text"]

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


_GROUPS = {
    "identity": "What the line is",
    "duty": "What flows in it; each may name a case (min, norm, max, relief ...) in its header",
    "route": "Where it runs",
    "stated": "What the contractor states, to be compared",
    "limits": "Limits on the row",
    "suction": "Suction of a pump",
    "mechanical": "Mechanical design",
}
_EVERYWHERE = (
    "A header may carry its unit in [ ], in ( ), after a comma or after the name; a units row, the cell itself or "
    "[units] of the criteria may say it too. Letters' case, accents and punctuation do not matter. In every column: "
    "HOLD, TBC, TBA, VTA and the like are open items; N/A does not apply; a dash or a blank is not given. "
    "`linelist fields NAME` shows one field in full."
)


def fields_text() -> str:
    """Return every field by part of the list: meaning, units, an example of a header, and the spellings understood."""
    blocks: list[str] = []
    grouped: dict[str, list[Field]] = {}
    for field in all_fields():
        grouped.setdefault(field.group, []).append(field)
    for group, fields in grouped.items():
        title = _GROUPS.get(group, group)
        blocks += [title, "-" * len(title), *(_field_block(field) for field in fields), ""]
    return "\n".join([*blocks, *textwrap.wrap(_EVERYWHERE, WIDTH)])


def _field_block(field: Field) -> str:
    units = f" Units: {units_text(field)}." if field.kind != "text" else ""
    meaning = f"{field.meaning[:1].upper()}{field.meaning[1:]}.{units}"
    lines = [field.name]
    lines += textwrap.wrap(meaning, WIDTH, initial_indent="    ", subsequent_indent="    ")
    headers = f"Headers: {spellings_text(field)}. For example: {example_header(field)}"
    lines += textwrap.wrap(headers, WIDTH, initial_indent="    ", subsequent_indent="    ", break_on_hyphens=False)
    return "\n".join(lines)


def one_field_text(name: str) -> str:
    """Return one field in full, with every spelling of every unit and what words stand for in its cells.

    Raises
    ------
    InputError
        If there is no such field.
    """
    known = {field.name: field for field in all_fields()}
    field = known.get(name.strip().casefold().replace(" ", "_").replace("-", "_"))
    if field is None:
        close = difflib.get_close_matches(name, list(known), n=3)
        remedy = f"Did you mean {' or '.join(close)}?" if close else "`linelist fields` lists them."
        raise InputError(Problem(f"there is no field {name!r}.", "", remedy))
    units = [", ".join(spellings) for spellings in all_units(field.dimension)] if field.kind == "number" else []
    parts = [
        ("field", field.name),
        ("meaning", field.meaning),
        ("part", _GROUPS.get(field.group, field.group).partition(";")[0]),
        ("by case", "yes: a header may name the case" if field.per_case else "no: one value a line"),
        ("headers", spellings_text(field)),
        ("example header", example_header(field)),
        ("example cell", example_of(field)),
        ("words in cells", words_in(field) or "free text"),
        ("shown in", shown_unit_of(field) or "-"),
        ("units", units_text(field) if not units else "one unit a line, with all its spellings:"),
    ]
    lines = [_paragraph(label, text) for label, text in parts]
    lines += [_paragraph("", "plain number" if text == "-" else text) for text in units]
    return "\n".join(lines)
