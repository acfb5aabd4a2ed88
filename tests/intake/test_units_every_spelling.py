"""Every spelling a list may use, with its SI value by definition; every doubtful one, with what is asked.

Definitions: NIST SP 811 (2008), appendix B: lb, ft, gallons, barrel of 42 US gallons, kgf, psi, conventional mm of
water and mercury; torr and atmosphere (10th CGPM); technical atmosphere 1 kgf/cm2 (DIN 1314). Which spellings are in
use is common practice.
"""

from __future__ import annotations

import csv
import math

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from checker.intake.unit_words import is_unit_text, size_basis, unit_in_cell, unit_or_refusal
from checker.unit_scripts import in_latin
from checker.unit_spelling import fold_unit
from checker.units import (
    QUESTIONS,
    TABLE,
    Unit,
    UnitRefusedError,
    dimensions_knowing,
    from_si,
    read_quantity,
    read_unit,
    to_si,
)

LB, FT, INCH, HOUR, DAY = 0.45359237, 0.3048, 0.0254, 3600.0, 86_400.0
KGF, GALLON, UK_GALLON = 9.80665, 231 * 0.0254**3, 4.54609e-3
BARREL, FT3 = 42 * GALLON, FT**3
PSI = LB * KGF / INCH**2
MMHG, MMH2O, TORR = 133.322387415, 9.80665, 101_325.0 / 760
ATMOSPHERE = 98_000.0
MOLE = 101_325.0 / (8.314462618 * 273.15)
"""mol/m3 at 0 degC and 1 atm, with the gas constant of CODATA 2018."""
STANDARD_MOLE = 101_325.0 / (8.314462618 * 288.15)
SCF = 14.696 * PSI / (8.314462618 * (519.67 / 1.8)) * FT3
"""mol in a cubic foot at 60 degF and 14.696 psia."""

CELSIUS = (
    "°C|º C|ºC|˚C|◦C|∘C|℃|⁰C|ᵒC|° C|deg C|degC|deg. C|DEG C|Deg.C|degrees C|Degree Celsius|Celsius|DegreeCelsius|"
    "oC|oc|C|C°|°С|centigrade|deg_C|[°C]|(°C)|°c|°\u200bC|\uff23|°\u00a0C"
).split("|")
FAHRENHEIT = "°F|ºF|℉|deg F|deg. F|degF|Fahrenheit|oF|F|˚F|DEG F|degrees Fahrenheit".split("|")
KELVIN = "K|°K|degK|kelvin|Kelvin|KELVIN|\u212a|deg K".split("|")
SPELLINGS: list[tuple[str, str, float]] = [
    *(("viscosity", text, 1e-3) for text in (
        "cP|cp|CP|Cp|cps|centipoise|mPa·s|mPa.s|mPa s|mPa-s|mPa*s|mPa⋅s|mPa∙s|mPa•s|mPa×s|mPas|(mPa.s)|mPa sec|mN.s/m²|"
        "mPa·S|мПа·с|сП"
    ).split("|")),
    *(("viscosity", text, 1e-6) for text in "µPa·s|μPa.s|uPa.s|cSt|cst|CST|mm²/s|mm2/s|mm^2/s|mm2 s-1|centistokes".split("|")),
    *(("viscosity", text, 1.0) for text in "Pa.s|Pa·s|Pa s|Pa-s|N.s/m2|kg/m.s|kg/m/s|kg m-1 s-1|kg·m⁻¹·s⁻¹".split("|")),
    ("viscosity", "P", 0.1), ("viscosity", "poise", 0.1), ("viscosity", "lb/ft.s", LB / FT),
    ("viscosity", "lb/ft.h", LB / FT / HOUR), ("viscosity", "lbf.s/ft2", LB * KGF / FT**2), ("viscosity", "cm²/s", 1e-4),
    *(("mass flow", text, 1 / HOUR) for text in (
        "kg/h|kg/hr|kg/hour|kg/hours|Kg/ hr|KG/HR|kg_h|kg h-1|kg·h⁻¹|kg/Hr.|kgs/hr|kg per hour|KilogramPerHour|кг/ч|"
        "kg/hrs|Kg/h|㎏/h|kilograms/hour|kgph"
    ).split("|")),
    *(("mass flow", text, 1000 / HOUR) for text in "t/h|T/h|te/h|tonnes/hr|TPH|tph|MT/h|MT/hr|t/hour|t_h|т/ч|metric tons/h".split("|")),
    *(("mass flow", text, LB / HOUR) for text in "lb/h|lb/hr|LB/HR|lbs/hr|lbm/h|#/hr|pounds/hour|PPH|lb hr^-1".split("|")),
    *(("mass flow", text, 1000 * LB / HOUR) for text in "klb/h|klb/hr|KLB/HR|kpph".split("|")),
    ("mass flow", "g/s", 1e-3), ("mass flow", "mg/s", 1e-6), ("mass flow", "kg/s", 1.0), ("mass flow", "t/d", 1000 / DAY),
    ("mass flow", "gm/sec", 1e-3), ("mass flow", "kg/min", 1 / 60),
    *(("volume flow", text, 1 / HOUR) for text in (
        "m3/h|m³/h|m^3/h|m**3/h|m 3/h|m3/hr|m³/hr|M3/H|m3_h|Am3/h|Am³/h|am3/hr|cum/hr|cu.m/h|m³ h⁻¹|CMH|m3 per hour|"
        "MetreCubedPerHour|м³/ч|㎥/h|cubic metres/hour|ACMH"
    ).split("|")),
    *(("volume flow", text, 1e-3 / 60) for text in "L/min|l/min|L minute^-1|lpm|LPM|litres/minute|ltr/min|ℓ/min|liter/min|л/мин".split("|")),
    *(("volume flow", text, GALLON / 60) for text in "gpm|GPM|USgpm|US gpm|USGPM|gal/min|USgal/min|US gal/min".split("|")),
    *(("volume flow", text, UK_GALLON / 60) for text in "igpm|IGPM|UK gpm|imp gpm|gpm (imp)|imp.gal/min".split("|")),
    *(("volume flow", text, BARREL / DAY) for text in "BPD|bpd|BPSD|bbl/d|bbl/day|BBL/D|bopd|b/d|barrels/day|B/D".split("|")),
    ("volume flow", "kbpd", 1000 * BARREL / DAY), ("volume flow", "BPH", BARREL / HOUR), ("volume flow", "l/s", 1e-3),
    ("volume flow", "kL/h", 1 / HOUR), ("volume flow", "mL/min", 1e-6 / 60), ("volume flow", "cc/min", 1e-6 / 60),
    ("volume flow", "ACFM", FT3 / 60), ("volume flow", "ft3/s", FT3), ("volume flow", "cu.ft/h", FT3 / HOUR),
    ("volume flow", "m3/s", 1.0), ("volume flow", "m³/d", 1 / DAY),
    *(("standard flow", text, MOLE / HOUR) for text in "Nm3/h|Nm³/h|Nm³/hr|NM3/HR|nm3/h|N m3/h|Nm^3/h|Ncum/h|m3(N)/h|NCMH".split("|")),
    *(("standard flow", text, STANDARD_MOLE / HOUR) for text in "Sm3/h|Sm³/h|SM3/HR|sm3/h|S m³/hr|std m3/h|SCMH".split("|")),
    ("standard flow", "kNm3/h", 1000 * MOLE / HOUR), ("standard flow", "NL/min", 1e-3 * MOLE / 60),
    ("standard flow", "kSm³/d", 1000 * STANDARD_MOLE / DAY), ("standard flow", "MMSCMD", 1e6 * STANDARD_MOLE / DAY),
    *(("standard flow", text, 1e6 * SCF / DAY) for text in "MMSCFD|mmscfd|MMscfd|MMSCF/D|MMSCF/day".split("|")),
    ("standard flow", "SCFM", SCF / 60), ("standard flow", "scfh", SCF / HOUR), ("standard flow", "kscfd", 1000 * SCF / DAY),
    *(("standard flow", text, 1000 / HOUR) for text in "kmol/h|kgmol/h|kmol/hr|kg-mol/h|kgmole/hr|kmol h-1|kmole/h".split("|")),
    *(("standard flow", text, LB * 1000 / HOUR) for text in "lbmol/h|lb-mol/hr|lbmole/h".split("|")),
    ("standard flow", "mol/s", 1.0), ("standard flow", "mol/h", 1 / HOUR),
    *(("density", text, 1000.0) for text in "gm/cc|g/cc|g/cm3|g/cm³|gm/cm3|kg/l|kg/L|kg/litre|t/m3|kg/dm3|g/ml|g cm-3".split("|")),
    *(("density", text, 1.0) for text in "kg/m3|kg/m³|KG/M3|kg/m^3|kg m-3|kg·m⁻³|kg/cu.m|g/L|кг/м³|kgm-3".split("|")),
    *(("density", text, LB / FT3) for text in "lb/ft3|lb/ft³|lbm/ft3|lbs/ft3|pcf|lb/cu.ft|LB/FT3".split("|")),
    *(("density", text, 999.016) for text in "SG|S.G.|sp.gr.|sp. gr.|relative density".split("|")),
    ("density", "lb/gal", LB / GALLON),
    *(("surface tension", text, 1e-3) for text in "mN/m|dyn/cm|dyne/cm|dynes/cm|DYNE/CM|mN·m⁻¹|mJ/m2".split("|")),
    ("surface tension", "N/m", 1.0),
    *(("conductivity", text, 1e-12) for text in "pS/m|CU|cu|pS m-1".split("|")),
    ("conductivity", "S/m", 1.0), ("conductivity", "nS/m", 1e-9), ("conductivity", "µS/cm", 1e-4),
    *(("diameter", text, INCH) for text in 'in|"|″|”|inch|IN|inches|in.|ins'.split("|")),
    *(("diameter", text, 1e-3) for text in "mm|MM|millimetres|㎜|мм".split("|")),
    *(("diameter", text, 1e-6) for text in "µm|μm|um|micron".split("|")),
    ("diameter", "mil", INCH / 1000), ("diameter", "ft", FT), ("length", "m", 1.0), ("length", "'", FT), ("length", "km", 1000.0),
    *(("molar mass", text, 1e-3) for text in "g/mol|kg/kmol|kg/kgmol|lb/lbmol|lb/lb-mol|g/gmol|kg kmol⁻¹".split("|")),
    *(("fraction", text, 0.01) for text in "%|wt%|wt.%|% wt|% w/w|mass %|weight %|% (w/w)".split("|")),
    *(("fraction", text, 1.0) for text in "-|mass frac|mass fraction|wt frac|kg/kg|w/w|wt/wt|mass basis".split("|")),
    ("fraction", "ppmw", 1e-6), ("stress", "GPa", 1e9), ("stress", "N/mm²", 1e6), ("pressure difference", "GPa", 1e9),
    ("pressure difference", "kg/cm2", 98_066.5), ("pressure difference", "bar(d)", 1e5), ("pressure difference", "N/m²", 1.0),
    ("pressure gradient", "bar/100 m", 1e3), ("pressure gradient", "bar / 100m", 1e3), ("pressure gradient", "bar/100m", 1e3),
    ("pressure gradient", "bar per 100 m", 1e3), ("pressure gradient", "kPa per 100 m", 10.0), ("pressure gradient", "kPa/km", 1.0),
    ("pressure gradient", "psi/100ft", PSI / (100 * FT)), ("pressure gradient", "psi/100 feet", PSI / (100 * FT)),
    ("pressure gradient", "psi per 100 ft", PSI / (100 * FT)), ("pressure gradient", "Pa/m", 1.0), ("pressure gradient", "mbar/m", 100.0),
    ("pressure gradient", "kg/cm2/100m", 980.665), ("pressure gradient", "mmH2O/m", MMH2O), ("pressure gradient", "bar/km", 100.0),
    ("pressure gradient", "Pa·m⁻¹", 1.0), ("pressure gradient", "bar/100 metres", 1e3), ("pressure gradient", "MPa/km", 1000.0),
]  # fmt: skip
PRESSURES = [
    *((text, 1e5, "g") for text in "barg|bar g|bar(g)|bar (g)|BARG|bar-g|bar_g|bar gauge|bar, g|bar ü|barü|Barg|bar.g".split("|")),
    *((text, 1e5, "a") for text in "bara|bar a|bar(a)|BARA|bar abs|bar (abs)|bar absolute|bar_a|bar abs.".split("|")),
    *((text, PSI, "g") for text in "psig|PSIG|psi(g)|psi g|lb/in2g|lbf/in² (g)|lb/sq.in g|# g|psi gauge|#(g)".split("|")),
    *((text, PSI, "a") for text in "psia|PSIA|psi(a)|psi abs|psi absolute".split("|")),
    *((text, 98_066.5, "g") for text in "kg/cm2g|Kg/cm2g|kg/cm²(g)|kg/cm² g|kgf/cm2g|KG/CM2G|ksc g|ksc(g)|kg/sq.cm g|kg/cm2 (g)|atü|atg|"
        "кгс/см2 изб|kg/cm²-g|㎏/㎠G|kg/cm^2g".split("|")),
    *((text, 98_066.5, "a") for text in "Kg/cm 2 A|kg/cm2a|kg/cm²(a)|kgf/cm2 abs|ata|ATA|ksca|kg/cm2 absolute".split("|")),
    *((text, 1e6, "g") for text in "MPag|MPa(G)|MPa g|MPaG|MPa gauge|МПа изб".split("|")),
    *((text, 1e3, "g") for text in "kPag|kPa(g)|KPAG|kPa g|kN/m2 g".split("|")),
    ("kPaa", 1e3, "a"), ("Pa(a)", 1.0, "a"), ("N/m2 (a)", 1.0, "a"), ("mbara", 100.0, "a"), ("mbar(g)", 100.0, "g"), ("hPa a", 100.0, "a"),
    ("mmWG", MMH2O, "g"), ("mm WG", MMH2O, "g"), ("mmH2O g", MMH2O, "g"), ("mmH₂O(a)", MMH2O, "a"), ("mWC g", 1000 * MMH2O, "g"),
    ("inWG", 25.4 * MMH2O, "g"), ("inH2O(g)", 25.4 * MMH2O, "g"), ("inWC (g)", 25.4 * MMH2O, "g"), ("ftH2O g", 304.8 * MMH2O, "g"),
    ("mmHg(a)", MMHG, "a"), ("mmHg abs", MMHG, "a"), ("Torr(a)", TORR, "a"), ("TORR abs", TORR, "a"), ("inHg a", 25.4 * MMHG, "a"),
    ("atm a", 101_325.0, "a"), ("atm(g)", 101_325.0, "g"),
]  # fmt: skip
BARE = [
    ("bar", "barg or bara"), ("psi", "psig or psia"), ("kg/cm2", "kg/cm2g or kg/cm2a"), ("MPa", "MPag or MPaa"), ("ksc", "kscg or ksca"),
    ("#", "psig or psia"), ("kPa", "kPag or kPaa"), ("Pa", "Pag or Paa"), ("N/m2", "N/m2g or N/m2a"), ("mmHg", "mmHg(g) or mmHg(a)"),
    ("mmH2O", "mmH2O(g) or mmH2O(a)"), ("inWC", "inWC(g) or inWC(a)"), ("Torr", "Torrg or Torra"), ("mbar", "mbarg or mbara"),
    ("atm", "atmg or atma"), ("kg/cm²", "kg/cm2g"), ("kgf/cm2", "kgf/cm2g"), ("бар", "barg or bara"), ("mH2O", "mH2O(g)"),
]  # fmt: skip
ASKED = [
    ("temperature", "0C", "zero"), ("temperature", "0 C", "zero"), ("temperature", "0F", "zero"), ("temperature", "deg", "which scale"),
    ("temperature", "°", "which scale"), ("pressure", "mPag", "megapascals"), ("pressure", "kg", "no pressure"),
    ("viscosity", "mPa/s", "write mPa.s"), ("viscosity", "MPa.s", "write mPa.s"), ("viscosity", "MPA·S", "write mPa.s"),
    ("viscosity", "SSU", "curve"), ("viscosity", "ssu", "curve"), ("viscosity", "cS", "cSt"), ("viscosity", "°E", "curve"),
    ("mass flow", "MLB/H", "thousand"), ("mass flow", "MLB/HR", "thousand"), ("mass flow", "M lb/h", "thousand"), ("mass flow", "Mlb/hr", "thousand"),
    ("mass flow", "MLBS/HR", "thousand"), ("mass flow", "mlb/hr", "thousand"), ("mass flow", "ton/h", "907.2"), ("mass flow", "tons/day", "907.2"),
    ("mass flow", "mt/h", "tonnes"), ("volume flow", "MBPD", "thousand"), ("volume flow", "cfm", "acfm or scfm"), ("volume flow", "stb/d", "60 degF"),
    ("standard flow", "MSCFD", "thousand"), ("standard flow", "Mscfd", "thousand"), ("standard flow", "mscfd", "thousand"),
    ("standard flow", "MSCF/D", "thousand"), ("standard flow", "MSCF/day", "thousand"), ("standard flow", "MSCF", "thousand"),
    ("standard flow", "MMCFD", "actual or standard"), ("standard flow", "MSm3/d", "thousand"),
    ("density", "kg/Nm3", "not at flowing"), ("density", "mol/cc", "molar density"),
    *(("fraction", text, "mole fraction is not a mass fraction") for text in (
        "mol%", "mole %", "% mol", "mole frac", "mol frac", "mole fraction", "mol/mol", "kmol/kmol", "mol", "mol.%", "MOL%", "Mole Fraction",
    )),
    ("fraction", "vol%", "volume fraction"), ("fraction", "ppm", "by mass or by mole"),
]  # fmt: skip
REFUSED = [
    ("temperature", "Â°C"), ("temperature", "\u202eC°"), ("temperature", "€C"), ("temperature", "barg"), ("pressure", "°C"), ("pressure", "Нm"),
    ("standard flow", "Нм3/ч"), ("viscosity", "мПа·сек"), ("mass flow", "kg/г"), ("pressure", "ба\u0433"), ("mass flow", "kg/h; DROP"),
    ("temperature", "x" * 5000), ("mass flow", "kg/h/h"), ("mass flow", "m3/h"), ("volume flow", "kg/h"), ("density", "1/0"), ("density", "m**m"),
    ("density", "__import__"), ("standard flow", "m3/h"), ("volume flow", "Nm3/h"), ("pressure gradient", "bar"), ("pressure", "bar/100m"),
]  # fmt: skip


@pytest.mark.parametrize("text", CELSIUS)
def test_celsius(text: str) -> None:
    assert float(to_si(25.0, read_unit(text, "temperature"))) == 298.15
    assert isinstance(unit_in_cell(text, "temperature"), Unit)
    assert is_unit_text(text)


@pytest.mark.parametrize("text", FAHRENHEIT)
def test_fahrenheit(text: str) -> None:
    assert float(to_si(212.0, read_unit(text, "temperature"))) == pytest.approx(373.15, rel=1e-15)


@pytest.mark.parametrize("text", KELVIN)
def test_kelvin(text: str) -> None:
    assert float(to_si(25.0, read_unit(text, "temperature"))) == 25.0


@pytest.mark.parametrize(("dimension", "text", "scale"), SPELLINGS)
def test_spelling(dimension: str, text: str, scale: float) -> None:
    unit = unit_in_cell(text, dimension)
    assert isinstance(unit, Unit), unit
    assert unit.scale == pytest.approx(scale, rel=1e-12)
    assert (unit.offset, unit.dimension) == (0.0, dimension)
    assert dimension in dimensions_knowing(text)
    assert is_unit_text(text)


@pytest.mark.parametrize(("text", "scale", "reference"), PRESSURES)
def test_pressure(text: str, scale: float, reference: str) -> None:
    unit = unit_in_cell(text, "pressure")
    assert isinstance(unit, Unit), unit
    expected = 2.5 * scale + (ATMOSPHERE if reference == "g" else 0.0)
    assert float(to_si(2.5, unit, atmosphere=ATMOSPHERE)) == pytest.approx(expected, rel=1e-12)


@pytest.mark.parametrize(("text", "words"), BARE)
def test_bare_pressure_is_asked(text: str, words: str) -> None:
    for refusal in (unit_or_refusal(text, "pressure"), unit_in_cell(text, "pressure")):
        assert isinstance(refusal, str)
        assert f"does not say gauge or absolute: write {words}" in refusal
    for written in words.split(" or "):
        assert isinstance(read_unit(written, "pressure"), Unit)


@pytest.mark.parametrize(("dimension", "text", "words"), ASKED)
def test_doubtful_spelling_is_asked(dimension: str, text: str, words: str) -> None:
    for refusal in (unit_or_refusal(text, dimension), unit_in_cell(text, dimension)):
        assert isinstance(refusal, str)
        assert words in refusal
    assert is_unit_text(text)


@pytest.mark.parametrize(("dimension", "text"), REFUSED)
def test_other_text_is_refused_whole(dimension: str, text: str) -> None:
    with pytest.raises(UnitRefusedError, match="not a unit of") as caught:
        read_unit(text, dimension)
    assert len(str(caught.value)) < 300
    assert str(caught.value).isprintable()
    assert isinstance(unit_in_cell(text, dimension), str)


def test_a_flow_of_unknown_kind_is_asked_the_same() -> None:
    """A header such as ``Flow (MSCFD)`` fits three fields, and its refusal is that of the first of them."""
    refusal = unit_or_refusal("MSCFD", "mass flow")
    assert isinstance(refusal, str)
    assert "not a unit of mass flow" in refusal
    assert refusal.endswith("write MMSCFD or scf/d.")
    assert "It is a unit of temperature." in str(unit_or_refusal("degC", "pressure"))


def test_letters_of_another_script_are_named() -> None:
    with pytest.raises(UnitRefusedError, match=r"U\+0433 cyrillic small letter ghe"):
        read_unit("kg/\u0433", "mass flow")
    assert in_latin("deg\u0421") == "degC"
    assert in_latin("\u041dм3/\u0447") == "\u041dм3/\u0447"


def test_degrees_api_by_definition() -> None:
    """API MPMS chapter 11.1: SG 60/60 = 141.5 / (API + 131.5), so 10 degAPI is water; 999.016 kg/m3 at 60 degF."""
    unit = read_unit("°API", "density")
    assert float(to_si(10.0, unit)) == pytest.approx(999.016, rel=1e-15)
    assert float(to_si(35.0, unit)) == pytest.approx(999.016 * 141.5 / 166.5, rel=1e-15)
    assert read_quantity("35 degAPI", "density") == pytest.approx(849.01, abs=0.02)
    numbers = np.array([-10.0, 0.0, 10.0, 60.0])
    assert from_si(to_si(numbers, unit), unit) == pytest.approx(numbers, abs=1e-12)
    with pytest.raises(UnitRefusedError, match="finite"):
        read_quantity("-131.5 API", "density")


def test_reference_states_of_standard_volumes() -> None:
    """0 degC, 15 degC and 60 degF, each named by its unit (ISO 13443; common practice for scf)."""
    assert read_unit("Nm3/h", "standard flow").reference == "0 degC, 1.01325 bar"
    assert read_unit("Sm3/h", "standard flow").reference == "15 degC, 1.01325 bar"
    assert read_unit("MMSCFD", "standard flow").reference == "60 degF, 14.696 psia"
    assert read_unit("scfm", "standard flow").scale * 60 * 379.48 == pytest.approx(LB * 1000, rel=2e-5)


@pytest.mark.parametrize(
    ("text", "basis"),
    [
        ("NPS", "NPS"), ("inch", "NPS"), ('"', "NPS"), ("in.", "NPS"), ("mm", "DN"), ("DN", "DN"), ("NB mm", "DN"), ("NB", "DN"),
        ("inches x 100", "NPS x 100"), ("NPS x 100", "NPS x 100"), ("inch×100", "NPS x 100"), ("cm", ""), ("", ""),
    ],
)  # fmt: skip
def test_size_basis(text: str, basis: str) -> None:
    assert size_basis(text) == basis


def test_questions_shadow_no_unit() -> None:
    with QUESTIONS.open(encoding="utf-8", newline="") as handle:
        questions = [(row["dimension"], row["spelling"], row["sentence"]) for row in csv.DictReader(handle)]
    with TABLE.open(encoding="utf-8", newline="") as handle:
        units = {(row["dimension"], row["spelling"]) for row in csv.DictReader(handle)}
    assert len({question[:2] for question in questions}) == len(questions)
    for dimension, spelling, sentence in questions:
        assert (dimension, spelling) not in units
        assert fold_unit(spelling) == spelling
        assert sentence.endswith((".", "?"))
        with pytest.raises(UnitRefusedError):
            read_unit(spelling, dimension)


DIMENSIONS = sorted({row for row, *_ in SPELLINGS} | {"pressure", "temperature"})
PIECES = st.lists(
    st.sampled_from([
        "k", "m", "M", "µ", "Pa", "bar", "psi", "g", "a", "(", ")", "/", "h", "3", "²", "·", " ", "°", "C", "С", "г", "N", "S", "lb", "scf", "D",
        "-1", "^", "%", "mol", "kg", "_", "per", "⁻¹", "0", "API", "#", "\u200b", "\u202e", "*", "x", "cm", "2",
    ]),
    max_size=8,
).map("".join)  # fmt: skip


@settings(max_examples=400, deadline=None)
@given(st.text(max_size=60) | PIECES, st.sampled_from(DIMENSIONS))
def test_any_text_is_a_unit_or_a_refusal(text: str, dimension: str) -> None:
    refusal = unit_or_refusal(text, dimension)
    in_cell = unit_in_cell(text, dimension)
    assert isinstance(refusal, Unit | str)
    if isinstance(in_cell, Unit):
        assert in_cell == refusal
    if isinstance(refusal, Unit):
        assert math.isfinite(refusal.scale)
        assert refusal.scale > 0.0
        assert dimension != "pressure" or refusal.reference in ("gauge", "absolute")
    elif refusal:
        assert refusal.isprintable()
    assert isinstance(dimensions_knowing(text), tuple)
    assert isinstance(is_unit_text(text), bool)


@settings(max_examples=200, deadline=None)
@given(st.sampled_from(SPELLINGS), st.floats(1e-6, 1e6))
def test_numbers_come_back_from_every_spelling(spelling: tuple[str, str, float], number: float) -> None:
    dimension, text, scale = spelling
    unit = read_unit(text, dimension)
    assert float(to_si(number, unit)) == pytest.approx(number * scale, rel=1e-12)
    assert float(from_si(to_si(number, unit), unit)) == pytest.approx(number, rel=1e-12)
