"""A review made up for the tests of the report: same attributes as the real one, no engine behind it."""

from __future__ import annotations

import hashlib
from collections.abc import Mapping
from dataclasses import dataclass, field
from typing import Any

import numpy as np
import pandas as pd

from checker.model import Address, CellRecord, HeaderMatch, HoldItem, RangeItem, Source, UnreadItem
from checker.review_model import (
    AssumptionItem,
    Basis,
    CautionItem,
    CellValue,
    NotCheckedGroup,
    OutcomeRow,
    RuleSummary,
    ServiceMatch,
)

RULES = {
    "liquid-velocity": ("Liquid velocity", "should", "v = w / (rho A)"),
    "gas-velocity": ("Gas velocity", "should", "v = w / (rho A), worst end"),
    "steam-velocity": ("Steam velocity", "should", "v = w / (rho A), worst end"),
    "two-phase-velocity": ("Two-phase velocity", "should", "v_m = w / (rho_m A)"),
    "minimum-velocity": ("Minimum velocity", "should", "v = w / (rho A)"),
    "erosional-velocity": ("Erosional velocity", "should", "v_e = C / sqrt(rho_m)"),
    "momentum-flux": ("Momentum flux", "should", "rho v^2"),
    "pressure-gradient": ("Pressure gradient", "should", "dp/L = f rho v^2 / (2 D)"),
    "pressure-budget": ("Pressure budget", "should", "dp = dp_pipe + dp_fittings + dp_acceleration"),
    "npsh-margin": ("NPSH margin", "shall", "NPSHa = (p_s - p_v) / (rho g) + z - h_l"),
    "mach-number": ("Mach number", "should", "M = v / c"),
    "stated-values": ("Stated values", "note", "|stated - computed| / computed"),
    "schedule-exists": ("Schedule exists", "shall", "wall in ASME B36.10M or B36.19M"),
    "phase-change": ("Liquid above its vapour pressure", "shall", "p > p_v"),
}
SERVICES = ("seawater cooling supply", "ammonia loading", "methanol transfer", "LP steam", "flare header", "wet gas")
FILE = "marrowquay_rev_b.csv"
HOSTILE = (
    "<script>alert(1)</script>",
    "{{7*7}}",
    "</td></tr></table><h1>own</h1>",
    "=cmd|' /C calc'!A0",
    "bell\x07 esc\x1b[31m nul\x00",
    "rtl\u202etxt.exe",
    '"><img src=x onerror=alert(1)>',
    "{% raw %}${jndi}",
    "<style>@import url(http://example.invalid/a.css)</style>",
    "lone \udc80 surrogate",
)


@dataclass(frozen=True)
class FakeResult:
    line_number: str
    row: int
    service: str
    phase: str
    size: str
    case: str
    velocity: float
    velocity_limit: float
    pressure_gradient: float
    pressure_loss: float
    dp_total: float
    mach: float
    momentum_flux: float
    utilisation: float
    governing_rule: str
    meets: int
    does_not_meet: int
    not_checked: int
    state: str


@dataclass(frozen=True)
class FakeResults:
    rows: tuple[FakeResult, ...]


@dataclass(frozen=True)
class FakeUtilisation:
    utilisation: np.ndarray[Any, Any]
    rule: np.ndarray[Any, Any]
    rules: tuple[str, ...]


@dataclass(frozen=True)
class FakeVelocity:
    velocity: np.ndarray[Any, Any]
    limit: np.ndarray[Any, Any]
    phase: np.ndarray[Any, Any]


@dataclass
class FakeReview:
    lines_count: int
    exceptions: tuple[OutcomeRow, ...]
    line_numbers: tuple[str, ...]
    points: int
    title: str = "Marrowquay terminal"
    document: str = "MQ-PR-CRI-001"
    recommendation: str = "revise and resubmit"
    recommendation_text: str = "revise and resubmit"
    reasons: tuple[str, ...] = (
        "NPSH margin (shall) is not met on 2 line cases.",
        "Liquid velocity exceeds its limit by more than 1.25 times on 9 line cases.",
    )
    coverage: float = 0.931
    coverage_text: str = "checked 93.1 %, not checked 6.9 %"
    rules_count: int = len(RULES)
    approved: tuple[OutcomeRow, ...] = ()
    not_checked_groups: tuple[NotCheckedGroup, ...] = ()
    hold_items: tuple[HoldItem, ...] = ()
    unread_items: tuple[UnreadItem, ...] = ()
    deleted_items: tuple[UnreadItem, ...] = ()
    range_items: tuple[RangeItem, ...] = ()
    matching: tuple[HeaderMatch, ...] = ()
    completeness: Any = None
    assumption_items: tuple[AssumptionItem, ...] = ()
    caution_items: tuple[CautionItem, ...] = ()
    rule_summaries: tuple[RuleSummary, ...] = ()
    service_matches: tuple[ServiceMatch, ...] = ()
    basis: Basis = field(default_factory=lambda: Basis((), (), (), (), ()))
    understood: tuple[str, ...] = ()
    columns_matched: tuple[tuple[str, str, str, str], ...] = ()
    columns_unmatched: tuple[str, ...] = ()
    faults: tuple[str, ...] = ()
    revisions: tuple[str, ...] = ("B", "C")
    approvals: tuple[tuple[str, ...], ...] = ()
    tally: Mapping[str, int] = field(default_factory=dict)

    @property
    def line_cases(self) -> int:
        return 2 * self.lines_count

    @property
    def outcomes(self) -> pd.DataFrame:
        names = ("line_number", "case", "rule", "force", "outcome", "value", "limit", "utilisation", "unit", "reason")
        meets = make_outcome(0, "10-AM-1000", outcome="meets")
        unchecked = make_outcome(1, "10-AM-1001", outcome="not checked", value=float("nan"))
        rows = [*self.exceptions, *self.approved, meets, unchecked]
        return pd.DataFrame({name: [getattr(row, name) for row in rows] for name in names})

    def outcome_rows(self, line_number: str) -> tuple[OutcomeRow, ...]:
        if line_number not in self.line_numbers:
            return ()
        place = self.line_numbers.index(line_number)
        outcomes = ("does not meet", "meets", "not checked", "not applicable")
        return tuple(
            make_outcome(place + step, line_number, outcome=outcome, line_case=2 * place + case, case=name)
            for case, name in enumerate(("normal", "maximum"))
            for step, outcome in enumerate(outcomes)
        )

    def record(self, field: str, line_case: int) -> CellRecord | None:
        return CellRecord("81000", (81000.0,), "kg/h", (22.5,)) if field == "flow_mass" else None

    def ledger_text(self, line_number: str) -> list[str]:
        return [f"balance of {line_number}", "  pressure   12.41 J/kg   0.1239 bar   1.265 m", "  closing error 2e-9"]

    def results(self) -> FakeResults:
        return FakeResults(tuple(make_result(place, line) for place, line in enumerate(self.line_numbers)))

    def utilisation_points(self) -> FakeUtilisation:
        generator = np.random.default_rng(7)
        rule = generator.integers(0, len(RULES), self.points)
        return FakeUtilisation(generator.lognormal(-0.75, 0.5, self.points), rule, tuple(RULES))

    def velocity_points(self) -> FakeVelocity:
        generator = np.random.default_rng(8)
        phase = generator.choice([0, 1, 2, -1], self.points, p=[0.6, 0.25, 0.1, 0.05]).astype(np.int8)
        limit = np.where(phase == 0, generator.choice([1.5, 2.5, 3.0, 4.5], self.points), 20.0)
        limit = np.where(phase == 1, generator.choice([20.0, 30.0, 60.0], self.points), limit)
        return FakeVelocity(limit * generator.lognormal(-0.6, 0.5, self.points), limit, phase)

    def hydraulics_columns(self) -> list[tuple[str, str, np.ndarray[Any, Any]]]:
        numbers = np.linspace(0.5, 5.0, self.line_cases)
        gaps = np.where(np.arange(self.line_cases) % 7 == 0, np.nan, numbers)
        return [
            ("velocity", "m/s", gaps),
            ("dp_total", "Pa", numbers * 1e5),
            ("reynolds", "", numbers * 1e5),
        ]

    def flow_regimes(self) -> list[str]:
        return ["segregated", "=evil()"] * self.lines_count

    @property
    def deviations(self) -> pd.DataFrame:
        columns = ["line_number", "case", "rule", "written", "approved_by", "reference", "until", "state"]
        return pd.DataFrame(list(self.approvals), columns=columns)

    def line_case_labels(self) -> list[tuple[str, str]]:
        return [(line, case) for line in self.line_numbers for case in ("normal", "maximum")]


def make_outcome(
    place: int,
    line_number: str,
    *,
    outcome: str = "does not meet",
    value: float | None = None,
    line_case: int = 0,
    case: str = "maximum",
    cell: str = "",
) -> OutcomeRow:
    """Return one outcome with everything filled in."""
    rule = list(RULES)[place % len(RULES)]
    title, force, equation = RULES[rule]
    number = 3.0 + 0.17 * (place % 11) if value is None else value
    origin = str(Address(FILE, 12 + place, "Flow Max [kg/h]"))
    cells = (
        CellValue("flow_mass", "mass flow", "1 250 000 kg/h", cell or "1,250,000", origin),
        CellValue("density", "density at flowing conditions", "1 021 kg/m3", "1021", f"{FILE}, row 12, column 'Rho'"),
        CellValue("inside_diameter", "bore of the pipe", "387.4 mm", "", "ASME B36.10M, NPS 16, schedule 30"),
        CellValue("velocity_maximum", "limit", "3.000 m/s", "", "criteria.toml, [[service]] seawater cooling supply"),
    )
    return OutcomeRow(
        line_number=line_number,
        case=case,
        service=SERVICES[place % len(SERVICES)],
        rule=rule,
        title=title,
        force=force,
        outcome=outcome,
        value=number,
        limit=3.0,
        utilisation=number / 3.0 if place % 13 else float("inf"),
        unit="m/s",
        value_shown=f"{number:.3f} m/s",
        limit_shown="at most 3.000 m/s",
        limit_origin="seawater cooling supply: 3.0 m/s (criteria.toml; common practice)",
        reason=f"{title}: {number:.3f} m/s at the worst end is above the limit of 3.000 m/s in the {case} case.",
        calculation=f"{equation}\n= 347.2 kg/s / (1021 kg/m3 x 0.1179 m2)\n= {number:.3f} m/s  >  3.000 m/s",
        source="Common practice for carbon steel in seawater; CRITERIA row 'cooling water'",
        cells=cells,
        rests_on=("roughness 0.05 mm (assumed: commercial steel)",) if place % 3 == 0 else (),
        composite=place % 5 == 0,
        line_case=line_case,
    )


def make_result(place: int, line_number: str) -> FakeResult:
    """Return one line's results; every seventh has gaps."""
    states = ("meets", "meets", "near limit", "does not meet", "not checked", "approved deviation")
    number = 0.8 + 0.13 * (place % 23)
    gap = float("nan") if place % 7 == 0 else number
    phase = ("liquid", "gas", "two-phase")[place % 3]
    return FakeResult(
        line_number=line_number,
        row=place + 2,
        service=SERVICES[place % len(SERVICES)],
        phase=phase,
        size=f"NPS {(2, 4, 6, 8, 16, 24)[place % 6]}",
        case="maximum",
        velocity=gap,
        velocity_limit=3.0,
        pressure_gradient=gap * 120.0,
        pressure_loss=gap * 21_000.0,
        dp_total=gap * 34_000.0,
        mach=0.21 if phase == "gas" else float("nan"),
        momentum_flux=gap * gap * 1021.0,
        utilisation=gap / 3.0,
        governing_rule="liquid-velocity",
        meets=7,
        does_not_meet=int(place % 6 == 3),
        not_checked=2,
        state=states[place % 6],
    )


def make_review(
    *, lines: int = 150, exceptions: int = 40, points: int = 120, hostile: bool = False, **changes: Any
) -> FakeReview:
    """Return a review with as many lines and exceptions as wanted; hostile texts in every cell text when asked."""
    numbers = tuple(f"{10 + place % 4}-{('SWS', 'AM', 'ME', 'LS')[place % 4]}-{1000 + place}" for place in range(lines))
    if hostile:
        numbers = tuple(f"{number} {HOSTILE[place % len(HOSTILE)]}" for place, number in enumerate(numbers))
    written = HOSTILE[0] if hostile else ""
    rows = tuple(
        make_outcome(place, numbers[(place * 2 // 3) % lines], line_case=place, cell=written and HOSTILE[place % 10])
        for place in range(exceptions)
    )
    spare = HOSTILE if hostile else ("HOLD 3", "n/a", '2" SCH 40')
    address = Address(FILE, 17, "Flow Max [kg/h]" if not hostile else HOSTILE[2])
    settings: dict[str, Any] = {
        "tally": _tally(lines * 2 * len(RULES), exceptions),
        "approved": (make_outcome(3, numbers[-1], outcome="approved deviation"),),
        "approvals": (
            (numbers[-1], "", "two-phase-velocity", "3.6 m/s", "piping lead", "MQ-DEV-004", "2030-06-30", "used"),
            (spare[0], "normal", "gas-velocity", "22 m/s", "piping lead", "MQ-DEV-005", "2020-01-31", "stale"),
        ),
        "not_checked_groups": _groups(numbers, spare),
        "hold_items": tuple(HoldItem(numbers[k % lines], "pressure", text, address) for k, text in enumerate(spare)),
        "unread_items": tuple(
            UnreadItem(numbers[k % lines], text, f"'{text}' is no number. Write one, or HOLD.", address)
            for k, text in enumerate(spare)
        ),
        "assumption_items": tuple(
            AssumptionItem(number, case, "roughness", "0.05 mm", "criteria: carbon steel")
            for number in numbers
            for case in ("normal", "maximum")
        ),
        "caution_items": (CautionItem("European Union", "The directive for pressure equipment applies.", "local"),),
        "rule_summaries": _rules(),
        "service_matches": tuple(ServiceMatch(text, "" if k == 5 else text, 25) for k, text in enumerate(SERVICES))
        + tuple(ServiceMatch(text, "", 1) for text in spare),
        "basis": _basis(),
        "understood": ("Comma-separated, header on row 1, units on row 2.", "Flow min, norm and max make three cases."),
        "deleted_items": tuple(
            UnreadItem(text, text, "Row 40: the line is struck through, so it is taken as deleted.", address)
            for text in spare
        ),
        "range_items": tuple(
            RangeItem(numbers[k % lines], "pressure", text, 4.5e5, 5.5e5, address) for k, text in enumerate(spare)
        ),
        "matching": (
            HeaderMatch(1, "Line No.", "line_number", "", "", ""),
            HeaderMatch(2, "Flow Max [kg/h]", "flow_mass", "maximum", "kg/h", ""),
            *(
                HeaderMatch(k, text, "", "", "", f"no field claims {text!r}; the closest is the field 'schedule'.")
                for k, text in enumerate(spare[:3], start=3)
            ),
        ),
        "columns_matched": (("Flow Max [kg/h]", "flow_mass", "maximum", "kg/h"), (spare[0], "remarks", "", "")),
        "columns_unmatched": ("Heat tracing circuit", spare[1]),
    }
    return FakeReview(lines, rows, numbers, points, **(settings | changes))


def _tally(outcomes: int, exceptions: int) -> dict[str, int]:
    counts = {"does not meet": exceptions, "not checked": min(230, outcomes // 10), "approved deviation": 2}
    counts["not applicable"] = outcomes // 4
    return counts | {"meets": outcomes - sum(counts.values())}


def _groups(numbers: tuple[str, ...], texts: tuple[str, ...]) -> tuple[NotCheckedGroup, ...]:
    return (
        NotCheckedGroup("pressure-budget", "pressure_drop_allowed is blank: give the allowed loss.", 120, numbers[:60]),
        NotCheckedGroup("gas-velocity", f"length reads {texts[0]}: the outlet is not known.", 80, numbers[60:80]),
        NotCheckedGroup(
            "npsh-margin",
            "vapour_pressure is on HOLD",
            30,
            numbers[80:83],
            f"vapour_pressure is on HOLD ('TBC') ({FILE}, row 83, column 'Vapour pressure [bara]')",
        ),
    )


def _rules() -> tuple[RuleSummary, ...]:
    counts = {"meets": 210, "does not meet": 3, "not checked": 16, "not applicable": 70, "approved deviation": 1}
    return tuple(
        RuleSummary(rule, title, force, "Published source, edition and clause", equation, "bundled", counts)
        for rule, (title, force, equation) in RULES.items()
    )


def _basis() -> Basis:
    names = (FILE, "criteria.toml", "classes.csv")
    digests = tuple(hashlib.sha256(name.encode()).hexdigest() for name in names)
    return Basis(
        inputs=tuple(Source(*named, "UTF-8, comma-separated") for named in zip(names, digests, strict=True)),
        versions=(("linelist-checker", "0.1.0"), ("numpy", "2.4.0")),
        methods=(("Colebrook-White", "friction factor", "Colebrook (1939)"), ("Isothermal", "gas", "energy balance")),
        differences=("cooling water: velocity_maximum 3.0 m/s, default 2.5 m/s",),
        adopted=(("roughness, carbon steel", "0.05 mm", "criteria.toml"), ("near limit", "0.9", "default")),
    )
