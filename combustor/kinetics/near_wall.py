"""The stream beside the wall: film air that takes in core gas, reacts, and joins the core.

One stream beside the parallel streams of the core. In every cell it takes in film air and core
gas of the mean composition, reacts for the cell's residence time, and gives some of itself back.
Mass, elements and enthalpy pass from one to the other whole.
"""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from combustor.base.errors import InputError, Problem
from combustor.base.method import Method
from combustor.kinetics.streams import Bundle, Stream

Array = NDArray[np.float64]

NEAR_WALL = Method(
    key="near-wall-stream",
    quantity="reaction beside the wall",
    source="film air as a stream of its own that exchanges gas with the core as its film decays, "
    "reacts at the residence time of the cell and joins the core where the film has died",
    reading="derived",
    note="same velocity as the core; the films of all sides and slots are one stream",
)


@dataclass(frozen=True, eq=False)
class WallExchange:
    """What the stream beside the wall takes and gives in one cell.

    Parameters
    ----------
    air : tuple of Stream
        Film air that enters beside the wall.
    entrained : float
        Core gas taken in, before the core's own side air [kg/s]
    returned : float
        Given to the core behind the cell [kg/s]
    joins : bool
        The whole stream, this cell's film air with it, mixes into the core before the cell.
    """

    air: tuple[Stream, ...] = ()
    entrained: float = 0.0
    returned: float = 0.0
    joins: bool = False


NO_EXCHANGE = WallExchange()


def entered(
    core: Bundle, beside: Bundle | None, exchange: WallExchange, molar_masses: Array
) -> tuple[Bundle, Bundle | None]:
    """Return core and near-wall stream as they enter a cell, the core's side air still to come.

    Raises
    ------
    InputError
        More core gas is to be taken in than flows, or some where there is no film.
    """
    for inflow in exchange.air:
        if inflow.mass_flow > 0.0:
            beside = _with_air(beside, inflow, molar_masses)
    if beside is None:
        if exchange.entrained > 0.0:
            _refuse("no stream flows beside the wall to take core gas in", exchange.entrained)
        return core, None
    if exchange.joins:
        flow = beside.total_flow
        return core.joined(flow, beside.mean_moles, beside.mean_enthalpy), None
    if not 0.0 <= exchange.entrained < core.total_flow:
        _refuse("the core cannot give that much gas to the wall", exchange.entrained)
    if exchange.entrained > 0.0:
        beside = beside.joined(exchange.entrained, core.mean_moles, core.mean_enthalpy)
        core = core.drawn(exchange.entrained)
    return core, beside


def left(core: Bundle, beside: Bundle, returned: float) -> tuple[Bundle, Bundle]:
    """Return core and near-wall stream behind a cell, after some of the latter joined the core.

    Raises
    ------
    InputError
        More is to join than flows beside the wall.
    """
    if not 0.0 <= returned < beside.total_flow:
        _refuse("the stream beside the wall cannot give that much to the core", returned)
    if returned == 0.0:
        return core, beside
    core = core.joined(returned, beside.mean_moles, beside.mean_enthalpy)
    return core, beside.drawn(returned)


def together(core: Bundle, beside: Bundle | None) -> Bundle:
    """Return all streams side by side, the one beside the wall last."""
    if beside is None:
        return core
    return Bundle(
        np.append(core.flows, beside.flows),
        np.vstack((core.moles, beside.moles)),
        np.append(core.enthalpies, beside.enthalpies),
    )


def parted(bundle: Bundle, apart: int) -> tuple[Bundle, Bundle | None]:
    """Return core and near-wall stream of streams side by side; the inverse of `together`."""
    if apart == 0:
        return bundle, None
    core, beside = slice(None, -apart), slice(-apart, None)
    return (
        Bundle(bundle.flows[core], bundle.moles[core], bundle.enthalpies[core]),
        Bundle(bundle.flows[beside], bundle.moles[beside], bundle.enthalpies[beside]),
    )


def _with_air(beside: Bundle | None, inflow: Stream, molar_masses: Array) -> Bundle:
    moles = inflow.mass_fractions / molar_masses
    if beside is None:
        return Bundle(np.array([inflow.mass_flow]), moles[None, :], np.array([inflow.enthalpy]))
    return beside.joined(inflow.mass_flow, moles, inflow.enthalpy)


def _refuse(what: str, flow: float) -> None:
    raise InputError(Problem(what, "from 0 to below the flow it is taken from", "flow", flow))
