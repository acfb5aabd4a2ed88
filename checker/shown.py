"""How a field's value is shown to people: four significant figures and the unit of the trade."""

from __future__ import annotations

import math
from functools import cache
from typing import Any

import numpy as np

from checker.fields import field_named
from checker.model import Coded
from checker.units import Unit, from_si, read_unit

__all__ = [
    "meaning_of",
    "shown_at",
    "shown_number",
    "shown_value",
    "si_unit_of",
    "si_unit_of_dimension",
    "unit_of",
]

NOT_GIVEN = "not given"

_COMPUTED: dict[str, tuple[str, str, str]] = {
    "velocity": ("velocity", "m/s", "velocity at the inlet"),
    "velocity_outlet": ("velocity", "m/s", "velocity at the outlet"),
    "velocity_highest": ("velocity", "m/s", "velocity at the worst end"),
    "velocity_lowest": ("velocity", "m/s", "velocity at the slow end"),
    "velocity_at_minimum": ("velocity", "m/s", "velocity at the minimum flow"),
    "velocity_at_stated_pressure": ("velocity", "m/s", "velocity at the stated pressure"),
    "velocity_maximum": ("velocity", "m/s", "maximum velocity"),
    "velocity_minimum": ("velocity", "m/s", "minimum velocity"),
    "erosional_velocity": ("velocity", "m/s", "erosional velocity"),
    "erosional_constant": ("erosional constant", "SI", "constant C of the erosional velocity"),
    "density": ("density", "kg/m3", "density at the inlet"),
    "density_outlet": ("density", "kg/m3", "density at the outlet"),
    "density_lowest": ("density", "kg/m3", "density at the lighter end"),
    "density_stated": ("density", "kg/m3", "density at the stated pressure"),
    "reynolds": ("dimensionless", "-", "Reynolds number"),
    "friction_factor": ("dimensionless", "-", "Darcy friction factor"),
    "kinetic_energy_factor": ("dimensionless", "-", "kinetic-energy factor"),
    "fittings_coefficient": ("dimensionless", "-", "sum of loss coefficients of the fittings"),
    "mach": ("dimensionless", "-", "Mach number at the inlet"),
    "mach_outlet": ("dimensionless", "-", "Mach number at the outlet"),
    "mach_highest": ("dimensionless", "-", "Mach number at the worst end"),
    "mach_maximum": ("dimensionless", "-", "maximum Mach number"),
    "npsh_ratio_minimum": ("dimensionless", "-", "least ratio of NPSH available to required"),
    "npsh_margin_minimum": ("length", "m", "least margin of NPSH available over required"),
    "npsh_available": ("length", "m", "NPSH available"),
    "npsh_required_at_flow": ("length", "m", "NPSH required at the case's flow"),
    "pressure_gradient": ("pressure gradient", "bar/100m", "friction gradient at the inlet state"),
    "pressure_gradient_maximum": ("pressure gradient", "bar/100m", "maximum friction gradient"),
    "dp_friction": ("pressure difference", "bar", "friction loss of the pipe"),
    "dp_fittings": ("pressure difference", "bar", "loss of the fittings"),
    "dp_elevation": ("pressure difference", "bar", "static head"),
    "dp_acceleration": ("pressure difference", "bar", "acceleration"),
    "dp_total": ("pressure difference", "bar", "total pressure difference, inlet minus outlet"),
    "pressure_loss": ("pressure difference", "bar", "pressure loss without static head"),
    "pressure_lowest": ("pressure", "bara", "lowest pressure of the line"),
    "lowest_sustained_flow": ("mass flow", "kg/h", "least flow of the continuous cases"),
    "pressure_inlet": ("pressure", "bara", "pressure at the inlet"),
    "pressure_outlet": ("pressure", "bara", "pressure at the outlet"),
    "momentum_flux": ("momentum flux", "Pa", "momentum flux at the worst end"),
    "momentum_flux_maximum": ("momentum flux", "Pa", "maximum momentum flux"),
    "wall_shear_stress": ("momentum flux", "Pa", "wall shear stress"),
    "liquid_holdup": ("fraction", "-", "liquid hold-up"),
    "stated_difference": ("dimensionless", "-", "largest relative difference"),
    "stated_values_tolerance": ("dimensionless", "-", "tolerance on stated values"),
    "surge_rise": ("pressure difference", "bar", "surge pressure rise"),
    "schedule_used": ("", "", "schedule"),
    "material_used": ("", "", "material"),
    "schedule_exists": ("", "", "in the tables"),
    "pipe_length": ("length", "m", "length"),
    "fittings_length": ("length", "m", "equivalent length of the fittings"),
    "pressure_first": ("pressure", "bara", "the pressure that is to be the higher"),
    "pressure_second": ("pressure", "bara", "the pressure it is held against"),
    "pressure_test_gauge": ("pressure difference", "bar", "test pressure, gauge"),
    "pressure_test_least": ("pressure difference", "bar", "least test pressure, gauge"),
    "temperature_first": ("temperature", "degC", "the temperature that is judged"),
    "temperature_second": ("temperature", "degC", "the temperature it is held against"),
    "saturation_temperature": ("temperature", "degC", "saturation temperature"),
    "saturation_temperature_design": ("temperature", "degC", "saturation temperature at the design pressure"),
    "flow_difference": ("dimensionless", "-", "relative difference of the row's flows"),
    "flow_least": ("mass flow", "kg/h", "least of the row's flows as mass"),
    "flow_most": ("mass flow", "kg/h", "greatest of the row's flows as mass"),
    "flow_normal_share": ("dimensionless", "-", "normal flow by the greatest flow"),
    "molar_volume_of_flows": ("dimensionless", "-", "volume flow by molar flow, m3/kmol"),
    "implied_compressibility": ("dimensionless", "-", "compressibility factor that the listed density means"),
    "density_expected": ("density", "kg/m3", "density by P M / (Z R T)"),
    "density_of_liquid": ("density", "kg/m3", "density of the liquid"),
    "viscosity_judged": ("viscosity", "cP", "viscosity, of two phases the one that is not usual"),
    "hold_fields": ("", "", "the fields on HOLD"),
    "outside_diameter_of_size": ("diameter", "mm", "outside diameter of the nominal size"),
    "line_number_text": ("", "", "the line number"),
    "look_alike_said": ("", "", "which number it looks like"),
    "number_mismatch_said": ("", "", "where number and columns differ"),
    "newest_revision": ("", "", "the newest revision"),
    **dict.fromkeys(
        (
            "pressure_rank_said", "temperature_rank_said", "gas_density_said", "liquid_density_said", "viscosity_said",
            "gauge_density_said", "gauge_velocity_said", "zero_flow_said", "saturation_said", "size_basis_said",
            "case_order_said",
        ),
        ("", "", "what agrees or contradicts"),
    ),
}  # fmt: skip


@cache
def _entry(name: str) -> tuple[str, str, str]:
    """Return dimension, shown unit and meaning of a field."""
    if name in _COMPUTED:
        return _COMPUTED[name]
    try:
        field = field_named(name.removesuffix("_listed"))
    except KeyError:
        return "", "", name.replace("_", " ")
    return field.dimension, field.unit, field.meaning


@cache
def _unit(dimension: str, spelling: str) -> Unit | None:
    return None if not dimension or dimension == "nominal size" else read_unit(spelling, dimension)


def meaning_of(name: str) -> str:
    """Return what a field means, in a few words."""
    return _entry(name)[2]


def unit_of(name: str) -> str:
    """Return the unit in which a field is shown; empty for plain numbers and texts."""
    spelling = _entry(name)[1]
    return "" if spelling in ("-", "NPS", "SI") else spelling.replace("/100m", "/100 m")


def si_unit_of(name: str) -> str:
    """Return the SI unit in which a field is held."""
    return si_unit_of_dimension(_entry(name)[0])


def si_unit_of_dimension(dimension: str) -> str:
    """Return the SI unit of a dimension, a dash where it has none."""
    return {
        "velocity": "m/s", "density": "kg/m3", "pressure": "Pa", "pressure difference": "Pa", "length": "m",
        "pressure gradient": "Pa/m", "momentum flux": "Pa", "diameter": "m", "mass flow": "kg/s",
        "volume flow": "m3/s", "temperature": "K", "viscosity": "Pa s", "molar mass": "kg/mol",
        "standard flow": "mol/s", "surface tension": "N/m", "stress": "Pa", "time": "s",
        "erosional constant": "kg^0.5 m^-0.5 s^-1",
    }.get(dimension, "-")  # fmt: skip


def shown_number(value: float, unit: str = "") -> str:
    """Return a number with four significant figures and its unit."""
    if math.isnan(value):
        return NOT_GIVEN
    if math.isinf(value):
        return "infinite" if value > 0 else "minus infinite"
    figures = f"{value:.4g}"
    if "e" in figures and 1e-3 <= abs(value) < 1e7:
        figures = f"{float(figures):.0f}"
    return f"{figures} {unit}".rstrip()


def shown_value(name: str, value: Any) -> str:
    """Return an SI value of a field in the unit in which people read it."""
    dimension, spelling, _ = _entry(name)
    if dimension == "nominal size":
        return "not given" if math.isnan(float(value)) else f"NPS {float(value):g}"
    unit = _unit(dimension, spelling)
    number = float(value) if unit is None else float(from_si(float(value), unit))
    return shown_number(number, unit_of(name))


def shown_at(name: str, held: Any, index: int) -> str:
    """Return the value of a field at one line case as people read it."""
    if isinstance(held, Coded):
        return held.text(index) or NOT_GIVEN
    array = np.asarray(held)
    item = array[index] if array.ndim else array.item()
    if array.dtype.kind == "b":
        return "yes" if item else "no"
    return shown_value(name, float(item))
