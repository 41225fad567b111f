"""Will this board suit this rider: measures to verdict, boots, bend, boards side by side."""

from __future__ import annotations

import math
import re
from collections.abc import Iterator
from typing import Any

import pytest
from axe import LOOKS, look_like, violations
from board_page import (
    BOARD,
    BOOT,
    PISTE,
    SHORT,
    board_question,
    boards_question,
    dock,
    done,
    field,
    open_board,
    plain,
    set_typed,
    settled,
    shows,
    value_at,
)
from playwright.sync_api import Browser, BrowserContext, Page, expect

import snowhold
from conftest import PHONE, Host, first_visit, wait_ready

SHEETS = {"boots": "Boots", "bend": "Stiffness", "measure": "Measures", "compare": "Compare",
          "board-rider": "Rider", "board-snow": "Snow"}


@pytest.fixture(scope="module")
def installed(browser: Browser, site) -> Iterator[tuple[BrowserContext, str]]:
    """A phone that has the app, and its address: later tests start from its cache."""
    host = Host(site)
    context = browser.new_context(**PHONE)
    page = context.new_page()
    page.goto(host.url)
    wait_ready(page)
    page.evaluate("navigator.serviceWorker.ready.then(() => true)")
    page.close()
    yield context, host.url
    context.close()
    host.stop()


@pytest.fixture
def board(installed) -> Iterator[Page]:
    """The Board view as on a first visit: nothing kept."""
    with first_visit(*installed) as page:
        open_board(page, installed[1])
        yield page


def test_the_main_job_by_touch(board):
    """From a tape measure and a boot to Turn."""
    board.locator(".board-open").tap()
    board.get_by_role("textbox", name="Name").fill("Mine 152")
    done(board)
    set_typed(board, nose_m="28.8", waist_m="24.6", tail_m="28.6", effective_edge_m="114")
    mine = BOARD | {"nose_m": 0.288, "waist_m": 0.246, "tail_m": 0.286, "effective_edge_m": 1.14}
    dock(board, "Boots")
    set_typed(board, boot_sole_length_m="31.5")
    boot = BOOT | {"sole_length_m": 0.315}
    shows(board, board_question(mine, boot=boot), boards_question(mine, mine, boot=boot))
    done(board)
    board.locator(".board-title").get_by_role("button", name="Save").tap()
    expect(board.locator(".board-title")).to_contain_text("Mine 152")
    expect(board.locator(".board-title")).to_contain_text("yours")

    settled(board)
    board.get_by_role("button", name="Ride it in Turn").tap()
    expect(board.locator(".turn-view")).to_be_visible()
    answer = snowhold.answer(board_question(mine, boot=boot))
    drag = min(answer["drag_angle_deg"].values())
    shown = float(field(board, "sidecut_radius_m").input_value())
    assert shown == pytest.approx(answer["sidecut_radius_m"], abs=0.005)
    board.get_by_role("button", name="Rider").tap()
    assert field(board, "effective_edge_m").input_value() == "114"
    assert float(field(board, "drag_angle_deg").input_value()) == pytest.approx(drag, abs=0.05)
    done(board)
    # One undo brings the board in Turn back.
    board.get_by_role("button", name="Undo").tap()
    expect(field(board, "sidecut_radius_m")).to_have_value("8")


def test_every_shown_figure_is_the_engines(board):
    asked = board_question(BOARD), boards_question(BOARD, BOARD)
    keys = shows(board, *asked)
    assert {"sidecut_radius_m", "boards.0.verdict", "boards.0.carve_speed_mps.max",
            "boot.front.toe.overhang_m"} <= keys
    dock(board, "Boots")
    assert {"boot.rear.heel.drag_angle_deg", "boot.clear_waist_m"} <= shows(board, *asked)
    done(board)
    dock(board, "Stiffness")
    assert {"bend.turn_radius_m", "bend.contact_length_m", "bend.local_radius_m.rear",
            "hard_snow_radius_m"} <= shows(board, *asked)


@pytest.mark.parametrize("verdict", ["small", "big"])
def test_a_board_that_does_not_suit_says_why(board, verdict):
    if verdict == "small":
        set_typed(board, waist_m="21", nose_m="25", tail_m="25")
    else:
        set_typed(board, waist_m="30", nose_m="34", tail_m="34")
    expect(board.locator(f".board-view [data-verdict={verdict}]")).to_have_count(1)
    settled(board)
    width = {"small": (0.25, 0.21, 0.25), "big": (0.34, 0.30, 0.34)}[verdict]
    changed = BOARD | dict(zip(("nose_m", "waist_m", "tail_m"), width, strict=True))
    answer = snowhold.answer(boards_question(changed, changed))["boards"][0]
    assert answer["verdict"] == verdict, "the board is what the test means it to be"
    says = plain(board.locator(".board-view .says").inner_text())
    reason = answer["reasons"][0]
    if verdict == "small":
        assert reason["code"] == "boot_drags"
        assert f"{reason['drag_angle_deg']:.0f}°" in says
        assert f"{reason['clear_waist_m'] * 100:.1f} cm" in says
    else:
        assert reason["code"] == "wide_for_boot" and "slow from edge to edge" in says


def test_a_stated_radius_that_the_widths_contradict_is_explained(board):
    dock(board, "Measures")
    set_typed(board, stated_radius_m="9.5")
    stated = snowhold.answer(board_question(BOARD, stated_radius_m=9.5))["stated_radius"]
    assert not stated["agrees"]
    text = board.locator("#sheet-measure")
    expect(text).to_contain_text(f"{stated['difference'] * 100:+.0f}")
    edge = next(one for one in stated["reasons"] if one["code"] == "effective_edge")
    expect(text).to_contain_text(f"{edge['effective_edge_m'] * 100:.0f}\u202fcm")
    set_typed(board, stated_radius_m="8.1")
    expect(text).to_contain_text("agrees")


def test_three_widths_give_the_radius_by_position(board):
    dock(board, "Measures")
    board.get_by_role("button", name="Add a width").tap()
    expect(board.locator(".width-row:visible")).to_have_count(3)
    # A tighter nose: the front width a little less than on one arc.
    for i, (at, width) in enumerate((("-30", "26.5"), ("0", "25.3"), ("30", "26.2"))):
        field(board, f"widths[{i}].at_m").fill(at)
        field(board, f"widths[{i}].width_m").fill(width)
        field(board, f"widths[{i}].width_m").press("Enter")
    widths = [{"at_m": at, "width_m": width}
              for at, width in ((-0.3, 0.265), (0.0, 0.253), (0.3, 0.262))]
    radii = snowhold.answer(board_question(BOARD, widths=widths))["radii"]
    rows = board.locator("#sheet-measure .along li")
    expect(rows).to_have_count(3)
    expect(rows.nth(0)).to_contain_text(f"{radii[0]['radius_m']:.1f}\u202fm")
    expect(rows.nth(2)).to_contain_text(f"{radii[2]['radius_m']:.1f}\u202fm")
    # Out of order: the engine's complaint at its field, the entry kept.
    field(board, "widths[1].at_m").fill("-45")
    field(board, "widths[1].at_m").press("Enter")
    expect(board.locator(".error:visible")).to_have_text(
        "From tail to nose, each past the one before.")
    expect(field(board, "widths[1].at_m")).to_have_value("−45")


def test_inches_and_millimetres(board):
    board.get_by_role("button", name="Settings", exact=True).tap()
    board.get_by_role("radio", name="mm", exact=True).check()
    done(board)
    expect(field(board, "waist_m")).to_have_value("253")
    board.get_by_role("button", name="Settings", exact=True).tap()
    board.get_by_role("radio", name="inches").check()
    done(board)
    expect(field(board, "waist_m")).to_have_value("9.961")
    set_typed(board, waist_m="10")
    changed = BOARD | {"waist_m": 0.254}
    radius = snowhold.answer(board_question(changed))["sidecut_radius_m"]
    expect(board.locator(".board-view [data-answer=sidecut_radius_m]")).to_have_text(
        f"{radius:.1f}\u202fm")


BAD = {
    "waist_m": ("31", "Not narrower than the nose. Check both."),
    "nose_m": ("", "Still missing."),
    "effective_edge_m": ("12", re.compile("50 to 200")),
}


@pytest.mark.parametrize("key", BAD)
def test_a_bad_measure_is_told_at_its_field_and_kept(board, key):
    text, says = BAD[key]
    set_typed(board, **{key: text})
    error = board.locator(".board-view .error:visible").first
    expect(error).to_have_text(says)
    expect(field(board, key)).to_have_value(text)
    expect(field(board, key)).to_have_attribute("aria-invalid", "true")
    expect(board.locator(".board-view .caption")).to_have_text(
        "Last answer. Put right what is marked.")
    set_typed(board, nose_m="29.7", waist_m="25.3", effective_edge_m="117")
    expect(board.locator(".board-view .error:visible")).to_have_count(0)
    settled(board)


def test_a_boot_of_two_and_a_half_metres(board):
    dock(board, "Boots")
    set_typed(board, boot_sole_length_m="250")
    expect(board.locator("#sheet-boots .error:visible")).to_contain_text("15 to 40")
    expect(field(board, "boot.sole_length_m")).to_have_value("250")
    done(board)
    expect(board.locator(".board-dock [data-wrong]")).to_contain_text("Boots")


def test_stiffness_at_home(board):
    dock(board, "Stiffness")
    expect(board.locator("#sheet-bend")).to_contain_text("assumed")
    set_typed(board, supports_m="100", load_kg="20", sag_m="-12")
    expect(board.locator("#sheet-bend .error:visible")).to_have_count(1)
    expect(field(board, "sag_m")).to_have_value("−12")
    set_typed(board, sag_m="22")
    answer = snowhold.answer({"ask": "stiffness", "supports_m": 1, "load_kg": 20, "sag_m": 0.022})
    for key in ("stiffness_nm2", "low_nm2", "high_nm2"):
        figure = board.locator(f".measured [data-answer={key}]")
        expect(figure).to_have_text(re.compile(re.escape(f"{answer[key]:.0f}")))
    board.get_by_role("button", name=re.compile("^Use ")).tap()
    assert float(field(board, "stiffness_nm2").input_value()) == pytest.approx(
        answer["stiffness_nm2"], abs=0.05)
    changed = BOARD | {"stiffness_nm2": answer["stiffness_nm2"]}
    shows_bend = snowhold.answer(board_question(changed))["bend"]["turn_radius_m"]
    expect(board.locator("#sheet-bend [data-answer='bend.turn_radius_m']")).to_have_text(
        f"{shows_bend:.1f}\u202fm")


def test_boards_side_by_side(board):
    dock(board, "Compare")
    expect(board.locator(".compare")).to_be_visible()
    asked = boards_question(BOARD, PISTE, SHORT)
    keys = shows(board, board_question(BOARD), asked)
    assert {"boards.2.verdict", "boards.1.carve_speed_mps.min", "boards.2.radius_at_45_m.bent",
            "boards.0.chance_holds"} <= keys
    expect(board.locator(".windows .carves")).to_have_count(3)
    expect(board.get_by_role("img", name="Speeds that carve every pitch")).to_be_visible()
    # The band of usual speeds and a lane's shape are on one scale.
    usual = snowhold.answer(asked)["usual_speed_mps"]
    window = snowhold.answer(asked)["boards"][1]["speed_windows"][0]
    drawn = board.evaluate("""() => {
        const band = document.querySelector('.windows .usual').getBBox();
        const shape = document.querySelectorAll('.windows .carves')[1].getBBox();
        return [band.x, band.x + band.width, shape.x];
    }""")
    perspective = (drawn[1] - drawn[0]) / (usual["high"] - usual["low"])
    assert drawn[2] == pytest.approx(drawn[0] + (window["min_mps"] - usual["low"]) * perspective,
                                     abs=1)
    # A fourth board joins; more than four cannot.
    board.get_by_role("checkbox", name="Wide 158").check()
    expect(board.locator(".windows .carves")).to_have_count(4)
    board.get_by_role("checkbox", name="Piste 160").uncheck()
    expect(board.locator(".windows .carves")).to_have_count(3)


def test_the_pictures_are_to_scale(board):
    answer = snowhold.answer(board_question(BOARD))
    box = board.locator(".plan .deck").evaluate(
        "(path) => [path.getBBox().width, path.getBBox().height]")
    outline = answer["picture"]["outline"]
    long = outline["x_m"][-1] - outline["x_m"][0]
    assert box[0] / box[1] == pytest.approx(long / (2 * max(outline["y_m"])), rel=0.02)
    # The board in section is tilted by the angle at which the boot drags.
    first = min(value_at(answer, f"boot.{foot}.{end}.drag_angle_deg")
                for foot in ("front", "rear") for end in ("toe", "heel"))
    deck = board.locator(".boot-section .deck").get_attribute("d") or ""
    points = [tuple(map(float, pair.split())) for pair in re.findall(r"[\d.-]+ [\d.-]+", deck)]
    (x0, y0), (x1, y1) = points[:2]
    assert math.degrees(math.atan2(y0 - y1, x0 - x1)) == pytest.approx(first, abs=0.5)
    # The thumb of the boot is on the snow, the edge below it.
    surface = board.locator(".boot-section .surface").evaluate("(path) => path.getBBox().y")
    assert y0 >= surface - 0.2


def test_without_boots_and_stiffness_it_says_what_is_not_checked(board):
    dock(board, "Boots")
    set_typed(board, boot_sole_length_m="")
    done(board)
    dock(board, "Stiffness")
    set_typed(board, stiffness_nm2="")
    done(board)
    expect(board.locator(".board-view .says")).to_contain_text(
        "Not checked: its stiffness, your boots.")
    board.get_by_role("button", name="Set boots").tap()
    expect(board.locator("#sheet-boots")).to_be_visible()
    done(board)
    bare = {key: value for key, value in BOARD.items() if key != "stiffness_nm2"}
    shows(board, board_question(bare, boot=None), boards_question(bare, bare, boot=None))


def test_before_numpy_is_there_it_waits_without_an_error(new_context, site):
    host = Host(site)
    context = new_context(**PHONE)
    held: list[Any] = []
    context.route("**/numpy*", lambda route: held.append(route))
    page = context.new_page()
    page.goto(host.url)
    wait_ready(page)
    page.get_by_role("button", name="Board", exact=True).tap()
    expect(page.locator(".board-view .says")).to_have_text("The bend comes in a moment.")
    expect(page.locator(".error:visible")).to_have_count(0)
    set_typed(page, waist_m="31")
    expect(page.locator(".board-view .error:visible")).to_have_count(1)
    set_typed(page, waist_m="25.3")
    for route in held:
        route.continue_()
    context.unroute("**/numpy*")
    settled(page)
    host.stop()


def test_works_without_a_network(installed, board):
    context, url = installed
    context.set_offline(True)
    try:
        board.goto(url)
        wait_ready(board)
        settled(board)
        set_typed(board, waist_m="25.5")
        changed = BOARD | {"waist_m": 0.255}
        shows(board, board_question(changed), boards_question(changed, changed))
    finally:
        context.set_offline(False)


@pytest.mark.parametrize("look", LOOKS)
def test_axe_finds_nothing(board, look):
    look_like(board, look)
    enhanced = ("color-contrast-enhanced",) if look == "glare" else ()
    # The bar at the foot covers what lies under it until it is scrolled up.
    board.evaluate("scrollTo(0, document.documentElement.scrollHeight)")
    found = violations(board, *enhanced, "target-size")
    for sheet, name in SHEETS.items():
        dock(board, name)
        expect(board.locator(f"#sheet-{sheet}")).to_be_visible()
        if sheet == "compare":
            expect(board.locator(".compare")).to_be_visible()
        found += violations(board, *enhanced)
        board.keyboard.press("Escape")
    board.locator(".board-open").tap()
    found += violations(board, *enhanced)
    board.keyboard.press("Escape")
    set_typed(board, waist_m="31", nose_m="wide")
    expect(board.locator(".board-view .error:visible").first).to_be_visible()
    found += violations(board, *enhanced)
    assert found == []


@pytest.mark.parametrize("size", [(320, 568), (360, 640), (640, 360), (915, 412)],
                         ids=lambda size: f"{size[0]}x{size[1]}")
@pytest.mark.parametrize("percent", [100, 200])
def test_targets_and_no_sideways_scrolling(board, size, percent):
    board.set_viewport_size({"width": size[0], "height": size[1]})
    board.evaluate("(size) => { document.documentElement.style.fontSize = size; }", f"{percent}%")
    wide, small, cut = {}, [], []

    def look(where: str) -> None:
        wide[where] = board.evaluate("""(width) => {
            const body = document.querySelector('dialog[open] .sheet-body');
            return Math.max(document.documentElement.scrollWidth,
                            body ? body.scrollWidth - body.clientWidth + width : 0);
        }""", size[0])
        small.extend(board.evaluate("""() => [...document.querySelectorAll(
                'button, label:has(input[type=radio], input[type=checkbox])')]
            .filter((node) => node.checkVisibility())
            .map((node) => [node, node.getBoundingClientRect()])
            .filter(([, box]) => box.width < 48 || box.height < 48)
            .map(([node, box]) => `${node.className} ${box.width}x${box.height}`)"""))
        cut.extend(board.evaluate("""() => [...document.querySelectorAll(
                '.field, .verdict-word, dd, label, .unit, [role=cell]')]
            .filter((node) => node.checkVisibility() && node.scrollWidth > node.clientWidth + 1
                && getComputedStyle(node).display !== 'inline')
            .map((node) => `${node.id} ${node.className} ${node.textContent}`)"""))

    look("page")
    for sheet, name in SHEETS.items():
        dock(board, name)
        if sheet == "compare":
            expect(board.locator(".compare")).to_be_visible()
        look(sheet)
        board.keyboard.press("Escape")
    board.locator(".board-open").tap()
    look("boards")
    board.evaluate("document.documentElement.style.fontSize = ''")
    assert {where: width for where, width in wide.items() if width > size[0]} == {}
    assert small == []
    assert cut == []


@pytest.mark.parametrize("size", [(360, 640), (412, 915), (915, 412)],
                         ids=lambda size: f"{size[0]}x{size[1]}")
def test_the_answer_is_there_without_scrolling(board, size):
    board.set_viewport_size({"width": size[0], "height": size[1]})
    board.evaluate("scrollTo(0, 0)")
    for part in (".verdict-word", ".says", ".figures", ".plan", ".boot-section", ".bite"):
        box = board.locator(f".board-view {part}").bounding_box()
        assert box and box["y"] >= 0 and box["y"] + box["height"] <= size[1], part


def test_nothing_moves_and_nothing_ticks(board):
    board.wait_for_timeout(1500)
    frames = board.evaluate("""() => new Promise((done) => {
        let calls = 0;
        const real = requestAnimationFrame;
        window.requestAnimationFrame = (f) => { calls += 1; return real(f); };
        const timers = setTimeout;
        window.setTimeout = (f, ms) => { calls += 1; return timers(f, ms); };
        timers(() => done(calls), 1000);
    })""")
    assert frames == 0
