"""The Pitch view in a browser on a phone: slope, slide, stopping, sentences."""

# ruff: noqa: F811 (fixtures are imported by name)

from __future__ import annotations

import re

import pytest
from pitch_page import (  # noqa: F401
    DEMO,
    SLOPES,
    field,
    installed,
    pitch,
    question,
    set_slope,
    set_typed,
    settled,
    shows,
)
from playwright.sync_api import Page, expect

import snowhold
from snowhold import pitch_words


def test_the_main_path_by_touch(pitch):
    asked = question()
    assert shows(pitch, asked, snowhold.answer(asked)) >= 10
    caption = pitch.locator(".pitch-view .caption")
    expect(caption).to_have_text("Invented slope: a demo, no real place.")
    expect(pitch.locator(".pitch-view .verdict-word")).to_have_text("May not stop")

    pitch.get_by_role("button", name="Leg 2").tap()
    for _ in range(2):
        pitch.get_by_role("button", name="Pitch: more").tap()
    pitch.get_by_role("button", name="Length: less").tap()
    legs = [DEMO[0], {"pitch_deg": 22, "length_m": 75}, DEMO[2]]
    asked = question(legs=legs)
    settled(pitch)
    shows(pitch, asked, snowhold.answer(asked))
    expect(pitch.locator(".pitch-view .caption")).not_to_contain_text("Invented")

    # The fall is where the finger lets go.
    slope = pitch.get_by_role("slider", name="Place of the fall")
    slope.scroll_into_view_if_needed()
    box = slope.bounding_box()
    assert box
    slope.tap(position={"x": box["width"] / 2, "y": box["height"] / 2})
    expect(slope).not_to_have_attribute("aria-valuenow", "0")
    settled(pitch)
    place = int(slope.get_attribute("aria-valuenow") or 0)
    assert 70 < place < 160
    asked = question(legs=legs, fall_at_m=place)
    shows(pitch, asked, snowhold.answer(asked))
    assert "on leg 2, 22°" in (slope.get_attribute("aria-valuetext") or "")

    pitch.get_by_role("button", name=re.compile("^Snow")).tap()
    pitch.get_by_role("radio", name="Ice").tap()
    pitch.get_by_role("button", name="Done").locator("visible=true").tap()
    asked |= {"snow": "I"}
    settled(pitch)
    shows(pitch, asked, snowhold.answer(asked))


def test_a_tap_that_is_over_before_it_is_heard_of(pitch):
    """A busy phone tells of the finger when it has gone: the place counts all the same."""
    slope = pitch.get_by_role("slider", name="Place of the fall")
    box = slope.bounding_box()
    assert box
    slope.dispatch_event("pointerdown", {
        "pointerId": 99, "button": 0, "clientX": box["x"] + box["width"] / 2,
        "clientY": box["y"] + box["height"] / 2})
    expect(slope).not_to_have_attribute("aria-valuenow", "0")


def test_a_pitch_of_one_leg_takes_two_entries(pitch):
    pitch.get_by_role("button", name="Enter your own slope").tap()
    expect(field(pitch, "legs[0].pitch_deg")).to_be_focused()
    expect(pitch.locator(".pitch-view .says")).to_have_text("Enter pitch and length of the slope.")
    assert pitch.locator(".error:visible").count() == 0
    pitch.keyboard.type("27")
    field(pitch, "legs[0].length_m").fill("140")
    settled(pitch)
    asked = question(legs=[{"pitch_deg": 27, "length_m": 140}])
    shows(pitch, asked, snowhold.answer(asked))
    undo = pitch.get_by_role("button", name=re.compile("^Undo"))
    for _ in range(3):
        undo.tap()
    settled(pitch)
    shows(pitch, question(), snowhold.answer(question()))
    expect(pitch.locator(".pitch-view .caption")).to_contain_text("Invented")


@pytest.mark.parametrize("slope", SLOPES)
def test_every_figure_is_the_engines_and_every_sentence_has_its_sense(pitch, slope):
    asked = set_slope(pitch, slope)
    answer = snowhold.answer(asked)
    shows(pitch, asked, answer)
    said = [text.replace("\u202f", " ") for text in pitch.locator(".words li").all_inner_texts()]
    english = [pitch_words.english(sentence) for sentence in answer["sentences"]]
    words = {"fresh, unpacked": "fresh and unpacked", "soft, chopped, slush":
             "soft, chopped or slushy", "hard, scraped": "hard and scraped"}
    for own, other in words.items():
        english = [text.replace(own, other) for text in english]
    # The page's table is written apart from the engine's English; both say the same.
    assert said == english
    expect(pitch.locator(".words .aside")).to_contain_text("An estimate.")
    steep = any(leg["pitch_deg"] >= 30 for leg in asked["legs"])
    assert pitch.locator(".words .avalanche").is_visible() == steep
    expect(pitch.get_by_role("img", name="Warning")).to_have_count(int(steep))
    headline = {"none": "Does not stop", "some": "May not stop"}.get(answer["band"]["stops"])
    if headline:
        expect(pitch.locator(".pitch-view .verdict-word")).to_have_text(headline)
    pitch.get_by_role("button", name="More Figures").tap()
    pitch.evaluate("document.querySelectorAll('details').forEach((one) => { one.open = true; })")
    assert shows(pitch, asked, answer) > 40


def drawn(page: Page, name: str) -> list[tuple[float, float]]:
    """Points of a line of the drawing, px."""
    path = page.locator(f".slope .{name}").get_attribute("d") or ""
    return [(float(x), float(y)) for x, y in (pair.split(" ") for pair in path[1:].split("L"))]


def test_the_slope_is_drawn_to_scale(pitch):
    asked = set_slope(pitch, "demo")
    points = drawn(pitch, "surface")
    profile = snowhold.answer(asked)["profile"]
    x0, (x1, y1) = points[0][0], points[-1]
    scale = (x1 - x0) / profile["x_m"][-1]
    for (x, y), x_m, height_m in zip(points, profile["x_m"], profile["height_m"], strict=True):
        assert x - x0 == pytest.approx(x_m * scale, abs=0.15)
        assert y1 - y == pytest.approx((height_m - profile["height_m"][-1]) * scale, abs=0.15)

    # A line over the snow is as high as its speed.
    def heights(way: str) -> list[tuple[float, float]]:
        line = drawn(pitch, way)
        speeds = [v for v in profile["speed_mps"][way] if v is not None]
        return [(points[i][1] - y, v)
                for i, ((_, y), v) in enumerate(zip(line, speeds, strict=True))]

    per_speed = heights("slick")[0][0] / (33 / 3.6)
    for way in ("slick", "middle", "rough"):
        for height, speed in heights(way):
            assert height == pytest.approx(speed * per_speed, abs=0.4)


def test_drop_and_percent_say_the_same_slope(pitch):
    set_slope(pitch, "flat")
    pitch.get_by_role("button", name="Drop or percent").tap()
    pitch.get_by_role("radio", name="drop").tap()
    pitch.keyboard.press("Escape")
    set_typed(pitch, **{"legs[0].drop_m": "75"})
    settled(pitch)
    asked = question(legs=[{"drop_m": 75, "length_m": 150}])
    shows(pitch, asked, snowhold.answer(asked))
    edge = pitch.locator("[data-answer=stand_edge_angle_deg]").locator("visible=true")
    expect(edge).to_have_text("30°")
    pitch.get_by_role("button", name="Drop or percent").tap()
    pitch.get_by_role("radio", name="percent").tap()
    pitch.keyboard.press("Escape")
    expect(field(pitch, "legs[0].percent")).to_have_value("57.7")  # tan 30°


def test_a_leg_of_its_own_snow_and_ten_legs(pitch):
    pitch.get_by_role("button", name="Leg 3").tap()
    pitch.get_by_role("button", name="More on leg 3").tap()
    pitch.locator("#sheet-pitch-leg input[value=I]").check()
    pitch.keyboard.press("Escape")
    asked = question(legs=[*DEMO[:2], DEMO[2] | {"snow": "I"}])
    settled(pitch)
    assert shows(pitch, asked, snowhold.answer(asked)) >= 10
    for number in range(4, 11):
        pitch.get_by_role("button", name="Add a leg").tap()
        pitch.keyboard.type("15")
        field(pitch, f"legs[{number - 1}].length_m").fill("20")
    expect(pitch.get_by_role("button", name="Add a leg")).to_have_count(0)
    asked["legs"] += [{"pitch_deg": 15, "length_m": 20}] * 7
    settled(pitch)
    shows(pitch, asked, snowhold.answer(asked))
    pitch.get_by_role("button", name="More on leg 10").tap()
    pitch.get_by_role("button", name="Remove this leg").tap()
    asked["legs"].pop()
    settled(pitch)
    shows(pitch, asked, snowhold.answer(asked))


def test_a_bad_entry_of_a_leg_is_kept_and_explained(pitch):
    pitch.get_by_role("button", name="Leg 2").tap()
    set_typed(pitch, **{"legs[1].pitch_deg": "80", "legs[1].length_m": "far"})
    expect(field(pitch, "legs[1].pitch_deg")).to_have_value("80")
    expect(field(pitch, "legs[1].length_m")).to_have_value("far")
    errors = pitch.locator(".pitch-view .error:visible")
    expect(errors).to_have_text(["Allowed: −20 to 50°",
                                 "Not a number. Allowed: 0.1 to 5000\u202fm"])
    expect(field(pitch, "legs[1].pitch_deg")).to_have_attribute("aria-invalid", "true")
    expect(pitch.locator(".pitch-view .caption")).to_contain_text("Last answer")
    # Another leg has no fault, and this one says that it has.
    pitch.get_by_role("button", name="Leg 1").tap()
    expect(errors).to_have_count(0)
    pitch.get_by_role("button", name="Leg 2").tap()
    expect(pitch.get_by_role("button", name="put right what is marked")).to_have_count(1)
    set_typed(pitch, **{"legs[1].pitch_deg": "21", "legs[1].length_m": "80"})
    settled(pitch)
    expect(errors).to_have_count(0)


def test_a_fall_beyond_a_shortened_slope_is_said_at_its_field(pitch):
    pitch.get_by_role("button", name="Rider").tap()
    set_typed(pitch, fall_at_m="300")
    error = pitch.locator("#sheet-pitch-rider .error:visible")
    expect(error).to_have_text("Allowed: 0 to 240\u202fm")
    pitch.keyboard.press("Escape")
    expect(pitch.locator(".pitch-view .dock-button[data-wrong]")).to_have_count(1)


def test_what_is_set_reaches_the_engine(pitch):
    pitch.get_by_role("button", name="Rider").tap()
    set_typed(pitch, clothing_friction="0,25", sight_distance_m="40", rider_mass_kg="70",
              altitude_m="2500", braking_friction="0.4", reaction_time_s="1.2", waist_m="26")
    pitch.keyboard.press("Escape")
    set_typed(pitch, speed_mps="50")
    asked = question(clothing_friction=0.25, sight_distance_m=40, rider_mass_kg=70,
                     altitude_m=2500, braking_friction=0.4, reaction_time_s=1.2, waist_m=0.26,
                     speed_mps=50 / 3.6)
    settled(pitch)
    answer = snowhold.answer(asked)
    shows(pitch, asked, answer)
    pitch.get_by_role("button", name="More Figures").tap()
    shows(pitch, asked, answer)
    figures = pitch.locator("#sheet-pitch-figures")
    expect(figures).to_contain_text("Speed that stops within 40\u202fm")


def test_units_change_what_is_shown_and_not_what_is_asked(pitch):
    pitch.get_by_role("button", name="Settings", exact=True).tap()
    for name in ("mph", "percent", "feet, lb"):
        pitch.get_by_role("radio", name=name).check()
    pitch.keyboard.press("Escape")
    expect(field(pitch, "legs[0].pitch_deg")).to_have_value("62.5")  # tan 32°
    expect(field(pitch, "legs[0].length_m")).to_have_value("196.9")
    band = snowhold.answer(question())["band"]
    mph = band["end_speed_mps"]["high"] * 3600 / 1609.344
    expect(pitch.locator(".pitch-view .says")).to_contain_text(f"{int(mph) + 1}\u202fmph")
    feet = band["distance_m"]["low"] / 0.3048
    slide = pitch.locator(".words li").nth(1)
    expect(slide).to_contain_text(f"after {int(feet)}\u202fft at the least")
