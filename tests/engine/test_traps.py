"""The traps in which NumPy would pass a line silently, one by one: each must end as `not checked`."""

from __future__ import annotations

from typing import Any

import numpy as np
import pytest
from small_lists import values_of

from checker.evaluation.derived import npsh_available, velocity_highest
from checker.model import Coded
from checker.ruling.contract import Outcome, Rule, Source, rule, rule_of
from checker.ruling.run import judge
from checker.ruling.tristate import all_of, any_of, is_code, not_

SOURCE = Source("common practice")
NAN = np.nan


def made(function: Any, **options: Any) -> Rule:
    """Return a rule made of a function for one test."""
    given = {"id": "test-rule", "title": "Test", "force": "should", "sense": "at most", "source": SOURCE}
    marked = rule_of(rule(**(given | {"calculation": "x"} | options))(function))
    assert marked is not None
    return marked


def velocity_rule(**options: Any) -> Rule:
    def judged(*, velocity_stated: Any, velocity_allowed: Any) -> Any:
        return velocity_stated, velocity_allowed

    return made(judged, **options)


def outcomes(found: Rule, count: int, **fields: Any) -> list[Outcome]:
    return [Outcome(int(code)) for code in judge(found, values_of(count, **fields)).outcome]


MEETS, FAILS, OPEN, NONE = (
    Outcome.MEETS,
    Outcome.DOES_NOT_MEET,
    Outcome.NOT_CHECKED,
    Outcome.NOT_APPLICABLE,
)


@pytest.mark.parametrize("sense", ["at most", "at least"])
@pytest.mark.parametrize(
    ("value", "limit"), [(NAN, 3.0), (2.0, NAN), (NAN, NAN), (np.inf, 3.0), (2.0, np.inf), (2.0, -np.inf)]
)
def test_only_finite_against_finite_is_judged(sense: str, value: float, limit: float) -> None:
    numbers = {"velocity_stated": [value], "velocity_allowed": [limit]}
    assert outcomes(velocity_rule(sense=sense), 1, numbers=numbers) == [OPEN]


def test_value_at_its_limit_meets_within_the_last_bits() -> None:
    """3.0 m/s through feet is 3.0000000000000004: compare within 1e-9 relative, no more."""
    through_feet = 3.0 / 0.3048 * 0.3048
    values = [through_feet, 3.0 * (1 + 0.9e-9), 3.0 * (1 + 2e-9)]
    numbers = {"velocity_stated": values, "velocity_allowed": [3.0] * 3}
    assert outcomes(velocity_rule(), 3, numbers=numbers) == [MEETS, MEETS, FAILS]


def test_nan_in_applies_is_not_checked_rather_than_not_applicable() -> None:
    def hot(*, temperature: Any) -> Any:
        return temperature > 373.15

    numbers = {"velocity_stated": [1.0] * 3, "velocity_allowed": [3.0] * 3, "temperature": [400.0, 300.0, NAN]}
    assert outcomes(velocity_rule(applies=hot), 3, numbers=numbers) == [MEETS, NONE, OPEN]


def test_missing_text_in_applies_is_not_checked() -> None:
    def hydrocarbon(*, fluid: Coded) -> Any:
        return fluid.where([text == "methanol" for text in fluid.texts])

    numbers = {"velocity_stated": [1.0] * 3, "velocity_allowed": [3.0] * 3}
    texts = {"fluid": ["methanol", "water", ""]}
    assert outcomes(velocity_rule(applies=hydrocarbon), 3, numbers=numbers, texts=texts) == [MEETS, NONE, OPEN]


def test_code_minus_one_does_not_read_the_last_row() -> None:
    texts = Coded(np.array([0, 1, -1], dtype=np.int32), ("liquid", "gas"))
    assert texts.where([False, True]).tolist() == [False, True, False]
    assert [texts.text(index) for index in range(3)] == ["liquid", "gas", ""]


def test_a_function_that_hides_nan_is_overruled_by_the_engine() -> None:
    """fmax, nanmax and interp hide NaN; a required field that is missing cannot be judged all the same."""

    def hiding(*, velocity_stated: Any, pressure_drop_stated: Any, velocity_allowed: Any) -> Any:
        return np.fmax(velocity_stated, np.nan_to_num(pressure_drop_stated)), velocity_allowed

    numbers = {"velocity_stated": [1.0], "pressure_drop_stated": [NAN], "velocity_allowed": [3.0]}
    assert outcomes(made(hiding), 1, numbers=numbers) == [OPEN]


def test_the_worst_end_is_not_known_when_either_end_is_not() -> None:
    worst = velocity_highest(velocity=np.array([1.0, 1.0, NAN]), velocity_outlet=np.array([2.0, NAN, 2.0]))
    assert np.isnan(worst).tolist() == [False, True, True]


def test_negative_npsh_has_infinite_utilisation() -> None:
    """limit / value of a negative value would be a flattering negative ratio."""
    available = npsh_available(
        source_pressure=np.array([1e5]),
        vapour_pressure=np.array([1.5e5]),
        density=np.array([1000.0]),
        static_head=np.array([0.0]),
        dp_friction=np.array([0.0]),
        dp_fittings=np.array([0.0]),
    )
    assert available[0] < 0.0

    def judged(*, velocity_stated: Any, velocity_allowed: Any) -> Any:
        return velocity_stated, velocity_allowed

    found = made(judged, sense="at least")
    said = judge(found, values_of(2, numbers={"velocity_stated": [available[0], 6.0], "velocity_allowed": [3.0, 3.0]}))
    assert said.utilisation[0] == np.inf
    assert said.utilisation[1] == pytest.approx(0.5)
    assert said.outcome.tolist() == [FAILS, MEETS]


def test_a_rule_that_raises_leaves_its_cases_not_checked_and_says_so() -> None:
    def failing(*, velocity_stated: Any) -> Any:
        raise ZeroDivisionError("by the rule's author")

    said = judge(made(failing), values_of(2, numbers={"velocity_stated": [1.0, 2.0]}))
    assert said.outcome.tolist() == [OPEN, OPEN]
    assert "ZeroDivisionError" in said.fault
    assert "test-rule" in said.fault


def test_a_rule_that_gives_too_few_values_is_a_fault() -> None:
    def short(*, velocity_stated: Any) -> Any:
        return velocity_stated[:1].repeat(2), np.array([1.0, 1.0])

    said = judge(made(short), values_of(3, numbers={"velocity_stated": [1.0, 2.0, 3.0]}))
    assert said.fault
    assert set(said.outcome.tolist()) == {OPEN}


def test_a_rule_cannot_change_the_fields_it_is_handed() -> None:
    def meddling(*, velocity_stated: Any, velocity_allowed: Any) -> Any:
        velocity_stated[:] = 0.0
        return velocity_stated, velocity_allowed

    said = judge(made(meddling), values_of(1, numbers={"velocity_stated": [9.0], "velocity_allowed": [3.0]}))
    assert "read-only" in said.fault
    assert said.outcome.tolist() == [OPEN]


def test_an_assumption_supports_meets_only_where_the_rule_calls_it_conservative() -> None:
    def judged(*, compressibility: Any, velocity_allowed: Any) -> Any:
        return compressibility, velocity_allowed

    fields = {
        "numbers": {"velocity_allowed": [3.0, 0.5], "pressure": [2e5] * 2, "compressibility": [NAN] * 2},
        "texts": {"phase": ["gas", "gas"]},
    }
    assert outcomes(made(judged), 2, **fields) == [OPEN, FAILS]
    assert outcomes(made(judged, conservative=("compressibility",)), 2, **fields) == [MEETS, FAILS]


def test_a_condition_is_met_where_nothing_contradicts_and_open_where_a_field_is_missing() -> None:
    def contradiction(*, velocity_stated: Any) -> Any:
        return velocity_stated > 5.0

    found = made(contradiction, sense="condition")
    assert outcomes(found, 3, numbers={"velocity_stated": [9.0, 1.0, NAN]}) == [FAILS, MEETS, OPEN]


def test_three_valued_logic() -> None:
    states = np.array([1, 0, -1])
    assert all_of(states, np.array([1, 1, 1])).tolist() == [1, 0, -1]
    assert all_of(states, np.array([0, 0, 0])).tolist() == [0, 0, 0]
    assert any_of(states, np.array([1, 1, 1])).tolist() == [1, 1, 1]
    assert any_of(states, np.array([0, 0, 0])).tolist() == [1, 0, -1]
    assert not_(states).tolist() == [0, 1, -1]
    assert is_code(np.array([2, 0, -1]), 2).tolist() == [1, 0, -1]
