"""Where something stands in a criteria file, in words, and the list of what is wrong there."""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from typing import Any

from checker.errors import InputError, Problem

__all__ = ["MOST_PROBLEMS", "ProblemList", "place_of", "shown"]

LONGEST_SHOWN = 60
MOST_PROBLEMS = 200
PathPart = str | int


def shown(value: object) -> str:
    """Return a value for a message, cut to a readable length."""
    text = repr(value)
    return text if len(text) <= LONGEST_SHOWN else f"{text[:LONGEST_SHOWN]}..."


def _service_place(document: Mapping[str, Any], index: int) -> str:
    services = document.get("service")
    service = services[index] if isinstance(services, list) and index < len(services) else None
    name = service.get("name") if isinstance(service, dict) else None
    return f"[[service]] {shown(name)}" if isinstance(name, str) and name else f"[[service]] number {index + 1}"


def _key(part: PathPart) -> str:
    return f"number {part + 1}" if isinstance(part, int) else part[:LONGEST_SHOWN]


def place_of(document: Mapping[str, Any], path: Sequence[PathPart]) -> str:
    """Return table and key of a path, such as ``[[service]] 'cooling water', velocity_maximum, bands, number 2``."""
    if not path:
        return ""
    if path[0] == "service" and len(path) > 1 and isinstance(path[1], int):
        return ", ".join([_service_place(document, path[1]), *map(_key, path[2:])])
    return ", ".join([f"[{_key(path[0])}]", *map(_key, path[1:])])


class ProblemList:
    """Everything that is wrong with one input file.

    A file with more than 200 problems is no file of this kind: reading stops there with those that were found.
    """

    def __init__(self, file: str, document: Mapping[str, Any]) -> None:
        self.file = file
        self.document = document
        self.problems: list[Problem] = []

    def add(self, path: Sequence[PathPart], what: str, remedy: str) -> None:
        """Note what is wrong at a path of the document and what to do about it."""
        place = place_of(self.document, path)
        self.problems.append(Problem(what, f"{self.file}, {place}" if place else self.file, remedy))
        if len(self.problems) >= MOST_PROBLEMS:
            last = Problem(f"more than {MOST_PROBLEMS} problems.", self.file, "Correct these first, then run again.")
            raise InputError([*self.problems, last])
