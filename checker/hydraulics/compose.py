"""The hydraulics of all line cases at once: every case by the method of its phase."""

from __future__ import annotations

from dataclasses import fields

import numpy as np

from checker.hydraulics.arrays import ArrayLike, IndexArray
from checker.hydraulics.cases import Cases, Results
from checker.hydraulics.ends import FLUSH_ENTRANCE_COEFFICIENT
from checker.hydraulics.gas_line import solve_gas
from checker.hydraulics.liquid import solve_liquid
from checker.hydraulics.solution import (
    FLOW_REGIMES,
    GAS,
    LIQUID,
    STATUS_CODES,
    STATUS_SENTENCES,
    TWO_PHASE,
    Methods,
    Solution,
)
from checker.hydraulics.two_phase_solver import solve_two_phase

__all__ = ["FLOW_REGIMES", "STATUS_CODES", "STATUS_SENTENCES", "Methods", "Solution", "cases_from", "solve"]

#: Cases worked on at once, by phase. Small blocks stay in the processor's cache; the march of two-phase lines has so
#: many short steps that few large blocks are quicker.
_BLOCKS = {LIQUID: 8192, GAS: 8192, TWO_PHASE: 65536}


@np.errstate(all="ignore")
def solve(
    *,
    phase: ArrayLike,
    flow_mass: ArrayLike,
    density: ArrayLike,
    viscosity: ArrayLike,
    vapour_fraction: ArrayLike,
    vapour_fraction_outlet: ArrayLike,
    liquid_density: ArrayLike,
    liquid_viscosity: ArrayLike,
    vapour_density: ArrayLike,
    vapour_viscosity: ArrayLike,
    surface_tension: ArrayLike,
    pressure: ArrayLike,
    pressure_basis: ArrayLike,
    heat_capacity_ratio: ArrayLike,
    inside_diameter: ArrayLike,
    roughness: ArrayLike,
    length: ArrayLike,
    fittings_length: ArrayLike,
    fittings_coefficient_n: ArrayLike,
    fittings_coefficient_k: ArrayLike,
    entrance: ArrayLike,
    exit: ArrayLike,
    elevation_change: ArrayLike,
    entrance_coefficient: ArrayLike | None = None,
    methods: Methods | None = None,
) -> Solution:
    """Solve the engineering Bernoulli balance of every line case.

    Parameters
    ----------
    phase : array_like of int
        0 liquid, 1 gas, 2 two-phase, -1 not known; shape (n,). All others broadcast to it.
    flow_mass : array_like
        [kg/s], at or above zero.
    density, viscosity : array_like
        Of liquid and gas, [kg/m3] at the stated pressure, [Pa s].
    vapour_fraction, vapour_fraction_outlet : array_like
        Mass fraction of vapour at the inlet and the outlet, [-]; constant where no outlet value is given, else
        linear along the line.
    liquid_density, liquid_viscosity, vapour_density, vapour_viscosity, surface_tension : array_like
        Of two-phase flow, at the stated pressure, [kg/m3], [Pa s], [N/m]; the vapour density follows the pressure.
    pressure : array_like
        Absolute, [Pa], above zero.
    pressure_basis : array_like of int
        Where it holds: 0 inlet, 1 outlet, -1 not known.
    heat_capacity_ratio : array_like
        k, [-]; needed for the Mach number only.
    inside_diameter, roughness, length, elevation_change : array_like
        [m]; elevation outlet minus inlet.
    fittings_length : array_like
        Length of pipe that the fittings count for, [m]; 0 none, NaN not known.
    fittings_coefficient_n, fittings_coefficient_k : array_like
        Sum of n in K = n fT, and sum of constant K, without entrance and exit; 0 none, NaN not known.
    entrance, exit : array_like
        Counts of entrances from a vessel at rest and exits into a receiver; 0 none, NaN not known.
    entrance_coefficient : array_like, optional
        Loss coefficient of the entrance, [-]; 0.5 an entrance where not given.
    methods : Methods, optional
        Methods of calculation.

    Returns
    -------
    Solution
        One value a case. A NaN argument makes NaN of all that depends on it, never of more; `status` says why.

    Notes
    -----
    An exit changes no pressure: the jet's kinetic energy is lost in the receiver, at the static pressure of the exit
    plane. It enters the ledger only, as exit loss in the place of the outlet kinetic term.

    References
    ----------
    .. [1] Bird, R.B., Stewart, W.E., Lightfoot, E.N., "Transport Phenomena", 2nd ed., sections 7.4 and 15.4.
    .. [2] Crane, "Flow of Fluids", TP-410, 2009.
    .. [3] Beggs, H.D., Brill, J.P., J. Pet. Technol. 25 (1973) 607-617, doi:10.2118/4007-PA.
    """
    given = dict(locals())
    chosen = methods or Methods()
    cases = cases_from(**{name: values for name, values in given.items() if name != "methods"})
    count = cases.flow_mass.size
    solution = Solution.blank(count)
    for code, block in _BLOCKS.items():
        of_phase = np.flatnonzero(cases.phase == code)
        for start in range(0, of_phase.size, block):
            rows = of_phase[start : start + block]
            _put(solution, rows, _solve_phase(code, cases.take(rows), chosen))
    return solution


def cases_from(**arguments: ArrayLike | None) -> Cases:
    """Broadcast the arguments of `solve` to one length; entrances without a coefficient get the flush one."""
    values = dict(arguments)
    if values.get("entrance_coefficient") is None:
        entrance = np.asarray(values["entrance"], dtype=np.float64)
        values["entrance_coefficient"] = FLUSH_ENTRANCE_COEFFICIENT * entrance
    names = [field.name for field in fields(Cases)]
    kinds = {"phase": np.int8, "pressure_basis": np.int8}
    arrays = [np.atleast_1d(np.asarray(values[name], dtype=kinds.get(name, np.float64))) for name in names]
    return Cases(*np.broadcast_arrays(*arrays))


def _solve_phase(code: int, cases: Cases, methods: Methods) -> Results:
    if code == LIQUID:
        return solve_liquid(cases)
    if code == GAS:
        return solve_gas(cases)
    return solve_two_phase(cases, methods)


def _put(solution: Solution, rows: IndexArray, result: Results) -> None:
    for name, values in result.items():
        target = getattr(solution, name)
        target[rows] = values.astype(target.dtype, copy=False)
