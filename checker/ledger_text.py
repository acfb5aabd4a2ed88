"""The engineering Bernoulli ledger of a line as text: every term in J/kg, bar and metres, and its closing error."""

from __future__ import annotations

import math

import numpy as np
from numpy.typing import NDArray

from checker.evaluation.values import Values
from checker.hydraulics.compose import STATUS_SENTENCES
from checker.hydraulics.ledger import ledger
from checker.shown import shown_number

__all__ = ["ledger_lines"]

_TERMS = (
    ("pressure_term", "pressure, integral of dp/rho from 2 to 1"),
    ("kinetic_term", "kinetic energy, (alpha2 v2^2 - alpha1 v1^2) / 2"),
    ("elevation_term", "elevation, g (z2 - z1)"),
    ("loss_pipe", "viscous loss of the pipe"),
    ("loss_fittings", "viscous loss of the fittings"),
    ("loss_exit", "loss of the jet in the receiver"),
    ("loss_slip", "slip of the phases, as the method takes it"),
    ("shaft_work", "shaft work done by the fluid"),
)
_WIDTH = 50


def ledger_lines(values: Values, line_cases: NDArray[np.int64]) -> list[str]:
    """Return the ledger of line cases, a block a case; a case that could not be solved says so."""
    arguments = dict(values["solver_arguments"])
    found = ledger(solution=values["solution"], rows=line_cases, **arguments)
    lines: list[str] = []
    for place, line_case in enumerate(line_cases):
        case = values.line_list.case.text(int(line_case)) or "case not named"
        error = float(found.closing_error[place])
        if math.isnan(error):
            sentence = STATUS_SENTENCES[int(values["status"][line_case])]
            lines += [f"Case {case}: no ledger ({sentence})", ""]
            continue
        lines.append(f"{'Case ' + case:<{_WIDTH}} {'J/kg':>12} {'bar':>12} {'m':>12}")
        for name, words in _TERMS:
            energy = float(getattr(found, name)[place])
            if name in ("loss_exit", "loss_slip", "shaft_work") and energy == 0.0:
                continue
            bar = float(found.in_pascals(name)[place]) / 1e5
            head = float(found.in_metres(name)[place])
            figures = "".join(f" {shown_number(number):>12}" for number in (energy, bar, head))
            lines.append(f"  {words:<{_WIDTH - 2}}{figures}")
        lines += [f"  closing error {error:.1e} of the largest term", ""]
    return lines
