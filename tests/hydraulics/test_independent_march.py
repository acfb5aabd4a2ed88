"""An independent march of 1000 segments in plain scalar code reproduces the far-end pressure.

Only the friction factor (fluids) and, for two-phase, the gradient of Beggs and Brill (fluids) are borrowed; nothing of
checker is used in the march. Every segment takes the classical fourth-order Runge-Kutta step of its own formulas.
"""

from __future__ import annotations

import math
from collections.abc import Callable

import fluids
import numpy as np
import pytest
from fluids.two_phase import Beggs_Brill
from hydraulics_cases import GAS, TWO_PHASE, one_case

from checker.hydraulics.compose import Methods, solve

G = 9.80665
SEGMENTS = 1000
CRANE = 0.0018 * 0.0254


def marched(start: float, gradient: Callable[[float], float], *, downstream: bool) -> float:
    """Pressure after the line; `gradient` is dp/dx for x from 0 to 1."""
    pressure, width = start, (1.0 if downstream else -1.0) / SEGMENTS
    for _ in range(SEGMENTS):
        first = gradient(pressure)
        second = gradient(pressure + 0.5 * width * first)
        third = gradient(pressure + 0.5 * width * second)
        fourth = gradient(pressure + width * third)
        pressure += width * (first + 2.0 * second + 2.0 * third + fourth) / 6.0
    return pressure


def alpha_of(number: float, factor: float) -> float:
    if number < 2000.0:
        return 2.0
    n = 1.0 / math.sqrt(factor)
    return (1 + n) ** 3 * (1 + 2 * n) ** 3 / (4 * n**4 * (3 + n) * (3 + 2 * n))


def rough_turbulent(bore: float) -> float:
    return (-2.0 * math.log10(CRANE / bore / 3.7)) ** -2


def known(values: dict[str, float]) -> dict[str, float]:
    return {name: float(column[0]) for name, column in one_case(**values).items()}


@pytest.mark.parametrize("rise", [-40.0, 0.0, 25.0])
@pytest.mark.parametrize("viscosity", [1e-3, 0.2])
@pytest.mark.parametrize("basis", [0, 1])
def test_liquid(rise: float, viscosity: float, basis: int) -> None:
    case = {
        "elevation_change": rise,
        "viscosity": viscosity,
        "fittings_coefficient_n": 90.0,
        "pressure_basis": basis,
        "fittings_length": 12.0,
    }
    x = known(case)
    flux = x["flow_mass"] / (math.pi / 4 * x["inside_diameter"] ** 2)
    number = flux * x["inside_diameter"] / viscosity
    factor = fluids.friction.friction_factor(Re=number, eD=x["roughness"] / x["inside_diameter"])
    loss = factor * (x["length"] + 12.0) / x["inside_diameter"] + 90.0 * rough_turbulent(x["inside_diameter"])
    slope = -(loss * flux**2 / (2.0 * x["density"]) + x["density"] * G * rise)
    far = marched(x["pressure"], lambda _: slope, downstream=basis == 0)
    found = solve(**one_case(**case))
    assert (found.pressure_outlet if basis == 0 else found.pressure_inlet)[0] == pytest.approx(far, rel=1e-6)


@pytest.mark.parametrize("rise", [-90.0, 0.0, 90.0])
@pytest.mark.parametrize(("flow", "pressure", "basis"), [
    (2.0, 1e6, 0), (4.2, 1e6, 0), (2.0, 1e6, 1), (3.0, 2e5, 1), (10.0, 6e5, 1), (0.001, 1e6, 0),
])  # fmt: skip
def test_gas(rise: float, flow: float, pressure: float, basis: int) -> None:
    case = GAS | {
        "elevation_change": rise,
        "flow_mass": flow,
        "pressure": pressure,
        "pressure_basis": basis,
        "density": 8.0 * pressure / 1e6,
        "fittings_coefficient_n": 60.0,
        "length": 150.0,
    }
    x = known(case)
    flux, energy = flow / (math.pi / 4 * x["inside_diameter"] ** 2), 1e6 / 8.0
    number = flux * x["inside_diameter"] / x["viscosity"]
    factor = fluids.friction.friction_factor(Re=number, eD=x["roughness"] / x["inside_diameter"])
    loss = factor * x["length"] / x["inside_diameter"] + 60.0 * rough_turbulent(x["inside_diameter"])
    alpha = alpha_of(number, factor)

    def gradient(p: float) -> float:
        density = p / energy
        return -(loss * flux**2 / (2.0 * density) + density * G * rise) / (1.0 - alpha * flux**2 / (density * p))

    far = marched(pressure, gradient, downstream=basis == 0)
    found = solve(**one_case(**case))
    assert (found.pressure_outlet if basis == 0 else found.pressure_inlet)[0] == pytest.approx(far, rel=1e-6)


@pytest.mark.parametrize("rise", [-30.0, 0.0, 30.0])
@pytest.mark.parametrize("basis", [0, 1])
@pytest.mark.parametrize(("flow", "quality"), [(12.0, 0.05), (4.0, 0.3), (6.0, 0.002)])
def test_beggs_and_brill(rise: float, basis: int, flow: float, quality: float) -> None:
    """Cases that stay within one regime, where the gradient is smooth; tolerance 1e-6 of the far-end pressure."""
    case = TWO_PHASE | {
        "elevation_change": rise,
        "flow_mass": flow,
        "vapour_fraction": quality,
        "length": 120.0,
        "pressure_basis": basis,
    }
    x = known(case)

    def gradient(p: float) -> float:
        length = x["length"]
        return -Beggs_Brill(
            m=flow,
            x=quality,
            rhol=x["liquid_density"],
            rhog=x["vapour_density"] * p / x["pressure"],
            mul=x["liquid_viscosity"],
            mug=x["vapour_viscosity"],
            sigma=x["surface_tension"],
            P=p,
            D=x["inside_diameter"],
            angle=math.degrees(math.asin(rise / length)),
            roughness=x["roughness"],
            L=length,
        )

    far = marched(x["pressure"], gradient, downstream=basis == 0)
    found = solve(**one_case(**case), methods=Methods(downhill_recovery=True))
    assert (found.pressure_outlet if basis == 0 else found.pressure_inlet)[0] == pytest.approx(far, rel=1e-6)


@pytest.mark.parametrize("rise", [-30.0, 0.0, 30.0])
@pytest.mark.parametrize("basis", [0, 1])
def test_homogeneous(rise: float, basis: int) -> None:
    case = TWO_PHASE | {
        "elevation_change": rise,
        "pressure_basis": basis,
        "length": 80.0,
        "fittings_coefficient_k": 3.0,
    }
    x = known(case)
    flux = x["flow_mass"] / (math.pi / 4 * x["inside_diameter"] ** 2)
    quality, bore = x["vapour_fraction"], x["inside_diameter"]

    def state(p: float) -> tuple[float, float, float]:
        vapour = x["vapour_density"] * p / x["pressure"]
        density = 1.0 / ((1 - quality) / x["liquid_density"] + quality / vapour)
        fraction = (1 - quality) / x["liquid_density"] * density
        number = flux * bore / (fraction * x["liquid_viscosity"] + (1 - fraction) * x["vapour_viscosity"])
        return density, number, fluids.friction.friction_factor(Re=number, eD=x["roughness"] / bore)

    alpha = alpha_of(*state(x["pressure"])[1:])

    def gradient(p: float) -> float:
        density, _, factor = state(p)
        taken = (factor * x["length"] / bore + 3.0) * flux**2 / (2.0 * density) + density * G * rise
        return -taken / (1.0 - alpha * flux**2 * quality * x["pressure"] / x["vapour_density"] / p**2)

    far = marched(x["pressure"], gradient, downstream=basis == 0)
    found = solve(**one_case(**case), methods=Methods(two_phase="homogeneous", downhill_recovery=True))
    assert (found.pressure_outlet if basis == 0 else found.pressure_inlet)[0] == pytest.approx(far, rel=1e-6)


def test_a_line_that_crosses_regimes_agrees_with_a_fine_march() -> None:
    """Across a jump of the gradient the plain march is good to a segment of it: 1e-4 of the pressure drop."""
    case = TWO_PHASE | {"elevation_change": 20.0, "flow_mass": 5.0, "vapour_fraction": 0.02, "length": 3000.0}
    x = known(case)

    def gradient(p: float) -> float:
        return -Beggs_Brill(
            m=5.0,
            x=0.02,
            rhol=x["liquid_density"],
            rhog=x["vapour_density"] * p / x["pressure"],
            mul=x["liquid_viscosity"],
            mug=x["vapour_viscosity"],
            sigma=x["surface_tension"],
            P=p,
            D=x["inside_diameter"],
            angle=math.degrees(math.asin(20.0 / 3000.0)),
            roughness=x["roughness"],
            L=3000.0,
        )

    far = marched(x["pressure"], gradient, downstream=True)
    found = solve(**one_case(**case), methods=Methods(downhill_recovery=True))
    assert found.dp_total[0] == pytest.approx(x["pressure"] - far, rel=1e-4)
    assert np.isfinite(found.dp_total[0])
