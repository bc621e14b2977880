"""Which reaction mechanism burns a fuel, and how far it can be trusted with it."""

from __future__ import annotations

import tomllib
from collections.abc import Iterable, Mapping
from dataclasses import dataclass, field
from pathlib import Path
from typing import Any

import cantera as ct

from combustor.base.errors import InputError, Problem
from combustor.base.method import Method, Reading
from combustor.fuel.lumped import parted
from combustor.fuel.mechanism import locate, shipped_folder


@dataclass(frozen=True)
class Mechanism:
    """One mechanism of the catalogue.

    Parameters
    ----------
    name, file, origin : str
        What it is called, which file, where that file comes from.
    burns, carries : frozenset of str
        Species it may be given as fuel; species a fuel may hold besides. Upper case.
    nitrogen_chemistry : bool
    source, reading, licence, note : str
        ``reading`` in the words of `combustor.base.method.Reading`.
    cautions : tuple of str
        Always said.
    species_cautions : mapping of str to str
        Said when the fuel holds more than ``minor_share`` of that species.
    minor_share : float
    adds : frozenset of str
        Species it does not hold that are added to it, lumped, with a fuel that has them.
    """

    name: str
    file: str
    origin: str
    burns: frozenset[str]
    carries: frozenset[str]
    nitrogen_chemistry: bool
    source: str
    reading: Reading
    licence: str
    note: str
    cautions: tuple[str, ...] = ()
    species_cautions: Mapping[str, str] = field(default_factory=dict)
    minor_share: float = 0.0
    validity: Mapping[str, tuple[float, float]] = field(default_factory=dict)
    adds: frozenset[str] = frozenset()

    @property
    def fuels(self) -> frozenset[str]:
        """Every species it may be given as fuel, added ones included."""
        return self.burns | self.adds

    @property
    def path(self) -> Path:
        """Where the file lies; a file of the same name in the working folder is not taken."""
        folders = [shipped_folder(), *(Path(folder) for folder in ct.get_data_directories())]
        for folder in folders:
            if folder.is_absolute() and (folder / self.file).is_file():
                return (folder / self.file).resolve()
        return locate(self.file)

    @property
    def method(self) -> Method:
        """The mechanism as a published method, for the table of sources and for notices."""
        return Method(
            key=f"mechanism-{Path(self.file).stem.lower()}",
            quantity=f"reaction rates and thermodynamics ({self.name})",
            source=self.source,
            reading=self.reading,
            validity=self.validity,
            note=self.note,
        )

    def cautions_for(self, composition: Mapping[str, float]) -> tuple[str, ...]:
        """Return what must be said when this mechanism burns that mixture (mole fractions)."""
        shares = {species.upper(): share for species, share in composition.items()}
        outside = sorted(set(shares) - self.fuels - self.carries)
        said = list(self.cautions)
        if outside:
            said.append(f"{self.name} was not made to burn {', '.join(outside)}")
        said += [
            text
            for species, text in self.species_cautions.items()
            if shares.get(species, 0.0) > self.minor_share
        ]
        return tuple(said)


def catalogue() -> tuple[Mechanism, ...]:
    """Return every mechanism the tool uses by itself, preferred first."""
    text = (shipped_folder() / "catalogue.toml").read_text(encoding="utf-8")
    return tuple(_mechanism(row) for row in tomllib.loads(text)["mechanism"])


def choose(compositions: Iterable[Mapping[str, float]], adding: bool = False) -> Mechanism:
    """Return the first mechanism that burns every one of these mixtures.

    Parameters
    ----------
    compositions : iterable of mapping
        Mole fractions of each fuel; several where one comparison must use one mechanism.
    adding : bool
        Whether lumped species of liquid fuels must be added to it.

    Raises
    ------
    InputError
        No mechanism burns them all; names the species that stand in the way.
    """
    wanted = {
        species.upper()
        for composition in compositions
        for species, share in composition.items()
        if share > 0.0
    }
    known = tuple(m for m in catalogue() if m.adds or not adding)
    for mechanism in known:
        if wanted <= mechanism.fuels | mechanism.carries:
            return mechanism
    raise InputError(_refusal(wanted, known))


def known_as(path: Path) -> Mechanism | None:
    """Return the catalogue's entry for a mechanism file, or None for a user's own."""
    for mechanism in catalogue():
        if mechanism.path == path.resolve():
            return mechanism
    return None


def method_of(mechanism: str | Path) -> Method:
    """Return the published method behind a mechanism file, a user's own included.

    Its ``notices`` take ``pressure`` (Pa) and ``temperature`` (K) where the catalogue states a
    range for them (see ``validity``).
    """
    path = Path(parted(mechanism)[0])
    known = known_as(path)
    if known is not None:
        return known.method
    return Method(
        key=f"mechanism-{path.stem.lower()}",
        quantity=f"reaction rates and thermodynamics ({path.name})",
        source=f"the user's own file {path.name}",
        reading="judgement",
        note="its validity is the user's to judge",
    )


def _refusal(wanted: set[str], known: tuple[Mechanism, ...]) -> Problem:
    burnable = frozenset[str]().union(*(m.fuels | m.carries for m in known))
    nowhere = sorted(wanted - burnable)
    if nowhere:
        return Problem(
            f"no mechanism here burns {', '.join(nowhere)}",
            key="composition",
            allowed=f"use {', '.join(sorted(burnable))}, or name a Cantera mechanism of your own "
            "that holds it",
        )
    lacking = [f"{m.name} lacks {', '.join(sorted(wanted - m.fuels - m.carries))}" for m in known]
    return Problem(
        f"no mechanism here burns {', '.join(sorted(wanted))} together ({'; '.join(lacking)})",
        key="composition",
        allowed="name a Cantera mechanism of your own that burns them all",
    )


def _mechanism(row: dict[str, Any]) -> Mechanism:
    return Mechanism(
        name=row["name"],
        file=row["file"],
        origin=row["from"],
        burns=frozenset(row["burns"]),
        adds=frozenset(row.get("adds", ())),
        carries=frozenset(row["carries"]),
        nitrogen_chemistry=row["nitrogen_chemistry"],
        source=row["source"],
        reading=row["reading"],
        licence=row["licence"],
        note=row["note"],
        cautions=tuple(row["cautions"]),
        species_cautions=row.get("species_cautions", {}),
        minor_share=row.get("minor_share", 0.0),
        validity={
            key.partition("_")[0]: (float(low), float(high))
            for key, (low, high) in row.get("validity", {}).items()
        },
    )
