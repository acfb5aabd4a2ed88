"""Providers of data rules: what is told once a row: open items and their age, impossible values, size bases."""

from __future__ import annotations

import re
from typing import Any

import numpy as np
from numpy.typing import NDArray

from checker.evaluation.contradictions import above, asked, contradiction, said
from checker.evaluation.provider import provider
from checker.intake.placeholders import placeholder
from checker.model import Coded
from checker.pipe.sizes import look_up
from checker.ruling.tristate import UNKNOWN, YES, all_of
from checker.tables.reading import read_table

__all__ = ["PROVIDERS", "revision_rank"]

FloatArray = NDArray[np.float64]
BoolArray = NDArray[np.bool_]
CodeArray = NDArray[np.int8]
Named = dict[str, Any]

HOTTEST = 1273.15
SAME_DIAMETER = 0.02
OF_SIZE_WITHIN, OF_SMALL_WITHIN, OTHER_STANDARD_WITHIN = 0.01, 0.0005, 0.03
#: NPS and outside diameter where ISO 4200 series 1 is more than 1 % from ASME B36.10M.
ISO_OUTSIDE = {2.5: 0.0761, 5.0: 0.1397}
_LETTERS = re.compile(r"[A-Z]{1,2}")
_NUMBER = re.compile(r"\d{1,3}")
_PREFIX = re.compile(r"^(?:REV(?:ISION)?)[\s.:]*")
_NUMBERS_FOLLOW_LETTERS = 1000.0


def revision_rank(text: str) -> float:
    """Return the place of a revision: A, B ... Z, AA ... before 0, 1, 2 ...; NaN for any other form.

    Letters for issues before approval and numbers after it are common practice; other schemes (P01, A1) are unclear.
    """
    word = _PREFIX.sub("", text.strip().upper())
    if _LETTERS.fullmatch(word):
        first = ord(word[0]) - ord("A") + 1
        return float(first if len(word) == 1 else 26 * first + ord(word[1]) - ord("A") + 1)
    return _NUMBERS_FOLLOW_LETTERS + int(word) if _NUMBER.fullmatch(word) else float("nan")


def line_number_stated(*, line_number_text: Coded) -> CodeArray:
    """Return 1 where a line has a number, -1 where its cell says that there is none yet."""
    open_ones = [
        not any(map(str.isdigit, text)) and bool(placeholder(text, "line_number")) for text in line_number_text.texts
    ]
    table = np.array([*(UNKNOWN if each else YES for each in open_ones), UNKNOWN], dtype=np.int8)
    return table[line_number_text.codes]


def row_holds(*, hold_fields: Coded, first_of_row: CodeArray) -> Named:
    """Return whether a row has something on HOLD; told at its first line case."""
    return {"row_on_hold": ((hold_fields.codes >= 0) & (first_of_row == YES)).astype(np.int8)}


def aged_hold(*, row_on_hold: CodeArray, revision: Coded, revision_gap: CodeArray) -> Named:
    """Return whether a row on HOLD is older than the newest revision of the list; nothing is said of the newest rows.

    One revision anywhere on the list that is neither letters nor a number leaves the newest unknown.
    """
    ranks = np.array([*(revision_rank(text) for text in revision.texts), np.nan])
    used = np.unique(revision.codes[revision.codes >= 0])
    newest = float(ranks[used].max()) if used.size else float("nan")
    last = int(used[np.argmax(ranks[used])]) if used.size and np.isfinite(newest) else -1
    mine = ranks[revision.codes]
    with np.errstate(invalid="ignore"):
        older = mine < newest
        newest_here = mine == newest
    return {
        "hold_with_revision": all_of(row_on_hold, asked(revision_gap), ~newest_here),
        "hold_older": contradiction(older, np.isnan(mine) | np.isnan(newest)),
        "newest_revision": Coded(np.full(mine.shape, last, dtype=np.int32), revision.texts),
    }


def impossible_value(
    *,
    temperature: FloatArray,
    temperature_gap: CodeArray,
    temperature_design: FloatArray,
    temperature_design_gap: CodeArray,
) -> Named:
    """Return whether a temperature is above 1 000 degC, which no pipe of a line list carries.

    What no fluid can be (a temperature below absolute zero, a pressure, density or size of nothing or less, a negative
    flow) is refused when it is read, and its cell is `not checked` with that reason.
    """
    operating, design = asked(temperature_gap), asked(temperature_design_gap)
    found = above(temperature, HOTTEST) | above(temperature_design, HOTTEST)
    unknown = (operating & np.isnan(temperature)) | (design & np.isnan(temperature_design))
    return {
        "temperature_stated": (operating | design).astype(np.int8),
        "impossible": contradiction(found, unknown),
    }


def _other_basis(size: FloatArray) -> tuple[FloatArray, FloatArray]:
    """Return the NPS that a size's number means read as DN, and the NPS that its DN's number means read as NPS."""
    rows = read_table("nominal_sizes")
    as_dn, as_nps = np.full(size.shape, np.nan), np.full(size.shape, np.nan)
    inches = {float(row["nps"]) for row in rows}
    for row in rows:
        nps, dn = float(row["nps"]), float(row["dn"])
        as_dn[size == dn] = nps
        if dn in inches:
            as_nps[size == nps] = dn
    return as_dn, as_nps


def _outside(size: FloatArray) -> FloatArray:
    return look_up(nps=size, schedule_code=np.full(size.shape, -1), schedule_names=[]).outside_diameter


def _near(first: FloatArray, second: FloatArray, share: float) -> BoolArray:
    with np.errstate(all="ignore"):
        return np.asarray(np.abs(first / second - 1.0) <= share, dtype=np.bool_)


def _is_of_size(diameter: FloatArray, size: FloatArray) -> BoolArray:
    """Return True where a diameter is that of the nominal size: within 1 %, of small pipe within 0.5 mm.

    ASME B36.10M, or where ISO 4200 (EN 10220, series 1) has another: DN 65 is 76.1 mm and DN 125 is 139.7 mm.
    """
    fits = np.zeros(size.shape, dtype=np.bool_)
    other = np.full(size.shape, np.nan)
    for nps, outside in ISO_OUTSIDE.items():
        other[size == nps] = outside
    for each in (_outside(size), other):
        with np.errstate(invalid="ignore"):
            fits |= np.abs(diameter - each) <= np.maximum(OF_SIZE_WITHIN * each, OF_SMALL_WITHIN)
    return fits


def size_basis(
    *,
    size: FloatArray,
    size_gap: CodeArray,
    outside_diameter_listed: FloatArray,
    outside_diameter_gap: CodeArray,
    first_of_row: CodeArray,
) -> Named:
    """Return whether a size goes with the row's outside diameter, and if not whether on the other basis; once a row.

    NPS 40 beside 48.3 mm is DN 40; DN 6 beside 168.3 mm is NPS 6. Up to 3 % off it may be pipe of another standard
    (EN 10255, JIS G 3452), so that it is no `shall`. Without an outside diameter nothing in the row says so.
    """
    mine = _outside(size)
    off = ~_is_of_size(outside_diameter_listed, size) & np.isfinite(outside_diameter_listed + mine)
    fits = [off & _near(outside_diameter_listed, _outside(other), SAME_DIAMETER) for other in _other_basis(size)]
    return {
        "size_told": all_of(first_of_row, asked(size_gap, outside_diameter_gap)),
        "size_basis_contradicts": contradiction(
            off | fits[0] | fits[1], np.isnan(size + outside_diameter_listed) | np.isnan(mine)
        ),
        "size_is_another": fits[0] | fits[1] | (off & ~_near(outside_diameter_listed, mine, OTHER_STANDARD_WITHIN)),
        "outside_diameter_of_size": mine,
        "size_basis_said": said(
            "they go together",
            (fits[0], "they go together when the number is a DN"),
            (fits[1], "they go together when the number is an NPS"),
            (off, "that is not the outside diameter of this size"),
        ),
    }


PROVIDERS = (
    provider(line_number_stated),
    provider(row_holds, "row_on_hold"),
    provider(aged_hold, "hold_with_revision", "hold_older", "newest_revision"),
    provider(impossible_value, "temperature_stated", "impossible"),
    provider(
        size_basis,
        "size_told",
        "size_basis_contradicts",
        "size_is_another",
        "outside_diameter_of_size",
        "size_basis_said",
    ),
)
