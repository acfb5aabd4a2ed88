"""What the solver is told (methods) and what it hands back (solution, status sentences)."""

from __future__ import annotations

from dataclasses import dataclass, fields
from typing import Literal

import numpy as np

from checker.hydraulics.arrays import BoolArray, CodeArray, FloatArray
from checker.hydraulics.beggs_brill import FLOW_REGIMES

LIQUID, GAS, TWO_PHASE = 0, 1, 2
INLET, OUTLET = 0, 1

#: Why a line case could not be solved; the position is the status code.
STATUS_SENTENCES = (
    "solved",
    "the phase is not known",
    "the mass flow is missing or negative",
    "the inside diameter is missing or not above zero",
    "the density is missing or not above zero",
    "the vapour fraction is missing or outside 0 to 1",
    "the outlet vapour fraction is outside 0 to 1",
    "the liquid density is missing or not above zero",
    "the vapour density is missing or not above zero",
    "the viscosity is missing or not above zero",
    "the surface tension is missing or not above zero",
    "the roughness is missing, negative or as large as the bore",
    "the length is missing or negative",
    "the fittings are not known",
    "the elevation change is missing",
    "the elevation change is larger than the length",
    "the pressure is missing or not above zero",
    "it is not known at which end the pressure holds",
    "the flow is zero: no two-phase method applies",
    "choked: the flow cannot get through at the stated inlet pressure",
    "choked: the acceleration of the two-phase flow uses up the pressure before the outlet",
    "pressure used up before the outlet",
    "no inlet pressure above zero gives the stated outlet pressure",
    "outside the range of the method",
)
STATUS_CODES = {
    name: code
    for code, name in enumerate(
        (
            "solved",
            "phase",
            "flow",
            "bore",
            "density",
            "vapour fraction",
            "outlet vapour fraction",
            "liquid density",
            "vapour density",
            "viscosity",
            "surface tension",
            "roughness",
            "length",
            "fittings",
            "elevation",
            "slope",
            "pressure",
            "pressure basis",
            "no flow",
            "choked",
            "choked two-phase",
            "pressure used up",
            "no inlet pressure",
            "method range",
        )
    )
}

__all__ = [
    "FLOW_REGIMES",
    "GAS",
    "INLET",
    "LIQUID",
    "OUTLET",
    "STATUS_CODES",
    "STATUS_SENTENCES",
    "TWO_PHASE",
    "Methods",
    "Solution",
]


@dataclass(frozen=True)
class Methods:
    """Methods of calculation, a part of the basis.

    Attributes
    ----------
    gas : "isothermal"
        Compressible flow at constant temperature.
    two_phase : "beggs-brill" or "homogeneous"
        Beggs and Brill (1973), or the no-slip mixture treated as one fluid.
    downhill_recovery : bool
        Whether a falling two-phase line gets back pressure from its fall; not by default.
    """

    gas: Literal["isothermal"] = "isothermal"
    two_phase: Literal["beggs-brill", "homogeneous"] = "beggs-brill"
    downhill_recovery: bool = False

    def __post_init__(self) -> None:
        """Refuse the name of a method that is not there."""
        if self.gas != "isothermal":
            raise ValueError(f"methods: gas={self.gas!r} is not known; use 'isothermal'")
        if self.two_phase not in ("beggs-brill", "homogeneous"):
            raise ValueError(f"methods: two_phase={self.two_phase!r} is not known; use 'beggs-brill' or 'homogeneous'")


@dataclass(frozen=True)
class Solution:
    """Hydraulics of every line case, SI, one value a case; NaN where not defined.

    Attributes
    ----------
    velocity, velocity_outlet, velocity_at_stated_pressure : ndarray
        Actual velocity in the first and last plane of the pipe, and at the density as listed, [m/s].
    reynolds, friction_factor, kinetic_energy_factor : ndarray
        At the inlet state; Darcy factor; that of the two-phase flow for two-phase.
    density, density_outlet : ndarray
        In the first and last plane; no-slip mixture for two-phase, [kg/m3].
    pressure_gradient, wall_shear_stress : ndarray
        Friction of the pipe at the inlet state, [Pa/m], and times bore over four, [Pa].
    dp_friction, dp_fittings, dp_elevation, dp_acceleration, dp_total : ndarray
        Parts of p1 - p2, [Pa]. With an entrance fitting p1 is that of the vessel at rest, and the entrance loss and
        the kinetic energy taken up are in `dp_fittings` and `dp_acceleration`. An exit loss is no part of any of
        them: the static pressure does not change at the exit plane.
    pressure_inlet, pressure_outlet : ndarray
        Absolute, [Pa]; the known end as stated, but the choking pressure at an outlet that floats up to it.
    mach, mach_outlet : ndarray
        Gas only.
    momentum_flux : ndarray
        rho v2 at the end of lowest density, [Pa].
    liquid_holdup, flow_regime : ndarray
        Two-phase only, at the inlet; regime as code into `FLOW_REGIMES`, -1 none.
    fittings_coefficient : ndarray
        Total K of the fittings, entrance included, exit not, [-].
    status : ndarray of int8
        Code into `STATUS_SENTENCES`; 0 solved.
    transitional, choked : ndarray of bool
        Reynolds number in the critical zone; sonic at the outlet plane.
    """

    velocity: FloatArray
    velocity_outlet: FloatArray
    velocity_at_stated_pressure: FloatArray
    reynolds: FloatArray
    friction_factor: FloatArray
    kinetic_energy_factor: FloatArray
    density: FloatArray
    density_outlet: FloatArray
    pressure_gradient: FloatArray
    dp_friction: FloatArray
    dp_fittings: FloatArray
    dp_elevation: FloatArray
    dp_acceleration: FloatArray
    dp_total: FloatArray
    pressure_inlet: FloatArray
    pressure_outlet: FloatArray
    mach: FloatArray
    mach_outlet: FloatArray
    momentum_flux: FloatArray
    wall_shear_stress: FloatArray
    liquid_holdup: FloatArray
    fittings_coefficient: FloatArray
    flow_regime: CodeArray
    status: CodeArray
    transitional: BoolArray
    choked: BoolArray

    @classmethod
    def blank(cls, count: int) -> Solution:
        """Return a solution of this many cases with nothing in it yet."""
        values: dict[str, object] = {field.name: np.full(count, np.nan) for field in fields(cls)}
        values["flow_regime"] = np.full(count, -1, dtype=np.int8)
        values["status"] = np.full(count, STATUS_CODES["phase"], dtype=np.int8)
        values["transitional"] = np.zeros(count, dtype=np.bool_)
        values["choked"] = np.zeros(count, dtype=np.bool_)
        return cls(**values)  # type: ignore[arg-type]
