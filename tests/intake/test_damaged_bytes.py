"""A list that is UTF-8 but for a byte or two keeps its good rows and says so."""

from __future__ import annotations

from pathlib import Path

import numpy as np

from checker.intake import read_line_list
from checker.model import Gap

HEADER = "Line No,Phase,Flow [kg/h],Oper. Temp. [°C],Density [kg/m³],Remarks\n".encode()


def test_one_bad_byte_spoils_its_own_cell_only(tmp_path: Path) -> None:
    path = tmp_path / "list.csv"
    path.write_bytes(HEADER + b"A,L,100,20,997,caf\xe9\nB,L,1\xe90,20,997,\nC,L,300,20,997,\n")
    listed = read_line_list(path)
    assert listed.numbers["temperature"].tolist() == [293.15] * 3
    assert np.isnan(listed.numbers["flow_mass"]).tolist() == [False, True, False]
    assert listed.gaps["flow_mass"].tolist() == [Gap.GIVEN, Gap.REFUSED, Gap.GIVEN]
    assert any("text row 2" in note and "2 bytes are not" in note for note in listed.notes)


def test_a_windows_file_is_still_read_as_one(tmp_path: Path) -> None:
    path = tmp_path / "list.csv"
    path.write_bytes(HEADER.decode().encode("cp1252") + b"A,L,100,20,997,caf\xe9\n")
    listed = read_line_list(path)
    assert listed.numbers["temperature"].tolist() == [293.15]
    assert any("Windows-1252" in note for note in listed.notes)
