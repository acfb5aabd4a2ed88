"""Providers: phase, service and pressure basis of each line case as codes."""

from __future__ import annotations

from typing import Any

import numpy as np
from numpy.typing import NDArray

from checker.criteria.criteria import Criteria
from checker.criteria.services import service_codes, unmatched_codes
from checker.evaluation.provider import provider
from checker.fluid.gas_density import GREATEST_GAS_DENSITY
from checker.model import Coded, Gap, Phase, PressureBasis, base_case

__all__ = ["PROVIDERS"]

CodeArray = NDArray[np.int8]
FloatArray = NDArray[np.float64]
_PHASES = {"liquid": Phase.LIQUID, "gas": Phase.GAS, "two-phase": Phase.TWO_PHASE}
_BASES = {"inlet": PressureBasis.INLET, "outlet": PressureBasis.OUTLET}


def _codes(coded: Coded, words: dict[str, Any]) -> CodeArray:
    table = np.array([*(words.get(text, -1) for text in coded.texts), -1], dtype=np.int8)
    return table[coded.codes]


LEAST_LIQUID_DENSITY = 250.0


def phase(
    *,
    phase_listed: Coded,
    vapour_fraction_listed: FloatArray,
    vapour_fraction_outlet_listed: FloatArray,
    density_listed: FloatArray,
    liquid_density_listed: FloatArray,
    vapour_density_listed: FloatArray,
) -> dict[str, NDArray[Any]]:
    """Return the `Phase` code; never inferred, -1 where the list does not say or contradicts itself.

    A liquid with vapour in it, a gas with liquid in it, a liquid below 250 kg/m3 and a gas above 400 kg/m3 (common
    practice) contradict their phase, at either end; so do two phases of which one is not there at either end, or
    whose vapour is the heavier.
    """
    said = _codes(phase_listed, _PHASES)
    inlet, outlet = vapour_fraction_listed, vapour_fraction_outlet_listed
    with np.errstate(invalid="ignore"):
        no_liquid = (inlet > 0.0) | (outlet > 0.0) | (density_listed < LEAST_LIQUID_DENSITY)
        no_gas = (inlet < 1.0) | (outlet < 1.0) | (density_listed > GREATEST_GAS_DENSITY)
        one_phase = ((inlet <= 0.0) | (inlet >= 1.0)) & (np.isnan(outlet) | (outlet == inlet))
        not_two = one_phase | (vapour_density_listed >= liquid_density_listed)
    contradictory = np.select(
        [said == Phase.LIQUID, said == Phase.GAS, said == Phase.TWO_PHASE], [no_liquid, no_gas, not_two], False
    )
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

    A relief line is judged on the case that its service names as the relief load, or not at all. A load below the flow
    of another of its cases is none.
    """
    relief = _flags([service.relief for service in criteria.services], service_code) == 1
    stated = np.zeros((len(criteria.services) + 1, len(case.texts) + 1), dtype=np.bool_)
    for row, service in enumerate(criteria.services):
        name = service.relief_case.casefold()
        stated[row, :-1] = [text == name or text.startswith(f"{name} ") for text in map(base_case, case.texts)]
    loads = np.where(relief & stated[service_code, case.codes], flow_mass, np.nan)
    groups = int(line_group.max(initial=-1)) + 1
    greatest, load = np.zeros(groups), np.zeros(groups)
    with np.errstate(invalid="ignore"):
        np.fmax.at(greatest, line_group, flow_mass)
        np.fmax.at(load, line_group, loads)
    known = (load > 0.0) & (load >= greatest)
    return np.where(relief & ~known[line_group], -1, 1).astype(np.int8)


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
