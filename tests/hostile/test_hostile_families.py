"""Every hostile text ends by itself within 2 GB and 30 s, read or refused in plain sentences, and touches nothing."""

from __future__ import annotations

import json
import os
import subprocess
import sys
from functools import cache
from pathlib import Path
from tempfile import TemporaryDirectory

import pytest
from text_families import Family, large_families, small_families

SECONDS = 30
CHILD = Path(__file__).parent / "child.py"


@cache
def reports(group: str) -> dict[str, dict[str, object]]:
    """Run a group of families in a process of its own and return what it reports, by family."""
    with TemporaryDirectory() as folder:
        done = subprocess.run(
            [sys.executable, str(CHILD), group, folder],
            capture_output=True,
            text=True,
            timeout=SECONDS,
            check=False,
            env={**os.environ, "PYTHONDONTWRITEBYTECODE": "1", "HOME": folder},
        )
    found = [json.loads(line) for line in done.stdout.splitlines()]
    latest = found[-1]["name"] if found else "none"
    assert done.returncode == 0, f"ended with {done.returncode} behind {latest}: {done.stderr[-2000:]}"
    return {report["name"]: report for report in found}


def check(family: Family, report: dict[str, object]) -> None:
    """Hold what came of a family against what must come of it."""
    said, output = str(report["text"]), str(report["output"])
    assert report["outcome"] == family.expectation.outcome, said
    assert not report["found"], report["found"]
    for words in family.expectation.words:
        assert words in said
    assert report["status"] in ((2,) if report["outcome"] == "refused" else (0, 1)), output
    for text in (said, output):
        assert "Traceback" not in text
        assert all(line.isprintable() for line in text.split("\n"))
    if report["outcome"] == "refused":
        assert said.startswith(family.file)
        assert family.file in output
        assert len(said) < 2_000
    assert report["touched"] == []
    assert report["left"] == [family.file]


@pytest.mark.parametrize("family", small_families(), ids=lambda family: family.name)
def test_small_family(family: Family) -> None:
    check(family, reports("small")[family.name])


@pytest.mark.parametrize("family", large_families(), ids=lambda family: family.name)
def test_large_family(family: Family) -> None:
    check(family, reports(family.name)[family.name])


FORGED = {
    "outcome": "refused", "found": "a look found something", "text": "Traceback (most recent call last)", "status": 3,
    "output": "\x1b[31m", "touched": ["open '/tmp/x'"], "left": ["list.csv", "x"],
}  # fmt: skip


@pytest.mark.parametrize("key", list(FORGED))
def test_the_check_sees_what_it_looks_for(key: str) -> None:
    family = next(family for family in small_families() if family.expectation.outcome == "reads")
    report: dict[str, object] = {
        "outcome": "reads", "found": "", "text": "Encoding UTF-8.", "status": 1, "output": "", "touched": [],
        "left": [family.file],
    }  # fmt: skip
    check(family, report)
    with pytest.raises(AssertionError):
        check(family, {**report, key: FORGED[key]})


def test_the_watch_sees_what_is_opened_for_writing(tmp_path: Path) -> None:
    script = "import child; w = child.Watch(); w.on = True; open('x', 'w').close(); open('x').close(); print(w.seen)"
    known = {**os.environ, "PYTHONPATH": str(CHILD.parent)}
    command = [sys.executable, "-c", script]
    done = subprocess.run(command, cwd=tmp_path, env=known, capture_output=True, text=True, check=True)
    assert done.stdout.strip() == str(["open 'x'"])


def test_the_families_are_the_same_each_time() -> None:
    assert [family.build() for family in small_families()] == [family.build() for family in small_families()]
    names = [family.name for family in (*small_families(), *large_families())]
    assert len(names) == len(set(names))
