"""The speed window over pitch, against the turn's own verdict."""

import math

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

import snowhold

KMH = 1 / 3.6


def window(**fields):
    reply = snowhold.answer({"ask": "window", "pitch_deg": 10, "speed_mps": 6,
                             "sidecut_radius_m": 8, **fields})
    assert "error" not in reply
    return reply


def verdict(pitch_deg, speed_mps, **fields):
    return snowhold.answer({"ask": "turn", "pitch_deg": pitch_deg, "speed_mps": speed_mps,
                            "sidecut_radius_m": 8, "samples": 0, "suggest": False,
                            **fields})["verdict"]


def expected(reply, pitch_deg, speed_mps, line=False):
    """Which state the drawn contours show at a point: straight lines between the pitches."""
    at = {key: np.interp(pitch_deg, reply["pitch_deg"], reply[key])
          for key in ("slowest_mps", "holds_mps", "marginal_mps", "carves_mps")
          if reply[key][0] is not None}
    if speed_mps <= at["slowest_mps"]:
        return "too_slow", at
    for key, state in (("holds_mps", "holds"), ("marginal_mps", "marginal")):
        if speed_mps <= at[key]:
            return state, at
    if not line and speed_mps > at["carves_mps"]:
        return "too_fast", at
    return "washes_out", at


@settings(deadline=None, max_examples=150)
@given(st.floats(0.05, 45), st.floats(0.3, 12), st.sampled_from(["F", "1F", "P", "K", "I"]),
       st.sampled_from([5, 8, 15]), st.sampled_from([0, 25]), st.none() | st.floats(6, 30))
def test_contours_are_exact_to_a_fifth_of_a_kilometre_an_hour(pitch_deg, speed, snow, angulation,
                                                              start, line_m):
    fields = {"snow": snow, "angulation_deg": angulation, "from_phase_deg": start,
              "line_radius_m": line_m}
    drawn, at = expected(window(**fields), pitch_deg, speed, line_m is not None)
    if all(abs(speed - bound) > 0.2 * KMH for bound in at.values()):
        asked = verdict(pitch_deg, speed, **fields)
        # Between the states the worst phase decides: a turn that washes out before the phase at
        # which it is too fast is said to wash out; below the slowest speed likewise.
        if drawn == "too_fast" or drawn == "too_slow":
            assert asked in (drawn, "washes_out", "too_fast")
        else:
            assert asked == drawn


def test_steepest_pitches():
    """Without angulation and limits of snow the carve closes where R g sin α = R g cos α · κ_max,
    κ_max = 1 (J/F 2004): at 45°."""
    reply = window(angulation_deg=0, max_load_g=5, highest_pitch_deg=50)
    assert reply["steepest_deg"]["carves"] == pytest.approx(45, abs=1e-6)
    assert reply["steepest_deg"]["holds"] is None
    usual = window()["steepest_deg"]
    assert usual["holds"] < usual["marginal"] < usual["carves"]


def test_flat_end():
    """√(g R_sc) on the flat without angulation (J/F 2004)."""
    reply = window(angulation_deg=0)
    assert reply["carves_mps"][0] == pytest.approx(math.sqrt(9.80665 * 8))
    assert reply["slowest_mps"][0] == 0


def test_picture_carries_its_cautions():
    assert window()["cautions"] == ["estimate", "avalanche"]
    assert window(highest_pitch_deg=25)["cautions"] == ["estimate"]
