"""How sure: the chance and the band, against SciPy's distributions and a far larger sample."""

import math

import numpy as np
import pytest
from scipy import stats
from scipy.stats import qmc

import snowhold
from snowhold.snow import SNOWS, Span
from snowhold.sure import latin_hypercube, log_triangular

CASES = [
    {"pitch_deg": 15, "speed_mps": 6, "sidecut_radius_m": 8},
    {"pitch_deg": 10, "speed_mps": 5, "sidecut_radius_m": 10, "snow": "K"},
    {"pitch_deg": 20, "speed_mps": 11, "sidecut_radius_m": 8, "line_radius_m": 14},
    {"pitch_deg": 5, "speed_mps": 6.5, "sidecut_radius_m": 7, "angulation_deg": 10, "snow": "4F"},
]


def ask(**fields):
    reply = snowhold.answer({"ask": "turn", "suggest": False, **fields})
    assert "error" not in reply
    return reply


@pytest.mark.parametrize("case", CASES)
def test_converged_against_200_000_samples(case):
    few, many = ask(**case), ask(**case, samples=200_000)
    assert few["chance_holds"] == pytest.approx(many["chance_holds"], abs=0.02)
    for end in ("low", "high"):
        for phase in (18, 27, 36):
            assert few["margin_band"][end][phase] == pytest.approx(
                many["margin_band"][end][phase], abs=0.05, rel=0.03)


@pytest.mark.parametrize("case", CASES[:2])
def test_chance_agrees_with_an_independent_sample(case):
    """SciPy's Latin hypercube and its own quantile functions in place of ours, turn by turn."""
    unit = qmc.LatinHypercube(6, seed=7).random(1500)
    snow = SNOWS[case.get("snow", "P")]
    held = 0
    for u in unit:
        pitch = stats.norm(case["pitch_deg"], 2).ppf(u[0])
        speed = stats.lognorm(0.10, scale=case["speed_mps"]).ppf(u[1])
        radius = stats.lognorm(0.03, scale=case["sidecut_radius_m"]).ppf(u[2])
        angulation = stats.norm(5, 3).ppf(u[3])
        hardness, shear = (math.exp(stats.triang(
            math.log(s.value / s.low) / math.log(s.high / s.low), math.log(s.low),
            math.log(s.high / s.low)).ppf(v)) for s, v in ((snow.hardness_npm3, u[4]),
                                                          (snow.shear_strength_pa, u[5])))
        if angulation < 0:
            continue  # past the platform limit, whatever the rest
        held += _holds(pitch, speed, radius, angulation, hardness, shear)
    assert ask(**case)["chance_holds"] == pytest.approx(held / len(unit), abs=0.03)


def _holds(pitch_deg, speed, radius, angulation_deg, hardness, shear):
    """Does the whole turn hold: forces written out, the balance solved by a dense scan."""
    alpha, a = math.radians(pitch_deg), math.radians(angulation_deg)
    edges = np.linspace(max(a, 1e-9), math.pi / 2 - 1e-6, 1500)
    normal = 80 * 9.80665 * math.cos(alpha)
    for phase in np.radians(np.arange(0, 181, 15)):
        needed = 80 * (speed**2 / (radius * np.cos(edges))
                       - 9.80665 * math.sin(alpha) * math.cos(phase))
        balanced = np.tan(edges - a) * normal - needed
        if balanced[0] > 0 or not (balanced > 0).any():
            return False
        i = int(np.argmax(balanced > 0))
        edge, force = edges[i], np.tan(edges[i] - a) * normal
        depth = math.sqrt(2 * normal / 1.2 * math.tan(edge) / hardness)
        if (shear * depth * 1.2 < force or math.hypot(force, normal) > 2 * 80 * 9.80665
                or math.tan(edge) * normal < force):
            return False
    return True


def test_latin_hypercube_is_one():
    """McKay 1979: exactly one sample in each of n equal slices, column by column; and the columns
    do not follow each other."""
    columns = latin_hypercube(512)
    for name in ("pitch", "speed", "hardness"):
        shares = columns[name] if name == "hardness" else stats.norm.cdf(columns[name])
        assert sorted(np.floor(shares * 512).astype(int)) == list(range(512))
    assert abs(np.corrcoef(columns["pitch"], columns["speed"])[0, 1]) < 0.15


@pytest.mark.parametrize("span", [Span(1, 0.5, 3), Span(1, 1, 2), Span(2, 1, 2), Span(1, 1, 1)])
def test_snow_follows_scipys_triangle_and_stays_in_its_range(span):
    uniform = np.linspace(1e-6, 1 - 1e-6, 1001)
    values = log_triangular(span, 1.0, uniform)
    assert (values >= span.low * (1 - 1e-12)).all()
    assert (values <= span.high * (1 + 1e-12)).all()
    if span.low < span.high:
        width = math.log(span.high / span.low)
        expected = stats.triang(math.log(span.value / span.low) / width, math.log(span.low),
                                width).ppf(uniform)
        assert np.log(values) == pytest.approx(expected, abs=1e-9)
    assert log_triangular(span, 0.0, uniform) == pytest.approx(np.full(1001, span.value))


def test_knowing_everything_gives_certainty():
    spread = {"pitch_deg": 0, "speed_share": 0, "sidecut_share": 0, "angulation_deg": 0,
              "line_share": 0, "snow_share": 0}
    for speed, chance in ((6, 1.0), (9, 0.0)):
        reply = ask(pitch_deg=10, speed_mps=speed, sidecut_radius_m=8, spread=spread)
        assert reply["chance_holds"] == chance
    reply = ask(pitch_deg=10, speed_mps=6, sidecut_radius_m=8, spread=spread)
    assert reply["margin_band"]["low"] == pytest.approx(reply["grip_margin"], abs=1e-9)


def test_chances_add_up_and_repeat():
    one, two = ask(**CASES[0]), ask(**CASES[0])
    assert one == two
    assert sum(one["chances"].values()) == pytest.approx(1)


def test_unknown_and_absurd_spreads_are_refused():
    reply = snowhold.answer({"ask": "turn", **CASES[0],
                             "spread": {"pitch_deg": 50, "wind": 1}})
    assert {fault["field"] for fault in reply["error"]} == {"spread.pitch_deg", "spread.wind"}


def test_no_samples_no_chance():
    assert ask(**CASES[0], samples=0)["chance_holds"] is None
