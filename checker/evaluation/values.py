"""Every field of a list's line cases by name: listed, looked up, computed; each computed once."""

from __future__ import annotations

import re
from collections.abc import Callable
from functools import cache
from typing import Any

import numpy as np
from numpy.typing import NDArray

from checker.criteria.classes import Classes
from checker.criteria.criteria import Criteria
from checker.criteria.limits import LIMIT_DIMENSION, limit_values
from checker.evaluation import (
    data_flow,
    data_fluid,
    data_ranks,
    data_rows,
    data_steam,
    derived,
    fluid_state,
    hydraulic_state,
    identity,
    line_number_state,
    list_facts,
    pipe_state,
    substances,
)
from checker.evaluation.provider import Provider
from checker.fields import all_fields
from checker.intake.placeholders import placeholder
from checker.line_numbers.folding import folded_keys
from checker.model import Coded, LineList, base_case

__all__ = ["BASE_FIELDS", "Values", "known_fields", "provider_of"]

BASE_FIELDS = (
    "criteria",
    "classes",
    "case",
    "case_kind",
    "line",
    "line_group",
    "line_number_text",
    "own_flow",
    "case_columns",
    "case_group",
    "first_of_row",
    "hold_fields",
    "state_told",
    "composite",
    "stated_values_tolerance",
)


@cache
def _providers() -> dict[str, Provider]:
    modules = (
        identity, substances, pipe_state, fluid_state, hydraulic_state, derived,
        data_ranks, data_fluid, data_flow, data_steam, data_rows, line_number_state,
    )  # fmt: skip
    return {output: found for module in modules for found in module.PROVIDERS for output in found.outputs}


def provider_of(name: str) -> Provider | None:
    """Return the provider that computes a field, None for a listed or base field."""
    return _providers().get(name)


@cache
def known_fields() -> frozenset[str]:
    """Return every name a rule may ask for."""
    listed = {field.name for field in all_fields()}
    suffixed = {f"{name}{suffix}" for name in listed for suffix in ("_listed", "_gap")}
    states = {f"{key}_state" for key in LIMIT_DIMENSION}
    return frozenset(listed | suffixed | set(_providers()) | set(LIMIT_DIMENSION) | states | set(BASE_FIELDS))


_DIGIT = re.compile(r"\d")
NORMAL_CASE = "normal"
NO_LIMIT, NOT_KNOWN = 1, 2


class Values:
    """The fields of a line list under one criteria and class file.

    Parameters
    ----------
    line_list, criteria, classes
        The inputs; ``classes`` may be None.
    overrides : mapping of str to array, optional
        Fields given in place of what would be computed (another flow, another bore), over the same line cases.
    """

    def __init__(
        self,
        *,
        line_list: LineList,
        criteria: Criteria,
        classes: Classes | None,
        overrides: dict[str, NDArray[np.float64]] | None = None,
    ) -> None:
        self.line_list = line_list
        self.criteria = criteria
        self.classes = classes
        self._held: dict[str, Any] = {
            "criteria": criteria,
            "classes": classes,
            "case": line_list.case,
            "case_kind": line_list.case_kind,
            "line": line_list.line,
            "line_number_text": Coded(line_list.line, line_list.line_number),
            "composite": line_list.composite,
            "stated_values_tolerance": np.full(line_list.line_cases, criteria.stated_values_tolerance),
            **(overrides or {}),
        }

    def __getitem__(self, name: str) -> Any:
        """Return a field over the line cases, computing it and what it needs on first use.

        Raises
        ------
        KeyError
            If no field has that name.
        """
        if name not in self._held:
            self._held.update(self._compute(name))
        return self._held[name]

    def _compute(self, name: str) -> dict[str, Any]:
        found = _providers().get(name)
        if found is not None:
            results = found.results({need: self[need] for need in found.needs})
            return {key: _read_only(value) for key, value in results.items() if key not in self._held}
        if name == "own_flow":
            return {name: _read_only(_own_flow(self.line_list))}
        if name == "line_group":
            return {name: _read_only(_groups(self.line_list))}
        if name in _LIST_FACTS:
            return {name: _read_only(_LIST_FACTS[name](self))}
        key = name.removesuffix("_state")
        if key in LIMIT_DIMENSION:
            return self._limit(key)
        if name.endswith("_gap"):
            return {name: _read_only(self.line_list.gap(name.removesuffix("_gap")))}
        return {name: _read_only(self._listed(name.removesuffix("_listed")))}

    def _limit(self, key: str) -> dict[str, Any]:
        values, state = limit_values(
            criteria=self.criteria,
            key=key,
            service=self["service_code"],
            size=self["size"],
            pressure=self["pressure"],
        )
        # The general row of a phase cannot say that a service that matched nothing needs no such limit.
        state = np.where(self["service_code_assumed"] & (state == NO_LIMIT), NOT_KNOWN, state).astype(np.int8)
        return {key: _read_only(values), f"{key}_state": _read_only(state)}

    def _listed(self, name: str) -> Any:
        field = next((field for field in all_fields() if field.name == name), None)
        if field is None:
            raise KeyError(name)
        return self.line_list.text(name) if field.kind == "text" else self.line_list.number(name)


_LIST_FACTS: dict[str, Callable[[Values], Any]] = {
    "case_columns": lambda values: list_facts.case_columns(values.line_list),
    "case_group": lambda values: list_facts.case_group(values.line_list, values["line_group"]),
    "first_of_row": lambda values: list_facts.first_of_row(values.line_list),
    "hold_fields": lambda values: list_facts.hold_fields(values.line_list),
    "state_told": lambda values: list_facts.state_told(values.line_list),
}
FLOW_FIELDS = ("flow_mass", "flow_volume", "flow_standard")


def _own_flow(line_list: LineList) -> NDArray[np.bool_]:
    """Return True where a line case's flow is stated for that case, not borrowed from a column that names none."""
    named = {column.case for column in line_list.columns if column.field in FLOW_FIELDS}
    if line_list.has("case") or len(line_list.case.texts) < 2:
        return np.ones(line_list.line_cases, dtype=np.bool_)
    return line_list.case.where(
        [text in named or (text == NORMAL_CASE and "" in named) for text in map(base_case, line_list.case.texts)]
    )


def _groups(line_list: LineList) -> NDArray[np.int32]:
    """Return one code per distinct line number: rows of one number are one line, those without one each their own.

    Numbers are the same where their folded keys are: case, blanks, quotation marks and kinds of hyphen do not count.
    """
    codes: dict[str | int, int] = {}
    numbers = line_list.line_number
    open_ones = {text for text in set(numbers) if not _DIGIT.search(text) and placeholder(text, "line_number")}
    keys: list[str | int] = [key or text for key, text in zip(folded_keys(numbers), numbers, strict=True)]
    if open_ones:
        keys = [
            index if text in open_ones else key for index, (text, key) in enumerate(zip(numbers, keys, strict=True))
        ]
    by_line = np.fromiter((codes.setdefault(key, len(codes)) for key in keys), dtype=np.int32, count=len(keys))
    return by_line[line_list.line] if by_line.size else np.zeros(0, dtype=np.int32)


def _read_only(value: Any) -> Any:
    if isinstance(value, Coded):
        value.codes.flags.writeable = False
    elif isinstance(value, np.ndarray):
        value.flags.writeable = False
    return value
