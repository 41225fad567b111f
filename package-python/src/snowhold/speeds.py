"""Speeds that people ride, as published.

References
----------
[1] L. L. Stepan et al., Skier and snowboarder speeds at US ski areas, JSAMS Plus (2023): 4164
    observations on groomed trails; snowboarders 33.0 ± 13.2 km/h; beginner 19.9 ± 7.2,
    intermediate 32.4 ± 9.9, advanced 44.5 ± 11.7 km/h (skiers and snowboarders together).
[2] J. E. Shealy et al., J. ASTM Int. 2 (2005): 38.9 km/h on average for snowboarders on
    intermediate slopes of 16 to 20°.
"""

from __future__ import annotations

from dataclasses import dataclass

_KMH_MPS = 1 / 3.6

STEPAN = ("L. L. Stepan et al., Skier and snowboarder speeds at US ski areas, JSAMS Plus (2023), "
          "4164 observations on groomed trails")
SHEALY = "J. E. Shealy et al., J. ASTM Int. 2 (2005), slopes of 16 to 20°"


@dataclass(frozen=True)
class Speed:
    """A published speed: mean and standard deviation over people (None: not given), m/s."""

    who: str
    mean_mps: float
    spread_mps: float | None
    source: str


SPEEDS = {
    speed.who: speed
    for speed in (
        Speed("beginner", 19.9 * _KMH_MPS, 7.2 * _KMH_MPS,
              f"{STEPAN}; skiers and snowboarders together"),
        Speed("intermediate", 32.4 * _KMH_MPS, 9.9 * _KMH_MPS,
              f"{STEPAN}; skiers and snowboarders together"),
        Speed("advanced", 44.5 * _KMH_MPS, 11.7 * _KMH_MPS,
              f"{STEPAN}; skiers and snowboarders together"),
        Speed("snowboarders", 33.0 * _KMH_MPS, 13.2 * _KMH_MPS, STEPAN),
        Speed("snowboarders_intermediate_slope", 38.9 * _KMH_MPS, None, SHEALY),
    )
}
"""Published speeds [1, 2] by whose they are."""
