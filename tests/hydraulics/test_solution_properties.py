"""Whole solutions: parts add up, missing input makes nothing up, neighbours do not matter, zero flow, speed."""

from __future__ import annotations

import dataclasses
import time
import warnings

import numpy as np
import pytest
from hydraulics_cases import GAS, TWO_PHASE, line_cases, one_case

from checker.hydraulics.compose import STATUS_CODES, STATUS_SENTENCES, Methods, Solution, solve

NAMES = [field.name for field in dataclasses.fields(Solution)]
NUMBERS = [name for name in NAMES if name not in ("status", "flow_regime", "transitional", "choked")]


def differs(first: Solution, second: Solution, row: int) -> list[str]:
    pairs = ((name, getattr(first, name)[row], getattr(second, name)[0]) for name in NAMES)
    return [name for name, one, other in pairs if not (one == other or (one != one and other != other))]


def test_one_line_alone_equals_the_same_line_among_a_thousand() -> None:
    cases = line_cases(1000, 42)
    together = solve(**cases)
    for row in range(0, 1000, 4):
        alone = solve(**{name: values[row : row + 1] for name, values in cases.items()})
        assert differs(together, alone, row) == []


def test_order_does_not_matter() -> None:
    cases = line_cases(500, 43)
    turned = solve(**{name: values[::-1] for name, values in cases.items()})
    straight = solve(**cases)
    for name in NAMES:
        np.testing.assert_array_equal(getattr(turned, name)[::-1], getattr(straight, name))


def test_parts_add_up_to_the_total_and_to_the_ends() -> None:
    cases = line_cases(4000, 44)
    found = solve(**cases)
    solved = found.status == 0
    parts = [found.dp_friction, found.dp_fittings, found.dp_elevation, found.dp_acceleration]
    largest = np.maximum.reduce([np.abs(part) for part in parts])
    assert (np.abs(sum(parts) - found.dp_total) / largest)[solved].max() < 1e-9
    between = found.pressure_inlet - found.pressure_outlet
    assert (np.abs(between - found.dp_total) / found.pressure_inlet)[solved].max() < 1e-13
    assert solved.mean() > 0.8


#: Inputs of each phase, and the results that stay known without them.
USES = {
    "liquid": ({}, {
        "viscosity": {"velocity", "momentum_flux", "density", "dp_elevation", "dp_acceleration"},
        "length": {"pressure_gradient", "dp_fittings", "wall_shear_stress"}, "density": {"reynolds"},
        "flow_mass": {"density"}, "inside_diameter": {"density"}, "roughness": {"reynolds", "velocity"},
        "elevation_change": {"dp_friction"}, "fittings_coefficient_n": {"dp_friction"},
        "fittings_coefficient_k": {"dp_friction"}, "fittings_length": {"dp_friction"}, "pressure": {"dp_total"},
        "entrance": {"dp_friction"},
    }),
    "gas": (GAS, {
        "viscosity": {"velocity", "mach"}, "length": {"velocity", "mach"}, "density": {"reynolds"},
        "flow_mass": set(), "inside_diameter": set(),
        "roughness": {"velocity"}, "elevation_change": {"velocity"}, "fittings_coefficient_n": {"velocity"},
        "fittings_coefficient_k": {"velocity"}, "fittings_length": {"velocity"}, "pressure": {"velocity"},
        "heat_capacity_ratio": {"dp_total"}, "entrance": set(),
    }),
    "two-phase": (TWO_PHASE, {
        "liquid_viscosity": {"velocity"}, "vapour_viscosity": {"velocity"}, "length": {"velocity"},
        "liquid_density": set(), "vapour_density": set(), "flow_mass": set(), "inside_diameter": set(),
        "roughness": {"velocity"}, "elevation_change": {"velocity"}, "fittings_coefficient_n": {"velocity"},
        "fittings_coefficient_k": {"velocity"}, "fittings_length": {"velocity"}, "pressure": set(),
        "surface_tension": {"velocity"}, "vapour_fraction": set(), "entrance": set(),
    }),
}  # fmt: skip


@pytest.mark.parametrize(("phase", "name"), [(phase, name) for phase, (_, names) in USES.items() for name in names])
def test_a_missing_input_makes_nan_of_all_that_depends_on_it(phase: str, name: str) -> None:
    """Whatever changes when the input changes is NaN when the input is missing."""
    base, known = USES[phase]
    full = one_case(
        **base
        | {
            "fittings_coefficient_n": 30.0,
            "fittings_coefficient_k": 1.0,
            "fittings_length": 2.0,
            "elevation_change": 2.0,
            "entrance": 1.0 if name == "entrance" else 0.0,
        }
    )
    complete = solve(**full)
    assert int(complete.status[0]) == 0
    changed = solve(**full | {name: full[name] * 1.01 if name != "entrance" else np.array([0.0])})
    missing = solve(**full | {name: np.array([np.nan])})
    for result in NUMBERS:
        if getattr(complete, result)[0] != getattr(changed, result)[0] and np.isfinite(getattr(complete, result)[0]):
            assert np.isnan(getattr(missing, result)[0]), result
    for result in known[name]:
        assert np.isfinite(getattr(missing, result)[0]), result


@pytest.mark.parametrize("value", [np.nan, np.inf, -1.0])
@pytest.mark.parametrize("name", ["flow_mass", "inside_diameter", "density"])
def test_nonsense_gives_no_velocity_and_no_warning(name: str, value: float) -> None:
    with warnings.catch_warnings():
        warnings.simplefilter("error")
        found = solve(**one_case(**{name: value}))
    assert np.isnan(found.dp_total[0]) or np.isinf(value)
    assert int(found.status[0]) != 0 or np.isinf(value)


def test_unknown_phase_is_not_solved() -> None:
    found = solve(**one_case(phase=-1))
    assert STATUS_SENTENCES[int(found.status[0])] == "the phase is not known"
    assert all(np.isnan(getattr(found, name)[0]) for name in NUMBERS)


def test_no_flow_takes_no_pressure_but_its_static_head() -> None:
    liquid = solve(**one_case(flow_mass=0.0, elevation_change=5.0, fittings_coefficient_n=30.0))
    assert liquid.velocity[0] == 0.0
    assert liquid.dp_total[0] == pytest.approx(998.0 * 9.80665 * 5.0)
    gas = solve(**one_case(**GAS | {"flow_mass": 0.0, "elevation_change": 5.0}))
    assert int(gas.status[0]) == 0
    assert gas.dp_total[0] == pytest.approx(8.0 * 9.80665 * 5.0, rel=1e-3)


def test_liquid_whose_pressure_is_used_up() -> None:
    found = solve(**one_case(pressure=1e5, length=5000.0))
    assert int(found.status[0]) == STATUS_CODES["pressure used up"]
    assert np.isnan(found.pressure_outlet[0])
    assert found.dp_total[0] > 1e5


def test_liquid_without_viscosity_keeps_its_velocity() -> None:
    found = solve(**one_case(viscosity=np.nan))
    assert found.velocity[0] == found.velocity_outlet[0] == found.velocity_at_stated_pressure[0] > 0.0
    assert int(found.status[0]) == STATUS_CODES["viscosity"]
    assert np.isnan([found.dp_friction[0], found.dp_total[0], found.pressure_outlet[0], found.friction_factor[0]]).all()


def test_entrance_from_a_vessel_takes_loss_and_kinetic_energy() -> None:
    """Bernoulli from the vessel at rest: p0 - p1 = (alpha + 0.5) rho v2 / 2."""
    plain, fed = solve(**one_case()), solve(**one_case(entrance=1.0))
    head = 0.5 * 998.0 * plain.velocity[0] ** 2
    assert fed.dp_fittings[0] == pytest.approx(0.5 * head, rel=1e-12)
    assert fed.dp_acceleration[0] == pytest.approx(plain.kinetic_energy_factor[0] * head, rel=1e-12)
    rounded = solve(**one_case(entrance=1.0), entrance_coefficient=[0.04])
    assert rounded.dp_fittings[0] == pytest.approx(0.04 * head, rel=1e-12)


def test_short_line_tends_to_no_drop() -> None:
    for base in ({}, GAS, TWO_PHASE):
        found = solve(**one_case(**base | {"length": 1e-9}))
        assert abs(found.dp_total[0]) < 1e-3
        assert found.pressure_outlet[0] == pytest.approx(found.pressure_inlet[0], rel=1e-9)


def test_many_lines_are_quick() -> None:
    """60 000 line cases; the limit leaves a busy machine ample room (about 0.3 s alone on one core)."""
    cases = line_cases(60_000, 45, (0.8, 0.12, 0.08))
    start = time.perf_counter()
    solve(**cases, methods=Methods())
    assert time.perf_counter() - start < 5.0
