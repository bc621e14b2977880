"""The convergence record every iterative solve returns."""

from __future__ import annotations

from dataclasses import dataclass


@dataclass(frozen=True)
class Convergence:
    """Outcome of an iterative solve.

    Parameters
    ----------
    converged : bool
    residual : float
        Largest residual in the solve's own dimensionless measure.
    iterations : int
    message : str
        What stood in the way; when converged, empty or what it took.
    """

    converged: bool
    residual: float
    iterations: int
    message: str = ""
