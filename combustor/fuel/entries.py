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
        Mole fractions; empty where a certificate stands in its place.
    source, reading : str
        Where the composition comes from and where that was really read.
    cautions : tuple of str
    synonyms : tuple of str
    certificate : mapping or None
        Of a liquid fuel, by the keys of `combustor.fuel.certificate.Certificate`.
    liquid : mapping or None
        Of a liquid that is a pure substance, by the keys of `combustor.fuel.record.Liquid`.
    """

    name: str
    composition: Mapping[str, float]
    source: str
    reading: str
    cautions: tuple[str, ...] = ()
    synonyms: tuple[str, ...] = ()
    certificate: Mapping[str, float] | None = None
    liquid: Mapping[str, float] | None = None


@cache
def entries() -> tuple[Entry, ...]:
    """Return every named fuel, in the order of the data file."""
    text = files("combustor.fuel").joinpath("catalogue.toml").read_text(encoding="utf-8")
    return tuple(
        Entry(
            name=name,
            composition=row.get("composition", {}),
            source=row["source"],
            reading=row["reading"],
            cautions=tuple(row.get("cautions", ())),
            synonyms=tuple(row.get("synonyms", ())),
            certificate=row.get("certificate"),
            liquid=row.get("liquid"),
        )
        for name, row in tomllib.loads(text).items()
    )


def plain(name: str) -> str:
    """Return a fuel name as the catalogue spells names: lower case, words joined by hyphens."""
    return "-".join(name.replace("_", " ").replace("-", " ").lower().split())
