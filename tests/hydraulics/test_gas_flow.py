"""Isothermal gas flow: put back into the equation, against fluids, limits, choking, ends."""

from __future__ import annotations

import fluids
import numpy as np
import pytest
from hydraulics_cases import GAS, one_case

from checker.hydraulics.compose import STATUS_CODES, solve
from checker.hydraulics.ends import pressure_before_entrance, pressure_behind_entrance
from checker.hydraulics.gas import choking_pressure, inlet_from_outlet, mach_number, outlet_from_inlet
from checker.hydraulics.gas_profile import along_line

COUNT = 4000


def lines(seed: int = 5) -> dict[str, np.ndarray]:
    random = np.random.default_rng(seed)
    pressure, energy = 10.0 ** random.uniform(4.5, 7.5, COUNT), 10.0 ** random.uniform(4.0, 6.0, COUNT)
    rise = random.uniform(-300.0, 300.0, COUNT)
    rise[::3] = 0.0
    return {
        "pressure_inlet": pressure,
        "mass_flux": pressure / np.sqrt(energy) * 10.0 ** random.uniform(-3.5, -0.1, COUNT),
        "pressure_over_density": energy,
        "loss_coefficient": 10.0 ** random.uniform(-2.0, 4.0, COUNT),
        "elevation_change": rise,
        "kinetic_energy_factor": random.uniform(1.0, 2.0, COUNT),
    }


def test_level_line_satisfies_the_published_equation() -> None:
    """Crane TP-410 eq. 1-6: p1^2 - p2^2 = G^2 c^2 (K + 2 ln(p1/p2)), with alpha = 1."""
    given = lines()
    given["elevation_change"], given["kinetic_energy_factor"] = np.zeros(COUNT), np.ones(COUNT)
    found = outlet_from_inlet(**given)
    solved = ~found.choked
    assert solved.mean() > 0.5
    first, last = found.pressure_inlet, found.pressure_outlet
    left = found.pressure_drop * (first + last)
    dynamic = given["mass_flux"] ** 2 * given["pressure_over_density"]
    right = dynamic * (given["loss_coefficient"] - 2.0 * np.log1p(-found.pressure_drop / first))
    np.testing.assert_allclose(left[solved], right[solved], rtol=1e-11)


def test_agrees_with_the_isothermal_gas_equation_of_fluids() -> None:
    """fluids.isothermal_gas returns the mass flow of two pressures: the solved pressures put back give the flow."""
    given = lines(6)
    given["elevation_change"], given["kinetic_energy_factor"] = np.zeros(COUNT), np.ones(COUNT)
    found = outlet_from_inlet(**given)
    ratio = found.pressure_drop / found.pressure_inlet
    for row in np.flatnonzero(~found.choked & (ratio > 1e-3) & (ratio < 0.8))[:200]:
        flow = fluids.compressible.isothermal_gas(
            rho=found.pressure_inlet[row] / given["pressure_over_density"][row],
            fd=given["loss_coefficient"][row],
            P1=found.pressure_inlet[row],
            P2=found.pressure_outlet[row],
            L=1.0,
            D=1.0,
        )
        assert flow / (np.pi / 4.0) == pytest.approx(given["mass_flux"][row], rel=1e-9)


def test_upstream_and_downstream_are_each_other_turned_round() -> None:
    given = lines(7)
    down = outlet_from_inlet(**given)
    rest = {name: values for name, values in given.items() if name != "pressure_inlet"}
    up = inlet_from_outlet(pressure_outlet=down.pressure_outlet, **rest)
    solved = ~down.choked
    np.testing.assert_allclose(up.pressure_inlet[solved], given["pressure_inlet"][solved], rtol=1e-13)


def test_parts_add_up_and_cover_the_line() -> None:
    given = lines(8)
    found = outlet_from_inlet(**given)
    solved = ~found.choked
    profile = along_line(
        pressure_outlet=found.pressure_outlet,
        path=found.path,
        **{name: values for name, values in given.items()},
    )
    dynamic = given["kinetic_energy_factor"] * given["mass_flux"] ** 2 * given["pressure_over_density"]
    gained = dynamic * found.pressure_drop / (found.pressure_inlet * found.pressure_outlet)
    total = profile.friction + profile.elevation + gained
    largest = np.maximum.reduce([np.abs(profile.friction), np.abs(profile.elevation), np.abs(gained)])
    assert np.max((np.abs(total - found.pressure_drop) / largest)[solved]) < 1e-9
    np.testing.assert_allclose(profile.covered[solved], 1.0, atol=1e-12)


@pytest.mark.parametrize("rise", [-200.0, 0.0, 35.0])
def test_tends_to_incompressible_flow_at_small_drops(rise: float) -> None:
    shared = {"mass_flux": 2.0, "pressure_over_density": 8e4, "loss_coefficient": 10.0, "elevation_change": rise}
    found = outlet_from_inlet(pressure_inlet=1e7, **shared)
    density = 1e7 / 8e4
    drop = 10.0 * 4.0 / (2.0 * density) + density * 9.80665 * rise
    assert float(found.pressure_drop) == pytest.approx(drop, rel=0.02)


def test_static_column_without_flow() -> None:
    """The barometric formula: p2 = p1 exp(-g z / c2)."""
    found = outlet_from_inlet(
        pressure_inlet=1e5, mass_flux=0.0, pressure_over_density=8.3e4, loss_coefficient=5.0, elevation_change=1000.0
    )
    assert float(found.pressure_outlet) == pytest.approx(1e5 * np.exp(-9.80665 * 1000.0 / 8.3e4), rel=1e-13)


def test_no_length_no_loss_no_change() -> None:
    found = outlet_from_inlet(pressure_inlet=3e5, mass_flux=100.0, pressure_over_density=8e4, loss_coefficient=0.0)
    assert float(found.pressure_outlet) == pytest.approx(3e5, rel=1e-15)
    assert float(found.pressure_drop) == 0.0


def test_fall_in_balance_with_friction_keeps_the_pressure() -> None:
    """A fall whose weight equals the friction: u1 is a stationary point of the line."""
    energy, flux, loss, pressure = 5e4, 300.0, 4.0, 2e6
    rise = -loss * flux**2 * energy**2 / (2.0 * 9.80665 * pressure**2)
    found = outlet_from_inlet(
        pressure_inlet=pressure,
        mass_flux=flux,
        pressure_over_density=energy,
        loss_coefficient=loss,
        elevation_change=rise,
    )
    assert float(found.pressure_outlet) == pytest.approx(pressure, rel=1e-12)
    profile = along_line(
        pressure_inlet=pressure,
        pressure_outlet=found.pressure_outlet,
        path=found.path,
        mass_flux=flux,
        pressure_over_density=energy,
        loss_coefficient=loss,
        elevation_change=rise,
        kinetic_energy_factor=1.0,
    )
    assert float(profile.friction) == pytest.approx(-float(profile.elevation), rel=1e-10)
    assert float(profile.friction) == pytest.approx(loss * flux**2 * energy / (2.0 * pressure), rel=1e-10)


def test_flow_that_cannot_get_through_is_choked() -> None:
    found = solve(**one_case(**GAS | {"flow_mass": 40.0}))
    assert bool(found.choked[0])
    assert int(found.status[0]) == STATUS_CODES["choked"]
    alpha = found.kinetic_energy_factor[0]
    assert found.mach_outlet[0] == pytest.approx(1.0 / np.sqrt(1.3 * alpha), rel=1e-12)
    flux = 40.0 / (np.pi / 4 * 0.10226**2)
    floor = choking_pressure(mass_flux=flux, pressure_over_density=1e6 / 8.0, kinetic_energy_factor=alpha)
    assert found.pressure_outlet[0] == pytest.approx(float(floor), rel=1e-14)
    for name in ("dp_friction", "dp_fittings", "dp_elevation", "dp_acceleration", "dp_total"):
        assert np.isnan(getattr(found, name)[0])


def test_outlet_below_the_choking_pressure_floats_up() -> None:
    flare = one_case(**GAS | {"flow_mass": 30.0, "pressure": 1.01e5, "density": 0.9, "pressure_basis": 1})
    found = solve(**flare)
    assert int(found.status[0]) == 0
    assert bool(found.choked[0])
    assert found.pressure_outlet[0] > 1.01e5
    assert found.mach_outlet[0] == pytest.approx(1.0 / np.sqrt(1.3 * found.kinetic_energy_factor[0]), rel=1e-12)
    again = solve(
        **one_case(
            **GAS
            | {
                "flow_mass": 30.0,
                "pressure": float(found.pressure_inlet[0]) * 1.000001,
                "density": 0.9 * float(found.pressure_inlet[0]) * 1.000001 / 1.01e5,
            }
        )
    )
    assert int(again.status[0]) == 0
    assert again.pressure_outlet[0] == pytest.approx(found.pressure_outlet[0], rel=5e-3)


def test_worst_end_of_a_gas_line_is_its_outlet() -> None:
    found = solve(**one_case(**GAS))
    assert found.velocity_outlet[0] > found.velocity[0]
    assert found.mach_outlet[0] > found.mach[0]
    flux = 2.0 / (np.pi / 4 * 0.10226**2)
    assert found.momentum_flux[0] == pytest.approx(flux * found.velocity_outlet[0], rel=1e-12)


def test_without_a_length_only_the_stated_end_is_known() -> None:
    inlet = solve(**one_case(**GAS | {"length": np.nan}))
    assert np.isfinite([inlet.velocity[0], inlet.mach[0], inlet.velocity_at_stated_pressure[0]]).all()
    assert np.isnan([inlet.velocity_outlet[0], inlet.momentum_flux[0], inlet.mach_outlet[0], inlet.dp_total[0]]).all()
    outlet = solve(**one_case(**GAS | {"length": np.nan, "pressure_basis": 1}))
    assert np.isnan([outlet.velocity[0], outlet.mach[0], outlet.momentum_flux[0]]).all()
    assert np.isfinite([outlet.velocity_outlet[0], outlet.mach_outlet[0], outlet.velocity_at_stated_pressure[0]]).all()


def test_entrance_step_is_the_balance_and_turns_round() -> None:
    shared = {"mass_flux": 400.0, "coefficient": 1.55, "volume_constant": 0.0, "volume_slope": 9e4}
    inside = float(pressure_behind_entrance(pressure_vessel=4e5, **shared))
    velocity = 400.0 * 9e4 / inside
    assert 4e5 - inside == pytest.approx(1.55 * 0.5 * 400.0 * velocity, rel=1e-12)
    assert float(pressure_before_entrance(pressure_pipe=inside, **shared)) == pytest.approx(4e5, rel=1e-14)
    assert np.isnan(pressure_behind_entrance(pressure_vessel=1e4, **shared))


def test_vessel_that_cannot_feed_the_entrance_is_choked() -> None:
    found = solve(**one_case(**GAS | {"flow_mass": 60.0, "entrance": 1.0}))
    assert int(found.status[0]) == STATUS_CODES["choked"]
    assert np.isnan(found.dp_total[0])


def test_exit_loss_is_no_pressure_drop() -> None:
    for case in (GAS, {}):
        plain, into_receiver = solve(**one_case(**case)), solve(**one_case(**case | {"exit": 1.0}))
        assert plain.dp_total[0] == into_receiver.dp_total[0]


def test_mach_number_of_air() -> None:
    """Velocity of sound in air at 288.15 K: 340.3 m/s (International Standard Atmosphere, ISO 2533)."""
    number = mach_number(velocity=340.294, pressure_over_density=101325.0 / 1.225, heat_capacity_ratio=1.4)
    assert float(number) == pytest.approx(1.0, rel=1e-5)
    assert np.isnan(mach_number(velocity=1.0, pressure_over_density=-1.0, heat_capacity_ratio=1.4))
    assert np.isnan(mach_number(velocity=1.0, pressure_over_density=1.0, heat_capacity_ratio=0.9))


def test_a_line_does_not_depend_on_its_neighbours() -> None:
    given = lines(9)
    many = outlet_from_inlet(**given).pressure_outlet
    single = [
        outlet_from_inlet(**{name: values[row : row + 1] for name, values in given.items()}).pressure_outlet[0]
        for row in range(300)
    ]
    np.testing.assert_array_equal(many[:300], single)
