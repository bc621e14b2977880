"""The burning velocity of one flame, where it is asked for."""

from __future__ import annotations

from typing import Any

from combustor.operability.burning_velocity import BurningVelocity
from combustor.report.document import Block, Facts, Prose
from combustor.report.field import Field, row

VELOCITY = Field("burning_velocity_m_s", "burning velocity", "value", "m/s", 1.0, figures=3)


def velocity_blocks(found: BurningVelocity) -> tuple[Block, ...]:
    """Return the burning velocity, its method and how far to trust it."""
    facts = Facts(((f"laminar {VELOCITY.label}", VELOCITY.with_unit(found)),))
    words = f"{found.method.source} ({found.method.reading}); {found.method.scatter}."
    return (facts, Prose(words), *(Prose(f"{line}.") for line in found.notices))


def velocity_entries(found: BurningVelocity) -> dict[str, Any]:
    """Return the entries of the JSON document."""
    return {
        **row((VELOCITY,), found),
        "burning_velocity_method": found.method.key,
        "burning_velocity_scatter": found.method.scatter,
        "burning_velocity_notices": [str(notice) for notice in found.notices],
    }
