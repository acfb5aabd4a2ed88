"""Beggs and Brill against fluids over every regime and slope; limits of two-phase lines; when a line fails."""

from __future__ import annotations

import numpy as np
import pytest
from fluids.two_phase import Beggs_Brill
from hydraulics_cases import TWO_PHASE, one_case

from checker.hydraulics.beggs_brill import FLOW_REGIMES, local_state, pressure_gradient
from checker.hydraulics.compose import STATUS_CODES, Methods, solve
from checker.hydraulics.two_phase import mixture_density, no_slip, void_fraction


def states(count: int = 3000, seed: int = 3) -> tuple[dict[str, np.ndarray], np.ndarray, np.ndarray]:
    random = np.random.default_rng(seed)
    angle = random.uniform(-90.0, 90.0, count)
    angle[::4] = 0.0
    quality = 10.0 ** random.uniform(-5.0, -0.01, count)
    quality[::11] = 0.0
    given = {
        "mass_flux": 10.0 ** random.uniform(0.5, 3.7, count),
        "vapour_fraction": quality,
        "liquid_density": random.uniform(400.0, 1200.0, count),
        "vapour_density": 10.0 ** random.uniform(-0.3, 2.0, count),
        "liquid_viscosity": 10.0 ** random.uniform(-4.0, -2.0, count),
        "vapour_viscosity": random.uniform(8e-6, 2e-5, count),
        "surface_tension": random.uniform(0.005, 0.07, count),
        "inside_diameter": random.uniform(0.02, 0.6, count),
        "roughness": random.uniform(0.0, 5e-4, count),
        "sine": np.sin(np.radians(angle)),
    }
    return given, angle, 10.0 ** random.uniform(6.5, 8.0, count)


def test_gradient_agrees_with_fluids_in_every_regime_and_slope() -> None:
    given, angle, pressure = states()
    state, found = local_state(**given), pressure_gradient(**given, pressure=pressure)
    number = state.mixture.density * state.mixture.velocity * given["inside_diameter"] / state.mixture.viscosity
    # fluids is laminar up to Re = 2040, checker up to 2000.
    compared = np.isfinite(found) & ~((number >= 2000.0) & (number < 2040.0))
    reference = np.array([
        Beggs_Brill(
            m=g * np.pi / 4.0 * d**2, x=x, rhol=rl, rhog=rg, mul=ml, mug=mg, sigma=s, P=p, D=d, angle=a, roughness=r,
            L=1.0,
        )
        for g, x, rl, rg, ml, mg, s, d, r, a, p in zip(
            *(given[name] for name in (
                "mass_flux", "vapour_fraction", "liquid_density", "vapour_density", "liquid_viscosity",
                "vapour_viscosity", "surface_tension", "inside_diameter", "roughness")),
            angle, pressure, strict=True)
    ])  # fmt: skip
    np.testing.assert_allclose(found[compared], reference[compared], rtol=1e-8)
    for code in range(len(FLOW_REGIMES)):
        for slope in (angle < 0.0, angle == 0.0, angle > 0.0):
            assert np.count_nonzero(compared & (state.flow_regime == code) & slope) >= 5


def test_no_slip_limits() -> None:
    density = mixture_density(vapour_fraction=[0.0, 1.0, 1.1, np.nan], liquid_density=800.0, vapour_density=5.0)
    assert density[:2] == pytest.approx([800.0, 5.0])
    assert np.isnan(density[2:]).all()
    assert void_fraction(vapour_fraction=[0.0, 1.0], liquid_density=800.0, vapour_density=5.0).tolist() == [0.0, 1.0]
    mixture = no_slip(
        mass_flux=[100.0, 0.0],
        vapour_fraction=0.5,
        liquid_density=800.0,
        vapour_density=5.0,
        liquid_viscosity=1e-3,
        vapour_viscosity=1e-5,
    )
    assert mixture.velocity[0] == pytest.approx(100.0 * (0.5 / 800.0 + 0.5 / 5.0))
    assert np.isnan(mixture.velocity[1])


@pytest.mark.parametrize("method", ["beggs-brill", "homogeneous"])
def test_without_vapour_it_is_the_liquid(method: str) -> None:
    two = solve(**one_case(**TWO_PHASE | {"vapour_fraction": 1e-12}), methods=Methods(two_phase=method))
    liquid = solve(**one_case(flow_mass=12.0, density=750.0, viscosity=4e-4, pressure=1.5e6))
    assert int(two.status[0]) == 0
    assert two.dp_friction[0] == pytest.approx(liquid.dp_friction[0], rel=2e-2 if method == "beggs-brill" else 1e-8)


def test_without_liquid_the_homogeneous_line_is_the_gas_line() -> None:
    two = solve(
        **one_case(**TWO_PHASE | {"vapour_fraction": 1.0, "flow_mass": 2.0, "elevation_change": 10.0}),
        methods=Methods(two_phase="homogeneous"),
    )
    gas = solve(
        **one_case(phase=1, flow_mass=2.0, density=15.0, viscosity=1.2e-5, pressure=1.5e6, elevation_change=10.0)
    )
    assert two.pressure_outlet[0] == pytest.approx(gas.pressure_outlet[0], rel=1e-9)
    for name in ("dp_friction", "dp_elevation", "dp_acceleration"):
        assert getattr(two, name)[0] == pytest.approx(getattr(gas, name)[0], rel=1e-6)


def test_all_vapour_in_beggs_and_brill_is_the_gas_gradient() -> None:
    given, _, _ = states(200)
    given["vapour_fraction"] = np.ones(200)
    state = local_state(**given)
    assert (state.liquid_holdup == 0.0).all()
    np.testing.assert_allclose(state.friction_factor, state.no_slip_factor, rtol=1e-15)


def test_no_downhill_recovery_unless_asked() -> None:
    falling = one_case(**TWO_PHASE | {"elevation_change": -20.0})
    kept = solve(**falling)
    recovered = solve(**falling, methods=Methods(downhill_recovery=True))
    assert kept.dp_elevation[0] == 0.0
    assert recovered.dp_elevation[0] < 0.0
    assert kept.dp_total[0] > recovered.dp_total[0]


def test_known_outlet_reproduces_the_known_inlet() -> None:
    down = solve(**one_case(**TWO_PHASE))
    outlet = float(down.pressure_outlet[0])
    up = solve(
        **one_case(**TWO_PHASE | {"pressure": outlet, "vapour_density": 15.0 * outlet / 1.5e6, "pressure_basis": 1})
    )
    assert up.pressure_inlet[0] == pytest.approx(1.5e6, rel=1e-9)
    assert up.velocity[0] == pytest.approx(down.velocity[0], rel=1e-9)


def test_flashing_along_the_line_takes_more() -> None:
    constant = solve(**one_case(**TWO_PHASE))
    flashing = solve(**one_case(**TWO_PHASE | {"vapour_fraction_outlet": 0.08}))
    assert flashing.dp_total[0] > constant.dp_total[0]
    assert flashing.velocity_outlet[0] > constant.velocity_outlet[0]


@pytest.mark.parametrize(("changes", "reason"), [
    ({"vapour_fraction": np.nan}, "vapour fraction"), ({"vapour_fraction": -0.1}, "vapour fraction"),
    ({"vapour_fraction": 1.1}, "vapour fraction"), ({"vapour_fraction_outlet": 2.0}, "outlet vapour fraction"),
    ({"surface_tension": np.nan}, "surface tension"), ({"liquid_density": np.nan}, "liquid density"),
    ({"vapour_density": 0.0}, "vapour density"), ({"vapour_viscosity": np.nan}, "viscosity"),
    ({"elevation_change": 150.0}, "slope"), ({"flow_mass": 0.0}, "no flow"), ({"length": np.nan}, "length"),
    ({"fittings_coefficient_k": np.nan}, "fittings"), ({"pressure": np.nan}, "pressure"),
    ({"pressure_basis": -1}, "pressure basis"), ({"elevation_change": np.nan}, "elevation"),
    ({"flow_mass": 90.0}, "choked two-phase"), ({"roughness": np.nan}, "roughness"),
])  # fmt: skip
def test_a_line_that_cannot_be_solved_says_why(changes: dict[str, float], reason: str) -> None:
    found = solve(**one_case(**TWO_PHASE | changes))
    assert int(found.status[0]) == STATUS_CODES[reason]
    assert np.isnan(found.dp_total[0])
    assert np.isnan(found.pressure_outlet[0])


def test_surface_tension_is_not_needed_by_the_homogeneous_method() -> None:
    found = solve(**one_case(**TWO_PHASE | {"surface_tension": np.nan}), methods=Methods(two_phase="homogeneous"))
    assert int(found.status[0]) == 0
    assert int(found.flow_regime[0]) == -1


def test_velocity_is_known_without_a_length() -> None:
    found = solve(**one_case(**TWO_PHASE | {"length": np.nan}))
    assert np.isfinite([found.velocity[0], found.density[0], found.velocity_at_stated_pressure[0]]).all()
    assert np.isnan([found.velocity_outlet[0], found.momentum_flux[0]]).all()


def test_an_unknown_method_is_refused() -> None:
    with pytest.raises(ValueError, match="two_phase='slip' is not known"):
        Methods(two_phase="slip")  # type: ignore[arg-type]
    with pytest.raises(ValueError, match="gas='fast' is not known"):
        Methods(gas="fast")  # type: ignore[arg-type]
