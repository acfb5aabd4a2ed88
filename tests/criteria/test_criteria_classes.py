"""The class file: what a piping class says of a line, and everything that can be wrong with the file."""

from __future__ import annotations

from pathlib import Path

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from checker.criteria.classes import Classes, load_classes
from checker.criteria.load import DEFAULT
from checker.errors import InputError
from checker.model import Coded

HEADER = (
    "piping_class,size_from [NPS],size_to [NPS],schedule,wall_thickness [mm],material,corrosion_allowance [mm],"
    "flange_rating,roughness [mm]\n"
)
GOOD = HEADER + (
    "A1A,1/2,1-1/2,80,,carbon steel,1.5,150,0.05\n"
    "A1A,2,24,STD,,carbon steel,1.5,150,\n"
    "B2S,DN15,DN300,10S,,stainless steel,0,300,0.05\n"
    'B2S,"14""","24""",,6.35,stainless steel,0,300,0.05\n'
)


def load(tmp_path: Path, text: str, **options: dict[str, str]) -> Classes:
    path = tmp_path / "classes.csv"
    path.write_text(text, encoding="utf-8")
    return load_classes(path, **options)


def problems_of(tmp_path: Path, text: str) -> list[str]:
    with pytest.raises(InputError) as caught:
        load(tmp_path, text)
    return [str(problem) for problem in caught.value.problems]


def coded(*texts: str) -> Coded:
    distinct = tuple(dict.fromkeys(text for text in texts if text))
    return Coded(np.array([distinct.index(text) if text else -1 for text in texts], dtype=np.int32), distinct)


def test_look_up(tmp_path: Path) -> None:
    classes = load(tmp_path, GOOD)
    values = classes.look_up(
        piping_class=coded("A1A", "a1a ", "A1A", "B2S", "B2S", "C9", "", "A1A", "A1A"),
        size=np.array([1.5, 2.0, 24.0, 0.5, 16.0, 6.0, 6.0, np.nan, 26.0]),
    )
    assert [values.schedule.text(i) for i in range(9)] == ["80", "STD", "STD", "10S", "", "", "", "", ""]
    assert [values.material.text(i) for i in range(5)] == ["carbon steel"] * 3 + ["stainless steel"] * 2
    assert values.known.tolist() == [True] * 5 + [False] * 4
    assert values.class_known.tolist() == [True] * 5 + [False, False, True, True]
    assert values.row.tolist() == [2, 3, 3, 4, 5, 0, 0, 0, 0]
    assert values.wall_thickness[4] == pytest.approx(6.35e-3)
    assert np.isnan(values.wall_thickness[[0, 1, 2, 3, 5, 6, 7, 8]]).all()
    assert values.corrosion_allowance[:4] == pytest.approx([1.5e-3, 1.5e-3, 1.5e-3, 0.0])
    assert values.roughness[0] == pytest.approx(5e-5)
    assert np.isnan(values.roughness[[1, 5]]).all()
    assert [values.flange_rating.text(i) for i in (0, 3, 5)] == ["150", "300", ""]


def test_header_spellings_delimiters_and_unknown_columns(tmp_path: Path) -> None:
    text = "Pipe class;Size from [DN];Size to [DN];Sch;Remarks;CA (mm)\nA1A;50;150;40;old;3\n"
    classes = load(tmp_path, text)
    assert classes.unmatched == ("Remarks",)
    (row,) = classes.rows
    assert (row.size_from, row.size_to, row.schedule) == (2.0, 6.0, "40")
    assert row.corrosion_allowance == pytest.approx(3e-3)


def test_unit_from_the_cell_or_from_the_criteria(tmp_path: Path) -> None:
    text = "class,size_from,size_to,wall_thickness\nA,2,4,5.5 mm\n"
    assert load(tmp_path, text).rows[0].wall_thickness == pytest.approx(5.5e-3)
    bare = text.replace("5.5 mm", "5.5")
    assert "has no unit" in problems_of(tmp_path, bare)[0]
    assert load(tmp_path, bare, units={"diameter": "mm"}).rows[0].wall_thickness == pytest.approx(5.5e-3)


def test_an_open_item_is_no_value(tmp_path: Path) -> None:
    with pytest.raises(InputError) as caught:
        load(tmp_path, HEADER + "A,2,4,HOLD,TBC,-,,150,\n")
    assert len(caught.value.problems) == 2
    assert all("open item" in problem.what for problem in caught.value.problems)


def test_all_problems_at_once(tmp_path: Path) -> None:
    text = HEADER + (
        "A,2,7,40,,cs,1.5,150,0.05\n"  # 7 is no size
        "A,6,4,40,,cs,1.5,150,0.05\n"  # runs down
        "B,2,6,40,x,cs,-1,150,0.05\n"  # no number; negative
        "B,6,8,40,,cs,1.5 kg,150,0.05\n"  # overlaps; no length
        ",2,4,40,0,cs,1.5,150,0.05\n"  # no class; no wall
    )
    problems = problems_of(tmp_path, text)
    assert len(problems) == 8
    for row, column, words in (
        (2, "size_to [NPS]", "'7' is not a nominal size"),
        (3, "size_to [NPS]", "run from 6 down to 4"),
        (4, "wall_thickness [mm]", "'x' is not a number"),
        (4, "corrosion_allowance [mm]", "'-1' cannot be"),
        (5, "corrosion_allowance [mm]", "'kg' is not a unit of diameter"),
        (5, "size_from [NPS]", "class 'B': the sizes overlap those of row 4"),
        (6, "piping_class", "names no class"),
        (6, "wall_thickness [mm]", "'0' cannot be"),
    ):
        place = f"classes.csv, row {row}, column '{column}': "
        assert any(problem.startswith(place) and words in problem for problem in problems), (row, column, problems)


def test_a_schedule_that_is_no_word_of_the_standards(tmp_path: Path) -> None:
    (problem,) = problems_of(tmp_path, HEADER + "A,2,4,Sch. 40,,cs,1.5,150,0.05\nB,2,4,abc,,cs,1.5,150,0.05\n")
    assert problem.startswith("classes.csv, row 3, column 'schedule': 'abc' is no schedule of ASME B36.10M")


def test_a_known_schedule_that_a_size_does_not_have_is_no_matter_of_the_file(tmp_path: Path) -> None:
    """ASME B36.10M has no schedule 20 below NPS 8: the lines that use it are told so, not the file."""
    text = HEADER + "A,2,4,20,,cs,1.5,150,0.05\nB,2,4,20,3,cs,1.5,150,0.05\n"
    assert [row.schedule for row in load(tmp_path, text).rows] == ["20", "20"]


@pytest.mark.parametrize(
    ("row", "words"),
    [
        # ASME B36.10M, schedule 40: NPS 2 3.91 mm, NPS 3 5.49 mm, NPS 4 6.02 mm; 12.5 % of 3.91 mm is 0.489 mm.
        ("2,2,40,3.91", ""),
        ("2,2,40,3.45", ""),
        ("2,2,40,4.39", ""),
        ("2,2,40,3.42", "the wall 3.42 mm is more than 12.5 % off that of schedule '40', 3.91 mm, at NPS 2."),
        ("2,2,40,4.41", "the wall 4.41 mm is more than 12.5 % off that of schedule '40', 3.91 mm, at NPS 2."),
        ("3,4,40,5.8", ""),
        ("2,4,40,6.02", "3.91 mm, at NPS 2 and at larger sizes of the row."),
        ("2,4,40,", ""),
        ("2,4,,6.02", ""),
    ],
)
def test_a_wall_beside_a_schedule_is_the_schedules_own(tmp_path: Path, row: str, words: str) -> None:
    text = HEADER + f"A,{row},cs,1.5,150,0.05\n"
    if not words:
        assert load(tmp_path, text).rows
        return
    (problem,) = problems_of(tmp_path, text)
    assert problem.startswith("classes.csv, row 2, column 'wall_thickness [mm]': ")
    assert words in problem


@pytest.mark.parametrize(("cell", "words"), [("100.1", "no pipe is rougher than 100 mm"), ("-0.05", "cannot be")])
def test_a_roughness_that_no_pipe_has(tmp_path: Path, cell: str, words: str) -> None:
    (problem,) = problems_of(tmp_path, HEADER + f"A,2,4,40,,cs,1.5,150,{cell}\n")
    assert problem.startswith("classes.csv, row 2, column 'roughness [mm]': ")
    assert words in problem
    assert load(tmp_path, HEADER + "A,2,4,40,,cs,1.5,150,0\n").rows[0].roughness == 0.0


@pytest.mark.parametrize(
    ("text", "words"),
    [
        ("", "no row below a header"),
        (HEADER, "no row below a header"),
        ("class,size_from\nA,2\n", "no column 'size_to'"),
        ("class,size_from,size_to\nA,2,4\n", "neither a column 'schedule' nor 'wall_thickness'"),
        ("class,size_from,size_to,sch,schedule\nA,2,4,40,40\n", "a column before says the same"),
        ("class,size_from,size_to,sch\nA,2,4,40,50\n", "has 5 cells, the header 4"),
        ("class,size_from,size_to,wall [kg]\nA,2,4,40\n", "not a unit of diameter"),
        ("class,size_from [bar],size_to,sch\nA,2,4,40\n", "no unit of a nominal size"),
        ('class,size_from,size_to,sch\nA,2,4,"40\n', "the row cannot be read"),
    ],
)
def test_headers_and_form(tmp_path: Path, text: str, words: str) -> None:
    assert any(words in problem for problem in problems_of(tmp_path, text))


def test_a_cell_over_two_lines_keeps_the_row_numbers(tmp_path: Path) -> None:
    text = 'class,size_from,size_to,sch,remarks\nA,2,4,40,"two\nlines"\n\nB,2,7,40,\n'
    (problem,) = problems_of(tmp_path, text)
    assert "row 5" in problem


def test_missing_file(tmp_path: Path) -> None:
    with pytest.raises(InputError, match="no such file to read as class file"):
        load_classes(tmp_path / "none.csv")


def test_the_blank_class_file_is_valid() -> None:
    classes = load_classes(DEFAULT.with_name("template_classes.csv"))
    assert classes.unmatched == ()
    assert len(classes.rows) == 4


@settings(max_examples=50, deadline=None)
@given(
    rows=st.lists(
        st.tuples(
            st.sampled_from(["EXAMPLE-1", "example-2", "EXAMPLE-3", ""]),
            st.sampled_from([0.5, 1.5, 2.0, 12.0, 13.0, 14.0, 24.0, 30.0, np.nan]),
        ),
        min_size=1,
        max_size=20,
    )
)
def test_one_by_one_equals_all_at_once(rows: list[tuple[str, float]]) -> None:
    classes = load_classes(DEFAULT.with_name("template_classes.csv"))
    together = classes.look_up(piping_class=coded(*(row[0] for row in rows)), size=np.array([row[1] for row in rows]))
    for index, (name, size) in enumerate(rows):
        alone = classes.look_up(piping_class=coded(name), size=np.array([size]))
        assert alone.row[0] == together.row[index]
        assert alone.schedule.text(0) == together.schedule.text(index)
        np.testing.assert_array_equal(alone.wall_thickness[0], together.wall_thickness[index])
