"""The engineering Bernoulli balance closes for every phase, and its terms are what they are called."""

from __future__ import annotations

import numpy as np
import pytest
from hydraulics_cases import GAS, TWO_PHASE, line_cases, one_case
from hypothesis import given, settings
from hypothesis import strategies as st

from checker.hydraulics import bernoulli
from checker.hydraulics.compose import Methods, solve
from checker.hydraulics.ledger import closing_error, ledger

METHODS = [Methods(), Methods(two_phase="homogeneous"), Methods(downhill_recovery=True)]


@pytest.mark.parametrize("methods", METHODS, ids=lambda m: f"{m.two_phase}, recovery {m.downhill_recovery}")
@given(seed=st.integers(0, 10_000_000))
@settings(max_examples=12, deadline=None)
def test_closes_within_a_millionth_of_the_largest_term(methods: Methods, seed: int) -> None:
    cases = line_cases(150, seed)
    found = solve(**cases, methods=methods)
    book = ledger(solution=found, rows=np.arange(150), methods=methods, **cases)
    solved = found.status == 0
    assert solved.sum() > 50
    assert np.isfinite(book.closing_error[solved]).all()
    assert book.closing_error[solved].max() < 1e-6
    unsolved = ~solved & (cases["phase"] != 0)
    assert np.isnan(book.closing_error[unsolved]).all()


def test_a_wrong_pressure_does_not_close() -> None:
    cases = one_case(fittings_coefficient_n=50.0, elevation_change=3.0)
    found = solve(**cases)
    book = ledger(solution=found, rows=[0], **cases)
    terms = {
        name: getattr(book, name)
        for name in (
            "kinetic_term",
            "elevation_term",
            "loss_pipe",
            "loss_fittings",
            "loss_exit",
            "loss_slip",
            "shaft_work",
        )
    }
    assert closing_error(pressure_term=1.001 * book.pressure_term, **terms)[0] > 1e-4


def test_exit_loss_and_outlet_kinetic_term_are_never_both_counted() -> None:
    for case in ({}, GAS, TWO_PHASE):
        plain, received = one_case(**case | {"entrance": 1.0}), one_case(**case | {"entrance": 1.0, "exit": 1.0})
        first = ledger(solution=solve(**plain), rows=[0], **plain)
        second = ledger(solution=solve(**received), rows=[0], **received)
        assert first.loss_exit[0] == 0.0
        assert first.kinetic_term[0] > 0.0
        assert second.kinetic_term[0] == 0.0
        assert second.loss_exit[0] == pytest.approx(first.kinetic_term[0], rel=1e-12)


def test_terms_in_pascals_and_metres() -> None:
    cases = one_case(elevation_change=10.0)
    book = ledger(solution=solve(**cases), rows=[0], **cases)
    assert book.in_metres("elevation_term")[0] == pytest.approx(10.0, rel=1e-14)
    assert book.in_pascals("elevation_term")[0] == pytest.approx(998.0 * 9.80665 * 10.0, rel=1e-14)
    assert book.shaft_work[0] == 0.0


def test_pump_work_is_negative() -> None:
    """Shaft work done by the fluid: a pump raising 3 bar in water does work on it."""
    work = bernoulli.shaft_work(
        pressure_term=bernoulli.pressure_term(pressure_drop=-3e5, density=1000.0),
        kinetic_term=0.0,
        elevation_term=0.0,
        viscous_loss=0.0,
    )
    assert float(work) == -300.0
    assert float(bernoulli.power(energy=work, flow_mass=10.0)) == -3000.0


def test_wall_shear_force_carries_the_friction() -> None:
    """Macroscopic momentum balance of a level line: pressure drop times area is the force on the wall."""
    cases = one_case()
    found = solve(**cases)
    force = bernoulli.wall_shear_force(wall_shear_stress=found.wall_shear_stress, inside_diameter=0.10226, length=100.0)
    assert force[0] == pytest.approx(found.dp_friction[0] * np.pi / 4 * 0.10226**2, rel=1e-12)


@pytest.mark.parametrize(("angle", "share"), [(90.0, np.sqrt(2.0)), (180.0, 2.0), (45.0, 0.7653668647), (0.0, 0.0)])
def test_bend_thrust(angle: float, share: float) -> None:
    """Slug of 950 kg/m3 at 10.53 m/s in a 160 mm bore: 3.0 kN at 90 degrees; others by the same momentum balance."""
    flux, area = 950.0 * 10.53**2, np.pi / 4 * 0.16**2
    thrust = float(bernoulli.bend_thrust(momentum_flux=flux, inside_diameter=0.16, angle=angle))
    assert thrust == pytest.approx(share * flux * area, rel=1e-9, abs=1e-9)
    if angle == 90.0:
        assert thrust == pytest.approx(3000.0, rel=0.01)
