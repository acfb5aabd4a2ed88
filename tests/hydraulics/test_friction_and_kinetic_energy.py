"""Friction factor and kinetic-energy factor against fluids, the defining equation and the asymptotes."""

from __future__ import annotations

import fluids
import numpy as np
import pytest

from checker.hydraulics.friction import (
    colebrook,
    crane_turbulent_factor,
    friction_factor,
    fully_rough,
    reynolds,
    transitional,
)
from checker.hydraulics.kinetic_energy import kinetic_energy_factor, power_law_factor


def grid() -> tuple[np.ndarray, np.ndarray]:
    number, rough = np.meshgrid(np.geomspace(2041.0, 1e9, 61), np.array([0.0, *np.geomspace(1e-7, 0.05, 24)]))
    return number.ravel(), rough.ravel()


def test_agrees_with_fluids_over_a_grid() -> None:
    number, rough = grid()
    reference = [fluids.friction.friction_factor(Re=r, eD=e) for r, e in zip(number, rough, strict=True)]
    found = friction_factor(reynolds=number, relative_roughness=rough)
    # fluids' own explicit method is good to about 1e-13 within this grid.
    np.testing.assert_allclose(found, reference, rtol=1e-12)


def test_is_the_root_of_colebrook_and_white() -> None:
    """Colebrook (1939): both sides of the implicit equation, in extended precision."""
    number, rough = grid()
    root = 1.0 / np.sqrt(colebrook(reynolds=number, relative_roughness=rough).astype(np.longdouble))
    other = -2.0 * np.log10(rough / np.longdouble(3.7) + np.longdouble(2.51) / number * root)
    np.testing.assert_allclose(np.asarray(other / root, dtype=float), 1.0, rtol=0, atol=4e-15)


def test_laminar_and_fully_rough_limits() -> None:
    assert friction_factor(reynolds=[1e-3, 1999.9], relative_roughness=[0.01, np.nan]) == pytest.approx(
        [64e3, 64.0 / 1999.9], rel=1e-15
    )
    limit = fully_rough(relative_roughness=[1e-3, 0.05])
    np.testing.assert_allclose(friction_factor(reynolds=1e15, relative_roughness=[1e-3, 0.05]), limit, rtol=1e-8)


def test_larger_of_both_in_the_critical_zone() -> None:
    number = np.linspace(2000.0, 3999.0, 40)
    for rough in (0.0, 1e-4, 0.05):
        found = friction_factor(reynolds=number, relative_roughness=rough)
        turbulent = np.array([fluids.friction.Colebrook(r, rough) for r in number])
        np.testing.assert_allclose(found, np.maximum(64.0 / number, turbulent), rtol=1e-9)
    assert transitional(reynolds=[1999.0, 2000.0, 3999.0, 4000.0, np.nan]).tolist() == [False, True, True, False, False]


def test_outside_the_domain_is_nan() -> None:
    assert np.isnan(
        friction_factor(
            reynolds=[0.0, -5.0, np.nan, 1e5, 1e5, 1e5], relative_roughness=[0.0, 0.0, 0.0, -1e-4, 1.0, np.nan]
        )
    ).all()
    assert np.isnan(
        reynolds(mass_flux=[-1.0, 1.0, 1.0], inside_diameter=[1.0, 0.0, 1.0], viscosity=[1.0, 1.0, 0.0])
    ).all()
    assert np.isnan(fully_rough(relative_roughness=[0.0, -1.0, 1.0, np.nan])).all()
    assert np.isnan(crane_turbulent_factor(inside_diameter=[0.0, np.nan])).all()


def test_one_element_equals_the_same_among_many() -> None:
    number, rough = grid()
    many = friction_factor(reynolds=number, relative_roughness=rough)
    single = [friction_factor(reynolds=number[i : i + 1], relative_roughness=rough[i : i + 1])[0] for i in range(200)]
    assert many[:200].tolist() == single


@pytest.mark.parametrize(("exponent", "printed"), [(7.0, 1.058), (6.0, 1.077), (9.0, 1.037), (10.0, 1.031)])
def test_power_law_factor_of_textbooks(exponent: float, printed: float) -> None:
    """Munson, Young and Okiishi, section 5.3, and White: alpha of power-law profiles (from memory)."""
    assert float(power_law_factor(exponent=exponent)) == pytest.approx(printed, abs=6e-4)


def test_power_law_factor_is_the_integral_of_the_profile() -> None:
    radius = (np.arange(200_000) + 0.5) / 200_000
    for order in (5.0, 8.0):
        profile = (1.0 - radius) ** (1.0 / order)
        mean = 2.0 * np.mean(profile * radius)
        integral = 2.0 * np.mean((profile / mean) ** 3 * radius)
        assert float(power_law_factor(exponent=order)) == pytest.approx(integral, rel=1e-6)


def test_kinetic_energy_factor_by_regime() -> None:
    found = kinetic_energy_factor(reynolds=[100.0, 3000.0, 1e5, 0.0], friction_factor=[np.nan, 0.04, 0.02, np.nan])
    assert found[:2].tolist() == [2.0, 2.0]
    assert found[2] == pytest.approx(float(power_law_factor(exponent=1.0 / np.sqrt(0.02))))
    assert found[3] == 2.0
    assert np.isnan(kinetic_energy_factor(reynolds=[np.nan, 1e5], friction_factor=[0.02, np.nan])).all()


def test_large_and_shaped_arrays() -> None:
    number = np.geomspace(500.0, 1e8, 20_000).reshape(100, 200)
    found = friction_factor(reynolds=number, relative_roughness=1e-4)
    assert found.shape == number.shape
    np.testing.assert_array_equal(found[70], friction_factor(reynolds=number[70], relative_roughness=1e-4))
