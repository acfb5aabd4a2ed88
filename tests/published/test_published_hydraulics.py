"""Published worked examples and tables, one test a printed value; the tables name source, example and tolerance."""

from __future__ import annotations

import tomllib
from functools import cache
from pathlib import Path
from typing import Any

import pint
import pytest
from published_computations import COMPUTATIONS

HERE = Path(__file__).parent
TABLES = ("friction_factors", "pipe_flow", "gas_flow", "two_phase_and_erosion", "pump_suction", "pipe_dimensions")


@cache
def units() -> pint.UnitRegistry[Any]:
    return pint.UnitRegistry()


def in_si(text: str) -> float:
    """Turn a printed value with its unit, or a bare number, into SI."""
    number, _, unit = text.partition(" ")
    return float(units().Quantity(float(number), unit or "dimensionless").to_base_units().magnitude)


def cases() -> list[Any]:
    found = []
    for table in TABLES:
        document = tomllib.loads((HERE / f"{table}.toml").read_text(encoding="utf-8"))
        for case in document["case"]:
            for name, (printed, tolerance) in case["expected"].items():
                label = f"{table}: {case['source'][:70]}: {name}"
                found.append(pytest.param(case, name, printed, tolerance, id=label))
    return found


@pytest.mark.parametrize(("case", "name", "printed", "tolerance"), cases())
def test_published_value(case: dict[str, Any], name: str, printed: str, tolerance: float) -> None:
    inputs = {key: in_si(text) for key, text in case["inputs"].items()}
    extra = {"schedule": case["schedule"]} if "schedule" in case else {}
    result = COMPUTATIONS[case["compute"]](inputs, **extra)[name]
    assert result == pytest.approx(in_si(printed), rel=tolerance), case["source"]


def test_at_least_sixty_published_cases_are_carried() -> None:
    documents = [tomllib.loads((HERE / f"{table}.toml").read_text(encoding="utf-8")) for table in TABLES]
    sources = [case["source"] for document in documents for case in document["case"]]
    assert len(sources) >= 60
    assert len(set(sources)) == len(sources)
    assert all(sources)
