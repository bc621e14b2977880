"""The compliance pre-check on a rated case: which limits bind, numbers, gaps, cycle totals."""

from __future__ import annotations

import shutil
from dataclasses import replace
from datetime import date
from pathlib import Path

import pytest

import combustor
from combustor.base.errors import InputError
from combustor.case.load import loads_case
from combustor.emissions.landing_takeoff import characteristic_factor
from combustor.studies.comply import comply
from combustor.studies.landing_cycle import CYCLE

DEMO = Path(__file__).parents[2] / "demo"
# Coarse, so that a rating costs little; what is tested here does not depend on it.
COARSE = "[model]\nstreams = 3\ncells = 2\nwall_stations = 20\n\n[rules]"
TEXT = (DEMO / "pump_drive_permit.toml").read_text().replace("[rules]", COARSE)
HEAD = TEXT[: TEXT.index("[rules]")]
FULL_FACTS = """
use = "mechanical-drive"
unit_state = "new"
site = "continental"
built = 2015-06-01
heat_input = "13 MW"
heat_input_basis = "LHV"
fuel_sulfur = "15 ppm"
"""


PERMIT = (DEMO / "permits" / "ostrelle_waterworks.toml").read_text()


@pytest.fixture(scope="module")
def demo(tmp_path_factory):
    """The demo, coarse, with limits wide enough for a coarse answer."""
    folder = tmp_path_factory.mktemp("case")
    (folder / "permits").mkdir()
    wide = PERMIT
    for limit, wider in (("250", "2500"), ("4.0", "9.0"), ("30", "90"), ("10", "30")):
        wide = wide.replace(f"limit = {limit}\n", f"limit = {wider}\n")
    (folder / "permits" / "ostrelle_waterworks.toml").write_text(wide)
    return loads_case(TEXT, str(folder / "case.toml"))


@pytest.fixture(scope="module")
def ratings(demo):
    return combustor.rate(demo)


def case_of(rules, head=HEAD):
    warm = head.replace("load =", 'ambient_temperature = "15 degC"\nload =')
    return loads_case(f"{warm}\n[rules]\n{rules}", str(DEMO / "case.toml"))


def test_the_demo_is_inside_its_permit(demo, ratings):
    check = comply(demo, ratings=ratings)
    assert check.inside and check.gaps == () and check.overdue == ()
    assert len(check.verdicts) == 3 * 6 + 2 * 3
    assert {v.verdict for v in check.verdicts} == {"inside"}
    full = next(p for p in ratings.points if p.name == "full")
    rate = full.emissions.ei_nox * full.fuel_flow * 3600.0
    by_row = {v.row: v for v in check.verdicts if v.point == "full"}
    assert by_row["nox-hourly-mass"].predicted == pytest.approx(rate, rel=1e-9)
    assert by_row["nox-yearly-mass"].predicted == pytest.approx(2.5 * rate, rel=1e-9)
    assert by_row["nox-per-output"].predicted == pytest.approx(rate / 3.0, rel=1e-9)
    # the permit's own 21 % against the 20.95 % of the rating's figure
    ppm = full.emissions.nox_mass_15 * 1e6
    o2 = full.emissions.o2_dry
    scale = (0.21 - 0.15) / (0.21 - o2) * (0.2095 - o2) / (0.2095 - 0.15)
    assert by_row["nox"].predicted == pytest.approx(ppm * scale, rel=1e-9)


def test_every_verdict_holds_the_numbers_it_needs(demo, ratings):
    for v in comply(demo, ratings=ratings).verdicts:
        assert v.band_low < v.predicted < v.band_high <= v.limit
        assert v.margin == pytest.approx(v.limit - v.predicted)
        assert 0.0 <= v.probability_of_exceeding < 0.06


def test_rows_from_memory_and_their_confirmation(ratings):
    facts = f'names = ["us-40cfr60-kkkk"]\n{FULL_FACTS}'
    case = case_of(facts)
    check = comply(case, ratings=ratings)
    by_row = {(v.point, v.row): v for v in check.verdicts}
    ppm = by_row["full", "new-gas-mechanical-50-ppm"]
    assert ppm.verdict == "limit not verified" and ppm.limit == 100.0
    full = next(p for p in ratings.points if p.name == "full").emissions
    scale = (0.209 - 0.15) / (0.209 - full.o2_dry) * (0.2095 - full.o2_dry) / (0.2095 - 0.15)
    assert ppm.predicted == pytest.approx(full.nox_dry_15 * 1e6 * scale, rel=1e-9)
    assert {by_row[p, "relaxed-30MW-ppm"].limit for p in ("p60", "p40", "idle")} == {150.0}
    assert ("p80", "relaxed-30MW-ppm") not in by_row
    assert not check.inside
    rows = [f"new-gas-mechanical-50-{t}" for t in ("ppm", "ng-per-J", "lb-per-MWh")]
    stated = ", ".join(f'"us-40cfr60-kkkk/{r}: eCFR 2026-11-30, table 1"' for r in rows)
    confirmed = comply(case_of(f"{facts}confirmed = [{stated}]"), ratings=ratings)
    found = {(v.point, v.row): v for v in confirmed.verdicts}["full", rows[0]]
    assert found.verdict == ppm.would_be
    assert found.limit_status == "confirmed by the user"


def test_sulfur_limits_read_in_a_copy_give_a_verdict(ratings):
    check = comply(case_of(f'names = ["us-40cfr60-kkkk"]\n{FULL_FACTS}'), ratings=ratings)
    sulfur = [v for v in check.verdicts if v.pollutant == "SO2" and v.point == "full"]
    assert {v.verdict for v in sulfur} == {"inside"}
    per_heat = next(v for v in sulfur if v.unit == "ng/J HHV")
    # 15 ppm sulfur, all of it but the SO3 share: 2 x 15e-6 x 0.98 / HHV
    hhv = combustor.fuel_of(case_of(FULL_FACTS)).higher_heating_value
    assert per_heat.predicted == pytest.approx(2.0 * 15e-6 * 0.98 / hhv * 1e12, rel=2e-3)


@pytest.mark.parametrize(
    ("fact", "missing"),
    [
        ("unit_state", "unit_state"),
        ("site", "site"),
        ("use", "use"),
        ("built", "built"),
        ("fuel_sulfur", "fuel_sulfur"),
    ],
)
def test_a_removed_fact_is_named_and_nothing_gets_better(ratings, fact, missing):
    whole = f'names = ["us-40cfr60-kkkk"]\n{FULL_FACTS}'
    before = {(v.point, v.row): v.verdict for v in comply(case_of(whole), ratings=ratings).verdicts}
    less = "\n".join(line for line in whole.splitlines() if not line.startswith(f"{fact} ="))
    check = comply(case_of(less), ratings=ratings)
    assert any(v.verdict == "undecided" and missing in v.missing for v in check.verdicts)
    for v in check.verdicts:
        if v.verdict == "inside":
            assert before[v.point, v.row] == "inside"


def test_without_names_every_shipped_set_is_looked_at(ratings):
    check = comply(case_of('use = "mechanical-drive"\ncountry = "DE"'), ratings=ratings)
    whole = {s.rule: s for s in check.standings if s.row == ""}
    assert len(whole) == 9
    assert whole["us-40cfr60-kkkk"].binds is False and "DE" in whole["us-40cfr60-kkkk"].why
    assert whole["icao-annex-16"].binds is False
    assert whole["de-44-bimschv"].binds is True
    assert whole["de-13-bimschv"].binds is False and "50 MW" in whole["de-13-bimschv"].why


def test_where_no_limit_binds_there_is_no_verdict(ratings):
    check = comply(case_of(f'names = ["icao-annex-16"]\n{FULL_FACTS}'), ratings=ratings)
    assert check.verdicts == () and check.inside is None
    (standing,) = check.standings
    assert standing.binds is False and "mechanical-drive" in standing.why


def test_a_set_left_out_on_a_derived_fact_is_no_pass(ratings):
    large = 'names = ["eu-2010-75-annex-v"]\nuse = "electric"\n'
    check = comply(case_of(large), ratings=ratings)
    assert check.verdicts == () and check.leaning_on == ("heat_input",)
    assert check.inside is False
    assert any("state heat_input" in note for note in check.notes)
    stated = comply(case_of(f'{large}heat_input = "13 MW"'), ratings=ratings)
    assert stated.inside is None and stated.leaning_on == ()


def test_a_set_past_its_review_is_flagged(demo, ratings):
    assert comply(demo, ratings=ratings, today=date(2030, 1, 1)).overdue == ("ostrelle_waterworks",)


def test_a_gap_says_what_would_close_it(ratings):
    check = comply(case_of(f'names = ["eu-2015-2193"]\n{FULL_FACTS}'), ratings=ratings)
    (gap,) = check.gaps
    assert (gap.pollutant, gap.rule) == ("NOx", "eu-2015-2193")
    levers = {remedy.what: remedy for remedy in gap.remedies}
    assert set(levers) == {
        "flame temperature",
        "residence time",
        "unmixedness",
        "water injection",
        "staging",
    }
    assert "colder" in levers["flame temperature"].change
    assert "second rating" in levers["unmixedness"].note


def test_points_without_a_result_are_undecided(demo, ratings):
    broken = replace(
        ratings,
        points=tuple(
            replace(p, status="blown_out", emissions=None) if p.name == "p60" else p
            for p in ratings.points
        ),
    )
    check = comply(demo, ratings=broken)
    silent = [v for v in check.verdicts if v.point == "p60"]
    assert len(silent) == 6 and {v.verdict for v in silent} == {"undecided"}
    assert all("blown out" in v.reason for v in silent)
    assert not check.inside


def test_of_a_choice_one_option_is_enough(demo, ratings, tmp_path):
    permit = PERMIT.replace("limit = 250", "limit = 2500")
    block = '[[limits]]\nrow = "nox"\n'
    twin = permit.replace(block, f'{block}choice = "either"\n', 1)
    head, limit = twin[: twin.index(block)], twin[twin.index(block) :].split("\n\n")[0]
    tight = limit.replace('row = "nox"', 'row = "nox-tight"').replace("2500", "5")
    path = tmp_path / "choice.toml"
    path.write_text(f"{head}{limit}\n\n{tight}\n")
    check = comply(demo, rules=[str(path)], ratings=ratings)
    assert {v.verdict for v in check.verdicts} == {"inside", "outside"}
    assert check.inside and check.gaps == ()
    path.write_text(f"{head}{tight.replace('choice', '#choice')}\n")
    assert not comply(demo, rules=[str(path)], ratings=ratings).inside


AIRCRAFT = """
names = ["icao-annex-16"]
use = "aircraft"
rated_thrust = "30 kN"
pressure_ratio = 20
type_date = 2005-01-01
engines_tested = 3
confirmed = ["icao-annex-16/caep4-nox-small-low: Annex 16 volume II, fourth edition, 2.3.2 d)"]
"""


def cycle_head():
    head = HEAD
    for mode, load in (
        ("take-off", '"100 %"'),
        ("climb", '"80 %"'),
        ("approach", '"60 %"'),
        ("idle", '"3 %"'),
    ):
        head = head.replace(f"load = {load}", f'load = {load}\ncycle_mode = "{mode}"')
    return head


def test_landing_and_take_off_totals(ratings):
    check = comply(case_of(AIRCRAFT, cycle_head()), ratings=ratings)
    by_row = {v.row: v for v in check.verdicts}
    assert set(by_row) == {"hc", "co", "caep4-nox-small-low"}
    point = {p.name: p for p in ratings.points}
    seconds = {"full": 42.0, "p80": 132.0, "p60": 240.0, "idle": 1560.0}
    for row, pollutant, index in (
        ("caep4-nox-small-low", "NOx", "ei_nox"),
        ("co", "CO", "ei_co"),
        ("hc", "UHC", "ei_uhc"),
    ):
        grams = sum(
            1e3 * getattr(point[name].emissions, index) * point[name].fuel_flow * time
            for name, time in seconds.items()
        )
        expected = grams / 30.0 / characteristic_factor(pollutant, 3)
        assert by_row[row].predicted == pytest.approx(expected, rel=1e-4)
        assert by_row[row].point == CYCLE and by_row[row].unit == "g/kN"
    nox = by_row["caep4-nox-small-low"]
    assert nox.limit == pytest.approx(37.572 + 1.6 * 20.0 - 0.2087 * 30.0)
    assert nox.verdict in ("inside", "too close to call", "outside")


def test_a_file_may_hold_limits_of_points_and_of_the_cycle(ratings, tmp_path):
    path = tmp_path / "both.toml"
    last = PERMIT.split("\n\n")[-1]
    cycle = last.replace('"so2"', '"cycle"').replace('"SO2"', '"CO"')
    cycle = cycle.replace('"mg/Nm3@15"', '"g/kN"').replace("limit = 12", "limit = 5000")
    path.write_text(f"{PERMIT}\n{cycle}".replace('"mechanical-drive"', '"aircraft"'))
    facts = AIRCRAFT.replace("icao-annex-16", str(path), 1).split("confirmed")[0]
    case = case_of(f'{facts}heat_input = "13 MW"\nheat_input_basis = "LHV"', cycle_head())
    check = comply(case, ratings=ratings)
    assert {v.row for v in check.verdicts if v.point == CYCLE} == {"cycle"}
    assert "nox-hourly-mass" in {v.row for v in check.verdicts if v.point == "idle"}


@pytest.mark.parametrize(
    ("old", "new", "said"),
    [
        ("engines_tested = 3", "", "engines_tested"),
        ('rated_thrust = "30 kN"', "", "rated_thrust"),
        ("type_date = 2005-01-01", "", "type_date"),
        ("pressure_ratio = 20", "", "pressure_ratio"),
    ],
)
def test_the_cycle_without_a_fact_is_undecided(ratings, old, new, said):
    text = AIRCRAFT.replace(old, new)
    check = comply(case_of(text, cycle_head()), ratings=ratings)
    nox = [v for v in check.verdicts if v.row == "caep4-nox-small-low" or v.row == ""]
    assert nox and all(v.verdict != "inside" for v in nox)
    assert any(said in " ".join((*v.missing, v.reason)) for v in check.verdicts)


def test_the_cycle_without_a_mode_names_it(ratings):
    head = cycle_head().replace('cycle_mode = "climb"', "")
    check = comply(case_of(AIRCRAFT, head), ratings=ratings)
    assert {v.verdict for v in check.verdicts} == {"undecided"}
    assert all("cycle_mode climb" in v.reason for v in check.verdicts)


def test_two_points_of_one_mode_are_refused(ratings):
    head = cycle_head().replace('cycle_mode = "climb"', 'cycle_mode = "take-off"')
    with pytest.raises(InputError, match="two points are the take-off"):
        comply(case_of(AIRCRAFT, head), ratings=ratings)


@pytest.mark.parametrize(
    ("rules", "said"),
    [
        ('names = ["us-40cfr60-kkk"]', "did you mean 'us-40cfr60-kkkk'"),
        ('names = ["us-40cfr60-kkkk"]\nconfirmed = ["us-40cfr60-kkkk/x: here"]', "no such row"),
        (
            'names = ["us-40cfr60-kkkk"]\nconfirmed = ["us-40cfr60-kkkk/relaxed-30MW-ppm"]',
            "does not say where",
        ),
        ('names = ["us-40cfr60-kkkk"]\nconfirmed = ["x/y: here"]', "no such rule set"),
        ('names = ["us-40cfr60-kkkk"]\nuse = "mechanical drve"', "did you mean 'mechanical-drive'"),
    ],
)
def test_wrong_rules_of_a_case_are_refused(ratings, rules, said):
    with pytest.raises(InputError, match="rules") as refused:
        comply(case_of(rules), ratings=ratings)
    assert said in str(refused.value)


@pytest.mark.parametrize(
    ("rules", "said"),
    [
        ('built = "last year"', "rules.built: not a day"),
        ("hours = 9000", "rules.hours"),
        ('heat_input_basis = "gross"', "LHV, HHV"),
        ('fuel_sulfur = "50 %"', "rules.fuel_sulfur"),
        ("fuel_sulphur = 0.1", "did you mean 'fuel_sulfur'"),
        ('unit_state = "old"', "new, existing, modified"),
    ],
)
def test_wrong_facts_are_refused_with_the_case(rules, said):
    with pytest.raises(InputError) as refused:
        case_of(rules)
    assert said in str(refused.value)


def test_the_public_call_rates_and_judges(tmp_path):
    shutil.copytree(DEMO, tmp_path / "demo")
    case = combustor.load_case(tmp_path / "demo" / "pump_drive_permit.toml")
    check = combustor.comply(case, points=["full"])
    assert check.inside and {v.point for v in check.verdicts} == {"full"}
