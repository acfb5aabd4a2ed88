"""The example list holds the faults that were put into it on purpose, and no others, by the scalar script alone."""

from __future__ import annotations

import ast
import csv
import math
import sys
from collections import defaultdict
from functools import cache
from pathlib import Path

import pytest
import scalar_check
from scalar_check import CLASSES, CRITERIA, FAILS, LIST, MEETS, NOT_CHECKED, RULES, Key, Outcome
from scalar_data import DATA_RULES
from scalar_reading import OPEN

HERE = Path(__file__).parent
MINIMA = ("minimum-velocity", "npsh-margin", "test-pressure-rank")
OWN_MODULES = {"scalar_check", "scalar_data", "scalar_hydraulics", "scalar_reading", "scalar_tables"}


@cache
def outcomes() -> dict[Key, Outcome]:
    return scalar_check.expected(LIST, CRITERIA, CLASSES)


def rows(path: Path) -> list[dict[str, str]]:
    with path.open(encoding="utf-8", newline="") as stream:
        return list(csv.DictReader(stream))


def test_exactly_the_deliberate_faults_do_not_meet() -> None:
    found = defaultdict(list)
    for (line, case, rule), (outcome, _, _) in outcomes().items():
        if outcome == FAILS:
            name = case.partition(", with ")[0]
            found[line, rule] += [name] if name not in found[line, rule] else []
    table = rows(HERE / "deliberate_faults.csv")
    deliberate = {(row["line_number"], row["rule"]): row["cases"].split() for row in table}
    assert dict(found) == deliberate


@pytest.mark.parametrize("rule", RULES)
def test_every_rule_is_met_and_failed_somewhere(rule: str) -> None:
    """An open item is never met; all of the list is of one revision, and no number stands twice."""
    seen = {outcome for (_, _, name), (outcome, _, _) in outcomes().items() if name == rule}
    assert {"standing-hold": {FAILS}, "aged-hold": set(), "doubled-line-number": {MEETS}}.get(
        rule, {MEETS, FAILS}
    ) <= seen


def test_about_one_line_in_eight_fails_something_of_its_duty() -> None:
    lines = {line for line, _, _ in outcomes()}
    failed = [(line, rule) for (line, _, rule), (outcome, _, _) in outcomes().items() if outcome == FAILS]
    failing = {line for line, rule in failed if rule not in DATA_RULES}
    assert len(lines) >= 150
    assert 18 <= len(failing) <= 24


def test_nine_tenths_of_the_applicable_outcomes_are_checked() -> None:
    checked = sum(outcome in (MEETS, FAILS) for outcome, _, _ in outcomes().values())
    unchecked = sum(outcome == NOT_CHECKED for outcome, _, _ in outcomes().values())
    assert unchecked > 0
    assert checked / (checked + unchecked) >= 0.9


def test_no_outcome_hangs_on_rounding() -> None:
    for (line, case, rule), (outcome, value, limit) in outcomes().items():
        if outcome in (MEETS, FAILS) and math.isfinite(value):
            utilisation = limit / value if rule in MINIMA else value / limit
            assert abs(utilisation - 1) > 0.005, (line, case, rule, utilisation)


def test_the_list_covers_services_phases_and_open_items() -> None:
    lines = rows(LIST)
    assert len({row["Line No."] for row in lines}) == len(lines)
    assert len({row["Service"] for row in lines if row["Service"]}) >= 12
    assert {row["Phase"] for row in lines} == {"L", "V", "M"}
    assert 6 <= sum(cell in OPEN for row in lines for cell in row.values()) <= 15


def test_line_numbers_follow_one_pattern_and_agree_with_their_columns() -> None:
    """All but the deliberate faults of a number."""
    table = rows(HERE / "deliberate_faults.csv")
    wrong = {row["line_number"] for row in table if row["rule"] in ("number-against-columns", "look-alike-number")}
    for row in rows(LIST):
        size, code, number, piping_class = row["Line No."].rsplit("-", 3)
        if row["Line No."] not in wrong:
            assert size == row["Size (NPS)"]
            assert number.isdigit()
        assert piping_class == row["Piping Class"]
        assert code.isupper()


@pytest.mark.parametrize("name", sorted(OWN_MODULES))
def test_the_scalar_script_uses_the_standard_library_only(name: str) -> None:
    tree = ast.parse((HERE / f"{name}.py").read_text(encoding="utf-8"))
    for node in ast.walk(tree):
        names = [alias.name for alias in node.names] if isinstance(node, ast.Import) else []
        names += [node.module or ""] if isinstance(node, ast.ImportFrom) else []
        for module in names:
            assert module.split(".")[0] in sys.stdlib_module_names | OWN_MODULES
