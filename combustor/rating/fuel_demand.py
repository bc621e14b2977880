"""The fuel flow that meets an exit temperature, found while the other unknowns settle."""

from __future__ import annotations

from dataclasses import dataclass, field

SHALLOWEST, STEEPEST = 0.5, 20.0  # slope of exit temperature over that of complete combustion
SETTLING = 2  # first passes, in which split and wall still move by themselves
NEAR_FLOWS = 0.003  # of the fuel flow: two this near bracket one state, or a jump
LEAST_JUMP = 2.0  # K


@dataclass
class FuelDemand:
    """Safeguarded secant on exit temperature against fuel flow.

    Near partial blow-out a little more fuel also burns better, so the exit temperature rises
    several times faster than complete combustion would have it; a fixed slope then circles.

    Parameters
    ----------
    target : float
        Exit temperature wanted [K]
    tried : list of (float, float)
        Fuel flow [kg/s] and the gap to the target it left [K], in order.
    complete : float
        Rise of the exit temperature with fuel flow at complete combustion, last seen [K s/kg]
    """

    target: float
    tried: list[tuple[float, float]] = field(default_factory=list)
    complete: float = 0.0

    def next_flow(self, flow: float, temperature: float, slope: float) -> float:
        """Return the fuel flow to try next.

        Parameters
        ----------
        flow : float
            Fuel flow just tried [kg/s]
        temperature : float
            Exit temperature it gave [K]
        slope : float
            Rise of the exit temperature with fuel flow at complete combustion [K s/kg]
        """
        gap = self.target - temperature
        self.complete = slope
        if self.tried:
            last_flow, last_gap = self.tried[-1]
            if abs(flow - last_flow) > 1e-9 * flow:
                seen = (last_gap - gap) / (flow - last_flow)
                if SHALLOWEST * slope < seen < STEEPEST * slope:
                    slope = seen
        self.tried.append((flow, gap))
        return self._inside(flow + gap / slope)

    @property
    def falls_into_a_jump(self) -> bool:
        """Whether two fuel flows next to each other leave the target between them.

        They do where a stream goes out at one of them and burns at the other: no slope of a
        single state joins them.
        """
        settled = self.tried[SETTLING:]
        below = [(flow, gap) for flow, gap in settled if gap > 0.0]
        above = [(flow, gap) for flow, gap in settled if gap <= 0.0]
        return any(
            abs(high - low) < NEAR_FLOWS * high
            and lacking - over > LEAST_JUMP + STEEPEST * self.complete * abs(high - low)
            for low, lacking in below
            for high, over in above
        )

    def _inside(self, wanted: float) -> float:
        """Keep the next flow between the nearest flows known to be too small and too large."""
        low = max((flow for flow, gap in self.tried[-6:] if gap > 0.0), default=0.0)
        high = min((flow for flow, gap in self.tried[-6:] if gap <= 0.0), default=float("inf"))
        if low >= high or low < wanted < high:
            return wanted
        return 0.5 * (low + high) if high < float("inf") else wanted
