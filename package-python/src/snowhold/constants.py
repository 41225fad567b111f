"""Constants that every piece of physics shares, each with its origin."""

G0_MPS2 = 9.80665
"""Standard gravity, m/s². Third General Conference on Weights and Measures (CGPM), 1901."""

HOLDS_MARGIN = 0.15
"""Grip margin from which an edge is said to hold rather than to be marginal. Assumed."""

AVALANCHE_PITCH_DEG = 30.0
"""Pitch from which the app points to the avalanche bulletin. Slab avalanches are released mostly
from about 30° up: common practice, no source."""

GROOMED_ROUGHNESS_M = 0.010
"""Height r of the bumps of a groomed surface, m. Assumed."""
