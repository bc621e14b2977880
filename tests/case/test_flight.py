"""Operating points stated by altitude, flight Mach number and ram recovery."""

import pytest

from combustor.base.errors import InputError
from combustor.case import load_case, loads_case
from combustor.case.load import override

DEMO = "demo/industrial_can.toml"
POINT = """[[points]]
name = "relight"
kind = "relight"
air_flow = "1.0 kg/s"
altitude = "9000 m"
flight_mach = 0.8
ram_recovery = "90 %"
fuel_air_ratio = 0.03
"""


def case_with(point: str, request: pytest.FixtureRequest):
    text = (request.config.rootpath / DEMO).read_text()
    return loads_case(text.replace("[targets]", f"{point}\n[targets]", 1))


def test_the_inlet_is_what_leaves_the_intake(request):
    # by hand: 229.65 K x 1.128; 30742 Pa x (1 + 0.9 x 0.52434)
    point = case_with(POINT, request).point("relight")
    assert point.inlet_temperature == pytest.approx(259.045, abs=0.005)
    assert point.inlet_pressure == pytest.approx(45250.0, rel=1e-4)
    assert point.altitude == 9000.0


def test_another_altitude_moves_the_inlet(request):
    case = case_with(POINT, request)
    higher = override(case, "points.relight.altitude", "10000 m").point("relight")
    assert higher.inlet_pressure < case.point("relight").inlet_pressure
    assert "inlet_pressure" not in higher.model_dump()
    assert override(case, "points.idle.inlet_pressure", 3.1e5).point("idle").altitude is None


@pytest.mark.parametrize(
    ("change", "said"),
    [
        (("altitude", 'inlet_pressure = "0.4 bar"\naltitude'), "contradicts altitude"),
        (('altitude = "9000 m"\n', ""), "no altitude stated"),
        (("9000 m", "90 km"), "outside the plausible range"),
        (("9000 m", "9000 kg"), "altitude"),
        (("flight_mach = 0.8", "flight_mach = 8"), "flight Mach number outside"),
    ],
)
def test_contradictions_are_refused_with_their_place(request, change, said):
    with pytest.raises(InputError, match=said) as refused:
        case_with(POINT.replace(*change), request)
    assert all(problem.line for problem in refused.value.problems if problem.key != "points[5]")


def test_points_without_flight_are_as_before(request):
    case = load_case(request.config.rootpath / DEMO)
    assert {"altitude", "flight_mach", "ram_recovery"}.isdisjoint(
        case.points[0].model_dump(exclude_none=True)
    )
