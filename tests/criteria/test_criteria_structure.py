"""The quick look at a file's shape says the same as the library that reads JSON Schema."""

from __future__ import annotations

import copy
import json
import tomllib
from typing import Any

import jsonschema
from hypothesis import given, settings
from hypothesis import strategies as st

from checker.criteria.load import DEFAULT
from checker.criteria.places import ProblemList
from checker.criteria.structure import ANNOTATIONS, KEYWORDS, conforms, criteria_schema
from checker.criteria.structure_messages import report_structure

VALIDATOR = jsonschema.Draft202012Validator(criteria_schema())
PROJECT: dict[str, Any] = {
    "project": {"title": "t", "document": "d", "jurisdictions": ["x"], "based_on": "default"},
    "site": {"atmospheric_pressure": "1 bar"},
    "methods": {"gas": "isothermal", "downhill_recovery": True},
    "service": [
        {
            "name": "a",
            "matches": ["A"],
            "phase": "gas",
            "general": True,
            "relief": True,
            "relief_case": "maximum",
            "velocity_maximum": {"by": "size", "bands": [{"up_to": "NPS 2", "value": "1 m/s"}, {"value": 2}]},
            "mach_maximum": 0.3,
            "momentum_flux_maximum": {"value": "1 Pa", "basis": "read"},
            "force": {"gas-velocity": "note"},
            "basis": "read",
        }
    ],
    "units": {"pressure": "barg"},
    "columns": {"Q": {"field": "flow_mass", "unit": "kg/h", "case": "normal"}},
    "recommendation": {"gross_factor": 1.25, "coverage_minimum": 0.9},
    "defaults": {"fittings_allowance": 0.3, "roughness": {"steel": "0.05 mm"}},
}


def places(node: Any, path: tuple[str | int, ...] = ()) -> list[tuple[str | int, ...]]:
    children = node.items() if isinstance(node, dict) else enumerate(node) if isinstance(node, list) else ()
    return [path, *(place for key, child in children for place in places(child, (*path, key)))]


ODD = st.one_of(
    st.sampled_from(["", "gas", "default", "note", "read", "size"]), st.booleans(), st.integers(-2, 2),
    st.floats(allow_nan=False), st.just([]), st.just({}), st.just(["x", 1]), st.just({"value": "1 m/s"}),
    st.just({"by": "size", "bands": []}), st.just({"value": 1, "odd": 2}),
)  # fmt: skip


@st.composite
def spoiled(draw: st.DrawFn) -> Any:
    """A good document with one place given another value, or an odd key added there."""
    document = copy.deepcopy(PROJECT)
    path = draw(st.sampled_from([place for place in places(PROJECT) if place]))
    parent = document
    for key in path[:-1]:
        parent = parent[key]  # type: ignore[index]
    if draw(st.booleans()) and isinstance(parent, dict):
        parent["odd"] = draw(ODD)
    else:
        parent[path[-1]] = draw(ODD)  # type: ignore[index]
    return document


@settings(max_examples=300, deadline=None)
@given(document=spoiled())
def test_agrees_with_the_library(document: Any) -> None:
    good = VALIDATOR.is_valid(document)
    assert conforms(document, criteria_schema()) == good
    problems = ProblemList("file", document)
    report_structure(document, problems)
    assert bool(problems.problems) == (not good)


def test_good_documents() -> None:
    assert conforms(PROJECT, criteria_schema())
    assert VALIDATOR.is_valid(PROJECT)
    assert conforms({}, criteria_schema())
    assert conforms(tomllib.loads(DEFAULT.read_text(encoding="utf-8")), criteria_schema())


def test_knows_every_keyword_that_the_schema_uses() -> None:
    used: set[str] = set()

    def walk(schema: Any) -> None:
        used.update(schema)
        for keyword in ("items", "additionalProperties"):
            if isinstance(schema.get(keyword), dict):
                walk(schema[keyword])
        for part in (
            *schema.get("properties", {}).values(),
            *schema.get("anyOf", ()),
            *schema.get("$defs", {}).values(),
        ):
            walk(part)

    walk(criteria_schema())
    assert used <= set(KEYWORDS) | ANNOTATIONS


def test_every_table_refuses_unknown_keys() -> None:
    def walk(schema: Any) -> None:
        if isinstance(schema, dict):
            if schema.get("type") == "object":
                assert "additionalProperties" in schema, json.dumps(schema)[:80]
            for part in schema.values():
                walk(part)
        elif isinstance(schema, list):
            for part in schema:
                walk(part)

    walk(criteria_schema())
