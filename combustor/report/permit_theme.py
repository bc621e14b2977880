"""Words and signs of a verdict on a limit."""

from __future__ import annotations

WORDS: dict[str, str] = {
    "inside": "+ inside",
    "too close to call": "~ too close to call",
    "outside": "! outside",
    "undecided": "? undecided",
    "limit not verified": "? limit not verified",
}
MARKS: dict[str, str] = {
    "inside": "ok",
    "too close to call": "watch",
    "outside": "act",
    "undecided": "watch",
    "limit not verified": "watch",
}
CAUTION = (
    "A pre-check from a model, not a measurement: the authority, a certified test and a licensed "
    "engineer decide. The band is a judgement, not yet calibrated on machines: it should hold the "
    "measured value in 9 of 10."
)
