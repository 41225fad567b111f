"""The question door: every fault named at once, nothing clamped, nothing guessed."""

import json
import math

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

import snowhold

GOOD = {"ask": "turn", "pitch_deg": 15, "speed_mps": 6, "sidecut_radius_m": 8}


def faults(question):
    reply = snowhold.answer(question)
    assert set(reply) == {"error"}
    for fault in reply["error"]:
        assert set(fault) == {"field", "problem", "allowed"}
        assert all(isinstance(text, str) and text for text in fault.values())
    return {fault["field"]: fault for fault in reply["error"]}


def test_names_every_bad_field_at_once():
    bad = faults({"ask": "turn", "pitch_deg": 75, "speed_mps": "fast", "rider_mass_kg": -1,
                  "snow": "slush", "colour": "red"})
    assert set(bad) == {"pitch_deg", "speed_mps", "sidecut_radius_m", "rider_mass_kg", "snow",
                        "colour"}
    assert "0 to 50" in bad["pitch_deg"]["allowed"]
    assert "degrees" in bad["pitch_deg"]["allowed"]
    assert "75" in bad["pitch_deg"]["problem"]
    assert "1F" in bad["snow"]["allowed"]


@pytest.mark.parametrize("value", [True, None, "7", [7], {}, math.nan, math.inf, -math.inf,
                                   10**400, 40.0000001, -0.1])
def test_speed_takes_only_numbers_in_range(value):
    assert set(faults({**GOOD, "speed_mps": value})) == {"speed_mps"}


@pytest.mark.parametrize("value", [0, 40, 40.0, 1e-9])
def test_the_ends_of_a_range_are_allowed(value):
    assert "error" not in snowhold.answer({**GOOD, "speed_mps": value})


@pytest.mark.parametrize("question", [None, [], "turn", 7, {}, {"ask": "weather"}, {"ask": None},
                                      {"ask": ["turn"]}, {"ask": {}}])
def test_what_is_not_a_question(question):
    assert set(faults(question)) <= {"question", "ask"}


def test_keys_that_are_not_text():
    assert faults({**GOOD, 3: 4})


JSON = st.recursive(
    st.none() | st.booleans() | st.integers() | st.floats() | st.text(max_size=10),
    lambda inner: st.lists(inner, max_size=4) | st.dictionaries(st.text(max_size=10), inner,
                                                                max_size=4), max_leaves=10)


@settings(max_examples=300, deadline=None)
@given(st.dictionaries(
    st.sampled_from(["pitch_deg", "speed_mps", "sidecut_radius_m", "snow", "angulation_deg",
                     "rider_mass_kg", "effective_edge_m", "max_load_g", "line_radius_m",
                     "drag_angle_deg", "phase_deg", "from_phase_deg", "__proto__"]), JSON))
def test_anything_is_answered_or_refused(fields):
    reply = snowhold.answer({**fields, "ask": "turn"})
    json.dumps(reply, allow_nan=False)
