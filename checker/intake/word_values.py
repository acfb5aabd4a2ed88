"""Words that stand for a value in the number column they fit: ATM, AMB, FV, NNF."""

from __future__ import annotations

import re

from checker.intake.cell_reading import Cell, CellReading, NumberContext, given, of_two, refused
from checker.intake.placeholders import AMBIENT, ATMOSPHERE, FULL_VACUUM, NO_FLOW, word_of
from checker.intake.ranges import LOWEST_DESIGN
from checker.intake.texts import shown
from checker.model import CellRecord, Gap
from checker.units import from_si

__all__ = ["word_value"]

_LONGEST = 60
_WITH_NUMBER = re.compile(
    r"(?P<word>[A-Za-z][A-Za-z. ]*?)\s?(?:/|&|\+|-|to|and)\s?(?P<behind>[-+]?\d[\d.,]*)"
    r"|(?P<before>[-+]?\d[\d.,]*)\s?(?:/|&|\+|-|to|and)\s?(?P<last>[A-Za-z][A-Za-z. ]*)",
    re.IGNORECASE | re.ASCII,
)
_FLOWS = frozenset({"flow_mass", "flow_volume", "flow_standard"})
_LOWEST_FIELDS = frozenset(LOWEST_DESIGN.values())


def _ambient(text: str, context: NumberContext) -> Cell:
    """Return the site's range of ambient temperature."""
    name = context.field.name
    if context.ambient is None:
        reason = (
            f"{shown(text)} is the ambient range of the site, which the criteria do not state: write the temperature, "
            "or give ambient_minimum and ambient_maximum under [site]."
        )
        return refused(text, reason)
    low, high = context.ambient
    record = CellRecord(text, (low, high), "K", (low, high), "ambient temperature of the site, as the criteria say")
    if name in _LOWEST_FIELDS:
        return Cell(CellReading(low, Gap.GIVEN), record)
    return Cell(of_two(low, high, context.field, 0, ""), record)


def _ambient_and_number(text: str, plain: str, context: NumberContext) -> Cell | None:
    """Return the refusal of a temperature that names the ambient one beside a number (``AMB/60``), else None."""
    match = (
        _WITH_NUMBER.fullmatch(plain) if len(plain) <= _LONGEST and context.field.dimension == "temperature" else None
    )
    if match is None or word_of(match["word"] or match["last"]) not in AMBIENT:
        return None
    number = (match["behind"] or match["before"]).strip()
    site = "give the lowest ambient temperature of the site in place of the word"
    if context.ambient is not None and context.unit is not None:
        low, high = (float(from_si(end, context.unit)) for end in context.ambient)
        unit = context.unit.spelling
        site = f"the ambient range of the criteria is {low:g} to {high:g} {unit}, so '{low:g}/{number}' may be meant"
    return refused(text, f"{shown(text)} is the ambient temperature beside a number: write both as numbers; {site}.")


def _vacuum(text: str, context: NumberContext) -> Cell:
    """Return the reading of a cell that says full vacuum and nothing else."""
    name = context.field.name
    if name == "pressure_design_minimum":
        return given(text, 0.0, 0.0, "bara")
    if name in LOWEST_DESIGN:
        reason = f"{shown(text)} is the lowest design pressure, full vacuum: write the design pressure too ('3.5/FV')."
        cell = refused(text, reason, CellRecord(text, (0.0,), "bara", (0.0,)))
        return Cell(cell.reading._replace(lowest=0.0), cell.record)
    return refused(text, f"{shown(text)} is full vacuum, a design condition and no operating value: give the pressure.")


def word_value(text: str, plain: str, context: NumberContext) -> Cell | None:
    """Return the reading of a word that stands for a value or asks for one; None where a cell holds no such word.

    Parameters
    ----------
    text, plain : str
        The cell as written, and tidied.
    context : NumberContext
        Field, atmosphere and ambient range.
    """
    word, field = word_of(plain), context.field
    if not word:
        return _ambient_and_number(text, plain, context)
    if word in NO_FLOW and field.name in _FLOWS:
        return given(text, 0.0, 0.0, context.unit.spelling if context.unit else "")
    if word in ATMOSPHERE and field.dimension == "pressure":
        return given(text, context.atmosphere, 0.0, "barg")
    if word in FULL_VACUUM and field.dimension == "pressure":
        return _vacuum(text, context)
    if word in AMBIENT and field.dimension == "temperature":
        return _ambient(text, context)
    return None
