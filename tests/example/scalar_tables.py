"""Figures typed in by hand for the scalar check of the example list.

Outside diameters and walls: ASME B36.10M-2018, table 1, and ASME B36.19M-2018, table 1, in millimetres; only
the sizes and schedules that the example's class file can ask for. Fitting coefficients: Crane TP-410, appendix
A-26 and following (equivalent lengths n in K = n f_T).
"""

from __future__ import annotations

OUTSIDE_DIAMETER_MM = {
    0.5: 21.3, 0.75: 26.7, 1.0: 33.4, 1.5: 48.3, 2.0: 60.3, 3.0: 88.9, 4.0: 114.3, 6.0: 168.3, 8.0: 219.1,
    10.0: 273.0, 12.0: 323.8, 14.0: 355.6, 16.0: 406.4, 18.0: 457.0, 20.0: 508.0, 24.0: 610.0, 28.0: 711.0,
    30.0: 762.0, 36.0: 914.0,
}  # fmt: skip

# The same two pipes in the metric columns of ASME B36.19M, which round 10.750 and 12.750 in the other way.
STAINLESS_OUTSIDE_DIAMETER_MM = {**OUTSIDE_DIAMETER_MM, 10.0: 273.1, 12.0: 323.9}

# A size that is not in a schedule's row does not exist in that schedule (checked for NPS 1/2 to 24).
WALL_MM = {
    "20": {8.0: 6.35, 10.0: 6.35, 12.0: 6.35, 14.0: 7.92, 16.0: 7.92, 18.0: 7.92, 20.0: 9.53, 24.0: 9.53},
    "40": {0.5: 2.77, 0.75: 2.87, 1.0: 3.38, 1.5: 3.68, 2.0: 3.91, 3.0: 5.49, 4.0: 6.02, 6.0: 7.11, 8.0: 8.18,
           10.0: 9.27, 12.0: 10.31, 14.0: 11.13, 16.0: 12.70, 18.0: 14.27, 20.0: 15.09, 24.0: 17.48},
    "80": {0.5: 3.73, 0.75: 3.91, 1.0: 4.55, 1.5: 5.08, 2.0: 5.54, 3.0: 7.62, 4.0: 8.56, 6.0: 10.97, 8.0: 12.70,
           10.0: 15.09, 12.0: 17.48, 14.0: 19.05, 16.0: 21.44, 18.0: 23.83, 20.0: 26.19, 24.0: 30.96},
    "STD": {0.5: 2.77, 0.75: 2.87, 1.0: 3.38, 1.5: 3.68, 2.0: 3.91, 3.0: 5.49, 4.0: 6.02, 6.0: 7.11, 8.0: 8.18,
            10.0: 9.27, 12.0: 9.53, 14.0: 9.53, 16.0: 9.53, 18.0: 9.53, 20.0: 9.53, 24.0: 9.53, 28.0: 9.53,
            30.0: 9.53, 36.0: 9.53},
    "40S": {0.5: 2.77, 0.75: 2.87, 1.0: 3.38, 1.5: 3.68, 2.0: 3.91, 3.0: 5.49, 4.0: 6.02, 6.0: 7.11, 8.0: 8.18,
            10.0: 9.27, 12.0: 9.53, 14.0: 9.53, 16.0: 9.53, 18.0: 9.53, 20.0: 9.53, 24.0: 9.53},
    "10S": {0.5: 2.11, 0.75: 2.11, 1.0: 2.77, 1.5: 2.77, 2.0: 2.77, 3.0: 3.05, 4.0: 3.05, 6.0: 3.40, 8.0: 3.76,
            10.0: 4.19, 12.0: 4.57, 14.0: 4.78, 16.0: 4.78, 18.0: 4.78, 20.0: 5.54, 24.0: 6.35},
}  # fmt: skip

FITTING_N = {
    "elbow 90 LR": 14.0, "elbow 90 std": 30.0, "elbow 45": 16.0, "gate valve": 8.0, "globe valve": 340.0,
    "ball valve": 3.0, "swing check valve": 100.0, "tee run": 20.0, "tee branch": 60.0,
}  # fmt: skip

# Header of the list -> field and the factor that makes it SI (pressures in bar: gauge is added by the reader).
COLUMNS: dict[str, tuple[str, float]] = {
    "Flow Min [kg/h]": ("flow_minimum", 1 / 3600),
    "Flow Norm [kg/h]": ("flow_normal", 1 / 3600),
    "Flow Max [kg/h]": ("flow_maximum", 1 / 3600),
    "Oper. Press. [barg]": ("pressure", 1e5),
    "Oper. Temp. [°C]": ("temperature", 1.0),
    "Density [kg/m³]": ("density", 1.0),
    "Viscosity [cP]": ("viscosity", 1e-3),
    "MW [kg/kmol]": ("molar_mass", 1e-3),
    "Z": ("compressibility", 1.0),
    "Cp/Cv": ("heat_capacity_ratio", 1.0),
    "Vap. Fraction (mass)": ("vapour_fraction", 1.0),
    "Liq. Density [kg/m³]": ("liquid_density", 1.0),
    "Liq. Viscosity [cP]": ("liquid_viscosity", 1e-3),
    "Vap. Density [kg/m³]": ("vapour_density", 1.0),
    "Vap. Viscosity [cP]": ("vapour_viscosity", 1e-3),
    "Surf. Tension [mN/m]": ("surface_tension", 1e-3),
    "Vap. Press. [bara]": ("vapour_pressure", 1e5),
    "Length [m]": ("length", 1.0),
    "Eq. Length [m]": ("equivalent_length", 1.0),
    "Elev. Change [m]": ("elevation_change", 1.0),
    "Allow. ΔP [bar]": ("pressure_drop_allowed", 1e5),
    "Velocity [m/s]": ("velocity_stated", 1.0),
    "ΔP [bar]": ("pressure_drop_stated", 1e5),
    "NPSHr [m]": ("npsh_required", 1.0),
    "NPSHr Flow [m³/h]": ("npsh_required_flow", 1 / 3600),
    "Source Press. [bara]": ("source_pressure", 1e5),
    "Static Head [m]": ("static_head", 1.0),
    "Vol. Flow Norm [m³/h]": ("volume_flow_normal", 1 / 3600),
    "Design Press. [barg]": ("design_pressure_gauge", 1e5),
    "Design Temp. [°C]": ("design_temperature", 1.0),
    "Min. Design Temp. [°C]": ("design_temperature_minimum", 1.0),
    "Test Press. [barg]": ("test_pressure_gauge", 1e5),
}

PHASES = {"L": "liquid", "V": "gas", "M": "two-phase"}

# Unit of a criteria text -> factor to SI.
UNITS = {
    "m/s": 1.0, "bar/100 m": 1e3, "Pa": 1.0, "m": 1.0, "mm": 1e-3, "bar": 1e5, "barg": 1e5,
}  # fmt: skip
