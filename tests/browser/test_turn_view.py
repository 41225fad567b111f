"""The main job in a browser on a phone: three sliders, snow, rider; verdict and figures."""

from __future__ import annotations

import re
from collections.abc import Callable, Iterator

import pytest
from playwright.sync_api import Browser, BrowserContext, Page, expect
from turn_page import (
    IMPERIAL,
    drag,
    expected,
    field,
    nudge,
    open_turn,
    plain,
    question,
    set_typed,
    settled,
    shows,
    slider,
)

import snowhold
from conftest import PHONE, START_MS, Host, first_visit, wait_ready


@pytest.fixture(scope="module")
def installed(browser: Browser, site) -> Iterator[tuple[BrowserContext, str]]:
    """A phone that has the app, and its address: later tests start from its cache."""
    host = Host(site)
    context = browser.new_context(**PHONE)
    page = context.new_page()
    open_turn(page, host.url)
    page.evaluate("navigator.serviceWorker.ready.then(() => true)")
    page.close()
    yield context, host.url
    context.close()
    host.stop()


@pytest.fixture
def turn(installed) -> Iterator[Page]:
    """The Turn view as on a first visit: nothing kept."""
    with first_visit(*installed) as page:
        open_turn(page, installed[1])
        yield page


def test_the_main_job_by_touch(turn):
    shows(turn, question())
    for _ in range(3):
        nudge(turn, "Pitch", "more").tap()
    shows(turn, question(pitch_deg=18))

    drag(turn, "speed_mps", 1 / 3)
    kmh = float(slider(turn, "speed_mps").input_value())
    assert 28 <= kmh <= 32
    expect(field(turn, "speed_mps")).to_have_value(f"{kmh:g}")
    shows(turn, question(pitch_deg=18, speed_mps=kmh / 3.6))

    turn.get_by_role("button", name=re.compile("^Snow")).tap()
    turn.get_by_role("radio", name="Ice").tap()
    turn.get_by_role("button", name="Done").locator("visible=true").tap()
    expect(turn.get_by_role("button", name=re.compile("^Snow"))).to_contain_text("Ice")
    shows(turn, question(pitch_deg=18, speed_mps=kmh / 3.6, snow="I"))


SITUATIONS = {
    "holds": {"pitch_deg": 12, "speed_mps": 20},
    "marginal": {"pitch_deg": 18, "speed_mps": 20.7, "snow": "K", "angulation_deg": 8},
    "washes_out": {"pitch_deg": 20, "speed_mps": 23.8, "snow": "K"},
    "too_fast": {"pitch_deg": 17, "speed_mps": 35},
    "too_slow": {"pitch_deg": 22, "speed_mps": 14},
}


@pytest.mark.parametrize("verdict", SITUATIONS)
def test_every_shown_figure_is_the_engines(turn, verdict):
    situation = dict(SITUATIONS[verdict])
    set_typed(turn, pitch_deg=str(situation["pitch_deg"]), speed_mps=str(situation["speed_mps"]))
    if "snow" in situation:
        turn.get_by_role("button", name=re.compile("^Snow")).tap()
        turn.locator(f"input[type=radio][value={situation['snow']}]").check()
        turn.keyboard.press("Escape")
    if "angulation_deg" in situation:
        turn.get_by_role("button", name=re.compile("^Rider")).tap()
        set_typed(turn, angulation_deg=str(situation["angulation_deg"]))
        turn.keyboard.press("Escape")
    asked = question(**situation | {"speed_mps": situation["speed_mps"] / 3.6})
    answer = snowhold.answer(asked)
    assert answer["verdict"] == verdict, "the situation is what the test means it to be"
    assert shows(turn, asked) >= 4

    turn.get_by_role("button", name="Figures").tap()
    assert shows(turn, asked) > 10
    along = turn.locator(".along li")
    runs = 1 + sum(a != b for a, b in zip(answer["state"], answer["state"][1:], strict=False))
    expect(along).to_have_count(runs)


def test_the_section_is_drawn_to_the_computed_angles(turn):
    """Angles measured off the drawing: balance axis, board and force against lean and edge."""
    set_typed(turn, pitch_deg="20", speed_mps="22")
    answer = snowhold.answer(question(pitch_deg=20, speed_mps=22 / 3.6))
    shows(turn, question(pitch_deg=20, speed_mps=22 / 3.6))
    worst = answer["worst"]

    def slope(name: str) -> float:
        """Direction of a line of the section on the page, degrees from level."""
        return turn.locator(f".section .{name}").evaluate("""(path) => {
            const [a, b] = [path.getPointAtLength(0), path.getPointAtLength(path.getTotalLength())];
            return Math.atan2(a.y - b.y, b.x - a.x) * 180 / Math.PI;
        }""")

    # At the end of the turn the section is along the fall line: it shows the pitch itself.
    assert worst["phase_deg"] > 90
    snow = slope("surface")
    normal = slope("normal")
    assert normal - snow == pytest.approx(90, abs=0.3)
    assert normal - slope("axis") == pytest.approx(worst["lean_deg"], abs=0.5)
    assert slope("platform") - snow == pytest.approx(180 - worst["edge_angle_deg"], abs=0.5)
    assert slope("force") + 180 == pytest.approx(slope("axis"), abs=0.5)
    set_typed(turn, speed_mps="20", pitch_deg="12")
    shows(turn, question(pitch_deg=12, speed_mps=20 / 3.6))
    assert snowhold.answer(question(pitch_deg=12, speed_mps=20 / 3.6))["worst"]["phase_deg"] == 180
    assert slope("surface") == pytest.approx(12, abs=0.2)


def test_too_fast_leads_with_the_line_to_drift(turn):
    set_typed(turn, pitch_deg="17", speed_mps="35")
    answer = snowhold.answer(question(pitch_deg=17, speed_mps=35 / 3.6))
    radius = expected(answer, "drift.line_radius_m")
    fix = turn.locator(".fix")
    expect(fix).to_have_text(re.compile("Drift it on"))
    assert plain(fix.inner_text()) == f"Drift it on {radius} or wider."
    # Both lines are drawn: the one to ride and the board's own arc.
    for line in ("holds", "other"):
        assert turn.locator(f".above .{line}").get_attribute("d")


def test_any_place_in_the_turn_by_keys_and_by_touch(turn):
    set_typed(turn, pitch_deg="20", speed_mps="22")
    asked = question(pitch_deg=20, speed_mps=22 / 3.6)
    answer = snowhold.answer(asked)
    shows(turn, asked)
    place = turn.get_by_role("slider", name="Place in the turn")
    place.focus()
    place.press("Home")
    expect(place).to_have_attribute("aria-valuenow", "0")
    place.press("PageDown")
    place.press("ArrowRight")
    expect(place).to_have_attribute("aria-valuenow", "20")
    for name in ("lean_deg", "edge_angle_deg", "grip_margin"):
        shown = turn.locator(f".figures [data-answer='{name}.4']")
        assert plain(shown.inner_text()) == expected(answer, f"{name}.4")
    expect(turn.locator(".caption")).to_contain_text("At 20° of the turn, above the fall line")
    place.press("Escape")
    expect(turn.locator(".figures [data-answer='worst.lean_deg']")).to_have_count(1)

    box = place.bounding_box()
    assert box
    turn.touchscreen.tap(box["x"] + box["width"] * 0.95, box["y"] + box["height"] / 2)
    middle = int(place.get_attribute("aria-valuenow") or 0)
    assert 60 <= middle <= 120
    turn.get_by_role("button", name="Back to where the margin is least").tap()
    expect(turn.locator(".figures [data-answer='worst.lean_deg']")).to_have_count(1)


def test_a_drifted_turn_can_be_looked_at_everywhere(turn):
    """There the places are those of the turn on the drifted line."""
    set_typed(turn, pitch_deg="17", speed_mps="35")
    asked = question(pitch_deg=17, speed_mps=35 / 3.6)
    line_m = snowhold.answer(asked)["drift"]["line_radius_m"]
    wider = snowhold.answer(asked | {"line_radius_m": line_m})
    place = turn.get_by_role("slider", name="Place in the turn")
    expect(turn.locator(".figures [data-answer='drift.lean_deg']")).to_have_count(1)
    place.focus()
    place.press("Home")
    for _ in range(18):
        place.press("ArrowDown")
    shown = turn.locator(".figures [data-answer='lean_deg.18']")
    assert plain(shown.inner_text()) == expected(wider, "lean_deg.18")


def test_bad_entries_are_kept_and_explained(turn):
    set_typed(turn, speed_mps="200", pitch_deg="steep")
    expect(field(turn, "speed_mps")).to_have_value("200")
    expect(field(turn, "pitch_deg")).to_have_value("steep")
    errors = turn.locator(".error:visible")
    expect(errors).to_have_count(2)
    texts = [plain(text) for text in errors.all_inner_texts()]
    assert texts == ["Not a number. Allowed: 0 to 50°", "Allowed: 0 to 144 km/h"]
    for key in ("speed_mps", "pitch_deg"):
        expect(field(turn, key)).to_have_attribute("aria-invalid", "true")
    expect(turn.locator(".pictures[data-old]")).to_have_count(1)
    expect(turn.locator(".caption")).to_contain_text("Last answer")
    # The figures are still those of the last good question.
    expect(turn.locator("[data-answer=verdict]")).to_have_text("Holds")

    set_typed(turn, speed_mps="20", pitch_deg="16")
    expect(turn.locator(".error:visible")).to_have_count(0)
    settled(turn)
    shows(turn, question(pitch_deg=16))


def test_a_bad_entry_in_a_sheet_marks_its_button(turn):
    turn.get_by_role("button", name=re.compile("^Rider")).tap()
    set_typed(turn, rider_mass_kg="5")
    expect(turn.locator("#sheet-rider .error:visible")).to_have_text("Allowed: 15 to 200\u202fkg")
    turn.keyboard.press("Escape")
    expect(turn.locator(".dock-button[data-wrong]")).to_have_count(1)


def test_a_comma_is_a_decimal_point(turn):
    set_typed(turn, speed_mps="21,5")
    shows(turn, question(speed_mps=21.5 / 3.6))


def test_empty_means_none_where_that_is_allowed(turn):
    turn.get_by_role("button", name=re.compile("^Rider")).tap()
    set_typed(turn, drag_angle_deg="40")
    expect(turn.locator("[data-verdict=washes_out]")).to_have_count(1)
    set_typed(turn, drag_angle_deg="")
    expect(turn.locator("[data-verdict=holds]")).to_have_count(1)
    shows(turn, question())


def test_state_survives_a_closed_tab(turn, installed):
    context, url = installed
    set_typed(turn, pitch_deg="33", speed_mps="18", sidecut_radius_m="7.5")
    turn.get_by_role("button", name=re.compile("^Snow")).tap()
    turn.locator("input[type=radio][value=K]").check()
    turn.keyboard.press("Escape")
    turn.get_by_role("button", name=re.compile("^Settings")).tap()
    turn.get_by_role("radio", name="glare").check()
    turn.keyboard.press("Escape")
    asked = question(pitch_deg=33, speed_mps=5, sidecut_radius_m=7.5, snow="K")
    shows(turn, asked)
    turn.wait_for_timeout(500)
    turn.close(run_before_unload=True)

    again = context.new_page()
    again.goto(url)
    expect(field(again, "pitch_deg")).to_have_value("33")
    expect(again.locator("html")).to_have_attribute("data-look", "glare")
    wait_ready(again)
    settled(again)
    shows(again, asked)
    again.close()


def test_a_kept_state_of_another_version_does_no_harm(turn):
    turn.wait_for_timeout(1000)  # until the page has nothing left to write
    turn.evaluate("""() => new Promise((done) => {
        const open = indexedDB.open('keyval-store');
        open.onsuccess = () => {
            const write = open.result.transaction('keyval', 'readwrite');
            write.objectStore('keyval').put({ version: 1, state: {
                inputs: { pitch_deg: 21, speed_mps: [], gone: 3 }, look: {},
                answers: { turn: { question: {}, answer: { verdict: 'holds' } } },
            } }, 'snowhold-state');
            write.oncomplete = () => { open.result.close(); done(); };
        };
    })""")
    turn.reload()
    wait_ready(turn)
    settled(turn)
    shows(turn, question(pitch_deg=21))


def test_units_change_what_is_shown_and_not_what_is_asked(turn):
    set_typed(turn, pitch_deg="20", speed_mps="23.8")
    asked = question(pitch_deg=20, speed_mps=23.8 / 3.6)
    shows(turn, asked)
    turn.get_by_role("button", name=re.compile("^Settings")).tap()
    for name in ("mph", "percent", "feet, lb"):
        turn.get_by_role("radio", name=name).check()
    turn.get_by_role("button", name="Done").locator("visible=true").tap()
    expect(field(turn, "pitch_deg")).to_have_value("36.4")  # tan 20°
    expect(field(turn, "speed_mps")).to_have_value("14.8")
    expect(field(turn, "sidecut_radius_m")).to_have_value("26.2")
    expect(turn.get_by_role("button", name=re.compile("^Rider"))).to_contain_text("176\u202flb")
    shows(turn, asked, IMPERIAL)
    turn.get_by_role("button", name="Figures").tap()
    shows(turn, asked, IMPERIAL)
    turn.keyboard.press("Escape")

    nudge(turn, "Speed", "more").tap()
    expect(field(turn, "speed_mps")).to_have_value("15")
    shows(turn, asked | {"speed_mps": 15 * 1609.344 / 3600}, IMPERIAL)
    set_typed(turn, speed_mps="100")
    expect(turn.locator(".error:visible")).to_have_text(re.compile(r"0 to 89\.5\u202fmph"))


def test_undo_takes_back_each_change_and_a_drag_as_one(turn):
    undo = turn.get_by_role("button", name=re.compile("^(Undo|Nothing)"))
    expect(undo).to_have_attribute("aria-disabled", "true")
    nudge(turn, "Pitch", "more").tap()
    drag(turn, "speed_mps", 0.5)
    turn.get_by_role("button", name=re.compile("^Snow")).tap()
    turn.locator("input[type=radio][value='4F']").check()
    turn.keyboard.press("Escape")
    turn.get_by_role("button", name=re.compile("^Settings")).tap()
    turn.get_by_role("radio", name="m/s").check()
    turn.keyboard.press("Escape")

    undo.tap()
    expect(turn.locator(".number", has_text="Speed").locator(".unit")).to_have_text("km/h")
    undo.tap()
    expect(turn.get_by_role("button", name=re.compile("^Snow"))).to_contain_text("Pencil")
    undo.tap()
    expect(field(turn, "speed_mps")).to_have_value("20")
    undo.tap()
    expect(field(turn, "pitch_deg")).to_have_value("15")
    expect(undo).to_have_attribute("aria-disabled", "true")
    shows(turn, question())


def test_everything_by_keyboard(turn):
    slider(turn, "pitch_deg").focus()
    turn.keyboard.press("ArrowRight")
    expect(field(turn, "pitch_deg")).to_have_value("16")
    # From field to field in reading order, every control has the focus once.
    turn.locator(".caution").focus()
    seen = []
    for _ in range(40):
        seen.append(turn.evaluate("""() => {
            const at = document.activeElement;
            return at.getAttribute('aria-label') || at.textContent || at.dataset.question;
        }"""))
        turn.keyboard.press("Tab")
    order = [next(i for i, name in enumerate(seen) if wanted in name) for wanted in (
        "estimate", "Settings", "Place in the turn", "Pitch: less", "Pitch in", "Pitch: more",
        "Pitch, slider", "Speed: less", "Sidecut radius, slider", "Snow", "Rider", "Figures")]
    assert order == sorted(order)

    snow = turn.get_by_role("button", name=re.compile("^Snow"))
    snow.focus()
    turn.keyboard.press("Enter")
    expect(turn.locator("#sheet-snow")).to_be_visible()
    assert turn.evaluate("document.activeElement.closest('dialog').id") == "sheet-snow"
    turn.locator("input[type=radio][value=P]").focus()
    turn.keyboard.press("ArrowDown")
    turn.keyboard.press("Escape")
    expect(snow).to_be_focused()
    expect(snow).to_contain_text("Knife")
    shows(turn, question(pitch_deg=16, snow="K"))


def test_avalanche_terrain_is_pointed_out(turn):
    warning = turn.get_by_role("img", name="Warning")
    set_typed(turn, pitch_deg="29")
    settled(turn)
    expect(warning).to_have_count(0)
    short = turn.locator(".caution")
    expect(short).to_contain_text("Not patrol’s judgement, not an avalanche forecast")
    set_typed(turn, pitch_deg="30")
    expect(warning).to_be_visible()
    expect(short).to_contain_text("avalanche bulletin")
    short.tap()
    expect(turn.locator("#sheet-caution")).to_contain_text(
        "An estimate. It does not replace the judgement of patrol, an instructor or local rules. "
        "It says nothing about avalanche danger. Closed stays closed.")


def test_nothing_jumps_when_the_engine_is_ready(
        installed, new_context: Callable[..., BrowserContext]):
    """The last answer stands, marked, while the engine starts; then only its mark goes."""
    _, url = installed
    context = new_context(**PHONE, service_workers="block")
    page = context.new_page()
    open_turn(page, url)
    page.wait_for_timeout(500)
    page.close()

    held = []
    page = context.new_page()
    page.route(re.compile(r"/assets/engine-"), lambda route: held.append(route))
    page.goto(url)
    expect(page.locator("[data-answer=verdict]")).to_have_text("Holds")
    expect(page.locator("html")).to_have_attribute("data-engine", "starting")
    expect(page.locator(".caption")).to_contain_text("Last answer. Starting")
    parts = (".verdict-word", ".says", ".figures", ".pictures", ".scrub", ".number >> nth=0",
             ".number >> nth=2", ".dock")
    before = {part: page.locator(part).bounding_box() for part in parts}
    for route in held:
        route.continue_()
    wait_ready(page)
    settled(page)
    assert {part: page.locator(part).bounding_box() for part in parts} == before
    expect(page.locator(".caption")).to_contain_text("Least margin")


def test_a_first_start_keeps_its_places_too(installed, new_context: Callable[..., BrowserContext]):
    _, url = installed
    page = new_context(**PHONE, service_workers="block").new_page()
    held = []
    page.route(re.compile(r"/assets/engine-"), lambda route: held.append(route))
    page.goto(url)
    expect(page.locator(".verdict-word")).to_have_text("Will it hold?")
    parts = (".figures", ".pictures", ".number >> nth=0", ".dock")
    before = {part: page.locator(part).bounding_box() for part in parts}
    for route in held:
        route.continue_()
    open_now = page.locator("[data-answer=verdict]")
    expect(open_now).to_have_text("Holds", timeout=START_MS)
    assert {part: page.locator(part).bounding_box() for part in parts} == before


def test_an_engine_that_fails_says_so(installed, new_context: Callable[..., BrowserContext]):
    _, url = installed
    page = new_context(**PHONE, service_workers="block").new_page()
    page.route(re.compile(r"/assets/engine-"), lambda route: route.abort())
    page.goto(url)
    expect(page.locator("html")).to_have_attribute("data-engine", "failed", timeout=START_MS)
    expect(page.locator(".says")).to_contain_text("did not start")


def test_the_page_rests_when_nothing_changes(turn):
    """No timer, animation frame, layout or style work goes on behind a still picture."""
    session = turn.context.new_cdp_session(turn)
    session.send("Performance.enable")

    def work() -> dict[str, float]:
        metrics = session.send("Performance.getMetrics")["metrics"]
        return {one["name"]: one["value"] for one in metrics
                if one["name"] in ("LayoutCount", "RecalcStyleCount")}

    set_typed(turn, pitch_deg="17")
    settled(turn)
    for _ in range(15):
        before = work()
        turn.wait_for_timeout(1500)
        if work() == before:
            return
    raise AssertionError("the page does not come to rest")
