"""The card and the link of a pitch: kept, printed, drawn, handed on, and refused where hostile."""

# ruff: noqa: F811 (fixtures are imported by name)

from __future__ import annotations

import re
import struct
import subprocess
import zlib

import pytest
from pitch_page import (  # noqa: F401
    DEMO,
    coded,
    field,
    fragment,
    installed,
    pitch,
    question,
    set_slope,
    set_typed,
    settled,
    shows,
)
from playwright.sync_api import expect

import snowhold
from conftest import PHONE, wait_ready


def test_state_survives_a_closed_tab_and_works_offline(pitch, installed):
    context, url, host = installed
    asked = set_slope(pitch, "stops")
    pitch.wait_for_timeout(500)
    with pitch.expect_event("close"):
        pitch.close(run_before_unload=True)
    host.stop()
    try:
        again = context.new_page()
        again.goto(url)
        wait_ready(again)
        tab = again.get_by_role("button", name="Pitch", exact=True)
        expect(tab).to_have_attribute("aria-current", "page")
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
    magic, _, _, pixels = grey.split(b"\n", 3)
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
        "a huge number": fragment(good, legs=[["pitch_deg", 1e300, 5, None]]),
        "no number": fragment(good, legs=[["pitch_deg", None, 5, None]]),
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
    alert = pitch.get_by_role("alert").filter(has_text="holds no pitch that Snowhold can read")
    expect(alert).to_be_visible()
    asked = question(legs=[{"pitch_deg": 31, "length_m": 60}, *DEMO[1:]])
    settled(pitch)
    shows(pitch, asked, snowhold.answer(asked))


def test_a_link_with_figures_out_of_range_shows_the_engines_errors(pitch):
    asked = question(legs=[{"pitch_deg": 75, "length_m": 60}])
    pitch.evaluate("(hash) => { location.hash = hash; }", fragment(asked))
    expect(field(pitch, "legs[0].pitch_deg")).to_have_value("75")
    expect(pitch.locator(".pitch-view .error:visible")).to_have_text("Allowed: −20 to 50°")
