"""One fault stands once: a card a line and rule, its other cases beneath; counts, first page, long texts and lists."""

from __future__ import annotations

import dataclasses
import io
import re
import tempfile
from typing import Any

import pytest
from bs4 import BeautifulSoup
from fake_review import FakeReview, make_outcome, make_review
from pypdf import PdfReader

from checker.report.breaches import breaches_of, counted_both_ways
from checker.report.html import render_html
from checker.report.pdf import render_pdf
from checker.report.safe_text import shortened
from checker.report.terminal import summary
from checker.report.wording import beyond, fields_in_words, no_exceptions, plural
from checker.review_model import CellValue, OutcomeRow

LINE = "10-SWS-1000"


def in_cases(place: int, line: str = LINE, **changes: Any) -> tuple[OutcomeRow, ...]:
    """Return one rule not met on one line in three cases, the worst first."""
    rows = (
        make_outcome(place, line, value=value, case=case, line_case=k)
        for k, (case, value) in enumerate((("maximum", 4.0), ("normal", 3.5), ("minimum", 3.2)))
    )
    return tuple(dataclasses.replace(row, **changes) for row in rows)


def review_of(*rows: OutcomeRow) -> FakeReview:
    return dataclasses.replace(make_review(lines=3, exceptions=0, points=0), exceptions=rows)


def soup_of(review: FakeReview, *, paged: bool = False) -> BeautifulSoup:
    return BeautifulSoup(render_html(review, paged=paged), "html.parser")


def test_cases_of_one_line_and_rule_are_one() -> None:
    rows = (*in_cases(1), *in_cases(2), make_outcome(1, "11-AM-1001"))
    breaches = breaches_of(rows)
    assert [(breach.rank, breach.worst.rule, len(breach.others)) for breach in breaches] == [
        (1, "gas-velocity", 2),
        (2, "steam-velocity", 2),
        (3, "gas-velocity", 0),
    ]
    assert breaches[0].cases == "maximum, normal, minimum"


@pytest.mark.parametrize(
    ("outcomes", "breaches", "said"),
    [
        (63, 37, "63 outcomes do not meet: 37 times a rule on a line"),
        (1, 1, "1 outcome does not meet: 1 time a rule on a line"),
    ],
)
def test_counts_are_said_both_ways(outcomes: int, breaches: int, said: str) -> None:
    assert counted_both_ways(outcomes, breaches) == said


def test_one_card_with_the_other_cases_and_their_calculations_beneath() -> None:
    rows = in_cases(1)
    soup = soup_of(review_of(*rows))
    (card,) = soup.select("article.card")
    shown = [[cell.get_text() for cell in row.find_all("td")] for row in card.select(".other-cases tbody tr")]
    assert shown == [[row.case, row.value_shown, row.limit_shown, f"{row.utilisation:.2f}"] for row in rows[1:]]
    assert [pre.get_text() for pre in card.select("details pre")] == [row.calculation for row in rows]
    assert "3 outcomes do not meet: 1 time a rule on a line." in soup.select_one("#exceptions p").get_text()


def test_paper_gives_each_other_case_one_line_with_its_calculation() -> None:
    rows = in_cases(1)
    (card,) = soup_of(review_of(*rows), paged=True).select("article.card")
    lines = card.select(".other-cases tbody tr")
    assert [line.select_one(".calculation-line").get_text() for line in lines] == [row.calculation for row in rows[1:]]


def test_cases_that_all_say_the_same_are_named_once() -> None:
    rows = in_cases(12, value_shown="no", limit_shown="yes", reason="no such wall", calculation="NPS 6, schedule 20")
    (card,) = soup_of(review_of(*rows)).select("article.card")
    assert "maximum, normal, minimum" in card.select_one(".figures").get_text()
    assert not card.select(".other-cases")


def test_terminal_names_five_rules_on_lines_and_not_one_five_times() -> None:
    rows = [row for place in range(1, 8) for row in in_cases(place)]
    text = " ".join(summary(review_of(*rows), None).split())
    assert "21 outcomes do not meet: 7 times a rule on a line. The 5 worst:" in text
    assert text.count(f"{LINE} (maximum, normal, minimum)") == 5


def test_composite_is_remarked_only_where_a_field_goes_by_case() -> None:
    size = CellValue("size", "nominal size", "NPS 6", '6"', "list.csv, row 2, column 'Size'")
    flow = CellValue("flow_mass", "mass flow", "10 kg/h", "10", "list.csv, row 2, column 'Flow'")
    for cells, remarked in (((size,), False), ((size, flow), True)):
        rows = in_cases(12, composite=True, cells=cells)
        assert bool(soup_of(review_of(*rows)).select(".composite")) is remarked


def test_limit_without_an_origin_gives_no_empty_entry() -> None:
    row = dataclasses.replace(make_outcome(1, LINE), limit_origin="")
    assert "Limit from" not in soup_of(review_of(row)).select_one("article.card").get_text()


def test_fields_are_called_by_their_meaning() -> None:
    (card,) = soup_of(review_of(make_outcome(1, LINE))).select("article.card")
    first = card.select_one(".cells tbody td")
    assert first.select_one(".meaning").get_text() == "mass flow"
    assert first.select_one("code.field").get_text() == "flow_mass"


@pytest.mark.parametrize(
    ("written", "said"),
    [
        ("flow_mass is blank", "mass flow (flow_mass) is blank"),
        ("surface_tension is on HOLD", "surface tension is on HOLD"),
        ("row 3, column 'flow_mass'", "row 3, column 'flow_mass'"),
        ("other_word stays", "other_word stays"),
    ],
)
def test_a_sentence_names_fields_by_meaning_but_leaves_the_texts_of_the_list(written: str, said: str) -> None:
    assert fields_in_words(written) == said


@pytest.mark.parametrize(
    ("tally", "said"),
    [
        ({"meets": 0, "not checked": 40}, "none among the 0.0 % that could be checked. Nothing was checked."),
        ({"meets": 30, "not checked": 10}, "No exceptions: none among the 75.0 % that could be checked."),
        ({"meets": 99_999, "not checked": 1}, "none among the 99.9 % that could be checked."),
        ({"meets": 5}, "No exceptions: every applicable outcome was checked."),
        ({"not applicable": 14}, "no rule applied to any line case: nothing was checked."),
    ],
)
def test_no_exceptions_never_says_more_than_was_checked(tally: dict[str, int], said: str) -> None:
    review = make_review(lines=1, exceptions=0, points=0, tally=tally)
    assert no_exceptions(review).endswith(said)
    assert said in " ".join(summary(review, None).split())
    assert said in soup_of(review).select_one("#exceptions").get_text()


def test_one_is_not_several() -> None:
    assert plural(1, "line") == "1 line"
    assert plural(0, "line case") == "0 line cases"
    review = make_review(lines=1, exceptions=0, points=0)
    assert "1 line, 2 line cases, 14 rules" in summary(review, None)
    assert "1 line, 2 line cases, 14 rules" in soup_of(review).select_one(".masthead").get_text()


def test_first_page_names_tool_list_digest_and_revisions() -> None:
    review = make_review(lines=3, exceptions=1, points=0)
    head = soup_of(review).select_one(".masthead").get_text()
    source = review.basis.inputs[0]
    assert source.name in head
    assert source.sha256[:12] in head
    assert "B, C" in head
    assert re.search(r"linelist-checker \d+\.\d+", head)
    first = PdfReader(io.BytesIO(render_pdf(review))).pages[0].extract_text()
    assert all(words in first for words in ("Checked by", "Date", "Signature", source.sha256[:12], "B, C"))


def test_a_review_without_revisions_is_shown_as_well() -> None:
    review = make_review(lines=2, exceptions=0, points=0, revisions=())
    assert "the list states" not in soup_of(review).select_one(".masthead").get_text()


def test_what_was_not_checked_names_a_cell() -> None:
    text = soup_of(make_review(lines=90, exceptions=0, points=0)).select_one("#not-checked").get_text()
    assert "First: ('TBC') (marrowquay_rev_b.csv, row 83, column 'Vapour pressure [bara]')" in text
    assert beyond("length is blank", "another reason") == "length is blank"


def test_long_texts_are_cut_and_their_length_told() -> None:
    assert shortened("x" * 200) == "x" * 200
    assert shortened("x" * 10_000) == f"{'x' * 200}\u2026 (10000 characters)"
    long = "9" * 10_000
    row = dataclasses.replace(make_outcome(1, long), cells=(CellValue("fluid", "the fluid", long, long, long),))
    review = dataclasses.replace(make_review(lines=1, exceptions=0, points=0), exceptions=(row,), line_numbers=(long,))
    for text in (render_html(review), render_html(review, paged=True), summary(review, None)):
        assert max(map(len, re.findall("9+", text)), default=0) <= 2_000
        assert "(10000 characters)" in text
    assert len(summary(review, None).splitlines()) < 40


def test_calculations_and_sentences_are_not_cut_as_cells_are() -> None:
    row = dataclasses.replace(make_outcome(1, LINE), calculation="a + " * 150, reason="because " * 100)
    text = soup_of(review_of(row)).select_one("article.card").get_text()
    assert row.calculation in text
    assert row.reason in text


def test_long_results_show_the_worst_states_and_say_where_the_rest_stand() -> None:
    soup = soup_of(make_review(lines=2_400, exceptions=1, points=0))
    states = [state.get_text().split(" ", 1)[1] for state in soup.select(".results-table .state")]
    assert len(states) == 2_000
    assert states[:400] == ["does not meet"] * 400
    assert states[400:800] == ["not checked"] * 400
    said = soup.select_one("#results .bounded").get_text()
    assert said == "Shown here: 2000 of 2400 lines. All of them are in hydraulics.csv and outcomes.json."


def test_results_of_a_list_that_fits_stay_in_its_order() -> None:
    review = make_review(lines=12, exceptions=1, points=0)
    heads = [head.contents[0].strip() for head in soup_of(review).select(".results-table tbody th")]
    assert heads == list(review.line_numbers)


def test_very_many_exceptions_are_bounded_in_the_compact_table_too() -> None:
    rows = [make_outcome(1, f"L-{number}") for number in range(2_700)]
    soup = soup_of(review_of(*rows))
    assert len(soup.select("article.card")) == 500
    assert len(soup.select(".compact-exceptions tbody tr")) == 2_000
    said = soup.select_one("#exceptions .bounded").get_text()
    assert said == "Shown here: 2000 of 2200 further exceptions. All of them are in outcomes.json."


def test_temporary_folder_is_not_asked_for_where_home_can_be_written(monkeypatch: pytest.MonkeyPatch) -> None:
    from checker.report.quiet import quiet_drawing

    def refused(*_: Any, **__: Any) -> None:
        raise AssertionError("a temporary folder was made")

    monkeypatch.setenv("MPLCONFIGDIR", tempfile.gettempdir())
    monkeypatch.setattr("checker.report.quiet._temporary_folder", refused)
    with quiet_drawing():
        pass
