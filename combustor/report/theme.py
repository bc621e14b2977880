"""Words, signs and colours of a judgement. Colour only repeats what word and sign say."""

from __future__ import annotations

VERDICTS: dict[str, str] = {"ok": "+ ok", "watch": "~ watch", "act": "! act"}
STATUSES: dict[str, str] = {
    "burning": "burning",
    "blown_out": "! blown out",
    "not_converged": "! not converged",
}
_SEVERITY = ("ok", "watch", "act")

# Terminal colours (ANSI, so that they follow the user's own palette).
STYLES: dict[str, str] = {
    "ok": "green",
    "watch": "yellow",
    "act": "bold red",
    "heading": "bold bright_blue",
    "title": "bold",
    "header": "bright_blue",
    "rule": "bright_black",
    "label": "bright_black",
    "": "",
}


def verdict(level: str) -> str:
    """Return sign and word of a finding's level."""
    return VERDICTS[level]


def status(word: str) -> str:
    """Return sign and words of a point's status."""
    return STATUSES[word]


def worst(levels: list[str]) -> str:
    """Return the gravest level; ``ok`` when there is none."""
    return max(levels, key=_SEVERITY.index, default="ok")


def severity(level: str) -> int:
    """Return the rank of a level, rising with gravity."""
    return _SEVERITY.index(level)
