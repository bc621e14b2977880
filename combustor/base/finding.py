"""A finding: a judgement on a number."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Literal

Level = Literal["ok", "watch", "act"]


@dataclass(frozen=True)
class Finding:
    """Value, limit, why it matters and what to change.

    Parameters
    ----------
    level : {"ok", "watch", "act"}
        Inside the limit; near it or outside a method's validity; limit broken.
    what : str
        The quantity judged, named as in the tables.
    value, limit : float or None
        In ``unit``; ``None`` where the finding is not about a number.
    unit : str
        Unit of both, as printed.
    advice : str
        What to change and roughly by how much.
    source : str
        Method or rule behind the judgement.
    """

    level: Level
    what: str
    value: float | None = None
    limit: float | None = None
    unit: str = ""
    advice: str = ""
    source: str = ""
