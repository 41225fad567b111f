"""``ask: "pitch"`` as a whole. The physics has its outside checks in tests/physics; here the answer
is held against the contract of its keys, worked cases, and the band that its sentences speak of."""

import json
import math

import pytest
from hypothesis import example, given, settings
from hypothesis import strategies as st

import snowhold
from snowhold.pitch_words import english, pitch_lines

SNOWS = ["F", "4F", "1F", "P", "K", "I"]
PROFILE = [{"pitch_deg": 28, "length_m": 120}, {"percent": 20, "length_m": 80, "snow": "4F"},
           {"drop_m": -3, "length_m": 60}]


def ask(legs=None, **fields):
    reply = snowhold.answer({"ask": "pitch", "legs": PROFILE if legs is None else legs, **fields})
    assert "error" not in reply, reply
    json.dumps(reply, allow_nan=False)
    return reply


def one(pitch_deg, length_m=200.0, **fields):
    return ask([{"pitch_deg": pitch_deg, "length_m": length_m}], **fields)


def faults(fields):
    reply = snowhold.answer({"ask": "pitch", **fields})
    assert set(reply) == {"error"}
    for fault in reply["error"]:
        assert set(fault) == {"field", "problem", "allowed"}
        assert all(isinstance(text, str) and text for text in fault.values())
    return {fault["field"]: fault for fault in reply["error"]}


LEGS = st.one_of(
    st.fixed_dictionaries({"pitch_deg": st.floats(-20, 50), "length_m": st.floats(0.1, 5000)}),
    st.fixed_dictionaries({"percent": st.floats(-36, 119), "length_m": st.floats(0.1, 5000),
                           "snow": st.none() | st.sampled_from(SNOWS)}),
    st.tuples(st.floats(-0.34, 0.76), st.floats(0.1, 5000)).map(
        lambda both: {"drop_m": both[0] * both[1], "length_m": both[1]}))

QUESTIONS = st.fixed_dictionaries(
    {"legs": st.lists(LEGS, min_size=1, max_size=10)},
    optional={
        "snow": st.sampled_from(SNOWS), "speed_mps": st.floats(0, 60),
        "clothing_friction": st.none() | st.floats(0.05, 1), "rider_mass_kg": st.floats(15, 200),
        "drag_area_m2": st.floats(0, 2), "altitude_m": st.floats(-400, 9000),
        "air_temperature_c": st.none() | st.floats(-60, 40),
        "braking_friction": st.none() | st.floats(0.05, 1),
        "reaction_time_s": st.none() | st.floats(0, 5),
        "sight_distance_m": st.none() | st.floats(0.5, 5000),
        "angulation_deg": st.floats(0, 40), "effective_edge_m": st.floats(0.5, 2),
        "max_load_g": st.floats(1.1, 5), "drag_angle_deg": st.none() | st.floats(5, 90),
        "waist_m": st.floats(0.15, 0.4)})

KEYS = {"stand_edge_angle_deg", "steepest_leg", "weakest_leg", "legs", "fall", "slide", "levels",
        "band", "profile", "sweep", "stopping", "air_density_kgpm3", "sentences", "cautions"}


def test_the_keys_are_there():
    reply = ask(speed_mps=8, fall_at_m=20, sight_distance_m=40)
    assert set(reply) == KEYS
    assert reply["stand_edge_angle_deg"] == pytest.approx(28)
    assert len(reply["legs"]) == len(reply["slide"]["legs"]) == 3
    assert {"speed_in_mps", "speed_out_mps"} <= set(reply["slide"]["legs"][0])
    assert {"legs", "stops", "distance_m"} <= set(reply["slide"])
    assert {"distance_m", "band_m", "by_pitch", "sight"} <= set(reply["stopping"])
    assert [level["clothing"] for level in reply["levels"]] == ["slick", "middle", "rough"]
    assert len(reply["sentences"]) == 3
    assert reply["fall"] == {"at_m": 20, "leg": 0, "speed_mps": 8, "left_m": 240}


def test_one_leg_takes_two_entries():
    assert set(one(12)) == KEYS


@settings(deadline=None, max_examples=300)
@given(QUESTIONS, st.floats(0, 0.9999))
@example({"legs": [{"pitch_deg": 0.0, "length_m": 0.1}], "speed_mps": 5e-324}, 0.0)
@example({"legs": [{"pitch_deg": 45.0, "length_m": 100}], "clothing_friction": 1.0,
          "speed_mps": 1e-300, "drag_area_m2": 0.0}, 0.0)
@example({"legs": [{"pitch_deg": 0.0, "length_m": 5000}] * 10, "speed_mps": 60,
          "rider_mass_kg": 15, "drag_area_m2": 2}, 0.5)
@example({"legs": [{"pitch_deg": 50, "length_m": 100}], "angulation_deg": 40}, 0.0)
def test_any_sound_question_has_a_sound_answer(fields, share):
    """No exception, NaN or infinity; figures that belong together agree; sentences have words."""
    length_m = sum(leg["length_m"] for leg in fields["legs"])
    reply = ask(**fields, fall_at_m=share * length_m)
    assert set(reply) == KEYS
    assert all(pitch_lines(reply))
    slide, band, stopping = reply["slide"], reply["band"], reply["stopping"]
    assert (slide["distance_m"] is None) == (not slide["stops"])
    assert slide["stops"] or slide["end_speed_mps"] >= 0
    assert slide["top_speed_mps"] >= slide["end_speed_mps"]
    assert (band["stops"] == "all") == (band["distance_m"]["high"] is not None)
    assert (band["stops"] != "none") == (band["distance_m"]["low"] is not None)
    near, mid, far = stopping["band_m"]["low"], stopping["distance_m"], stopping["band_m"]["high"]
    for closer, farther in ((near, mid), (mid, far)):
        assert farther is None or closer <= farther * (1 + 1e-9)
    for leg in reply["legs"]:
        margins = leg["standing"]["grip_margin"]
        assert margins["low"] is None or margins["low"] <= margins["mid"] <= margins["high"]
    profile = reply["profile"]
    assert profile["distance_m"] == sorted(profile["distance_m"])
    for speeds in profile["speed_mps"].values():
        assert len(speeds) == len(profile["distance_m"]) == len(profile["height_m"])
        # Nothing before the fall, one unbroken stretch after it.
        known = [index for index, speed in enumerate(speeds) if speed is not None]
        assert known == list(range(known[0], known[-1] + 1))


@settings(deadline=None, max_examples=100)
@given(QUESTIONS, st.floats(0, 1), st.floats(0, 1))
def test_sentences_speak_for_the_whole_band(fields, slickness, drag):
    """A slide anywhere in the band does what the sentence says of all, some or none."""
    reply = ask(**fields)
    band, sentence = reply["band"], reply["sentences"][1]
    frictions = band["friction"]
    friction = frictions["low"] + slickness * (frictions["high"] - frictions["low"])
    mass = fields.get("rider_mass_kg", 80) * (0.75 + 0.5 * drag)
    if not 15 <= mass <= 200:
        return
    other = ask(**{**fields, "clothing_friction": friction, "rider_mass_kg": mass})["slide"]
    low, high = (band["distance_m"][end] for end in ("low", "high"))
    top = 1 + band["top_speed_mps"]["high"]**2
    if sentence["code"] in ("slide_stays", "slide_stops_all"):
        assert other["stops"]
    if sentence["code"] == "slide_stays":
        assert other["distance_m"] == 0
    if sentence["code"] == "slide_stops_none":
        assert not other["stops"]
    if other["stops"]:
        assert other["distance_m"] >= low * (1 - 1e-9) - 1e-9
        assert high is None or other["distance_m"] <= high * (1 + 1e-9) + 1e-9
    assert other["end_speed_mps"]**2 <= band["end_speed_mps"]["high"]**2 + 1e-9 * top
    assert other["end_speed_mps"]**2 >= band["end_speed_mps"]["low"]**2 - 1e-9 * top
    assert not other["slides_back"] or band["may_slide_back"]


def test_three_ways_to_give_a_leg():
    by_angle, by_drop, by_percent = (ask([leg], speed_mps=7) for leg in (
        {"pitch_deg": 20, "length_m": 80},
        {"drop_m": 80 * math.sin(math.radians(20)), "length_m": 80},
        {"percent": 100 * math.tan(math.radians(20)), "length_m": 80, "pitch_deg": None}))
    for other in (by_drop, by_percent):
        for key in ("pitch_deg", "percent", "drop_m"):
            assert other["legs"][0][key] == pytest.approx(by_angle["legs"][0][key])
        assert other["slide"]["end_speed_mps"] == pytest.approx(
            by_angle["slide"]["end_speed_mps"])


def test_levels_and_slide_are_one_physics():
    reply = ask(speed_mps=8, clothing_friction=0.19)
    slick = reply["levels"][0]
    assert {key: reply["slide"][key] for key in ("stops", "distance_m", "end_speed_mps")} == {
        key: slick[key] for key in ("stops", "distance_m", "end_speed_mps")}
    assert [round(level["speeds_up_above_deg"], 1) for level in reply["levels"]] == [
        10.8, 18.5, 25.6]  # Nachbauer et al. 2016 for the first and the last; the middle is ours


def test_band_is_widened_by_a_friction_outside_it():
    assert ask()["band"]["friction"] == {"low": 0.19, "high": 0.48}
    assert ask(clothing_friction=0.3)["band"]["friction"] == {"low": 0.19, "high": 0.48}
    assert ask(clothing_friction=0.6)["band"]["friction"] == {"low": 0.19, "high": 0.6}
    stopping = ask(braking_friction=0.1, reaction_time_s=2)["stopping"]
    assert stopping["braking_friction"] == {"low": 0.1, "mid": 0.1, "high": 0.5}
    assert stopping["reaction_time_s"] == {"low": 0.5, "mid": 2, "high": 2}


def test_band_takes_in_mass_and_drag_area():
    """0.35 to 0.7 m² and 60 to 100 kg around 0.5 m² and 80 kg: assumed."""
    reply = ask()
    density = reply["air_density_kgpm3"]
    assert reply["band"]["drag_per_m"]["low"] == pytest.approx(density * 0.35 / (2 * 100))
    assert reply["band"]["drag_per_m"]["high"] == pytest.approx(density * 0.7 / (2 * 60))


def test_sweep_is_what_asking_gives():
    """The sweep changes the pitch of the leg of the fall and nothing else."""
    fields = {"speed_mps": 8, "fall_at_m": 140}
    sweep = ask(**fields)["sweep"]
    assert sweep["leg"] == 1
    for pitch_deg in (0, 17, 50):
        legs = [PROFILE[0], {"pitch_deg": pitch_deg, "length_m": 80}, PROFILE[2]]
        levels = ask(legs, **fields)["levels"]
        at = sweep["pitch_deg"].index(pitch_deg)
        for swept, level in zip(sweep["levels"], levels, strict=True):
            assert swept["end_speed_mps"][at] == pytest.approx(level["end_speed_mps"])
            assert swept["distance_m"][at] == pytest.approx(level["distance_m"])
    for swept in sweep["levels"]:
        assert swept["foot_speed_mps"] == sorted(swept["foot_speed_mps"])


def test_profile_is_to_scale_and_knows_every_halt():
    reply = ask(speed_mps=8, fall_at_m=20)
    profile = reply["profile"]
    assert profile["distance_m"][0] == 0 and profile["distance_m"][-1] == 260
    assert min(profile["height_m"]) == pytest.approx(0)
    for leg in reply["legs"]:
        start, end = (profile["distance_m"].index(leg[key]) for key in ("start_m", "end_m"))
        fell = profile["height_m"][start] - profile["height_m"][end]
        went = profile["x_m"][end] - profile["x_m"][start]
        assert fell == pytest.approx(leg["drop_m"])
        assert math.hypot(fell, went) == pytest.approx(leg["length_m"])
    asked = profile["speed_mps"]["asked"]
    halt = profile["distance_m"].index(reply["slide"]["stops_at_m"])
    assert asked[halt] == 0 and asked[halt + 1] is None
    assert asked[profile["distance_m"].index(20)] == 8
    assert asked[0] is None
    for passage, leg in zip(reply["slide"]["legs"], reply["legs"], strict=True):
        if not passage["stops"]:
            assert asked[profile["distance_m"].index(leg["end_m"])] == passage["speed_out_mps"]


def test_stop_along_the_profile_and_past_its_end():
    reply = one(10, 20.0, speed_mps=10)
    assert reply["stopping"]["distance_m"] == pytest.approx(
        reply["legs"][0]["stopping_distance_m"]["mid"])
    assert reply["stopping"]["past_profile"] == {"low": True, "mid": True, "high": True}
    # A leg that braking cannot hold (0.35 < tan 25°), then one where it can.
    reply = ask([{"pitch_deg": 25, "length_m": 50}, {"pitch_deg": 0, "length_m": 500}],
                speed_mps=10)
    assert reply["legs"][0]["stopping_distance_m"]["mid"] is None
    assert 50 < reply["stopping"]["distance_m"] < 550


def test_sight_distance():
    sight = one(8, sight_distance_m=30)["stopping"]["sight"]
    assert 0 < sight["speed_mps"]["low"] < sight["speed_mps"]["mid"] < sight["speed_mps"]["high"]
    stop = one(8, speed_mps=sight["speed_mps"]["low"])["stopping"]
    assert stop["band_m"]["high"] == pytest.approx(30)
    assert one(40, sight_distance_m=30)["stopping"]["sight"]["speed_mps"] == {
        "low": None, "mid": None, "high": None}
    assert one(8)["stopping"]["sight"] is None


def test_weakest_leg_need_not_be_the_steepest():
    reply = ask([{"pitch_deg": 28, "length_m": 50}, {"pitch_deg": 25, "length_m": 50,
                                                     "snow": "I"}])
    assert (reply["steepest_leg"], reply["weakest_leg"]) == (0, 1)
    assert reply["legs"][0]["standing"]["state"]["mid"] == "holds"
    assert reply["legs"][1]["standing"]["state"]["mid"] == "washes_out"
    assert reply["stand_edge_angle_deg"] == pytest.approx(28)
    said = reply["sentences"][0]
    assert said["code"] == "stand_may_wash_out"
    assert "25°" in english(said)


def test_washing_out_and_sideslip():
    standing = one(20, snow="I")["legs"][0]["standing"]
    assert standing["washes_out_above_deg"]["low"] < standing["washes_out_above_deg"]["mid"]
    assert standing["edge_catch_below_deg"] == standing["sideslip_deg"]["min"]
    assert standing["sideslip_deg"]["max"] == pytest.approx(20 - math.degrees(math.atan(0.03)))
    assert one(3)["legs"][0]["standing"]["sideslip_deg"] is None
    assert one(20, snow="1F")["legs"][0]["standing"]["washes_out_above_deg"]["mid"] is None


@pytest.mark.parametrize(("fields", "codes"), [
    ({"pitch_deg": 0, "speed_mps": 0}, ["stand_level", "slide_stays", "stop_at_rest"]),
    ({"pitch_deg": 0}, ["stand_level", "slide_stops_all", "stop_always"]),
    ({"pitch_deg": 18}, ["stand_holds", "slide_stops_some", "stop_unsure"]),
    ({"pitch_deg": 28, "snow": "1F", "rider_mass_kg": 50},
     ["stand_holds", "slide_stops_none", "stop_never"]),
    ({"pitch_deg": 35}, ["stand_may_wash_out", "slide_stops_none", "stop_never"]),
    ({"pitch_deg": 15, "angulation_deg": 0}, ["stand_marginal", "slide_stops_some",
                                              "stop_unsure"]),
    ({"pitch_deg": 40, "snow": "I", "rider_mass_kg": 200},
     ["stand_washes_out", "slide_stops_none", "stop_never"]),
])
def test_sentences(fields, codes):
    reply = one(**fields)
    assert [sentence["code"] for sentence in reply["sentences"]] == codes
    for sentence in reply["sentences"]:
        assert english(sentence).endswith(".")


def test_words_round_outward():
    """Between 13.28 and 49.7 m is "13 to 50 m": no surer than the band."""
    reply = one(5)
    said = english(reply["sentences"][1])
    low, high = reply["band"]["distance_m"]["low"], reply["band"]["distance_m"]["high"]
    assert f"{math.floor(low)} to {math.ceil(high)} m" in said


@pytest.mark.parametrize(("pitch_deg", "codes"), [(29.9, ["estimate"]),
                                                  (30, ["estimate", "avalanche"]),
                                                  (-20, ["estimate"])])
def test_cautions_are_always_there(pitch_deg, codes):
    assert one(pitch_deg)["cautions"] == codes


def test_slides_back_is_said():
    reply = ask([{"pitch_deg": 20, "length_m": 50}, {"pitch_deg": -15, "length_m": 300}],
                clothing_friction=0.2)
    assert reply["slide"]["slides_back"] and reply["band"]["may_slide_back"]
    assert "slide back" in english(reply["sentences"][1])
    # Every slide of the band halts on the rise, and only those in rough clothing lie there.
    reply = ask([{"pitch_deg": 0, "length_m": 5}, {"pitch_deg": -15, "length_m": 300}],
                speed_mps=15)
    assert reply["levels"][0]["slides_back"] and not reply["levels"][2]["slides_back"]
    assert reply["band"]["may_slide_back"]
    assert not one(-8, speed_mps=15)["band"]["may_slide_back"]


@pytest.mark.parametrize(("legs", "fields"), [
    (None, {"legs"}),
    ([], {"legs"}),
    ({}, {"legs"}),
    ([{"pitch_deg": 5, "length_m": 5}] * 11, {"legs"}),
    ([7, None, []], {"legs[0]", "legs[1]", "legs[2]"}),
    ([{}], {"legs[0].length_m", "legs[0].pitch_deg"}),
    ([{"length_m": 5}], {"legs[0].pitch_deg"}),
    ([{"length_m": 5, "pitch_deg": None}], {"legs[0].pitch_deg"}),
    ([{"length_m": 5, "pitch_deg": 5, "drop_m": 1}], {"legs[0].drop_m"}),
    ([{"length_m": 5, "pitch_deg": 5, "drop_m": 1, "percent": 9}],
     {"legs[0].drop_m", "legs[0].percent"}),
    ([{"length_m": 5, "drop_m": 5.01}], {"legs[0].drop_m"}),
    ([{"length_m": 5, "drop_m": -5.01}], {"legs[0].drop_m"}),
    ([{"length_m": 5, "drop_m": 4.9}], {"legs[0].drop_m"}),
    ([{"length_m": 5, "drop_m": -2}], {"legs[0].drop_m"}),
    ([{"length_m": 5, "pitch_deg": 5}, {"length_m": 0.05, "pitch_deg": 51}],
     {"legs[1].length_m", "legs[1].pitch_deg"}),
    ([{"length_m": 5, "pitch_deg": -20.1}, {"length_m": 5001, "percent": 120}],
     {"legs[0].pitch_deg", "legs[1].length_m", "legs[1].percent"}),
    ([{"length_m": math.nan, "pitch_deg": math.inf}], {"legs[0].length_m", "legs[0].pitch_deg"}),
    ([{"length_m": 5, "pitch_deg": 5, "snow": "slush", "colour": 1}],
     {"legs[0].snow", "legs[0].colour"}),
])
def test_impossible_legs_are_named(legs, fields):
    """And with them whatever else is wrong, all at once."""
    bad = faults({"legs": legs, "speed_mps": 61, "snow": "ice", "colour": "red"})
    assert set(bad) == fields | {"speed_mps", "snow", "colour"}


@pytest.mark.parametrize("speed_mps", [-0.1, 60.1, 1e300, math.nan, "fast", None, True])
def test_absurd_speeds_are_named(speed_mps):
    assert set(faults({"legs": PROFILE, "speed_mps": speed_mps})) == {"speed_mps"}


def test_fall_has_to_be_on_the_profile():
    assert set(faults({"legs": PROFILE, "fall_at_m": 260, "snow": "ice"})) == {"fall_at_m", "snow"}
    assert "260" in faults({"legs": PROFILE, "fall_at_m": 300})["fall_at_m"]["allowed"]
    assert ask(fall_at_m=259.9)["fall"]["leg"] == 2
    assert ask(fall_at_m=120)["fall"]["leg"] == 1


JSON = st.recursive(
    st.none() | st.booleans() | st.floats() | st.integers() | st.text(max_size=5),
    lambda inner: st.lists(inner, max_size=3) | st.dictionaries(
        st.sampled_from(["pitch_deg", "length_m", "drop_m", "percent", "snow", "x"]), inner,
        max_size=4), max_leaves=12)


@settings(deadline=None, max_examples=300)
@given(st.dictionaries(st.sampled_from(["legs", "snow", "speed_mps", "fall_at_m", "x",
                                        "sight_distance_m", "clothing_friction"]), JSON),
       st.lists(JSON, max_size=12) | JSON)
def test_junk_is_refused_or_answered(fields, legs):
    reply = snowhold.answer({"ask": "pitch", "legs": legs, **fields})
    json.dumps(reply, allow_nan=False)
    assert "error" in reply or set(reply) == KEYS
