"""The energy balance of a fired unit from absolute enthalpies, worked out apart from the account.

Nothing here counts heat from a reference temperature: what goes in and what comes out carry their enthalpies of
formation, in the published form of the property polynomials (NASA/TP-2002-211556, equation 2), and amounts follow from
the conservation of each element. Only the coefficients, the fuel's own elements and saturation pressure are shared.
"""

from dataclasses import dataclass
from math import log

from fluegas.accounting.inputs import AccountInput
from fluegas.combustion.air import REST_OF_AIR
from fluegas.combustion.fuel import FUEL_GASES
from fluegas.thermo.species import atomic_weight, species
from fluegas.thermo.water import saturation_pressure

CARBON_IN_ASH = 33.7e6
"""Heat of combustion of carbon in ash [J/kg], ASME PTC 4 (from memory)."""


def enthalpy(symbol: str, temperature: float) -> float:
    """Return the enthalpy of one mole [J/mol], formation included."""
    entry = species(symbol)
    place = next(i for i, end in enumerate(entry.temperatures[1:]) if temperature <= end)
    a1, a2, a3, a4, a5, a6, a7, b1, _ = entry.coefficients[place]
    t = temperature
    series = a3 * t + a4 * t**2 / 2 + a5 * t**3 / 3 + a6 * t**4 / 4 + a7 * t**5 / 5
    return -a1 / t + a2 * log(t) + series + b1


@dataclass(frozen=True)
class Streams:
    """Amounts that enter and leave with a kilogram of fuel [mol/kg] by species, and the dry flue gas [mol/kg]."""

    dry_air: dict[str, float]
    air_water: float
    flue: dict[str, float]
    dry_flue: float


def streams(data: AccountInput, excess_air: float) -> Streams:
    """Return the amounts for a state of shape `()`, by conservation of each element at this `excess_air`."""
    fuel, readings = data.fuel, data.readings
    count = {element: float(fuel.element(element)) for element in ("C", "H", "O", "N", "S", "Cl", "Ar", "He")}
    moisture, x = float(fuel.moisture), float(data.air.oxygen)
    burned = count["C"] * (1 - float(readings.unburned_carbon))
    stoichiometric = burned + (count["H"] - count["Cl"]) / 4 + count["S"] - count["O"] / 2
    dry = (1 + excess_air) * stoichiometric / x
    scale = (1 - x) / (1 - 0.2095)
    air = {"O2": x * dry, **{gas: share * scale * dry for gas, share in REST_OF_AIR.items()}}
    steam = 0.0
    if data.air.relative_humidity is not None:
        vapour = float(data.air.relative_humidity) * float(saturation_pressure(data.air.temperature))
        steam = dry * vapour / (float(data.air.pressure) - vapour)
    share = {gas: float(getattr(readings, gas.lower())) for gas in ("CO", "H2", "CH4", "NO")}

    def flue(total: float) -> dict[str, float]:
        """Return the flue gas if its dry part were `total`: every element that enters leaves."""
        gas = {name: value * total for name, value in share.items()}
        gas["CO2"] = burned + air["CO2"] - gas["CO"] - gas["CH4"]
        gas["SO2"], gas["HCl"] = count["S"], count["Cl"]
        gas["Ar"], gas["He"] = count["Ar"] + air["Ar"], count["He"]
        gas["N2"] = (count["N"] + 2 * air["N2"] - gas["NO"]) / 2
        gas["H2O"] = (count["H"] - count["Cl"] - 2 * gas["H2"] - 4 * gas["CH4"]) / 2 + moisture + steam
        atoms_in = count["O"] + moisture + steam + 2 * air["O2"] + 2 * air["CO2"]
        gas["O2"] = (atoms_in - 2 * gas["CO2"] - gas["CO"] - gas["NO"] - 2 * gas["SO2"] - gas["H2O"]) / 2
        return gas

    def dry_part(total: float) -> float:
        return sum(value for name, value in flue(total).items() if name != "H2O")

    at_zero, slope = dry_part(0.0), dry_part(1.0) - dry_part(0.0)
    total = at_zero / (1 - slope)
    return Streams(air, steam, flue(total), total)


def fuel_enthalpy(data: AccountInput) -> float:
    """Return the absolute enthalpy of a kilogram of fuel [J/kg] at its temperature.

    A gas: that of its components, no heating value involved. Else by definition of the net heating value: its value at
    T_ref is net value + products of complete combustion, all gaseous, - oxygen; above it the given heat capacity.
    """
    fuel, t = data.fuel, float(data.fuel_temperature)
    if fuel.gases.any():
        return sum(float(amount) * enthalpy(gas, t) for gas, amount in zip(FUEL_GASES, fuel.gases, strict=True))
    return enthalpy_from_net_value(data) + float(fuel.heat_capacity) * (t - fuel.reference_temperature)


def enthalpy_from_net_value(data: AccountInput) -> float:
    """Return net value + enthalpy of the gaseous products of complete combustion - that of the oxygen, at T_ref."""
    fuel, t = data.fuel, data.fuel.reference_temperature
    c, h, o, n, s, cl, ar, he = (float(fuel.element(e)) for e in ("C", "H", "O", "N", "S", "Cl", "Ar", "He"))
    products = {"CO2": c, "H2O": (h - cl) / 2 + float(fuel.moisture), "SO2": s, "HCl": cl, "N2": n / 2}
    products |= {"Ar": ar, "He": he}
    oxygen = c + (h - cl) / 4 + s - o / 2
    burnt = sum(amount * enthalpy(gas, t) for gas, amount in products.items())
    return float(fuel.net_heating_value) + burnt - oxygen * enthalpy("O2", t)


def condensed(data: AccountInput, flow: Streams) -> float:
    """Return the condensate [mol/kg fuel]: as measured, else what leaves the gas saturated at the site pressure."""
    if data.condensate is not None:
        return float(data.condensate) / species("H2O").molar_mass
    temperature, pressure = float(data.readings.flue_temperature), float(data.air.pressure)
    if temperature > 400.0:
        return 0.0
    saturated = float(saturation_pressure(temperature))
    if saturated >= pressure:
        return 0.0
    return max(0.0, flow.flue["H2O"] - flow.dry_flue * saturated / (pressure - saturated))


def useful_and_surface_heat(data: AccountInput, excess_air: float) -> float:
    """Return what is left for use and surface [J/kg fuel]: enthalpies in, less out, less the other losses."""
    flow = streams(data, excess_air)
    burner = data.air.burner_temperature
    air_temperature = float(data.air.temperature)
    if burner is not None and bool(data.air.preheated_outside):
        air_temperature = float(burner)
    brought = fuel_enthalpy(data) + flow.air_water * enthalpy("H2O", air_temperature)
    brought += sum(amount * enthalpy(gas, air_temperature) for gas, amount in flow.dry_air.items())
    flue_temperature = float(data.readings.flue_temperature)
    water = condensed(data, flow)
    gas = {**flow.flue, "H2O": flow.flue["H2O"] - water}
    carried = sum(amount * enthalpy(name, flue_temperature) for name, amount in gas.items())
    if water:
        carried += water * enthalpy("H2O(l)", flue_temperature)
    carried += residue_enthalpy(data)
    value = data.fuel.gross_heating_value if data.basis == "gross" else data.fuel.net_heating_value
    other = sum(float(share) for share in data.other.values()) * float(value)
    return brought - carried - other


def residue_enthalpy(data: AccountInput) -> float:
    """Return the enthalpy of the carbon in the ash [J/kg fuel]: it would burn to CO2 with 33.7 MJ/kg at T_ref."""
    carbon = float(data.fuel.element("C")) * float(data.readings.unburned_carbon)
    t = data.fuel.reference_temperature
    return carbon * (CARBON_IN_ASH * atomic_weight("C") + enthalpy("CO2", t) - enthalpy("O2", t))


def useful_heat(data: AccountInput, excess_air: float) -> float:
    """Return the useful heat [J/kg fuel] after the surface loss."""
    left = useful_and_surface_heat(data, excess_air)
    if data.surface_share is not None:
        value = data.fuel.gross_heating_value if data.basis == "gross" else data.fuel.net_heating_value
        return left - float(data.surface_share) * float(value)
    return left / (1 + float(data.surface_per_useful))
