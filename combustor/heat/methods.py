"""Every published method this room can use."""

from __future__ import annotations

from combustor.base.method import Method
from combustor.hardware.film_decay import FAR_DECAY
from combustor.heat.balance import BALANCE
from combustor.heat.conduction import CONDUCTION
from combustor.heat.convection import DUCT, FILM_CONVECTION
from combustor.heat.effusion import EFFUSION, HOLE_CONVECTION, TRANSPIRATION
from combustor.heat.enclosure import CASING_BALANCE, ENCLOSURE
from combustor.heat.film import ENTRAINMENT, SLOT_FILM, SUPERPOSITION, WEAK_FILM
from combustor.heat.gas_radiation import EXCHANGE, LUMINOSITY, LUMINOSITY_RATIO, LUMINOUS
from combustor.heat.grey_gas import GREY_GAS
from combustor.heat.join import JOIN
from combustor.heat.leckner import BROADENING
from combustor.heat.transport import TRANSPORT

METHODS: tuple[Method, ...] = (
    BALANCE,
    EXCHANGE,
    GREY_GAS,
    BROADENING,
    LUMINOUS,
    LUMINOSITY,
    LUMINOSITY_RATIO,
    DUCT,
    TRANSPORT,
    CONDUCTION,
    ENCLOSURE,
    CASING_BALANCE,
    SLOT_FILM,
    FAR_DECAY,
    WEAK_FILM,
    FILM_CONVECTION,
    JOIN,
    SUPERPOSITION,
    ENTRAINMENT,
    EFFUSION,
    HOLE_CONVECTION,
    TRANSPIRATION,
)
