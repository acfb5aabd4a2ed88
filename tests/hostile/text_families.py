# ruff: noqa: RUF001
"""Families of hostile texts: damaged, lying, swollen, or written as no reader expects.

Each family states what must come of it: the list is read or refused, and words that the messages must then hold; some
also look at the list itself. The traits were put together from memory, from common practice in line lists, and from
what plain library readers do with such files.
"""

from __future__ import annotations

import codecs
import gzip
from collections.abc import Callable, Iterable
from typing import NamedTuple

import numpy as np

from checker.model import Gap, LineList

__all__ = ["Expectation", "Family", "large_families", "small_families"]

HEADER = (
    "Line No,Size,From,To,Fluid,Flow (kg/h),Oper Press (barg),Oper Temp (°C),Density (kg/m3),Viscosity (cP),"
    "Length (m),Remarks"
)
ROW = '"6""-P-1001-A1A","6""",P-101A,E-102,water,50000,4.5,60,983,0.466,42,'
WIDTH = HEADER.count(",") + 1
LOCK = "~$"


class Expectation(NamedTuple):
    """What must come of a text: ``reads`` or ``refused``, words of what is said, and a look at the list."""

    outcome: str
    words: tuple[str, ...] = ()
    look: Callable[[LineList], None] | None = None


class Family(NamedTuple):
    """One hostile text: its name, how its bytes are made, the name of its file, and what must come of it."""

    name: str
    build: Callable[[], bytes]
    file: str
    expectation: Expectation


def _bytes(text: str | bytes) -> bytes:
    return text if isinstance(text, bytes) else text.encode()


def _reads(
    name: str, text: str | bytes, *words: str, look: Callable[[LineList], None] | None = None, file: str = "list.csv"
) -> Family:
    return Family(name, lambda: _bytes(text), file, Expectation("reads", words, look))


def _refused(name: str, text: str | bytes, *words: str, file: str = "list.csv") -> Family:
    return Family(name, lambda: _bytes(text), file, Expectation("refused", words))


def quoted(cell: str) -> str:
    """Return a cell quoted for CSV."""
    return '"' + cell.replace('"', '""') + '"'


def row_with(**cells: str) -> str:
    """Return a row of the common table with some cells of its own, by position as ``c0``, ``c5``."""
    base = ['6"-P-1001-A1A', '6"', "P-101A", "E-102", "water", "50000", "4.5", "60", "983", "0.466", "42", ""]
    for place, cell in cells.items():
        base[int(place[1:])] = cell
    return ",".join(map(quoted, base))


def table(*rows: str, header: str = HEADER, end: str = "\r\n") -> str:
    """Return a table of rows beneath the common header."""
    return end.join([header, *rows, ""])


def column(header: str, cells: Iterable[str]) -> str:
    """Return a list with one column of interest beside a density that reads."""
    rows = [f"P-{index},{quoted(cell)},998" for index, cell in enumerate(cells, start=1)]
    return "\n".join([f"Line No,{quoted(header)},Density (kg/m3)", *rows, ""])


def gaps(listed: LineList, field: str) -> list[Gap]:
    """Return the gaps of a field."""
    return [Gap(int(gap)) for gap in listed.gap(field)]


def look_lines(count: int) -> Callable[[LineList], None]:
    """Return a look that counts the lines."""

    def look(listed: LineList) -> None:
        assert len(listed.line_number) == count, listed.line_number

    return look


def look_each_reads_as(field: str, value: float, at_least: int) -> Callable[[LineList], None]:
    """Return a look at cells that all write one value: each reads as it or is refused, none half-way."""

    def look(listed: LineList) -> None:
        numbers = listed.number(field)
        given = np.isfinite(numbers)
        assert int(given.sum()) >= at_least, [listed.cell(field, index) for index in np.flatnonzero(~given)]
        assert np.allclose(numbers[given], value, rtol=1e-9)
        assert set(gaps(listed, field)) <= {Gap.GIVEN, Gap.REFUSED}

    return look


def look_all(field: str, *allowed: Gap) -> Callable[[LineList], None]:
    """Return a look at the gaps of a field."""

    def look(listed: LineList) -> None:
        assert set(gaps(listed, field)) <= set(allowed), list(
            zip(listed.line_number, gaps(listed, field), strict=False)
        )

    return look


def formulas() -> list[Family]:
    """Cells that a spreadsheet would compute, and honest ones that begin the same way."""
    hostile = [
        "=1+1", "=cmd|' /C echo x'!A0", "@SUM(1+1)", "+1+1", "-1+1", "\t=1+1",
        '=HYPERLINK("http://example.invalid","x")',
        "\uff1d1+1", '=IMPORTXML("http://example.invalid","//a")', "=DDE(\"a\";\"b\";\"c\")", "%0A-1+1", "\r=1",
    ]  # fmt: skip
    honest = ["-45", "+60", "-29", "-0.5", "+0"]
    rows = [row_with(c0=cell, c4=cell, c11=cell) for cell in hostile]
    temperatures = column("Oper Temp (°C)", [*honest, "-", "=1+1", "@45", "+-1"])

    def look(listed: LineList) -> None:
        expected = [Gap.GIVEN] * len(honest) + [Gap.BLANK] + [Gap.REFUSED] * 3
        assert gaps(listed, "temperature") == expected
        assert np.allclose(listed.number("temperature")[:5] - 273.15, [-45, 60, -29, -0.5, 0])

    return [
        _reads("h01 formulas in texts", table(*rows), look=look_lines(len(hostile))),
        _reads("h01 formulas among temperatures", temperatures, look=look),
    ]


def markup() -> list[Family]:
    """Markup, template signs, addresses and paths, in tags, headers and remarks."""
    texts = [
        "<script>alert(1)</script>", "</td></tr></table><h1>x", "<img src=x onerror=alert(1)>", "{{7*7}}", "{% raw %}",
        "${7*7}", "&lt;b&gt;", "<!--", "]]>", "<svg/onload=alert(1)>", "javascript:alert(1)", "\"'><b>",
        "<style>*{display:none}",
        "file:///etc/passwd", "http://example.invalid/x.png", "\\\\server\\share", "data:text/html,<b>x",
        "../../../../etc/passwd",
        '<link rel=attachment href="file:///etc/passwd">', "url(file:///etc/passwd)", "CON", "NUL", "-rf",
        "$(touch x)", "`id`",
        "a" * 300, "..", "/", "?q=1#x", "%2e%2e%2f",
    ]  # fmt: skip
    rows = [row_with(c0=text, c2=text, c11=text) for text in texts]
    header = f"{HEADER},<script>alert(2)</script>"
    return [
        _reads("h02 h03 h26 markup, addresses and paths", table(*rows), look=look_lines(len(texts))),
        _reads("h02 markup in a header", table(f"{ROW},x", header=header), look=look_lines(1)),
    ]


def control_characters() -> list[Family]:
    """NUL, ESC and the like."""
    return [
        _refused(
            "h04a a NUL in a cell", table(ROW, row_with(c4="wa\0ter")), "NUL character at character", "text row 3"
        ),
        _refused("h04b NULs first", "\0" * 512 + table(ROW), "NUL character at character 1", "text row 1, character 1"),
        _reads(
            "h04c ESC, DEL, BEL in texts and numbers",
            table(row_with(c0="P-\x1b[31m1\x7f", c5="50\x1b[0m", c11="\x07bell\x1b]0;x\x07"), ROW),
            look=lambda listed: _is(gaps(listed, "flow_mass"), [Gap.REFUSED, Gap.GIVEN]),
        ),
        _reads("h04d Ctrl-Z ends nothing", table(ROW, "\x1a", ROW), look=None),
    ]


def _is(found: object, expected: object) -> None:
    assert found == expected, found


def rows_of_any_width() -> list[Family]:
    """Short and long rows, notes, commas without quotation marks."""
    rows = [
        ROW, "P-short,6", f"{ROW},extra,extra2", "", '""', ",,,", "P-77", "NOTES: 1. HOLD on this line",
        'P-2,6,A,B,water,"50,000",4.5,60,983,1,1,', "P-3,6,A,B,water,50000,4.5,60,983,0.466,42,unquoted, comma",
        ",6,A,B,water,50000,4.5,60,983,1,1,x", "TOTAL,,,,,100000", HEADER, "Page 3 of 12",
    ]  # fmt: skip
    words = ("an unquoted delimiter may have moved", "it is a note", "it is a total", "it repeats the header")
    return [
        _reads("h06 ragged rows", table(*rows), *words, look=look_lines(6)),
        _reads(
            "h08b grouped headers",
            "Line No,Operating,,Design,\n,Press [barg],Temp [°C],Press [barg],Temp [°C]\nP-1,4,60,7,90\n",
        ),
        _refused(
            "h08 headers twice",
            "Line No,Size,Size,Temp [K],TEMP. [K]\nP-1,6,8,300,310\n",
            "two columns for the field size",
        ),
    ]


def not_numbers() -> list[Family]:
    """Words, and what `float` takes by accident."""
    words = [
        "",
        " ",
        "-",
        "--",
        "\u2014",
        "N/A",
        "n.a.",
        "NA",
        "none",
        "nil",
        "HOLD",
        "TBC",
        "TBA",
        "VTA",
        "LATER",
        "BY VENDOR",
    ]
    refused = [
        "NaN", "nan", "inf", "-inf", "Infinity", "1e309", "#N/A", "#REF!", "#DIV/0!", "null", "?", "???", "*",
        "**", "x",
        "see note 3", "REFER P&ID", "DITTO", "-do-", "same as above", "\u2193", "\u221e", "Saturated", "Undefined",
        "true",
        "1_000", "0x1F", "1e", "e5", "\u0663", "\u0661\u0662", "\u2163", "\u00bd", "1.2.3", "1,2,3",
        "[3.967, 76.39]", "12:30",
    ]  # fmt: skip
    known = (Gap.BLANK, Gap.HOLD, Gap.NOT_APPLICABLE)

    def look(listed: LineList) -> None:
        first, *others = gaps(listed, "temperature")
        assert first is Gap.GIVEN
        assert set(others[: len(words)]) <= set(known)
        wrong = [text for text, gap in zip(refused, others[len(words) :], strict=True) if gap is not Gap.REFUSED]
        assert not wrong, wrong

    cells = column("Oper Temp (°C)", ["60", *words, *refused])
    return [_reads("h09 words and accidental numbers", cells, look=look)]


def physics() -> list[Family]:
    """States that no fluid has."""
    impossible = {
        "c6": ["-2", "-1.01325", "-0.1 bara", "1e308"], "c7": ["-300", "-273.15", "-1 K", "99999"],
        "c8": ["0", "-1", "1e9"],
        "c9": ["0", "-1", "1e309"], "c10": ["-1", "1e300"], "c5": ["1e308", "1e309", "-5"],
        "c1": ["0", "-6", "1e-9", "9999"],
    }  # fmt: skip
    rows = [row_with(**{place: value}) for place, values in impossible.items() for value in values]
    odd = [row_with(c5="5e-324"), row_with(c5="-0"), row_with(c7="-40", c4="ice"), row_with(c7="800", c4="water")]

    def look(listed: LineList) -> None:
        assert not any(np.isinf(values).any() for values in listed.numbers.values())
        refused = np.sum([gap == Gap.REFUSED for gap in listed.gaps.values()], axis=0)
        assert refused[0] == 0
        assert (refused[1 : len(rows) + 1] == 1).all(), np.flatnonzero(refused[1 : len(rows) + 1] != 1)

    return [_reads("h10 impossible physics", table(ROW, *rows, *odd), look=look)]


def line_ends() -> list[Family]:
    """Every end of line there is, between records and inside cells."""
    mixed = HEADER + "\r\n" + ROW + "\n" + ROW + "\r" + ROW + "\n\r" + ROW + "\r\n"
    moved = HEADER + "\n" + ROW + "\x0b" + ROW + "\x0c" + ROW + "\n" + ROW + "\n"
    inside = table(row_with(c11="a\u2028b\u0085c\u2029d"), ROW)
    broken = table(row_with(c0='6"-P-1301-\nA1A', c11="HOLD 1\nHOLD 2"), ROW)
    return [
        _reads("h13a ends of lines mixed", mixed, look=look_lines(4)),
        _reads("h13a records run together", moved, "control character that breaks lines", look=look_lines(2)),
        _reads("h13b carriage returns alone", table(*[ROW] * 8, end="\r"), look=look_lines(8)),
        _reads("h13c Unicode ends of lines inside cells", inside, look=look_lines(2)),
        _reads("h13d a line number over two lines", broken, "joined by one blank", look=look_lines(2)),
    ]


def encodings() -> list[Family]:
    """The same table in many encodings, and in two at once."""
    text = table(row_with(c4="eau glacée", c11="Ø 150 < 5 µm"), row_with(c4="Kühlwasser"))
    degree = look_each_reads_as("temperature", 333.15, 2)
    named = {
        "cp1252": "Windows-1252", "latin-1": "Windows-1252", "cp850": "code page 850", "mac_roman": "Mac Roman",
        "utf-8-sig": "stated by the file's byte-order mark", "utf-16": "UTF-16", "utf-32": "UTF-32",
        "utf-16-le": "told by its NUL bytes", "utf-16-be": "told by its NUL bytes",
    }  # fmt: skip
    found = [_reads(f"h14 {name}", text.encode(name, "replace"), words, look=degree) for name, words in named.items()]
    scripts = {
        "cp1251": ("Вода оборотная", "Пар низкого давления", "Конденсат возвратный"),
        "gb18030": ("冷却循环水供水", "低压蒸汽管道", "工艺凝结水回收"),
        "shift_jis": ("冷却水供給ライン", "低圧蒸気ヘッダー", "プロセス凝縮水"),
    }
    for name, fluids in scripts.items():
        rows = table(*(row_with(c4=fluid) for fluid in fluids), header=HEADER.replace("°C", "degC"))
        found.append(_reads(f"h14 {name}", rows.encode(name), "told by its signs", look=look_lines(3)))
    two = table(row_with(c7="60 °C")).encode() + row_with(c7="60 °C").encode("cp1252") + b"\r\n"
    return [
        *found,
        _reads("h14 encoded twice", text.encode().decode("cp1252").encode(), "encoded twice"),
        _reads(
            "h14 two encodings in one file", two, "1 byte is not", look=look_each_reads_as("temperature", 333.15, 1)
        ),
        _reads(
            "h14 bytes that are none",
            table(ROW).encode() + b'6"-P-1,6",\xff\xfe\xc3(\xed\xa0\x80,E,w,5,1,20,998,1,1,\xc0\xaf\n',
        ),
        _reads(
            "h14 two marks", codecs.BOM_UTF8 * 2 + table(ROW).encode(), "second byte-order mark", look=look_lines(1)
        ),
        _refused("h14 UTF-7", "+AGw-ine No,Size\n+ADw-script+AD4-,6\n", "no table found"),
    ]


def empty_texts() -> list[Family]:
    """Nothing, next to nothing, and headers without lines."""
    title = "LINE LIST,,\nProject,Marrowquay,\nRev,A,\nSheet,1 of 3,\n"
    return [
        _refused("h15a no bytes", b"", "empty: no table found"),
        _refused("h15b a mark only", codecs.BOM_UTF8, "empty: no table found"),
        _refused("h15c blanks", "   \r\n\t\r\n  ", "empty: no table found"),
        _refused("h15d commas", ",,,\n,,,\n", "no table found"),
        _refused("h16a header only", HEADER + "\n", "no lines"),
        _refused("h16b header and units", f"{HEADER}\n,inch,,,,kg/h,barg,degC,kg/m3,cP,m,\n", "no lines"),
        _refused("h16c no header", f"{ROW}\n{ROW}\n", "no table found"),
        _refused("h16d header last", f"{ROW}\n{HEADER}\n", "no lines"),
        _refused("h16e title block only", title, "no table found"),
    ]


def spellings() -> list[Family]:
    """Units, sizes and numbers in look-alike signs: accepted whole or refused, never by halves."""
    degrees = [
        "°C", "ºC", "˚C", "◦C", "℃", " °C", "° C", "degC", "deg C", "deg.C", "DEG C", "C", "c", "oC", "0C",
        "Celsius", "°c", "\u00b0\u0421",
        "gradC", "'C", "\u2070C", "\u1d52C", "\u00b0\u200bC",
    ]  # fmt: skip
    viscosities = [
        "cP", "cp", "CP", "mPa.s", "mPa·s", "mPa s", "mPas", "mPa-s", "mPa*s", "mPa⋅s", "mPa∙s", "MPa.s", "mPa/s",
        "centipoise", "cPs", "c.P.",
        "с\u0440", "mPa\u00a0s", "сP", "mN.s/m2",
    ]  # fmt: skip
    numbers = [
        "1,234", "12.345", "-46100", "-172-47", "60 0C", "!123.7", "1 234,5", "1'234.5", "1\u00a0234",
        "1\u202f234.5", "1,87,000", "1.234.567",
        "50.000,5", "2.98x10-6", "2.98×10⁻⁶", "1E+02", "1e2", "5-7", "5–7", "5~7", "5 to 7", "-29 to 38", "<5",
        "≤5", "~50", "ca. 50", "50±5",
        "50*", "50¹", "50 (Note 2)", "max 50", "380+", "3.5/FV", "FV", "100 psig / 150 °F", "50 / 60", "−45",
        "‐45", "—45", "٥٠", "５０",
        "1_000", "0x1F", "1e", "-0", "+5", "5.", ".5", "5,", ",5", "1..2", "1,,2", "--5", "+-5", "5 5", "½", "1½",
        "1-1/2",
    ]  # fmt: skip
    sizes = [
        '6"', "6″", "6”", "6''", "6 in", "6IN", "6 inch", "NPS 6", "6 NPS", "DN150", "DN 150", "DN-150", "150NB",
        "150 NB", "ND150", "Ø150",
        "150 mm", '6" (DN150)', "150 (6\")", "0600", "150", "7\"", "1.1/2\"", "1-1/2\"", "1½\"", "1 1/2\"",
        '8"x6"', "80/50", "Ду150", "150A",
        "６\"", "6\u200b\"", "VI", "six",
    ]  # fmt: skip
    inches = sizes[:8]

    def sizes_look(listed: LineList) -> None:
        numbers_ = listed.number("size")
        six = [index for index, size in enumerate(sizes) if size in inches or "150" in size]
        given = [index for index in six if np.isfinite(numbers_[index])]
        assert len(given) >= len(inches)
        assert all(numbers_[index] == 6.0 for index in given), [(sizes[index], numbers_[index]) for index in given]

    return [
        _reads(
            "h17 degrees",
            column("Oper Temp", [f"60 {unit}" for unit in degrees]),
            look=look_each_reads_as("temperature", 333.15, 10),
        ),
        _reads(
            "h17 viscosities",
            column("Viscosity", [f"5 {unit}" for unit in viscosities]),
            look=look_each_reads_as("viscosity", 0.005, 8),
        ),
        _reads("h17b numbers", column("Oper Temp (°C)", numbers)),
        _reads("h17 sizes", column("Size", sizes), look=sizes_look),
        _reads(
            "h17 pressures without gauge or absolute",
            column("Oper Press", ["4 barg", "4 bar", "4 psi", "4 kg/cm2", "4 MPa"]),
            "gauge or absolute",
        ),
    ]


def invisible_signs() -> list[Family]:
    """Tags that look alike and are not the same."""
    tags = [
        "P-1001", "\u202eP-1001", "P-1001\u200e", "P\u200b-1001", "P\u00ad-1001", "P-\u00a01001", "\u0420-1001",
        "P-l001", "P-1OO1", "p-1001",
        "P-1001 ", "P\u2010-1001", "P\u20111001", "P-1001\U000e0041", "\ufeffP-1001", "P\u0301-1001", "\uff30-1001",
    ]  # fmt: skip
    return [
        _reads(
            "h18 look-alike and invisible signs", table(*(row_with(c0=tag) for tag in tags)), look=look_lines(len(tags))
        )
    ]


def delimiters() -> list[Family]:
    """Quotation marks that are not closed, and every delimiter."""
    many = "\r\n".join([HEADER, '"6-P-open,6,A,B,water,1,1,60,983,1,1,', *[ROW] * 200, ""])
    swallowed = "\r\n".join(
        [
            HEADER,
            ROW,
            'P-2,6,A,B,water,1,1,60,983,1,1,"open',
            *[ROW.replace('"', "")] * 5,
            'P-3,6,A,B,w,1,1,60,983,1,1,shut"',
            "",
        ]
    )
    plain = "Line No{0}DN{0}Flow [kg/h]{0}Temp [K]{0}Remarks\nP-1{0}150{0}50{1}5{0}300{0}x\n"

    def half(listed: LineList) -> None:
        assert np.allclose(listed.number("flow_mass"), 50.5 / 3600)

    return [
        _refused("h20a an unclosed quotation mark", many, "row 2: a quotation mark opened in this row"),
        _refused("h20a a mark that a later one closes", swallowed, "row 3: a quotation mark opened in this row"),
        _reads(
            "h20b an inch mark not doubled",
            table('"6"-P-1002-A1A",6",A,B,water,1,1,60,983,1,1,', ROW),
            "quotation marks contradict",
        ),
        _reads(
            "h20c semicolon and decimal comma",
            plain.format(";", ","),
            "Cells parted by semicolon.",
            "Decimal commas.",
            look=half,
        ),
        _reads("h20d sep line", "sep=;\n" + plain.format(";", ","), "as the line sep= says", look=half),
        _reads(
            "h20e tab", plain.format("\t", "."), "Cells parted by tab.", "Decimal points.", look=half, file="list.tsv"
        ),
        _reads("h20f pipe", plain.format("|", "."), "Cells parted by pipe.", look=half, file="list.txt"),
        _refused(
            "h20g fixed width",
            "LINE NO         SIZE  FROM     TO\nP-1001          6     P-101    E-102\n",
            "fixed width",
            file="list.txt",
        ),
        _reads(
            "h20h decimal commas in a list of commas",
            table(ROW, "P-2,6,A,B,water,50000,4,5,60,983,0,466,42,"),
            "an unquoted delimiter",
        ),
    ]


def wrong_containers() -> list[Family]:
    """Files that are not what their name says."""
    return [
        _reads("h25a a text named xlsx", table(ROW), look=look_lines(1), file="list.xlsx"),
        _refused(
            "h25b a web page named xls",
            "<html><body><table><tr><td>Line No</td></tr></table>",
            "web page",
            file="list.xls",
        ),
        _refused("h25d a PDF document named csv", b"%PDF-1.7\n%\xe2\xe3\xcf\xd3\n1 0 obj", "PDF"),
        _refused("h25e gzip named csv", gzip.compress(table(ROW).encode(), mtime=0), "gzip"),
        _refused("h25g JSON named csv", '{"lines": [{"Line No": "P-1"}]}', "JSON"),
        _refused("h25h a lock file", table(ROW), "lock file", file=f"{LOCK}list.csv"),
    ]


def parser_stress() -> list[Family]:
    """Cells that make a careless parser slow, or make it compute."""
    cells = [
        "9" * 5_000, "1" + "0" * 400, "1e999999999", "1e-999999999", "1/0", "0/0", "9**9**9**9", "m**m**m",
        "(" * 500 + "1" + ")" * 500,
        "a" * 3_000 + "!", "1" + " 1" * 2_000, "1," * 3_000, "1." * 3_000, "-" * 5_000, "+" * 5_000, "1e" * 2_000,
        " " * 5_000 + "x",
        "x" + " " * 30_000, "__import__('os').system('touch x')", "kg" * 1_000, "1 " + "/m" * 2_000,
        "5 to " * 1_000, "HOLD " * 2_000,
        "1" + "\u0301" * 2_000, "((((((((((a*)*)*)*)*)*)*)*)*)*)*", "1\u20441\u20441" * 500, "%s%n%x" * 100,
        "{0.__class__}", "\\x31",
    ]  # fmt: skip
    look = look_all("temperature", Gap.REFUSED, Gap.HOLD, Gap.BLANK, Gap.GIVEN)
    many = [f"{index}{text[:40]}" for index in range(10) for text in cells]
    return [
        _reads("h27 stress in numbers", column("Oper Temp (°C)", [*cells, *many, "60"]), look=look),
        _reads("h27 stress in sizes", column("Size", [*cells, *many, '6"'])),
        _reads("h27 stress in line numbers", table(*(row_with(c0=cell or "x") for cell in cells if cell.strip(" -+")))),
        _reads(
            "h27 stress in a header",
            f"Line No,Temp [K],{quoted(cells[9])},{quoted('press ' * 500)},{quoted('[' * 900)}\nP-1,300,1,2,3\n",
        ),
    ]


def graphs() -> list[Family]:
    """Lines that run in circles, and a long chain."""
    odd = [
        ("V-1", "V-1"),
        ("A", "B"),
        ("B", "A"),
        ("P-1", "P-2"),
        ("", ""),
        ("A, B; C / D", "E & F"),
        ("P-101 A/B", "?"),
    ]
    rows = [row_with(c0=f"P-{index}", c2=start, c3=end) for index, (start, end) in enumerate(odd)]
    chain = [f"P-{index},DN 150,N-{index},N-{index + 1},water,1000,4,60,983,0.5,10," for index in range(3_000)]
    return [
        _reads("h28 circles, branches and unknown ends", table(*rows, rows[0]), look=look_lines(len(odd) + 1)),
        _reads("h28 a chain of 3000", table(*chain), look=look_lines(3_000)),
    ]


def small_families() -> list[Family]:
    """Return every family that is read within a moment."""
    makers = (
        formulas, markup, control_characters, rows_of_any_width, not_numbers, physics, line_ends, encodings,
        empty_texts, spellings, invisible_signs, delimiters, wrong_containers, parser_stress, graphs,
    )  # fmt: skip
    return [family for make in makers for family in make()]


def _long_cell(letter: str, place: str) -> bytes:
    return table(ROW, row_with(**{place: letter * 10_000_000})).encode()


def _wide(names: Iterable[str]) -> bytes:
    header = ",".join(names)
    return f"Line No,Temp [K],{header}\nP-1,300{',' * (header.count(',') + 1)}\n".encode()


def _many_rows() -> bytes:
    row = '"6""-P-%07d-A1A","6""",P-101A,E-102,water,50000,4.5,60,983,0.466,42,\n'
    return (HEADER + "\n" + "".join([row % number for number in range(1_000_000)])).encode()


def large_families() -> list[Family]:
    """Return the families that are large: each is built when it is asked for."""

    def refused(name: str, build: Callable[[], bytes], *words: str) -> Family:
        return Family(name, build, "list.csv", Expectation("refused", words))

    return [
        refused("h05 a cell of 10 MB", lambda: _long_cell("x", "c11"), "row 3: a cell is longer than 32767"),
        refused(
            "h05 a number of 10 million digits", lambda: _long_cell("9", "c5"), "row 3: a cell is longer than 32767"
        ),
        refused("h07 100 000 columns", lambda: _wide(f"x{index}" for index in range(100_000)), "more than 2000"),
        refused("h07 100 000 equal columns", lambda: _wide(["Remarks"] * 100_000), "more than 2000"),
        refused("h19 1 000 000 rows", _many_rows, "the file has more than 200000 rows"),
    ]
