"""What a setting saves against another at equal useful heat: fuel, heat, money, carbon dioxide.

Arrays run over settings on the first axis, `(n, ...)`. Savings are in sequence: two settings compared with the same one
are not to be summed.
"""

from collections.abc import Sequence
from dataclasses import dataclass

import numpy as np

from fluegas.thermo.polynomials import FloatArray


@dataclass(frozen=True)
class Comparison:
    """Changes against the compared setting, negative for a saving; zeros where a setting is compared with itself.

    fuel: relative change of heat input on the file's basis; fuel_gross, fuel_net: on either. heat: J/a. cost:
    currency/a. carbon_dioxide: fossil, kg/a. NaN where what is needed was not given.
    """

    compared_with: tuple[int, ...]
    fuel: FloatArray
    fuel_gross: FloatArray
    fuel_net: FloatArray
    heat: FloatArray
    cost: FloatArray
    carbon_dioxide: FloatArray


@dataclass(frozen=True)
class AnnualUse:
    """Heat input of the settings [J/a] on the file's basis and what it costs.

    heat: of the compared settings, shape `(n, ...)`, NaN where not known. price: currency/J. carbon_dioxide: kg/J.
    """

    heat: FloatArray
    price: FloatArray
    carbon_dioxide: FloatArray


def compare(
    efficiency: FloatArray,
    efficiency_gross: FloatArray,
    efficiency_net: FloatArray,
    compared_with: Sequence[int],
    annual: AnnualUse,
) -> Comparison:
    """Return each setting's changes at equal useful heat: heat inputs go as eta_compared/eta.

    `efficiency` is on the file's basis, like the annual heat and price.
    """
    other = list(compared_with)
    itself = np.array([place == index for place, index in enumerate(other)]).reshape(-1, *(1,) * (efficiency.ndim - 1))

    def change(eta: FloatArray) -> FloatArray:
        """Without useful heat on either side there is nothing to compare."""
        useful = (eta > 0) & (eta[other] > 0)
        return np.where(itself, 0.0, np.where(useful, eta[other] / np.where(useful, eta, 1.0) - 1.0, np.nan))

    before = annual.heat[other]
    fuel = change(efficiency)
    after = before * (1.0 + fuel)

    def difference(factor: FloatArray) -> FloatArray:
        return np.where(itself, 0.0, after * factor - before * factor[other])

    return Comparison(
        compared_with=tuple(other),
        fuel=fuel,
        fuel_gross=change(efficiency_gross),
        fuel_net=change(efficiency_net),
        heat=np.where(itself, 0.0, before * fuel),
        cost=difference(annual.price),
        carbon_dioxide=difference(annual.carbon_dioxide),
    )
