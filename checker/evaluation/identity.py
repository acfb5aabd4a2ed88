"""Providers: phase, service and pressure basis of each line case as codes."""

from __future__ import annotations

from typing import Any

import numpy as np
from numpy.typing import NDArray

from checker.criteria.criteria import Criteria
from checker.criteria.services import service_codes, unmatched_codes
from checker.evaluation.provider import provider
from checker.model import Coded, Gap, Phase, PressureBasis

__all__ = ["PROVIDERS"]

CodeArray = NDArray[np.int8]
FloatArray = NDArray[np.float64]
_PHASES = {"liquid": Phase.LIQUID, "gas": Phase.GAS, "two-phase": Phase.TWO_PHASE}
_BASES = {"inlet": PressureBasis.INLET, "outlet": PressureBasis.OUTLET}


def _codes(coded: Coded, words: dict[str, Any]) -> CodeArray:
    table = np.array([*(words.get(text, -1) for text in coded.texts), -1], dtype=np.int8)
    return table[coded.codes]


LEAST_LIQUID_DENSITY = 250.0
GREATEST_GAS_DENSITY = 400.0


def phase(
    *, phase_listed: Coded, vapour_fraction_listed: FloatArray, density_listed: FloatArray
) -> dict[str, NDArray[Any]]:
    """Return the `Phase` code; never inferred, -1 where the list does not say or contradicts itself.

    A liquid with vapour in it, a gas with liquid in it, a liquid below 250 kg/m3 and a gas above 400 kg/m3 (common
    practice) contradict their phase.
    """
    said = _codes(phase_listed, _PHASES)
    with np.errstate(invalid="ignore"):
        no_liquid = (vapour_fraction_listed > 0.0) | (density_listed < LEAST_LIQUID_DENSITY)
        no_gas = (vapour_fraction_listed < 1.0) | (density_listed > GREATEST_GAS_DENSITY)
    contradictory = (said == Phase.LIQUID) & no_liquid | (said == Phase.GAS) & no_gas
    return {
        "phase": np.where(contradictory, Phase.UNKNOWN, said).astype(np.int8),
        "phase_contradictory": contradictory,
    }


def service_code(*, criteria: Criteria, service_listed: Coded, phase: CodeArray) -> NDArray[np.int32]:
    """Return the index of the criteria's service, -1 where the list does not say."""
    return service_codes(criteria=criteria, service=service_listed, phase=phase)


def service_code_assumed(*, criteria: Criteria, service_listed: Coded, phase: CodeArray) -> NDArray[np.bool_]:
    """Return True where a service matches nothing and only the general row of its phase can stand in."""
    return unmatched_codes(criteria=criteria, service=service_listed, phase=phase)


def _flags(flags: list[bool], service_code: NDArray[np.int32]) -> CodeArray:
    return np.array([*flags, -1], dtype=np.int8)[service_code]


def steam(*, criteria: Criteria, service_code: NDArray[np.int32]) -> CodeArray:
    """Return 1 where the service is steam, 0 where it is not, -1 where the service is not known."""
    return _flags([service.steam for service in criteria.services], service_code)


def pump_suction(
    *, criteria: Criteria, service_code: NDArray[np.int32], service_code_assumed: NDArray[np.bool_]
) -> CodeArray:
    """Return 1 where the service is a pump suction, 0 where it is not, -1 where the service is not known or matched."""
    flags = _flags([service.pump_suction for service in criteria.services], service_code)
    return np.where(service_code_assumed, -1, flags).astype(np.int8)


def relief_load_given(
    *,
    criteria: Criteria,
    service_code: NDArray[np.int32],
    case: Coded,
    line_group: NDArray[np.int32],
    flow_mass: FloatArray,
) -> CodeArray:
    """Return 1 where the line is no relief line or states its relief load, -1 where it is one and does not.

    A relief line is judged on the case that its service names as the relief load, or not at all.
    """
    relief = _flags([service.relief for service in criteria.services], service_code) == 1
    names = [service.relief_case.casefold() for service in criteria.services]
    wanted = np.array([*(case.texts.index(name) if name in case.texts else -2 for name in names), -2])[service_code]
    with np.errstate(invalid="ignore"):
        loaded = relief & (case.codes == wanted) & (flow_mass > 0.0)
    has = np.zeros(int(line_group.max(initial=-1)) + 1, dtype=np.bool_)
    has[line_group[loaded]] = True
    return np.where(relief & ~has[line_group], -1, 1).astype(np.int8)


def pressure_basis(
    *,
    criteria: Criteria,
    pressure_basis_listed: Coded,
    pressure_basis_gap: CodeArray,
    service_code: NDArray[np.int32],
) -> CodeArray:
    """Return the `PressureBasis` code: the list's, else (where it has no such column) the service's, else the inlet."""
    listed = _codes(pressure_basis_listed, _BASES)
    by_service = [_BASES.get(service.pressure_basis, PressureBasis.INLET) for service in criteria.services]
    default = np.array([*by_service, PressureBasis.UNKNOWN], dtype=np.int8)[service_code]
    return np.where(pressure_basis_gap == Gap.NO_COLUMN, default, listed).astype(np.int8)


PROVIDERS = (
    provider(phase, "phase", "phase_contradictory"),
    *(
        provider(function)
        for function in (
            service_code, service_code_assumed, steam, pump_suction, relief_load_given, pressure_basis,
        )
    ),
)  # fmt: skip
