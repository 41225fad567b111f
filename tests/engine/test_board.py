"""``ask: "board"`` and ``ask: "boards"`` as a whole: the contract of their keys, faults at their
fields, and what must hold for any board. The physics has its outside checks in tests/physics."""

import json
import math

import pytest
from hypothesis import HealthCheck, given, settings
from hypothesis import strategies as st

import snowhold
from snowhold import board_words
from snowhold.board import BOARD, BOOT, FIELDS
from snowhold.compare import USUAL_LEVELS
from snowhold.question import Choice, Items, Number, Record

SHAPE = {"nose_m": 0.295, "waist_m": 0.25, "tail_m": 0.295, "effective_edge_m": 1.2}
BOARD_QUESTION = {"ask": "board", **SHAPE, "rider_mass_kg": 80, "snow": "P"}


def ask(**fields):
    reply = snowhold.answer({**BOARD_QUESTION, **fields})
    assert "error" not in reply, reply
    json.dumps(reply, allow_nan=False)
    return reply


def compare(boards, **fields):
    reply = snowhold.answer({"ask": "boards", "boards": [{**SHAPE, **board} for board in boards],
                             **fields})
    assert "error" not in reply, reply
    json.dumps(reply, allow_nan=False)
    return reply


def faults(**fields):
    return {fault["field"] for fault in snowhold.answer({**BOARD_QUESTION, **fields})["error"]}


def test_the_fixed_keys_are_there():
    reply = ask(stiffness_nm2=180, boot={"sole_length_m": 0.3}, pitch_deg=15)
    assert reply["sidecut_radius_m"] == pytest.approx(8.0)
    assert set(reply["drag_angle_deg"]) == {"toe", "heel"}
    assert set(reply["bend"]) >= {"turn_radius_m", "contact_length_m"}
    assert set(reply["carve_speed_mps"]) == {"min", "max"}


def test_what_is_not_given_is_not_guessed():
    reply = ask()
    for key in ("bend", "boot", "drag_angle_deg", "mass_range_kg", "needed", "radii",
                "stated_radius"):
        assert reply[key] is None
    assert reply["hard_snow_radius_m"] == pytest.approx(8 * math.cos(math.radians(45)))
    assert reply["stiffness_range_nm2"]["max"] > 180


def test_figures_of_the_model_through_the_door():
    """L 1.2 m, R_sc 8 m, ε 50°, N 80 kg on the flat; 0.12 N/mm³ (P): a little under the 5.07 m of
    0.1 N/mm³ and 800 N. The bend is balanced, and its depth that of the mean pressure."""
    reply = ask(stiffness_nm2=180, edge_angle_deg=50, pitch_deg=0, stance_width_m=0.52)["bend"]
    assert reply["turn_radius_m"] == pytest.approx(5.07, abs=0.03)
    assert reply["converged"]
    assert abs(reply["force_balance"]) < 1e-8
    assert reply["fit"] == "suits"
    assert [list(part.values()) for part in reply["contact"]] == [pytest.approx([-0.6, 0.6])]
    picture = reply["picture"]
    assert len(picture["at_m"]) == len(picture["depth_m"]) == len(picture["push_npm"])


def test_carve_window_is_that_of_the_turn():
    reply = ask(pitch_deg=12, angulation_deg=8)
    turn = snowhold.answer({"ask": "turn", "pitch_deg": 12, "speed_mps": 6, "angulation_deg": 8,
                            "sidecut_radius_m": reply["sidecut_radius_m"]})
    assert reply["carve_speed_mps"] == turn["carve_speed_mps"]


@pytest.mark.parametrize("line_radius_m", [None, 15.0])
def test_needed_edge_is_the_greatest_of_the_turn(line_radius_m):
    reply = ask(pitch_deg=8, speed_mps=5.5, line_radius_m=line_radius_m)
    turn = snowhold.answer({"ask": "turn", "pitch_deg": 8, "speed_mps": 5.5, "snow": "P",
                            "sidecut_radius_m": reply["sidecut_radius_m"],
                            "line_radius_m": line_radius_m})
    edges = [edge for edge in turn["edge_angle_deg"] if edge is not None]
    assert reply["needed"]["edge_angle_deg"] == pytest.approx(max(edges))
    assert reply["needed"]["by"] == ("carve" if line_radius_m is None else "line")


def test_above_the_carves_speed_the_tightest_line_that_holds_is_asked():
    reply = ask(pitch_deg=15, speed_mps=10)
    turn = snowhold.answer({"ask": "turn", "pitch_deg": 15, "speed_mps": 10,
                            "sidecut_radius_m": reply["sidecut_radius_m"]})
    assert turn["verdict"] == "too_fast"
    assert reply["needed"]["by"] == "drift"
    assert reply["needed"]["turn_radius_m"] == pytest.approx(turn["drift"]["line_radius_m"])


def test_a_widened_board_clears_its_boot():
    asked = {"boot": {"sole_length_m": 0.32}, "pitch_deg": 10, "speed_mps": 7.1}
    narrow = ask(**asked)
    assert not narrow["boot"]["clears"]
    wider_m = narrow["boot"]["clear_waist_m"] - SHAPE["waist_m"] + 1e-6
    wide = ask(**asked, **{key: SHAPE[key] + wider_m for key in ("nose_m", "waist_m", "tail_m")})
    assert wide["boot"]["clears"]
    assert min(wide["drag_angle_deg"].values()) == pytest.approx(
        wide["needed"]["edge_angle_deg"], abs=0.01)


def test_radius_by_position():
    widths = [{"at_m": x, "width_m": 0.25 + x * x / 8} for x in (-0.6, -0.3, 0.0, 0.3, 0.6)]
    reply = ask(widths=widths, stated_radius_m=9)
    assert [row["radius_m"] for row in reply["radii"]] == pytest.approx([8.0] * 3, rel=0.01)
    assert not reply["stated_radius"]["agrees"]


def test_uneven_bend_is_said():
    assert not ask(stiffness_nm2=180)["bend"]["oval"]
    assert ask(stiffness_nm2=180, stiffness_shape=[1, 1, 1, 0.1, 0.1], snow="1F")["bend"]["oval"]


def test_an_unfinished_solve_is_said(monkeypatch):
    monkeypatch.setattr("snowhold.beam._MOST_STEPS", 0)
    reply = ask(stiffness_nm2=180)
    assert reply["bend"]["converged"] is False
    assert reply["bend"]["turn_radius_m"] is None
    assert reply["mass_range_kg"] is None


def test_a_bad_measurement_is_an_error_at_its_field():
    assert faults(waist_m=0.30) == {"waist_m"}
    assert faults(boot={"sole_length_m": 2.5}) == {"boot.sole_length_m"}
    assert faults(waist_m=0.2949) == {"waist_m"}
    assert faults(stance_width_m=0.9, setback_m=0.1, effective_edge_m=1.0) == {"stance_width_m"}
    assert faults(front_insert_width_m=0.2) == {"front_insert_width_m"}


def test_every_bad_field_at_once_those_between_fields_too():
    assert faults(waist_m=0.30, boot={"sole_length_m": 2.5}, snow="slush", camber_m=1,
                  stance_width_m=float("nan"), colour="red") == {
        "waist_m", "boot.sole_length_m", "snow", "camber_m", "stance_width_m", "colour"}
    assert faults(waist_m=None, rear_insert_width_m=-1) == {"waist_m", "rear_insert_width_m"}


def test_bad_widths_are_errors_at_their_places():
    good = [{"at_m": -0.5, "width_m": 0.28}, {"at_m": 0.0, "width_m": 0.25},
            {"at_m": 0.5, "width_m": 0.28}]
    assert faults(widths=good[:2]) == {"widths"}
    assert faults(widths=[good[1], good[0], good[2]]) == {"widths[1].at_m"}
    assert faults(widths=[*good, {"at_m": 0.7, "width_m": 0.3}]) == {"widths[3].at_m"}
    assert faults(widths=[{"at_m": -0.5, "width_m": 0.2}, *good[1:]]) == {"widths[0].width_m"}
    assert faults(widths=[good[0], {"at_m": 0.0, "width_m": 0.33}, good[2]]) == {"widths"}
    assert faults(widths=[{"at_m": "x", "width_m": 0.2}, *good[1:]]) == {
        "widths[0].at_m", "widths[0].width_m"}


def test_boards_name_the_board_at_fault():
    reply = snowhold.answer({
        "ask": "boards", "boards": [SHAPE, {**SHAPE, "waist_m": 0.31}, {**SHAPE, "nose_m": 9}],
        "pitch_low_deg": 20, "pitch_high_deg": 10})
    assert {fault["field"] for fault in reply["error"]} == {
        "boards[1].waist_m", "boards[2].nose_m", "pitch_high_deg"}


def test_usual_speeds_are_the_published_ones_or_the_riders():
    """Stepan et al. 2023: intermediate 32.4 ± 9.9 km/h."""
    usual = compare([{}, {}], usual_level="intermediate")["usual_speed_mps"]
    assert usual["mean"] * 3.6 == pytest.approx(32.4)
    assert usual["high"] * 3.6 == pytest.approx(42.3)
    assert usual["source"] == "published"
    given = compare([{}, {}], usual_speed_mps=7, usual_speed_spread_mps=1)["usual_speed_mps"]
    assert (given["low"], given["high"], given["source"]) == (6, 8, "given")
    assert set(USUAL_LEVELS) == {"beginner", "intermediate", "advanced", "snowboarders"}


def verdict(board, **fields):
    told = compare([board, {}], **fields)["boards"][0]
    return told["verdict"], [reason["code"] for reason in told["reasons"]]


def test_verdicts_and_their_reasons():
    rider = {"rider_mass_kg": 75, "usual_speed_mps": 6, "boot": {"sole_length_m": 0.29}}
    assert verdict({"stiffness_nm2": 200}, **rider) == ("suits", [])
    fast = {**rider, "usual_speed_mps": 20}
    assert verdict({}, **fast) == ("small", ["speed_above_window"])
    slow = {**rider, "usual_speed_mps": 2, "pitch_low_deg": 15}
    assert verdict({}, **slow) == ("big", ["speed_below_window"])
    assert verdict({"stiffness_nm2": 1500}, **rider) == ("big", ["too_stiff"])
    heavy = {**rider, "rider_mass_kg": 140, "snow": "F"}
    assert verdict({"stiffness_nm2": 60}, **heavy)[0] == "small"
    assert verdict({}, **rider | {"boot": {"sole_length_m": 0.36}}) == ("small", ["boot_drags"])
    assert verdict({}, **rider | {"boot": {"sole_length_m": 0.24}}) == ("big", ["wide_for_boot"])


def test_a_comparison_tells_of_a_board_what_a_board_question_tells():
    boards = compare([{"stiffness_nm2": 200}, {"stiffness_nm2": 500}], rider_mass_kg=60,
                     pitch_low_deg=10, pitch_high_deg=20, boot={"sole_length_m": 0.28})["boards"]
    alone = ask(stiffness_nm2=500, rider_mass_kg=60, pitch_deg=15, boot={"sole_length_m": 0.28})
    assert boards[1]["radius_at_45_m"] == {"hard_snow": alone["hard_snow_radius_m"],
                                           "bent": alone["bend"]["turn_radius_m"]}
    for key in ("drag_angle_deg", "mass_range_kg", "stiffness_range_nm2", "sidecut_radius_m"):
        assert boards[1][key] == alone[key]
    windows = boards[1]["speed_windows"]
    assert [window["pitch_deg"] for window in windows] == [10, 12.5, 15, 17.5, 20]
    assert boards[1]["carve_speed_mps"] == {"min": windows[-1]["min_mps"],
                                            "max": windows[-1]["max_mps"]}


def within(field):
    """Any value that a field allows."""
    if isinstance(field, Number):
        value = st.floats(field.low, field.high)
    elif isinstance(field, Choice):
        value = st.sampled_from(field.words)
    elif isinstance(field, Record):
        value = record(field.fields)
    elif isinstance(field, Items):
        value = st.lists(within(field.of), min_size=field.low, max_size=field.high)
    return value | st.none() if getattr(field, "null", False) else value


def record(fields):
    needed = {name: within(field) for name, field in fields.items()
              if name in ("sole_length_m", *SHAPE)}
    others = {name: within(field) for name, field in fields.items() if name not in needed}
    return st.fixed_dictionaries(needed, optional=others)


@st.composite
def sensible(draw, fields):
    """Mostly answerable: widths made from a waist and a sidecut, places on the edge."""
    question = draw(record({name: field for name, field in fields.items()
                            if name not in ("ask", "widths", *SHAPE)}))
    edge_m = draw(st.floats(0.6, 1.9))
    waist_m = draw(st.floats(0.16, 0.35))
    depth_m = edge_m**2 / (4 * draw(st.floats(max(4.0, edge_m**2 / 0.5), 35)))
    lean_m = draw(st.floats(-0.9, 0.9)) * depth_m
    question |= {"effective_edge_m": edge_m, "waist_m": waist_m,
                 "nose_m": min(waist_m + depth_m + lean_m, 0.5),
                 "tail_m": min(waist_m + depth_m - lean_m, 0.5)}
    if draw(st.booleans()):
        question["widths"] = [
            {"at_m": x * edge_m, "width_m": waist_m + draw(st.floats(0, 1)) * depth_m * 4 * x * x}
            for x in (-0.5, -0.3, -0.1, 0.1, 0.3, 0.5)]
    return question


RELAXED = settings(max_examples=80, deadline=None,
                   suppress_health_check=[HealthCheck.too_slow, HealthCheck.data_too_large])


@RELAXED
@given(sensible(FIELDS))
def test_any_board_is_answered_with_finite_figures(question):
    reply = snowhold.answer({"ask": "board", **question})
    json.dumps(reply, allow_nan=False)
    assert json.loads(json.dumps(reply)) == reply
    if "error" in reply:
        assert all(fault["field"].split(".")[0].split("[")[0] in FIELDS
                   for fault in reply["error"])
    elif reply["bend"]:
        assert reply["bend"]["converged"]
        assert abs(reply["bend"]["force_balance"]) <= 1e-8


@RELAXED
@given(record({name: field for name, field in FIELDS.items() if name != "ask"}))
def test_any_allowed_values_are_answered_or_refused(question):
    reply = snowhold.answer({"ask": "board", **question})
    json.dumps(reply, allow_nan=False)


JUNK = st.recursive(st.none() | st.booleans() | st.floats() | st.integers() | st.text(max_size=5),
                    lambda inner: st.lists(inner, max_size=3)
                    | st.dictionaries(st.sampled_from([*FIELDS, *BOOT, "x"]), inner, max_size=4),
                    max_leaves=6)


@RELAXED
@given(st.dictionaries(st.sampled_from([*FIELDS, "boards", "pitch_low_deg", "usual_level"]), JUNK),
       st.sampled_from(["board", "boards"]))
def test_junk_is_refused_in_words(junk, topic):
    reply = snowhold.answer({**SHAPE, **junk, "ask": topic})
    json.dumps(reply, allow_nan=False)


@settings(max_examples=20, deadline=None,
          suppress_health_check=[HealthCheck.too_slow, HealthCheck.data_too_large])
@given(st.lists(sensible(BOARD), min_size=2, max_size=3), st.floats(0, 50), st.floats(0, 50),
       st.sampled_from(["F", "P", "I"]), within(Record(BOOT, default=None, null=True)))
def test_any_boards_are_compared_with_finite_figures(boards, one_deg, other_deg, snow, boot):
    reply = snowhold.answer({"ask": "boards", "boards": boards, "snow": snow, "boot": boot,
                             "pitch_low_deg": min(one_deg, other_deg),
                             "pitch_high_deg": max(one_deg, other_deg)})
    json.dumps(reply, allow_nan=False)
    if "error" not in reply:
        assert all(board["verdict"] in ("suits", "small", "big") for board in reply["boards"])


@pytest.mark.parametrize("fields", [
    {}, {"stiffness_nm2": 180, "speed_mps": 7.1, "boot": {"sole_length_m": 0.33}},
    {"stiffness_nm2": 2000, "rider_mass_kg": 20, "stated_radius_m": 12, "pitch_deg": 45},
    {"stiffness_nm2": 60, "snow": "F", "boot": {"sole_length_m": 0.22}}])
def test_every_answer_has_words(fields):
    assert all(line and "{" not in line for line in board_words.board_lines(ask(**fields)))
    told = compare([{}, {"stiffness_nm2": fields.get("stiffness_nm2")}],
                   boot=fields.get("boot"))
    assert len(board_words.boards_lines(told)) == 3


@pytest.mark.parametrize("line_m", [None, 14.0])
def test_the_chance_is_that_of_the_rider_s_usual_turn(line_m):
    """The same turn asked on its own, on the middle pitch: 30 km/h known to a fifth."""
    told = compare([{}, {"waist_m": 0.26}], boot={"sole_length_m": 0.29}, pitch_low_deg=4,
                   pitch_high_deg=10, usual_speed_mps=6.5, usual_speed_spread_mps=1.3,
                   usual_line_radius_m=line_m)["boards"]
    for board in told:
        drags = [angle for angle in board["drag_angle_deg"].values() if angle is not None]
        asked = snowhold.answer({
            "ask": "turn", "pitch_deg": 7, "speed_mps": 6.5, "samples": 1024, "suggest": False,
            "sidecut_radius_m": board["sidecut_radius_m"], "line_radius_m": line_m,
            "effective_edge_m": SHAPE["effective_edge_m"], "spread": {"speed_share": 0.2},
            "drag_angle_deg": min(drags) if drags else None})
        assert 0 < board["chance_holds"] < 1
        assert board["chance_holds"] == pytest.approx(asked["chance_holds"], abs=0.01)
