"""What a text in a size column most likely is, where it is no nominal size: for the sentence that refuses it."""

from __future__ import annotations

import re
from collections.abc import Mapping
from functools import cache

from checker.criteria.nominal_size import nominal_sizes, size_of_dn, written_size
from checker.intake.spreadsheet_traces import date_originals
from checker.tables.reading import read_table

__all__ = ["coded_readings", "in_words", "no_such_size", "size_doubt", "size_originals"]

MILLIMETRES_OF_INCH = 25.4
INCHES_TOLERANCE, TOLERANCE = 0.006, 0.16
"""What two printings of one outside diameter differ by, in inches and in mm."""
_TWO_SIZES = re.compile(r".*\d.*[xX\u00d7/&+~;,].*\d.*|.*\d.*(?:to|-|\band\b|\bby\b).*\d.*", re.DOTALL)
_WITH_LETTERS = re.compile(r"[\d\s./\"-]*\d[\s\"]*([A-Za-z]{1,8})", re.ASCII)
_WRITE = 'write 6" or DN 150.'


@cache
def _outside_diameters() -> Mapping[float, float]:
    """Return the outside diameter in mm of every nominal size of the pipe tables, by its NPS."""
    return {float(row["nps"]): float(row["outside_diameter_mm"]) for row in read_table("pipe_dimensions")}


def _outside_diameter_of(number: float) -> str:
    """Return the nominal size whose outside diameter, in inches or in mm, a number is; empty where it is none."""
    for nps, outside in _outside_diameters().items():
        if abs(number - outside / MILLIMETRES_OF_INCH) <= INCHES_TOLERANCE or abs(number - outside) <= TOLERANCE:
            return f"NPS {nps:g} (DN {nominal_sizes().get(nps, 0)})"
    return ""


def _in_other_basis(number: float, basis: str) -> str:
    """Return the nominal size that a number is on the other basis, empty where it is none there."""
    if basis == "NPS":
        return f"DN {number:g}" if number in size_of_dn() and number > max(nominal_sizes()) else ""
    return f"NPS {number:g}" if number in nominal_sizes() else ""


def no_such_size(number: float, basis: str) -> str:
    """Return what to say of a number that is no nominal size on a basis: what it seems to be, or the nearest ones."""
    outside = _outside_diameter_of(number)
    if outside:
        return f"is the outside diameter of {outside}, no nominal size: write {outside} if that is meant."
    sizes = tuple(nominal_sizes()) if basis == "NPS" else tuple(size_of_dn())
    nearest = sorted(sorted(sizes, key=lambda size: abs(size - number))[:2])
    names = " and ".join(f"{basis} {size:g}" for size in nearest)
    other = _in_other_basis(number, basis)
    hint = f" It looks like {other}: is the column in {'DN' if basis == 'NPS' else 'NPS'}?" if other else ""
    return f"is no nominal size of ASME B36.10M ({basis}); the nearest are {names}.{hint}"


def coded_readings(code: str) -> str:
    """Return the sentence for a size of four digits, or with a leading zero: inches x 100, or mm."""
    number = int(code)
    readings = [f"NPS {number / 100:g} (inches x 100)"] if number / 100 in nominal_sizes() else []
    readings += [f"DN {number}"] if number in size_of_dn() else []
    seen = f": it reads as {' or as '.join(readings)}" if readings else ""
    return (
        f'looks like a coded size{seen}. Write it with its mark, such as 6" or DN 150, or set [units] size = '
        "'inches x 100' in the criteria if all sizes are such codes."
    )


def in_words(nps: float) -> str:
    """Return an NPS as people write it: ``1 1/2`` for 1.5."""
    whole, eighths = divmod(round(nps * 8), 8)
    if not eighths:
        return f"{whole}"
    bottom = 8 // (eighths & -eighths)
    fraction = f"{eighths * bottom // 8}/{bottom}"
    return f"{whole} {fraction}" if whole else fraction


def size_originals(text: str) -> tuple[str, ...]:
    """Return the sizes that a date may have been before a spreadsheet made a date of it.

    ``2-Jan`` and ``1-Feb`` are 1/2 by the order of the month, or 1 1/2 or 2 1/2 with their whole inches lost.
    """
    pair = re.fullmatch(r"(\d{1,2})-(\d{1,2})", next(iter(date_originals(text)), ""), re.ASCII)
    if pair is None:
        return ()
    top, bottom = sorted((int(pair[1]), int(pair[2])))
    written = written_size(f"{top}/{bottom}")
    sizes = (written.number + inches for inches in range(3)) if written is not None else ()
    return tuple(in_words(size) for size in sizes if size in nominal_sizes())


def size_doubt(plain: str) -> str:
    """Return the end of the sentence that refuses a text which states no size in a known form.

    Parameters
    ----------
    plain : str
        The cell with its blanks and signs tidied.
    """
    if date_originals(plain):
        originals = [f'{size}"' for size in size_originals(plain)]
        meant = f": was it {' or '.join(originals)}?" if originals else "."
        return f"is a date, which a spreadsheet makes of sizes such as 1/2 or 1-1/2{meant} Write the size as text."
    if plain.startswith("-"):
        return 'is not above zero: a pipe needs a nominal size such as 6" or DN 150.'
    letters = _WITH_LETTERS.fullmatch(plain)
    if letters:
        return f"carries the letters {letters[1]}: a material, a rating or a mark is no part of a size: {_WRITE}"
    if _TWO_SIZES.fullmatch(plain):
        return "names two sizes: give one size a row."
    return f"is no nominal size: {_WRITE}"
