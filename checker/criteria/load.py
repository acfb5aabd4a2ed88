"""Load the project's criteria: the bundled default, a file laid over it, or a file that stands alone."""

from __future__ import annotations

from dataclasses import fields
from pathlib import Path
from typing import Any

from checker.criteria.criteria import Criteria, Service
from checker.criteria.differences import differences_between
from checker.criteria.file_reading import read_toml
from checker.criteria.merging import PROJECT_BASIS, laid_over, with_origins
from checker.criteria.places import ProblemList
from checker.criteria.service_reading import read_services
from checker.criteria.settings import Settings, read_settings
from checker.criteria.structure_messages import report_structure
from checker.errors import InputError, ToolFaultError
from checker.model import Source

__all__ = ["DEFAULT", "load_criteria"]

DEFAULT = Path(__file__).parent / "default.toml"


def _read(
    document: dict[str, Any], file: str, *, shape_is_good: bool
) -> tuple[Settings, tuple[Service, ...], ProblemList]:
    """Return what a document says, and everything in its values that is wrong."""
    problems = ProblemList(file, document)
    settings = read_settings(document, problems)
    services = read_services(
        document.get("service"), problems, atmosphere=settings.atmosphere, shape_is_good=shape_is_good
    )
    return settings, services, problems


def _checked(document: dict[str, Any], file: str) -> None:
    """Raise every problem of a project's own file at once."""
    structure = ProblemList(file, document)
    report_structure(document, structure)
    *_, values = _read(document, file, shape_is_good=not structure.problems)
    problems = structure.problems + values.problems
    if problems:
        raise InputError(problems)


def _origin(document: dict[str, Any], file: str) -> str:
    project = document.get("project", {})
    return project.get("document") or project.get("title") or file


def _criteria(
    settings: Settings,
    services: tuple[Service, ...],
    *,
    source: Source,
    based_on_source: Source | None = None,
    default_only: bool = False,
    differences: tuple[str, ...] = (),
) -> Criteria:
    return Criteria(
        source=source,
        based_on_source=based_on_source,
        default_only=default_only,
        services=services,
        differences=differences,
        **{field.name: getattr(settings, field.name) for field in fields(settings)},
    )


def _read_good(document: dict[str, Any], file: str) -> tuple[Settings, tuple[Service, ...]]:
    """Return what a document says that was checked before, or the bundled default."""
    settings, services, problems = _read(document, file, shape_is_good=True)
    if problems.problems:
        raise ToolFaultError(problems.problems)
    return settings, services


def load_criteria(path: Path | None) -> Criteria:
    """Load the design criteria.

    Parameters
    ----------
    path : Path or None
        The project's criteria file (TOML). With ``based_on = "default"`` in its [project] only the differences from
        the bundled default are written there; without, it stands alone. None takes the bundled default.

    Returns
    -------
    Criteria
        Limits and defaults in SI.

    Raises
    ------
    InputError
        If the file cannot be used. It holds all problems at once, each with file, table and key.
    """
    default_document, default_source = read_toml(DEFAULT)
    default_settings, default_services = _read_good(default_document, DEFAULT.name)
    if path is None:
        return _criteria(default_settings, default_services, source=default_source, default_only=True)
    mine, source = read_toml(path)
    _checked(mine, source.name)
    based = mine.get("project", {}).get("based_on") == "default"
    origin = _origin(mine, source.name)
    if based:
        document = laid_over(default_document, mine, source=origin)
    else:
        own = [with_origins(service, source=origin, basis=PROJECT_BASIS) for service in mine.get("service", [])]
        document = {**mine, "service": own}
    settings, services = _read_good(document, source.name)
    differences = differences_between(
        old=default_services, new=services, old_settings=default_settings, new_settings=settings
    )
    return _criteria(
        settings,
        services,
        source=source,
        based_on_source=default_source if based else None,
        differences=differences,
    )
