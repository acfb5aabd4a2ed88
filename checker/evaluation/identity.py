"""Providers: phase, service and pressure basis of each line case as codes."""

from __future__ import annotations

from typing import Any

import numpy as np
from numpy.typing import NDArray

from checker.criteria.criteria import Criteria
from checker.criteria.services import service_codes
from checker.evaluation.provider import provider
from checker.model import Coded, Gap, Phase, PressureBasis

__all__ = ["PROVIDERS"]

CodeArray = NDArray[np.int8]
_PHASES = {"liquid": Phase.LIQUID, "gas": Phase.GAS, "two-phase": Phase.TWO_PHASE}
_BASES = {"inlet": PressureBasis.INLET, "outlet": PressureBasis.OUTLET}


def _codes(coded: Coded, words: dict[str, Any]) -> CodeArray:
    table = np.array([*(words.get(text, -1) for text in coded.texts), -1], dtype=np.int8)
    return table[coded.codes]


def phase(*, phase_listed: Coded) -> CodeArray:
    """Return the `Phase` code; never inferred, -1 where the list does not say."""
    return _codes(phase_listed, _PHASES)


def service_code(*, criteria: Criteria, service_listed: Coded, phase: CodeArray) -> NDArray[np.int32]:
    """Return the index of the criteria's service, -1 where the list does not say."""
    return service_codes(criteria=criteria, service=service_listed, phase=phase)


def _flags(flags: list[bool], service_code: NDArray[np.int32]) -> CodeArray:
    return np.array([*flags, -1], dtype=np.int8)[service_code]


def steam(*, criteria: Criteria, service_code: NDArray[np.int32]) -> CodeArray:
    """Return 1 where the service is steam, 0 where it is not, -1 where the service is not known."""
    return _flags([service.steam for service in criteria.services], service_code)


def pump_suction(*, criteria: Criteria, service_code: NDArray[np.int32]) -> CodeArray:
    """Return 1 where the service is a pump suction, 0 where it is not, -1 where the service is not known."""
    return _flags([service.pump_suction for service in criteria.services], service_code)


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


PROVIDERS = tuple(provider(function) for function in (phase, service_code, steam, pump_suction, pressure_basis))
