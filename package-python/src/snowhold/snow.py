"""Snow by the hand hardness test, and what an edge and a body meet in it.

The six classes are those of the hand hardness test in [1]. What each feels like is turned into
numbers that stay inside published ranges; the mapping itself is *assumed*, chosen so that an
80 kg rider on 1.2 m of edge holds to about the lean that common practice expects on such snow
(no source).

References
----------
[1] C. Fierz et al., The International Classification for Seasonal Snow on the Ground,
    UNESCO-IHP / IACS, 2009.
[2] M. Mössner, G. Innerhofer, K. Schindelwig, P. Kaps, H. Schretter, W. Nachbauer, Measurement of
    mechanical properties of snow for simulation of skiing, J. Glaciology 59 (2013). Hardness
    0.04 to 90 N/mm³; failure shear stress from 0.04 to 0.50 N/mm² (the upper figure from memory).
[3] F. Wolfsperger, F. Meyer, M. Gilgien, The Snow-Friction of Freestyle Skis and Snowboards…,
    Front. Mech. Eng. 7 (2021) 728722. Snowboards 0.026 ± 0.008 to 0.143 ± 0.017.
"""

from __future__ import annotations

from dataclasses import dataclass

from snowhold.constants import GROOMED_ROUGHNESS_M


@dataclass(frozen=True)
class Span:
    """A value and the range it may lie in."""

    value: float
    low: float
    high: float

    def scaled(self, factor: float) -> Span:
        """The same span in another unit."""
        return Span(self.value * factor, self.low * factor, self.high * factor)


@dataclass(frozen=True)
class Snow:
    """One class of snow.

    ``hardness_npm3`` H_V: force that a volume of pressed-in edge meets, N/m³.
    ``shear_strength_pa`` S_f: shear stress at which the groove wall fails, Pa.
    ``glide_friction`` μ: sliding friction of the base, dimensionless.
    ``roughness_m`` r: height of the surface's bumps, m: 10 mm on groomed snow, more on chop, all
    assumed.
    """

    code: str
    name: str
    hardness_npm3: Span
    shear_strength_pa: Span
    glide_friction: Span
    roughness_m: float


def _snow(code: str, name: str, hardness_npmm3: tuple[float, float, float],
          shear_npmm2: tuple[float, float, float], glide: tuple[float, float, float],
          roughness_m: float = GROOMED_ROUGHNESS_M) -> Snow:
    return Snow(code, name, Span(*hardness_npmm3).scaled(1e9), Span(*shear_npmm2).scaled(1e6),
                Span(*glide), roughness_m)


# Each triple is value, lowest, highest, in N/mm³, N/mm² and 1: assumed, inside the ranges of
# [2] and [3].
SNOWS = {
    snow.code: snow
    for snow in (
        _snow("F", "fresh, unpacked", (0.04, 0.04, 0.06), (0.04, 0.04, 0.08), (0.10, 0.06, 0.14)),
        _snow("4F", "soft, chopped, slush", (0.05, 0.04, 0.08), (0.10, 0.06, 0.16),
              (0.07, 0.04, 0.14), roughness_m=0.025),
        _snow("1F", "soft groomed", (0.06, 0.04, 0.12), (0.20, 0.12, 0.28), (0.05, 0.03, 0.08)),
        _snow("P", "firm groomed", (0.12, 0.06, 0.30), (0.30, 0.20, 0.40), (0.04, 0.026, 0.06)),
        _snow("K", "hard, scraped", (0.70, 0.30, 2.0), (0.45, 0.35, 0.50), (0.03, 0.026, 0.05)),
        _snow("I", "ice", (2.5, 1.0, 90.0), (0.50, 0.40, 0.50), (0.03, 0.026, 0.05)),
    )
}
"""The six classes by their code, softest first."""
