"""How each kind of published case is computed: through the functions of checker, from SI inputs."""

from __future__ import annotations

import math
from collections.abc import Callable, Mapping

import numpy as np

from checker.hydraulics import bernoulli, gas, suction
from checker.hydraulics.arrays import GRAVITY
from checker.hydraulics.compose import Solution, solve
from checker.hydraulics.ends import mass_flux
from checker.hydraulics.erosion import erosional_constant_si, erosional_velocity
from checker.hydraulics.friction import crane_turbulent_factor, friction_factor, reynolds
from checker.hydraulics.two_phase import mixture_density, void_fraction

Inputs = Mapping[str, float]
Results = dict[str, float]
GAS_CONSTANT = 8.31446261815324

#: Standard conditions of Crane's examples: 60 F, 14.7 psia.
STANDARD_PRESSURE, STANDARD_TEMPERATURE = 14.7 * 6894.757293168, 288.70555555555


def one_line(phase: int, **given: float) -> Solution:
    """Solve a single line case; what is not given is not known, fittings none."""
    names = (
        "flow_mass density viscosity vapour_fraction vapour_fraction_outlet liquid_density liquid_viscosity "
        "vapour_density vapour_viscosity surface_tension pressure heat_capacity_ratio inside_diameter roughness length"
    ).split()
    values = dict.fromkeys(names, math.nan) | {
        "fittings_length": 0.0,
        "fittings_coefficient_n": 0.0,
        "fittings_coefficient_k": 0.0,
        "entrance": 0.0,
        "exit": 0.0,
        "elevation_change": 0.0,
        "pressure_basis": 0,
    }
    return solve(phase=phase, **(values | given))


def area(bore: float) -> float:
    return math.pi / 4.0 * bore * bore


def flow_of(x: Inputs) -> tuple[float, float]:
    """Mass flow and velocity from whichever flow the source gives."""
    if "flow_mass" in x:
        return x["flow_mass"], x["flow_mass"] / x["density"] / area(x["inside_diameter"])
    volume = x["flow_volume"] if "flow_volume" in x else x["velocity"] * area(x["inside_diameter"])
    return volume * x["density"], volume / area(x["inside_diameter"])


def friction(x: Inputs) -> Results:
    darcy = float(friction_factor(reynolds=x["reynolds"], relative_roughness=x["relative_roughness"]))
    return {"darcy": darcy, "fanning": darcy / 4.0}


def crane_turbulent(x: Inputs) -> Results:
    return {"turbulent_factor": float(crane_turbulent_factor(inside_diameter=x["inside_diameter"]))}


def liquid_line(x: Inputs) -> Results:
    flow, velocity = flow_of(x)
    found = one_line(
        0,
        flow_mass=flow,
        density=x["density"],
        viscosity=x["viscosity"],
        inside_diameter=x["inside_diameter"],
        roughness=x["roughness"],
        length=x["length"],
        fittings_coefficient_k=x.get("k", 0.0),
        elevation_change=x.get("rise", 0.0),
        pressure=1.0e8,
    )
    drop = float(found.dp_total[0])
    return {
        "reynolds": float(found.reynolds[0]),
        "darcy": float(found.friction_factor[0]),
        "fanning": float(found.friction_factor[0]) / 4.0,
        "pressure_drop": drop,
        "pressure_gain": -drop,
        "head": drop / x["density"] / GRAVITY,
        "power": drop * flow / x["density"],
        "loss": drop / x["density"],
        "flow_volume": velocity * area(x["inside_diameter"]),
        "velocity": float(found.velocity[0]),
    }


def fittings_only(x: Inputs) -> Results:
    _, velocity = flow_of(x)
    loss = bernoulli.fittings_loss(loss_coefficient=x["k"], velocity=velocity)
    return {"velocity": velocity, "pressure_drop": float(bernoulli.as_pressure(energy=loss, density=x["density"]))}


def given_factor(x: Inputs) -> Results:
    """Balance with the friction factor that the source used; `kinetic` is the number of velocity heads at the end."""
    flow, velocity = flow_of(x)
    pipe = bernoulli.pipe_loss(
        friction_factor=x["darcy"],
        length=x["length"] + x.get("fittings_length", 0.0),
        inside_diameter=x["inside_diameter"],
        velocity=velocity,
    )
    fittings = bernoulli.fittings_loss(loss_coefficient=x.get("k", 0.0), velocity=velocity)
    bore, outlet = x["inside_diameter"], x.get("outlet_diameter", x["inside_diameter"])
    kinetic = bernoulli.kinetic_term(
        velocity_inlet=velocity,
        velocity_outlet=velocity * (bore / outlet) ** 2,
        kinetic_energy_factor_inlet=1.0,
        kinetic_energy_factor_outlet=1.0,
    ) + bernoulli.exit_loss(kinetic_energy_factor=x.get("kinetic", 0.0), velocity=velocity)
    height = bernoulli.elevation_term(elevation_change=x.get("rise", 0.0))
    back = bernoulli.pressure_term(pressure_drop=x.get("back_pressure", 0.0), density=x["density"])
    total = pipe + fittings + kinetic + height + back
    flux = mass_flux(flow_mass=flow, inside_diameter=bore)
    number = reynolds(mass_flux=flux, inside_diameter=bore, viscosity=x.get("viscosity", math.nan))
    return {
        "pressure_drop": float(bernoulli.as_pressure(energy=total, density=x["density"])),
        "pipe_loss": float(pipe),
        "head": float(bernoulli.as_head(energy=total)),
        "reynolds": float(number),
        "power": float(bernoulli.power(energy=total, flow_mass=flow)) / x.get("efficiency", 1.0),
    }


def crane_pumping(x: Inputs) -> Results:
    """Crane's pumping example: the reduced-seat K on the pipe bore, exit loss one velocity head."""
    ratio = x["seat"] / x["inside_diameter"]
    seat = x["seat_n"] * x["turbulent_factor"]
    valve = (seat + ratio * (0.5 * (1.0 - ratio**2) + (1.0 - ratio**2) ** 2)) / ratio**4
    flow, velocity = flow_of(x)
    found = one_line(
        0,
        flow_mass=flow,
        density=x["density"],
        viscosity=x["viscosity"],
        inside_diameter=x["inside_diameter"],
        roughness=x["roughness"],
        length=x["length"],
        fittings_coefficient_n=x["n"],
        fittings_coefficient_k=valve,
        elevation_change=x["rise"],
        pressure=1.0e7,
    )
    jet = bernoulli.exit_loss(kinetic_energy_factor=1.0, velocity=velocity)
    energy = float(found.dp_total[0]) / x["density"] + float(jet)
    return {"head": energy / GRAVITY, "power": energy * flow / x["efficiency"]}


def mechanical_energy(x: Inputs) -> Results:
    """Loss that closes a balance: shaft work with the loss in the place of the work."""
    pressure = bernoulli.pressure_term(pressure_drop=x["pressure_inlet"] - x["pressure_outlet"], density=x["density"])
    height = bernoulli.elevation_term(elevation_change=x["rise"])
    loss = bernoulli.shaft_work(
        pressure_term=pressure, kinetic_term=0.0, elevation_term=height, viscous_loss=-x["work_to_fluid"]
    )
    return {"loss": float(loss)}


def fan(x: Inputs) -> Results:
    flow = x["flow_mass"]
    first, second = (flow / x["density"] / area(x[name]) for name in ("inside_diameter", "outlet_diameter"))
    kinetic = bernoulli.kinetic_term(
        velocity_inlet=first,
        velocity_outlet=second,
        kinetic_energy_factor_inlet=x["alpha_inlet"],
        kinetic_energy_factor_outlet=x["alpha_outlet"],
    )
    pressure = bernoulli.pressure_term(pressure_drop=-x["pressure_rise"], density=x["density"])
    loss = bernoulli.shaft_work(
        pressure_term=pressure, kinetic_term=kinetic, elevation_term=0.0, viscous_loss=-x["power"] / flow
    )
    return {"loss": float(loss)}


def _gas(x: Inputs, pressure: float, basis: int) -> Results:
    energy = GAS_CONSTANT * x["temperature"] / x["molar_mass"]
    standard = STANDARD_PRESSURE * x["molar_mass"] / GAS_CONSTANT / STANDARD_TEMPERATURE
    found = one_line(
        1,
        flow_mass=x["flow_standard"] * standard,
        density=pressure / energy,
        viscosity=x["viscosity"],
        inside_diameter=x["inside_diameter"],
        roughness=x["roughness"],
        length=x["length"],
        pressure=pressure,
        pressure_basis=basis,
        heat_capacity_ratio=1.4,
    )
    return {
        "pressure_drop": float(found.dp_total[0]),
        "velocity": float(found.velocity[0]),
        "velocity_outlet": float(found.velocity_outlet[0]),
        "pressure_inlet": float(found.pressure_inlet[0]),
    }


def gas_line(x: Inputs) -> Results:
    return _gas(x, x["pressure"], 0)


def gas_line_upstream(x: Inputs) -> Results:
    return _gas(x, x["pressure_outlet"], 1)


def isothermal_outlet(x: Inputs) -> Results:
    energy = GAS_CONSTANT * x["temperature"] / x["molar_mass"]
    flux = mass_flux(flow_mass=x["flow_molar"] * x["molar_mass"], inside_diameter=x["inside_diameter"])
    found = gas.inlet_from_outlet(
        pressure_outlet=x["pressure_outlet"],
        mass_flux=flux,
        pressure_over_density=energy,
        loss_coefficient=x["darcy"] * x["length"] / x["inside_diameter"],
    )
    limit = gas.choking_pressure(mass_flux=flux, pressure_over_density=energy)
    return {
        "pressure_inlet": float(found.pressure_inlet),
        "velocity_limit": float(flux * energy / limit),
        "velocity_outlet": float(flux * energy / found.pressure_outlet),
    }


def mach(x: Inputs) -> Results:
    energy = x["gas_constant"] * x["temperature"]
    number = gas.mach_number(
        velocity=x["velocity"], pressure_over_density=energy, heat_capacity_ratio=x["heat_capacity_ratio"]
    )
    return {"mach": float(number)}


def gas_low_drop(x: Inputs) -> Results:
    density = x["pressure"] * x["molar_mass"] / GAS_CONSTANT / x["temperature"]
    loss = bernoulli.pipe_loss(
        friction_factor=x["darcy"], length=x["length"], inside_diameter=x["inside_diameter"], velocity=x["velocity"]
    )
    flow = density * x["velocity"] * area(x["inside_diameter"])
    return {
        "density": density,
        "mass_flux": float(mass_flux(flow_mass=flow, inside_diameter=x["inside_diameter"])),
        "pressure_outlet": x["pressure"] - float(bernoulli.as_pressure(energy=loss, density=density)),
    }


def void(x: Inputs) -> Results:
    return {"void_fraction": float(void_fraction(**x))}


def air_lift(x: Inputs) -> Results:
    air_density = 1.293 * x["pressure"] / x["pressure_free"]
    air, water = 1.293 * x["air_free"], 1000.0 * x["water"]
    density = mixture_density(vapour_fraction=air / (air + water), liquid_density=1000.0, vapour_density=air_density)
    return {"velocity": float(mass_flux(flow_mass=air + water, inside_diameter=x["inside_diameter"]) / density)}


def erosional(x: Inputs) -> Results:
    constant = erosional_constant_si(field_constant=x["field_constant"])
    return {"erosional_velocity": float(erosional_velocity(density=x["density"], erosional_constant=constant))}


def erosional_gas(x: Inputs) -> Results:
    """Density 29 G P / (Z R T) in lb/ft3 with R = 10.73 ft3 psia / (lb-mol R)."""
    field = 29.0 * x["specific_gravity"] * x["pressure"] / (x["compressibility"] * 10.73 * x["temperature"])
    return erosional({"field_constant": x["field_constant"], "density": field * 16.01846337396})


def npsh(x: Inputs) -> Results:
    loss = x["loss_head"] * x["density"] * GRAVITY
    head = suction.npsh_available(
        source_pressure=x["source_pressure"],
        vapour_pressure=x["vapour_pressure"],
        density=x["density"],
        static_head=x["static_head"],
        friction_loss=loss,
    )
    return {"npsh": float(head)}


def npsh_flange(x: Inputs) -> Results:
    velocity = x["flow_volume"] / area(x["inside_diameter"])
    shared = {"pressure": x["pressure"], "vapour_pressure": x["vapour_pressure"], "density": x["density"]}
    with_head = suction.npsh_from_flange_pressure(velocity=velocity, **shared)
    without = suction.npsh_from_flange_pressure(velocity=0.0, **shared)
    return {"npsh": float(with_head), "velocity_head": float(with_head - without)}


def npsh_heads(x: Inputs) -> Results:
    weight = 1000.0 * GRAVITY
    return npsh(
        {
            "source_pressure": x["source_head"] * weight,
            "vapour_pressure": x["vapour_head"] * weight,
            "density": 1000.0,
            "static_head": x["static_head"],
            "loss_head": x["loss_head"],
        }
    )


def npsh_boiling(x: Inputs) -> Results:
    _, velocity = flow_of(x)
    loss = bernoulli.pipe_loss(
        friction_factor=x["darcy"], length=x["length"], inside_diameter=x["inside_diameter"], velocity=velocity
    )
    return npsh(
        {
            "source_pressure": 1.0e5,
            "vapour_pressure": 1.0e5,
            "density": x["density"],
            "static_head": x["static_head"],
            "loss_head": float(bernoulli.as_head(energy=loss)),
        }
    )


def acceleration(x: Inputs) -> Results:
    return {"head": float(suction.acceleration_head(**x))}


def dimensions(x: Inputs, schedule: str) -> Results:
    from checker.pipe.sizes import look_up

    found = look_up(nps=np.array([x["nps"]]), schedule_code=np.array([0]), schedule_names=[schedule])
    return {
        "outside_diameter": float(found.outside_diameter[0]),
        "wall_thickness": float(found.wall_thickness[0]),
    }


COMPUTATIONS: dict[str, Callable[..., Results]] = {
    function.__name__: function
    for function in (
        friction,
        crane_turbulent,
        liquid_line,
        fittings_only,
        given_factor,
        crane_pumping,
        mechanical_energy,
        fan,
        gas_line,
        gas_line_upstream,
        isothermal_outlet,
        mach,
        gas_low_drop,
        void,
        air_lift,
        erosional,
        erosional_gas,
        npsh,
        npsh_flange,
        npsh_heads,
        npsh_boiling,
        acceleration,
        dimensions,
    )
}
