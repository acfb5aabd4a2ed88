"""The commands as a person or a CI job calls them: what they say, what they write, how they end."""

from __future__ import annotations

import json
import subprocess
import sys
from pathlib import Path

import pytest
from click.testing import CliRunner, Result

from checker.cli import main

EXAMPLE = Path(__file__).parents[2] / "example_linelists"
GIVEN = ["--criteria", str(EXAMPLE / "criteria.toml"), "--classes", str(EXAMPLE / "classes.csv")]
LIST = EXAMPLE / "marrowquay_rev_a.csv"

HEADER = (
    "Line No.,Service,Phase,Size (NPS),Sch.,Flow [kg/h],Oper. Press. [barg],Oper. Temp. [degC],"
    "Density [kg/m3],Viscosity [cP],Length [m],Fittings,Elev. Change [m],Material"
)
GOOD_ROW = '"6""-CWS-1-B1A",CWS,L,"6""",40,100000,4.0,25,997,0.89,50,none,0,carbon steel'


def run(*arguments: str) -> Result:
    return CliRunner().invoke(main, list(arguments))


def written(folder: Path, *rows: str, header: str = HEADER) -> Path:
    path = folder / "list.csv"
    path.write_text("\n".join([header, *rows]) + "\n", encoding="utf-8")
    return path


def test_gate_on_the_example_asks_for_a_revision() -> None:
    result = run("gate", str(LIST), *GIVEN)
    assert result.exit_code == 1
    assert result.stdout.splitlines()[0].startswith("checked ")
    assert result.stdout.splitlines()[1] == "revise and resubmit"


def test_gate_ends_with_0_where_all_is_met_and_says_default_criteria(tmp_path: Path) -> None:
    result = run("gate", str(written(tmp_path, GOOD_ROW.replace("CWS,L", "pump discharge,L"))))
    assert result.exit_code == 0
    assert result.stdout.splitlines()[:2] == [
        "checked 100.0 %, not checked 0.0 %",
        "screened on default criteria: no comments",
    ]


def test_gate_never_ends_with_0_where_nothing_could_be_judged(tmp_path: Path) -> None:
    held = '"6""-CWS-1-B1A",CWS,HOLD,"6""",HOLD,100000,4.0,25,997,0.89,50,none,0,carbon steel'
    result = run("gate", str(written(tmp_path, held)))
    assert result.exit_code == 1
    # Rules on the list's own figures could be told; they are no part of the share.
    assert result.stdout.startswith("checked 0.0 %, not checked 100.0 %")
    assert "incomplete" in result.stdout


def test_gate_refuses_a_list_of_which_no_number_can_be_read(tmp_path: Path) -> None:
    held = '"6""-CWS-1-B1A",HOLD,HOLD,HOLD,HOLD,HOLD,HOLD,HOLD,HOLD,HOLD,HOLD,HOLD,HOLD,HOLD'
    result = run("gate", str(written(tmp_path, held)))
    assert result.exit_code == 2
    assert "not one number" in result.stderr


@pytest.mark.parametrize(
    ("content", "said"),
    [
        ("", "empty"),
        (HEADER + "\n", "no line"),
        ("Service,Phase,Size (NPS),Flow [kg/h],Density [kg/m3]\nCWS,L,6,5,1\n", "line-number"),
    ],
)
def test_a_list_without_lines_is_refused_with_status_2(tmp_path: Path, content: str, said: str) -> None:
    path = tmp_path / "list.csv"
    path.write_text(content, encoding="utf-8")
    result = run("gate", str(path))
    assert result.exit_code == 2
    assert said in result.stderr.lower()
    assert "list.csv" in result.stderr


def test_a_file_that_is_not_there_is_named(tmp_path: Path) -> None:
    result = run("gate", str(tmp_path / "nowhere.csv"))
    assert result.exit_code == 2
    assert "nowhere.csv" in result.stderr


def test_all_faults_of_a_criteria_file_are_told_at_once(tmp_path: Path) -> None:
    criteria = tmp_path / "criteria.toml"
    criteria.write_text(
        '[[service]]\nname = "x"\nmatches = ["X"]\nvelocity_maximum = "3 bar"\nvelocity_minimun = "1 m/s"\n'
        'pressure_gradient_maximum = "1 bar / 100 furlongs"\n',
        encoding="utf-8",
    )
    result = run("gate", str(LIST), "--criteria", str(criteria))
    assert result.exit_code == 2
    for word in ("velocity_maximum", "velocity_minimun", "pressure_gradient_maximum"):
        assert word in result.stderr


def test_a_rule_that_fails_ends_with_status_3(tmp_path: Path) -> None:
    folder = tmp_path / "own"
    folder.mkdir()
    (folder / "own.py").write_text(
        "from checker.ruling.contract import Source, rule\n"
        '@rule(id="own-fault", title="T", force="note", sense="at most", source=Source("s"), calculation="")\n'
        "def fails(*, length):\n"
        '    """Fail."""\n'
        "    raise RuntimeError('on purpose')\n",
        encoding="utf-8",
    )
    result = run("gate", str(written(tmp_path, GOOD_ROW)), "--rules", str(folder))
    assert result.exit_code == 3
    assert "own-fault" in result.stderr
    assert "on purpose" in result.stderr


def test_gate_writes_json_only_when_asked(tmp_path: Path) -> None:
    target = tmp_path / "outcomes.json"
    result = run("gate", str(LIST), *GIVEN, "--json", str(target), "--quiet")
    assert result.exit_code == 1
    assert json.loads(target.read_text(encoding="utf-8"))["recommendation"].endswith("revise and resubmit")
    assert sorted(path.name for path in tmp_path.iterdir()) == ["outcomes.json"]


def test_calculation_prints_the_sheet_of_one_line() -> None:
    number = '4"-CWS-3110-B1A'
    result = run("calculation", str(LIST), number, *GIVEN)
    assert result.exit_code == 0
    for text in (number, "does not meet", "closing error", "column", "kinetic energy"):
        assert text in result.stdout, text


def test_calculation_of_an_unknown_line_names_the_closest() -> None:
    result = run("calculation", str(LIST), '4"-CWS-3110-B1B', *GIVEN)
    assert result.exit_code == 2
    assert '4"-CWS-3110-B1A' in result.stderr


def test_rules_and_fields_are_listed() -> None:
    assert "npsh-margin" in run("rules").stdout
    assert "ANSI/HI" in run("rules", "npsh-margin").stdout
    unknown = run("rules", "npsh-margins")
    assert unknown.exit_code == 2
    assert "npsh-margin" in unknown.stderr
    assert "flow_mass" in run("fields").stdout


def test_template_writes_what_reads_back_and_leaves_files_alone(tmp_path: Path) -> None:
    assert run("template", str(tmp_path)).exit_code == 0
    names = sorted(path.name for path in tmp_path.iterdir())
    assert names == [
        "classes.csv",
        "criteria.toml",
        "deviations.csv",
        "equipment.csv",
        "line_list.csv",
        "line_list.xlsx",
    ]
    (tmp_path / "criteria.toml").write_text("mine", encoding="utf-8")
    assert "left as it is" in run("template", str(tmp_path)).stdout
    assert (tmp_path / "criteria.toml").read_text(encoding="utf-8") == "mine"
    (tmp_path / "criteria.toml").unlink()
    run("template", str(tmp_path))
    header = (tmp_path / "line_list.csv").read_text(encoding="utf-8").strip().split(",")
    row = ",".join("L-1" if name == "line_number" else "" for name in header)
    filled = written(tmp_path, row, header=",".join(header))
    result = run(
        "gate", str(filled), "--criteria", str(tmp_path / "criteria.toml"), "--classes", str(tmp_path / "classes.csv"),
        "--deviations", str(tmp_path / "deviations.csv"),
    )  # fmt: skip
    assert result.exit_code in (1, 2), result.stderr
    assert "two columns" not in result.stderr.lower()


def test_inputs_are_left_as_they_were_and_no_import_is_heavy() -> None:
    """The gate imports none of the heavy libraries, and reads its inputs only."""
    before = {path.name: path.read_bytes() for path in EXAMPLE.iterdir() if path.is_file()}
    code = (
        "import sys\nfrom checker.cli import main\n"
        f"try:\n    main(['gate', {str(LIST)!r}, *{GIVEN!r}])\n"
        "except SystemExit as end:\n    print('status', end.code)\n"
        "heavy = {'pandas', 'weasyprint', 'matplotlib', 'CoolProp', 'pint', 'jsonschema', 'fluids', 'scipy'}\n"
        "print(sorted(heavy & set(sys.modules)))\n"
    )
    done = subprocess.run([sys.executable, "-c", code], capture_output=True, text=True, check=True)
    assert done.stdout.splitlines()[-2:] == ["status 1", "[]"]
    assert {path.name: path.read_bytes() for path in EXAMPLE.iterdir() if path.is_file()} == before
