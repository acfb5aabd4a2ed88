"""Pipe hydraulics of one line case at a time, in plain scalar form (SI units throughout).

Nothing here is shared with the program under test: the equations are written again, solved by bisection and by
marching, so that agreement means something.

Sources: Colebrook, J. Inst. Civ. Eng. 11 (1939) 133; Crane TP-410 (K = n f_T); Beggs and Brill, J. Pet. Technol.
25 (1973) 607, as published (without the later hold-up factors of Payne); kinetic-energy correction of the power-law
profile with n = 1 / sqrt(f), Nunner's finding, from memory.
"""

from __future__ import annotations

import math
from collections.abc import Callable
from dataclasses import dataclass
from typing import NamedTuple

GRAVITY = 9.80665
CRANE_ROUGHNESS = 0.0018 * 0.0254
STEPS = 400
# The gradient of Beggs and Brill jumps where the flow pattern changes: a step there is halved so many times.
HALVINGS = 30


class ChokedError(ValueError):
    """The pressure cannot carry the flow to the end of the line."""


@dataclass(frozen=True)
class Pipe:
    """Bore, wall roughness and route of one line."""

    bore: float
    roughness: float
    length: float
    fittings_length: float
    fittings_n: float
    entrances: int
    elevation_change: float

    @property
    def area(self) -> float:
        return math.pi * self.bore**2 / 4

    @property
    def fittings_coefficient(self) -> float:
        """Sum of K: n f_T for the fittings and 0.5 for each entrance."""
        fully_rough = (2 * math.log10(3.7 * self.bore / CRANE_ROUGHNESS)) ** -2
        return self.fittings_n * fully_rough + 0.5 * self.entrances


@dataclass(frozen=True)
class Result:
    """What the rules need of one line case; NaN where it is not known."""

    velocity_stated_end: float = math.nan
    velocity_inlet: float = math.nan
    velocity_outlet: float = math.nan
    density_inlet: float = math.nan
    density_outlet: float = math.nan
    pressure_gradient: float = math.nan
    dp_friction_and_fittings: float = math.nan
    dp_acceleration: float = math.nan
    mach_inlet: float = math.nan
    mach_outlet: float = math.nan

    @property
    def dp_without_static(self) -> float:
        return self.dp_friction_and_fittings + self.dp_acceleration


def colebrook(reynolds: float, relative_roughness: float) -> float:
    """Darcy friction factor: x + 2 log10(e/3.7 + 2.51 x / Re) = 0 for x = 1 / sqrt(f), by bisection."""
    low, high = 0.5, 40.0
    for _ in range(100):
        middle = (low + high) / 2
        if middle + 2 * math.log10(relative_roughness / 3.7 + 2.51 * middle / reynolds) > 0:
            high = middle
        else:
            low = middle
    return 4 / (low + high) ** 2


def friction_factor(reynolds: float, relative_roughness: float) -> float:
    """64 / Re when laminar, Colebrook when turbulent, the larger of both between 2000 and 4000."""
    if math.isnan(reynolds) or math.isnan(relative_roughness):
        return math.nan
    if reynolds <= 2000:
        return 64 / reynolds
    turbulent = colebrook(reynolds, relative_roughness)
    return turbulent if reynolds >= 4000 else max(64 / reynolds, turbulent)


def kinetic_energy_factor(reynolds: float, factor: float) -> float:
    """2 up to Re 4000 (the larger, in between); above, that of u = u_max (y / R)^(1/n) with n = 1 / sqrt(f)."""
    if math.isnan(reynolds):
        return math.nan
    if reynolds < 4000:
        return 2.0
    n = 1 / math.sqrt(factor)
    return float(((n + 1) * (2 * n + 1)) ** 3 / (4 * n**4 * (n + 3) * (2 * n + 3)))


def liquid(pipe: Pipe, flow: float, density: float, viscosity: float) -> Result:
    """Constant density: all in closed form; an entrance also takes the kinetic energy from the static pressure."""
    velocity = flow / (density * pipe.area)
    reynolds = density * velocity * pipe.bore / viscosity
    factor = friction_factor(reynolds, pipe.roughness / pipe.bore)
    dynamic = density * velocity**2 / 2
    gradient = factor / pipe.bore * dynamic
    losses = gradient * (pipe.length + pipe.fittings_length) + pipe.fittings_coefficient * dynamic
    kinetic = kinetic_energy_factor(reynolds, factor) * dynamic if pipe.entrances else 0.0
    return Result(velocity, velocity, velocity, density, density, gradient, losses, kinetic)


def gas(pipe: Pipe, flow: float, density: float, viscosity: float, pressure: float, basis: str, k: float) -> Result:
    """Isothermal flow of a gas of constant P / rho; fittings and rise are spread evenly over the length."""
    flux = flow / pipe.area
    reynolds = flux * pipe.bore / viscosity
    factor = friction_factor(reynolds, pipe.roughness / pipe.bore)
    alpha = kinetic_energy_factor(reynolds, factor)
    per_metre = loss_per_metre(pipe, factor)
    sine = pipe.elevation_change / pipe.length
    ratio = density / pressure

    def slope(at: float) -> float:
        rho = at * ratio
        freedom = 1 - alpha * flux**2 / (rho * at)
        if freedom <= 0:
            raise ChokedError
        return -(per_metre * flux**2 / (2 * rho) + rho * GRAVITY * sine) / freedom

    profile = march(slope, pressure, pipe.length, basis)
    inlet, outlet = profile[0], profile[-1]
    static = GRAVITY * sine * ratio * trapezoid(profile, pipe.length)
    acceleration = alpha * flux**2 * (1 / outlet - 1 / inlet) / ratio
    sonic = math.sqrt(k / ratio)
    velocities = [flux / (at * ratio) for at in (pressure, inlet, outlet)]
    return Result(
        velocity_stated_end=velocities[0],
        velocity_inlet=velocities[1],
        velocity_outlet=velocities[2],
        density_inlet=inlet * ratio,
        density_outlet=outlet * ratio,
        pressure_gradient=factor / pipe.bore * flux**2 / (2 * inlet * ratio),
        dp_friction_and_fittings=inlet - outlet - static - acceleration,
        dp_acceleration=acceleration,
        mach_inlet=velocities[1] / sonic,
        mach_outlet=velocities[2] / sonic,
    )


def gas_inlet_only(pipe: Pipe, flow: float, density: float, viscosity: float, k: float, pressure: float) -> Result:
    """What is left of a gas line known at its inlet when its length is not known."""
    flux = flow / pipe.area
    factor = friction_factor(flux * pipe.bore / viscosity, pipe.roughness / pipe.bore)
    velocity = flux / density
    return Result(
        velocity_stated_end=velocity,
        velocity_inlet=velocity,
        density_inlet=density,
        pressure_gradient=factor / pipe.bore * density * velocity**2 / 2,
        mach_inlet=velocity / math.sqrt(k * pressure / density),
    )


def loss_per_metre(pipe: Pipe, factor: float) -> float:
    """(f L_total / D + sum K) / L."""
    return (factor * (pipe.length + pipe.fittings_length) / pipe.bore + pipe.fittings_coefficient) / pipe.length


def march(slope: Callable[[float], float], pressure: float, length: float, basis: str) -> list[float]:
    """Pressures from inlet to outlet at equal steps, by the classical Runge-Kutta method from the known end."""

    def rate(at: float) -> float:
        if at <= 0:
            raise ChokedError
        return slope(at)

    step = (length if basis == "inlet" else -length) / STEPS
    profile = [pressure]
    for _ in range(STEPS):
        at = profile[-1]
        first = rate(at)
        second = rate(at + step * first / 2)
        third = rate(at + step * second / 2)
        fourth = rate(at + step * third)
        profile.append(at + step * (first + 2 * second + 2 * third + fourth) / 6)
    return profile if basis == "inlet" else profile[::-1]


def trapezoid(values: list[float], length: float) -> float:
    """Integral along the line of a quantity known at equal steps."""
    return (sum(values) - (values[0] + values[-1]) / 2) * length / (len(values) - 1)


@dataclass(frozen=True)
class Mixture:
    """Liquid and vapour of a two-phase line; the vapour density belongs to `pressure` and is proportional to it."""

    flow: float
    vapour_fraction: float
    liquid_density: float
    liquid_viscosity: float
    vapour_density: float
    vapour_viscosity: float
    surface_tension: float
    pressure: float

    def at(self, pressure: float, area: float) -> tuple[float, float, float]:
        """Superficial velocities of liquid and vapour, and the vapour density, at a pressure."""
        vapour_density = self.vapour_density * pressure / self.pressure
        liquid = self.flow * (1 - self.vapour_fraction) / (self.liquid_density * area)
        vapour = self.flow * self.vapour_fraction / (vapour_density * area)
        return liquid, vapour, vapour_density


def segment_holdup(pattern: str, share: float, froude: float, velocity_number: float, angle: float) -> float:
    """Beggs and Brill's liquid hold-up of one flow pattern, uphill or level."""
    a, b, c = {
        "segregated": (0.98, 0.4846, 0.0868),
        "intermittent": (0.845, 0.5351, 0.0173),
        "distributed": (1.065, 0.5824, 0.0609),
    }[pattern]
    level = max(a * math.pow(share, b) / math.pow(froude, c), share)
    if angle == 0 or pattern == "distributed":
        return level
    d, e, f, g = (0.011, -3.768, 3.539, -1.614) if pattern == "segregated" else (2.96, 0.305, -0.4473, 0.0978)
    logarithm = math.log(d * math.pow(share, e) * math.pow(velocity_number, f) * math.pow(froude, g))
    strength = max((1 - share) * logarithm, 0.0)
    sine = math.sin(1.8 * angle)
    return level * (1 + strength * (sine - sine**3 / 3))


def flow_pattern(share: float, froude: float) -> tuple[str, float]:
    """Beggs and Brill's map; the second value is the weight of `segregated` inside the transition zone."""
    l1, l2 = 316 * share**0.302, 0.0009252 * share**-2.4684
    l3, l4 = 0.1 * share**-1.4516, 0.5 * share**-6.738
    if froude < (l1 if share < 0.01 else l2):
        return "segregated", math.nan
    if share >= 0.01 and froude <= l3:
        return "transition", (l3 - froude) / (l3 - l2)
    if froude <= (l1 if share < 0.4 else l4):
        return "intermittent", math.nan
    return "distributed", math.nan


def holdup(share: float, froude: float, velocity_number: float, angle: float) -> float:
    pattern, weight = flow_pattern(share, froude)
    if pattern != "transition":
        return segment_holdup(pattern, share, froude, velocity_number, angle)
    ends = [segment_holdup(end, share, froude, velocity_number, angle) for end in ("segregated", "intermittent")]
    return weight * ends[0] + (1 - weight) * ends[1]


class Terms(NamedTuple):
    """Friction, fittings and rise in Pa/m at a pressure, the acceleration group E_k, and the flow pattern."""

    friction: float
    fittings: float
    rise: float
    kinetic: float
    pattern: str

    @property
    def parts(self) -> tuple[float, float, float]:
        """Pressure drop, losses and static part per metre."""
        if self.kinetic >= 1:
            raise ChokedError
        losses = self.friction + self.fittings
        return (losses + self.rise) / (1 - self.kinetic), losses, self.rise


def two_phase_terms(pipe: Pipe, mixture: Mixture, pressure: float) -> Terms:
    """What acts on the flow at a pressure, after Beggs and Brill."""
    if pressure <= 0:
        raise ChokedError
    liquid_part, vapour_part, vapour_density = mixture.at(pressure, pipe.area)
    velocity = liquid_part + vapour_part
    share = liquid_part / velocity
    no_slip = share * mixture.liquid_density + (1 - share) * vapour_density
    viscosity = share * mixture.liquid_viscosity + (1 - share) * mixture.vapour_viscosity
    froude = velocity**2 / (GRAVITY * pipe.bore)
    number = liquid_part * (mixture.liquid_density / (GRAVITY * mixture.surface_tension)) ** 0.25
    sine = max(pipe.elevation_change / pipe.length, 0.0)
    held = holdup(share, froude, number, math.asin(sine))
    slip_density = held * mixture.liquid_density + (1 - held) * vapour_density
    factor = friction_factor(no_slip * velocity * pipe.bore / viscosity, pipe.roughness / pipe.bore)
    factor *= math.exp(friction_exponent(share / held**2))
    dynamic = no_slip * velocity**2 / 2
    friction = factor / pipe.bore * dynamic
    fittings = friction * pipe.fittings_length / pipe.length + pipe.fittings_coefficient / pipe.length * dynamic
    kinetic = vapour_part * velocity * slip_density / pressure
    return Terms(friction, fittings, slip_density * GRAVITY * sine, kinetic, flow_pattern(share, froude)[0])


def friction_exponent(y: float) -> float:
    """S of the two-phase friction factor f = f_no-slip exp(S), Beggs and Brill (1973)."""
    if 1 < y < 1.2:
        return math.log(2.2 * y - 1.2)
    x = math.log(y)
    return x / (-0.0523 + 3.182 * x - 0.8725 * x**2 + 0.01853 * x**4)


def two_phase_step(terms: Callable[[float], Terms], at: float, step: float, halvings: int) -> list[float]:
    """Pressure drop, losses and static part over one Runge-Kutta step, halved while it meets two flow patterns."""
    stages = [terms(at)]
    for share in (0.5, 0.5, 1.0):
        stages.append(terms(at - share * step * stages[-1].parts[0]))
    columns = zip(*(stage.parts for stage in stages), strict=True)
    gains = [step / 6 * (first + 2 * second + 2 * third + fourth) for first, second, third, fourth in columns]
    patterns = {stage.pattern for stage in stages} | {terms(at - gains[0]).pattern}
    if len(patterns) == 1 or halvings == 0:
        return gains
    near = two_phase_step(terms, at, step / 2, halvings - 1)
    far = two_phase_step(terms, at - near[0], step / 2, halvings - 1)
    return [one + other for one, other in zip(near, far, strict=True)]


def two_phase(pipe: Pipe, mixture: Mixture, basis: str) -> Result:
    """Beggs and Brill marched from the known end; the vapour fraction stays, a fall gives no pressure back."""

    def terms(at: float) -> Terms:
        return two_phase_terms(pipe, mixture, at)

    sign = 1 if basis == "inlet" else -1
    far, losses, static = mixture.pressure, 0.0, 0.0
    for _ in range(STEPS):
        gains = two_phase_step(terms, far, sign * pipe.length / STEPS, HALVINGS)
        far, losses, static = far - gains[0], losses + sign * gains[1], static + sign * gains[2]
    inlet, outlet = (mixture.pressure, far) if basis == "inlet" else (far, mixture.pressure)
    velocities, densities = [], []
    for at in (mixture.pressure, inlet, outlet):
        velocities.append(sum(mixture.at(at, pipe.area)[:2]))
        densities.append(mixture.flow / (velocities[-1] * pipe.area))
    return Result(
        velocity_stated_end=velocities[0],
        velocity_inlet=velocities[1],
        velocity_outlet=velocities[2],
        density_inlet=densities[1],
        density_outlet=densities[2],
        pressure_gradient=terms(inlet).friction,
        dp_friction_and_fittings=losses,
        dp_acceleration=inlet - outlet - losses - static,
    )
