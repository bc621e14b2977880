"""Balances of the chain: what goes in against what comes out."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass

import numpy as np

from combustor.fuel.gas import Gas
from combustor.kinetics.streams import Bundle, Stream


@dataclass(frozen=True)
class Balances:
    """Relative imbalances of a chain.

    Parameters
    ----------
    elements : float
        Largest over the elements, of that element's inflow [-]
    enthalpy : float
        Of the fuel's lower heating value times its flow [-]
    """

    elements: float
    enthalpy: float


def balances(
    gas: Gas, fuel: Stream, inflows: Sequence[Stream], outflow: Bundle, heat_loss: float
) -> Balances:
    """Return how well elements and enthalpy of the whole chain close.

    Parameters
    ----------
    gas : Gas
    fuel : Stream
        Its heat is the measure of the enthalpy balance.
    inflows : sequence of Stream
        Everything that enters, the fuel included.
    outflow : Bundle
    heat_loss : float
        [W]

    Returns
    -------
    Balances
    """
    entering = np.sum(
        [inflow.mass_flow * gas.element_moles(inflow.mass_fractions) for inflow in inflows], axis=0
    )
    leaving = outflow.total_flow * (gas.element_matrix @ outflow.mean_moles) * 1000.0
    present = entering > 0.0
    elements = float(np.max(np.abs(leaving - entering)[present] / entering[present]))
    supplied = sum(inflow.mass_flow * inflow.enthalpy for inflow in inflows)
    carried = outflow.total_flow * outflow.mean_enthalpy
    heat = fuel.mass_flow * gas.lower_heating_value(fuel.mass_fractions)
    return Balances(elements, abs(supplied - heat_loss - carried) / heat)
