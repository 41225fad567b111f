"""Driving the Pitch view: opening it, setting its slope, reading figures against the engine."""

from __future__ import annotations

import base64
import json
import math
from collections.abc import Iterator
from decimal import ROUND_HALF_UP, Decimal
from pathlib import Path
from typing import Any

import pytest
from playwright.sync_api import Browser, BrowserContext, Locator, Page, expect

from conftest import PHONE, START_MS, Host, first_visit, wait_offline, wait_ready

OWN = ("speed_mps", "fall_at_m", "clothing_friction", "drag_area_m2", "altitude_m",
       "air_temperature_c", "braking_friction", "reaction_time_s", "sight_distance_m", "waist_m")
SHARED = ("snow", "rider_mass_kg", "angulation_deg", "max_load_g", "effective_edge_m",
          "drag_angle_deg")
BASE: dict[str, Any] = {
    "ask": "pitch", "speed_mps": 33 / 3.6, "fall_at_m": 0, "clothing_friction": None,
    "drag_area_m2": 0.5, "altitude_m": 1500, "air_temperature_c": None, "braking_friction": None,
    "reaction_time_s": None, "sight_distance_m": None, "waist_m": 0.25, "snow": "P",
    "rider_mass_kg": 80, "angulation_deg": 5, "max_load_g": 2, "effective_edge_m": 1.2,
    "drag_angle_deg": None,
}
DEMO = [{"pitch_deg": 32, "length_m": 60}, {"pitch_deg": 20, "length_m": 80},
        {"pitch_deg": 6, "length_m": 100}]
# Slopes whose slides end in every way that there is.
SLOPES: dict[str, dict[str, Any]] = {
    "demo": {"legs": DEMO},
    "steep_ice": {"legs": [{"pitch_deg": 42, "length_m": 180}], "snow": "I"},
    "flat": {"legs": [{"pitch_deg": 3, "length_m": 150}]},
    "level": {"legs": [{"pitch_deg": 0, "length_m": 100}], "speed_mps": 0},
    "stops": {"legs": [{"pitch_deg": 12, "length_m": 120}, {"pitch_deg": 2, "length_m": 80}],
              "speed_mps": 6, "sight_distance_m": 30},
    "back": {"legs": [{"pitch_deg": 30, "length_m": 40}, {"pitch_deg": -15, "length_m": 200}]},
    "ten": {"legs": [{"pitch_deg": pitch, "length_m": length} for pitch, length in (
        (8, 40), (22, 60), (35, 50), (28, 80), (12, 30), (38, 45), (18, 70), (5, 50), (-6, 30),
        (2, 60))], "fall_at_m": 60},
}


def question(**changes: Any) -> dict[str, Any]:
    return BASE | {"legs": DEMO} | changes


def fragment(asked: dict[str, Any], **changes: Any) -> str:
    """The link's fragment for a question: written here from the format's description."""
    legs = [[by, leg[by], leg["length_m"], leg.get("snow")] for leg in asked["legs"]
            for by in ("pitch_deg", "percent", "drop_m") if by in leg]
    content = {"v": 1, "name": "", "demo": False, "legs": legs,
               "own": [asked[key] for key in OWN], "shared": [asked[key] for key in SHARED]}
    return coded(json.dumps(content | changes))


def coded(text: str) -> str:
    return "#pitch=" + base64.urlsafe_b64encode(text.encode()).decode().rstrip("=")


def open_pitch(page: Page, url: str) -> None:
    page.goto(url)
    wait_ready(page)
    page.get_by_role("button", name="Pitch", exact=True).click()
    settled(page)


def set_slope(page: Page, name: str) -> dict[str, Any]:
    """Bring one of SLOPES into the open page by a link; gives its question."""
    asked = question(**SLOPES[name])
    page.evaluate("(hash) => { location.hash = hash; }", fragment(asked))
    expect(page.get_by_text("Opened from a link")).to_be_visible()
    settled(page)
    return asked


def settled(page: Page) -> None:
    """Until what is shown is the answer to what is set."""
    expect(page.locator(".pitch-view .pictures:not([data-old]):not([data-empty])")).to_have_count(
        1, timeout=START_MS)
    page.wait_for_timeout(150)


def field(page: Page, key: str) -> Locator:
    return page.locator(f'input[type=text][data-question="{key}"]').locator("visible=true")


def set_typed(page: Page, **values: str) -> None:
    for key, text in values.items():
        one = field(page, key.replace("__", "."))
        one.fill(text)
        one.press("Enter")


def at(answer: Any, key: str) -> Any:
    """The value under a key with dots; None where there is none (the answer before had one)."""
    for part in key.split("."):
        if isinstance(answer, list):
            answer = answer[int(part)] if int(part) < len(answer) else None
        else:
            answer = None if answer is None else answer[part]
    return answer


def readings(answer: dict[str, Any], key: str) -> set[str]:
    """How the figure under a key may be written, without its unit: rounded, or outward."""
    value = at(answer, key)
    if key.endswith("limit"):
        return {"platform", "snow", "boot drag", "legs"} if value else {"–"}
    if value is None:
        return {"–", "does not stop", "no stop", "not up to 50°", "or no stop", "none"}
    if "grip_margin" in key:
        factor = 100.0
    elif "mps" in key:
        factor = 3.6
    else:
        factor = 1.0
    number = value * factor
    low, high = math.floor(number), math.ceil(number)
    near = int(Decimal(number).quantize(Decimal(1), ROUND_HALF_UP))
    found = {f"{n}" for n in (low, near, high)}
    return {text.replace("-", "−") for text in found} | {f"+{n}" for n in found}


def wrong_figures(page: Page, answer: dict[str, Any]) -> tuple[int, list[str]]:
    """Figures in sight, and those whose numbers are none of their key's readings."""
    found = page.evaluate("""() => [...document.querySelectorAll('[data-answer]')]
        .filter((node) => node.checkVisibility() && node.textContent)
        .filter((node) => !node.hasAttribute('hidden'))
        .filter((node) => !document.querySelector('dialog[open]') || node.closest('dialog[open]'))
        .map((node) => [node.dataset.answer, node.textContent])""")
    wrong = []
    for key, text in found:
        allowed = readings(answer, key)
        plain = text.replace("\u202f", " ")
        words = plain.replace("°", "").replace("–", " ").replace(",", " ").split()
        if not (plain in allowed or any(word in allowed for word in words)):
            wrong.append(f"{key}: {text!r}, not {sorted(allowed)}")
    return len(found), wrong


def shows(page: Page, asked: dict[str, Any], answer: dict[str, Any]) -> int:
    """Wait until every figure in sight is the engine's answer; gives how many there are."""
    for _ in range(50):
        count, wrong = wrong_figures(page, answer)
        if count and not wrong:
            return count
        page.wait_for_timeout(100)
    raise AssertionError((asked, wrong))


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
    with first_visit(context, url) as page:
        said: list[str] = []
        # The manifest, on which a first visit starts here, has no icon of its own as a page.
        page.on("console", lambda one: said.append(one.text) if one.type == "error"
                and not one.location["url"].endswith("/favicon.ico") else None)
        open_pitch(page, url)
        yield page
        assert said == [], said
