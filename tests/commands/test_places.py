"""Where the commands write: never over an input, a device or a link; the place is tried before the work."""

from __future__ import annotations

import os
from pathlib import Path

from click.testing import CliRunner

from checker.cli import main

LIST = "Line No,Service,Phase,Size (NPS),Sch,Flow [m3/h],Density [kg/m3]\nA,CWS,L,6,40,100,997\n"


def listed(folder: Path) -> Path:
    path = folder / "list.csv"
    path.write_text(LIST, encoding="utf-8")
    return path


def test_a_fifo_is_not_replaced_by_a_file(tmp_path: Path) -> None:
    fifo = tmp_path / "fifo"
    os.mkfifo(fifo)
    result = CliRunner().invoke(main, ["gate", str(listed(tmp_path)), "--json", str(fifo)])
    assert result.exit_code == 2
    assert "no ordinary file" in result.stderr
    assert fifo.is_fifo()


def test_a_link_is_followed_to_the_file_it_names(tmp_path: Path) -> None:
    target, link = tmp_path / "target.json", tmp_path / "link.json"
    target.write_text("{}", encoding="utf-8")
    link.symlink_to(target)
    CliRunner().invoke(main, ["gate", str(listed(tmp_path)), "--json", str(link)])
    assert link.is_symlink()
    assert "recommendation" in target.read_text(encoding="utf-8")


def test_a_link_to_an_input_is_still_an_input(tmp_path: Path) -> None:
    path, link = listed(tmp_path), tmp_path / "link.json"
    link.symlink_to(path)
    result = CliRunner().invoke(main, ["gate", str(path), "--json", str(link)])
    assert result.exit_code == 2
    assert path.read_text(encoding="utf-8") == LIST


def test_a_filled_template_is_judged(tmp_path: Path) -> None:
    """The blank list with one complete line, the template's own criteria and classes: nothing is asked in vain."""
    CliRunner().invoke(main, ["template", str(tmp_path)])
    header = (tmp_path / "line_list.csv").read_text(encoding="utf-8").strip().split(",")
    line = {
        "line_number": "L-1", "service": "cooling water", "phase": "liquid", "size [NPS]": "6",
        "piping_class": "EXAMPLE-1", "case": "normal", "flow_mass [kg/h]": "100000", "pressure [barg]": "4",
        "pressure_basis": "inlet", "temperature [degC]": "25", "density [kg/m3]": "997", "viscosity [cP]": "0.89",
        "vapour_pressure [bara]": "0.032", "length [m]": "50", "fittings": "2 x elbow 90 LR",
        "elevation_change [m]": "0", "pressure_drop_allowed [bar]": "1", "pressure_design [barg]": "10",
        "temperature_design [degC]": "60", "temperature_design_minimum [degC]": "-10",
    }  # fmt: skip
    assert set(line) <= set(header)
    path = tmp_path / "filled.csv"
    path.write_text(",".join(header) + "\n" + ",".join(line.get(name, "") for name in header) + "\n", encoding="utf-8")
    given = ["--criteria", str(tmp_path / "criteria.toml"), "--classes", str(tmp_path / "classes.csv")]
    result = CliRunner().invoke(main, ["gate", str(path), *given])
    assert float(result.stdout.split("checked ")[1].split(" %")[0]) > 80.0, result.stdout
