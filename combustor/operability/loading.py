"""Light-up and relight: loading of the combustor against ignition limits."""

from __future__ import annotations

import math

from combustor.base.method import Method

IGNITION_LOADING = Method(
    key="ignition-loading",
    quantity="burning-velocity loading at which a combustor lights",
    source="Greenhough & Lefebvre 1957 loading P^1.75 A D^0.75 exp(T/300) / W; light-up and "
    "altitude relight seen between 1e6 and 5e6",
    reading="from memory",
    validity={"pressure": (2e4, 3e5), "temperature": (220.0, 400.0)},
    scatter="the band itself: certain to light above, hopeless below",
    note="low confidence, and spray quality at windmilling flow decides beside it",
)
FLAMMABLE_LIMITS = Method(
    key="flammable-limits",
    quantity="flammable range of a fuel in air",
    source="NFPA 497:2008 and Bureau of Mines Bulletin 627 at 25 degC; mixtures by Le Chatelier; "
    "lean limit falls by 0.0721 % per kelvin (Burgess-Wheeler)",
    reading="as given in",
    scatter="10 %",
    note="Bulletin 627 and the slope from memory",
)

CERTAIN_LIGHT, HOPELESS_LIGHT = 5e6, 1e6
LOADING_TEMPERATURE = 300.0  # K
WEAKENING = 0.000721  # per K above 25 degC
ROOM_TEMPERATURE = 298.15  # K

# Mole fraction in air at 25 degC, lean and rich.
LIMITS: dict[str, tuple[float, float]] = {
    "CH4": (0.05, 0.15),
    "C2H6": (0.030, 0.125),
    "C3H8": (0.021, 0.095),
    "C2H4": (0.027, 0.36),
    "H2": (0.04, 0.75),
    "CO": (0.125, 0.74),
    "NH3": (0.15, 0.28),
    "CH3OH": (0.06, 0.36),
}


def ignition_loading(
    pressure: float, area: float, height: float, temperature: float, air_flow: float
) -> float:
    """Return the burning-velocity loading, SI.

    Parameters
    ----------
    pressure, temperature : float
        Inlet totals [Pa], [K]
    area, height : float
        Reference area and height [m2], [m]
    air_flow : float
        [kg/s]

    Source
    ------
    ``IGNITION_LOADING``.
    """
    heat = math.exp(temperature / LOADING_TEMPERATURE)
    return pressure**1.75 * area * height**0.75 * heat / air_flow


def lean_flammable_limit(composition: dict[str, float], temperature: float) -> float | None:
    """Return the lean flammable limit of a fuel, mole fraction of fuel in air.

    Parameters
    ----------
    composition : dict of str to float
        Mole fractions of the fuel; what does not burn dilutes.
    temperature : float
        Of the mixture [K]

    Returns
    -------
    float or None
        None where a part that burns has no limit here.

    Source
    ------
    ``FLAMMABLE_LIMITS``.
    """
    inert = {"N2", "CO2", "AR", "HE", "H2O", "O2"}
    burning = {name.upper(): share for name, share in composition.items() if share > 0.0}
    inverse = 0.0
    for name, share in burning.items():
        if name in inert:
            continue
        if name not in LIMITS:
            return None
        inverse += share / LIMITS[name][0]
    if inverse <= 0.0:
        return None
    return max(1.0 - WEAKENING * (temperature - ROOM_TEMPERATURE), 0.0) / inverse
