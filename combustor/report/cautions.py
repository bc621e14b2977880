"""What every report says once: what the figures are for, and what was not judged."""

from __future__ import annotations

from collections.abc import Iterable

PRE_CHECK = (
    "Calculated figures for a pre-check, not an approval. Casing and flame tube are hot parts "
    "under pressure, fed with fuel: local codes, type certification where it applies, and a "
    "licensed engineer decide."
)
NOT_ASSESSED = "Not assessed: combustion dynamics, buckling, life."


def cautions(of_fuels: Iterable[str] = ()) -> tuple[str, ...]:
    """Return the lines that end a report, those of the fuels between the general ones."""
    return (PRE_CHECK, *map(sentence, dict.fromkeys(of_fuels)), NOT_ASSESSED)


def sentence(words: str) -> str:
    """Return ``words`` with a capital first and a full stop last."""
    words = words.strip()
    return f"{words[:1].upper()}{words[1:]}{'' if words.endswith('.') else '.'}"
