"""Where a reaction mechanism is found: the user's file, the shipped ones, Cantera's own data."""

from __future__ import annotations

import difflib
import hashlib
from pathlib import Path

import cantera as ct

from combustor.base.errors import InputError, Problem
from combustor.fuel.lumped import parted

SUFFIXES = (".yaml", ".yml")


def shipped_folder() -> Path:
    """Return the folder of mechanisms that come with the tool.

    An installed package holds them inside itself; a checkout has them beside the package.

    Returns
    -------
    pathlib.Path
        The folder; it need not hold any file.
    """
    package = Path(__file__).resolve().parents[1]
    installed = package / "_mechanisms"
    return installed if installed.is_dir() else package.parent / "mechanisms"


def shipped_names() -> tuple[str, ...]:
    """Return the file names of the shipped mechanisms, sorted."""
    folder = shipped_folder()
    if not folder.is_dir():
        return ()
    return tuple(sorted(path.name for path in folder.iterdir() if path.suffix in SUFFIXES))


def fingerprint(mechanism: str) -> str:
    """Return a digest of a mechanism's file and of the lumped species added to it, hex."""
    file = locate(parted(mechanism)[0])
    text = str(mechanism).partition("#")[2]
    return hashlib.sha256(file.read_bytes() + text.encode()).hexdigest()


def locate(name: str | Path) -> Path:
    """Return the path of a mechanism file.

    Looked for in this order: a path to a file of the user's; a shipped mechanism; a file that
    comes with Cantera. The suffix ``.yaml`` may be left out for the last two.

    Parameters
    ----------
    name : str or pathlib.Path
        Path or bare name.

    Returns
    -------
    pathlib.Path
        An existing file.

    Raises
    ------
    InputError
        No such file anywhere; names the nearest known spelling.
    """
    given = Path(name).expanduser()
    if given.suffix in SUFFIXES and given.is_file():
        return given.resolve()
    file_names = [given] if given.suffix in SUFFIXES else [given.with_name(given.name + ".yaml")]
    for folder in (shipped_folder(), *_cantera_folders()):
        for file_name in file_names:
            candidate = folder / file_name
            if not given.is_absolute() and candidate.is_file():
                return candidate.resolve()
    known = [*shipped_names(), *_cantera_names()]
    nearest = difflib.get_close_matches(file_names[0].name, known, n=1, cutoff=0.6)
    raise InputError(
        Problem(
            "mechanism file not found",
            key="mechanism",
            value=str(name),
            allowed="give the path of a Cantera YAML file, or one of "
            + (", ".join(shipped_names()) or "gri30.yaml"),
            nearest=nearest[0] if nearest else None,
        )
    )


def _cantera_folders() -> tuple[Path, ...]:
    folders = (Path(folder) for folder in ct.get_data_directories())
    return tuple(folder for folder in folders if folder.is_absolute() and folder.is_dir())


def _cantera_names() -> list[str]:
    found = []
    for folder in _cantera_folders():
        found += [path.name for path in folder.glob("*.yaml")]
        found += [f"example_data/{path.name}" for path in folder.glob("example_data/*.yaml")]
    return sorted(found)
