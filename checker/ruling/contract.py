"""What a rule is: a pure function of named arrays, with its source, its force and when it applies."""

from __future__ import annotations

import inspect
from collections.abc import Callable
from dataclasses import dataclass
from enum import IntEnum
from functools import cache
from typing import Any, Literal, TypeVar

from checker.errors import Problem, ToolFaultError

__all__ = ["FORCES", "Force", "Outcome", "Rule", "Sense", "Source", "rule", "rule_of"]

Sense = Literal["at most", "at least", "condition"]
Force = Literal["note", "should", "shall"]
FORCES: tuple[Force, ...] = ("note", "should", "shall")
Function = TypeVar("Function", bound=Callable[..., Any])
_MARK = "__linelist_rule__"


class Outcome(IntEnum):
    """What a rule says of one line case."""

    NOT_APPLICABLE = 0
    MEETS = 1
    DOES_NOT_MEET = 2
    NOT_CHECKED = 3
    APPROVED_DEVIATION = 4

    @property
    def words(self) -> str:
        """The outcome as reports write it."""
        return self.name.lower().replace("_", " ")


@dataclass(frozen=True, slots=True)
class Source:
    """Where a requirement is published."""

    document: str
    edition: str = ""
    clause: str = ""

    def __str__(self) -> str:
        return ", ".join(part for part in (self.document, self.edition, self.clause) if part)


@dataclass(frozen=True, slots=True)
class Rule:
    """One requirement, ready to be judged.

    Attributes
    ----------
    id, title : str
        Name in words joined by hyphens, and the heading people read.
    force : {"note", "should", "shall"}
        Verbal form of ISO/IEC Directives Part 2; criteria may set another by service.
    sense : {"at most", "at least", "condition"}
        How the value is held against the limit; a condition is not met where the function returns True.
    source : Source
        Where the requirement is published.
    calculation : str
        The equation in words and symbols.
    unit, dimension : str
        Unit in which the value is shown, and its dimension.
    function : callable
        Keyword-only arrays in; ``(value, limit)`` out, or a bool array for a condition.
    required, optional : tuple of str
        Parameter names; a missing required value is `not checked`, an optional one is the function's own business.
    applies : callable or None
        Fields in, out a bool array or one of 0 (no), 1 (yes), -1 (not known); None applies everywhere.
    conservative : tuple of str
        Fields whose assumed value may still support `meets`.
    shall_where : callable or None
        ``(value, limit, fields ...)`` by name in, True where the requirement is a `shall`.
    limit_key : str
        Key of the criteria whose origin is told beside the limit; empty where the row or the rule gives the limit.
    origin : str
        The bundle it came from.
    on_data : bool
        True where the rule holds the list against itself, not the pipe against its duty: the coverage counts the
        other rules only, so that a list full of consistent figures is not taken for a checked one.
    """

    id: str
    title: str
    force: Force
    sense: Sense
    source: Source
    calculation: str
    unit: str
    dimension: str
    function: Callable[..., Any]
    required: tuple[str, ...]
    optional: tuple[str, ...]
    applies: Callable[..., Any] | None
    conservative: tuple[str, ...]
    shall_where: Callable[..., Any] | None
    limit_key: str
    origin: str
    on_data: bool = False

    @property
    def parameters(self) -> tuple[str, ...]:
        """Every field the function asks for."""
        return self.required + self.optional

    @property
    def applies_parameters(self) -> tuple[str, ...]:
        """Every field that decides whether the rule applies."""
        return () if self.applies is None else parameter_names(self.applies)


@cache
def parameter_names(function: Callable[..., Any]) -> tuple[str, ...]:
    """Return the names of a function's parameters, in order."""
    return tuple(inspect.signature(function).parameters)


def _split(function: Callable[..., Any], identity: str) -> tuple[tuple[str, ...], tuple[str, ...]]:
    parameters = inspect.signature(function).parameters.values()
    positional = [p.name for p in parameters if p.kind is not inspect.Parameter.KEYWORD_ONLY]
    if positional:
        raise ToolFaultError(
            Problem(
                f"parameters {', '.join(positional)} of rule {identity!r} are not keyword-only.",
                f"{function.__module__}.{function.__qualname__}",
                "Put a bare * before them.",
            )
        )
    required = tuple(p.name for p in parameters if p.default is inspect.Parameter.empty)
    return required, tuple(p.name for p in parameters if p.default is not inspect.Parameter.empty)


def rule(
    *,
    id: str,
    title: str,
    force: Force,
    sense: Sense,
    source: Source,
    calculation: str,
    unit: str = "",
    dimension: str = "",
    applies: Callable[..., Any] | None = None,
    conservative: tuple[str, ...] = (),
    shall_where: Callable[..., Any] | None = None,
    limit_key: str = "",
    on_data: bool = False,
) -> Callable[[Function], Function]:
    """Mark a pure function as a rule; the function itself stays as it is and can be called in tests.

    Raises
    ------
    ToolFaultError
        If the force or the sense is none of the known words, the source is empty or a parameter is positional.
    """

    def mark(function: Function) -> Function:
        place = f"{function.__module__}.{function.__qualname__}"
        if force not in FORCES or sense not in ("at most", "at least", "condition"):
            remedy = "Use note, should or shall; at most, at least or condition."
            raise ToolFaultError(Problem(f"rule {id!r} has {force=!r}, {sense=!r}.", place, remedy))
        if not source.document.strip():
            raise ToolFaultError(
                Problem(f"rule {id!r} has no source.", place, "Name the document or 'common practice'.")
            )
        required, optional = _split(function, id)
        marked = Rule(
            id, title, force, sense, source, calculation, unit, dimension, function, required, optional,
            applies, conservative, shall_where, limit_key, function.__module__, on_data,
        )  # fmt: skip
        setattr(function, _MARK, marked)
        return function

    return mark


def rule_of(thing: object) -> Rule | None:
    """Return the rule a function carries, None where it carries none."""
    found = getattr(thing, _MARK, None)
    return found if isinstance(found, Rule) else None
