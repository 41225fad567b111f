"""The Pitch view in a browser on a phone: slope, slide, stopping, sentences, card and link."""

from __future__ import annotations

import json
import re
import struct
import subprocess
import zlib
from collections.abc import Iterator
from pathlib import Path

import pytest
from playwright.sync_api import Browser, BrowserContext, Page, expect

import snowhold
from conftest import PHONE, ROOT, START_MS, Host, wait_offline, wait_ready
from pitch_page import (
    DEMO, SLOPES, coded, field, fragment, open_pitch, question, set_slope, set_typed, settled,
    shows,
)
from snowhold import pitch_words

AXE = (ROOT / "web/node_modules/axe-core/axe.min.js").read_text("utf-8")
LOOKS = ("light", "dark", "glare")


@pytest.fixture(scope="module")
def installed(browser: Browser, site: Path) -> Iterator[tuple[BrowserContext, str, Host]]:
    """A phone that has the app, and its address: later tests start from its cache."""
    host = Host(site)
    context = browser.new_context(**PHONE)
    page = context.new_page()
    open_pitch(page, host.url)
    wait_offline(page)
    page.close()
    yield context, host.url, host
    context.close()
    host.stop()


@pytest.fixture
def pitch(installed) -> Iterator[Page]:
    """The Pitch view as on a first visit: nothing kept."""
    context, url, _ = installed
    page = context.new_page()
    errors: list[str] = []
    page.on("pageerror", lambda error: errors.append(str(error)))
    page.goto(f"{url}manifest.webmanifest")
    page.evaluate("""() => new Promise((done) => {
        indexedDB.deleteDatabase('keyval-store').onsuccess = done;
    })""")
    page.on("console", lambda said: errors.append(said.text) if said.type == "error" else None)
    open_pitch(page, url)
    yield page
    page.close()
    assert errors == []


def test_the_main_path_by_touch(pitch):
    asked = question()
    assert shows(pitch, asked, snowhold.answer(asked)) >= 10
    expect(pitch.locator(".pitch-view .caption")).to_have_text("Invented slope: a demo, no real place.")
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
    box = slope.bounding_box()
    assert box
    pitch.touchscreen.tap(box["x"] + box["width"] / 2, box["y"] + box["height"] / 2)
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


def test_the_slope_is_drawn_to_scale(pitch):
    asked = set_slope(pitch, "demo")
    points = pitch.locator(".slope .surface").evaluate("""(path) =>
        path.getAttribute('d').slice(1).split('L').map((pair) => pair.split(' ').map(Number))""")
    profile = snowhold.answer(asked)["profile"]
    (x0, y0), (x1, y1) = points[0], points[-1]
    scale = (x1 - x0) / profile["x_m"][-1]
    for (x, y), x_m, height_m in zip(points, profile["x_m"], profile["height_m"], strict=True):
        assert x - x0 == pytest.approx(x_m * scale, abs=0.15)
        assert y1 - y == pytest.approx((height_m - profile["height_m"][-1]) * scale, abs=0.15)
    # A line over the snow is as high as its speed.
    def heights(way: str) -> list[tuple[float, float]]:
        line = pitch.locator(f".slope .{way}").evaluate("""(path) =>
            path.getAttribute('d').slice(1).split('L').map((pair) => pair.split(' ').map(Number))""")
        speeds = [v for v in profile["speed_mps"][way] if v is not None]
        return [(points[i][1] - y, v) for i, ((_, y), v) in enumerate(zip(line, speeds, strict=True))]

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
    expect(pitch.locator("[data-answer=stand_edge_angle_deg]").locator("visible=true")).to_have_text("30°")
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
    expect(errors).to_have_text(["Allowed: −20 to 50°", "Not a number. Allowed: 0.1 to 5000\u202fm"])
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
    expect(pitch.locator("#sheet-pitch-rider .error:visible")).to_have_text("Allowed: 0 to 240\u202fm")
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
    expect(pitch.locator("#sheet-pitch-figures")).to_contain_text("Speed that stops within 40\u202fm")


def test_state_survives_a_closed_tab_and_works_offline(pitch, installed):
    context, url, host = installed
    asked = set_slope(pitch, "stops")
    pitch.wait_for_timeout(500)
    pitch.close(run_before_unload=True)
    host.stop()
    try:
        again = context.new_page()
        again.goto(url)
        wait_ready(again)
        expect(again.get_by_role("button", name="Pitch", exact=True)).to_have_attribute("aria-current", "page")
        settled(again)
        shows(again, asked, snowhold.answer(asked))
        again.get_by_role("button", name="Show Card").tap()
        with again.expect_download() as saved:
            again.get_by_role("button", name="Image").tap()
        width, height, dark = png(saved.value.path().read_bytes())
        assert width == 1080 and height > 1500
        assert 0.02 < dark < 0.5, "the picture has something on it"
        again.close()
    finally:
        host.start()


def png(data: bytes) -> tuple[int, int, float]:
    """Width, height and the share of dark bytes of a PNG, by its specification (ISO 15948)."""
    assert data[:8] == b"\x89PNG\r\n\x1a\n"
    width, height = struct.unpack(">II", data[16:24])
    parts, place = b"", 8
    while place < len(data):
        (length,) = struct.unpack(">I", data[place:place + 4])
        if data[place + 4:place + 8] == b"IDAT":
            parts += data[place + 8:place + 8 + length]
        place += 12 + length
    raw = zlib.decompress(parts)
    # Filtered bytes: of an empty page all but the first of a row are 0.
    return width, height, sum(byte != 0 for byte in raw[::97]) / len(raw[::97])


@pytest.mark.parametrize("paper", ["A4", "Letter"])
def test_the_card_prints_on_one_page_black_on_white(pitch, paper, tmp_path):
    asked = set_slope(pitch, "ten")
    answer = snowhold.answer(asked)
    pitch.get_by_role("button", name="Show Card").tap()
    pitch.get_by_label("Name of the slope").fill("Race hill <b>upper</b> part")
    card = pitch.locator("#sheet-card")
    expect(card.get_by_role("heading", name="Race hill <b>upper</b> part")).to_be_visible()
    shows(pitch, asked, answer)
    for part in ("What it means", "Numbers", "Computed for", "Sources", "An estimate.",
                 "avalanche bulletin", "W. Nachbauer", "by Snowhold"):
        expect(card).to_contain_text(part)
    file = tmp_path / "card.pdf"
    pitch.pdf(path=file, format=paper)
    info = subprocess.run(["pdfinfo", file], capture_output=True, text=True, check=True).stdout
    assert re.search(r"Pages:\s+1\n", info)
    text = subprocess.run(["pdftotext", "-layout", file, "-"], capture_output=True, text=True,
                          check=True).stdout
    assert "May not stop" in text and "Sources" in text and "Settings" not in text
    grey = subprocess.run(["pdftoppm", "-r", "40", file], capture_output=True, check=True).stdout
    magic, size, _, pixels = grey.split(b"\n", 3)
    assert magic == b"P6"
    colours = {pixels[i:i + 3] for i in range(0, len(pixels) - 2, 3)}
    assert all(max(colour) - min(colour) <= 2 for colour in colours), "no colour is printed"


def test_a_link_brings_the_whole_pitch_to_a_fresh_page(pitch, installed, new_context):
    _, url, _ = installed
    asked = set_slope(pitch, "stops")
    pitch.get_by_role("button", name="Show Card").tap()
    pitch.get_by_label("Name of the slope").fill("Südhang, früh")
    pitch.get_by_role("button", name="Link").tap()
    address = pitch.get_by_role("textbox", name="Link").input_value()
    assert address.startswith(f"{url}#pitch=")

    page = new_context(**PHONE).new_page()
    page.goto(address)
    wait_ready(page)
    settled(page)
    shows(page, asked, snowhold.answer(asked))
    expect(page.get_by_role("alert").filter(has_text="Opened from a link")).to_be_visible()
    assert "#" not in page.url
    page.get_by_role("button", name="Show Card").tap()
    expect(page.get_by_role("heading", name="Südhang, früh")).to_be_visible()
    page.keyboard.press("Escape")
    page.get_by_role("button", name=re.compile("^Undo")).tap()
    page.get_by_role("button", name="Pitch", exact=True).click()
    settled(page)
    shows(page, question(), snowhold.answer(question()))


def hostile() -> dict[str, str]:
    good = question()
    legs = [["pitch_deg", 20, 50, None]]
    return {
        "no base64": "#pitch=%3Cscript%3E",
        "no JSON": coded("{'v': 1"),
        "a list": coded("[1, 2, 3]"),
        "another version": fragment(good, v=2),
        "a foreign key": fragment(good, view="turn"),
        "a prototype": coded('{"__proto__": {"x": 1}, "v": 1}'),
        "eleven legs": fragment(good, legs=legs * 11),
        "no leg": fragment(good, legs=[]),
        "a leg of text": fragment(good, legs=[["pitch_deg", "20", 50, None]]),
        "an unknown steepness": fragment(good, legs=[["constructor", 20, 50, None]]),
        "a list as a word": fragment(good, legs=[[["pitch_deg"], 20, 50, None]]),
        "a huge number": coded(json.dumps({"v": 1}) [:-1] + ', "legs": [["pitch_deg", 1e999, 5, null]]}'),
        "unknown snow": fragment(good, shared=["<b>", 80, 5, 2, 1.2, None]),
        "null speed": fragment(good, own=[None, 0, None, 0.5, 1500, None, None, None, None, 0.25]),
        "a long name": fragment(good, name="x" * 61),
        "a name that turns the line": fragment(good, name="abc\u202edef"),
        "much too long": "#pitch=" + "A" * 100_000,
    }


@pytest.mark.parametrize("kind", hostile())
def test_a_hostile_link_is_refused_and_changes_nothing(pitch, kind):
    set_typed(pitch, **{"legs[0].pitch_deg": "31"})
    settled(pitch)
    pitch.evaluate("(hash) => { location.hash = hash; }", hostile()[kind])
    expect(pitch.get_by_role("alert").filter(has_text="holds no pitch that Snowhold can read")).to_be_visible()
    asked = question(legs=[{"pitch_deg": 31, "length_m": 60}, *DEMO[1:]])
    settled(pitch)
    shows(pitch, asked, snowhold.answer(asked))


def test_a_link_with_figures_out_of_range_shows_the_engines_errors(pitch):
    asked = question(legs=[{"pitch_deg": 75, "length_m": 60}])
    pitch.evaluate("(hash) => { location.hash = hash; }", fragment(asked))
    expect(field(pitch, "legs[0].pitch_deg")).to_have_value("75")
    expect(pitch.locator(".pitch-view .error:visible")).to_have_text("Allowed: −20 to 50°")


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
    expect(pitch.locator(".words li").nth(1)).to_contain_text(f"after {int(feet)}\u202fft at the least")


def violations(page: Page, *extra: str) -> list[str]:
    page.evaluate(f"() => {{ if (!window.axe) {{ {AXE} }} }}")
    found = page.evaluate("""async (extra) => (await axe.run(document, {
        rules: Object.fromEntries(extra.map((rule) => [rule, { enabled: true }])),
    })).violations""", list(extra))
    return [f"{one['id']}: {node['target']} {node['failureSummary']}"
            for one in found for node in one["nodes"]]


def look_like(page: Page, look: str) -> None:
    page.get_by_role("button", name="Settings", exact=True).click()
    page.get_by_role("radio", name=look).check()
    page.keyboard.press("Escape")
    expect(page.locator("html")).to_have_attribute("data-look", look)


SHEETS = {"pitch-snow": "Snow, firm", "pitch-rider": "Rider", "pitch-figures": "More Figures",
          "pitch-leg": "More on leg", "card": "Show Card"}


@pytest.mark.parametrize("look", LOOKS)
def test_axe_finds_nothing_in_the_view_and_its_sheets(pitch, look):
    look_like(pitch, look)
    set_slope(pitch, "ten")
    enhanced = ("color-contrast-enhanced",) if look == "glare" else ()
    # The whole page in sight: nothing lies half under the views' bar.
    pitch.set_viewport_size({"width": 412, "height": 2000})
    found = violations(pitch, *enhanced, "target-size")
    pitch.set_viewport_size(PHONE["viewport"])
    for sheet, name in SHEETS.items():
        pitch.get_by_role("button", name=name).first.click()
        expect(pitch.locator(f"#sheet-{sheet}")).to_be_visible()
        found += [f"{sheet}: {one}" for one in violations(pitch, *enhanced)]
        pitch.keyboard.press("Escape")
    set_typed(pitch, **{"legs[0].pitch_deg": "90"})
    expect(pitch.locator(".pitch-view .error:visible")).to_have_count(1)
    assert found + violations(pitch) == []


@pytest.mark.parametrize("percent", [100, 200])
@pytest.mark.parametrize("size", [(320, 568), (360, 640), (568, 320), (915, 412), (1280, 800)],
                         ids=lambda size: f"{size[0]}x{size[1]}")
def test_nothing_needs_sideways_scrolling(pitch, size, percent):
    set_slope(pitch, "ten")
    pitch.set_viewport_size({"width": size[0], "height": size[1]})
    pitch.evaluate("(size) => { document.documentElement.style.fontSize = size; }", f"{percent}%")
    wide = {"page": pitch.evaluate("document.documentElement.scrollWidth - innerWidth")}
    small = []
    for sheet, name in {"": "", **SHEETS}.items():
        if name:
            pitch.get_by_role("button", name=name).first.click()
            wide[sheet] = pitch.evaluate("""() => Math.max(...[...document.querySelectorAll(
                'dialog[open], dialog[open] .sheet-body, dialog[open] .card-scroll, dialog[open] .card-tools')]
                .map((node) => node.scrollWidth - node.clientWidth))""")
        if percent == 100:
            small += pitch.evaluate("""() => [...document.querySelectorAll(
                    'button, input:not([type=radio]), label:has(input), [role=slider], summary')]
                .filter((node) => node.checkVisibility() && !node.matches('.field'))
                .map((node) => [node, node.getBoundingClientRect()])
                .filter(([, box]) => box.width < 48 || box.height < 48)
                .map(([node, box]) => `${node.className} ${node.textContent} ${box.width}x${box.height}`)""")
        pitch.keyboard.press("Escape")
    assert max(wide.values()) <= 0, wide
    assert small == []


@pytest.mark.parametrize("size", [(360, 640), (412, 915), (915, 412), (640, 360)],
                         ids=lambda size: f"{size[0]}x{size[1]}")
def test_the_answer_is_there_without_scrolling(pitch, size):
    pitch.set_viewport_size({"width": size[0], "height": size[1]})
    pitch.evaluate("scrollTo(0, 0)")
    nav = pitch.locator(".nav").bounding_box()
    assert nav
    low = nav["y"] if size[0] < size[1] else size[1]
    for part in (".verdict-word", ".says", ".figures", ".slope"):
        box = pitch.locator(f".pitch-view {part}").bounding_box()
        assert box and box["y"] >= 0 and box["y"] + box["height"] <= low, part


def test_the_headline_is_said_once_when_it_has_settled(pitch):
    pitch.wait_for_timeout(1500)
    pitch.evaluate("""() => {
        window.said = [];
        const live = document.querySelector('.pitch-view .verdict [aria-live]');
        new MutationObserver(() => window.said.push(live.textContent)).observe(live, { childList: true });
    }""")
    for pitch_deg in ("20", "12", "8", "3"):
        set_typed(pitch, **{"legs[0].pitch_deg": pitch_deg})
    pitch.wait_for_timeout(2000)
    said = pitch.evaluate("window.said")
    assert len(said) == 1
    assert said[0].startswith(pitch.locator(".pitch-view .verdict-word").inner_text())


def test_by_keyboard_the_fall_goes_along_the_slope(pitch):
    slope = pitch.get_by_role("slider", name="Place of the fall")
    slope.focus()
    for key, place in (("ArrowRight", 1), ("PageDown", 13), ("End", 239), ("Home", 0)):
        slope.press(key)
        expect(slope).to_have_attribute("aria-valuenow", str(place), timeout=START_MS)
    words = pitch.locator(".pitch-view .pictures > .visually-hidden").inner_text()
    assert "Leg 1: 32°, 60\u202fm." in words and "In middle clothing the slide stops after" in words


def test_the_page_rests_when_nothing_changes(pitch):
    session = pitch.context.new_cdp_session(pitch)
    session.send("Performance.enable")

    def work() -> dict[str, float]:
        metrics = session.send("Performance.getMetrics")["metrics"]
        return {one["name"]: one["value"] for one in metrics
                if one["name"] in ("LayoutCount", "RecalcStyleCount", "ScriptDuration")}

    set_typed(pitch, **{"legs[0].pitch_deg": "17"})
    pitch.wait_for_timeout(2500)
    before = work()
    pitch.wait_for_timeout(1500)
    assert work() == before
