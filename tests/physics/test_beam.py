"""The beam on a one-sided foundation, and the board bent into snow.

Outside checks: M. Hetényi's closed forms for beams on an elastic foundation (1946; from memory),
SciPy's collocation solver for boundary-value problems, R_sc cos ε of hard snow (Jentschura and
Fahrbach 2004), force and moment balance, numpy's own least squares, and the figures computed in the
project's description of the model."""

import math

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st
from scipy.integrate import solve_bvp

from snowhold import beam
from snowhold.beam import deflect, nodes_m, point_load, weights_m
from snowhold.bend import (
    NODES,
    Board,
    contact_parts,
    groove,
    line_in_snow_m,
    load_factor,
    part_weights_m,
    press,
    sidecut_curvature_pm,
)


def flat_board(nodes=NODES, edge_m=1.2, radius_m=8.0, stance_m=0.52, camber_m=0.0, setback_m=0.0,
               front_share=0.5, shape=None):
    x_m = nodes_m(edge_m, nodes)
    shape = np.ones(nodes) if shape is None else np.interp(
        x_m, np.linspace(-edge_m / 2, edge_m / 2, len(shape)), shape)
    return Board(x_m, x_m**2 / (2 * radius_m), shape, camber_m,
                 (-stance_m / 2 - setback_m, stance_m / 2 - setback_m), front_share)


def pressed(board, stiffness_nm2, normal_n, edge_deg, hardness_npm3, angulation_deg=5):
    edge_rad = math.radians(edge_deg)
    solution = press(board, np.array([stiffness_nm2]), np.array([normal_n]), edge_rad,
                     math.radians(edge_deg - angulation_deg), hardness_npm3)
    return solution, groove(board, solution, edge_rad)


BOARDS = st.fixed_dictionaries({
    "edge_m": st.floats(0.7, 1.8), "radius_m": st.floats(4, 30), "camber_m": st.floats(-0.02, 0.02),
    "stance_m": st.floats(0.3, 0.6), "setback_m": st.floats(-0.04, 0.04),
    "front_share": st.floats(0.2, 0.8),
    "shape": st.lists(st.floats(0.1, 3), min_size=2, max_size=7)})


@settings(max_examples=150, deadline=None)
@given(board=BOARDS, stiffness_nm2=st.floats(5, 2000), normal_n=st.floats(100, 2000),
       edge_deg=st.floats(10, 75), hardness=st.floats(4e7, 9e10))
def test_forces_and_moments_balance(board, stiffness_nm2, normal_n, edge_deg, hardness):
    """Σ q_N = N, and the snow's push turns the board about its middle as the rider's force does."""
    on = flat_board(**board)
    solution, _ = pressed(on, stiffness_nm2, normal_n, edge_deg, hardness)
    assert solution.converged[0]
    push_n = weights_m(on.x_m) * solution.push_npm[0] / load_factor(
        math.radians(edge_deg), math.radians(edge_deg - 5))
    assert push_n.sum() == pytest.approx(normal_n, rel=1e-8)
    rear_m, front_m = on.bindings_m
    moment_nm = normal_n * ((1 - on.front_share) * rear_m + on.front_share * front_m)
    assert push_n @ on.x_m == pytest.approx(moment_nm, abs=1e-7 * normal_n)
    assert (solution.push_npm >= 0).all()
    assert (solution.push_npm[solution.depth_m < 0] == 0).all()


@pytest.mark.parametrize("edge_deg", [20, 35, 50, 65])
@pytest.mark.parametrize("radius_m", [7.0, 8.0, 10.0])
def test_hard_snow_carves_sidecut_times_cosine(edge_deg, radius_m):
    """10 N/mm³ and a usual board: R_sc cos ε within 1 %."""
    solution, cut = pressed(flat_board(radius_m=radius_m), 180.0, 800.0, edge_deg, 1e10)
    assert solution.converged[0]
    assert 1 / cut.curvature_pm[0] == pytest.approx(
        radius_m * math.cos(math.radians(edge_deg)), rel=0.01)


@pytest.mark.parametrize(("stiffness_nm2", "radius_m"), [(20, 4.5), (180, 5.07), (400, 5.5)])
def test_computed_figures_of_the_model(stiffness_nm2, radius_m):
    """L 1.2 m, R_sc 8 m, ε 50°, N 800 N, H_V 0.1 N/mm³: 4.5, 5.07 and 5.5 m; the rule says 5.14.

    Stance and angulation are not told: 0.52 m and 5°. Without angulation 180 N·m² carves 5.04 m.
    """
    _, cut = pressed(flat_board(), stiffness_nm2, 800, 50, 1e8)
    assert 1 / cut.curvature_pm[0] == pytest.approx(radius_m, abs=0.03)


@pytest.mark.parametrize("hardness", [4e7, 1.2e8, 2.5e9])
@pytest.mark.parametrize("stiffness_nm2", [60, 180, 400])
@pytest.mark.parametrize("edge_deg", [30, 45, 60])
def test_halving_the_mesh_changes_little(stiffness_nm2, hardness, edge_deg):
    cuts = [pressed(flat_board(nodes), stiffness_nm2, 800, edge_deg, hardness)[1]
            for nodes in (NODES, 2 * NODES - 1)]
    assert cuts[0].curvature_pm == pytest.approx(cuts[1].curvature_pm, rel=1e-3)
    assert cuts[0].contact_m == pytest.approx(cuts[1].contact_m, rel=1e-3)


def winkler(stiffness_npm2):
    """An elastic foundation that pushes and pulls, q = k d."""
    return lambda depth_m: (stiffness_npm2 * depth_m, np.full_like(depth_m, stiffness_npm2))


def on_winkler(length_m, nodes, ei_nm2, k_npm2, load_n):
    x_m = nodes_m(length_m, nodes)
    flat = np.zeros((1, nodes))
    return x_m, deflect(x_m, np.full((1, nodes - 2), ei_nm2), flat[0],
                        load_n * point_load(x_m, 0.0)[None, :], flat, np.ones((1, 1)),
                        winkler(k_npm2), flat)


def test_hetenyi_endless_beam():
    """Load P on an endless beam: w = P β/(2k) e^(−βx) (cos βx + sin βx), β⁴ = k/(4 EI)."""
    ei_nm2, k_npm2, load_n = 180.0, 5e4, 100.0
    beta = (k_npm2 / (4 * ei_nm2))**0.25
    x_m, solution = on_winkler(16 / beta, 801, ei_nm2, k_npm2, load_n)
    decay = beta * np.abs(x_m)
    closed_m = load_n * beta / (2 * k_npm2) * np.exp(-decay) * (np.cos(decay) + np.sin(decay))
    assert solution.deflection_m[0] == pytest.approx(closed_m, abs=1e-3 * closed_m.max())


@pytest.mark.parametrize("beta_l", [0.5, 2.0, 5.0])
def test_hetenyi_free_beam_loaded_at_the_middle(beta_l):
    """Middle P β/(2k) (cosh βl + cos βl + 2)/(sinh βl + sin βl), ends
    2 P β/k cosh(βl/2) cos(βl/2)/(sinh βl + sin βl)."""
    ei_nm2, length_m, load_n = 180.0, 1.2, 100.0
    beta = beta_l / length_m
    k_npm2 = 4 * ei_nm2 * beta**4
    _, solution = on_winkler(length_m, 401, ei_nm2, k_npm2, load_n)
    below = math.sinh(beta_l) + math.sin(beta_l)
    middle_m = load_n * beta / (2 * k_npm2) * (math.cosh(beta_l) + math.cos(beta_l) + 2) / below
    end_m = 2 * load_n * beta / k_npm2 * math.cosh(beta_l / 2) * math.cos(beta_l / 2) / below
    assert solution.deflection_m[0, 200] == pytest.approx(middle_m, rel=1e-4)
    assert solution.deflection_m[0, [0, -1]] == pytest.approx([end_m] * 2, abs=1e-4 * middle_m)


CASES = {
    "usual": {},
    "soft snow": {"hardness": 4e7, "edge_deg": 35},
    "loses contact at the ends": {"stiffness_nm2": 40.0, "hardness": 2.5e9},
    "loses contact in the middle": {"stiffness_nm2": 500.0, "hardness": 7e8, "normal_n": 200.0},
    "camber, taper, off centre": {
        "stiffness_nm2": 250.0, "hardness": 1.2e8,
        "board": {"camber_m": 0.008, "setback_m": 0.02, "front_share": 0.6,
                  "shape": [0.4, 1.0, 0.6]}},
    "reverse camber": {"board": {"camber_m": -0.006, "front_share": 0.45}},
}


@pytest.mark.parametrize("case", CASES.values(), ids=CASES)
def test_against_scipy_boundary_value_solver(case):
    """The same equation by collocation: three spans between ends and bindings, each on 0 to 1, with
    moment and shear carried on and the bindings' loads as jumps of the shear."""
    board = flat_board(201, **case.get("board", {}))
    ei_nm2, normal_n = case.get("stiffness_nm2", 180.0), case.get("normal_n", 800.0)
    edge_deg, hardness = case.get("edge_deg", 50.0), case.get("hardness", 1e8)
    solution, cut = pressed(board, ei_nm2, normal_n, edge_deg, hardness)
    edge_rad = math.radians(edge_deg)
    factor = load_factor(edge_rad, edge_rad - math.radians(5))
    length_m = board.x_m[-1] - board.x_m[0]
    ends_m = np.array([board.x_m[0], *board.bindings_m, board.x_m[-1]])
    spans_m = np.diff(ends_m)
    loads_n = factor * normal_n * np.array([1 - board.front_share, board.front_share])

    def depth_m(x_m, u_m):
        return u_m * math.cos(edge_rad) + x_m**2 / 16 * math.sin(edge_rad)

    def slopes(s, y):
        rows = []
        for i in range(3):
            u_m, tilt, moment, shear = y[4 * i:4 * i + 4]
            x_m = ends_m[i] + s * spans_m[i]
            push = (factor * hardness / (2 * math.tan(edge_rad))
                    * np.maximum(depth_m(x_m, u_m), 0)**2)
            ei = ei_nm2 * np.interp(x_m, board.x_m, board.stiffness_shape)
            free_pm = 8 * board.camber_m / length_m**2
            rows += [spans_m[i] * row for row in (tilt, moment / ei + free_pm, shear, -push)]
        return np.array(rows)

    def bounds(a, b):
        joins = []
        for i in range(2):
            step = a[4 * i + 4:4 * i + 8] - b[4 * i:4 * i + 4]
            step[3] -= loads_n[i]
            joins += list(step)
        return np.array([a[2], a[3], *joins, b[10], b[11]])

    s = np.linspace(0, 1, 101)
    guess = np.zeros((12, s.size))
    for i in range(3):
        x_m = ends_m[i] + s * spans_m[i]
        guess[4 * i] = np.interp(x_m, board.x_m, solution.deflection_m[0])
        guess[4 * i + 1] = np.interp(x_m, board.x_m,
                                     np.gradient(solution.deflection_m[0], board.x_m))
    other = solve_bvp(slopes, bounds, s, guess, tol=1e-6, max_nodes=200_000)
    assert other.success, other.message
    other_m = np.empty(board.x_m.size)
    for i in range(3):
        inside = (board.x_m >= ends_m[i] - 1e-12) & (board.x_m <= ends_m[i + 1] + 1e-12)
        other_m[inside] = other.sol((board.x_m[inside] - ends_m[i]) / spans_m[i])[4 * i]
    bent_m = np.ptp(other_m)
    assert solution.deflection_m[0] == pytest.approx(other_m, abs=1e-3 * bent_m)

    # And the radius, fitted by numpy where the other solution touches.
    touches = depth_m(board.x_m, other_m) > 0
    line_m = line_in_snow_m(board, other_m, edge_rad)
    weights = weights_m(board.x_m)[touches]
    fitted = np.polyfit(board.x_m[touches], line_m[touches], 2, w=np.sqrt(weights))[0]
    assert cut.curvature_pm[0] == pytest.approx(2 * fitted, rel=5e-3)


def test_three_point_bending_of_a_handbook():
    """On two stiff narrow supports the middle sags by P l³/(48 EI)."""
    x_m = nodes_m(1.2, 481)
    ei_nm2, load_n, half_m = 180.0, 50.0, 0.5
    at = sum(point_load(x_m, end) for end in (-half_m, half_m)) / (x_m[1] - x_m[0])

    def supports(depth_m):
        return 1e9 * at * depth_m, 1e9 * at + 0 * depth_m

    flat = np.zeros((1, x_m.size))
    solution = deflect(x_m, np.full((1, x_m.size - 2), ei_nm2), flat[0],
                       load_n * point_load(x_m, 0.0)[None, :], flat, np.ones((1, 1)), supports,
                       flat)
    sag_m = solution.deflection_m[0, 240] - solution.deflection_m[0, 40]
    assert sag_m == pytest.approx(load_n * (2 * half_m)**3 / (48 * ei_nm2), rel=1e-4)


@settings(max_examples=30, deadline=None)
@given(seed=st.integers(0, 10**6))
def test_any_start_ends_in_the_same_shape(seed):
    """The energy is convex, so it has one minimum."""
    board = flat_board(61)
    factor = load_factor(math.radians(50), math.radians(45))
    offset_m = board.proud_m[None, :] * math.sin(math.radians(50))

    def snow(depth_m):
        pressed_m = np.maximum(depth_m, 0)
        return 4e8 * pressed_m**2, 8e8 * pressed_m

    load_n = factor * 400 * (point_load(board.x_m, -0.26) + point_load(board.x_m, 0.26))
    starts_m = np.random.default_rng(seed).uniform(-0.05, 0.05, (2, 61)) + 0.08
    solution = deflect(board.x_m, np.full((2, 59), 180.0), np.zeros(61),
                       np.stack([load_n, load_n]), offset_m + np.zeros((2, 1)),
                       np.full((2, 1), math.cos(math.radians(50))), snow, starts_m)
    assert solution.converged.all()
    assert solution.deflection_m[0] == pytest.approx(solution.deflection_m[1], abs=1e-9)


def test_an_unfinished_solve_says_so(monkeypatch):
    monkeypatch.setattr(beam, "_MOST_STEPS", 1)
    solution, _ = pressed(flat_board(), 20, 800, 50, 1e9)
    assert not solution.converged[0]
    assert solution.residual[0] > beam.CONVERGED_RESIDUAL


def test_a_batch_is_its_cases_one_by_one():
    board = flat_board()
    edge_rad, lean_rad = math.radians(50), math.radians(45)
    ei_nm2, normal_n = np.array([20.0, 180, 2000]), np.array([1500.0, 800, 150])
    together = press(board, ei_nm2, normal_n, edge_rad, lean_rad, 7e8)
    assert together.converged.all()
    for i in range(3):
        alone = press(board, ei_nm2[i:i + 1], normal_n[i:i + 1], edge_rad, lean_rad, 7e8)
        assert together.deflection_m[i] == pytest.approx(alone.deflection_m[0], abs=1e-10)


def test_contact_is_found_between_nodes():
    x_m = nodes_m(4.0, 5)
    start, end = contact_parts(np.array([[-1.0, 1.0, 2.0, -2.0, -1.0]]))
    assert (end - start)[0] == pytest.approx([0.5, 1.0, 0.5, 0.0])
    assert part_weights_m(x_m, start, end).sum() == pytest.approx(2.0)
    # A straight line integrates exactly: ∫ x dx from −1.5 to 0.5.
    assert part_weights_m(x_m, start, end)[0] @ x_m == pytest.approx((0.5**2 - 1.5**2) / 2)


def test_local_radii_tell_an_even_groove_from_an_oval():
    """On very hard snow each third of the groove has the board's own radius. A board whose front
    half is ten times as soft bends unevenly."""
    _, even = pressed(flat_board(), 180, 800, 40, 1e12, angulation_deg=5)
    _, uneven = pressed(flat_board(shape=[1, 1, 1, 0.1, 0.1]), 180, 800, 50, 1e8)
    assert np.ptp(even.third_curvature_pm) < 0.1 * even.third_curvature_pm.mean()
    assert np.ptp(uneven.third_curvature_pm) > 0.1 * uneven.third_curvature_pm.mean()


def test_sidecut_of_an_edge_is_numpys_parabola():
    board = flat_board(shape=None)
    assert sidecut_curvature_pm(board) == pytest.approx(1 / 8)
    bumpy = Board(board.x_m, board.proud_m + 0.002 * np.sin(9 * board.x_m), board.stiffness_shape,
                  0.0, board.bindings_m, 0.5)
    weights = weights_m(board.x_m)
    fitted = 2 * np.polyfit(board.x_m, bumpy.proud_m, 2, w=np.sqrt(weights))[0]
    assert sidecut_curvature_pm(bumpy) == pytest.approx(fitted)
