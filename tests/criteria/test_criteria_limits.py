"""Limits of the criteria as arrays: band edges, and what is not known never becomes a number."""

from __future__ import annotations

from pathlib import Path

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from checker.criteria.criteria import LIMIT_DIMENSION, Criteria
from checker.criteria.limits import LimitState, force_codes, limit_origin, limit_values
from checker.criteria.load import load_criteria

DEFAULT = load_criteria(None)
BAR = 1e5
ATMOSPHERE = 101_325.0


def index_of(name: str, criteria: Criteria = DEFAULT) -> int:
    return [service.name for service in criteria.services].index(name)


def look_up(
    name: str, key: str, sizes: list[float], pressures: list[float], criteria: Criteria = DEFAULT
) -> tuple[list[float], list[int]]:
    service = np.full(len(sizes), index_of(name, criteria), dtype=np.int32)
    value, state = limit_values(
        criteria=criteria, key=key, service=service, size=np.array(sizes), pressure=np.array(pressures)
    )
    return value.tolist(), state.tolist()


def test_a_size_at_the_end_of_a_band_belongs_to_it() -> None:
    just = 1.0 + 1e-12
    sizes = [0.5, 2.0, 2.0 * just, 2.5, 10.0, 12.0, 18.0, 20.0, 80.0]
    values, states = look_up("pump suction, at bubble point", "velocity_maximum", sizes, [np.nan] * len(sizes))
    assert values == pytest.approx([0.6, 0.6, 0.6, 0.9, 0.9, 1.2, 1.2, 1.5, 1.5])
    assert states == [0] * len(sizes)


def test_a_size_beyond_the_tolerance_is_in_the_next_band() -> None:
    values, _ = look_up("pump suction, at bubble point", "velocity_maximum", [2.0 * (1 + 1e-8)], [np.nan])
    assert values == pytest.approx([0.9])


def test_gas_momentum_flux_ladder_goes_by_gauge_pressure() -> None:
    """Common practice, two owners agree: 6 000, 7 500, 10 000, 15 000 up to 20, 50, 80 barg and above."""
    gauge = np.array([0.0, 20.0, 20.1, 50.0, 50.1, 80.0, 80.1, 200.0])
    values, states = look_up("general gas", "momentum_flux_maximum", [np.nan] * 8, (gauge * BAR + ATMOSPHERE).tolist())
    assert values == pytest.approx([6000, 6000, 7500, 7500, 10000, 10000, 15000, 15000])
    assert states == [0] * 8


@pytest.mark.parametrize("bad", [np.nan, np.inf, -np.inf, 0.0, -1.0])
def test_a_missing_or_impossible_size_or_pressure_is_not_known(bad: float) -> None:
    for name, key in (("pump discharge", "velocity_maximum"), ("general gas", "momentum_flux_maximum")):
        values, states = look_up(name, key, [bad], [bad])
        assert np.isnan(values[0])
        assert states == [LimitState.UNKNOWN]


def test_a_limit_without_bands_needs_neither_size_nor_pressure() -> None:
    assert look_up("cooling water", "velocity_maximum", [np.nan], [np.nan]) == ([3.7], [0])


def test_no_such_limit() -> None:
    values, states = look_up("cooling water", "mach_maximum", [6.0], [1e6])
    assert np.isnan(values[0])
    assert states == [LimitState.NO_LIMIT]


@pytest.mark.parametrize("key", list(LIMIT_DIMENSION))
def test_an_unknown_service_never_yields_a_number(key: str) -> None:
    """-1 must not read the last service, nor a code beyond it."""
    service = np.array([-1, -2, len(DEFAULT.services), 10**6], dtype=np.int32)
    value, state = limit_values(
        criteria=DEFAULT, key=key, service=service, size=np.full(4, 6.0), pressure=np.full(4, 1e6)
    )
    assert np.isnan(value).all()
    assert (state == LimitState.UNKNOWN).all()


def test_criteria_without_services(tmp_path: Path) -> None:
    path = tmp_path / "empty.toml"
    path.write_text("")
    value, state = limit_values(
        criteria=load_criteria(path), key="mach_maximum", service=np.array([-1, 0], dtype=np.int32),
        size=np.ones(2), pressure=np.ones(2),
    )  # fmt: skip
    assert np.isnan(value).all()
    assert state.tolist() == [2, 2]


def test_no_lines_at_all() -> None:
    none, codes = np.empty(0), np.empty(0, dtype=np.int32)
    value, state = limit_values(criteria=DEFAULT, key="velocity_maximum", service=codes, size=none, pressure=none)
    assert value.shape == state.shape == (0,)
    forces = force_codes(
        criteria=DEFAULT, rule_id="mach-number", default_force="should", service=codes, keys=("mach_maximum",)
    )
    assert forces.shape == (0,)


def test_unknown_key() -> None:
    with pytest.raises(KeyError, match="velocity_maximum"):
        look_up("cooling water", "velocity_max", [6.0], [1e6])


NUMBERS = st.one_of(st.just(np.nan), st.just(np.inf), st.floats(0.1, 100.0), st.sampled_from([2.0, 6.0, 10.0, 12.0]))
PRESSURES = st.one_of(st.just(np.nan), st.floats(1e3, 2e7), st.just(20 * BAR + ATMOSPHERE))


@settings(max_examples=100, deadline=None)
@given(
    key=st.sampled_from(list(LIMIT_DIMENSION)),
    rows=st.lists(st.tuples(st.integers(-1, len(DEFAULT.services)), NUMBERS, PRESSURES), min_size=1, max_size=20),
)
def test_one_by_one_equals_all_at_once(key: str, rows: list[tuple[int, float, float]]) -> None:
    service = np.array([row[0] for row in rows], dtype=np.int32)
    size, pressure = np.array([row[1] for row in rows]), np.array([row[2] for row in rows])
    value, state = limit_values(criteria=DEFAULT, key=key, service=service, size=size, pressure=pressure)
    assert (np.isfinite(value) == (state == LimitState.SET)).all()
    for index in range(len(rows)):
        one = slice(index, index + 1)
        alone, alone_state = limit_values(
            criteria=DEFAULT, key=key, service=service[one], size=size[one], pressure=pressure[one]
        )
        np.testing.assert_array_equal(alone, value[one])
        np.testing.assert_array_equal(alone_state, state[one])


def test_origin_names_service_value_source_and_basis() -> None:
    sentence = limit_origin(DEFAULT, "velocity_maximum", index_of("cooling water"), np.nan, np.nan)
    assert sentence == "cooling water: 3.7 m/s [cooling water headers 2.5 to 3.7 m/s, upper limit; read]"


def test_origin_of_a_band_agrees_with_the_array() -> None:
    index = index_of("pump discharge")
    for size, text in ((2.0, "2.0 m/s"), (3.0, "2.5 m/s"), (12.0, "3.0 m/s"), (14.0, "4.0 m/s")):
        assert f": {text} at this size" in limit_origin(DEFAULT, "velocity_maximum", index, size, np.nan)
    assert "not known" in limit_origin(DEFAULT, "velocity_maximum", index, np.nan, np.nan)


def test_origin_of_nothing_is_empty() -> None:
    assert limit_origin(DEFAULT, "velocity_maximum", -1, 6.0, 1e6) == ""
    assert limit_origin(DEFAULT, "mach_maximum", index_of("cooling water"), 6.0, 1e6) == ""
