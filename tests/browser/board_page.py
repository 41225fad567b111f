"""Driving the Board view: opening, setting inputs, reading figures against the engine's answer."""

from __future__ import annotations

from decimal import ROUND_FLOOR, ROUND_HALF_UP, Decimal
from typing import Any

from playwright.sync_api import Locator, Page, expect

import snowhold
from conftest import START_MS, wait_arrays, wait_ready

BOARD = {"nose_m": 0.297, "waist_m": 0.253, "tail_m": 0.295, "effective_edge_m": 1.17,
         "stiffness_nm2": 170, "camber_m": 0.003, "stance_width_m": 0.52}
PISTE = {"nose_m": 0.292, "waist_m": 0.25, "tail_m": 0.288, "effective_edge_m": 1.22,
         "stiffness_nm2": 200, "camber_m": 0.003, "stance_width_m": 0.53}
SHORT = {"nose_m": 0.272, "waist_m": 0.233, "tail_m": 0.27, "effective_edge_m": 1.04,
         "stiffness_nm2": 90, "camber_m": 0.003, "stance_width_m": 0.48}
BOOT = {"sole_length_m": 0.3, "sole_width_m": 0.1, "front_angle_deg": 15, "rear_angle_deg": -6,
        "front_toeward_m": 0, "rear_toeward_m": 0, "toe_height_m": 0.05, "heel_height_m": 0.045}
RIDER = {"rider_mass_kg": 80, "angulation_deg": 5, "max_load_g": 2, "snow": "P", "boot": BOOT}
"""What a first visit holds: the invented boards and the invented rider."""

VERDICTS = {"suits": "Suits", "small": "On the small side", "big": "On the big side"}
SHORT_VERDICTS = {"suits": "suits", "small": "small", "big": "big"}

# Last part of an answer's key: ways in which the page may write it, as factor, decimals, symbol.
KMH = 3.6
WRITTEN = {
    "sidecut_radius_m": [(1, 1, " m")], "sidecut_spread_m": [(1, 1, " m")],
    "turn_radius_m": [(1, 1, " m")], "hard_snow_radius_m": [(1, 1, " m")],
    "front": [(1, 1, " m")], "middle": [(1, 1, " m")], "rear": [(1, 1, " m")],
    "hard_snow": [(1, 1, " m")], "bent": [(1, 1, " m")],
    "toe": [(1, 0, "°")], "heel": [(1, 0, "°")], "drag_angle_deg": [(1, 0, "°")],
    "overhang_m": [(1000, 0, " mm")], "clear_waist_m": [(100, 1, " cm")],
    "contact_length_m": [(100, 0, " cm")], "max_depth_m": [(1000, 1, " mm")],
    "min": [(KMH, 0, ""), (KMH, 1, "")], "max": [(KMH, 0, " km/h"), (KMH, 1, "")],
    "chance_holds": [(100, 0, " %")],
    "stiffness_nm2": [(1, 0, " N·m²")], "low_nm2": [(1, 0, " N·m²")], "high_nm2": [(1, 0, " N·m²")],
}


def boards_question(*boards: dict[str, Any], **changes: Any) -> dict[str, Any]:
    return {"ask": "boards", "boards": list(boards), **RIDER, "pitch_low_deg": 10,
            "pitch_high_deg": 20, "usual_level": "snowboarders", "usual_line_radius_m": 12,
            **changes}


def board_question(board: dict[str, Any], **changes: Any) -> dict[str, Any]:
    return {"ask": "board", **board, **RIDER, "edge_angle_deg": 45, "pitch_deg": 15,
            "speed_mps": 33 / 3.6, "line_radius_m": 12, **changes}


def ways(value: Any, key: str) -> list[str]:
    """How the page may write a figure."""
    if value is None:
        return ["–"]
    if isinstance(value, str):
        return [VERDICTS[value], SHORT_VERDICTS[value]]
    texts = []
    for factor, decimals, symbol in WRITTEN[key.split(".")[-1]]:
        # ECMA-402 rounds halves away from zero; a chance is shown no better than it is.
        safe = key.endswith("chance_holds")
        number = Decimal(value * factor + (1e-6 if safe else 0)).quantize(
            Decimal(1).scaleb(-decimals), ROUND_FLOOR if safe else ROUND_HALF_UP)
        sign = "+" if key.endswith("overhang_m") and number > 0 else ""
        texts.append((f"{sign}{number}" if number else f"{abs(number)}").replace("-", "−") + symbol)
    return texts


def value_at(answer: Any, key: str) -> Any:
    for part in key.split("."):
        answer = None if answer is None else answer[int(part) if isinstance(answer, list) else part]
    return answer


def plain(text: str) -> str:
    """Spaces of every width as one kind."""
    return text.replace("\u202f", " ").replace("\u00a0", " ").strip()


def open_board(page: Page, url: str) -> None:
    page.goto(url)
    wait_ready(page)
    page.get_by_role("button", name="Board", exact=True).tap()
    wait_arrays(page)
    settled(page)


def settled(page: Page) -> None:
    """Until what is shown is the answer to what is set."""
    expect(page.locator(".board-view .verdict:not([data-verdict=none]):not([data-old])")
           ).to_have_count(1, timeout=START_MS)


def field(page: Page, key: str) -> Locator:
    """The field in sight for a key of the question."""
    return page.locator(f'input[type=text][data-question="{key}"]').locator("visible=true")


def set_typed(page: Page, **values: str) -> None:
    for key, text in values.items():
        name = key.replace("boot_", "boot.")
        field(page, name).fill(text)
        field(page, name).press("Enter")


def dock(page: Page, name: str) -> None:
    page.locator(".board-dock").get_by_role("button", name=name).tap()
    expect(page.locator("dialog[open]")).to_have_count(1)


def done(page: Page) -> None:
    page.get_by_role("button", name="Done").locator("visible=true").tap()


def shows(page: Page, board: dict[str, Any], boards: dict[str, Any]) -> set[str]:
    """Wait until every figure in sight is the engine's answer; gives their keys."""
    told, compared = snowhold.answer(board), snowhold.answer(boards)
    assert "error" not in told and "error" not in compared

    def wrong() -> list[str]:
        found = page.evaluate("""() => [...document.querySelectorAll(
                'dialog[open] [data-answer], .board-view [data-answer]')]
            .filter((node) => node.checkVisibility())
            .map((node) => [node.dataset.answer, node.textContent])""")
        keys.update(key for key, _ in found)
        faults = []
        for key, text in found:
            value = value_at(compared if key.startswith("boards.") else told, key)
            if key.endswith("mass_range_kg"):
                continue
            if plain(text) not in ways(value, key):
                faults.append(f"{key}: {text}, not {ways(value, key)}")
        return faults

    for _ in range(100):
        keys: set[str] = set()
        faults = wrong()
        if not faults and keys:
            return keys
        page.wait_for_timeout(100)
    raise AssertionError(faults)
