"""How fast the account of a million rows is, against per-species Horner schemes of the same rows."""

import time
import tracemalloc

import numpy as np

from fluegas.accounting.account import HeatAccount, heat_account
from fluegas.accounting.inputs import AccountInput
from fluegas.combustion.air import Air
from fluegas.combustion.gas_fuel import gas_fuel
from fluegas.combustion.product_gas import FlueReadings
from fluegas.thermo.polynomials import FloatArray, from_published
from fluegas.thermo.species import species
from tests.bench.timing import Comparison, alternate

ROWS = 1_000_000
SIX_OUTPUTS = (
    "excess_air",
    "losses.gross.dry_gas",
    "losses.gross.fuel_water",
    "losses.gross.air_moisture",
    "losses.gross.carbon_monoxide",
    "efficiency.gross",
)
SEVEN_SPECIES = ("N2", "O2", "CO2", "H2O", "Ar", "CO", "SO2")


def logger_rows(rows: int = ROWS) -> AccountInput:
    """Return an invented log of a gas boiler: humid air, dry O2, CO and flue temperature row by row."""
    random = np.random.default_rng(7)
    air = Air(
        temperature=random.uniform(275.0, 305.0, rows),
        pressure=np.asarray(101_300.0),
        relative_humidity=random.uniform(0.3, 0.9, rows),
    )
    readings = FlueReadings(
        flue_temperature=random.uniform(400.0, 560.0, rows),
        o2=random.uniform(0.02, 0.08, rows),
        co=random.uniform(5e-6, 150e-6, rows),
    )
    fuel = gas_fuel({"methane": 0.931, "ethane": 0.042, "propane": 0.008, "nitrogen": 0.012, "carbon dioxide": 0.007})
    return AccountInput(fuel, air, readings, fuel_temperature=np.asarray(288.15), surface_share=np.asarray(0.011))


def per_species_horner(data: AccountInput) -> list[FloatArray]:
    """Return seven molar enthalpies at flue and air temperature, each by its own Horner scheme over all rows."""
    found: list[FloatArray] = []
    coefficients = [from_published([species(symbol).coefficients[0]])[:, 0] for symbol in SEVEN_SPECIES]
    for t in (data.readings.flue_temperature, data.air.temperature):
        log_t = np.log(t)
        for k in coefficients:
            polynomial = t * (k[2] + t * (k[3] + t * (k[4] + t * (k[5] + t * k[6]))))
            found.append(k[0] / t + k[1] * log_t + k[7] + polynomial)
    return found


def peak_memory(data: AccountInput) -> float:
    """Return the megabytes that six outputs need at their peak, beyond inputs and outputs."""
    heat_account(data, SIX_OUTPUTS)
    tracemalloc.start()
    result = heat_account(data, SIX_OUTPUTS)
    _, peak = tracemalloc.get_traced_memory()
    tracemalloc.stop()
    return (peak - sum(array.nbytes for array in result.values())) / 1e6


def compare_account() -> list[Comparison]:
    """Return the ratios of six outputs and of the full result to the reference."""
    data = logger_rows()

    def six() -> HeatAccount:
        return heat_account(data, SIX_OUTPUTS)

    def full() -> HeatAccount:
        return heat_account(data)

    runs = [lambda: per_species_horner(data), six, full]
    reference, few, everything = alternate(runs, repeats=7, clock=time.process_time)
    memory = peak_memory(data)
    return [
        Comparison("six outputs of 1e6 rows / Horner of 7 species at 2 temperatures", few / reference, 1.0),
        Comparison("full result of 1e6 rows / the same reference", everything / reference, 4.0),
        Comparison("memory of six outputs beyond inputs and outputs, MB", memory, 100.0),
    ]
