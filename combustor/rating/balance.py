"""Balances over the whole combustor, as every rating carries them."""

from __future__ import annotations

import numpy as np

from combustor.fuel.gas import Gas
from combustor.rating.couple import Coupled
from combustor.rating.operating import Operating
from combustor.rating.walls import casing_loss_of


def balances_of(gas: Gas, operating: Operating, coupled: Coupled) -> dict[str, float]:
    """Return the imbalances of air, elements and enthalpy.

    Returns
    -------
    dict
        "air" relative to the inlet air; "elements" the largest over the elements, relative to
        that element's inflow, of the chain and of the whole; "enthalpy" the larger of the
        chain's and the whole combustor's (air + fuel - casing loss - exit), over the fuel's
        heat; "chain_enthalpy" the chain's alone.
    """
    fire = coupled.fire
    assert fire.exit is not None and fire.chain.balances is not None
    air_flow, fuel_flow = operating.inlet.mass_flow, fire.fuel_flow
    entering = air_flow * gas.element_moles(operating.air)
    entering += fuel_flow * gas.element_moles(operating.fuel)
    entering += operating.water_flow * gas.element_moles(operating.water)
    leaving = fire.exit_flow * gas.element_moles(fire.exit.mass_fractions)
    present = entering > 0.0
    elements = float(np.max(np.abs(leaving - entering)[present] / entering[present]))
    supplied = air_flow * operating.air_enthalpy + fuel_flow * operating.fuel_enthalpy
    supplied += operating.water_flow * operating.water_enthalpy
    carried = fire.exit_flow * fire.exit.enthalpy + casing_loss_of(coupled.walls)
    heat = fuel_flow * operating.lower_heating_value
    return {
        "air": coupled.split.imbalance,
        "elements": max(elements, fire.chain.balances.elements),
        "enthalpy": max(abs(supplied - carried) / heat, fire.chain.balances.enthalpy),
        "chain_enthalpy": fire.chain.balances.enthalpy,
    }
