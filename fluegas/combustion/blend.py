"""Co-firing: several fuels burnt together as one Fuel, everything per kilogram weighted by mass.

Element amounts, moisture, ash, heating values, heat capacity and gases are amounts or heats for each kilogram, so the
blend's are the sums of the parts'. Gross less net stays the latent heat of the blend's water, since that is linear too.
"""

from collections.abc import Sequence
from dataclasses import replace

import numpy as np
from numpy.typing import ArrayLike

from fluegas.combustion.fuel import Fuel
from fluegas.errors import InputError
from fluegas.thermo.polynomials import FloatArray


def blend(fuels: Sequence[Fuel], mass_shares: ArrayLike) -> Fuel:
    """Return the Fuel that `fuels` make together, each with its share of the mass as fired.

    `mass_shares` has the fuels on its first axis, shape `(n, ...)`, and sums to 1 over it; the states behind broadcast
    against those of the fuels. The cautions of all parts come along.

    Raises InputError if there is no fuel, if the shares do not fit or if the reference temperatures differ.
    """
    shares = checked_shares(fuels, mass_shares)
    references = {fuel.reference_temperature for fuel in fuels}
    if len(references) != 1:
        raise InputError(f"fuels to be blended must share one reference temperature, not {sorted(references)}")

    def together(parts: Sequence[FloatArray], leading: int = 0) -> FloatArray:
        padded = [_padded(np.asarray(part), shares.ndim - 1, leading) for part in parts]
        return np.asarray(sum(share * part for share, part in zip(shares, padded, strict=True)))

    return replace(
        fuels[0],
        elements=together([fuel.elements for fuel in fuels], 1),
        moisture=together([fuel.moisture for fuel in fuels]),
        ash=together([fuel.ash for fuel in fuels]),
        gross_heating_value=together([fuel.gross_heating_value for fuel in fuels]),
        net_heating_value=together([fuel.net_heating_value for fuel in fuels]),
        heat_capacity=together([fuel.heat_capacity for fuel in fuels]),
        gases=together([fuel.gases for fuel in fuels], 1),
        cautions=tuple(dict.fromkeys(caution for fuel in fuels for caution in fuel.cautions)),
    )


def _padded(part: FloatArray, states: int, leading: int) -> FloatArray:
    """Return `part` with enough state axes behind its `leading` ones to meet shares of `states` axes."""
    missing = max(states - (part.ndim - leading), 0)
    return part.reshape((*part.shape[:leading], *(1,) * missing, *part.shape[leading:]))


def mass_shares_of_heat(heating_values: ArrayLike, heat_shares: ArrayLike) -> FloatArray:
    """Return shares of the mass from shares of the heat, both of shape `(n, ...)`, the fuels on the first axis.

    `heating_values` [J/kg as fired] are those of the basis that the heat is counted on.

    Raises InputError if a heating value is not above zero.
    """
    values, shares = np.asarray(heating_values, dtype=float), np.asarray(heat_shares, dtype=float)
    if not np.all(values > 0):
        raise InputError(f"a share of the heat needs a heating value above zero, not {float(np.min(values)):g} J/kg")
    mass = shares / values
    shared: FloatArray = mass / mass.sum(axis=0)
    return shared


def heat_shares_of_mass(heating_values: ArrayLike, mass_shares: ArrayLike) -> FloatArray:
    """Return shares of the heat from shares of the mass, both of shape `(n, ...)`, the fuels on the first axis."""
    heat = np.asarray(heating_values, dtype=float) * np.asarray(mass_shares, dtype=float)
    shared: FloatArray = heat / heat.sum(axis=0)
    return shared


def checked_shares(fuels: Sequence[Fuel], shares: ArrayLike) -> FloatArray:
    """Return `shares` as an array. Raises InputError unless there is one for each fuel, none negative, sum 1."""
    array = np.asarray(shares, dtype=float)
    if not fuels or array.ndim == 0 or len(array) != len(fuels):
        raise InputError(f"a blend needs a share for each of its fuels; there are {len(fuels)} fuels")
    if not np.all(array >= 0):
        raise InputError(f"a share of a blend is {float(np.min(array)):g}; it must be at least 0")
    total = array.sum(axis=0)
    if not np.allclose(total, 1.0, rtol=0, atol=1e-9):
        worst = float(np.asarray(total).flat[np.argmax(np.abs(np.asarray(total) - 1))])
        raise InputError(f"the shares of a blend sum to {worst:g}; they must sum to 1")
    return array
