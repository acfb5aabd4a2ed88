"""Every row of the unit table against pint, and the traps that pint alone does not show."""

from __future__ import annotations

import csv
import math
import re

import pint
import pytest

from checker.units import API, TABLE, from_si, read_quantity, read_unit, to_si

GAS_CONSTANT = 8.314462618
"""J/(mol K), CODATA 2018."""
BASES = {
    "0 degC, 1.01325 bar": (273.15, 101_325.0),
    "15 degC, 1.01325 bar": (288.15, 101_325.0),
    "60 degF, 14.696 psia": ((60.0 + 459.67) * 5.0 / 9.0, 14.696 * 6894.757293168361),
}
REGISTRY: pint.UnitRegistry[float] = pint.UnitRegistry()

with TABLE.open(encoding="utf-8", newline="") as handle:
    ROWS = list(csv.DictReader(handle))


def _scale_and_offset(expression: str) -> tuple[float, float]:
    if expression == "degree_Rankine":
        return REGISTRY.Quantity(1.0, expression).to("kelvin").magnitude, 0.0
    if expression.startswith("degree"):
        zero = REGISTRY.Quantity(0.0, expression).to("kelvin").magnitude
        return REGISTRY.Quantity(1.0, f"delta_{expression}").to("kelvin").magnitude, zero
    quantity = REGISTRY.parse_expression(expression)
    if not hasattr(quantity, "units"):
        return float(quantity), 0.0
    return REGISTRY.Quantity(float(quantity.magnitude), quantity.units).to_base_units().magnitude, 0.0


@pytest.mark.parametrize("row", ROWS, ids=lambda row: f"{row['dimension']}-{row['spelling']}")
def test_row_agrees_with_pint(row: dict[str, str]) -> None:
    expression, _, base = row["pint_expression"].partition(" at ")
    scale, offset = _scale_and_offset(expression)
    if base:
        kelvin, pascal = BASES[base]
        scale *= pascal / (GAS_CONSTANT * kelvin)
        assert row["reference"] == base
    assert math.isclose(float(row["scale_to_SI"]), scale, rel_tol=1e-15)
    offset = 131.5 if row["reference"] == API else offset
    assert math.isclose(float(row["offset_to_SI"]), offset, rel_tol=1e-15)


def test_spellings_are_unique_and_folded() -> None:
    from checker.unit_spelling import fold_unit

    keys = [(row["dimension"], row["spelling"]) for row in ROWS]
    assert len(keys) == len(set(keys))
    assert [spelling for _, spelling in keys if fold_unit(spelling) != spelling] == []


@pytest.mark.parametrize("row", [row for row in ROWS if row["reference"] not in ("?", "kinematic")][::7])
def test_numbers_come_back(row: dict[str, str]) -> None:
    if not row["spelling"] or (row["dimension"] == "pressure" and not row["reference"]):
        return
    unit = read_unit(row["spelling"], row["dimension"])
    for number in (0.0, 1.0, 37.5, 1e4):
        back = float(from_si(to_si(number, unit, atmosphere=98_000.0), unit, atmosphere=98_000.0))
        lost = 1e-12 * unit.offset if unit.reference == API else 0.0
        assert back == pytest.approx(number, rel=1e-12, abs=lost + 2e-15 * (abs(unit.offset) + 98_000.0) / unit.scale)


@pytest.mark.parametrize("unit", ["barg", "psig", "kg/cm2g", "kPag", "MPag", "mbarg"])
def test_zero_gauge_is_the_sites_atmosphere(unit: str) -> None:
    assert float(to_si(0.0, read_unit(unit, "pressure"), atmosphere=83_000.0)) == 83_000.0


def test_a_gauge_reading_adds_the_atmosphere_and_never_multiplies() -> None:
    """1 kgf/cm2 is 98 066.5 Pa and 1 bar 100 000 Pa (NIST SP 811, appendix B)."""
    step = to_si(11.0, read_unit("kg/cm2g", "pressure")) - to_si(10.0, read_unit("kg/cm2g", "pressure"))
    assert float(step) == pytest.approx(98_066.5, rel=1e-12)
    assert read_quantity("1 barg", "pressure", atmosphere=101_325.0) == 201_325.0


def test_a_temperature_is_no_temperature_difference() -> None:
    """Fixed points of ITS-90 scale definitions: 0 degC = 32 degF = 273.15 K, -40 degC = -40 degF."""
    assert read_quantity("32 degF", "temperature") == pytest.approx(273.15, rel=1e-15)
    assert read_quantity("-40 degF", "temperature") == pytest.approx(
        read_quantity("-40 degC", "temperature"), rel=1e-15
    )
    assert read_quantity("671.67 degR", "temperature") == pytest.approx(373.15, rel=1e-15)


@pytest.mark.parametrize(
    ("text", "pascal_per_metre"),
    [
        ("0.45 bar/100m", 450.0),
        ("0.45 bar / 100 m", 450.0),
        ("45 kPa/100m", 450.0),
        ("1 psi/100ft", 6894.757293168361 / 30.48),
    ],
)
def test_per_100_is_a_hundredth(text: str, pascal_per_metre: float) -> None:
    assert read_quantity(text, "pressure gradient") == pytest.approx(pascal_per_metre, rel=1e-14)


def test_milli_and_mega_stay_apart() -> None:
    assert read_unit("mPa.s", "viscosity").scale == pytest.approx(1e-3, rel=1e-15)
    with pytest.raises(ValueError, match="megapascal seconds"):
        read_unit("MPa.s", "viscosity")


@pytest.mark.parametrize(("spelling", "ideal_m3"), [("Nm3/h", 22.41396954), ("Sm3/h", 22.41396954 * 288.15 / 273.15)])
def test_standard_volumes_against_published_molar_volumes(spelling: str, ideal_m3: float) -> None:
    """CODATA 2018: 22.413 969 54 m3/kmol at 273.15 K, 101.325 kPa; at 288.15 K the same times 288.15/273.15."""
    scale = read_unit(spelling, "standard flow").scale
    assert scale * 3600.0 * ideal_m3 / 1000.0 == pytest.approx(1.0, rel=1e-7)


def test_every_unit_shown_by_a_field_reads() -> None:
    from checker.fields import all_fields

    for field in all_fields():
        if field.kind == "number":
            read_unit(field.unit, field.dimension)


def test_spellings_hold_no_second_meaning_for_case() -> None:
    letters = re.compile(r"^[mM][A-Za-z]")
    for row in ROWS:
        if letters.match(row["spelling"]) and row["reference"] != "?":
            assert read_unit(row["spelling"], row["dimension"]).scale == float(row["scale_to_SI"])
