"""Wall friction of the annulus air."""

from __future__ import annotations

import numpy as np

from combustor.base.method import Method
from combustor.gasdynamics import Number

HAALAND = Method(
    key="friction-haaland",
    quantity="Darcy friction factor",
    source="Haaland 1983, J. Fluids Engineering 105",
    reading="from memory",
    validity={"reynolds_number": (4.0e3, 1.0e8), "relative_roughness": (0.0, 0.05)},
    scatter="2 % against Colebrook-White",
)


def friction_factor_haaland(reynolds_number: Number, relative_roughness: Number) -> Number:
    """Return the Darcy friction factor, [1.8 log10(6.9/Re + (e/3.7)^1.11)]^-2.

    Parameters
    ----------
    reynolds_number : float or ndarray
        On the hydraulic diameter.
    relative_roughness : float or ndarray
        Wall roughness over hydraulic diameter.
    """
    inside = 6.9 / reynolds_number + (relative_roughness / 3.7) ** 1.11
    return (1.8 * np.log10(inside)) ** -2.0
