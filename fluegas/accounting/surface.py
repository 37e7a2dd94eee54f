"""Surface loss: radiation and convection, stated as a share or estimated from the rated output."""

from collections.abc import Mapping
from types import MappingProxyType

from fluegas.errors import Caution, InputError

SOURCE = "form of EN 12952-15, constants from memory"
SMALLEST = 1e6
"""Rated output [W] below which the estimate is outside its field."""

OIL_AND_GAS, HARD_COAL, LIGNITE = 0.0113, 0.022, 0.0315
CONSTANTS: Mapping[str, float] = MappingProxyType(
    {
        **dict.fromkeys(("natural gas", "liquefied petroleum gas", "propane", "butane", "coke-oven gas"), OIL_AND_GAS),
        **dict.fromkeys(("biogas", "distillate oil", "residual oil", "plant oil"), OIL_AND_GAS),
        **dict.fromkeys(("anthracite", "bituminous coal"), HARD_COAL),
        "lignite": LIGNITE,
    }
)
"""Constant of the estimate by kind of fuel."""
_BY_STATE = {"gas": OIL_AND_GAS, "liquid": OIL_AND_GAS, "solid": LIGNITE}


def estimated_surface_heat(rated_output: float, kind: str | None, state: str) -> tuple[float, tuple[Caution, ...]]:
    """Return the surface heat [W] of a boiler of `rated_output` [W useful heat] and cautions about the estimate.

    Q_RC = C Q_N^0.7 with both in MW (EN 12952-15; from memory): C = 0.0113 for oil and gas, 0.022 for hard coal, 0.0315
    for lignite. A solid fuel of another `kind` takes the largest constant, with a caution.

    Raises InputError if the rated output is not above zero.
    """
    if not rated_output > 0:
        raise InputError("the surface loss can be estimated only from a rated output above zero")
    cautions: tuple[Caution, ...] = ()
    constant = CONSTANTS.get(kind or "", _BY_STATE[state])
    if kind not in CONSTANTS and state == "solid":
        message = "the surface estimate has no constant for this solid fuel; that of lignite, the largest, was taken"
        cautions += (Caution("surface_estimate_constant", message, constant, None, SOURCE),)
    if rated_output < SMALLEST:
        message = "the surface estimate is made for boilers of 1 MW and more; state the surface loss if it is known"
        cautions += (Caution("surface_estimate_small", message, rated_output, SMALLEST, SOURCE),)
    return constant * (rated_output * 1e-6) ** 0.7 * 1e6, cautions
