"""Nominal sizes as lists write them: NPS with fractions, DN, inch marks, both at once; held as NPS inches.

The pairs of NPS and DN, and the forms of a single size, are those of `criteria.nominal_size`.
"""

from __future__ import annotations

import re
from collections.abc import Iterable
from functools import cache, lru_cache
from typing import NamedTuple

from checker.criteria.nominal_size import CODED, WrittenSize, nominal_sizes, size_of_dn, written_size
from checker.intake.placeholders import placeholder
from checker.intake.size_doubts import coded_readings, no_such_size, size_doubt
from checker.intake.texts import shown, tidy
from checker.model import Gap

__all__ = ["CODED", "MIXED", "SizeReading", "column_basis", "read_size", "without_note"]

NAN = float("nan")
LONGEST_SIZE = 40
MIXED = "NPS and DN mixed"
"""Basis of a column whose bare numbers cannot all stand on one basis: none of them is read."""
LEAST_PLAIN_DN, LEAST_ROUND_DN = 15, 50
"""Below DN 15 a number marked NB or A, below DN 50 one marked with a diameter sign, may be one of inches."""
_ASK_BASIS = "write 6\" or DN 150, head the column 'Size (NPS)' or 'Size (DN)', or set [units] size in the criteria."
_CODE = re.compile(r"0\d{2,4}|\d{4}", re.ASCII)
_SHORT_CODE = re.compile(r"\d{2,4}", re.ASCII)
_FOOTNOTE = re.compile(
    r"\s*(?:[(\[]\s?(?:see )?notes?\.? ?\d{1,2}(?: ?[,&] ?\d{1,2}){0,4}\s?[)\]]|[*\u2020\u2021\u00a7]{1,4})$",
    re.IGNORECASE,
)
_PAIR = re.compile(r"(?P<first>[^()\[\]]+?)\s*[(\[]\s*(?P<second>[^()\[\]]+?)\s*[)\]]")
_STROKE = re.compile(
    r"(?P<first>.*[^\s\d/].*?)\s*[/|=]\s*(?P<second>.*)|(?P<bare>\d{1,4})\s*[/|=]\s*(?P<marked>.*\D.*)", re.ASCII
)


class SizeReading(NamedTuple):
    """One size cell: NPS inches (NaN where there is none), its gap, the reason of a refusal, and its own basis."""

    nps: float
    gap: Gap
    reason: str
    basis: str


@cache
def _pairs() -> tuple[tuple[float, float], ...]:
    return tuple((nps, float(dn)) for nps, dn in nominal_sizes().items())


def _refused(text: str, reason: str, basis: str = "") -> SizeReading:
    return SizeReading(NAN, Gap.REFUSED, f"{shown(text)} {reason}", basis)


def _size_on(number: float, basis: str) -> float:
    """Return the NPS of a number on a basis, NaN where there is no such nominal size."""
    if basis == "NPS":
        return number if number in nominal_sizes() else NAN
    return size_of_dn().get(number, NAN)


def _listed(number: float, basis: str, text: str, own: str) -> SizeReading:
    """Return the nominal size of a number on a basis, or a refusal that says what it seems to be."""
    if number <= 0.0:
        return _refused(text, 'is not above zero: a pipe needs a nominal size such as 6" or DN 150.', own)
    size = _size_on(number, basis)
    return SizeReading(size, Gap.GIVEN, "", own) if size == size else _refused(text, no_such_size(number, basis), own)


def _ask(number: float, text: str, basis: str) -> SizeReading:
    readings = [f"{name} {number:g}" for name in ("NPS", "DN") if _size_on(number, name) > 0.0]
    both = f"NPS or DN ({' or '.join(readings)})" if len(readings) == 2 else "NPS or DN"
    if basis == MIXED:
        return _refused(text, f'could be {both}, and the column mixes the two: mark each size, such as 6" or DN 150.')
    return _refused(text, f"could be {both}: {_ASK_BASIS}")


def _bare(written: WrittenSize, text: str, basis: str) -> SizeReading:
    """Read a number that names no basis on that of its column; with none, only a decimal says that it is inches."""
    if basis == CODED:
        return _refused(text, 'is no code of inches x 100, such as 0600: write 6" or the code.')
    if basis in ("NPS", "DN"):
        return _listed(written.number, basis, text, "")
    if written.number > 0.0 and written.number == int(written.number):
        return _ask(written.number, text, basis)
    return _listed(written.number, "NPS", text, "")


def _metric(written: WrittenSize, text: str, basis: str) -> SizeReading:
    """Read a number with a metric sign; small ones with a sign that goes with inches too are asked."""
    least = {"NB": LEAST_PLAIN_DN, "A": LEAST_PLAIN_DN, "Ø": LEAST_ROUND_DN}.get(written.sign, 0)
    if written.number >= least:
        return _listed(written.number, "DN", text, "DN")
    if written.sign == "A":
        return _refused(text, size_doubt(text))
    return _bare(written, text, basis)


def _single(written: WrittenSize, *, text: str, basis: str, comma: bool) -> SizeReading:
    if written.basis == "DN":
        return _metric(written, text, basis)
    marked_short = written.basis == "NPS" and _size_on(written.number, "NPS") > 0.0
    if written.comma and not comma and not marked_short:
        return _refused(text, "has a decimal comma in a list that is not written with one: write 1.5 or 1 1/2.")
    return _listed(written.number, "NPS", text, "NPS") if written.basis else _bare(written, text, basis)


def _code(plain: str, text: str, basis: str) -> SizeReading | None:
    """Read a size of four digits, or with a leading zero; None where a text is no such code."""
    if basis == CODED and _SHORT_CODE.fullmatch(plain):
        return _listed(int(plain) / 100.0, "NPS", text, "")
    if not _CODE.fullmatch(plain):
        return None
    if basis == "DN" and not plain.startswith("0"):
        return _listed(float(plain), "DN", text, "")
    return _refused(text, coded_readings(plain))


def _basis_of_pair(first: WrittenSize, second: WrittenSize) -> tuple[str, str] | None:
    """Return the bases of two sizes of which one is in inches and one in mm, None where that cannot be told."""
    bases = [size.basis or ("" if size.number == int(size.number) else "NPS") for size in (first, second)]
    if set(bases) == {""}:
        return ("DN", "NPS") if first.number > second.number else ("NPS", "DN")
    other = {"NPS": "DN", "DN": "NPS"}
    bases = [mine or other[bases[1 - place]] for place, mine in enumerate(bases)]
    return (bases[0], bases[1]) if bases[0] != bases[1] else None


def _two_sizes(plain: str) -> tuple[WrittenSize, WrittenSize, bool] | None:
    """Return the two sizes of ``40 (1.5")`` or ``DN 150/6"``, and whether a stroke parts them; else None."""
    match = _PAIR.fullmatch(plain)
    stroke = None if match else _STROKE.fullmatch(plain)
    if match:
        parts = match["first"], match["second"]
    elif stroke:
        parts = stroke["first"] or stroke["bare"] or "", stroke["second"] or stroke["marked"] or ""
    else:
        return None
    first, second = (written_size(part) for part in parts)
    return None if first is None or second is None else (first, second, stroke is not None)


def _twice(plain: str, text: str) -> SizeReading | None:
    """Read one size that is stated in inches and in mm; None where the text states no such two.

    Two bare numbers with a stroke between them, or two of inches, are the two ends of a reducer.
    """
    found = _two_sizes(plain)
    bases = None if found is None else _basis_of_pair(found[0], found[1])
    if found is None or bases is None:
        return None
    first, second, with_stroke = found
    marks = {first.basis, second.basis}
    if with_stroke and "NPS" not in marks:
        return None
    one, other = _size_on(first.number, bases[0]), _size_on(second.number, bases[1])
    if one == other:
        return SizeReading(one, Gap.GIVEN, "", "" if marks == {""} else "both")
    if with_stroke and "DN" not in marks:
        return None
    names = " and ".join(f"{basis} {size.number:g}" for basis, size in zip(bases, (first, second), strict=True))
    return _refused(text, f"names {names}, which are not one size: {_partners(bases, (first, second))}give one size.")


def _partners(bases: tuple[str, str], sizes: tuple[WrittenSize, WrittenSize]) -> str:
    """Return what each of two contradicting sizes goes with by the table, as far as it is a nominal size."""
    said = []
    for basis, size in zip(bases, sizes, strict=True):
        nps = _size_on(size.number, basis)
        if nps == nps:
            partner = f"NPS {nps:g}" if basis == "DN" else f"DN {nominal_sizes()[nps]}"
            said.append(f"{basis} {size.number:g} is {partner}, ")
    return "".join(said)


@lru_cache(maxsize=8192)
def _read(text: str, basis: str, comma: bool) -> SizeReading:
    plain = " ".join(tidy(text).split())
    gap = placeholder(plain, "size")
    if gap is not Gap.GIVEN:
        return SizeReading(NAN, gap, "", "")
    plain = without_note(plain)
    code = _code(plain, text, basis)
    if code is not None:
        return code
    written = written_size(plain)
    if written is not None:
        return _single(written, text=text, basis=basis, comma=comma)
    return _twice(plain, text) or _refused(text, size_doubt(plain))


def read_size(text: str, basis: str, comma: bool) -> SizeReading:
    """Read one size cell.

    Parameters
    ----------
    text : str
        The cell as written.
    basis : str
        ``NPS`` or ``DN`` where the column says which, `CODED` where its numbers are inches x 100, `MIXED` where it
        holds both, else empty: then a bare whole number is refused.
    comma : bool
        Whether the list is written with decimal commas.
    """
    if len(text) > LONGEST_SIZE and len(text.strip()) > LONGEST_SIZE:
        return _refused(text, 'is no size: write 6" or DN 150.')
    return _read(text.strip(), basis, comma)


def without_note(text: str) -> str:
    """Return a size as written without its footnote mark at the end (``6*``, ``6 (Note 2)``)."""
    return _FOOTNOTE.sub("", text) if len(text) <= LONGEST_SIZE else text


def _is_on(cell: str, basis: str, comma: bool) -> bool:
    return read_size(cell, basis, comma).gap is Gap.GIVEN


def _mixes(bare: Iterable[str], stated: Iterable[str], comma: bool) -> bool:
    """Return whether bare numbers include some that only NPS and some that only DN knows, or that only the other does.

    A number that is no nominal size at all says nothing of the column.
    """
    only = set(stated)
    for cell in bare:
        on = [basis for basis in ("NPS", "DN") if _is_on(cell, basis, comma)]
        only.update(on if len(on) == 1 else ())
    return len(only) == 2


def column_basis(cells: Iterable[str], comma: bool) -> str:
    """Return the basis that the marked cells of a bare size column agree on, where they outnumber the bare ones.

    `MIXED` is returned where marks or bare numbers speak for NPS in one cell and for DN in another: nothing is
    guessed of such a column.
    """
    counts = {"NPS": 0, "DN": 0, "both": 0, "": 0}
    bare: dict[str, None] = {}
    for cell in cells:
        reading = read_size(cell, "", comma)
        if reading.gap in (Gap.GIVEN, Gap.REFUSED):
            counts[reading.basis] += 1
            if not reading.basis:
                bare[cell] = None
    stated = [basis for basis in ("NPS", "DN") if counts[basis]]
    if _mixes(bare, stated, comma):
        return MIXED
    return stated[0] if len(stated) == 1 and counts[stated[0]] > counts[""] else ""
