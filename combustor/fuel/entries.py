"""The catalogue of named fuels as data."""

from __future__ import annotations

import tomllib
from collections.abc import Mapping
from dataclasses import dataclass
from functools import cache
from importlib.resources import files


@dataclass(frozen=True)
class Entry:
    """One named fuel.

    Parameters
    ----------
    name : str
    composition : mapping of str to float
        Mole fractions.
    source, reading : str
        Where the composition comes from and where that was really read.
    cautions : tuple of str
    synonyms : tuple of str
    """

    name: str
    composition: Mapping[str, float]
    source: str
    reading: str
    cautions: tuple[str, ...] = ()
    synonyms: tuple[str, ...] = ()


@cache
def entries() -> tuple[Entry, ...]:
    """Return every named fuel, in the order of the data file."""
    text = files("combustor.fuel").joinpath("catalogue.toml").read_text(encoding="utf-8")
    return tuple(
        Entry(
            name=name,
            composition=row["composition"],
            source=row["source"],
            reading=row["reading"],
            cautions=tuple(row.get("cautions", ())),
            synonyms=tuple(row.get("synonyms", ())),
        )
        for name, row in tomllib.loads(text).items()
    )


def plain(name: str) -> str:
    """Return a fuel name as the catalogue spells names: lower case, words joined by hyphens."""
    return "-".join(name.replace("_", " ").replace("-", " ").lower().split())
