"""The key of a line number: what counts as one number, what only looks like it, and that folding is stable."""

from __future__ import annotations

import pytest
from hypothesis import given
from hypothesis import strategies as st

from checker.line_numbers.alike import why_alike
from checker.line_numbers.folding import folded_key, folded_keys, looser_key, looser_keys, plain_numbers

NUMBER = '6"-P-1042-A1A-H'
#: Spellings of one number that word processors, spreadsheets and keyboards leave behind: common practice.
ONE_NUMBER = (
    '6"-p-1042-a1a-h',
    ' 6"-P-1042-A1A-H ',
    '6" - P - 1042 - A1A - H',
    "6-P-1042-A1A-H",
    "6''-P-1042-A1A-H",
    "6\u2033-P-1042-A1A-H",
    "\u201c6\u201d-P-1042-A1A-H",
    '6"\u2011P\u20131042\u2212A1A\u2014H',
    '6"-P-1\u200b042-A1A-H',
    '\ufeff6"-P-1042-A1A-H\u200e',
    '6"-P-1042-A1A\u202e-H',
    '6"\u00a0-\u00a0P-1042-A1A-H',
    '6"-\u0420-1042-\u04101\u0410-\u041d',
    '6"-\u03a1-1042-A1A-H',
    '\uff16"-P-1042-A1A-H',
    '6"-P-1042-A1A-H\U000e0041',
)
LOOKS_LIKE_IT = (
    '6"-P-1O42-A1A-H',
    '6"-P-I042-A1A-H',
    '6"-P-l042-A1A-H',
    '6"-P-1042-AIA-H',
    '6"-P-1042-\u00c11A-H',
    '6"-P-1042-A1A-H (Rev B)',
    '6"-P-1042-A1A-H [REV. 2]',
    '6"-P-1042-A1A-H Rev 0',
)
ANOTHER = ('6"-P-1043-A1A-H', '8"-P-1042-A1A-H', '6"-P-1042-A1A', '6"-P-10-42-A1A-H', '6"-P-1042-A1B-H')
TEXTS = st.text(max_size=30) | st.text(
    alphabet="01OIl|\"'-\u2011/_. ()ABPREVrev\u0410\u0420\u0391\u200b\u00ad\n", max_size=30
)


@pytest.mark.parametrize("text", ONE_NUMBER)
def test_spellings_of_one_number_have_one_key(text: str) -> None:
    assert folded_key(text) == folded_key(NUMBER)
    assert looser_key(text) == looser_key(NUMBER)


@pytest.mark.parametrize("text", LOOKS_LIKE_IT)
def test_look_alikes_have_one_looser_key_but_not_one_key(text: str) -> None:
    assert looser_key(text) == looser_key(NUMBER)
    assert folded_key(text) != folded_key(NUMBER)


@pytest.mark.parametrize("text", ANOTHER)
def test_another_number_has_another_key(text: str) -> None:
    assert folded_key(text) != folded_key(NUMBER)
    assert looser_key(text) != looser_key(NUMBER)


@pytest.mark.parametrize(
    ("one", "other"),
    [("P 1 11", "P 11 1"), ("1 1/2-P-7", "11/2-P-7"), ("A BC 1", "AB C 1"), ("2-IA-1001", "2-LA-1001")],
)
def test_a_blank_between_two_words_and_a_capital_l_tell_numbers_apart(one: str, other: str) -> None:
    assert folded_key(one) != folded_key(other)


def test_instrument_air_does_not_look_like_lean_amine() -> None:
    assert looser_key("2-IA-1001") != looser_key("2-LA-1001")


@given(TEXTS)
def test_folding_again_changes_nothing(text: str) -> None:
    assert folded_key(folded_key(text)) == folded_key(text)
    assert looser_key(looser_key(text)) == looser_key(text)


@given(st.lists(TEXTS, max_size=8))
def test_a_number_has_the_same_key_whatever_stands_beside_it(texts: list[str]) -> None:
    assert folded_keys(texts) == [folded_key(text) for text in texts]
    assert looser_keys(texts) == [looser_key(text) for text in texts]
    assert plain_numbers(texts) == [plain_numbers((text,))[0] for text in texts]


def test_long_numbers_keep_their_own_keys_and_are_parsed_in_part() -> None:
    one, other = "9" * 10_000 + "1", "9" * 10_000 + "2"
    assert folded_key(one) != folded_key(other)
    assert len(plain_numbers([one])[0]) < 1_000
    assert folded_keys([]) == looser_keys([]) == plain_numbers([]) == []


@pytest.mark.parametrize(
    ("one", "other", "words"),
    [
        ("P-1O42", "P-1042", "character 4 is a capital O in the first and a zero in the second"),
        ("P-1042", "P\u20111042", "character 2 is a hyphen in the first and U+2011 NON-BREAKING HYPHEN in the second"),
        ("P-1042", "P-10\u200b42", "U+200B ZERO WIDTH SPACE after character 4 stands in the second only"),
        ("A-l1", "A-11", "character 3 is a small l in the first and a one in the second"),
        ("P-A1A", "P-\u04101A", "character 3 is 'A' in the first and U+0410 CYRILLIC CAPITAL LETTER A in the second"),
        ("p-a1a", "P-A1A", "they differ in capital and small letters only"),
        ("P-1", "P-1", ""),
    ],
)
def test_what_tells_look_alikes_apart_is_named(one: str, other: str, words: str) -> None:
    assert why_alike(one, other) == words


@given(TEXTS, TEXTS)
def test_two_different_texts_are_told_apart_in_printable_words(one: str, other: str) -> None:
    words = why_alike(one, other)
    assert bool(words) == (one != other)
    assert words.isascii()
