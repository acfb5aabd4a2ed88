"""A field of a line list in words: its heading in a list, the units understood, an example, what words mean in it."""

from __future__ import annotations

import csv
from collections.abc import Mapping, Sequence
from functools import cache

from checker.fields import Field
from checker.units import TABLE

__all__ = [
    "all_units",
    "example_header",
    "example_of",
    "header_of",
    "shown_unit_of",
    "spellings_text",
    "units_text",
    "words_in",
]

GAUGE = ("pressure", "pressure_design", "pressure_test", "set_pressure")
MOST_UNITS = 12
_EXAMPLES = {
    "line_number": '6"-CWS-1203-B1A', "service": "cooling water", "fluid": "cooling water", "phase": "liquid",
    "stream": "1204", "piping_class": "B1A", "size": "6", "schedule": "40", "material": "carbon steel",
    "from": "P-1203A/B", "to": "E-1204", "drawing": "MQ-PID-1203", "area": "12", "revision": "B",
    "case": "normal", "pressure_basis": "inlet", "fittings": "4 x elbow 90 LR; 1 x gate valve",
    "design_code": "ASME B31.3", "test_medium": "water", "flange_rating": "150", "insulation": "hot, 50 mm",
    "tracing": "electric", "fluid_group": "2", "remarks": "sloped to drain",
    "flow_mass": "125000", "flow_volume": "125", "flow_standard": "8500", "vapour_fraction": "0.12",
    "vapour_fraction_outlet": "0.18", "density": "997", "liquid_density": "720", "vapour_density": "12.4",
    "viscosity": "0.89", "liquid_viscosity": "0.35", "vapour_viscosity": "0.011", "molar_mass": "18.02",
    "compressibility": "0.97", "heat_capacity_ratio": "1.31", "surface_tension": "22", "pressure": "4.5",
    "pressure_design": "10", "pressure_test": "15", "vapour_pressure": "0.032", "source_pressure": "1.05",
    "temperature": "30", "temperature_design": "60", "temperature_design_minimum": "-5", "sand_rate": "0",
    "outside_diameter": "168.3", "wall_thickness": "7.11", "inside_diameter": "154.1", "roughness": "0.05",
    "length": "84", "equivalent_length": "32", "elevation_change": "-3.5", "corrosion_allowance": "1.5",
    "velocity_stated": "1.9", "velocity_allowed": "3", "npsh_required": "2.8", "npsh_required_flow": "125",
    "static_head": "4.2", "closure_time": "10", "allowable_stress": "138",
}  # fmt: skip
_CHOICES = {
    "phase": "Liquid (L), gas or vapour (G, V), two-phase (2PH, mixed).",
    "pressure_basis": "Inlet or outlet: the end of the line at which its pressure is stated.",
    "case": "Minimum, normal, maximum, relief, start-up ...; a name of your own is a case too.",
    "size": 'NPS as 6, 6", 1-1/2 or 1.5, or DN 150; bare numbers need NPS or DN in the header or the criteria.',
    "fittings": "Counts and kinds (4 x elbow 90 LR; 1 x gate valve), or none.",
    "remarks": "Free text; a remark that says no more than DELETED takes the line out of the checks.",
}
_FLOWS = ("flow_mass", "flow_volume", "flow_standard")


@cache
def _spellings() -> Mapping[str, tuple[tuple[str, ...], ...]]:
    """Return by dimension the spellings of each unit, those that are one and the same together."""
    found: dict[str, dict[tuple[str, str, str], list[str]]] = {}
    with TABLE.open(encoding="utf-8", newline="") as handle:
        for row in csv.DictReader(handle):
            if row["reference"] != "?" and row["spelling"]:
                meaning = (row["scale_to_SI"], row["offset_to_SI"], row["reference"])
                found.setdefault(row["dimension"], {}).setdefault(meaning, []).append(row["spelling"])
    return {dimension: tuple(map(_once, units.values())) for dimension, units in found.items()}


def _once(spellings: Sequence[str]) -> tuple[str, ...]:
    """Return spellings without those that differ from an earlier one by the case of letters only."""
    seen: dict[str, str] = {}
    for spelling in spellings:
        seen.setdefault(spelling.casefold(), spelling)
    return tuple(seen.values())


def all_units(dimension: str) -> Sequence[Sequence[str]]:
    """Return the units of a dimension that are read, each with all its spellings; the commonest first."""
    return _spellings().get(dimension, ())


def units_text(field: Field) -> str:
    """Return the commonest units that are read for a field, and how many there are besides."""
    if field.kind == "size":
        return "NPS (inches), DN"
    if field.kind != "number":
        return "none: a text"
    names = [spellings[0] for spellings in all_units(field.dimension)]
    own = [name for name in names if name == field.unit]
    ordered = own + [name for name in names if name not in own]
    ordered = ["plain number" if name == "-" else name for name in ordered]
    more = len(ordered) - MOST_UNITS
    text = ", ".join(ordered[:MOST_UNITS])
    return f"{text} and {more} more" if more > 0 else text


def shown_unit_of(field: Field) -> str:
    """Return the unit in which the blank list asks for a field; empty where it needs none."""
    if field.name in GAUGE:
        return "barg"
    return "" if field.unit == "-" else field.unit


def header_of(field: Field) -> str:
    """Return the heading of a field in a blank list: its name, and its unit in brackets."""
    unit = shown_unit_of(field)
    return f"{field.name} [{unit}]" if unit else field.name


def example_header(field: Field) -> str:
    """Return a heading as a contractor might write it, with case and unit where the field has them."""
    name = (field.spellings or (field.name,))[0]
    name = name.upper() if len(name) < 4 else name
    case = " max" if field.per_case and field.name != "case" and field.kind == "number" else ""
    unit = shown_unit_of(field)
    return f"{name[:1].upper()}{name[1:]}{case}" + (f" [{unit}]" if unit else "")


def example_of(field: Field) -> str:
    """Return an example of a cell, in the unit in which the blank list asks for it."""
    return _EXAMPLES.get(field.name, "1" if field.kind == "number" else "text")


def spellings_text(field: Field) -> str:
    """Return the header spellings understood besides the field's own name."""
    return ", ".join(field.spellings) or "its own name only"


def words_in(field: Field) -> str:
    """Return what words stand for in the cells of a field, a sentence or more."""
    said = [_CHOICES.get(field.name, "")]
    if field.name in _FLOWS:
        said.append("NNF: no flow in this case.")
    if field.dimension == "pressure":
        said.append("ATM: the site's atmosphere, 0 barg.")
    if field.name == "pressure_design":
        said.append("3.5/FV: 3.5 is the design pressure, full vacuum the lowest one.")
    if field.name == "temperature_design":
        said.append("-29/60: the higher is the design temperature, the lower the lowest one.")
    if field.dimension == "temperature":
        said.append("AMB: the ambient range of the site, where the criteria state it.")
    if field.kind == "number":
        asked = field.name in ("pressure_design", "temperature_design")
        said.append("45 to 60: asked, which is it?" if asked else "45 to 60: both ends are judged.")
        said.append("<5, max 50, ~50: listed, not used.")
    return " ".join(text for text in said if text)
