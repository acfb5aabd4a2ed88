"""Saturation temperature and viscosity of water against print and CoolProp."""

from __future__ import annotations

import numpy as np
import pytest
from CoolProp.CoolProp import PropsSI

from checker.fluid.saturation import HIGHEST_PRESSURE, LOWEST_PRESSURE, saturation_temperature
from checker.fluid.water_viscosity import liquid_water_viscosity


@pytest.mark.parametrize(("pressure", "printed"), [(1e5, 372.755919), (1e6, 453.035632), (1e7, 584.149488)])
def test_printed_values_of_the_industrial_formulation(pressure: float, printed: float) -> None:
    """IAPWS R7-97(2012), table 36: program verification of equation 31 at 0.1, 1 and 10 MPa."""
    assert float(saturation_temperature(pressure)) == pytest.approx(printed, abs=5e-7)


def test_it_agrees_with_the_scientific_formulation() -> None:
    """CoolProp holds the IAPWS formulation of 1995; the industrial one follows it within 0.02 K."""
    pressures = np.geomspace(700.0, 2.2e7, 60)
    real = [PropsSI("T", "P", float(pressure), "Q", 0, "Water") for pressure in pressures]
    assert saturation_temperature(pressures) == pytest.approx(real, abs=0.02)


def test_its_ends_are_kept_and_beyond_them_it_knows_nothing() -> None:
    """273.15 K at 611.213 Pa and the critical temperature of 647.096 K: the ends of region 4."""
    ends = saturation_temperature([LOWEST_PRESSURE, HIGHEST_PRESSURE])
    assert ends == pytest.approx([273.15, 647.096], abs=1e-3)
    assert np.isnan(saturation_temperature([611.0, 22.0641e6, 0.0, -1e5, np.inf, np.nan])).all()


@pytest.mark.parametrize(("celsius", "centipoise"), [(20.0, 1.002), (100.0, 0.282)])
def test_viscosity_of_water_at_the_two_temperatures_that_everybody_knows(celsius: float, centipoise: float) -> None:
    """1.002 mPa s at 20 degC: ISO/TR 3666; 0.282 at 100 degC: handbooks, from memory."""
    assert 1e3 * float(liquid_water_viscosity(celsius + 273.15)) == pytest.approx(centipoise, rel=0.015)


def test_viscosity_of_water_is_that_of_the_formulation_of_2008() -> None:
    """CoolProp holds the IAPWS formulation of 2008 for the viscosity of water."""
    temperatures = np.linspace(273.2, 573.1, 40)
    real = [PropsSI("V", "T", float(kelvin), "Q", 0, "Water") for kelvin in temperatures]
    assert liquid_water_viscosity(temperatures) == pytest.approx(real, rel=0.06)
    assert np.isnan(liquid_water_viscosity([272.0, 574.0, np.nan])).all()
