"""Liquid and solid fuels: from an analysis in mass percent, on a stated basis, to a Fuel as fired.

The dry analysis and the dry heating value are what a fuel keeps; `with_moisture` wets the same dry fuel anew. Hydrogen
and oxygen exclude those of the moisture. A heating value is on the basis of the analysis it comes with.
"""

from collections.abc import Mapping
from dataclasses import dataclass, replace

import numpy as np
from numpy.typing import ArrayLike

from fluegas.combustion.fuel import ELEMENTS, FUEL_GASES, LIQUID, Fuel, atomic_weights, latent_heat
from fluegas.combustion.gas_fuel import disagreement_caution, sum_cautions
from fluegas.combustion.heating_value import (
    ESTIMATE_NAME,
    ESTIMATE_SCATTER,
    at_constant_pressure,
    estimated_gross_heating_value,
)
from fluegas.errors import AnalysisError, Caution
from fluegas.thermo.polynomials import FloatArray
from fluegas.thermo.species import GAS_CONSTANT, species

AS_FIRED, DRY, DRY_ASH_FREE = "as fired", "dry", "dry ash-free"
SOLID_ELEMENTS = {"carbon": "C", "hydrogen": "H", "oxygen": "O", "nitrogen": "N", "sulfur": "S", "chlorine": "Cl"}
HEAT_CAPACITY = {"liquid": 2000.0, "solid": 1300.0}
"""Heat capacity of dry oil and dry solid fuel [J/(kg K)]; common practice, no source."""
WATER_HEAT_CAPACITY = 4190.0
"""Heat capacity of moisture [J/(kg K)]; common practice, no source."""
DISAGREEMENT = 0.03
"""How far a stated heating value may lie from the estimate: twice the estimate's scatter."""


def solid_fuel(
    fractions: Mapping[str, ArrayLike],
    *,
    analysis_basis: str = AS_FIRED,
    state: str = "solid",
    reference_temperature: float = 298.15,
    gross_heating_value: ArrayLike | None = None,
    net_heating_value: ArrayLike | None = None,
    at_constant_volume: bool = False,
    heat_capacity: ArrayLike | None = None,
) -> Fuel:
    """Return the Fuel of a liquid or solid from mass `fractions`: SOLID_ELEMENTS, "moisture" and "ash".

    `analysis_basis` says what the elements and the heating values refer to: "as fired", "dry" or "dry ash-free".
    Moisture is always the share as fired; ash is on the analysis basis, on "dry ash-free" on the dry basis. Shares of
    the basis are scaled to sum to 1. Heating values in J/kg at `reference_temperature` [K]; gross leads where both are
    given; where none is, it is estimated and a caution says so. `heat_capacity` [J/(kg K)] is that of the dry fuel.

    Raises AnalysisError for an unknown part, a negative share, an empty analysis or a fuel that cannot burn.
    """
    dry = _dry_analysis(fractions, analysis_basis)
    elements = np.zeros((len(ELEMENTS), *dry.organic.shape[1:]))
    weights = atomic_weights()[: len(SOLID_ELEMENTS)].reshape(-1, *(1,) * (dry.organic.ndim - 1))
    elements[: len(SOLID_ELEMENTS)] = dry.organic / weights
    stated, cautions = _gross_of_basis(
        elements,
        dry.wetness / species("H2O").molar_mass,
        dry.ash,
        analysis_basis,
        gross_heating_value,
        net_heating_value,
        at_constant_volume,
        reference_temperature,
    )
    gross, doubts = _held_against_estimate(stated, dry)
    dry_capacity = HEAT_CAPACITY[LIQUID if state == LIQUID else "solid"] if heat_capacity is None else heat_capacity
    fuel = Fuel(
        elements=elements,
        moisture=np.zeros(np.shape(dry.wetness)),
        ash=dry.ash,
        gross_heating_value=gross,
        net_heating_value=gross - latent_heat(elements[1], 0.0, reference_temperature),
        heat_capacity=np.asarray(dry_capacity, dtype=float),
        gases=np.zeros((len(FUEL_GASES), *(1,) * (dry.organic.ndim - 1))),
        reference_temperature=float(reference_temperature),
        cautions=(*sum_cautions(dry.total), *cautions, *doubts),
    )
    if not np.all(fuel.net_heating_value > 0):
        raise AnalysisError("the fuel analysis has nothing that burns")
    return with_moisture(fuel, dry.wetness)


@dataclass(frozen=True)
class _DryAnalysis:
    """Dry shares of SOLID_ELEMENTS, `(6, ...)`, and of ash; moisture as fired; the sum of the analysis as given."""

    organic: FloatArray
    ash: FloatArray
    wetness: FloatArray
    total: FloatArray


def _dry_analysis(fractions: Mapping[str, ArrayLike], basis: str) -> _DryAnalysis:
    shares = _checked(fractions)
    moisture, ash = shares.pop("moisture"), shares.pop("ash")
    organic = np.stack(np.broadcast_arrays(*shares.values()))
    sum_of_elements = organic.sum(axis=0)
    if not np.all(sum_of_elements > 0):
        raise AnalysisError("the fuel analysis is empty; give at least carbon or hydrogen")
    total = sum_of_elements + (0 if basis == DRY_ASH_FREE else ash) + (moisture if basis == AS_FIRED else 0)
    to_dry = _to_dry(basis, total, moisture, ash)
    return _DryAnalysis(
        organic=organic * to_dry,
        ash=np.asarray(ash if basis == DRY_ASH_FREE else ash * to_dry),
        wetness=np.asarray(moisture / total if basis == AS_FIRED else moisture),
        total=np.asarray(total),
    )


def _held_against_estimate(stated: FloatArray | None, dry: _DryAnalysis) -> tuple[FloatArray, tuple[Caution, ...]]:
    """Return the stated gross value, else the estimate, per kg dry, and what is doubtful about it."""
    elements = dict(zip(SOLID_ELEMENTS.values(), dry.organic, strict=True))
    estimate = estimated_gross_heating_value({**elements, "ash": dry.ash})
    if stated is not None:
        origin = f"the estimate of {ESTIMATE_NAME}, dry"
        return stated, disagreement_caution(stated, estimate, origin, DISAGREEMENT)
    least = float(np.min(estimate))
    message = (
        f"no heating value given: {least / 1e6:.4g} MJ/kg dry, gross, estimated from the "
        f"analysis by {ESTIMATE_NAME}, average error {100 * ESTIMATE_SCATTER:.2g} %"
    )
    return estimate, (Caution("heating_value_estimated", message, least, None, f"{ESTIMATE_NAME}, Fuel 81, 1051"),)


def _checked(fractions: Mapping[str, ArrayLike]) -> dict[str, FloatArray]:
    known = (*SOLID_ELEMENTS, "moisture", "ash")
    for name, share in fractions.items():
        if name not in known:
            raise AnalysisError(f"{name} is not a part of a mass analysis; it has {', '.join(known)}")
        if not np.all(np.asarray(share) >= 0):
            raise AnalysisError(f"{name} is {float(np.min(share)):g} in the analysis; a share cannot be negative")
    shares = {name: np.asarray(fractions.get(name, 0.0), dtype=float) for name in known}
    if not np.all(shares["moisture"] < 1):
        raise AnalysisError("moisture is 100 % or more of the fuel as fired; it must stay below")
    return shares


def _to_dry(basis: str, total: FloatArray, moisture: FloatArray, ash: FloatArray) -> FloatArray:
    """Return the factor from a share on the analysis basis to one on the dry basis."""
    if basis == AS_FIRED:
        dry: FloatArray = 1 / (total - moisture)
        return dry
    if basis == DRY:
        return 1 / total
    if basis == DRY_ASH_FREE:
        if not np.all(ash < 1):
            raise AnalysisError("ash is 100 % or more of the dry fuel; it must stay below")
        return (1 - ash) / total
    raise AnalysisError(f"analysis basis {basis!r} is not one of {AS_FIRED}, {DRY}, {DRY_ASH_FREE}")


def _gross_of_basis(
    elements: FloatArray,
    water: FloatArray,
    dry_ash: FloatArray,
    basis: str,
    gross: ArrayLike | None,
    net: ArrayLike | None,
    at_constant_volume: bool,
    reference_temperature: float,
) -> tuple[FloatArray | None, tuple[Caution, ...]]:
    """Return the stated gross value at constant pressure per kg dry (None if none was stated) and cautions."""
    if gross is None and net is None:
        return None, ()
    per_dry = _value_scale(basis, water, dry_ash)
    hydrogen = elements[1]
    moisture = water * per_dry if basis == AS_FIRED else np.zeros(np.shape(water))
    expansion = GAS_CONSTANT * reference_temperature * (hydrogen / 2 + moisture) if at_constant_volume else 0.0
    latent = latent_heat(hydrogen, moisture, reference_temperature) - expansion
    from_net = None if net is None else np.asarray(net, dtype=float) * per_dry + latent
    from_gross = None if gross is None else np.asarray(gross, dtype=float) * per_dry
    cautions: tuple[Caution, ...] = ()
    if from_gross is not None and from_net is not None:
        cautions = disagreement_caution(from_gross, from_net, "the net value plus the latent heat, dry", 0.005)
    value = from_gross if from_gross is not None else from_net
    if value is not None and at_constant_volume:
        value = at_constant_pressure(value, hydrogen, elements[2], elements[3], reference_temperature)
    return value, cautions


def _value_scale(basis: str, water: FloatArray, dry_ash: FloatArray) -> FloatArray:
    """Return kilograms of the analysis basis per kilogram dry."""
    if basis == AS_FIRED:
        scale: FloatArray = 1 / (1 - water * species("H2O").molar_mass)
        return scale
    return 1 - dry_ash if basis == DRY_ASH_FREE else np.ones(np.shape(dry_ash))


def with_moisture(fuel: Fuel, moisture: ArrayLike) -> Fuel:
    """Return the same dry liquid or solid fuel with another `moisture`, kg/kg as fired.

    The dry analysis, the dry heating value and the dry heat capacity are kept.

    Raises AnalysisError if moisture is negative or reaches 1.
    """
    new = np.asarray(moisture, dtype=float)
    if not np.all((new >= 0) & (new < 1)):
        raise AnalysisError("moisture must be at least 0 and below 100 % of the fuel as fired")
    molar_mass = species("H2O").molar_mass
    old = fuel.moisture * molar_mass
    scale = (1 - new) / (1 - old)
    missing_axes = max(scale.ndim + 1 - fuel.elements.ndim, 0)
    elements = fuel.elements.reshape(len(ELEMENTS), *(1,) * missing_axes, *fuel.elements.shape[1:]) * scale
    gross = fuel.gross_heating_value * scale
    water = new / molar_mass
    dry_capacity = (fuel.heat_capacity - WATER_HEAT_CAPACITY * old) / (1 - old)
    return replace(
        fuel,
        elements=elements,
        moisture=water,
        ash=fuel.ash * scale,
        gross_heating_value=gross,
        net_heating_value=gross - latent_heat(elements[1], water, fuel.reference_temperature),
        heat_capacity=dry_capacity * (1 - new) + WATER_HEAT_CAPACITY * new,
    )


def unburned_carbon_share(fuel: Fuel, ash_shares: ArrayLike, carbon_contents: ArrayLike) -> FloatArray:
    """Return the share of the fuel's carbon that leaves in the ash streams, u.

    u m_C = A sum_k x_k c_k/(1 - c_k): `ash_shares` x_k are shares of the ash, `carbon_contents` c_k mass fractions of
    carbon in each stream's residue; streams on the first axis, shape `(n, ...)`.

    Raises AnalysisError if a stream is all carbon or more carbon would leave than the fuel has.
    """
    x, c = np.asarray(ash_shares, dtype=float), np.asarray(carbon_contents, dtype=float)
    if not np.all((c >= 0) & (c < 1)):
        raise AnalysisError("the carbon in an ash stream must be at least 0 and below 100 %")
    carbon = fuel.element("C") * atomic_weights()[0]
    share: FloatArray = fuel.ash * (x * c / (1 - c)).sum(axis=0) / carbon
    if not np.all(share < 1):
        raise AnalysisError("the ash streams would carry more carbon than the fuel has; check ash, shares and carbon")
    return share
