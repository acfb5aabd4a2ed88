"""Encodings: told by the mark, the NUL pattern, UTF-8 itself, the trade's signs; else Windows-1252, and said so."""

from __future__ import annotations

from pathlib import Path

import pytest
from lists import read

from checker.intake.encodings import tell_encoding, unmarked_wide_encoding

WESTERN = (
    "Line No,Service,Flow [kg/h],Oper Temp [°C],Density [kg/m³],Remarks\n"
    "P-1,eau glacée,100,20,998,Ø 150 über 5 µm\n"
    "P-2,Kühlwasser,200,25,997,à vérifier\n"
)
SERVICES = {
    "cp1251": ("Вода оборотная подающая", "Пар низкого давления", "Конденсат возвратный"),
    "gb18030": ("冷却循环水供水管道", "低压蒸汽管道系统", "工艺凝结水回收管道"),
    "cp932": ("冷却水供給ライン", "低圧蒸気ヘッダー配管", "プロセス凝縮水の回収"),
}


def lines_in(encoding: str) -> bytes:
    rows = [f"P-{index},{service},100,20,998" for index, service in enumerate(SERVICES[encoding])]
    return "\n".join(["Line No,Service,Flow [kg/h],Oper Temp [degC],Density [kg/m3]", *rows, ""]).encode(encoding)


@pytest.mark.parametrize(
    ("encoding", "words"),
    [("cp1252", "Windows-1252"), ("cp850", "code page 850 (DOS)"), ("mac_roman", "Mac Roman")],
)
def test_the_trades_signs_tell_western_encodings_apart(tmp_path: Path, encoding: str, words: str) -> None:
    content = WESTERN.encode(encoding, "replace")
    listed = read(tmp_path, content)
    assert listed.number("temperature").tolist() == [293.15, 298.15]
    assert listed.text("service").text(0) == "eau glacée"
    assert any(note.startswith("Not UTF-8 (byte ") and f"read as {words}" in note for note in listed.notes)


@pytest.mark.parametrize("encoding", list(SERVICES))
def test_words_in_another_script(tmp_path: Path, encoding: str) -> None:
    listed = read(tmp_path, lines_in(encoding))
    assert listed.text("service").texts == SERVICES[encoding]
    assert any("told by its signs" in note for note in listed.notes)
    assert listed.number("temperature").tolist() == [293.15] * 3


def test_without_a_clear_sign_windows_1252_is_read_and_said(tmp_path: Path) -> None:
    listed = read(tmp_path, "Line No,Service,Temp [degC]\nP-1,café,20\n".encode("cp1252"))
    assert listed.text("service").text(0) == "café"
    note = next(note for note in listed.notes if "Windows-1252" in note)
    assert note.startswith("Not UTF-8 (byte 35): read as Windows-1252; check signs such as the degree sign")
    assert tell_encoding(b"caf\x8e", 3)[0] == "cp1252"


def test_a_tie_is_no_answer() -> None:
    cubes = "m³".encode("cp1252") + b" " + "m³".encode("cp850")
    assert tell_encoding(cubes, 1)[0] == "cp1252"


def test_utf_8_with_more_bad_bytes_than_good_signs_stays_utf_8(tmp_path: Path) -> None:
    head = "Line No,From,Temp [°C]\n".encode()
    listed = read(tmp_path, head + b"P-1,\xff\xfe\xa8,20\nP-2,A,30\n")
    assert listed.number("temperature").tolist() == [293.15, 303.15]
    assert any("3 bytes are not" in note for note in listed.notes)


def test_utf_7_is_never_decoded(tmp_path: Path) -> None:
    listed = read(tmp_path, b"Line No,Temp [K],Remarks\nP-1,300,+ADw-script+AD4-\n")
    assert listed.text("remarks").text(0) == "+ADw-script+AD4-"


def test_a_lone_nul_is_no_wide_encoding() -> None:
    assert unmarked_wide_encoding(b"Line No,Temp\nP-1,\0\n") == ""
    assert unmarked_wide_encoding(b"\0" * 600 + b"Line No,Temp\n") == ""
    assert unmarked_wide_encoding(b"") == ""
    assert unmarked_wide_encoding(b"ab") == ""


def test_a_refusal_for_want_of_headers_says_how_the_file_was_read(tmp_path: Path) -> None:
    with pytest.raises(Exception, match=r"no table found(.|\n)*The file was read so: Encoding UTF-8\. Cells parted by"):
        read(tmp_path, "abc,def\n1,2\n")
