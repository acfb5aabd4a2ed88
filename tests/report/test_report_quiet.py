"""Libraries keep quiet: no banner, no notice of folders; only the report's own sentence shows."""

from __future__ import annotations

import builtins
import os
import subprocess
import sys
from pathlib import Path
from typing import Any

import pytest
from fake_review import make_review

from checker.report.pdf import PANGO_SENTENCE, PdfUnavailableError, render_pdf

PROGRAM = """
import sys
sys.path[:0] = sys.argv[1:]
from fake_review import make_review
from checker.report.charts import draw_pictures
from checker.report.pdf import render_pdf
review = make_review(lines=3, exceptions=2, points=20)
render_pdf(review, pictures=draw_pictures(review))
"""


def test_missing_pango_prints_no_banner(monkeypatch: pytest.MonkeyPatch, capsys: pytest.CaptureFixture[str]) -> None:
    real = builtins.__import__

    def failing(name: str, *arguments: Any, **keywords: Any) -> Any:
        if name == "weasyprint":
            print("-----\ncould not import some external libraries\n-----")
            print("see the installation steps", file=sys.stderr)
            raise OSError("cannot load library")
        return real(name, *arguments, **keywords)

    monkeypatch.setattr(builtins, "__import__", failing)
    with pytest.raises(PdfUnavailableError) as refused:
        render_pdf(make_review(lines=1, exceptions=0, points=0), pictures=())
    assert str(refused.value) == PANGO_SENTENCE
    assert capsys.readouterr() == ("", "")


@pytest.mark.skipif(not Path("/proc/self").exists(), reason="needs a folder in which nobody can write")
def test_a_home_that_cannot_be_written_gives_no_notice(tmp_path: Path) -> None:
    shut = {"MPLCONFIGDIR", "XDG_CACHE_HOME", "XDG_CONFIG_HOME"}
    environment = {name: value for name, value in os.environ.items() if name not in shut}
    environment |= {"HOME": "/proc/self", "TMPDIR": str(tmp_path)}
    here = Path(__file__).parent
    command = [sys.executable, "-c", PROGRAM, str(here), str(here.parents[1])]
    result = subprocess.run(command, env=environment, capture_output=True, text=True)
    assert (result.returncode, result.stdout, result.stderr) == (0, "", "")
    assert list(tmp_path.iterdir()) == []
