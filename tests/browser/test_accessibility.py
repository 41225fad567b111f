"""Hands and eyes: axe-core, targets, large text, narrow screens, what a screen reader hears."""

from __future__ import annotations

import re
from collections.abc import Iterator

import pytest
from axe import LOOKS, look_like, violations
from playwright.sync_api import Browser, Page, expect
from turn_page import drag, open_turn, set_typed, settled

from conftest import PHONE, Host

SHEETS = {"snow": re.compile("^Snow"), "rider": re.compile("^Rider"), "figures": "Figures",
          "settings": re.compile("^Settings"), "caution": re.compile("estimate|avalanche")}
# Pitch and speed (km/h) of a turn in each verdict, on firm snow with the usual rider.
VERDICTS = {"holds": ("12", "20"), "washes_out": ("20", "25"), "too_fast": ("17", "35"),
            "too_slow": ("32", "14")}


@pytest.fixture(scope="module")
def turn(browser: Browser, site) -> Iterator[Page]:
    """One Turn view for all these tests; each leaves it as it likes."""
    host = Host(site)
    context = browser.new_context(**PHONE)
    page = context.new_page()
    open_turn(page, host.url)
    yield page
    context.close()
    host.stop()


@pytest.mark.parametrize("look", LOOKS)
@pytest.mark.parametrize("verdict", VERDICTS)
def test_axe_finds_nothing_on_the_page(turn, look, verdict):
    look_like(turn, look)
    pitch, speed = VERDICTS[verdict]
    set_typed(turn, pitch_deg=pitch, speed_mps=speed)
    expect(turn.locator(f"[data-verdict={verdict}]")).to_have_count(1)
    enhanced = ("color-contrast-enhanced",) if look == "glare" else ()
    assert violations(turn, *enhanced) == []


@pytest.mark.parametrize("look", LOOKS)
@pytest.mark.parametrize("sheet", SHEETS)
def test_axe_finds_nothing_in_a_sheet(turn, look, sheet):
    look_like(turn, look)
    set_typed(turn, pitch_deg="20", speed_mps="25")
    turn.get_by_role("button", name=SHEETS[sheet]).click()
    expect(turn.locator(f"#sheet-{sheet}")).to_be_visible()
    enhanced = ("color-contrast-enhanced",) if look == "glare" else ()
    found = violations(turn, *enhanced)
    turn.keyboard.press("Escape")
    assert found == []


@pytest.mark.parametrize("look", LOOKS)
def test_axe_finds_nothing_where_entries_are_wrong(turn, look):
    look_like(turn, look)
    set_typed(turn, pitch_deg="95", speed_mps="quick")
    expect(turn.locator(".error:visible")).to_have_count(2)
    found = violations(turn)
    set_typed(turn, pitch_deg="15", speed_mps="20")
    settled(turn)
    assert found == []


SMALL_TARGETS = """() => [...document.querySelectorAll(
        'button, input:not([type=radio]), label:has(input), [role=slider]')]
    .filter((node) => node.checkVisibility() && !node.matches('[type=text]'))
    .map((node) => [node, node.getBoundingClientRect()])
    .filter(([, box]) => box.width < 48 || box.height < 48)
    .map(([node, box]) => `${node.className} ${box.width}x${box.height}`)"""


@pytest.mark.parametrize("size", [(320, 568), (360, 640), (412, 915), (640, 360), (915, 412)],
                         ids=lambda size: f"{size[0]}x{size[1]}")
def test_targets_are_made_for_gloves(turn, size):
    turn.set_viewport_size({"width": size[0], "height": size[1]})
    assert turn.evaluate(SMALL_TARGETS) == []
    for name in SHEETS.values():
        turn.get_by_role("button", name=name).click()
        small = turn.evaluate(SMALL_TARGETS)
        turn.keyboard.press("Escape")
        assert small == []
    turn.set_viewport_size(PHONE["viewport"])


@pytest.mark.parametrize("percent", [100, 200])
@pytest.mark.parametrize("look", LOOKS)
@pytest.mark.parametrize("size", [(320, 568), (360, 640), (568, 320), (640, 360), (1280, 800)],
                         ids=lambda size: f"{size[0]}x{size[1]}")
def test_nothing_needs_sideways_scrolling(turn, size, look, percent):
    look_like(turn, look)
    set_typed(turn, pitch_deg="18.5", speed_mps="123.4")
    turn.set_viewport_size({"width": size[0], "height": size[1]})
    turn.evaluate("(size) => { document.documentElement.style.fontSize = size; }", f"{percent}%")
    wide = [turn.evaluate("document.documentElement.scrollWidth")]
    for name in SHEETS.values():
        turn.get_by_role("button", name=name).click()
        wide.append(turn.evaluate("""() => {
            const sheet = document.querySelector('dialog[open]');
            const body = sheet.querySelector('.sheet-body');
            return Math.max(sheet.scrollWidth, body.scrollWidth - body.clientWidth + size);
        }""".replace("size", str(size[0]))))
        turn.keyboard.press("Escape")
    # No text of a control is cut off, either.
    cut = turn.evaluate("""() => [
        ...document.querySelectorAll('.field, .verdict-word, dd, label, .unit')]
        .filter((node) => node.checkVisibility() && node.scrollWidth > node.clientWidth + 1
            && getComputedStyle(node).display !== 'inline')
        .map((node) => `${node.className} ${node.textContent}`)""")
    turn.evaluate("document.documentElement.style.fontSize = ''")
    turn.set_viewport_size(PHONE["viewport"])
    assert max(wide) <= size[0]
    assert cut == []


@pytest.mark.parametrize("size", [(360, 640), (412, 915), (915, 412), (640, 360)],
                         ids=lambda size: f"{size[0]}x{size[1]}")
def test_the_answer_is_there_without_scrolling(turn, size):
    turn.set_viewport_size({"width": size[0], "height": size[1]})
    turn.evaluate("scrollTo(0, 0)")
    # The way between the views covers the foot of a high screen.
    nav = turn.locator("nav").bounding_box() if turn.locator("nav").is_visible() else None
    foot = nav["y"] if nav and nav["y"] > 0 else size[1]
    for part in (".verdict-word", ".says", ".figures", ".section", ".scrub"):
        box = turn.locator(part).bounding_box()
        assert box and box["y"] >= 0 and box["y"] + box["height"] <= foot, part
    for part in (".number >> nth=0", ".number >> nth=1", ".number >> nth=2"):
        box = turn.locator(part).bounding_box()
        assert box and box["y"] + 16 <= foot, part
    turn.set_viewport_size(PHONE["viewport"])


def test_the_verdict_is_said_once_when_it_has_settled(turn):
    set_typed(turn, pitch_deg="15", speed_mps="20")
    settled(turn)
    turn.wait_for_timeout(1500)
    turn.evaluate("""() => {
        window.said = [];
        new MutationObserver(() => window.said.push(
            document.querySelector('.verdict [aria-live]').textContent))
            .observe(document.querySelector('.verdict [aria-live]'), { childList: true });
    }""")
    drag(turn, "speed_mps", 0.45)
    turn.wait_for_timeout(2000)
    said = turn.evaluate("window.said")
    assert len(said) == 1
    word = turn.locator("[data-answer=verdict]").inner_text()
    assert said[0].startswith(f"{word}. ")


def test_the_pictures_have_words(turn):
    set_typed(turn, pitch_deg="20", speed_mps="25")
    expect(turn.locator("[data-verdict=washes_out]")).to_have_count(1)
    section = turn.get_by_role("img", name="The hill in section")
    name = section.get_attribute("aria-label") or ""
    for figure in turn.locator(".figures dd").all_inner_texts():
        assert figure in name
    place = turn.get_by_role("slider", name="Place in the turn")
    text = place.get_attribute("aria-valuetext") or ""
    assert "below the fall line: washes out, grip margin" in text


def test_motion_only_where_the_picture_follows(turn):
    moving = turn.evaluate("""() => [...document.querySelectorAll('*')].filter((node) => {
        const style = getComputedStyle(node);
        return style.animationName !== 'none' || style.transitionDuration !== '0s';
    }).length""")
    assert moving == 0
