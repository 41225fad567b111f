"""Stiffness at home. Outside checks: the bending line integrated twice, the frequency equation
cosh βL cos βL = 1 by SciPy, F. K. Fuss et al. 2010 (16 Hz), a Monte Carlo of the measurement."""

import math

import numpy as np
import pytest
from scipy.integrate import cumulative_trapezoid
from scipy.optimize import brentq

import snowhold
from snowhold.stiffness import (
    FREE_FREE_NUMBER,
    TYPICAL,
    bending_stiffness_nm2,
    free_mode_stiffness_nm2,
)


def ask(**fields):
    return snowhold.answer({"ask": "stiffness", "supports_m": 1.1, "load_kg": 10, "sag_m": 0.015,
                            **fields})


def test_sag_of_a_beam_integrated_twice():
    """u″ = −M/EI with M = P x/2 up to the middle, level in the middle, 0 at the support."""
    ei_nm2, load_n, supports_m = 200.0, 98.0, 1.1
    x_m = np.linspace(0, supports_m / 2, 20_001)
    tilt = cumulative_trapezoid(load_n * x_m / 2 / ei_nm2, x_m, initial=0)
    sag_m = np.trapezoid(tilt[-1] - tilt, x_m)
    assert bending_stiffness_nm2(load_n, supports_m, sag_m) == pytest.approx(ei_nm2, rel=1e-6)


def test_free_free_number():
    root = brentq(lambda beta_l: math.cosh(beta_l) * math.cos(beta_l) - 1, 4.5, 5.0, xtol=1e-14)
    assert root**2 == pytest.approx(FREE_FREE_NUMBER, rel=1e-12)


def test_typical_medium_board_is_the_measured_mode():
    """16 Hz, 1.55 m and 2.7 kg (both assumed): about 200 N·m²."""
    assert free_mode_stiffness_nm2(16, 1.55, 2.7) == pytest.approx(200, rel=0.03)
    medium = next(entry for entry in TYPICAL if entry["code"] == "medium")
    assert medium["stiffness_nm2"] == pytest.approx(200, rel=0.03)
    assert all(entry["source"] for entry in TYPICAL)


def test_answer_and_its_spread_against_many_measurements():
    reply = ask(supports_spread_m=0.005, load_spread_kg=0.2, sag_spread_m=0.0005)
    random = np.random.default_rng(3)
    load_n = 9.80665 * (10 + random.normal(0, 0.2, 200_000))
    many = bending_stiffness_nm2(load_n, 1.1 + random.normal(0, 0.005, 200_000),
                                 0.015 + random.normal(0, 0.0005, 200_000))
    assert reply["stiffness_nm2"] == pytest.approx(9.80665 * 10 * 1.1**3 / (48 * 0.015))
    assert reply["spread_nm2"] == pytest.approx(many.std(), rel=0.02)
    assert sum(reply["spread_from"].values()) == pytest.approx(1)
    assert reply["weakest"] == "sag"
    assert reply["low_nm2"] < reply["stiffness_nm2"] < reply["high_nm2"]


def test_no_spread_at_all():
    reply = ask(supports_spread_m=0, load_spread_kg=0, sag_spread_m=0)
    assert reply["spread_nm2"] == 0
    assert reply["weakest"] is None


@pytest.mark.parametrize("sag_m", [-0.01, 0, 0.15, 1e-5])
def test_bad_sags_are_errors_at_the_sag(sag_m):
    assert [fault["field"] for fault in ask(sag_m=sag_m)["error"]] == ["sag_m"]


def test_every_bad_field_at_once():
    reply = ask(sag_m=-1, load_kg=0, supports_m="far")
    assert {fault["field"] for fault in reply["error"]} == {"sag_m", "load_kg", "supports_m"}
