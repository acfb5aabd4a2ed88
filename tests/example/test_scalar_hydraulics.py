"""The scalar script against the outside world: `fluids`, `CoolProp` and closed forms."""

from __future__ import annotations

import csv
import math
from typing import Any

import pytest
from CoolProp.CoolProp import PropsSI
from fluids.friction import Colebrook
from fluids.piping import nearest_pipe
from fluids.two_phase import Beggs_Brill
from scalar_check import LIST
from scalar_hydraulics import (
    Mixture,
    Pipe,
    colebrook,
    gas,
    kinetic_energy_factor,
    liquid,
    loss_per_metre,
    two_phase_terms,
)
from scalar_tables import OUTSIDE_DIAMETER_MM, STAINLESS_OUTSIDE_DIAMETER_MM, WALL_MM

FLUIDS = {"Ammonia": "Ammonia", "Methanol": "Methanol", "Cooling water": "Water", "Condensate": "Water",
          "Boiler feed water": "Water"}  # fmt: skip
DENSITY_COLUMNS = ("Density [kg/m³]", "Oper. Press. [barg]", "Oper. Temp. [°C]")
ATMOSPHERE = 1.0125e5
GASES = {"Ammonia vapour": "Ammonia", "Nitrogen": "Nitrogen", "Air": "Air", "Steam": "Water"}


@pytest.mark.parametrize("schedule", WALL_MM)
def test_walls_agree_with_the_tables_of_fluids(schedule: str) -> None:
    look_up: Any = nearest_pipe  # typed for whole sizes only
    for nps, wall in WALL_MM[schedule].items():
        _, _, outside, thickness = look_up(NPS=nps, schedule=schedule)
        assert thickness * 1000 == pytest.approx(wall, abs=1e-6)
        diameters = STAINLESS_OUTSIDE_DIAMETER_MM if schedule.endswith("S") else OUTSIDE_DIAMETER_MM
        assert outside * 1000 == pytest.approx(diameters[nps], abs=1e-6)


def test_there_is_no_schedule_20_below_nps_8() -> None:
    with pytest.raises(ValueError, match="NPS not in list"):
        nearest_pipe(NPS=6, schedule="20")
    assert min(WALL_MM["20"]) == 8


@pytest.mark.parametrize("reynolds", [4e3, 1e5, 3e7])
@pytest.mark.parametrize("roughness", [1e-5, 1e-3, 2e-2])
def test_friction_factor_agrees_with_fluids(reynolds: float, roughness: float) -> None:
    assert colebrook(reynolds, roughness) == pytest.approx(Colebrook(Re=reynolds, eD=roughness), rel=1e-10)


def test_kinetic_energy_factor_of_the_one_seventh_profile() -> None:
    """1.058 for n = 7: the value of the fluid-mechanics textbooks, from memory."""
    assert kinetic_energy_factor(1e5, 1 / 49) == pytest.approx(1.058, abs=5e-4)
    assert kinetic_energy_factor(1e3, 0.064) == 2


def test_laminar_liquid_is_hagen_poiseuille() -> None:
    pipe = Pipe(0.05, 5e-5, 100.0, 0.0, 0.0, 0, 0.0)
    found = liquid(pipe, 0.2, 900.0, 0.1)
    assert found.dp_without_static == pytest.approx(128 * 0.1 * 100 * (0.2 / 900) / (math.pi * 0.05**4), rel=1e-12)


def test_level_gas_line_closes_the_isothermal_equation() -> None:
    """P1^2 - P2^2 = G^2 (P / rho) (f L / D + sum K + 2 alpha ln(P1 / P2)), the textbook form with alpha kept."""
    pipe = Pipe(0.1, 5e-5, 200.0, 10.0, 60.0, 0, 0.0)
    flow, density, viscosity, inlet = 1.5, 5.0, 1.5e-5, 5e5
    found = gas(pipe, flow, density, viscosity, inlet, "inlet", 1.3)
    outlet = inlet - found.dp_without_static
    reynolds = 4 * flow / (math.pi * pipe.bore * viscosity)
    factor = colebrook(reynolds, pipe.roughness / pipe.bore)
    loss = loss_per_metre(pipe, factor) * pipe.length
    right = (flow / pipe.area) ** 2 * inlet / density
    right *= loss + 2 * kinetic_energy_factor(reynolds, factor) * math.log(inlet / outlet)
    assert inlet**2 - outlet**2 == pytest.approx(right, rel=1e-9)
    back = gas(pipe, flow, density * outlet / inlet, viscosity, outlet, "outlet", 1.3)
    assert back.dp_without_static == pytest.approx(found.dp_without_static, rel=1e-9)


@pytest.mark.parametrize("rise", [0.0, 2.0, 15.0, 80.0])
@pytest.mark.parametrize(("flow", "fraction"), [(0.5, 0.05), (3.0, 0.002), (10.0, 0.4), (2.0, 0.9), (30.0, 0.95)])
def test_beggs_and_brill_agrees_with_fluids(rise: float, flow: float, fraction: float) -> None:
    pipe = Pipe(0.15, 5e-5, 100.0, 0.0, 0.0, 0, rise)
    mixture = Mixture(flow, fraction, 680.0, 3e-4, 25.0, 1.2e-5, 0.015, 30e5)
    gradient, _, _ = two_phase_terms(pipe, mixture, 30e5).parts
    published = Beggs_Brill(
        m=flow, x=fraction, rhol=680.0, rhog=25.0, mul=3e-4, mug=1.2e-5, sigma=0.015, P=30e5, D=0.15,
        angle=math.degrees(math.asin(rise / 100)), roughness=5e-5, L=1.0, acceleration=True,
    )  # fmt: skip
    # `fluids` solves Colebrook's equation by an explicit formula of nearly full accuracy.
    assert gradient == pytest.approx(published, rel=1e-5)


def real_density(row: dict[str, str], pressure: float, temperature: float) -> float:
    """Density of the pure fluid of a row after CoolProp; NaN where the row's fluid is not one."""
    if row["Phase"] == "L" and row["Fluid"] in FLUIDS:
        return float(PropsSI("D", "T", temperature, "Q", 0, FLUIDS[row["Fluid"]]))
    if row["Phase"] == "V" and row["Fluid"] in GASES and row["Press. Basis"] == "inlet":
        return float(PropsSI("D", "T", temperature, "P", pressure, GASES[row["Fluid"]]))
    return math.nan


def test_densities_of_pure_fluids_on_the_list_are_those_of_coolprop() -> None:
    with LIST.open(encoding="utf-8", newline="") as stream:
        lines = list(csv.DictReader(stream))
    checked = 0
    for row in lines:
        listed, pressure, temperature = (row[name] for name in DENSITY_COLUMNS)
        if "Density at" in row["Remarks"] or not listed or pressure == "ATM" or temperature == "AMB":
            continue
        real = real_density(row, float(pressure) * 1e5 + ATMOSPHERE, float(temperature) + 273.15)
        if not math.isnan(real):
            assert float(listed) == pytest.approx(real, rel=0.01), row["Line No."]
            checked += 1
    assert checked > 80
