"""Floor 3: the liner wall and the film beside it."""

from combustor.heat.effusion import Effusion
from combustor.heat.sides import AnnulusSide, Casing, Film, GasSide, Radiation
from combustor.heat.wall import WallMarch, WallPeak, march

__all__ = [
    "AnnulusSide",
    "Casing",
    "Effusion",
    "Film",
    "GasSide",
    "Radiation",
    "WallMarch",
    "WallPeak",
    "march",
]
