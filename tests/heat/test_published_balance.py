"""The wall balance worked through by hand for one wall in five conditions."""

from __future__ import annotations

import numpy as np
import pytest

SOURCE = "Lefebvre-Herbert-1960-constants-from-memory-hand-calculation"
COLUMNS = (
    "gas_emissivity",
    "gas_coefficient",
    "air_coefficient",
    "adiabatic_wall_temperature",
    "temperature",
    "cold_side_temperature",
    "radiation_in",
    "convection_in",
    "radiation_out",
    "convection_out",
)
# blowing ratio, distance mm, effectiveness, then the columns (fluxes in kW/m2)
TABLE_TEXT = """
no-film              -     20 0      .2533  653.5 1033.5 2000   1288.5 1260.6 137.9 465.0 75.2 527.7
wall-jet-20mm        2.311 20 0.8311 .2533 2396.9 1033.5  961.1  946.9  937.2 174.9  34.1 15.5 193.5
wall-jet-40mm        2.311 40 0.7235 .2533 1625.8 1033.5 1095.6 1020.7 1007.3 168.3 121.8 24.3 265.9
boundary-layer-20mm  0.9   20 0.6669 .2533  621.4 1033.5 1166.3 1003.5  991.0 169.9 101.2 22.0 249.0
boundary-layer-40mm  0.9   40 0.5806 .2533  504.7 1033.5 1274.2 1024.3 1010.7 168.0 126.2 24.7 269.4
"""
TABLE = {row.split()[0]: row.split()[1:] for row in TABLE_TEXT.strip().splitlines()}


@pytest.mark.parametrize("case", TABLE, ids=[f"{SOURCE}:{case}" for case in TABLE])
def test_every_column_within_one_percent(bench, case):
    blowing_ratio = TABLE[case][0]
    distance, effectiveness, *expected = (float(cell) for cell in TABLE[case][1:])
    films = () if blowing_ratio == "-" else (bench.film(float(blowing_ratio)),)
    result = bench.march(films, stations=100)
    index = int(np.argmin(abs(result.station - distance / 1000.0)))
    assert result.station[index] == pytest.approx(distance / 1000.0)
    assert result.film_effectiveness[index] == pytest.approx(effectiveness, abs=1e-3)
    for column, value in zip(COLUMNS, expected, strict=True):
        scale = 1e3 if column.startswith(("radiation", "convection")) else 1.0
        assert getattr(result, column)[index] / scale == pytest.approx(value, rel=0.01), column


def test_conduction_matches_the_temperature_drop_of_the_sheet(bench):
    result = bench.march()
    drop = result.temperature - result.cold_side_temperature
    assert drop[0] == pytest.approx(27.83, rel=0.01)
    assert result.conduction == pytest.approx(26.0 / 1.2e-3 * drop)
