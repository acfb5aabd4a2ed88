"""Sentences on what is wrong with the shape of a criteria file: all of it at once."""

from __future__ import annotations

from collections.abc import Iterator
from difflib import get_close_matches
from typing import TYPE_CHECKING, Any

from checker.criteria.places import LONGEST_SHOWN, ProblemList, shown
from checker.criteria.structure import conforms, criteria_schema

if TYPE_CHECKING:
    from jsonschema.exceptions import ValidationError

__all__ = ["report_structure"]

_KIND = {"object": "a table", "array": "a list", "string": "a text", "boolean": "true or false", "number": "a number"}
_LIMIT_REMEDY = (
    'Write a text with its unit, such as "3.0 m/s", or a table such as '
    '{ by = "size", bands = [{ up_to = "NPS 2", value = "1.5 m/s" }, { value = "2.5 m/s" }] }.'
)


def _listed(words: list[str]) -> str:
    return ", ".join(words[:-1]) + f" or {words[-1]}" if len(words) > 1 else words[0]


def _parts(error: ValidationError) -> tuple[Any, Any]:
    """Return the part of the schema and the value that it does not fit."""
    return error.schema, error.instance


def _unknown_keys(error: ValidationError) -> Iterator[tuple[list[str | int], str, str]]:
    schema, instance = _parts(error)
    known = sorted(schema["properties"])
    for key in instance:
        if key not in known:
            close = get_close_matches(key, known, n=1, cutoff=0.5) if len(key) <= LONGEST_SHOWN else []
            remedy = f"The closest known key is {close[0]!r}." if close else f"Known keys: {', '.join(known)}."
            yield [*error.absolute_path, key], f"unknown key {shown(key)}.", remedy


def _missing_keys(error: ValidationError) -> Iterator[tuple[list[str | int], str, str]]:
    schema, instance = _parts(error)
    for key in schema["required"]:
        if key not in instance:
            yield list(error.absolute_path), f"key {key!r} is missing.", f"Write {key} = ..."


def _wording(error: ValidationError) -> tuple[str, str]:
    """Return what is wrong and what to do, for an error of one value."""
    schema, instance = _parts(error)
    value, argument = shown(instance), schema[error.validator]
    if error.validator == "type":
        kinds = _listed([_KIND[name] for name in ([argument] if isinstance(argument, str) else argument)])
        return f"{value} is not {kinds}.", f"Write {kinds}."
    if error.validator == "enum" and error.absolute_path[0] == "methods":
        which = str(error.absolute_path[-1]).replace("_", "-")
        known = _listed([repr(word) for word in argument])
        return f"{value} is not a {which} method of this version.", f"The {which} methods of this version: {known}."
    if error.validator == "enum":
        return f"{value} is not known here.", f"Write {_listed([repr(word) for word in argument])}."
    if error.validator == "pattern":
        words = "'read', 'common practice', 'from memory' or 'project criteria'"
        return f"{value} says no basis that is known.", f"Begin it with {words}."
    if error.validator in ("minimum", "maximum"):
        side = "less" if error.validator == "minimum" else "more"
        return f"{value} is {side} than {argument}.", f"Write a number not {side} than {argument}."
    if error.validator in ("minItems", "minLength"):
        return f"{value} is empty.", "Write something there or leave the key away."
    return f"{value} is no limit that can be read.", _LIMIT_REMEDY


def _sentences(error: ValidationError) -> Iterator[tuple[list[str | int], str, str]]:
    if error.validator == "additionalProperties":
        yield from _unknown_keys(error)
    elif error.validator == "required":
        yield from _missing_keys(error)
    elif error.validator == "anyOf" and isinstance(error.instance, dict):
        banded = "bands" in error.instance or "by" in error.instance
        wanted = "#/$defs/banded" if banded else "#/$defs/one_value"
        branch = [choice.get("$ref") for choice in _parts(error)[0]["anyOf"]].index(wanted)
        for cause in error.context or ():
            if cause.schema_path[0] == branch:
                yield from _sentences(cause)
    else:
        yield (list(error.absolute_path), *_wording(error))


def report_structure(document: dict[str, Any], problems: ProblemList) -> None:
    """Add a sentence for everything in which a document departs from the schema."""
    if conforms(document, criteria_schema()):
        return
    from jsonschema import Draft202012Validator

    for error in Draft202012Validator(criteria_schema()).iter_errors(document):
        for path, what, remedy in _sentences(error):
            problems.add(path, what, remedy)
