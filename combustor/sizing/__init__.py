"""Floor 4: from targets to metal."""

from combustor.sizing.record import Candidate, Design, Dimension, ZoneTarget
from combustor.sizing.size import size

__all__ = ["Candidate", "Design", "Dimension", "ZoneTarget", "size"]
