"""Nominal sizes in every spelling of the trade: what each reads as, and what is said of those that are none.

NPS and DN after ASME B36.10M and ISO 6708; outside diameters from the same tables; the spellings are common practice.
"""

from __future__ import annotations

from pathlib import Path

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st
from lists import one_column, read

from checker.criteria.nominal_size import CODED, nominal_sizes, read_nominal_size, size_of_dn, written_size
from checker.intake.size_doubts import in_words, size_originals
from checker.intake.sizes import MIXED, column_basis, read_size
from checker.model import Gap

READ = [
    *((text, 1.25) for text in ("1 1/4", "1-1/4", '1-1/4"', '1.1/4"', "1¼", '1¼"', '1.25"', "1 1/4 in", "1 - 1/4", '1"1/4', "1–1/4")),
    *((text, 1.5) for text in ("1 1/2", "1-1/2", '1-1/2"', '1.1/2"', '1½"', "1½", "1 ½", '1.5"', "1.5", "1.50", 'NPS 1-1/2', "1⁄2 ".replace("1⁄2", "1 1⁄2"))),
    *((text, 2.5) for text in ("2 1/2", "2-1/2 in", "2½", '2.5"')),
    *((text, 0.75) for text in ("3/4", '3/4"', "¾", '¾"', "0.75", '.75"', "NPS 3/4", "NPS 0.75", "3/4 in", '3/4″', "DN 20")),
    *((text, 0.5) for text in ("1/2", "½", '1/2"', '0.5"', "0.5″", "DN15", "15A")),
    *((text, 0.125) for text in ("1/8", "⅛", '1/8"', "DN 6")), ("3/8", 0.375), ("⅜", 0.375), ("1/4", 0.25),
    *((text, 6.0) for text in (
        '6"', "6''", "6″", "6”", "6“", "6′′", "6 in", "6 in.", "6 inch", "6-inch", "6 INCH", "6IN", "6 inches", "NPS 6", "NPS6", "NPS-6", "6 NPS",
        '6.0"', ' 6" ', '6" NB', 'NB 6"', 'Ø6"', "６\"", "6\u00a0in", "DN 150", "DN150", "dn150", "DN-150", "DN.150", "DN=150", "DN_150", "ND 150",
        "150NB", "150 NB", "NB 150", "150 mm NB", "150 mm", "150mm", "150 DN", "DN 150 mm", "150A", "Ду150", "Ду 150", "ДУ 150", "Ø150", "ø150", "⌀150",
        'DN 150 (6")', '150 (6")', '6" (150)', '6" (DN150)', '6"/150', '6"/DN150', 'DN150/6"', "DN 150 [6 in]", '150/6"',
    )),
    *((text, 3.0) for text in ("DN 80", "DN80", "DN-80", "ND 80", "Ø80", "80NB", "NB 80", "80A", "Ду80", "DN=80", "80 mm", '80 (3")')),
    *((text, 1.5) for text in ('40 (1.5")', '1.5" (40)', 'DN 40 (1 1/2")', '40 (1½")', '1-1/2" (DN 40)', "40 (1.5)")),
    *((text, 6.0) for text in ('6"*', '6" (Note 2)', "DN 150 *", "DN150 [see notes 1, 2]", '6"\u2020', "150 mm**")),
    ("24 in", 24.0), ('48"', 48.0), ("DN 1200", 48.0), ("14″", 14.0),
]  # fmt: skip
REFUSED = [
    ("0600", "coded size: it reads as NPS 6 (inches x 100) or as DN 600"), ("1800", "NPS 18 (inches x 100) or as DN 1800"),
    ("0500", "inches x 100"), ("0050", "NPS 0.5 (inches x 100)"), ("9999", "coded size"), ("1400", "inches x 100"),
    ("80/50", "two sizes"), ("DN 25/50", "two sizes"), ("DN = 25/50", "two sizes"), ('8"x6"', "two sizes"), ("8/6", "two sizes"), ('8"×6"', "two sizes"),
    ('8"/6"', "two sizes"), ("6-8", "two sizes"), ('6" to 8"', "two sizes"), ('6" 8"', 'is no nominal size'), ("6 x 4", "two sizes"), ("2/4", "two sizes"), ('6"/4', "two sizes"),
    ("DN 80 x DN 50", "two sizes"), ('3/4"x1/2"', "two sizes"),
    ('40 (2")', "DN 40 is NPS 1.5, NPS 2 is DN 50"), ('6" (DN 200)', "NPS 6 is DN 150, DN 200 is NPS 8"), ('6"/DN 200', "not one size"),
    ("2-Jan", 'was it 1/2" or 1 1/2" or 2 1/2"?'), ("1-Feb", 'was it 1/2" or 1 1/2"'), ("02-Jan", '1 1/2"'), ("4-Jan", 'was it 1/4" or 1 1/4"'),
    ("3-Apr", 'was it 3/4"?'), ("4-Mar", 'was it 3/4"?'), ("Jan-02", '1 1/2"'), ("2026-01-02", '1 1/2"'), ("2026-01-02 00:00:00", '1 1/2"'), ("5-Jul", "is a date"),
    ('7"', "the nearest are NPS 6 and NPS 8"), ('3 1/4"', "the nearest are NPS 3 and NPS 3.5"), ("DN 151", "the nearest are DN 125 and DN 150"), ('5/8"', "nearest"),
    ("8.625", "the outside diameter of NPS 8"), ("6.625", "the outside diameter of NPS 6"), ('4.5"', "the outside diameter of NPS 4"), ("168.3", "the outside diameter of NPS 6 (DN 150)"),
    ("219.1 mm", "the outside diameter of NPS 8 (DN 200)"), ("1-1/4CR", "letters CR"), ("6 STD", "letters STD"), ("150#", "is no nominal size"), ("150 lb", "letters lb"),
    ("0", "not above zero"), ('0"', "not above zero"), ('-6"', "not above zero"), ("big", "is no nominal size"), ('"', "is no nominal size"), ("1e1", "is no"),
    ("٦\"", "is no nominal size"), ("1" * 5000, "5000 characters"), ("6A", "letters A"), ("1,234\"", "decimal comma"), ("1/0", "two sizes"), ("1_0", "is no nominal size"),
]  # fmt: skip
IN_COLUMN = [
    ("6", "NPS", 6.0, ""), ("150", "DN", 6.0, ""), ("1.5", "NPS", 1.5, ""), ("1,5", "NPS", None, "decimal comma"), ("2", "NPS", 2.0, ""),
    ("150", "NPS", None, "It looks like DN 150: is the column in DN?"), ("200", "NPS", None, "looks like DN 200"), ("1.5", "DN", None, "looks like NPS 1.5"),
    ("12", "DN", None, "looks like NPS 12: is the column in NPS?"), ("24", "DN", None, "looks like NPS 24"), ("219.1", "DN", None, "outside diameter of NPS 8"),
    ("273", "DN", None, "outside diameter of NPS 10"), ("0600", "DN", None, "coded"), ("1400", "DN", 56.0, ""), ("0600", "NPS", None, "coded"),
    ("6", "", None, "could be NPS or DN (NPS 6 or DN 6)"), ("150", "", None, "could be NPS or DN"), ("6 NB", "", None, "could be NPS or DN"), ("Ø6", "", None, "could be"),
    ("Ø6", "NPS", 6.0, ""), ("6", MIXED, None, "the column mixes the two"), ('6"', MIXED, 6.0, ""), ("DN 50", MIXED, 2.0, ""),
    ("0600", CODED, 6.0, ""), ("1800", CODED, 18.0, ""), ("0050", CODED, 0.5, ""), ("600", CODED, 6.0, ""), ("50", CODED, 0.5, ""), ("0150", CODED, 1.5, ""),
    ("0650", CODED, None, "no nominal size"), ("6", CODED, None, "no code of inches x 100"), ('14"', CODED, 14.0, ""),
]  # fmt: skip
COLUMNS = [
    (['6"', '8"', "4"], "NPS"), (['6"', "DN 150", "4"], MIXED), (["30", "18", "14", "150", "200"], MIXED), (["30", "18", "8.625", "6.625"], ""),
    (["150", "200", "50"], ""), (["2", "4", "6"], ""), (['6"', '8"', '10"', "150"], MIXED), (["DN 50", "DN 80", "100"], "DN"), (["DN 50", "DN 80", "4"], MIXED),
    (["40", "1.5", "2"], ""), (["40", '1.5"', "150"], MIXED), (['6"', "8", "10"], ""), ([], ""), (["HOLD", "-"], ""), (['6"', '8"', "7"], "NPS"),
    (["1 1/2", "3/4", "2"], "NPS"), (["25", "20", "12"], MIXED), (["0600", "0800"], ""),
]  # fmt: skip


@pytest.mark.parametrize(("text", "nps"), READ)
@pytest.mark.parametrize("basis", ["", "NPS"])
def test_size_is_read(text: str, nps: float, basis: str) -> None:
    reading = read_size(text, basis, False)
    assert (reading.nps, reading.gap, reading.reason) == (nps, Gap.GIVEN, "")


@pytest.mark.parametrize(("text", "words"), REFUSED)
def test_size_is_refused_with_its_likely_meaning(text: str, words: str) -> None:
    reading = read_size(text, "NPS", False)
    assert np.isnan(reading.nps)
    assert reading.gap is Gap.REFUSED
    assert words in reading.reason
    assert len(reading.reason) < 320
    assert np.isnan(read_size(text, MIXED, False).nps)


@pytest.mark.parametrize(("text", "basis", "nps", "words"), IN_COLUMN)
def test_size_on_the_basis_of_its_column(text: str, basis: str, nps: float | None, words: str) -> None:
    reading = read_size(text, basis, False)
    assert reading.gap is (Gap.REFUSED if nps is None else Gap.GIVEN)
    assert (nps is None and np.isnan(reading.nps)) or reading.nps == nps
    assert words in reading.reason


@pytest.mark.parametrize(("text", "nps"), [('1,5"', 1.5), ("2,5 in", 2.5), ('0,75"', 0.75)])
def test_a_marked_decimal_comma_leaves_no_doubt(text: str, nps: float) -> None:
    assert read_size(text, "", False).nps == nps


@pytest.mark.parametrize(("cells", "basis"), COLUMNS)
def test_basis_of_a_bare_column(cells: list[str], basis: str) -> None:
    assert column_basis(cells, False) == basis


def test_a_mixed_column_is_not_guessed(tmp_path: Path) -> None:
    listed = read(tmp_path, one_column("Size", "30", "18", "150", "200", '6"'))
    assert listed.gap("size").tolist() == [Gap.REFUSED] * 4 + [Gap.GIVEN]
    assert "mixes" in listed.refusals["size", 0]


def test_criteria_settle_coded_sizes(tmp_path: Path) -> None:
    codes = one_column("Nominal size", "1800", "0600", "0050")
    assert read(tmp_path, codes).gap("size").tolist() == [Gap.REFUSED] * 3
    settled = read(tmp_path, codes, units={"size": "inches x 100"})
    assert settled.number("size").tolist() == [18.0, 6.0, 0.5]


@pytest.mark.parametrize(("unit", "good"), [("NPS", True), ("DN", True), ("inches x 100", True), ("cm", False)])
def test_a_criteria_file_may_state_the_basis_of_sizes(tmp_path: Path, unit: str, good: bool) -> None:
    from checker.criteria.load import load_criteria
    from checker.errors import InputError

    path = tmp_path / "criteria.toml"
    path.write_text(f'[units]\nsize = "{unit}"\n', encoding="utf-8")
    if good:
        assert load_criteria(path).units["size"] == unit
    else:
        with pytest.raises(InputError, match="inches x 100"):
            load_criteria(path)


def test_sizes_in_words() -> None:
    assert [in_words(nps) for nps in (0.125, 0.75, 1.5, 3.5, 6.0)] == ["1/8", "3/4", "1 1/2", "3 1/2", "6"]
    assert size_originals("2-Jan") == ("1/2", "1 1/2", "2 1/2")
    assert size_originals("8-Mar") == ("3/8",)
    assert size_originals('6"') == ()


@pytest.mark.parametrize("nps", list(nominal_sizes()))
def test_every_nominal_size_reads_back_in_every_form(nps: float) -> None:
    dn, words = nominal_sizes()[nps], in_words(nps)
    forms = [
        f'{words}"',
        f"NPS {words}",
        f"NPS {nps:g}",
        f'{nps:g}"',
        f"{nps:g} in",
        f"DN {dn}",
        f"DN{dn}",
        f"{dn} mm",
        f'{dn} ({words}")',
        f'{words}" (DN {dn})',
    ]
    for form in forms:
        assert read_size(form, "", False).nps == nps, form
    for form in forms[:8]:
        assert read_nominal_size(form) == nps, form
    assert size_of_dn()[dn] == nps


PIECES = st.lists(
    st.sampled_from([
        "1", "2", "4", "6", "0", "80", "150", "1/2", "3/4", "½", " ", "-", ".", ",", '"', "″", "''", "in", "NPS", "DN", "NB", "A", "Ø", "mm", "Ду", "(", ")",
        "/", "x", "CR", "Jan", "٣", "\u200b", "[", "]", "=", "|", "1e", "_",
    ]),
    max_size=7,
).map("".join)  # fmt: skip


@settings(max_examples=500, deadline=None)
@given(st.text(max_size=50) | PIECES, st.sampled_from(["", "NPS", "DN", CODED, MIXED]), st.booleans())
def test_any_text_is_a_size_a_gap_or_a_refusal(text: str, basis: str, comma: bool) -> None:
    reading = read_size(text, basis, comma)
    assert np.isnan(reading.nps) == (reading.gap is not Gap.GIVEN)
    assert bool(reading.reason) == (reading.gap is Gap.REFUSED)
    assert np.isnan(reading.nps) or reading.nps in nominal_sizes()
    assert column_basis([text, "6"], comma) in ("", "NPS", "DN", MIXED)
    written = written_size(text)
    assert written is None or written.number >= 0.0
    assert np.isnan(read_nominal_size(text)) or read_nominal_size(text) in nominal_sizes()


def test_a_footnote_mark_is_no_part_of_a_bare_size(tmp_path: Path) -> None:
    listed = read(tmp_path, one_column("Size (NPS)", "6*", "6 (Note 2)", "8", "*", "6*4"))
    assert listed.number("size")[:3].tolist() == [6.0, 6.0, 8.0]
    assert listed.gap("size")[3:].tolist() == [Gap.REFUSED] * 2
    mixed = read(tmp_path, one_column("Size (NPS)", "20*", "150 (Note 1)", "6"))
    assert "could be NPS 20 or DN 20" in mixed.refusals["size", 0]
