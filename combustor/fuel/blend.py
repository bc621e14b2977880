"""Blends written as text: ``"natural-gas+30%hydrogen"``, shares by volume."""

from __future__ import annotations

import re
from collections.abc import Callable, Mapping
from dataclasses import dataclass

from combustor.base.errors import InputError, Problem
from combustor.fuel.entries import plain

HOW = 'write "FIRST+30%SECOND" (volume percent of the second), parentheses for blends in blends'


@dataclass(frozen=True)
class Part:
    """One named fuel of a blend and its share of the whole, by mole."""

    name: str
    share: float


def parts(text: str) -> tuple[Part, ...]:
    """Return the named fuels of a blend with their shares of the whole.

    Each ``+P%NAME`` makes NAME the share P of everything up to there:
    ``"a+20%b+50%c"`` is 40 % a, 10 % b, 50 % c.

    Raises
    ------
    InputError
        The text cannot be read as a blend, or a share lies outside 0 to 100 %.
    """
    tokens = re.findall(r"\(|\)|\+|[^()+]+", text)
    found, rest = _sum([token.strip() for token in tokens if token.strip()], text)
    if rest:
        raise _unreadable(text)
    return tuple(Part(name, share) for name, share in found.items())


def tidied(text: str) -> str:
    """Return a blend's text in one spelling: lower case, no spaces about ``+``, ``%``, ``()``."""
    return plain(re.sub(r"\s*([+%()])\s*", r"\1", text))


def mixed(
    blend: tuple[Part, ...], composition_of: Callable[[str], Mapping[str, float]]
) -> dict[str, float]:
    """Return the mole fractions of a blend; parts of share zero leave nothing behind."""
    total: dict[str, float] = {}
    for part in blend:
        if part.share > 0.0:
            for species, fraction in composition_of(part.name).items():
                total[species] = total.get(species, 0.0) + part.share * fraction
    return total


def _sum(tokens: list[str], text: str) -> tuple[dict[str, float], list[str]]:
    share, mixture, rest = _term(tokens, text)
    if share is not None:
        raise _unreadable(text)
    while rest and rest[0] == "+":
        share, added, rest = _term(rest[1:], text)
        if share is None:
            raise _unreadable(text)
        mixture = {name: (1.0 - share) * part for name, part in mixture.items()}
        for name, part in added.items():
            mixture[name] = mixture.get(name, 0.0) + share * part
    return mixture, rest


def _term(tokens: list[str], text: str) -> tuple[float | None, dict[str, float], list[str]]:
    if not tokens or tokens[0] in {"+", ")"}:
        raise _unreadable(text)
    if tokens[0] == "(":
        share, name, rest = None, "", tokens
    else:
        share, name = _share_and_name(tokens[0], text)
        rest = tokens[1:]
    if name:
        return share, {name: 1.0}, rest
    if not rest or rest[0] != "(":
        raise _unreadable(text)
    mixture, rest = _sum(rest[1:], text)
    if not rest or rest[0] != ")":
        raise _unreadable(text)
    return share, mixture, rest[1:]


def _share_and_name(token: str, text: str) -> tuple[float | None, str]:
    before, percent, after = token.partition("%")
    if not percent:
        return None, before.strip()
    try:
        share = float(before)
    except ValueError:
        raise _unreadable(text) from None
    if not 0.0 <= share <= 100.0:
        raise InputError(
            Problem("share of a blend outside 0 to 100 %", key="fuel", value=text, allowed=HOW)
        )
    return share / 100.0, after.strip()


def _unreadable(text: str) -> InputError:
    return InputError(
        Problem("cannot be read as a fuel or blend", key="fuel", value=text, allowed=HOW)
    )
