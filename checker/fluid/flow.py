"""The mass flow of a line case, from whichever flow the row states."""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

__all__ = ["FLOW_TOLERANCE", "mass_flow"]

FloatArray = NDArray[np.float64]
FLOW_TOLERANCE = 0.02


def mass_flow(
    *,
    flow_mass: FloatArray,
    flow_volume: FloatArray,
    flow_standard: FloatArray,
    density: FloatArray,
    molar_mass: FloatArray,
) -> tuple[FloatArray, NDArray[np.bool_]]:
    """Return the mass flow and where the flows of one row contradict each other.

    Parameters
    ----------
    flow_mass : float array
        Mass flow as listed [kg/s].
    flow_volume : float array
        Volume flow at flowing conditions as listed [m3/s].
    flow_standard : float array
        Standard volume flow as listed, as the amount of substance it stands for [mol/s].
    density : float array
        Density at flowing conditions [kg/m3].
    molar_mass : float array
        Molar mass [kg/mol].

    Returns
    -------
    flow : float array
        Mass flow [kg/s]: the listed one, else volume x density, else amount x molar mass; NaN where none can be had
        or where two of them differ by more than 2 % (common practice: CRITERIA of mass against volume flow).
    contradictory : bool array
        True where two of them differ by more than 2 %.
    """
    flows = np.stack(np.broadcast_arrays(flow_mass, flow_volume * density, flow_standard * molar_mass))
    there = np.isfinite(flows)
    largest = np.where(there, flows, -np.inf).max(axis=0)
    smallest = np.where(there, flows, np.inf).min(axis=0)
    contradictory = (there.sum(axis=0) > 1) & (largest - smallest > FLOW_TOLERANCE * np.abs(largest))
    first = np.take_along_axis(flows, there.argmax(axis=0)[np.newaxis], axis=0)[0]
    return np.where(contradictory, np.nan, first), contradictory
