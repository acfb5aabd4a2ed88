"""Which fields stand behind a computed one in each phase: what a gap or an assumption there reaches."""

from __future__ import annotations

from functools import cache

from checker.criteria.limits import LIMIT_DIMENSION
from checker.evaluation.values import provider_of
from checker.model import Phase

__all__ = ["behind", "direct"]

_LIQUID_STATE = ("flow_mass", "density_stated", "inside_diameter")
_GAS_STATE = _LIQUID_STATE
_TWO_PHASE_STATE = ("flow_mass", "vapour_fraction", "liquid_density", "vapour_density", "inside_diameter")
_ROUTE = ("pipe_length", "fittings_length", "fittings_n", "fittings_k")
_ALONG = ("pressure", "pressure_basis", *_ROUTE, "elevation_along")
_FRICTION = ("viscosity", "roughness")
_TWO_PHASE_FRICTION = ("liquid_viscosity", "vapour_viscosity", "surface_tension", "roughness")

_AT_STATED = ("velocity_at_stated_pressure",)
_STATE_OUTPUTS = ("velocity", "velocity_outlet", "density", "density_outlet", "momentum_flux")
_FRICTION_OUTPUTS = ("reynolds", "friction_factor", "kinetic_energy_factor", "pressure_gradient", "wall_shear_stress")


def _all(names: tuple[str, ...], needs: tuple[str, ...]) -> dict[str, tuple[str, ...]]:
    return dict.fromkeys(names, needs)


def _liquid() -> dict[str, tuple[str, ...]]:
    friction = (*_LIQUID_STATE, *_FRICTION)
    table = _all((*_AT_STATED, *_STATE_OUTPUTS), _LIQUID_STATE)
    table |= _all(_FRICTION_OUTPUTS, friction)
    table["dp_friction"] = (*friction, "pipe_length")
    table["dp_fittings"] = table["dp_acceleration"] = (*friction, *_ROUTE[1:])
    table["dp_elevation"] = ("density_stated", "elevation_along")
    table |= _all(("dp_total", "pressure_inlet", "pressure_outlet"), (*friction, *_ALONG))
    return table


def _compressible(state: tuple[str, ...], friction: tuple[str, ...]) -> dict[str, tuple[str, ...]]:
    everything = (*state, *friction, *_ALONG)
    table = _all(_AT_STATED, state)
    table |= _all((*_STATE_OUTPUTS, *_FRICTION_OUTPUTS), everything)
    table |= _all(
        (
            "dp_friction",
            "dp_fittings",
            "dp_acceleration",
            "dp_elevation",
            "dp_total",
            "pressure_inlet",
            "pressure_outlet",
        ),
        everything,
    )
    return table


@cache
def _tables() -> dict[int, dict[str, tuple[str, ...]]]:
    gas = _compressible(_GAS_STATE, _FRICTION)
    gas |= _all(("mach", "mach_outlet"), (*gas["velocity"], "heat_capacity_ratio"))
    two_phase = _compressible(_TWO_PHASE_STATE, _TWO_PHASE_FRICTION)
    two_phase["liquid_holdup"] = two_phase["velocity"]
    return {Phase.LIQUID: _liquid(), Phase.GAS: gas, Phase.TWO_PHASE: two_phase}


def direct(name: str, phase: int) -> tuple[str, ...]:
    """Return the fields directly behind one, in the order in which a reader would look for them."""
    table = _tables().get(phase)
    if table is not None and name in table:
        return ("phase", *table[name])
    if name in LIMIT_DIMENSION:
        return ("service_code",)
    found = provider_of(name)
    return () if found is None else tuple(need for need in found.needs if not need.endswith("_assumed"))


@cache
def behind(name: str, phase: int) -> frozenset[str]:
    """Return every field behind one in a phase, itself included."""
    reached: set[str] = set()
    waiting = [name]
    while waiting:
        current = waiting.pop()
        if current not in reached:
            reached.add(current)
            waiting.extend(direct(current, phase))
    return frozenset(reached)
