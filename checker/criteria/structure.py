"""Whether a criteria file has the shape that `schema.json` asks for.

`conforms` knows just the keywords that the schema uses. It answers yes or no in a few milliseconds; the library that
words what is wrong costs more to import than the rest of the criteria together, so it is imported only after a no.
"""

from __future__ import annotations

import json
import re
from collections.abc import Callable, Mapping
from functools import cache
from pathlib import Path
from typing import Any

__all__ = ["ANNOTATIONS", "KEYWORDS", "conforms", "criteria_schema"]

SCHEMA = Path(__file__).parent / "schema.json"
ANNOTATIONS = frozenset({"$schema", "$defs", "title", "description"})
Schema = Mapping[str, Any]


@cache
def criteria_schema() -> Schema:
    """Return the JSON Schema of the criteria file."""
    schema: Schema = json.loads(SCHEMA.read_text(encoding="utf-8"))
    return schema


def _is_number(value: object) -> bool:
    return isinstance(value, int | float) and not isinstance(value, bool)


_IS_TYPE: Mapping[str, Callable[[object], bool]] = {
    "object": lambda value: isinstance(value, dict),
    "array": lambda value: isinstance(value, list),
    "string": lambda value: isinstance(value, str),
    "boolean": lambda value: isinstance(value, bool),
    "number": _is_number,
}


def _type(value: Any, wanted: str | list[str], _: Schema) -> bool:
    return any(_IS_TYPE[name](value) for name in ([wanted] if isinstance(wanted, str) else wanted))


def _enum(value: Any, allowed: list[str], _: Schema) -> bool:
    return isinstance(value, str) and value in allowed


def _reference(value: Any, reference: str, _: Schema) -> bool:
    return conforms(value, criteria_schema()["$defs"][reference.removeprefix("#/$defs/")])


def _any_of(value: Any, choices: list[Schema], _: Schema) -> bool:
    return any(conforms(value, choice) for choice in choices)


def _properties(value: Any, known: Mapping[str, Schema], _: Schema) -> bool:
    return not isinstance(value, dict) or all(conforms(value[key], known[key]) for key in value if key in known)


def _additional(value: Any, allowed: bool | Schema, schema: Schema) -> bool:
    if not isinstance(value, dict):
        return True
    others = [key for key in value if key not in schema.get("properties", {})]
    return not others if isinstance(allowed, bool) else all(conforms(value[key], allowed) for key in others)


def _required(value: Any, keys: list[str], _: Schema) -> bool:
    return not isinstance(value, dict) or all(key in value for key in keys)


def _items(value: Any, item: Schema, _: Schema) -> bool:
    return not isinstance(value, list) or all(conforms(element, item) for element in value)


KEYWORDS: Mapping[str, Callable[[Any, Any, Schema], bool]] = {
    "$ref": _reference,
    "type": _type,
    "enum": _enum,
    "anyOf": _any_of,
    "properties": _properties,
    "additionalProperties": _additional,
    "required": _required,
    "items": _items,
    "minItems": lambda value, least, _: not isinstance(value, list) or len(value) >= least,
    "minLength": lambda value, least, _: not isinstance(value, str) or len(value) >= least,
    "minimum": lambda value, least, _: not _is_number(value) or not value < least,
    "maximum": lambda value, most, _: not _is_number(value) or not value > most,
    "pattern": lambda value, pattern, _: not isinstance(value, str) or bool(re.search(pattern, value)),
}


def conforms(value: Any, schema: Schema) -> bool:
    """Return whether a value has the shape that a part of the criteria schema asks for."""
    return all(
        KEYWORDS[keyword](value, argument, schema) for keyword, argument in schema.items() if keyword not in ANNOTATIONS
    )
