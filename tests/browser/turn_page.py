"""Driving the Turn view: opening it, setting inputs, checking figures against the engine."""

from __future__ import annotations

from decimal import ROUND_CEILING, ROUND_FLOOR, ROUND_HALF_UP, Decimal
from typing import Any

from playwright.sync_api import Locator, Page, expect

import snowhold
from conftest import START_MS, wait_ready

START = {
    "ask": "turn", "pitch_deg": 15, "speed_mps": 20 / 3.6, "sidecut_radius_m": 8, "snow": "P",
    "rider_mass_kg": 80, "angulation_deg": 5, "max_load_g": 2, "effective_edge_m": 1.2,
    "samples": 0, "suggest": False,
}
"""What a first visit asks."""

VERDICTS = {"holds": "Holds", "marginal": "Marginal", "washes_out": "Washes out",
            "too_slow": "Too slow to carve", "too_fast": "Too fast to carve"}

KMH, MPH, FT, LB = 3.6, 3600 / 1609.344, 1 / 0.3048, 1 / 0.45359237
# Last part of an answer's key: factor from the engine's unit, decimals, symbol, by the settings.
METRIC = {
    "lean_deg": (1, 0, "°"), "edge_angle_deg": (1, 0, "°"), "phase_deg": (1, 0, "°"),
    "grip_margin": (100, 0, " %"), "load_g": (1, 2, " g"), "turn_radius_m": (1, 1, " m"),
    "line_radius_m": (1, 1, " m"), "penetration_m": (1000, 1, " mm"),
    "min": (KMH, 1, " km/h"), "max": (KMH, 1, " km/h"),
}
IMPERIAL = METRIC | {
    "turn_radius_m": (FT, 0, " ft"), "line_radius_m": (FT, 0, " ft"),
    "penetration_m": (1 / 0.0254, 2, " in"), "min": (MPH, 1, " mph"), "max": (MPH, 1, " mph"),
}


def question(**changes: Any) -> dict[str, Any]:
    return START | changes


def expected(answer: dict[str, Any], key: str, units: dict[str, Any] = METRIC) -> str:
    """The figure under a dotted key as the page should write it."""
    value: Any = answer
    for part in key.split("."):
        value = None if value is None else value[int(part) if isinstance(value, list) else part]
    if key == "verdict":
        return VERDICTS[value]
    if value is None:
        return "–"
    name = name_of(key)
    factor, decimals, symbol = units[name]
    # ECMA-402 rounds halves away from zero; margins are shown no better, and the tightest line no
    # tighter, than they are, what is off by rounding alone apart.
    mode, slack = {"grip_margin": (ROUND_FLOOR, 1e-6), "line_radius_m": (ROUND_CEILING, -1e-6)}.get(
        name, (ROUND_HALF_UP, 0.0))
    number = Decimal(value * factor + slack * 10**-decimals).quantize(
        Decimal(1).scaleb(-decimals), mode)
    sign = "+" if name == "grip_margin" and number > 0 else ""
    text = f"{sign}{number}" if number else f"{abs(number)}"
    return text.replace("-", "−") + symbol


def name_of(key: str) -> str:
    """Last part of a dotted key that is a name."""
    return next(part for part in reversed(key.split(".")) if not part.isdigit())


def plain(text: str) -> str:
    """Spaces of every width as one kind."""
    return text.replace("\u202f", " ").replace("\u00a0", " ").strip()


def open_turn(page: Page, url: str) -> None:
    page.goto(url)
    wait_ready(page)
    expect(page.locator("[data-verdict]:not([data-verdict=none])")).to_have_count(
        1, timeout=START_MS)
    settled(page)


def settled(page: Page) -> None:
    """Until what is shown is the answer to what is set."""
    expect(page.locator(".pictures:not([data-old])")).to_have_count(1, timeout=START_MS)


def field(page: Page, key: str) -> Locator:
    return page.locator(f"input[type=text][data-question={key}]")


def slider(page: Page, key: str) -> Locator:
    return page.locator(f"input[type=range][data-question={key}]")


def set_typed(page: Page, **values: str) -> None:
    for key, text in values.items():
        field(page, key).fill(text)
        field(page, key).press("Enter")


def nudge(page: Page, name: str, direction: str) -> Locator:
    return page.get_by_role("button", name=f"{name}: {direction}", exact=True)


def shows(page: Page, asked: dict[str, Any], units: dict[str, Any] = METRIC) -> int:
    """Wait until the turn's figures in sight are the engine's answer; gives how many there are.

    Chances and what to change have tests of their own. A speed may stand without its unit beside
    the input that has it.
    """
    answer = snowhold.answer(asked)

    def wrong() -> list[str]:
        found = page.evaluate("""() => [...document.querySelectorAll('[data-answer]')]
            .filter((node) => node.checkVisibility())
            .map((node) => [node.dataset.answer, node.textContent])""")
        found = [(key, text) for key, text in found if key == "verdict" or name_of(key) in units]
        figures.extend(found)
        return [f"{key}: {text}, not {expected(answer, key, units)}" for key, text in found
                if plain(text) not in (expected(answer, key, units),
                                       expected(answer, key, units).split(" ")[0]
                                       if key.startswith("carve_speed") else None)]

    for _ in range(50):
        figures: list[Any] = []
        faults = wrong()
        if not faults and figures:
            return len(figures)
        page.wait_for_timeout(100)
    raise AssertionError(faults)


def drag(page: Page, key: str, share: float) -> None:
    """Drag a slider's knob with a finger to a share of its way, in ten steps."""
    knob = slider(page, key)
    knob.scroll_into_view_if_needed()
    box = knob.bounding_box()
    assert box
    half = 12  # half a knob: the track ends there
    low, high = (float(knob.get_attribute(end) or 0) for end in ("min", "max"))
    now = (float(knob.input_value()) - low) / (high - low)
    start, end = (box["x"] + half + part * (box["width"] - 2 * half) for part in (now, share))
    y = box["y"] + 20
    finger = page.context.new_cdp_session(page)

    def touch(kind: str, x: float | None) -> None:
        points = [] if x is None else [{"x": x, "y": y}]
        finger.send("Input.dispatchTouchEvent", {"type": kind, "touchPoints": points})

    touch("touchStart", start)
    for step in range(1, 11):
        touch("touchMove", start + (end - start) * step / 10)
    touch("touchEnd", None)

