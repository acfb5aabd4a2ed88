"""The records that hold the design criteria."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass

from checker.criteria.hints import ColumnHint
from checker.model import Source

__all__ = ["FORCES", "LIMIT_DIMENSION", "Criteria", "Limit", "Service"]

FORCES = ("note", "should", "shall")

LIMIT_DIMENSION: dict[str, str] = {
    "velocity_maximum": "velocity",
    "velocity_minimum": "velocity",
    "pressure_gradient_maximum": "pressure gradient",
    "momentum_flux_maximum": "momentum flux",
    "mach_maximum": "dimensionless",
    "erosional_constant": "erosional constant",
    "npsh_margin_minimum": "length",
    "npsh_ratio_minimum": "dimensionless",
}


@dataclass(frozen=True, slots=True)
class Limit:
    """One limit of one service.

    Attributes
    ----------
    key : str
        Key of the criteria file, such as ``velocity_maximum``.
    text : str
        The limit as written, its bands in one line.
    by : str
        What its bands go by: ``size``, ``pressure``, or empty where one value holds throughout.
    uppers : tuple of float
        Upper end of each band, itself belonging to the band: NPS inches or Pa absolute; the last is infinite.
    values : tuple of float
        SI value of each band.
    texts : tuple of str
        Each value as written.
    source : str
        Where the figure comes from.
    basis : str
        How it is known: ``read ...``, ``common practice ...``, ``from memory ...`` or ``project criteria``.
    confirmed : str
        Edition against which the project confirmed it; empty where nobody did.
    """

    key: str
    text: str
    by: str
    uppers: tuple[float, ...]
    values: tuple[float, ...]
    texts: tuple[str, ...]
    source: str = ""
    basis: str = ""
    confirmed: str = ""

    @property
    def from_memory(self) -> bool:
        """True where the figure was recalled and no edition confirms it: its rule is at most ``should``."""
        return self.basis.startswith("from memory") and not self.confirmed


@dataclass(frozen=True, slots=True)
class Service:
    """One service of the criteria.

    Attributes
    ----------
    name : str
        Name in words.
    matches : tuple of str
        Codes and words of a line list that mean this service; ``*`` stands for any text.
    phase : str
        ``liquid``, ``gas`` or ``two-phase`` where the row holds for that phase only, else empty.
    general : bool
        True for the row that a line of that phase takes when its service matches nothing.
    steam, pump_suction, solids_free : bool
        What rules ask of a service.
    relief : bool
        True for a relief or flare line: it is judged on its relief load.
    relief_case : str
        Case of the list in which the relief load of such a line stands.
    pressure_basis : str
        End at which such lines are known where the list does not say: ``inlet``, ``outlet`` or empty.
    limits : mapping of str to Limit
        By key of `LIMIT_DIMENSION`.
    force : mapping of str to str
        Force of a rule for this service, by rule id.
    source, basis, confirmed, note : str
        As written; a limit may say its own source, basis and confirmation.
    """

    name: str
    matches: tuple[str, ...]
    phase: str
    general: bool
    steam: bool
    pump_suction: bool
    solids_free: bool
    relief: bool
    relief_case: str
    pressure_basis: str
    limits: Mapping[str, Limit]
    force: Mapping[str, str]
    source: str
    basis: str
    confirmed: str
    note: str


@dataclass(frozen=True, slots=True)
class Criteria:
    """The design criteria of one project.

    Attributes
    ----------
    source : Source
        The criteria file; the bundled default where none was given.
    based_on_source : Source or None
        The bundled default where the file is laid over it.
    default_only : bool
        True where no file was given.
    title, document : str
        Project and its criteria document.
    jurisdictions : tuple of str
        Whose local codes hold.
    atmosphere : float
        Atmospheric pressure of the site, Pa.
    ambient_minimum, ambient_maximum : float
        K; NaN where not given.
    gas_method, two_phase_method, fittings_method : str
        Methods adopted.
    downhill_recovery : bool
        True where static recovery in downhill two-phase lines is allowed.
    services : tuple of Service
        In the order in which their matches are tried.
    units : mapping of str to str
        Unit of a header that states none, by dimension.
    columns : mapping of str to ColumnHint
        What a contractor's header means.
    gross_factor, coverage_minimum, stated_values_tolerance : float
        Dimensionless.
    fittings_allowance : float
        Fittings as a fraction of the straight length where a list gives neither; NaN where not adopted.
    roughness : mapping of str to float
        Absolute roughness, m, by material in lower case.
    differences : tuple of str
        Where this file differs from the bundled default: old -> new.
    """

    source: Source
    based_on_source: Source | None
    default_only: bool
    title: str
    document: str
    jurisdictions: tuple[str, ...]
    atmosphere: float
    ambient_minimum: float
    ambient_maximum: float
    gas_method: str
    two_phase_method: str
    fittings_method: str
    downhill_recovery: bool
    services: tuple[Service, ...]
    units: Mapping[str, str]
    columns: Mapping[str, ColumnHint]
    gross_factor: float
    coverage_minimum: float
    stated_values_tolerance: float
    fittings_allowance: float
    roughness: Mapping[str, float]
    differences: tuple[str, ...]
