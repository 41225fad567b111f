"""The Pitch view for hands and eyes: axe-core, targets, large text, narrow screens."""

# ruff: noqa: F811 (fixtures are imported by name)

from __future__ import annotations

import pytest
from axe import LOOKS, look_like, violations
from pitch_page import field, installed, pitch, set_slope, set_typed  # noqa: F401
from playwright.sync_api import expect

from conftest import PHONE, START_MS

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
                ['', ' .sheet-body', ' .card-scroll', ' .card-tools']
                    .map((part) => `dialog[open]${part}`).join())]
                .map((node) => node.scrollWidth - node.clientWidth))""")
        if percent == 100:
            small += pitch.evaluate("""() => [...document.querySelectorAll(
                    'button, input:not([type=radio]), label:has(input), [role=slider], summary')]
                .filter((node) => node.checkVisibility() && !node.matches('.field'))
                .map((node) => [node, node.getBoundingClientRect()])
                .filter(([, box]) => box.width < 48 || box.height < 48)
                .map(([node, box]) =>
                    `${node.className} ${node.textContent} ${box.width}x${box.height}`)""")
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
        new MutationObserver(() => window.said.push(live.textContent))
            .observe(live, { childList: true });
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
