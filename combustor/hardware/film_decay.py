"""How a film's effectiveness falls with distance behind its slot."""

from __future__ import annotations

import numpy as np
from numpy.typing import ArrayLike, NDArray

from combustor.base.method import Method

NEAR_DECAY = Method(
    key="film-decay-near",
    quantity="decay of film effectiveness with distance over slot height",
    source="Ballal & Lefebvre 1972-73: (x/s)^-0.2",
    reading="from memory",
    validity={"slot_heights": (0.0, 150.0)},
)
FAR_DECAY = Method(
    key="film-decay-far",
    quantity="decay of film effectiveness beyond 150 slot heights",
    source="fully developed turbulent mixing, x^-0.8, as in the film laws of the 1960s "
    "(Stollery & El-Ehwany 1965 and others)",
    reading="from memory",
    validity={"slot_heights": (150.0, 1000.0)},
    note="continues the near law from its end, where that would let a film live for ever",
)

FAR_START = 150.0
NEAR_EXPONENT, FAR_EXPONENT = -0.2, -0.8


def decay(slot_heights: ArrayLike) -> NDArray[np.float64]:
    """Return the decay of effectiveness, by distance over slot height [-]; 1 at one height."""
    distance = np.asarray(slot_heights, dtype=float)
    near = np.minimum(distance, FAR_START) ** NEAR_EXPONENT
    return near * (np.maximum(distance, FAR_START) / FAR_START) ** FAR_EXPONENT


def decay_exponent(slot_heights: ArrayLike) -> NDArray[np.float64]:
    """Return d ln(decay) / d ln(distance) [-]."""
    distance = np.asarray(slot_heights, dtype=float)
    return np.where(distance <= FAR_START, NEAR_EXPONENT, FAR_EXPONENT)
