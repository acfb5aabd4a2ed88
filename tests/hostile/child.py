"""Runs families in a process of its own, limited in memory, and reports each as a line of JSON.

    python child.py GROUP FOLDER

The process may use 2 GB of address space. Whatever is opened for writing, and every socket, is reported.
"""

from __future__ import annotations

import json
import os
import resource
import sys
import time
from pathlib import Path

LIMIT = 2 << 30
WRITES = os.O_WRONLY | os.O_RDWR | os.O_CREAT | os.O_TRUNC | os.O_APPEND
CHANGES = (
    "os.remove",
    "os.rename",
    "os.mkdir",
    "os.rmdir",
    "os.link",
    "os.symlink",
    "shutil.",
    "socket.",
    "subprocess.",
    "os.system",
)


class Watch:
    """Notes what the process opens for writing, and every socket and program it starts."""

    def __init__(self) -> None:
        self.seen: list[str] = []
        self.on = False
        sys.addaudithook(self._hook)

    def _hook(self, event: str, arguments: tuple[object, ...]) -> None:
        if not self.on:
            return
        writes = event == "open" and isinstance(arguments[2], int) and arguments[2] & WRITES
        if (writes and arguments[0] != os.devnull) or event.startswith(CHANGES):
            self.seen.append(f"{event} {arguments[0]!r}")


def said_of(path: Path, look: object) -> tuple[str, str, str]:
    """Return what came of a list, all that was said of it, and what a look at it found wrong."""
    from checker.errors import InputError
    from checker.intake import read_line_list

    try:
        listed = read_line_list(path)
    except InputError as error:
        return "refused", str(error), ""
    sentences = [*listed.notes, *listed.refusals.values(), *(item.reason for item in (*listed.unread, *listed.deleted))]
    found = ""
    try:
        if callable(look):
            look(listed)
    except AssertionError as error:
        found = f"{type(error).__name__}: {error}"
    return "reads", "\n".join(sentences), found


def gate(path: Path) -> tuple[int, str]:
    """Return exit status and output of the gate."""
    from click.testing import CliRunner

    from checker.cli import main

    result = CliRunner().invoke(main, ["gate", str(path)])
    crash = (
        ""
        if result.exception is None or isinstance(result.exception, SystemExit)
        else f"Traceback {result.exception!r}"
    )
    return result.exit_code, result.output + crash


def groups() -> dict[str, list[object]]:
    """Return the families by group; each large one is a group of its own."""
    from text_families import large_families, small_families
    from workbook_families import groups as workbook_groups

    return {"small": [*small_families()], **{family.name: [family] for family in large_families()}, **workbook_groups()}


def run(group: str, folder: Path) -> None:
    """Run the families of a group and print what came of each."""
    watch = Watch()
    for index, family in enumerate(groups()[group]):
        place = folder / str(index)
        place.mkdir()
        path = place / family.file
        path.write_bytes(family.build())
        os.chdir(place)
        watch.seen.clear()
        watch.on, started = True, time.perf_counter()
        outcome, text, found = said_of(path, family.expectation.look)
        status, output = gate(path)
        watch.on, seconds = False, time.perf_counter() - started
        left = sorted(str(item.relative_to(place)) for item in place.rglob("*"))
        report = {
            "name": family.name, "outcome": outcome, "text": text, "found": found, "status": status, "output": output,
            "touched": watch.seen, "left": left, "seconds": seconds,
        }  # fmt: skip
        print(json.dumps(report), flush=True)


if __name__ == "__main__":
    resource.setrlimit(resource.RLIMIT_AS, (LIMIT, LIMIT))
    run(sys.argv[1], Path(sys.argv[2]))
