"""Faults of a board question that no field shows alone: fields that contradict each other."""

from __future__ import annotations

from collections.abc import Callable, Mapping
from typing import Any

from snowhold.question import BadQuestion, Field, Items, Record, read
from snowhold.shape import fitted_curvature_pm, stations
from snowhold.sidecut import sidecut_radius_m
from snowhold.turn import RANGES

Faults = list[dict[str, str]]

RADII_M = RANGES["sidecut_radius_m"]
"""Sidecut radii that a turn can be asked about, m."""

TAPE_SLACK_M = 0.003
"""Widths may contradict each other by this much: two readings of a tape. Assumed."""


def read_all(question: Any, fields: Mapping[str, Field],
             cross: Callable[[Mapping[str, Any]], Faults]) -> dict[str, Any]:
    """Like :func:`snowhold.question.read`, with the faults that ``cross`` finds between fields.

    Where fields are bad by themselves, ``cross`` sees the good ones only, so that every fault is
    named at once.
    """
    try:
        values = read(question, fields)
    except BadQuestion as bad:
        raise BadQuestion(bad.faults + cross(good_fields(question, fields))) from None
    faults = cross(values)
    if faults:
        raise BadQuestion(faults)
    return values


def good_fields(question: Any, fields: Mapping[str, Field]) -> dict[str, Any]:
    """The values of those fields that are good by themselves."""
    good: dict[str, Any] = {}
    if not isinstance(question, Mapping):
        return good
    for name, field in fields.items():
        try:
            good |= read({name: question[name]} if name in question else {}, {name: field})
        except BadQuestion:
            # A list with one bad entry still has good ones, at their own places.
            entries = question.get(name)
            if (isinstance(field, Items) and isinstance(field.of, Record)
                    and isinstance(entries, (list, tuple)) and len(entries) <= field.high):
                good[name] = [good_fields(entry, field.of.fields) for entry in entries]
    return good


def cross_faults(values: Mapping[str, Any], path: str = "") -> Faults:
    """Contradictions between a board's fields; fields that are not there are left alone.

    ``path`` goes before each field's name.
    """
    faults: Faults = []

    def fault(field: str, problem: str, allowed: str) -> None:
        faults.append({"field": path + field, "problem": problem, "allowed": allowed})

    nose_m, waist_m, tail_m, edge_m = (
        values.get(key) for key in ("nose_m", "waist_m", "tail_m", "effective_edge_m"))
    waisted = True
    if waist_m is not None:
        for end, width_m in (("nose", nose_m), ("tail", tail_m)):
            if width_m is not None and width_m <= waist_m:
                waisted = False
                fault("waist_m", f"{waist_m:g} is not narrower than the {end}, {width_m:g}",
                      f"below {end}_m")
    if None not in (nose_m, waist_m, tail_m, edge_m) and waisted:
        radius_m = sidecut_radius_m(nose_m, waist_m, tail_m, edge_m)
        if not RADII_M[0] <= radius_m <= RADII_M[1]:
            fault("waist_m", f"these widths on {edge_m:g} m of edge make a sidecut radius of "
                  f"{radius_m:.3g} m", f"a sidecut radius from {RADII_M[0]:g} to {RADII_M[1]:g} m")
    for foot in ("front", "rear"):
        insert_m = values.get(f"{foot}_insert_width_m")
        if insert_m is not None and waist_m is not None and insert_m < waist_m - TAPE_SLACK_M:
            fault(f"{foot}_insert_width_m", f"{insert_m:g} is narrower than the waist, "
                  f"{waist_m:g}", "waist_m or more")
    if edge_m is not None:
        _stance_fault(values, edge_m, fault)
        if values.get("widths") is not None:
            _width_faults(values["widths"], edge_m, waist_m, fault)
    if (not faults and values.get("widths") is not None
            and nose_m is not None and tail_m is not None and edge_m is not None):
        _bulge_fault(values["widths"], nose_m, tail_m, edge_m, fault)
    return faults


Fault = Callable[[str, str, str], None]


def _stance_fault(values: Mapping[str, Any], edge_m: float, fault: Fault) -> None:
    """A stance that reaches beyond the edge; the stance where none is given never does."""
    stance_m, setback_m = values.get("stance_width_m"), values.get("setback_m")
    if stance_m is None or setback_m is None:
        return
    reach_m = stance_m / 2 + abs(setback_m)
    if reach_m > edge_m / 2:
        fault("stance_width_m", f"puts a binding {reach_m:.3g} m from the middle of the edge",
              f"bindings within {edge_m / 2:.3g} m of the middle")


def _bulge_fault(widths: list[dict[str, float]], nose_m: float, tail_m: float, edge_m: float,
                 fault: Fault) -> None:
    """Widths that leave the board without a sidecut as a whole."""
    if len(widths) < 3 or any(len(row) < 2 for row in widths):
        return
    along = stations(nose_m, 0.0, tail_m, edge_m, [(row["at_m"], row["width_m"]) for row in widths])
    curvature_pm = fitted_curvature_pm(along)
    if not 1 / RADII_M[1] <= curvature_pm <= 1 / RADII_M[0]:
        radius = f"a radius of {1 / curvature_pm:.3g} m" if curvature_pm > 0 else "a bulge"
        fault("widths", f"make {radius} as a whole",
              f"a sidecut radius from {RADII_M[0]:g} to {RADII_M[1]:g} m")


def _width_faults(widths: list[dict[str, float]], edge_m: float, waist_m: float | None,
                  fault: Fault) -> None:
    before_m = None
    for index, row in enumerate(widths):
        at_m, width_m = row.get("at_m"), row.get("width_m")
        if width_m is not None and waist_m is not None and width_m < waist_m - TAPE_SLACK_M:
            fault(f"widths[{index}].width_m", f"{width_m:g} is narrower than the waist, "
                  f"{waist_m:g}", "waist_m or more")
        if at_m is None:
            continue
        if abs(at_m) > edge_m / 2:
            fault(f"widths[{index}].at_m", f"{at_m:g} is beyond the effective edge",
                  f"from {-edge_m / 2:g} to {edge_m / 2:g} m")
        elif before_m is not None and at_m < before_m + edge_m / 100:
            fault(f"widths[{index}].at_m", f"{at_m:g} is not past the one before, {before_m:g}",
                  f"from tail to nose, {edge_m / 100:g} m or more apart")
        before_m = at_m
