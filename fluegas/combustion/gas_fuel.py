"""Gas fuels: from an analysis in mole percent to a Fuel."""

from collections.abc import Mapping

import numpy as np
from numpy.typing import ArrayLike

from fluegas.combustion.fuel import ELEMENTS, FUEL_GASES, Fuel, fuel_gases, latent_heat
from fluegas.combustion.heating_value import molar_heating_values
from fluegas.errors import AnalysisError, Caution
from fluegas.thermo.polynomials import FloatArray
from fluegas.thermo.species import species, symbol_of

SUM_TOLERANCE = 0.005
"""How far an analysis may sum from 1 before it is cautioned."""
DISAGREEMENT = 0.01
"""How far a stated heating value may lie from that of the analysis without a caution; common practice, no source."""


def gas_amounts(fractions: Mapping[str, ArrayLike]) -> FloatArray:
    """Return amounts of FUEL_GASES, shape `(35, ...)`, from a mapping of plain names or symbols to mole fractions.

    Raises AnalysisError for a gas that a fuel gas cannot have, a negative share or an empty analysis.
    """
    shape = np.broadcast_shapes(*(np.shape(share) for share in fractions.values()))
    amounts = np.zeros((len(FUEL_GASES), *shape))
    for name, share in fractions.items():
        symbol = name if name in FUEL_GASES else symbol_of(name)
        if symbol not in FUEL_GASES:
            raise AnalysisError(f"{name} is not among the gases that a fuel gas may contain")
        if np.any(np.asarray(share) < 0):
            raise AnalysisError(f"{name} is {float(np.min(share)):g} in the analysis; a share cannot be negative")
        amounts[FUEL_GASES.index(symbol)] += share
    if not np.all(amounts.sum(axis=0) > 0):
        raise AnalysisError("the gas analysis is empty; give at least one gas")
    return amounts


def element_matrix() -> FloatArray:
    """Return atoms of ELEMENTS in each of FUEL_GASES, shape `(8, 35)`, water vapour counted as moisture, not here."""
    counts = [[species(gas).elements.get(element, 0) for gas in FUEL_GASES] for element in ELEMENTS]
    matrix = np.array(counts, dtype=float)
    matrix[:, FUEL_GASES.index("H2O")] = 0.0
    return matrix


def gas_fuel(
    fractions: Mapping[str, ArrayLike],
    *,
    reference_temperature: float = 298.15,
    gross_heating_value: ArrayLike | None = None,
    net_heating_value: ArrayLike | None = None,
) -> Fuel:
    """Return the Fuel of a gas from its mole `fractions` (plain names or symbols), normalised to sum to 1.

    Heating values are those of ideal gases from enthalpies of formation at `reference_temperature` [K], unless a gross
    or net value [J/kg] is given; then gross leads, and a disagreement with the analysis above 1 % is a caution.

    Raises AnalysisError for an impossible analysis or one that cannot burn.
    """
    shares = gas_amounts(fractions)
    total = shares.sum(axis=0)
    cautions = sum_cautions(total)
    gases = fuel_gases()
    amounts = shares / (np.tensordot(gases.molar_mass, shares, 1))
    elements = np.tensordot(element_matrix(), amounts, 1)
    moisture = amounts[FUEL_GASES.index("H2O")]
    molar_gross, _ = molar_heating_values(gases.symbols, reference_temperature)
    computed = np.tensordot(molar_gross, amounts, 1)
    latent = latent_heat(elements[1], moisture, reference_temperature)
    if not np.all(computed - latent > 0):
        raise AnalysisError("the gas analysis has nothing that burns")
    gross = computed
    if gross_heating_value is not None:
        gross = np.asarray(gross_heating_value, dtype=float)
    elif net_heating_value is not None:
        gross = np.asarray(net_heating_value, dtype=float) + latent
    if gross is not computed:
        cautions += disagreement_caution(gross, computed, "the analysis, from enthalpies of formation", DISAGREEMENT)
    if gross_heating_value is not None and net_heating_value is not None:
        cautions += disagreement_caution(
            np.asarray(net_heating_value, dtype=float), gross - latent, "the gross value less the latent heat", 0.005
        )
    zero = np.zeros(np.shape(moisture))
    return Fuel(
        elements=elements,
        moisture=moisture,
        ash=zero,
        gross_heating_value=gross,
        net_heating_value=gross - latent,
        heat_capacity=zero,
        gases=amounts,
        reference_temperature=float(reference_temperature),
        cautions=cautions,
    )


def sum_cautions(total: FloatArray) -> tuple[Caution, ...]:
    """Return a caution if an analysis sums to something else than 1, by more than half a percent."""
    worst = float(np.asarray(total).flat[np.argmax(np.abs(np.asarray(total) - 1))])
    if abs(worst - 1) <= SUM_TOLERANCE:
        return ()
    message = f"the fuel analysis sums to {100 * worst:.4g} %, not 100 %; it was scaled to 100 %"
    return (
        Caution("analysis_sum", message, worst, 1.0, "normalised as ISO 6976 asks; limit: common practice, no source"),
    )


def disagreement_caution(given: FloatArray, expected: FloatArray, origin: str, tolerance: float) -> tuple[Caution, ...]:
    """Return a caution if a stated heating value and an expected one [J/kg] differ by more than `tolerance`."""
    ratio = np.asarray(given / expected)
    worst = float(ratio.flat[np.argmax(np.abs(ratio - 1))])
    if abs(worst - 1) <= tolerance:
        return ()
    stated, other = float(np.asarray(given).flat[0]) / 1e6, float(np.asarray(expected).flat[0]) / 1e6
    message = (
        f"the stated heating value, {stated:.4g} MJ/kg, is {100 * (worst - 1):+.2g} % off that of {origin}, "
        f"{other:.4g} MJ/kg; the stated one was used"
    )
    return (Caution("heating_value_disagrees", message, worst - 1, tolerance, "limit: common practice, no source"),)
