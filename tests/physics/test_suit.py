"""Which masses and stiffnesses suit. Outside check: the bounds solved again on a finer mesh with
SciPy's root finder."""

import math

import numpy as np
import pytest
from scipy.optimize import brentq

from snowhold.beam import nodes_m
from snowhold.bend import Board
from snowhold.suit import hard_snow_ratio, mass_range_kg, stiffness_range_nm2

EDGE_RAD, LEAN_RAD = math.radians(45), math.radians(40)
PER_KG = 9.80665 * math.cos(math.radians(10))


def board(nodes=41):
    x_m = nodes_m(1.2, nodes)
    return Board(x_m, x_m**2 / 16, np.ones(nodes), 0.0, (-0.26, 0.26), 0.5)


def off(bound, hardness, mass_kg, ei_nm2):
    return hard_snow_ratio(board(101), np.array([ei_nm2]), np.array([mass_kg * PER_KG]), EDGE_RAD,
                           LEAN_RAD, hardness)[0] - bound


@pytest.mark.parametrize(("ei_nm2", "hardness"),
                         [(60, 4e7), (200, 4e7), (400, 1.2e8), (400, 2.5e9)])
def test_mass_bounds_carve_a_tenth_off(ei_nm2, hardness):
    found = mass_range_kg(board(), ei_nm2, PER_KG, EDGE_RAD, LEAN_RAD, hardness)
    for bound, mass_kg in ((1 / 1.1, found["min"]), (1 / 0.9, found["max"])):
        def miss(kg, bound=bound):
            return off(bound, hardness, kg, ei_nm2)

        if mass_kg is None:
            assert miss(15) * miss(200) > 0
        else:
            assert mass_kg == pytest.approx(brentq(miss, 15, 200), rel=0.02)


@pytest.mark.parametrize("hardness", [6e7, 1.2e8, 7e8])
def test_stiffness_bounds_carve_a_tenth_off(hardness):
    found = stiffness_range_nm2(board(), 70 * PER_KG, EDGE_RAD, LEAN_RAD, hardness)
    for bound, ei_nm2 in ((1 / 0.9, found["min"]), (1 / 1.1, found["max"])):
        def miss(ei, bound=bound):
            return off(bound, hardness, 70, ei)

        if ei_nm2 is None:
            assert miss(20) * miss(2000) > 0
        else:
            assert ei_nm2 == pytest.approx(brentq(miss, 20, 2000), rel=0.02)


def test_where_nothing_suits_there_is_no_range():
    assert mass_range_kg(board(), 2000, PER_KG, EDGE_RAD, LEAN_RAD, 1.2e8) is None


def test_a_stiffer_board_wants_a_heavier_rider():
    least = [mass_range_kg(board(), ei, PER_KG, EDGE_RAD, LEAN_RAD, 6e7)["min"]
             for ei in (250, 350, 450)]
    assert least == sorted(least)
