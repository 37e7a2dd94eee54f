"""Every figure of the account, declared once: its name, label, dimension, group, help, source and formula.

Names are dotted as the JSON output nests them: "losses.gross.dry_gas", "dew_point.water". Tables, help and the account
itself take what they need from here.
"""

from collections.abc import Callable, Mapping
from functools import cache
from types import MappingProxyType

import numpy as np

from fluegas.accounting import beside
from fluegas.accounting.air_density import air_density_figures
from fluegas.accounting.emission_figures import emission_figures
from fluegas.accounting.figure import BESIDE, HEAT_ACCOUNT, LIMITS, MIXTURE, Figure
from fluegas.accounting.inputs import BASES
from fluegas.accounting.terms import Terms
from fluegas.combustion.air import dry_air_molar_mass
from fluegas.combustion.product_gas import DRY_FLUE_GASES, FLUE_GASES
from fluegas.thermo.polynomials import FloatArray
from fluegas.thermo.species import atomic_weight, species

LOSS_LABELS: Mapping[str, tuple[str, str]] = MappingProxyType(
    {
        "dry_gas": ("Dry flue gas", "Sensible heat of the dry flue gas above the reference temperature."),
        "fuel_water": (
            "Water from fuel",
            "Heat of the water from hydrogen and moisture; with its heat of evaporation on the gross basis.",
        ),
        "air_moisture": ("Moisture in air", "Sensible heat of the water vapour that came with the air."),
        "condensation": ("Condensation", "Heat given back by water condensing below its dew point; negative."),
        "carbon_monoxide": ("Carbon monoxide", "Heat of combustion of the CO in the flue gas."),
        "hydrogen": ("Hydrogen", "Heat of combustion of the H2 in the flue gas."),
        "methane": ("Methane", "Heat of combustion of the CH4 in the flue gas."),
        "unburned_carbon": ("Carbon in ash", "Heat of combustion of the carbon left in the ash, 33.7 MJ/kg."),
        "surface": ("Surface", "Radiation and convection from the unit's surface; the same heat at equal useful heat."),
        "other": ("Other losses", "Losses stated in percent of the heat input."),
    }
)
CREDIT_LABELS: Mapping[str, tuple[str, str]] = MappingProxyType(
    {
        "air": ("Air heat", "Sensible heat of the dry air above the reference temperature, where it enters."),
        "air_moisture": ("Air moisture heat", "Sensible heat of the water vapour in the air, where it enters."),
        "fuel": ("Fuel heat", "Sensible heat of the fuel above the reference temperature."),
    }
)
LOSSES = tuple(LOSS_LABELS)
_ACCOUNT = "heat account over species data of NASA/TP-2002-211556"
_BALANCE = "element balances, exact"


@cache
def figures() -> Mapping[str, Figure]:
    """Return every figure by name, in the order of tables."""
    account = (*_mixture(), *_shares(), *_losses(), *_credits(), *_efficiency(), *_beside())
    every = (*account, *air_density_figures(), *emission_figures())
    return MappingProxyType({figure.name: figure for figure in every})


def _share(amount: FloatArray, whole: FloatArray) -> FloatArray:
    """Return amount/whole; a gas that is nowhere stays one zero, so that no array is filled with it."""
    nowhere = amount.size == 1 and not np.any(amount) and bool(np.all(whole > 0))
    return amount if nowhere else amount / whole


def _air_per_fuel(terms: Terms) -> FloatArray:
    return terms.gas.dry_air * dry_air_molar_mass(terms.data.air.oxygen)


def _flue_gas_per_fuel(terms: Terms) -> FloatArray:
    fuel, carbon = terms.data.fuel, terms.gas.fuel.element("C") - terms.gas.burned_carbon
    from_fuel = 1.0 - fuel.ash - carbon * atomic_weight("C")
    return from_fuel + _air_per_fuel(terms) + terms.gas.water_from_air * species("H2O").molar_mass


def _mixture() -> list[Figure]:
    return [
        Figure(
            "excess_air",
            "Excess air",
            "fraction",
            MIXTURE,
            "Dry air supplied over the air that just burns what burns, less 1.",
            _BALANCE,
            lambda terms: terms.gas.excess_air,
            True,
        ),
        Figure(
            "air_ratio",
            "Air ratio",
            "ratio",
            MIXTURE,
            "Dry air supplied over the theoretical air.",
            _BALANCE,
            lambda terms: 1.0 + terms.gas.excess_air,
            True,
        ),
        Figure(
            "air_per_fuel",
            "Dry air per fuel",
            "mass_ratio",
            MIXTURE,
            "Mass of dry air per mass of fuel as fired.",
            _BALANCE,
            _air_per_fuel,
            True,
        ),
        Figure(
            "flue_gas_per_fuel",
            "Flue gas per fuel",
            "mass_ratio",
            MIXTURE,
            "Mass of wet flue gas, condensate included, per mass of fuel as fired.",
            _BALANCE,
            _flue_gas_per_fuel,
        ),
    ]


def _shares() -> list[Figure]:
    def dry_share(gas: str) -> Callable[[Terms], FloatArray]:
        return lambda terms: _share(terms.gas.amount(gas), terms.gas.dry_flue_gas)

    def wet_share(gas: str) -> Callable[[Terms], FloatArray]:
        return lambda terms: _share(terms.gas.amount(gas), terms.gas.wet_flue_gas)

    found = []
    for basis, gases, share in (("dry", DRY_FLUE_GASES, dry_share), ("wet", FLUE_GASES, wet_share)):
        for gas in gases:
            name = f"flue_gas.{basis}.{gas}"
            text = f"Mole fraction of {species(gas).name} in the {basis} flue gas."
            found.append(Figure(name, f"{gas}, {basis}", "fraction", MIXTURE, text, _BALANCE, share(gas)))
    return found


def _losses() -> list[Figure]:
    def loss(name: str, basis: str) -> Callable[[Terms], FloatArray]:
        return lambda terms: terms.loss(name, basis)

    return [
        Figure(f"losses.{basis}.{name}", label, "fraction", HEAT_ACCOUNT, text, _ACCOUNT, loss(name, basis))
        for basis in BASES
        for name, (label, text) in LOSS_LABELS.items()
    ]


def _credits() -> list[Figure]:
    def credit(name: str, basis: str) -> Callable[[Terms], FloatArray]:
        return lambda terms: terms.credit(name, basis)

    return [
        Figure(f"credits.{basis}.{name}", label, "fraction", HEAT_ACCOUNT, text, _ACCOUNT, credit(name, basis))
        for basis in BASES
        for name, (label, text) in CREDIT_LABELS.items()
    ]


def _efficiency() -> list[Figure]:
    def efficiency(basis: str) -> Callable[[Terms], FloatArray]:
        return lambda terms: terms.efficiency(basis)

    def all_input(basis: str) -> Callable[[Terms], FloatArray]:
        return lambda terms: terms.efficiency_all_input(basis)

    found = []
    for basis in BASES:
        text = f"Useful heat over the fuel's {basis} heat: 1 - losses + credits."
        source = "fuel efficiency as ASME PTC 4 defines it"
        found.append(
            Figure(f"efficiency.{basis}", "Useful heat", "fraction", HEAT_ACCOUNT, text, source, efficiency(basis))
        )
    for basis in BASES:
        text = f"Useful heat over the fuel's {basis} heat and the credits."
        name, label, source = f"efficiency_all_input.{basis}", "Useful of all input", "as EN 12952-15 divides"
        found.append(Figure(name, label, "fraction", HEAT_ACCOUNT, text, source, all_input(basis)))
    return found


def _beside() -> list[Figure]:
    def available(basis: str) -> Callable[[Terms], FloatArray]:
        return lambda terms: beside.available_heat(terms, basis)

    text = "Heat of the wet flue gas from air to flue temperature over the net value; no latent heat."
    found = [
        Figure(
            "stack_loss_from_air.rigorous",
            "Stack loss from air",
            "fraction",
            BESIDE,
            text,
            _ACCOUNT,
            beside.stack_loss_from_air,
        ),
        Figure(
            "stack_loss_from_air.short_formula",
            "  by short formula",
            "fraction",
            BESIDE,
            "The same by the short formula, for the fuel kinds that it names.",
            "German 1. BImSchV (2010), annex 2, no. 3.4.1",
            beside.short_formula,
        ),
    ]
    text = "Heat left to the furnace above the chamber temperature, credits at the burner, no surface loss."
    for basis in BASES:
        name = f"available_heat.{basis}"
        found.append(Figure(name, "Available heat", "fraction", BESIDE, text, _ACCOUNT, available(basis)))
    text = "Adiabatic flame temperature of complete combustion, no dissociation."
    name, label = "flame_temperature.complete", "Flame, complete"
    found.append(Figure(name, label, "temperature", BESIDE, text, _ACCOUNT, beside.flame_temperature))
    text = "Temperature below which water condenses from the flue gas."
    source = "IAPWS R7-97, region 4"
    name, label = "dew_point.water", "Water dew point"
    found.append(Figure(name, label, "temperature", LIMITS, text, source, beside.dew_point_of_water))
    text = "Temperature below which sulfuric acid condenses, +-5 K; metal may be colder than the gas."
    source = "Verhoff and Banchero (1974) unless another is named"
    name, label = "dew_point.acid", "Acid dew point +-5 K"
    found.append(Figure(name, label, "temperature", LIMITS, text, source, beside.dew_point_of_acid))
    return found
