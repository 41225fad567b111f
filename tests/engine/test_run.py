"""``ask: "run"`` as a whole. The physics has its outside checks in tests/physics; here the answer
is held against the contract of its keys, the turn's own answers, worked cases and properties."""

import json
import math

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

import snowhold
from snowhold import run as run_module
from snowhold.report import run_lines

G = 9.80665
SNOWS = ["F", "4F", "1F", "P", "K", "I"]
FIGURES = ("lean_deg", "edge_angle_deg", "turn_radius_m", "load_g", "grip_margin", "limit")
ORDER = ["washes_out", "too_fast", "too_slow", "marginal", "holds"]


def ask(**fields):
    question = {"ask": "run", "start_speed_mps": 5, "sidecut_radius_m": 8, **fields}
    if "legs" not in question:
        question.setdefault("pitch_deg", 5)
    reply = snowhold.answer(question)
    assert "error" not in reply, reply
    json.dumps(reply, allow_nan=False)
    return reply


def faults(**fields):
    reply = snowhold.answer({"ask": "run", **fields})
    assert set(reply) == {"error"}
    return {fault["field"]: fault for fault in reply["error"]}


LEGS = st.lists(st.fixed_dictionaries({"pitch_deg": st.floats(0, 50),
                                       "length_m": st.floats(0.1, 5000)}), min_size=1, max_size=10)
QUESTIONS = st.tuples(
    st.one_of(st.fixed_dictionaries({"pitch_deg": st.floats(0, 50)}),
              st.fixed_dictionaries({"legs": LEGS})),
    st.fixed_dictionaries(
        {"start_speed_mps": st.floats(0, 40), "sidecut_radius_m": st.floats(3, 40),
         "turns": st.integers(1, 12), "critical": st.just(False)},
        optional={
            "start_phase_deg": st.floats(0, 80), "angulation_deg": st.floats(0, 40),
            "snow": st.sampled_from(SNOWS), "rider_mass_kg": st.floats(15, 200),
            "effective_edge_m": st.floats(0.5, 2), "max_load_g": st.floats(1.1, 5),
            "line_radius_m": st.none() | st.floats(1, 1000),
            "drag_angle_deg": st.none() | st.floats(5, 90),
            "glide_friction": st.none() | st.floats(0, 0.2), "drag_area_m2": st.floats(0, 2),
            "altitude_m": st.floats(-400, 9000),
            "air_temperature_c": st.none() | st.floats(-60, 40)}),
).map(lambda both: {**both[0], **both[1]})


def test_the_keys_are_there():
    reply = ask()
    assert set(reply) == {
        "verdict", "end", "fails_at", "worst", "time_s", "distance_m", "end_speed_mps",
        "top_speed_mps", "critical_pitch_deg", "no_speed_carves", "legs", "energy", "path",
        "cautions"}
    assert set(reply["path"]) == {
        "x_m", "y_m", "height_m", "time_s", "distance_m", "speed_mps", "pitch_deg", "turn_index",
        "phase_deg", "state", "pivoted", *FIGURES}
    # 29 spots a turn from 20° to 160° by 5°; where two turns meet there are two.
    assert {len(column) for column in reply["path"].values()} == {10 * 29}
    assert reply["verdict"] == "holds"
    assert reply["end"] == "turns_done"
    assert reply["fails_at"] is None
    assert reply["path"]["phase_deg"][:2] == [20, 25]


@settings(deadline=None, max_examples=150)
@given(QUESTIONS)
def test_every_answer_is_consistent(question):
    reply = ask(**question)
    path, fails = reply["path"], reply["fails_at"]
    assert reply["verdict"] == min(path["state"], key=ORDER.index)
    for key in ("distance_m", "time_s", "y_m", "turn_index"):
        assert all(a <= b for a, b in zip(path[key], path[key][1:], strict=False))
    assert all(a >= b for a, b in zip(path["height_m"], path["height_m"][1:], strict=False))
    for i, state in enumerate(path["state"]):
        unbalanced = state in ("too_slow", "too_fast")
        assert all((path[key][i] is None) == unbalanced for key in FIGURES)
        # Without balance there is no going on.
        assert not unbalanced or i == len(path["state"]) - 1
    assert (fails is None) == (reply["verdict"] in ("holds", "marginal"))
    if reply["end"] in ("too_slow", "too_fast"):
        assert path["state"][-1] == reply["end"]
    if fails is not None:
        assert path["phase_deg"][0] <= fails["phase_deg"] <= 180
        assert fails["distance_m"] <= reply["distance_m"]
        assert (fails["grip_margin"] is None) == (fails["state"] != "washes_out")
    assert abs(reply["energy"]["relative_error"]) < 1e-3
    assert run_lines(reply)


@pytest.mark.parametrize("fields", [
    {}, {"pitch_deg": 9}, {"pitch_deg": 12, "line_radius_m": 14, "start_speed_mps": 9},
    {"snow": "I"}, {"drag_angle_deg": 40}])
def test_a_spot_is_a_turn_at_its_speed(fields):
    """The same board, snow and rider at the spot's pitch, speed and phase, asked as a turn."""
    path = ask(critical=False, **fields)["path"]
    for i in range(0, len(path["x_m"]) - 1, 7):
        kept = {key: value for key, value in fields.items()
                if key not in ("start_speed_mps", "pitch_deg")}
        turn = snowhold.answer({
            "ask": "turn", "sidecut_radius_m": 8, "pitch_deg": path["pitch_deg"][i],
            "speed_mps": path["speed_mps"][i], "phase_deg": path["phase_deg"][i], "samples": 0,
            "suggest": False, **kept})
        for key in FIGURES[:-1]:
            assert path[key][i] == pytest.approx(turn[key][0], rel=1e-6)
        assert path["limit"][i] == turn["limit"][0]
        assert path["state"][i] == turn["state"][0]


def test_the_first_failure_is_where_the_margin_reaches_0():
    """Ice shears first; the run goes on past it, flagged."""
    reply = ask(snow="I")
    fails, path = reply["fails_at"], reply["path"]
    assert (fails["state"], fails["limit"], fails["turn"]) == ("washes_out", "snow", 1)
    assert fails["grip_margin"] == pytest.approx(0, abs=1e-3)
    assert fails["grip_margin"] < 0
    for distance, margin in zip(path["distance_m"], path["grip_margin"], strict=True):
        if distance < fails["distance_m"]:
            assert margin >= 0
    after = next(i for i, s in enumerate(path["distance_m"]) if s >= fails["distance_m"])
    assert path["grip_margin"][after] < 0
    for key in ("x_m", "y_m", "time_s", "speed_mps", "phase_deg"):
        low, high = sorted((path[key][after - 1], path[key][after]))
        assert low <= fails[key] <= high
    assert reply["end"] == "turns_done"


def test_the_boot_lets_go_at_its_drag_angle():
    """The margin jumps to −1 where the edge angle passes the drag angle."""
    reply = ask(drag_angle_deg=30)
    fails, path = reply["fails_at"], reply["path"]
    assert (fails["limit"], fails["grip_margin"]) == ("boot", -1)
    edge = np.interp(fails["distance_m"], path["distance_m"], path["edge_angle_deg"])
    assert edge == pytest.approx(30, abs=0.02)


def test_a_failure_at_a_break_is_at_the_break():
    """On a line below the fall line a steeper leg asks for more lean at once: here from an edge
    angle of about 38 to 45°, tan λ = (v²/R − g sin α cos φ)/(g cos α), past the drag angle."""
    legs = [{"pitch_deg": 2, "length_m": 17}, {"pitch_deg": 20, "length_m": 50}]
    reply = ask(legs=legs, line_radius_m=12, start_speed_mps=8, start_phase_deg=10,
                drag_angle_deg=42, glide_friction=0, drag_area_m2=0)
    fails = reply["fails_at"]
    assert (fails["state"], fails["limit"]) == ("washes_out", "boot")
    assert fails["pitch_deg"] == 20
    assert fails["y_m"] == pytest.approx(17, abs=1e-6)


def test_a_rider_who_stops():
    """v² falls by 2 μ g R_sc per radian on the flat without angulation and air."""
    reply = ask(pitch_deg=0, angulation_deg=0, drag_area_m2=0, start_speed_mps=4,
                start_phase_deg=10)
    assert reply["end"] == "stops"
    assert reply["end_speed_mps"] == 0
    assert reply["verdict"] == "too_slow"
    assert reply["fails_at"]["phase_deg"] == pytest.approx(
        10 + math.degrees(16 / (2 * 0.04 * G * 8)), abs=0.01)


def test_mirrored_turns_alternate():
    path = ask(start_phase_deg=0)["path"]
    turns = np.array(path["turn_index"])
    # Each turn heads out to one side and comes back: the odd ones to the other.
    sides = [np.sign(np.array(path["x_m"])[turns == i].mean() - path["x_m"][i * 37])
             for i in range(10)]
    assert sides == [1, -1] * 5


def test_legs_and_the_critical_pitch():
    reply = ask(legs=[{"pitch_deg": 1, "length_m": 5}, {"pitch_deg": 5, "length_m": 20},
                      {"pitch_deg": 15, "length_m": 40}])
    critical = reply["critical_pitch_deg"]
    assert 5 < critical < 8
    assert [leg["no_speed_carves"] for leg in reply["legs"]] == [False, False, True]
    steady = [leg["steady_speed_mps"] for leg in reply["legs"]]
    assert steady[0] is None and steady[2] is None
    long_run = ask(pitch_deg=5, turns=60)
    assert long_run["end_speed_mps"] == pytest.approx(steady[1], rel=0.01)
    assert reply["no_speed_carves"]
    assert not ask()["no_speed_carves"]


def test_the_critical_pitch_can_be_left_out():
    reply = ask(critical=False)
    assert (reply["critical_pitch_deg"], reply["no_speed_carves"], reply["legs"]) == (None,) * 3
    assert reply["path"] == ask()["path"]


def test_a_profile_that_ends():
    reply = ask(legs=[{"pitch_deg": 5, "length_m": 20}], turns=60)
    assert reply["end"] == "profile_ends"
    assert reply["path"]["y_m"][-1] == pytest.approx(20, abs=1e-6)


def test_thin_air_is_faster():
    """Half the density, about, at 5500 m (ISO 2533)."""
    low, high = ask(altitude_m=0), ask(altitude_m=5500)
    assert high["end_speed_mps"] > low["end_speed_mps"]
    assert high["energy"]["drag_work_j"] < 0.7 * low["energy"]["drag_work_j"]


@pytest.mark.parametrize("fields", [
    {}, {"pitch_deg": 9}, {"legs": [{"pitch_deg": 5, "length_m": 9}, {"pitch_deg": 9,
                                                                      "length_m": 30}]}])
def test_without_numpy_the_same(monkeypatch, fields):
    """On a phone numpy comes later than the engine."""
    whole = ask(critical=False, **fields)
    monkeypatch.setattr(run_module, "numpy_or_none", lambda: None)
    plain = ask(critical=False, **fields)
    for key in FIGURES[:-1]:
        for one, other in zip(plain["path"][key], whole["path"][key], strict=True):
            assert one == (other if other is None else pytest.approx(other, rel=1e-6))
    assert plain["path"]["state"] == whole["path"]["state"]


def test_errors_name_their_fields():
    assert set(faults()) == {"pitch_deg", "start_speed_mps", "sidecut_radius_m"}
    good = {"start_speed_mps": 5, "sidecut_radius_m": 8}
    leg = {"pitch_deg": 5, "length_m": 9}
    assert set(faults(**good, pitch_deg=5, legs=[leg])) == {"legs"}
    assert set(faults(**good, legs=[leg, {"pitch_deg": 60}])) == {"legs[1].pitch_deg",
                                                                  "legs[1].length_m"}
    assert set(faults(**good, legs=[leg] * 11)) == {"legs"}
    bad = faults(pitch_deg=51, start_speed_mps=-1, sidecut_radius_m=1, turns=2.5, critical=1,
                 glide_friction=0.3, colour="red", start_phase_deg=90)
    assert set(bad) == {"pitch_deg", "start_speed_mps", "sidecut_radius_m", "turns", "critical",
                        "glide_friction", "colour", "start_phase_deg"}
    assert "0 to 80" in bad["start_phase_deg"]["allowed"]


def test_cautions():
    assert ask()["cautions"] == ["estimate"]
    assert ask(pitch_deg=35)["cautions"] == ["estimate", "avalanche"]
    assert "drift_friction" in ask(line_radius_m=12)["cautions"]


@pytest.mark.parametrize(("fields", "words"), [
    ({}, ["Holds", "settle at", "All turns done"]),
    ({"pitch_deg": 15}, ["Too fast", "no speed carves", "drift it"]),
    ({"snow": "I"}, ["Washes out in turn 1", "shears"]),
    ({"pitch_deg": 0}, ["The rider stops", "lose speed"]),
    ({"start_speed_mps": 1}, ["Too slow to carve"]),
])
def test_words_for_people(fields, words):
    lines = "\n".join(run_lines(ask(**fields)))
    for word in words:
        assert word in lines
