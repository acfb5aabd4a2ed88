"""Every bundle of rules comes in by this door: the bundled one, an installed package, a folder of modules."""

from __future__ import annotations

import importlib
import importlib.util
import pkgutil
import sys
from collections.abc import Collection, Iterable, Iterator
from importlib.metadata import EntryPoint, entry_points
from itertools import pairwise
from pathlib import Path
from types import ModuleType

from checker.errors import InputError, Problem, ToolFaultError
from checker.ruling.contract import Rule, rule_of

__all__ = ["GROUP", "load_rules"]

GROUP = "linelist_checker.rules"


def _modules_of(package: ModuleType) -> Iterator[ModuleType]:
    yield package
    for found in sorted(pkgutil.walk_packages(package.__path__, f"{package.__name__}."), key=lambda found: found.name):
        yield importlib.import_module(found.name)


def _from_entry_point(point: EntryPoint) -> list[ModuleType]:
    try:
        package = importlib.import_module(point.value)
        return list(_modules_of(package)) if hasattr(package, "__path__") else [package]
    except Exception as error:
        remedy = "Mend or remove that package: a bundle that cannot be loaded must not be passed over."
        where = f"rule bundle {point.name!r} ({point.value})"
        raise ToolFaultError(Problem(f"cannot be loaded: {error!r}.", where, remedy)) from error


def _from_folder(folder: Path) -> list[ModuleType]:
    if not folder.is_dir():
        raise InputError(Problem("is not a folder.", str(folder), "Give --rules a folder of Python modules."))
    files = sorted(folder.glob("*.py"))
    if not files:
        raise InputError(Problem("holds no Python module.", str(folder), "Put a .py file with a rule there."))
    return [_module_from_file(file) for file in files]


def _module_from_file(file: Path) -> ModuleType:
    name = f"linelist_rules_{file.stem}"
    spec = importlib.util.spec_from_file_location(name, file)
    try:
        if spec is None or spec.loader is None:
            raise ImportError(f"{file} is no Python module")
        module = importlib.util.module_from_spec(spec)
        sys.modules[name] = module
        spec.loader.exec_module(module)
    except Exception as error:
        sys.modules.pop(name, None)
        raise ToolFaultError(
            Problem(
                f"cannot be loaded: {error!r}.", f"rule module {file.name}", "Mend it or take it out of the folder."
            )
        ) from error
    return module


def _rules_in(modules: Iterable[ModuleType]) -> Iterator[Rule]:
    for module in modules:
        for thing in vars(module).values():
            found = rule_of(thing)
            if found is not None and found.origin == module.__name__:
                yield found


def load_rules(*, known_fields: Collection[str], folder: Path | None = None) -> tuple[Rule, ...]:
    """Return every rule of every bundle, sorted by id.

    Parameters
    ----------
    known_fields : collection of str
        Every field a rule may ask for.
    folder : Path, optional
        A folder of further rule modules.

    Raises
    ------
    ToolFaultError
        If a bundle does not load, two rules share an id, a rule asks for a field nobody knows, or there is no rule.
    InputError
        If the folder is no folder, or is empty.
    """
    points = sorted(entry_points(group=GROUP), key=lambda point: (point.name, point.value))
    modules = [module for point in points for module in _from_entry_point(point)]
    if folder is not None:
        modules += _from_folder(folder)
    rules = sorted({id(found): found for found in _rules_in(modules)}.values(), key=lambda found: found.id)
    problems = [*_twins(rules), *(problem for found in rules for problem in _unknown_fields(found, known_fields))]
    if not rules:
        problems.append(Problem("no rule was found.", f"entry-point group {GROUP}", "Install the distribution again."))
    if problems:
        raise ToolFaultError(problems)
    return tuple(rules)


def _twins(rules: list[Rule]) -> Iterator[Problem]:
    for first, second in pairwise(rules):
        if first.id == second.id:
            remedy = "Rename one: an id names one rule."
            yield Problem(f"rule id {first.id!r} is used twice.", f"{first.origin} and {second.origin}", remedy)


def _unknown_fields(found: Rule, known_fields: Collection[str]) -> Iterator[Problem]:
    asked = (*found.parameters, *found.applies_parameters)
    unknown = sorted({name for name in asked if name not in known_fields})
    if unknown:
        remedy = "`linelist fields` lists the fields of a list; DEVELOPERS.md lists the computed ones."
        yield Problem(f"rule {found.id!r} asks for unknown fields: {', '.join(unknown)}.", found.origin, remedy)
