"""exceptions.html: order, completeness, harmlessness, sameness."""

from __future__ import annotations

import re
import subprocess
import sys
from pathlib import Path

import pytest
from bs4 import BeautifulSoup
from fake_review import HOSTILE, make_review

from checker.report.html import render_html
from checker.report.safe_text import visible

ORDER = (
    "Recommendation and coverage",
    "The list at a glance",
    "How the list was read",
    "Exceptions by line: what must be done",
    "Approved deviations",
    "What was not checked, and why",
    "Rows and cells not read",
    "HOLD register",
    "Assumptions",
    "Cautions",
    "Basis",
    "Rules and how often each gave which outcome",
    "Results of every line",
)
REFERENCES = re.compile(r"""(?:src|href|action|poster|data|srcset)\s*=\s*["']?([^"'\s>]*)|url\(\s*["']?([^"')]*)""")
IMPORTS = re.compile(r"@import|<link|<base|<iframe|<object|<embed", re.IGNORECASE)


@pytest.fixture(scope="module")
def page() -> str:
    return render_html(make_review())


@pytest.fixture(scope="module")
def soup(page: str) -> BeautifulSoup:
    return BeautifulSoup(page, "html.parser")


@pytest.fixture(scope="module")
def hostile_page() -> str:
    return render_html(make_review(hostile=True))


def test_sections_stand_in_order(soup: BeautifulSoup) -> None:
    titles = [" ".join(heading.get_text().split()[1:]) for heading in soup.find_all("h2")]
    assert tuple(titles) == ORDER


def test_approved_deviations_are_left_out_where_there_are_none() -> None:
    page = render_html(make_review(lines=3, exceptions=1, points=5, approved=(), approvals=()))
    assert "Approved deviations" not in [heading.get_text() for heading in BeautifulSoup(page, "html.parser")("h2")]


def test_coverage_stands_before_the_recommendation(soup: BeautifulSoup) -> None:
    first = soup.select_one("#recommendation p")
    assert first is not None
    assert first.get_text() == "checked 93.1 %, not checked 6.9 %"
    assert "Revise and resubmit" in soup.select_one("#recommendation .verdict").get_text()


def test_tally_adds_up(soup: BeautifulSoup) -> None:
    counts = [row.find_all("td")[1].get_text() for row in soup.select(".tally tbody tr")]
    assert sum(int(count) for count in counts) == 150 * 2 * 14


def test_every_exception_shows_value_limit_case_calculation_cell_and_source(soup: BeautifulSoup) -> None:
    review = make_review()
    cards = soup.select("article.card")
    assert len(cards) == len(review.exceptions)
    by_rank = {int(card["id"].removeprefix("exception-")): card for card in cards}
    for rank, row in enumerate(review.exceptions, start=1):
        text = by_rank[rank].get_text()
        wanted = [row.value_shown, row.limit_shown, row.case, row.force, row.calculation, row.source, row.limit_origin]
        wanted += [part for cell in row.cells for part in (cell.shown, cell.written, cell.origin)]
        assert not [part for part in wanted if part not in text]


def test_paper_shows_the_numbers_of_a_line_once_with_the_exceptions_that_rest_on_them() -> None:
    review = make_review(lines=3, exceptions=6, points=0)
    soup = BeautifulSoup(render_html(review, paged=True), "html.parser")
    for group in soup.select(".line-group"):
        ranks = [int(card["id"].removeprefix("exception-")) for card in group.select(".card")]
        rows = [[cell.get_text() for cell in row.find_all("td")] for row in group.select(".cells tbody tr")]
        for rank in ranks:
            mine = {row[0] for row in rows if row[4] == "all" or str(rank) in row[4].split(", ")}
            wanted = review.exceptions[rank - 1].cells
            assert mine == {f"{cell.meaning} {cell.field}" for cell in wanted}


def test_exceptions_of_one_line_stand_together(soup: BeautifulSoup) -> None:
    lines = [heading.get_text() for heading in soup.select("#exceptions .line-number")]
    assert len(lines) == len(set(lines)) == len({row.line_number for row in make_review().exceptions})


def test_results_hold_every_line(soup: BeautifulSoup) -> None:
    rows = soup.select(".results-table tbody tr")
    assert len(rows) == 150
    assert {len(row.find_all(["td", "th"])) for row in rows} == {9}


def test_basis_holds_the_digest_of_every_input(page: str) -> None:
    assert all(source.sha256 in page for source in make_review().basis.inputs)


def test_two_pictures_each_with_its_numbers(soup: BeautifulSoup) -> None:
    figures = soup.select("#pictures figure")
    assert [figure.h3.get_text() for figure in figures] == ["Utilisation by rule", "Velocity against its limit"]
    assert all(figure.find("svg") and figure.select("tbody tr") for figure in figures)


def test_ids_are_unique_and_every_reference_inside_the_page_has_its_place(soup: BeautifulSoup, page: str) -> None:
    ids = [element["id"] for element in soup.select("[id]")]
    assert len(ids) == len(set(ids))
    wanted = {match.strip("#") for match in re.findall(r'(?:href="|url\()(#[^")]+)', page)}
    assert wanted <= set(ids)


def test_every_approval_says_what_became_of_it(soup: BeautifulSoup) -> None:
    states = [row.find_all("td")[-1].get_text() for row in soup.select(".approvals-table tbody tr")]
    assert states == ["used", "stale"]


def test_a_rule_that_failed_is_named_beside_the_recommendation() -> None:
    page = render_html(make_review(lines=2, exceptions=1, points=0, faults=("rule npsh-margin: ValueError",)))
    assert "rule npsh-margin: ValueError" in BeautifulSoup(page, "html.parser").select_one("#recommendation").get_text()


@pytest.mark.parametrize("paged", [False, True])
@pytest.mark.parametrize("hostile", [False, True])
def test_nothing_outside_is_asked_for_and_nothing_runs(*, hostile: bool, paged: bool) -> None:
    page = render_html(make_review(hostile=hostile), paged=paged)
    soup = BeautifulSoup(page, "html.parser")
    assert not soup.find_all(["script", "iframe", "object", "embed", "link", "base", "form", "img"])
    attributes = {name.lower() for element in soup.find_all(True) for name in element.attrs}
    assert not [name for name in attributes if name.startswith("on")]
    for element in soup.find_all(True):
        for name in ("src", "href", "xlink:href", "action", "srcset", "data", "poster"):
            assert element.get(name, "#").startswith("#")
    for sheet in [*soup.find_all("style"), *soup.select("[style]")]:
        text = sheet.get("style") or sheet.get_text()
        assert "@import" not in text
        assert all(target.startswith("#") for target in re.findall(r"url\(\s*[\"']?([^\"')]*)", text))


def test_no_outside_address_stands_anywhere_in_the_page(page: str) -> None:
    assert not IMPORTS.search(page)
    assert all(not target or target.startswith("#") for pair in REFERENCES.findall(page) for target in pair)
    assert "://" not in page


def test_hostile_texts_leave_the_shape_of_the_page_unchanged(soup: BeautifulSoup, hostile_page: str) -> None:
    hostile = BeautifulSoup(hostile_page, "html.parser")
    for table in (".results-table", ".cells", ".rule-table", ".columns-table", ".tally"):
        plain_rows = [len(each.select("tr")) for each in soup.select(table)]
        assert [len(each.select("tr")) for each in hostile.select(table)] == plain_rows
        assert {len(row.find_all(["td", "th"], recursive=False)) for row in hostile.select(f"{table} tr")} == {
            len(row.find_all(["td", "th"], recursive=False)) for row in soup.select(f"{table} tr")
        }
    assert len(hostile("h1")) == 1
    assert len(hostile("style")) == len(soup("style"))


def test_hostile_texts_are_shown_as_they_were_written(hostile_page: str) -> None:
    text = BeautifulSoup(hostile_page, "html.parser").get_text()
    assert all(visible(hostile) in text for hostile in HOSTILE)
    assert "{{7*7}}" in text


def test_characters_that_hide_or_steer_are_written_out(hostile_page: str) -> None:
    assert not re.search(r"[\x00-\x08\x0b-\x1f\x7f-\x9f\u202a-\u202e\u2066-\u2069\ud800-\udfff]", hostile_page)
    assert "\\u202e" in hostile_page
    assert "esc\\x1b[31m" in hostile_page


def test_states_are_told_by_word_and_shape(soup: BeautifulSoup) -> None:
    for state in soup.select(".results-table .state"):
        shape, word = state.get_text().split(" ", 1)
        assert shape in "■◆▲●□"
        assert word in {"does not meet", "not checked", "near limit", "meets", "approved deviation"}


def test_many_exceptions_are_bounded_and_none_is_lost() -> None:
    review = make_review(lines=200, exceptions=620, points=0)
    soup = BeautifulSoup(render_html(review), "html.parser")
    assert len(soup.select("article.card")) == 500
    assert len(soup.select(".compact-exceptions tbody tr")) == 120
    assert "The 500 worst are written out in full; the other 120" in soup.select_one("#exceptions").get_text()


def test_paper_says_what_it_leaves_out() -> None:
    review = make_review(lines=1_100, exceptions=2, points=0)
    soup = BeautifulSoup(render_html(review, paged=True), "html.parser")
    assert len(soup.select(".results-table tbody tr")) == 1_000
    said = soup.select_one("#results .bounded").get_text()
    assert said == "Shown here: 1000 of 1100 lines. All of them are in exceptions.html."
    whole = BeautifulSoup(render_html(review), "html.parser")
    assert len(whole.select(".results-table tbody tr")) == 1_100


def test_an_empty_review_still_gives_every_section() -> None:
    review = make_review(
        lines=1, exceptions=0, points=0, approved=(), approvals=(), not_checked_groups=(),
        hold_items=(), unread_items=(), assumption_items=(), caution_items=(), service_matches=(),
        columns_matched=(), columns_unmatched=(), understood=(), reasons=(), tally={},
    )  # fmt: skip
    text = BeautifulSoup(render_html(review), "html.parser").get_text()
    assert "No outcome could be judged" in text
    assert "It does not replace the codes in force" in text


PROGRAM = """
import hashlib, sys
sys.path[:0] = sys.argv[1:]
from fake_review import make_review
from checker.report.html import render_html
from checker.report.pdf import render_pdf
review = make_review(lines=6, exceptions=4, points=20)
print(hashlib.sha256(render_html(review).encode()).hexdigest(), hashlib.sha256(render_pdf(review)).hexdigest())
"""


def test_same_review_same_bytes_in_another_time_zone_and_hash_order() -> None:
    here = Path(__file__).parent
    runs = [{"TZ": "UTC", "PYTHONHASHSEED": "1"}, {"TZ": "Pacific/Auckland", "PYTHONHASHSEED": "77"}]
    command = [sys.executable, "-c", PROGRAM, str(here), str(here.parents[1])]
    results = [subprocess.run(command, env=_environment(run), capture_output=True, text=True) for run in runs]
    assert [result.returncode for result in results] == [0, 0], results
    assert results[0].stdout == results[1].stdout != ""


def _environment(changes: dict[str, str]) -> dict[str, str]:
    import os

    return {**os.environ, **changes}
