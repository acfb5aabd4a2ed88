"""The one error base: every message says what was wrong, where, and what to do."""

from __future__ import annotations

from collections.abc import Iterable
from dataclasses import dataclass

__all__ = ["InputError", "LineListError", "Problem", "ToolFaultError"]

INPUT_STATUS = 2
FAULT_STATUS = 3


@dataclass(frozen=True, slots=True)
class Problem:
    """One thing that is wrong with an input.

    Attributes
    ----------
    what : str
        What was given and what is wrong with it.
    where : str
        File, sheet, row, column or key; empty where there is no place to name.
    remedy : str
        What the reader can do about it.
    """

    what: str
    where: str = ""
    remedy: str = ""

    def __str__(self) -> str:
        place = f"{self.where}: " if self.where else ""
        remedy = f" {self.remedy}" if self.remedy else ""
        return f"{place}{self.what}{remedy}"


class LineListError(Exception):
    """Base of every error this program raises on purpose."""

    status = INPUT_STATUS

    def __init__(self, problems: Problem | Iterable[Problem]) -> None:
        self.problems: tuple[Problem, ...] = (problems,) if isinstance(problems, Problem) else tuple(problems)
        super().__init__("\n".join(str(problem) for problem in self.problems))


class InputError(LineListError):
    """The input or the call cannot be used: exit status 2."""

    status = INPUT_STATUS


class ToolFaultError(LineListError):
    """A fault in the tool or in a rule: exit status 3."""

    status = FAULT_STATUS
