"""Why a data rule could not be told: the first cell of those it reads that is open, with its address."""

from __future__ import annotations

from typing import NamedTuple

__all__ = ["BY_PHASE", "DATA_NEEDS", "Needs"]


class Needs(NamedTuple):
    """The list's fields that stand behind a field of a data rule, and what to say where each of them is there."""

    fields: tuple[str, ...]
    otherwise: str = "a value of another case of the line, or one that it rests on, is missing"


_FLOWS = ("flow_mass", "flow_volume", "flow_standard")
_GAS = ("density", "pressure", "temperature", "molar_mass", "compressibility")
DATA_NEEDS: dict[str, Needs] = {
    "line_number_stated": Needs((), "the line has no number yet"),
    "phase_said": Needs(("phase",)),
    "water": Needs(("fluid", "service")),
    "pressure_rank_broken": Needs(("pressure_design", "pressure", "pressure_design_minimum")),
    "temperature_rank_broken": Needs(("temperature_design", "temperature_design_minimum", "temperature")),
    "case_order_broken": Needs(_FLOWS, "the flow of another case of the line is not given in the same way"),
    "liquid_test_by_code": Needs(
        ("pressure_test", "pressure_design", "design_code", "test_medium"), "the test medium is none that is known"
    ),
    "pressure_test_least": Needs(("pressure_design",)),
    "gas_density_stated": Needs(("phase",)),
    "gas_density_contradicts": Needs(_GAS),
    "liquid_density_stated": Needs(("phase",)),
    "liquid_density_contradicts": Needs(("density", "liquid_density", "fluid", "temperature")),
    "viscosity_stated": Needs(("phase",)),
    "viscosity_contradicts": Needs(("viscosity", "liquid_viscosity", "vapour_viscosity", "fluid", "temperature")),
    "gauge_told_by_density": Needs(("phase",)),
    "gauge_against_density": Needs(_GAS),
    "gauge_told_by_velocity": Needs(("phase",)),
    "gauge_against_velocity": Needs(("velocity_stated", "pressure"), "the velocity at the pressure cannot be computed"),
    "flows_stated_twice": Needs(_FLOWS),
    "flow_difference": Needs((*_FLOWS, "density", "molar_mass"), "the density of the row cannot be told"),
    "standard_may_be_taken": Needs(("phase", *_FLOWS)),
    "standard_taken_for_actual": Needs((*_FLOWS, "molar_mass", "density"), "the density of the row cannot be told"),
    "zero_flow_contradicts": Needs(("service", "phase", *_FLOWS), "the service is not known"),
    "saturation_asked": Needs(("fluid", "phase", "service")),
    "saturation_contradicts": Needs(
        ("pressure", "temperature", "pressure_design", "temperature_design"),
        "the pressure is outside the range in which water boils, 611 Pa to 220.64 bar absolute",
    ),
    "impossible": Needs(("temperature", "temperature_design")),
    "hold_with_revision": Needs(("revision",)),
    "hold_older": Needs(("revision",), "a revision of the list is neither letters nor a number, so none is the newest"),
    "size_basis_contradicts": Needs(("size", "outside_diameter"), "the nominal size is none of ASME B36.10M"),
}
#: They hold a row against the phase it states, so that nothing meets where the row contradicts its phase.
BY_PHASE = frozenset(
    {
        "gas_density_contradicts", "liquid_density_contradicts", "viscosity_contradicts", "gauge_against_density",
        "gauge_against_velocity", "saturation_contradicts",
    }
)  # fmt: skip
