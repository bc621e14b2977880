"""Stations along the axis shared by the annulus and liner marches."""

from __future__ import annotations

from collections.abc import Iterable, Sequence

import numpy as np

from combustor.airflow.result import Array
from combustor.hardware.metal import AxialProfile

# Rows nearer than this along the axis are one station: they share annulus flow and statics.
SAME_STATION = 1.0e-6


def merged(stations: Iterable[float]) -> list[float]:
    """Return rising stations, m, those within :data:`SAME_STATION` of the one before left out."""
    kept: list[float] = []
    for station in sorted(stations):
        if not kept or station - kept[-1] > SAME_STATION:
            kept.append(station)
    return kept


def nearest(stations: Sequence[float], station: float) -> float:
    """Return the entry of ``stations`` nearest to ``station``."""
    return min(stations, key=lambda other: abs(other - station))


def doubled_nodes(
    start: float, end: float, cells: int, entries: Sequence[float], kinks: Sequence[float]
) -> Array:
    """Return rising nodes from ``start`` to ``end``; every entry station stands there twice.

    Parameters
    ----------
    start, end : float
        m.
    cells : int
        Equal cells into which the length is cut before entries and kinks are added.
    entries : sequence of float
        Stations where mass enters or leaves, m, merged.
    kinks : sequence of float
        Further stations to be nodes, m: where an area profile changes slope.
    """
    width = (end - start) / cells
    # Uniform nodes very close to a row would only make slivers.
    fixed = merged([start, end, *entries, *(k for k in kinks if start < k < end)])
    inside = [
        node
        for node in (start + width * number for number in range(1, cells))
        if abs(node - nearest(fixed, node)) > 0.01 * width
    ]
    nodes = sorted([*fixed, *inside])
    twice = {nearest(nodes, entry) for entry in entries}
    return np.array([node for node in nodes for _ in range(2 if node in twice else 1)])


def profile_at(profile: AxialProfile, nodes: Array, scale: float = 1.0) -> Array:
    """Return a metal profile at ``nodes`` times ``scale``."""
    return profile.at(nodes) * scale
