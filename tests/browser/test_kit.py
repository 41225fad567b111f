"""Riders and boards that are kept: saved, edited, copied, deleted, undone; after closing, too."""

from __future__ import annotations

from collections.abc import Callable, Iterator

import pytest
from board_page import (
    PISTE,
    board_question,
    dock,
    done,
    field,
    open_board,
    set_typed,
    settled,
)
from playwright.sync_api import BrowserContext, Locator, Page, expect

import snowhold
from conftest import PHONE, Host


@pytest.fixture
def board(host: Host, new_context: Callable[..., BrowserContext]) -> Iterator[Page]:
    page = new_context(**PHONE).new_page()
    errors: list[str] = []
    page.on("pageerror", lambda error: errors.append(str(error)))
    open_board(page, host.url)
    yield page
    assert errors == []


def kit(page: Page) -> Locator:
    page.locator(".board-open").tap()
    return page.get_by_role("list", name="Boards kept here")


def names(rows: Locator) -> list[str]:
    return rows.locator(".kit-name").all_inner_texts()


def closed_and_opened(page: Page, url: str) -> Page:
    page.wait_for_timeout(300)
    page.close()
    again = page.context.new_page()
    again.goto(url)
    settled(again)
    return again


def test_the_first_boards_and_riders_are_marked_as_invented(board):
    rows = kit(board)
    assert rows.get_by_role("listitem").count() == 4
    for text in rows.locator(".kit-detail").all_inner_texts():
        assert "invented" in text
    done(board)
    dock(board, "Rider")
    riders = board.get_by_role("list", name="Riders kept here")
    for text in riders.locator(".kit-detail").all_inner_texts():
        assert "invented" in text


def test_save_edit_copy_delete_undo_and_close(board, host):
    set_typed(board, waist_m="25.6")
    board.locator(".board-title").get_by_role("button", name="Save").tap()
    rows = kit(board)
    mine = "All-round 155, changed"
    assert names(rows)[-1] == mine
    # The invented one stays as it was.
    expect(rows.get_by_role("listitem").first).to_contain_text("waist 25.3")
    board.get_by_role("textbox", name="Name").fill("Mine")
    board.locator("#sheet-boards").get_by_role("button", name="Save").tap()
    assert names(rows)[-1] == "Mine"
    done(board)

    # Edited: what is kept follows on saving only.
    set_typed(board, waist_m="25.8")
    rows = kit(board)
    expect(board.locator("#sheet-boards")).to_contain_text("Not saved yet.")
    expect(rows.get_by_role("listitem").last).to_contain_text("waist 25.6")
    board.locator("#sheet-boards").get_by_role("button", name="Save").tap()
    expect(rows.get_by_role("listitem").last).to_contain_text("waist 25.8")

    rows.get_by_role("button", name="Copy: Mine").tap()
    assert names(rows)[-2:] == ["Mine", "Mine, copy"]
    rows.get_by_role("button", name="Delete: Short 142").tap()
    rows.get_by_role("button", name="Delete: Mine", exact=True).tap()
    assert names(rows) == ["All-round 155", "Piste 160", "Wide 158", "Mine, copy"]

    board = closed_and_opened(board, host.url)
    rows = kit(board)
    assert names(rows) == ["All-round 155", "Piste 160", "Wide 158", "Mine, copy"]
    rows.get_by_role("button", name="Delete: Wide 158").tap()
    assert "Wide 158" not in names(rows)
    board.locator("#sheet-boards").get_by_role("button", name="Undo").tap()
    assert names(rows) == ["All-round 155", "Piste 160", "Wide 158", "Mine, copy"]
    rows.get_by_role("button", name="Mine, copy", exact=False).first.tap()
    expect(board.locator("dialog[open]")).to_have_count(0)
    expect(field(board, "waist_m")).to_have_value("25.8")


def test_undo_of_a_change_to_the_measures(board):
    set_typed(board, waist_m="25.9")
    settled(board)
    board.locator(".board-dock").get_by_role("button", name="Undo").tap()
    expect(field(board, "waist_m")).to_have_value("25.3")


def test_a_kept_board_is_one_tap_from_turn(board):
    rows = kit(board)
    rows.get_by_role("button", name="Ride it in Turn: Piste 160").tap()
    expect(board.locator(".turn-view")).to_be_visible()
    answer = snowhold.answer(board_question(PISTE))
    assert float(field(board, "sidecut_radius_m").input_value()) == pytest.approx(
        answer["sidecut_radius_m"], abs=0.005)


def test_every_board_can_be_deleted(board):
    rows = kit(board)
    for _ in range(4):
        rows.get_by_role("button", name="Delete").first.tap()
    assert names(rows) == []
    done(board)
    # The open board is still there, saved again if wanted.
    settled(board)
    expect(field(board, "waist_m")).to_have_value("25.3")
    dock(board, "Compare")
    expect(board.locator(".compare-result")).to_be_hidden()
    done(board)
    board.locator(".board-title").get_by_role("button", name="Save").tap()
    assert len(names(kit(board))) == 1


def test_a_rider_is_kept_with_boots_and_pitches(board, host):
    dock(board, "Boots")
    set_typed(board, boot_sole_length_m="28")
    done(board)
    dock(board, "Rider")
    set_typed(board, rider_mass_kg="66", pitch_high_deg="24", usual_speed_mps="38")
    sheet = board.locator("#sheet-board-rider")
    sheet.get_by_role("textbox", name="Name").fill("Me")
    sheet.get_by_role("button", name="Save").tap()
    riders = board.get_by_role("list", name="Riders kept here")
    assert riders.locator(".kit-name").all_inner_texts()[-1] == "Me"
    riders.get_by_role("button", name="Rider B").first.tap()
    expect(field(board, "rider_mass_kg")).to_have_value("58")
    expect(sheet.get_by_role("radio", name="beginners")).to_be_checked()

    board.keyboard.press("Escape")
    board = closed_and_opened(board, host.url)
    dock(board, "Rider")
    expect(field(board, "rider_mass_kg")).to_have_value("58")
    board.locator("#sheet-board-rider .kit-open", has_text="Me").tap()
    expect(field(board, "rider_mass_kg")).to_have_value("66")
    expect(field(board, "pitch_high_deg")).to_have_value("24")
    expect(field(board, "usual_speed_mps")).to_have_value("38")
    done(board)
    dock(board, "Boots")
    expect(field(board, "boot.sole_length_m")).to_have_value("28")
