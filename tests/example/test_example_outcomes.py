"""The program's outcomes on the example list are those of the scalar script, line by line and case by case."""

from __future__ import annotations

import math
from functools import cache
from typing import Any

import pytest
import scalar_check
from scalar_check import CLASSES, CRITERIA, LIST, MEETS, NOT_APPLICABLE, NOT_CHECKED, RULES, Key, Outcome
from scalar_reading import read

JUDGED = (MEETS, scalar_check.FAILS)
TOLERANCE = {"liquid": 1e-6, "gas": 1e-3, "two-phase": 1e-3}


@cache
def reviewed() -> Any:
    import checker

    return checker.review(str(LIST), criteria=str(CRITERIA), classes=str(CLASSES))


@cache
def found() -> dict[Key, Outcome]:
    """The program's outcomes under the rules that the scalar script knows."""
    frame = reviewed().outcomes
    names = ["line_number", "case", "rule", "outcome", "value", "limit"]
    columns = [list(frame[name]) for name in names]
    table: dict[Key, Outcome] = {}
    for line, case, rule, outcome, value, limit in zip(*columns, strict=True):
        if str(rule) in RULES:
            key = (str(line), str(case), str(rule))
            assert key not in table, key
            table[key] = (str(outcome), float(value), float(limit))
    return table


@cache
def expected() -> dict[Key, Outcome]:
    """The scalar script's outcomes; the program's table leaves out what is not applicable."""
    everything = scalar_check.expected(LIST, CRITERIA, CLASSES)
    return {key: outcome for key, outcome in everything.items() if outcome[0] != NOT_APPLICABLE}


def of_rule(table: dict[Key, Outcome], rule: str) -> dict[tuple[str, str], Outcome]:
    return {(line, case): outcome for (line, case, name), outcome in table.items() if name == rule}


@pytest.mark.parametrize("rule", RULES)
def test_outcomes_are_the_same(rule: str) -> None:
    program = {key: outcome for key, (outcome, _, _) in of_rule(found(), rule).items()}
    script = {key: outcome for key, (outcome, _, _) in of_rule(expected(), rule).items()}
    differing = {
        key: (program.get(key, NOT_APPLICABLE), script.get(key, NOT_APPLICABLE))
        for key in program.keys() | script.keys()
        if program.get(key) != script.get(key)
    }
    assert differing == {}, "program, then scalar script"


@pytest.mark.parametrize("rule", RULES)
def test_values_and_limits_are_the_same(rule: str) -> None:
    phases = {line.number: line.phase for line in read(LIST, CRITERIA, CLASSES)[0]}
    program = of_rule(found(), rule)
    for (line, case), (outcome, value, limit) in of_rule(expected(), rule).items():
        if outcome not in JUDGED or not math.isfinite(value):
            continue
        tolerance = TOLERANCE[phases[line]]
        # A relative difference of two near numbers carries their error undivided.
        margin = tolerance if rule == "stated-values" else 0.0
        assert program[line, case][1] == pytest.approx(value, rel=tolerance, abs=margin), (line, case)
        assert program[line, case][2] == pytest.approx(limit, rel=tolerance), (line, case)


def test_recommendation_is_revise_and_resubmit() -> None:
    assert reviewed().recommendation == "revise and resubmit"


def test_nine_tenths_of_the_applicable_outcomes_are_checked() -> None:
    outcomes = [str(outcome) for outcome in reviewed().outcomes["outcome"]]
    checked = sum(outcome in JUDGED for outcome in outcomes)
    assert checked / (checked + outcomes.count(NOT_CHECKED)) >= 0.9


def test_a_rule_on_data_governs_a_line_only_where_it_is_not_met() -> None:
    """A test at exactly 1.5 times the design pressure is no line near its limit."""
    done = reviewed()
    on_data = {rule.id for rule in done.judgement.rules if rule.on_data}
    failed = {(row.line_number, row.rule) for row in done.exceptions}
    governed = [(row.line_number, row.governing_rule) for row in done.results().rows if row.governing_rule in on_data]
    assert governed
    assert set(governed) <= failed
