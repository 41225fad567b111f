"""What the page shows as the ground of its answers: published figures, digit by digit."""

import pytest

import snowhold

REFERENCE = snowhold.answer({"ask": "reference"})


@pytest.mark.parametrize(("who", "mean_kmh", "spread_kmh"), [
    # Stepan et al., JSAMS Plus (2023).
    ("beginner", 19.9, 7.2), ("intermediate", 32.4, 9.9), ("advanced", 44.5, 11.7),
    ("snowboarders", 33.0, 13.2),
    # Shealy et al., J. ASTM Int. 2 (2005).
    ("snowboarders_intermediate_slope", 38.9, None),
])
def test_published_speeds(who, mean_kmh, spread_kmh):
    speed = next(s for s in REFERENCE["speeds"] if s["who"] == who)
    assert speed["mean_mps"] * 3.6 == pytest.approx(mean_kmh)
    if spread_kmh is None:
        assert speed["spread_mps"] is None
    else:
        assert speed["spread_mps"] * 3.6 == pytest.approx(spread_kmh)
    assert speed["source"]


def test_snow_table_in_the_units_of_its_sources():
    """Hand hardness classes of Fierz et al. 2009, H_V and S_f inside Mössner et al. 2013."""
    assert [snow["code"] for snow in REFERENCE["snows"]] == ["F", "4F", "1F", "P", "K", "I"]
    for snow in REFERENCE["snows"]:
        assert snow["hardness_npm3"]["low"] / 1e9 >= 0.04
        assert snow["hardness_npm3"]["high"] / 1e9 <= 90
        assert snow["shear_strength_pa"]["high"] / 1e6 <= 0.50


def test_ranges_are_those_that_the_turn_allows():
    for name, span in REFERENCE["turn_ranges"].items():
        if name in ("pitch_deg", "speed_mps", "sidecut_radius_m"):
            good = {"ask": "turn", "pitch_deg": 10, "speed_mps": 6, "sidecut_radius_m": 8,
                    "samples": 0}
            for end, ok in ((span["low"], True), (span["high"], True),
                            (span["high"] * 1.001, False)):
                assert ("error" not in snowhold.answer({**good, name: end})) == ok


def test_spread_is_the_one_that_a_question_without_any_has():
    question = {"ask": "turn", "pitch_deg": 18, "speed_mps": 6, "sidecut_radius_m": 8}
    told = snowhold.answer(question | {"spread": REFERENCE["turn_spread"]})
    assert told == snowhold.answer(question)


def test_nothing_else_is_asked():
    assert "error" in snowhold.answer({"ask": "reference", "pitch_deg": 3})
