"""One tap behind the Turn view: how sure, what to change, speed window, line, run, presets.

Figures are checked against the engine run on the desktop; its own tests check those against
outside sources.
"""

from __future__ import annotations

import math
import re
from collections.abc import Iterator

import pytest
from axe import LOOKS, look_like, violations
from playwright.sync_api import Browser, Page, expect
from turn_page import START, field, open_turn, plain, set_typed, settled, slider

import snowhold
from conftest import PHONE, Host, wait_arrays

SHEETS = ("changes", "sure", "window", "line", "run")


@pytest.fixture(scope="module")
def shared(browser: Browser, site) -> Iterator[Page]:
    """One Turn view with numpy for all these tests."""
    host = Host(site)
    context = browser.new_context(**PHONE)
    page = context.new_page()
    errors: list[str] = []
    page.on("pageerror", lambda error: errors.append(str(error)))
    open_turn(page, host.url)
    wait_arrays(page)
    yield page
    context.close()
    host.stop()
    assert errors == []


@pytest.fixture
def turn(shared: Page) -> Page:
    """As on a first visit: everything undone."""
    if shared.locator("dialog[open]").count():
        shared.keyboard.press("Escape")
    shared.set_viewport_size(PHONE["viewport"])
    shared.evaluate("document.documentElement.style.fontSize = ''")
    undo = shared.get_by_role("button", name=re.compile("^(Undo|Nothing)"))
    while undo.get_attribute("aria-disabled") is None:
        undo.click()
    known(shared)
    return shared


def known(page: Page) -> None:
    """Until the slow part of the answer is there, too."""
    settled(page)
    expect(page.locator(".chance:not([data-old])")).to_have_count(1, timeout=20_000)
    expect(page.locator(".chance [data-answer=chance_holds]")).not_to_have_text("–")


def put(page: Page, pitch: str, kmh: str) -> dict:
    """Set pitch and speed; gives the full answer to them."""
    set_typed(page, pitch_deg=pitch, speed_mps=kmh)
    page.wait_for_timeout(400)
    known(page)
    return full(pitch_deg=float(pitch), speed_mps=float(kmh) / 3.6)


def full(**changes) -> dict:
    asked = {key: value for key, value in START.items() if key not in ("samples", "suggest")}
    return snowhold.answer(asked | changes)


def sheet(page: Page, name: str):
    page.locator(f"[data-sheet={name}]").click()
    found = page.locator(f"#sheet-{name}")
    expect(found).to_be_visible()
    return found


def done(page: Page) -> None:
    page.get_by_role("button", name="Done").locator("visible=true").click()


def number(text: str) -> float:
    found = re.search(r"[−-]?\d+(\.\d+)?", plain(text).replace("−", "-"))
    assert found, text
    return float(found[0])


def test_the_chance_is_the_engines(turn):
    for pitch, kmh in (("12", "20"), ("20", "25")):
        answer = put(turn, pitch, kmh)
        shown = turn.locator(".chance [data-answer=chance_holds]").inner_text()
        assert number(shown) == math.floor(answer["chance_holds"] * 100 + 1e-6)
    expect(turn.locator(".chance")).to_have_attribute(
        "aria-label", re.compile(rf"{number(shown):.0f}\s*in 100"))


def test_a_drifted_line_has_its_own_chance(turn):
    """Where the page is about the drifted line, so is the chance."""
    answer = put(turn, "17", "35")
    line_m = answer["drift"]["line_radius_m"]
    wider = full(pitch_deg=17, speed_mps=35 / 3.6, line_radius_m=line_m)
    shown = turn.locator(".chance [data-answer=chance_holds]").inner_text()
    assert number(shown) == math.floor(wider["chance_holds"] * 100 + 1e-6)
    assert wider["chance_holds"] > answer["chance_holds"]


def test_the_best_change_is_one_tap_and_undo_takes_it_back(turn):
    answer = put(turn, "20", "25")
    best = answer["changes"][0]
    assert best["input"] == "speed_mps"
    fix = turn.locator("button.fix")
    slower = (best["from"] - best["to"]) * 3.6
    assert slower <= number(fix.inner_text()) <= slower + 0.1
    expect(fix).to_have_text(re.compile("slower"))
    fix.click()
    expect(turn.locator("[data-verdict=holds]")).to_have_count(1)
    expect(fix).to_be_hidden()
    turn.get_by_role("button", name="Undo: Speed").click()
    expect(turn.locator("[data-verdict=washes_out]")).to_have_count(1)
    expect(field(turn, "speed_mps")).to_have_value("25")


def test_too_fast_drifts_in_one_tap(turn):
    put(turn, "17", "35")
    turn.locator("button.fix").click()
    expect(turn.locator("[data-verdict=holds]")).to_have_count(1)
    expect(turn.locator("[data-sheet=line]")).to_contain_text("Line of 7.8")
    turn.get_by_role("button", name="Undo: Line radius").click()
    expect(turn.locator("[data-verdict=too_fast]")).to_have_count(1)


@pytest.mark.parametrize("index", range(4))
def test_every_change_in_the_list_makes_it_hold(turn, index):
    answer = put(turn, "20", "25")
    enough = [change for change in answer["changes"] if change["enough"]]
    found = sheet(turn, "changes")
    buttons = found.locator("button.change")
    expect(buttons).to_have_count(len(enough))
    order = buttons.evaluate_all("nodes => nodes.map((node) => node.dataset.change)")
    assert order == [change["input"] for change in enough]
    expect(found.locator(".changes-none li")).to_have_count(len(answer["changes"]) - len(enough))
    buttons.nth(index).click()
    expect(found).to_be_hidden()
    expect(turn.locator("[data-verdict=holds]")).to_have_count(1)


def test_where_nothing_is_enough_it_says_so(turn):
    turn.get_by_role("button", name=re.compile("^Snow")).click()
    turn.locator("#sheet-snow input[value=I]").check()
    turn.keyboard.press("Escape")
    set_typed(turn, pitch_deg="40", speed_mps="25")
    turn.wait_for_timeout(400)
    known(turn)
    answer = full(pitch_deg=40, speed_mps=25 / 3.6, snow="I")
    assert not any(change["enough"] for change in answer["changes"])
    fix = turn.locator("button.fix")
    expect(fix).to_contain_text("No one change is enough.")
    fix.click()
    expect(turn.locator("#sheet-changes")).to_contain_text("No change of one thing alone")
    done(turn)


def test_knowing_better_changes_the_chance(turn):
    answer = put(turn, "20", "22")
    found = sheet(turn, "sure")
    expect(found.get_by_text("assumed").first).to_be_visible()
    figure = found.locator("[data-answer=chance_holds]")
    assert number(figure.inner_text()) == math.floor(answer["chance_holds"] * 100 + 1e-6)
    entry = found.locator("input[data-question='spread.angulation_deg']")
    expect(entry).to_have_value("3")
    entry.fill("1")
    entry.press("Enter")
    expect(found.get_by_role("group", name="Angulation ±")).to_contain_text("yours")
    surer = full(pitch_deg=20, speed_mps=22 / 3.6, spread={"angulation_deg": 1})
    assert surer["chance_holds"] > answer["chance_holds"]
    expect(figure).to_have_text(f"{math.floor(surer['chance_holds'] * 100 + 1e-6)}\u202fin 100",
                                timeout=15_000)
    label = found.get_by_role("img", name="Grip margin along the turn").get_attribute("aria-label")
    last = f"{math.floor(surer['margin_band']['high'][-1] * 100 + 1e-6):+d}".replace("-", "−")
    assert f"to {last}" in plain(label or "")
    found.get_by_role("button", name="Back to the assumed").click()
    expect(entry).to_have_value("3")
    done(turn)


def test_a_bad_spread_is_kept_and_explained(turn):
    found = sheet(turn, "sure")
    entry = found.locator("input[data-question='spread.pitch_deg']")
    entry.fill("9")
    entry.press("Enter")
    expect(found.locator(".error:visible")).to_have_text("Allowed: 0 to 5°", timeout=15_000)
    expect(entry).to_have_value("9")
    done(turn)


def test_a_tap_in_the_window_sets_pitch_and_speed(turn):
    put(turn, "20", "25")
    found = sheet(turn, "window")
    picture = found.get_by_role("img", name="Pitch against speed")
    expect(picture).to_be_visible(timeout=15_000)
    hold = full(pitch_deg=20, speed_mps=25 / 3.6)["hold_speed_mps"]
    spoken = plain(picture.get_attribute("aria-label") or "")
    assert f"holds from {hold['min'] * 3.6:.1f} km/h to {hold['max'] * 3.6:.1f} km/h" in spoken

    circle = found.locator(".point.rim").bounding_box()
    box = picture.bounding_box()
    assert circle and box
    x, y = circle["x"] + circle["width"] / 2, circle["y"] + circle["height"] / 2
    turn.touchscreen.tap(x - box["width"] * 0.2, y + box["height"] * 0.1)
    expect(field(turn, "pitch_deg")).not_to_have_value("20")
    pitch, kmh = (float(field(turn, key).input_value()) for key in ("pitch_deg", "speed_mps"))
    assert 5 <= pitch <= 12
    assert 15 <= kmh <= 23
    assert slider(turn, "pitch_deg").input_value() == f"{pitch:g}"
    # By keys; after a pause that is a change of its own to undo.
    turn.wait_for_timeout(1200)
    handle = found.get_by_role("slider", name="Speed in the picture")
    handle.press("ArrowUp")
    handle.press("ArrowRight")
    expect(field(turn, "pitch_deg")).to_have_value(f"{pitch + 1:g}")
    expect(field(turn, "speed_mps")).to_have_value(f"{kmh + 1:g}")
    done(turn)
    turn.get_by_role("button", name="Undo: Speed window").click()
    expect(field(turn, "pitch_deg")).to_have_value(f"{pitch:g}")
    turn.get_by_role("button", name="Undo: Speed window").click()
    expect(field(turn, "pitch_deg")).to_have_value("20")
    expect(field(turn, "speed_mps")).to_have_value("25")


def test_the_windows_contours_are_the_engines(turn):
    """Read off the drawing: the bound of what holds, at its first point and at its last."""
    put(turn, "20", "25")
    found = sheet(turn, "window")
    expect(found.locator(".edge-holds")).to_have_attribute("d", re.compile("L"), timeout=15_000)
    asked = {key: value for key, value in START.items() if key not in ("samples", "suggest")}
    window = snowhold.answer(asked | {"ask": "window", "highest_pitch_deg": 50})
    ends, ticks = found.evaluate("""(dialog) => [
        [0, 1].map((share) => {
            const path = dialog.querySelector('.edge-holds');
            const at = path.getPointAtLength(path.getTotalLength() * share);
            return [at.x, at.y];
        }),
        [...dialog.querySelectorAll('.grid')].map((grid) => grid.getAttribute('d'))[0],
    ]""")
    # Grid lines: upright at 0, 10… degrees, level at every tick of speed.
    lines = [tuple(map(float, part.replace("L", " ").split())) for part in ticks.split("M")[1:]]
    x0, x10 = lines[0][0], lines[1][0]
    levels = sorted((line[1] for line in lines if line[1] == line[3]), reverse=True)
    kmh_per_px = 10 / (levels[0] - levels[1])
    bottom = lines[0][3]
    holds = [(p, h) for p, h, s in zip(window["pitch_deg"], window["holds_mps"],
                                       window["slowest_mps"], strict=True) if h > s]
    for (x, y), (pitch, mps) in zip(ends, (holds[0], holds[-1]), strict=True):
        assert (x - x0) / (x10 - x0) * 10 == pytest.approx(pitch, abs=0.2)
        assert (bottom - y) * kmh_per_px == pytest.approx(mps * 3.6, abs=0.2)
    done(turn)


def test_presets_are_the_published_speeds(turn):
    """Stepan et al., JSAMS Plus (2023): 19.9, 32.4 and 44.5 km/h."""
    found = sheet(turn, "window")
    for who, kmh in (("Beginner", "19.9"), ("Intermediate", "32.4"), ("Advanced", "44.5")):
        found.get_by_role("button", name=who).click()
        expect(field(turn, "speed_mps")).to_have_value(kmh)
    expect(found.get_by_text("JSAMS Plus (2023)").first).to_be_hidden()
    found.get_by_text("Where these come from").click()
    expect(found.get_by_text("JSAMS Plus (2023)").first).to_be_visible()
    done(turn)


def test_a_line_can_be_drawn(turn):
    put(turn, "20", "25")
    found = sheet(turn, "line")
    found.get_by_role("radio", name="Drift a wider line").check()
    entry = found.locator("input[type=text][data-question=line_radius_m]")
    expect(entry).to_be_visible()
    entry.fill("11")
    entry.press("Enter")
    answer = full(pitch_deg=20, speed_mps=25 / 3.6, line_radius_m=11)
    index = answer["phase_deg"].index(answer["worst"]["phase_deg"])
    for key, factor, decimals in (("lean_deg", 1, 0), ("least_edge_angle_deg", 1, 0),
                                  ("drift_angle_deg", 1, 1), ("groove_width_m", 1000, 1)):
        shown = found.locator(f"[data-answer='{key}.{index}']")
        expect(shown).to_have_text(re.compile(f"^{answer[key][index] * factor:.{decimals}f}"))
    expect(found.locator(".catch")).to_contain_text("stays clear")
    done(turn)
    expect(turn.locator("[data-sheet=line]")).to_contain_text("Line of 11")
    expect(turn.locator("[data-verdict=holds]")).to_have_count(1)


def test_edge_catch_and_pivoting_are_said(turn):
    put(turn, "32", "14")
    found = sheet(turn, "line")
    found.get_by_role("radio", name="Drift a wider line").check()
    entry = found.locator("input[type=text][data-question=line_radius_m]")
    entry.fill("6")
    entry.press("Enter")
    answer = full(pitch_deg=32, speed_mps=14 / 3.6, line_radius_m=6)
    assert answer["edge_catch"]["phases_deg"]
    assert any(answer["pivoted"])
    warning = found.locator(".catch[data-warning]")
    expect(warning).to_contain_text("Catches an edge if flat: keep it tilted 3° or more")
    expect(warning.get_by_role("img", name="Warning")).to_be_visible()
    expect(found.get_by_text("tighter than the board carves")).to_be_visible()
    done(turn)


def test_the_turns_shape_can_be_set(turn):
    put(turn, "20", "25")
    found = sheet(turn, "line")
    entry = found.locator("input[type=text][data-question=from_phase_deg]")
    entry.fill("40")
    entry.press("Enter")
    picture = found.get_by_role("img", name="The turn from above: it starts 40°")
    expect(picture).to_be_visible()
    done(turn)
    answer = full(pitch_deg=20, speed_mps=25 / 3.6, from_phase_deg=40)
    expect(turn.locator(f"[data-verdict={answer['verdict']}]")).to_have_count(1)
    expect(turn.get_by_role("slider", name="Place in the turn")).to_have_attribute(
        "aria-valuemin", "40")


def run_answer(**changes) -> dict:
    asked = {key: value for key, value in START.items()
             if key not in ("samples", "suggest", "pitch_deg", "speed_mps")}
    return snowhold.answer(asked | {"ask": "run"} | changes)


def test_a_run_says_where_it_fails_and_that_no_speed_carves(turn):
    put(turn, "20", "25")
    answer = run_answer(pitch_deg=20, start_speed_mps=25 / 3.6)
    assert answer["no_speed_carves"]
    found = sheet(turn, "run")
    expect(found.locator("[data-run=too_fast]")).to_have_text("Too fast to carve in turn 1",
                                                              timeout=20_000)
    expect(found.get_by_text("No speed carves this pitch; drift it.")).to_be_visible()
    for key, factor, decimals in (("critical_pitch_deg", 1, 1), ("time_s", 1, 1),
                                  ("distance_m", 1, 0), ("top_speed_mps", 3.6, 0)):
        expect(found.locator(f"[data-answer={key}]")).to_have_text(
            re.compile(f"^{answer[key] * factor:.{decimals}f}"))
    picture = found.get_by_role("img", name="The run from above")
    assert "Too fast to carve in turn 1." in (picture.get_attribute("aria-label") or "")
    expect(found.locator(".run-picture .mark")).to_be_visible()

    found.get_by_role("button", name="Drift it on").click()
    expect(found.locator("[data-run=washes_out]")).to_be_visible(timeout=20_000)
    expect(found.get_by_text("slowed more than this")).to_be_visible()
    done(turn)


def test_a_run_on_a_gentle_pitch_holds(turn):
    put(turn, "4", "20")
    answer = run_answer(pitch_deg=4, start_speed_mps=20 / 3.6, turns=3)
    found = sheet(turn, "run")
    turns = found.locator("input[data-question=turns]")
    turns.fill("3")
    turns.press("Enter")
    expect(found.locator(f"[data-run={answer['verdict']}]")).to_be_visible(timeout=20_000)
    assert answer["fails_at"] is None
    expect(found.locator(".run-picture .mark")).to_be_hidden()
    expect(found.get_by_text("No speed carves")).to_be_hidden()
    done(turn)


def test_a_run_over_several_pitches(turn):
    put(turn, "4", "20")
    found = sheet(turn, "run")
    found.get_by_role("radio", name="Several pitches").check()
    steep = found.locator("input[data-question='legs[1].pitch_deg']")
    steep.fill("25")
    steep.press("Enter")
    answer = run_answer(start_speed_mps=20 / 3.6, legs=[
        {"pitch_deg": 4, "length_m": 60}, {"pitch_deg": 25, "length_m": 60}])
    assert [leg["no_speed_carves"] for leg in answer["legs"]] == [False, True]
    expect(found.get_by_text("No speed carves the 25° leg; drift it.")).to_be_visible(
        timeout=20_000)
    steep.fill("80")
    steep.press("Enter")
    expect(found.locator(".error:visible")).to_have_text("Allowed: 0 to 50°", timeout=20_000)
    steep.fill("25")
    steep.press("Enter")
    found.get_by_role("radio", name="Pitch as in the Turn view").check()
    done(turn)


SMALL_TARGETS = """() => [...document.querySelectorAll(
        'button, input:not([type=radio]), label:has(input), summary')]
    .filter((node) => node.checkVisibility() && !node.matches('[type=text]'))
    .map((node) => [node, node.getBoundingClientRect()])
    .filter(([, box]) => box.width < 48 || box.height < 48)
    .map(([node, box]) => `${node.className} ${box.width}x${box.height}`)"""


def fill(page: Page, name: str) -> None:
    """Until a sheet shows all that it has."""
    ready = {"changes": ".change", "sure": ".margin-band .spread[d]", "window": ".edge-holds[d]",
             "line": ".row >> nth=0", "run": ".run-picture .curve[d] >> nth=0"}[name]
    expect(page.locator(f"#sheet-{name} {ready}").first).to_be_attached(timeout=20_000)


@pytest.mark.parametrize("look", LOOKS)
@pytest.mark.parametrize("name", SHEETS)
def test_axe_finds_nothing_in_a_sheet(turn, look, name):
    look_like(turn, look)
    put(turn, "20", "25")
    enhanced = ("color-contrast-enhanced",) if look == "glare" else ()
    page = violations(turn, *enhanced)
    sheet(turn, name)
    fill(turn, name)
    found = violations(turn, *enhanced)
    small = turn.evaluate(SMALL_TARGETS)
    done(turn)
    assert page == []
    assert found == []
    assert small == []


@pytest.mark.parametrize(("width", "height", "percent"), [(320, 568, 100), (360, 640, 200),
                                                         (568, 320, 100)])
def test_nothing_needs_sideways_scrolling(turn, width, height, percent):
    put(turn, "20", "25")
    turn.set_viewport_size({"width": width, "height": height})
    turn.evaluate("(size) => { document.documentElement.style.fontSize = size; }", f"{percent}%")
    wide = {"page": turn.evaluate("document.documentElement.scrollWidth") - width}
    for name in SHEETS:
        found = sheet(turn, name)
        fill(turn, name)
        wide[name] = found.evaluate("""(sheet) => {
            const body = sheet.querySelector('.sheet-body');
            return Math.max(sheet.scrollWidth - sheet.clientWidth,
                body.scrollWidth - body.clientWidth);
        }""")
        done(turn)
    assert {name: over for name, over in wide.items() if over > 0} == {}


@pytest.mark.parametrize(("width", "height"), [(360, 640), (412, 915), (915, 412)])
def test_the_answer_stays_in_sight(turn, width, height):
    turn.set_viewport_size({"width": width, "height": height})
    put(turn, "20", "25")
    turn.evaluate("scrollTo(0, 0)")
    nav = turn.locator("nav").bounding_box()
    low = nav["y"] if nav and nav["y"] > height / 2 and width < height else height
    for part in (".verdict-word", "button.fix", ".figures", ".chance", ".section",
                 ".number >> nth=0"):
        box = turn.locator(part).bounding_box()
        assert box and box["y"] >= 0 and box["y"] + box["height"] <= low, part


def test_the_rows_keep_their_places(turn):
    """Whatever the verdict, the sliders do not move under the finger."""
    places = []
    for pitch, kmh in (("12", "20"), ("20", "25"), ("17", "35"), ("32", "14")):
        put(turn, pitch, kmh)
        places.append(turn.locator(".number >> nth=0").evaluate("(node) => node.offsetTop"))
    assert len(set(places)) == 1, places


def test_the_page_rests_with_all_sheets_made(turn):
    put(turn, "20", "25")
    for name in SHEETS:
        sheet(turn, name)
        fill(turn, name)
        done(turn)
    session = turn.context.new_cdp_session(turn)
    session.send("Performance.enable")

    def work() -> dict[str, float]:
        metrics = session.send("Performance.getMetrics")["metrics"]
        return {one["name"]: one["value"] for one in metrics
                if one["name"] in ("LayoutCount", "RecalcStyleCount")}

    turn.wait_for_timeout(2500)
    before = work()
    turn.wait_for_timeout(1500)
    assert work() == before
