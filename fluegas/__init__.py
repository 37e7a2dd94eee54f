"""Heat accounts of fired units: from a fuel analysis and flue-gas readings to losses, credits and efficiency.

The public names below are loaded when first used, so that `import fluegas` costs nothing. All quantities are SI; arrays
of any shapes that broadcast go in, arrays come out.
"""

from importlib import import_module
from typing import TYPE_CHECKING

if TYPE_CHECKING:
    from fluegas.accounting.account import HeatAccount, heat_account
    from fluegas.accounting.figures import figures
    from fluegas.accounting.inputs import AccountInput
    from fluegas.accounting.ledger import UnitInput, ledger
    from fluegas.combustion.air import Air
    from fluegas.combustion.fuel import Fuel
    from fluegas.combustion.gas_fuel import gas_fuel
    from fluegas.combustion.product_gas import FlueReadings
    from fluegas.combustion.solid_fuel import solid_fuel
    from fluegas.errors import FluegasError, InputError, ScenarioError
    from fluegas.scenario.reading import read_scenario
    from fluegas.scenario.result import work_out
    from fluegas.scenario.saving import save
    from fluegas.scenario.writing import edited

__version__ = "0.1.0"

__all__ = [
    "AccountInput",
    "Air",
    "FlueReadings",
    "FluegasError",
    "Fuel",
    "HeatAccount",
    "InputError",
    "ScenarioError",
    "UnitInput",
    "edited",
    "figures",
    "gas_fuel",
    "heat_account",
    "ledger",
    "read_scenario",
    "save",
    "solid_fuel",
    "work_out",
]

_HOME = {
    "AccountInput": "accounting.inputs",
    "Air": "combustion.air",
    "FlueReadings": "combustion.product_gas",
    "FluegasError": "errors",
    "Fuel": "combustion.fuel",
    "HeatAccount": "accounting.account",
    "InputError": "errors",
    "ScenarioError": "errors",
    "UnitInput": "accounting.ledger",
    "edited": "scenario.writing",
    "figures": "accounting.figures",
    "gas_fuel": "combustion.gas_fuel",
    "heat_account": "accounting.account",
    "ledger": "accounting.ledger",
    "read_scenario": "scenario.reading",
    "save": "scenario.saving",
    "solid_fuel": "combustion.solid_fuel",
    "work_out": "scenario.result",
}


def __getattr__(name: str) -> object:
    if name not in _HOME:
        raise AttributeError(f"module 'fluegas' has no public name {name!r}; it has {', '.join(__all__)}")
    return getattr(import_module(f"fluegas.{_HOME[name]}"), name)


def __dir__() -> list[str]:
    return [*__all__, "__version__"]
