"""Header spellings in ten languages: the field, case and unit of each.

Sources: English headers are common practice of printed line lists; those marked *seen* were met in published tables;
the other languages are from memory.
"""

from __future__ import annotations

import pytest

from checker.fields import all_fields
from checker.intake.headers import read_header
from checker.intake.texts import key_of

# header | field | case | unit
ENGLISH = r"""
Line No. | line_number | |
LINE NUMBER | line_number | |
Line ID | line_number | |
Line identifier | line_number | |
Line designation | line_number | |
Line Tag | line_number | |
Pipe No. | line_number | |
Piping No. | line_number | |
L/N | line_number | |
LINE # | line_number | |
ItemTag | line_number | |
Line_No | line_number | |
Line No.* | line_number | |
Line No (Note 4) | line_number | |
Seq. No. | sequence | |
Serial | sequence | |
Item | sequence | |
Area | area | |
Unit No. | area | |
System | area | |
Service | service | |
FluidCode | service | |
ProductCode | service | |
Commodity | service | |
Medium | fluid | |
Phase  | phase | |
L/V/M | phase | |
V/L | phase | |
NPS | size | | NPS
DN | size | | DN
NB | size | | DN
ND | size | | DN
Nom. Dia. | size | |
Ø | size | |
Dia | size | |
Size (NPS) | size | | NPS
Pipe Size [inch] | size | | inch
NominalDiameterNumericalValueRepresentation | size | |
NominalDiameterRepresentation | size | |
O.D. (mm) | outside_diameter | | mm
Dext [mm] | outside_diameter | | mm
Outside diameter of pipe | outside_diameter | |
Inner Diameter [m] | inside_diameter | | m
Bore (DN) | size | | DN
Sch. | schedule | |
Wall [mm] | wall_thickness | | mm
Wall Thk. (mm) | wall_thickness | | mm
PipingClassCode | piping_class | |
Line Class | piping_class | |
Pipe Spec | piping_class | |
PMS | piping_class | |
MOC | material | |
Mat'l | material | |
SourceItem | from | |
TargetItem | to | |
Beginning Node | from | |
Ending Node | to | |
Start point | from | |
End point | to | |
Origin | from | |
Destination | to | |
P&ID No. | drawing | |
P & ID | drawing | |
Iso No. | drawing | |
Oper. P (barg) | pressure | | barg
O.P. (psig) | pressure | | psig
P op [bara] | pressure | | bara
Press. | pressure | |
Operating Pressure, kg/cm2g | pressure | | kg/cm2g
Pressure, Kg/cm 2 A | pressure | | Kg/cm 2 A
Pressure (gauge) [bar] | pressure | | bar(g)
OperatingPressure | pressure | |
Press. max oper. (barg) | pressure | maximum | barg
MOP (barg) | pressure | maximum | barg
Upset pressure (barg) | pressure | upset | barg
Press\nure\n(barg) | pressure | | barg
P\nr\ne\ns\ns | pressure | |
T op (°C) | temperature | | °C
Norm. temp. [°C] | temperature | | °C
Temperature (◦C) | temperature | | ◦C
T [K] | temperature | | K
Max. Oper. Temp. (°C) | temperature | maximum | °C
Des. P (barg) | pressure_design | | barg
P.D. [barg] | pressure_design | | barg
DP (barg) | pressure_design | | barg
D.P. (psig) | pressure_design | | psig
Design P (psig) | pressure_design | | psig
Design Pressure\n(Note 4)\nbarg | pressure_design | | barg
PS [barg] | pressure_design | | barg
TS [°C] | temperature_design | | °C
DT (°C) | temperature_design | | °C
Mech. Design Temp (C) | temperature_design | | C
MDMT [°C] | temperature_design_minimum | | °C
LDT (°C) | temperature_design_minimum | | °C
Lower Design Temp. °C | temperature_design_minimum | | °C
Min. Design Press. (barg) | pressure_design_minimum | | barg
FV | pressure_design_minimum | |
Test Pressure (psig) | pressure_test | | psig
Hydrotest [barg] | pressure_test | | barg
TP (barg) | pressure_test | | barg
Test Medium | test_medium | |
Mass flow rate (mg/s) | flow_mass | | mg/s
Massflowrate | flow_mass | |
m_dot [g/s] | flow_mass | | g/s
Norm Flow (kg/h) | flow_mass | normal | kg/h
Flow, m³/h | flow_volume | | m³/h
Flow MMSCFD | flow_standard | | MMSCFD
Design flow [kg/h] | flow_mass | design | kg/h
Turndown flow [kg/h] | flow_mass | minimum | kg/h
Shut-in pressure [barg] | pressure | shut-in | barg
Sp. Gr. | density | | SG
Fluid density [kg/m3] | density | | kg/m3
Visc. (cP) | viscosity | | cP
Mol Wt | molar_mass | |
Vap. Press. (bara) | vapour_pressure | | bara
TVP [bara] | vapour_pressure | | bara
Comp. factor | compressibility | |
Cp/Cv | heat_capacity_ratio | |
Vapour mass fraction | vapour_fraction | |
Fluid bulk modulus [GPa] | bulk_modulus | | GPa
Conductivity [pS/m] | conductivity | | pS/m
Sand particle diameter [mm] | particle_diameter | | mm
Vel. (m/s) | velocity_stated | | m/s
ΔP [bar] | pressure_drop_stated | | bar
dP [bar] | pressure_drop_stated | | bar
dP/100 m [bar] | pressure_gradient_stated | | bar/100m
DP (bar/100m) | pressure_gradient_stated | | bar/100m
Total pressure loss [Pa/m] | pressure_gradient_stated | | Pa/m
Allow. ΔP [bar] | pressure_drop_allowed | | bar
Run (m) | length | | m
Eq. length [m] | equivalent_length | | m
ΔZ [m] | elevation_change | | m
InsulationType | insulation | |
InsulationThickness | insulation_thickness | |
Ins. thk. (mm) | insulation_thickness | | mm
HeatTracingType | tracing | |
HT | tracing | |
Paint | painting | |
NDE | examination | |
RT % | examination | |
X-ray | examination | |
PWHT | heat_treatment | |
Stress Crit. | stress_category | |
Corr. Allow. (in) | corrosion_allowance | | in
CA [mm] | corrosion_allowance | | mm
Flange Rating | flange_rating | |
PED cat. | fluid_group | |
Rev. | revision | |
Hold | hold | |
Status | status | |
Comments | remarks | |
TEMP0C | temperature | | 0C
"""

OTHER_LANGUAGES = """
N° ligne | line_number | |
Repère | line_number | |
Diamètre nominal | size | |
Pression de service (barg) | pressure | | barg
Pression de calcul [barg] | pressure_design | | barg
Température (°C) | temperature | | °C
Temperature de calcul mini (°C) | temperature_design_minimum | | °C
Débit (kg/h) | flow_mass | | kg/h
Débit maxi [m3/h] | flow_volume | maximum | m3/h
Debit massique [kg/h] | flow_mass | | kg/h
Masse volumique (kg/m3) | density | | kg/m3
Viscosité (cP) | viscosity | | cP
Calorifuge | insulation | |
Traçage | tracing | |
de | from | |
à | to | |
Perte de charge [bar] | pressure_drop_stated | | bar
Surépaisseur de corrosion [mm] | corrosion_allowance | | mm
Leitungs-Nr. | line_number | |
Nennweite | size | |
Betriebsdruck [barg] | pressure | | barg
Auslegungsdruck (PS) [barg] | pressure_design | | barg
Auslegungstemperatur [°C] | temperature_design | | °C
Temperatur [°C] | temperature | | °C
Durchfluss [kg/h] | flow_mass | | kg/h
Durchfluss Auslegung [kg/h] | flow_mass | design | kg/h
Dichte [kg/m³] | density | | kg/m³
Zähigkeit [mPas] | viscosity | | mPas
von | from | |
nach | to | |
Dämmung | insulation | |
Begleitheizung | tracing | |
Werkstoff | material | |
Prüfdruck [barg] | pressure_test | | barg
Press. / Druck [barg] | pressure | | barg
Temperatur / Temperature [°C] | temperature | | °C
Druck (Pressure) [barg] | pressure | | barg
N.º de línea | line_number | |
Diámetro | size | |
Presión de operación (barg) | pressure | | barg
Presion de diseno (barg) | pressure_design | | barg
Caudal (kg/h) | flow_mass | | kg/h
Caudal máximo [m3/h] | flow_volume | maximum | m3/h
Desde | from | |
Hasta | to | |
Aislamiento | insulation | |
Densidad [kg/m3] | density | | kg/m3
Nº linha | line_number | |
Diâmetro | size | |
Pressão de projeto (barg) | pressure_design | | barg
Temperatura de operação [°C] | temperature | | °C
Vazão [kg/h] | flow_mass | | kg/h
Isolamento | insulation | |
Massa específica [kg/m3] | density | | kg/m3
Linjenr | line_number | |
Dimensjon | size | |
Designtrykk [barg] | pressure_design | | barg
Driftstrykk [barg] | pressure | | barg
Strømning [kg/h] | flow_mass | | kg/h
fra | from | |
til | to | |
Tetthet [kg/m3] | density | | kg/m3
Numero linea | line_number | |
Pressione di progetto [barg] | pressure_design | | barg
Portata [kg/h] | flow_mass | | kg/h
Temperatura di esercizio [°C] | temperature | | °C
Coibentazione | insulation | |
№ линии | line_number | |
Номер линии | line_number | |
Рабочее давление [barg] | pressure | | barg
Расчётное давление [barg] | pressure_design | | barg
Расчетная температура [°C] | temperature_design | | °C
Расход [kg/h] | flow_mass | | kg/h
Расход макс. [kg/h] | flow_mass | maximum | kg/h
Плотность [kg/m3] | density | | kg/m3
Среда | fluid | |
管线号 | line_number | |
管径 (DN) | size | | DN
设计压力 [barg] | pressure_design | | barg
操作温度 [°C] | temperature | | °C
介质 | fluid | |
起点 | from | |
终点 | to | |
保温 | insulation | |
流量 [kg/h] | flow_mass | | kg/h
最大流量 [kg/h] | flow_mass | maximum | kg/h
配管番号 | line_number | |
ライン番号 | line_number | |
設計圧力 [barg] | pressure_design | | barg
運転温度 [°C] | temperature | | °C
材質 | material | |
"""

CASES = [
    tuple(part.strip() for part in line.replace("\\n", "\n").split("|"))
    for line in (ENGLISH + OTHER_LANGUAGES).strip("\n").split("\n")
    if line.strip()
]


def test_the_table_is_long_enough() -> None:
    assert len(CASES) >= 150
    assert len({header for header, *_ in CASES}) == len(CASES)


@pytest.mark.parametrize(("header", "field", "case", "unit"), CASES, ids=[case[0] for case in CASES])
def test_header_in_its_language(header: str, field: str, case: str, unit: str) -> None:
    reading = read_header(header)
    assert reading is not None
    assert field in [found.name for found in reading.fields]
    assert (reading.case, reading.unit) == (case, unit)


@pytest.mark.parametrize("form", ["  {} ", "{}*", "{} (Note 3)", "{}\n", "{} **", "{} (see note 2)"])
@pytest.mark.parametrize("header", ["Line No", "Oper Press (barg)", "Débit (kg/h)", "Design Temp [°C]", "管线号"])
def test_marks_and_blanks_change_nothing(form: str, header: str) -> None:
    assert read_header(form.format(header)) == read_header(header)


def test_accents_and_capitals_change_nothing() -> None:
    assert key_of("Pression de Référence") == key_of("PRESSION DE REFERENCE")
    assert key_of("Strømning") == "stromning"
    assert key_of("Ø") == "dia"
    assert key_of("dP") == key_of("ΔP") != key_of("DP")


@pytest.mark.parametrize(
    "header",
    [
        "Pressure (shut-off) [barg]",
        "Viscosity (cP) (at 20 degC)",
        "Oper/Des/Test",
        "Press / Temp",
        "From → To",
        "Max. Size (inch)",
        "Elev [m]",
        "MAWP [barg]",
        "a",
        "Colour",
    ],
)
def test_header_whose_words_are_not_all_understood_is_claimed_by_nothing(header: str) -> None:
    assert read_header(header) is None


def test_no_spelling_stands_twice_in_one_field() -> None:
    for field in all_fields():
        keys = [key_of(text) for text in (field.name, *field.spellings)]
        assert len(keys) == len(set(keys)), field.name
        assert all(keys), field.name


def test_spellings_of_several_fields_are_those_that_are_asked() -> None:
    """Only flows, pressure drops, DP, PS, bore, wall and a largest velocity may name several fields; all others name one."""
    named: dict[str, set[str]] = {}
    for field in all_fields():
        for text in (field.name, *field.spellings):
            named.setdefault(key_of(text), set()).add(field.name)
    several = {frozenset(fields) for fields in named.values() if len(fields) > 1}
    drops = frozenset({"pressure_drop_stated", "pressure_gradient_stated"})
    flows = frozenset({"flow_mass", "flow_volume", "flow_standard"})
    assert several == {
        flows,
        drops,
        drops | {"pressure_design"},
        frozenset({"pressure_design", "painting"}),
        frozenset({"size", "inside_diameter"}),
        frozenset({"schedule", "wall_thickness"}),
        frozenset({"velocity_stated", "velocity_allowed"}),
    }


@pytest.mark.parametrize(
    ("header", "field", "unit"),
    [
        ("Inlet P (barg)", "pressure", "barg"),
        ("Inlet T (C)", "temperature", "C"),
        ("Rel. density (SG)", "density", "SG"),
        ("\u00b0API", "density", "degAPI"),
        ("LDMT (C)", "temperature_design_minimum", "C"),
        ("Vap. wt%", "vapour_fraction", "%"),
        ("Op. temperature / Betriebstemperatur [\u00b0C]", "temperature", "\u00b0C"),
        ("\u64cd\u4f5c\u538b\u529b Operating Pressure (barg)", "pressure", "barg"),
        ("\u64cd\u4f5c\u538b\u529bOperating Pressure (barg)", "pressure", "barg"),
        ("Operating Pressure\n\u64cd\u4f5c\u538b\u529b\n(barg)", "pressure", "barg"),
        ("\u8bbe\u8ba1\u6e29\u5ea6 Design Temp (C)", "temperature_design", "C"),
    ],
)
def test_spellings_of_two_scripts_and_short_forms(header: str, field: str, unit: str) -> None:
    reading = read_header(header)
    assert reading is not None
    assert [one.name for one in reading.fields] == [field]
    assert reading.unit == unit
