"""The ledger of the engineering Bernoulli balance of chosen line cases, each term computed on its own."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from checker.hydraulics import bernoulli
from checker.hydraulics.arrays import GRAVITY, ArrayLike, FloatArray, IndexArray
from checker.hydraulics.cases import Cases, Fittings, fittings_of
from checker.hydraulics.compose import cases_from
from checker.hydraulics.ends import mass_flux
from checker.hydraulics.gas_line import GasLine
from checker.hydraulics.gas_profile import pressure_energy
from checker.hydraulics.solution import GAS, LIQUID, TWO_PHASE, Methods, Solution
from checker.hydraulics.two_phase_solver import TwoPhaseCases


@dataclass(frozen=True)
class Ledger:
    """Terms of the balance, J/kg, one value a case; NaN where the case is not solved.

    Attributes
    ----------
    pressure_term : ndarray
        Integral of dp/rho from 2 to 1: of gas and two-phase by quadrature along the line.
    kinetic_term, elevation_term : ndarray
        (alpha2 v2^2 - alpha1 v1^2)/2, with no velocity in a vessel at rest or a receiver; g (z2 - z1).
    loss_pipe, loss_fittings, loss_exit : ndarray
        Viscous loss of the pipe, of the fittings with the entrance, and of the jet in a receiver.
    loss_slip : ndarray
        Two-phase only: what the method takes beyond the no-slip balance for the slip of the phases (the weight of the
        liquid held up, the acceleration of the method, a fall that is not recovered).
    shaft_work : ndarray
        Zero: no machine stands within a line.
    density : ndarray
        Density for the terms in Pa: liquid as it is, else mean of the line, pressure drop over pressure term.
    closing_error : ndarray
        Difference of both sides over the largest term, [-].
    """

    pressure_term: FloatArray
    kinetic_term: FloatArray
    elevation_term: FloatArray
    loss_pipe: FloatArray
    loss_fittings: FloatArray
    loss_exit: FloatArray
    loss_slip: FloatArray
    shaft_work: FloatArray
    density: FloatArray
    closing_error: FloatArray

    def in_pascals(self, term: str) -> FloatArray:
        """One of the terms, in Pa at the ledger's density."""
        return bernoulli.as_pressure(energy=getattr(self, term), density=self.density)

    def in_metres(self, term: str) -> FloatArray:
        """One of the terms, in metres of the flowing fluid."""
        return bernoulli.as_head(energy=getattr(self, term))


_TERMS = (
    "pressure_term",
    "kinetic_term",
    "elevation_term",
    "loss_pipe",
    "loss_fittings",
    "loss_exit",
    "loss_slip",
    "shaft_work",
)


@np.errstate(all="ignore")
def ledger(*, solution: Solution, rows: ArrayLike, methods: Methods | None = None, **arguments: ArrayLike) -> Ledger:
    """Ledger of chosen line cases.

    Parameters
    ----------
    solution : Solution
        What `compose.solve` gave for the arguments.
    rows : array_like of int
        Rows of the line cases wanted.
    methods : Methods, optional
        As given to `compose.solve`.
    **arguments : array_like
        The other arguments of `compose.solve`, whole columns.

    Returns
    -------
    Ledger
        One value a chosen case.

    References
    ----------
    .. [1] Bird, R.B., Stewart, W.E., Lightfoot, E.N., "Transport Phenomena", 2nd ed., section 7.4.
    """
    chosen = np.atleast_1d(np.asarray(rows, dtype=np.intp))
    cases = cases_from(**arguments).take(chosen)
    terms = {name: np.full(chosen.size, np.nan) for name in _TERMS}
    for code in (LIQUID, GAS, TWO_PHASE):
        part = np.flatnonzero(cases.phase == code)
        if part.size:
            found = _phase_terms(code, cases.take(part), _solved(solution, chosen[part]), methods or Methods())
            for name, values in found.items():
                terms[name][part] = values
    density = np.where(cases.phase == LIQUID, cases.density, solution.dp_total[chosen] / terms["pressure_term"])
    terms["shaft_work"] = np.where(np.isnan(terms["pressure_term"]), np.nan, 0.0)
    return Ledger(**terms, density=density, closing_error=closing_error(**terms))


@np.errstate(all="ignore")
def closing_error(*, pressure_term: ArrayLike, **terms: ArrayLike) -> FloatArray:
    """Difference between the pressure term and all others, over the largest of them, [-]; 0 where all are zero."""
    left = np.asarray(pressure_term, dtype=np.float64)
    right = sum(np.asarray(values, dtype=np.float64) for values in terms.values())
    largest = np.abs(left)
    for values in terms.values():
        largest = np.maximum(largest, np.abs(values))
    return np.where(largest == 0.0, 0.0, np.abs(left - right) / largest)


def _solved(solution: Solution, rows: IndexArray) -> dict[str, FloatArray]:
    names = (
        "velocity",
        "velocity_outlet",
        "kinetic_energy_factor",
        "friction_factor",
        "dp_total",
        "fittings_coefficient",
        "status",
        "density",
    )
    return {name: np.asarray(getattr(solution, name)[rows]) for name in names}


def _phase_terms(code: int, cases: Cases, solved: dict[str, FloatArray], methods: Methods) -> dict[str, FloatArray]:
    fittings = fittings_of(cases)
    if code == LIQUID:
        terms = _liquid(cases, solved)
    elif code == GAS:
        terms = _gas(cases, fittings)
    else:
        terms = _two_phase(cases, fittings, methods)
    return terms | _ends(cases, fittings, solved, terms["pressure_term"])


def _ends(
    cases: Cases, fittings: Fittings, solved: dict[str, FloatArray], pressure_term: FloatArray
) -> dict[str, FloatArray]:
    """Kinetic term, elevation and exit loss, from the solution's velocities."""
    alpha, first, last = solved["kinetic_energy_factor"], solved["velocity"], solved["velocity_outlet"]
    leaves = np.nan_to_num(cases.exit) > 0.0
    kinetic = bernoulli.kinetic_term(
        velocity_inlet=np.where(fittings.entrance > 0.0, 0.0, first),
        velocity_outlet=np.where(leaves, 0.0, last),
        kinetic_energy_factor_inlet=alpha,
        kinetic_energy_factor_outlet=alpha,
    )
    jet = np.where(leaves, bernoulli.exit_loss(kinetic_energy_factor=alpha, velocity=last), 0.0)
    known = np.where(np.isnan(pressure_term), np.nan, 1.0)
    return {
        "kinetic_term": known * kinetic,
        "loss_exit": known * jet,
        "elevation_term": known * bernoulli.elevation_term(elevation_change=cases.elevation_change),
    }


def _liquid(cases: Cases, solved: dict[str, FloatArray]) -> dict[str, FloatArray]:
    velocity = mass_flux(flow_mass=cases.flow_mass, inside_diameter=cases.inside_diameter) / cases.density
    factor = np.where(velocity == 0.0, 0.0, solved["friction_factor"])
    return {
        "pressure_term": bernoulli.pressure_term(pressure_drop=solved["dp_total"], density=cases.density),
        "loss_pipe": bernoulli.pipe_loss(
            friction_factor=factor, length=cases.length, inside_diameter=cases.inside_diameter, velocity=velocity
        ),
        "loss_fittings": bernoulli.fittings_loss(loss_coefficient=solved["fittings_coefficient"], velocity=velocity),
        "loss_slip": np.zeros_like(velocity),
    }


def _gas(cases: Cases, fittings: Fittings) -> dict[str, FloatArray]:
    line = GasLine(cases)
    flow = line.solve()
    profile, share = line.profile(flow)
    head = 0.5 * (line.flux * line.energy / flow.pressure_inlet) ** 2
    entrance = np.where(fittings.entrance == 0.0, 0.0, fittings.entrance_coefficient * head)
    step = np.where(fittings.entrance == 0.0, 0.0, line.entrance_step * head)
    along = pressure_energy(
        pressure_inlet=flow.pressure_inlet, pressure_drop=flow.pressure_drop, pressure_over_density=line.energy
    )
    return {
        "pressure_term": along + step,
        "loss_pipe": profile.loss * share,
        "loss_fittings": profile.loss * (1.0 - share) + entrance,
        "loss_slip": np.zeros_like(along),
    }


def _two_phase(cases: Cases, fittings: Fittings, methods: Methods) -> dict[str, FloatArray]:
    known = TwoPhaseCases(cases, methods)
    found = known.marched(ledger=True)
    first = np.where(known.from_inlet, known.behind_entrance(), found.pressure)
    velocity = known.line.mass_flux / known.line.density(first, np.zeros_like(first))
    head = 0.5 * velocity * velocity
    entrance = np.where(fittings.entrance == 0.0, 0.0, fittings.entrance_coefficient * head)
    step = np.where(fittings.entrance == 0.0, 0.0, known.entrance_step * head)
    return {
        "pressure_term": found.parts[7] + step,
        "loss_pipe": found.parts[4],
        "loss_fittings": found.parts[5] + entrance,
        "loss_slip": found.parts[6],
    }


__all__ = ["GRAVITY", "Ledger", "closing_error", "ledger"]
