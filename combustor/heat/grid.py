"""Stations of the wall march: no cell spans a slot or a step in what the wall sees."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass
from itertools import pairwise

import numpy as np
from numpy.typing import NDArray

from combustor.heat.effusion import Effusion
from combustor.heat.sides import AnnulusSide, Film, FloatArray, GasSide


@dataclass(frozen=True)
class Grid:
    """Stations (m), the length each stands for (m), and whether the gas recirculates there."""

    station: FloatArray
    length: FloatArray
    recirculating: NDArray[np.bool_]


def grid_of(
    gas: GasSide,
    films: Sequence[Film],
    air: AnnulusSide,
    effusion: Sequence[Effusion],
    stations: int,
) -> Grid:
    """Spread at least ``stations`` stations over the gas side, evenly between the breaks.

    Every stretch between breaks (slots, ends of drilled patches, end of recirculation, rows
    where gas or air is given twice) carries stations at both its ends; the last one stands a
    hair before the break, where the wall is hottest.
    """
    start, end = float(gas.station[0]), float(gas.station[-1])
    total = end - start
    breaks = {start, end}
    breaks.update(film.station for film in films if start < film.station < end)
    breaks.update(x for patch in effusion for x in (patch.start, patch.end) if start < x < end)
    breaks.update(x for side in (gas, air) for x in _steps(side.station) if start < x < end)
    recirculation_end = gas.recirculation_end
    if recirculation_end is not None and start < recirculation_end < end:
        breaks.add(recirculation_end)
    hair = 1e-9 * total
    edges = _spaced(sorted(breaks), 10.0 * hair)
    nodes, lengths = [], []
    for left, right in pairwise(edges):
        count = max(int(np.ceil(stations * (right - left) / total)), 1) + 1
        stretch = np.linspace(left, right, count)
        cell = np.full(count, (right - left) / (count - 1))
        cell[[0, -1]] *= 0.5
        if right < end:
            stretch[-1] = right - hair
        nodes.append(stretch)
        lengths.append(cell)
    x = np.concatenate(nodes)
    limit = -np.inf if recirculation_end is None else recirculation_end
    return Grid(x, np.concatenate(lengths), x < limit)


def _steps(station: FloatArray) -> list[float]:
    """Return the stations that are given twice: values step there."""
    return [float(x) for x in station[1:][np.diff(station) == 0.0]]


def _spaced(edges: list[float], gap: float) -> list[float]:
    """Drop edges closer than ``gap`` to the one before, keeping both ends."""
    kept = [edges[0]]
    kept.extend(edge for edge in edges[1:-1] if edge - kept[-1] > gap and edges[-1] - edge > gap)
    return [*kept, edges[-1]]
