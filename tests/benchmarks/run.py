"""Print how long the program takes against a reference measured in the same run, whole processes in turn.

    python tests/benchmarks/run.py              everything
    python tests/benchmarks/run.py --lines 20000 --rounds 3
    python tests/benchmarks/run.py --only intake

Nothing here is asserted: machines differ, ratios are for people to read. Both sides run from compiled modules, as
they do when installed: the first round, which is left out, compiles them into a folder of its own.
"""

from __future__ import annotations

import argparse
import os
import statistics
import subprocess
import sys
import tempfile
import time
from collections.abc import Callable
from pathlib import Path

import numpy as np
from large_list import write_large_list, write_large_workbook

ROOT = Path(__file__).parents[2]
EXAMPLE = ROOT / "example_linelists"
GIVEN = ["--criteria", str(EXAMPLE / "criteria.toml"), "--classes", str(EXAMPLE / "classes.csv")]
GATE = [sys.executable, "-m", "checker.cli", "gate", "--quiet"]


COMPILED = tempfile.TemporaryDirectory()
KNOWN = {name: value for name, value in os.environ.items() if name != "PYTHONDONTWRITEBYTECODE"}
KNOWN["PYTHONPYCACHEPREFIX"] = COMPILED.name


def seconds(command: list[str]) -> float:
    """Return the wall time of one whole process."""
    start = time.perf_counter()
    subprocess.run(command, stdout=subprocess.DEVNULL, stderr=subprocess.DEVNULL, check=False, env=KNOWN)
    return time.perf_counter() - start


def in_turn(first: list[str], second: list[str], rounds: int) -> tuple[float, float, float]:
    """Return the medians of two commands run in turn, and the median of their ratios pair by pair."""
    pairs = [(seconds(first), seconds(second)) for _ in range(rounds + 1)][1:]
    ratios = [mine / reference for mine, reference in pairs]
    return statistics.median(a for a, _ in pairs), statistics.median(b for _, b in pairs), statistics.median(ratios)


def show(what: str, mine: float, reference: float, ratio: float, aim: str) -> None:
    """Print one comparison."""
    print(f"{what:<74} {mine:9.3f} s {reference:9.3f} s   ratio {ratio:7.4f}   aim {aim}", flush=True)


def bench_long_list(lines: int, rounds: int) -> None:
    """Gate on a long list against a plain read of the same file."""
    with tempfile.TemporaryDirectory() as folder:
        path = Path(folder) / "long.csv"
        write_large_list(path, lines=lines)
        read = [sys.executable, "-c", f"import pandas; pandas.read_csv({str(path)!r}, dtype=object)"]
        show(
            f"gate, {lines} lines x 3 cases / pandas.read_csv(dtype=object)",
            *in_turn([*GATE, str(path), *GIVEN], read, rounds),
            "4, later 2.5",
        )


INTAKE = "from pathlib import Path; from checker.intake import read_line_list; read_line_list(Path({path!r}))"
PEAK = "; import resource; print(resource.getrusage(resource.RUSAGE_SELF).ru_maxrss)"
CELL_BY_CELL = (
    "from openpyxl import load_workbook; book = load_workbook({path!r}, read_only=True);"
    "[[cell.value for cell in row] for row in book.worksheets[0].iter_rows()]"
)


def bench_intake(lines: int, rounds: int) -> None:
    """Read a long list, nothing else, against a plain read of the same file; and its peak memory against its size."""
    with tempfile.TemporaryDirectory() as folder:
        path = Path(folder) / "long.csv"
        write_large_list(path, lines=lines)
        mine = [sys.executable, "-c", INTAKE.format(path=str(path))]
        read = [sys.executable, "-c", f"import pandas; pandas.read_csv({str(path)!r}, dtype=object)"]
        what = f"intake alone, {lines} lines x 40 columns / pandas.read_csv(dtype=object)"
        show(what, *in_turn(mine, read, rounds), "2.2")
        command = [sys.executable, "-c", INTAKE.format(path=str(path)) + PEAK]
        peak = int(subprocess.run(command, capture_output=True, text=True, check=True).stdout) * 1024
        size = path.stat().st_size
        mebi = 2**20
        print(
            f"{'peak memory of that process / size of the file':<74} {peak / mebi:7.0f} MiB {size / mebi:7.1f} MiB ",
            end="",
        )
        print(f"ratio {peak / size:7.4f}   aim 12", flush=True)


def bench_workbook(rows: int, rounds: int) -> None:
    """Read a workbook against the library's own read of it, cell by cell."""
    with tempfile.TemporaryDirectory() as folder:
        path = Path(folder) / "long.xlsx"
        write_large_workbook(path, lines=rows)
        mine = [sys.executable, "-c", INTAKE.format(path=str(path))]
        read = [sys.executable, "-c", CELL_BY_CELL.format(path=str(path))]
        show(f"intake of an XLSX of {rows} rows / openpyxl cell by cell", *in_turn(mine, read, rounds), "1.5")


def bench_example(rounds: int) -> None:
    """Gate on the example against the import of pandas."""
    mine = [*GATE, str(EXAMPLE / "marrowquay_rev_a.csv"), *GIVEN]
    show(
        "gate, example / python -c 'import pandas'",
        *in_turn(mine, [sys.executable, "-c", "import pandas"], rounds),
        "2",
    )


def per_element(function: Callable[[], object], count: int) -> float:
    """Return the least time an element took over some repeats."""
    times = []
    for _ in range(5):
        start = time.perf_counter()
        function()
        times.append(time.perf_counter() - start)
    return min(times) / count


def bench_friction() -> None:
    """Friction kernel, laminar and transition included, against the scalar library function in a loop."""
    from fluids.friction import friction_factor as scalar

    from checker.hydraulics.friction import friction_factor

    chance = np.random.default_rng(1)
    reynolds = 10.0 ** chance.uniform(2.0, 8.0, 100_000)
    rough = 10.0 ** chance.uniform(-6.0, -1.5, 100_000)
    mine = per_element(lambda: friction_factor(reynolds=reynolds, relative_roughness=rough), reynolds.size)
    few = list(zip(reynolds[:10_000].tolist(), rough[:10_000].tolist(), strict=True))
    reference = per_element(lambda: [scalar(Re=number, eD=depth) for number, depth in few], len(few))
    show("friction factor per element / fluids.friction_factor in a loop", mine, reference, mine / reference, "1/50")


def main() -> None:
    """Run every benchmark."""
    parser = argparse.ArgumentParser(description=__doc__, formatter_class=argparse.RawDescriptionHelpFormatter)
    parser.add_argument("--lines", type=int, default=100_000)
    parser.add_argument("--rounds", type=int, default=5)
    parser.add_argument("--rows", type=int, default=20_000, help="rows of the workbook")
    parser.add_argument(
        "--only",
        choices=("friction", "example", "gate", "intake"),
        help="one part alone; intake is texts and workbooks",
    )
    given = parser.parse_args()
    parts: dict[str, Callable[[], None]] = {
        "friction": bench_friction,
        "example": lambda: bench_example(given.rounds),
        "gate": lambda: bench_long_list(given.lines, given.rounds),
        "intake": lambda: bench_intake(given.lines, given.rounds),
        "workbook": lambda: bench_workbook(given.rows, given.rounds),
    }
    for name, part in parts.items():
        if given.only in (None, name) or (given.only == "intake" and name == "workbook"):
            part()


if __name__ == "__main__":
    main()
