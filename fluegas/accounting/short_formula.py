"""Constants of the short flue-loss formula, for the kinds of fuel that the regulation names."""

from collections.abc import Mapping
from math import nan
from types import MappingProxyType

CONSTANTS: Mapping[str, tuple[float, float]] = MappingProxyType(
    {
        "distillate oil": (0.68, 0.007),
        "plant oil": (0.68, 0.007),
        "natural gas": (0.66, 0.009),
        "coke-oven gas": (0.60, 0.011),
        "liquefied petroleum gas": (0.63, 0.008),
    }
)
"""A [percent] and B [percent/K] of q = (t_flue - t_air)(A/(21 - O2) + B), German 1. BImSchV (2010), annex 2, 3.4.1."""


def short_formula_constants(kind: str | None) -> tuple[float, float]:
    """Return A and B for a `kind` of fuel, NaN where the regulation names none."""
    return CONSTANTS.get(kind or "", (nan, nan))
