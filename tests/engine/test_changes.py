"""What to change: every suggestion holds, and nothing nearer does (by SciPy's root finding on the
margin, or by asking again)."""

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st
from scipy.optimize import brentq

import snowhold

BASE = {"ask": "turn", "samples": 0, "sidecut_radius_m": 8}

TURNS = st.fixed_dictionaries({
    "pitch_deg": st.floats(0, 45), "speed_mps": st.floats(1, 20),
    "sidecut_radius_m": st.floats(5, 20), "angulation_deg": st.floats(4.2, 25),
    "snow": st.sampled_from(["F", "4F", "1F", "P", "K", "I"]),
    "rider_mass_kg": st.floats(30, 120), "max_load_g": st.floats(1.3, 3),
    "line_radius_m": st.none() | st.floats(5, 80), "from_phase_deg": st.floats(0, 60)})


def ask(**fields):
    reply = snowhold.answer({**BASE, **fields})
    assert "error" not in reply
    return reply


def verdict(**fields):
    return ask(**fields, suggest=False)["verdict"]


@settings(deadline=None, max_examples=80)
@given(TURNS)
def test_what_is_suggested_holds_and_nothing_nearer_does(turn):
    reply = ask(**turn)
    if reply["verdict"] == "holds":
        assert reply["changes"] == []
        return
    efforts = [change["effort"] for change in reply["changes"] if change["enough"]]
    assert efforts == sorted(efforts)
    for change in reply["changes"]:
        name, now, to = change["input"], change["from"], change["to"]
        assert now == turn[name]
        if not change["enough"]:
            assert to is None
            continue
        assert verdict(**{**turn, name: to}) == "holds"
        if name in ("speed_mps", "pitch_deg", "angulation_deg", "sidecut_radius_m"):
            for share in (0.25, 0.5, 0.75, 0.999):
                nearer = now + (to - now) * share
                assert verdict(**{**turn, name: nearer}) != "holds"


@settings(deadline=None, max_examples=60)
@given(TURNS)
def test_what_is_called_not_enough_is_not_enough(turn):
    """Asked again over the whole range of that input."""
    reply = ask(**turn)
    for change in reply["changes"]:
        if change["enough"]:
            continue
        tries = {"speed_mps": [0.5 + 0.5 * i for i in range(60)],
                 "pitch_deg": list(range(0, 51, 2)), "angulation_deg": list(range(0, 41, 2)),
                 "sidecut_radius_m": list(range(3, 41)),
                 "snow": ["F", "4F", "1F", "P", "K", "I"], "line_radius_m": []}
        for value in tries[change["input"]]:
            assert verdict(**{**turn, change["input"]: value}) != "holds"


def test_speed_to_the_root_that_scipy_finds():
    turn = {"pitch_deg": 15, "speed_mps": 6.9}
    found = brentq(lambda v: min(ask(**{**turn, "speed_mps": v})["grip_margin"]) - 0.15, 5, 6.85)
    speed = next(c for c in ask(**turn)["changes"] if c["input"] == "speed_mps")
    assert speed["to"] == pytest.approx(found, rel=1e-5)
    assert speed["effort"] == pytest.approx((6.9 - found) / 0.69, rel=1e-3)


def test_smallest_against_its_spread_comes_first():
    """A speed that is known well is a harder thing to change than one that is not."""
    turn = {"pitch_deg": 15, "speed_mps": 6.95}
    assert ask(**turn)["changes"][0]["input"] == "speed_mps"
    sure = ask(**turn, spread={"speed_share": 0.001})["changes"]
    assert sure[0]["input"] != "speed_mps"


def test_nothing_helps_is_said_plainly():
    """On ice at speed no single change of angulation or pitch is enough."""
    changes = {c["input"]: c for c in ask(pitch_deg=20, speed_mps=12, snow="I")["changes"]}
    assert not changes["angulation_deg"]["enough"]
    assert changes["angulation_deg"]["effort"] is None
