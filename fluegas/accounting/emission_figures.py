"""The figures of emissions, declared once."""

from collections.abc import Callable

import numpy as np

from fluegas.accounting import emissions
from fluegas.accounting.figure import EMISSIONS, Figure
from fluegas.accounting.inputs import BASES
from fluegas.accounting.terms import Terms
from fluegas.thermo.polynomials import FloatArray

LABELS = {"co": "CO", "no": "NO", "no2": "NO2", "nox": "NOx", "so2": "SO2"}
_BALANCE = "element balances, exact"
_READING = "reading, dry"
_NORMAL = "ideal gas at 0 degC and 101.325 kPa"
_REFERENCE = "dilution with the oxidant; Directive 2010/75/EU, annex VI part 3, has 21 % for its oxygen"
_ORIGIN = {
    "nox": " Counted as NO2; NO + NO2 where NOx itself was not read.",
    "so2": " From the fuel's sulfur where it was not read.",
}


def emission_figures() -> list[Figure]:
    """Return the figures of emissions in the order of tables."""
    found = [*_carbon_dioxide()]
    text = "Oxygen in the dry gas that limits refer to."
    name, label = "emissions.reference_oxygen", "Reference O2"
    source = "as stated, else Directive 2010/75/EU, annex V"
    found.append(Figure(name, label, "fraction", EMISSIONS, text, source, _reference_oxygen, True))
    for pollutant in LABELS:
        found += _pollutant(pollutant)
        if pollutant == "co":
            text = "CO in the dry flue gas without excess air, its share times x/(x - O2)."
            name, formula = "emissions.co.air_free", emissions.air_free_carbon_monoxide
            found.append(Figure(name, "CO, air-free", "trace_fraction", EMISSIONS, text, _REFERENCE, formula))
    return found


def _reference_oxygen(terms: Terms) -> FloatArray:
    return np.asarray(terms.data.reference_oxygen)


def _carbon_dioxide() -> list[Figure]:
    def per_input(mass: Callable[[Terms], FloatArray], basis: str) -> Callable[[Terms], FloatArray]:
        return lambda terms: mass(terms) / terms.heating_value(basis)

    def per_useful(mass: Callable[[Terms], FloatArray]) -> Callable[[Terms], FloatArray]:
        return lambda terms: mass(terms) / terms.useful_heat

    dimension, found = "emission_per_energy", []
    for stem, label, useful_label, what, mass in (
        ("co2", "Fossil CO2 per input", "Fossil CO2, useful", "Fossil CO2", emissions.fossil_carbon_dioxide),
        (
            "all_co2",
            "All CO2 per input",
            "All CO2, useful",
            "CO2, biogenic CO2 included,",
            emissions.carbon_dioxide,
        ),
    ):
        for basis in BASES:
            name, text = f"emissions.{stem}_per_input.{basis}", f"{what} per {basis} heat input."
            formula = per_input(mass, basis)
            found.append(Figure(name, label, dimension, EMISSIONS, text, _BALANCE, formula, True))
        name, text = f"emissions.{stem}_per_useful", f"{what} per useful heat."
        found.append(Figure(name, useful_label, dimension, EMISSIONS, text, _BALANCE, per_useful(mass)))
    return found


def _pollutant(pollutant: str) -> list[Figure]:
    label, origin = LABELS[pollutant], _ORIGIN.get(pollutant, "")

    def share(terms: Terms) -> FloatArray:
        return emissions.dry_share(terms, pollutant)

    def share_at_reference(terms: Terms) -> FloatArray:
        return emissions.scaled(share(terms), lambda: emissions.to_reference_oxygen(terms))

    def concentration(terms: Terms) -> FloatArray:
        return emissions.concentration(share(terms), pollutant)

    def at_reference(terms: Terms) -> FloatArray:
        return emissions.concentration(share_at_reference(terms), pollutant)

    rows = (
        ("dry", f"{label} share", "trace_fraction", f"Mole fraction of {label} in the dry flue gas.", _READING, share),
        (
            "dry_at_reference_oxygen",
            f"{label} share, ref. O2",
            "trace_fraction",
            f"Mole fraction of {label} in the dry flue gas at the reference oxygen.",
            _REFERENCE,
            share_at_reference,
        ),
        (
            "concentration",
            f"{label} concentration",
            "normal_concentration",
            f"Mass of {label} per normal cubic metre of dry flue gas.",
            _NORMAL,
            concentration,
        ),
        (
            "at_reference_oxygen",
            f"{label} at reference O2",
            "normal_concentration",
            f"Mass of {label} per normal cubic metre of dry flue gas at the reference oxygen.",
            f"{_NORMAL}; {_REFERENCE}",
            at_reference,
        ),
    )
    shares = [
        Figure(f"emissions.{pollutant}.{key}", text, dimension, EMISSIONS, help_text + origin, source, formula)
        for key, text, dimension, help_text, source, formula in rows
    ]
    return [*shares, *_per_input(pollutant)]


def _per_input(pollutant: str) -> list[Figure]:
    label, origin = LABELS[pollutant], _ORIGIN.get(pollutant, "")
    source = "reading times the dry flue gas of the element balances"

    def on(basis: str) -> Callable[[Terms], FloatArray]:
        return lambda terms: emissions.mass_per_fuel(terms, pollutant) / terms.heating_value(basis)

    found = []
    for basis in BASES:
        name, text = f"emissions.{pollutant}.per_input.{basis}", f"Mass of {label} per {basis} heat input.{origin}"
        dimension = "trace_emission_per_energy"
        found.append(Figure(name, f"{label} per input", dimension, EMISSIONS, text, source, on(basis)))
    return found
