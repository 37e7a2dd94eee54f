"""`import fluegas`: about fifteen documented names, loaded when first used, arrays in and arrays out."""

import inspect
import subprocess
import sys
from typing import Any

import numpy as np
import pytest

import fluegas

NAMES = {
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
}


def test_the_list_of_public_names() -> None:
    assert set(fluegas.__all__) == NAMES
    assert set(fluegas._HOME) == NAMES
    assert set(dir(fluegas)) == {*NAMES, "__version__"}


@pytest.mark.parametrize("name", sorted(NAMES))
def test_every_name_is_there_and_documented(name: str) -> None:
    found = getattr(fluegas, name)
    assert found.__name__ == name
    assert len(inspect.getdoc(found) or "") > 20


def test_an_unknown_name_is_told() -> None:
    with pytest.raises(AttributeError, match="has no public name 'hearth'; it has AccountInput"):
        _ = fluegas.hearth


def test_importing_the_package_loads_nothing_heavy() -> None:
    code = "import sys, fluegas; print(sorted({'numpy', 'pint', 'rich', 'tomlkit', 'click'} & set(sys.modules)))"
    done = subprocess.run([sys.executable, "-c", code], capture_output=True, text=True, encoding="utf-8", check=True)
    assert done.stdout == "[]\n"


def test_plain_numbers_and_arrays_go_in_and_arrays_come_out() -> None:
    fuel = fluegas.gas_fuel({"methane": 0.93, "ethane": 0.05, "nitrogen": 0.02})
    oxygen = np.linspace(0.01, 0.09, 7)
    air = fluegas.Air(temperature=np.asarray(295.15), pressure=np.asarray(101_325.0), relative_humidity=np.asarray(0.5))
    readings = fluegas.FlueReadings(flue_temperature=np.asarray(480.0), o2=oxygen, co=30e-6)
    data = fluegas.AccountInput(fuel, air, readings, fuel_temperature=np.asarray(288.15))
    account = fluegas.heat_account(data, ["efficiency.gross", "excess_air"])
    assert account["efficiency.gross"].shape == (7,)
    assert np.all(np.diff(account["efficiency.gross"]) < 0)
    plain: dict[str, Any] = {"flue_temperature": 480.0, "o2": 0.01, "co": 30e-6}
    surroundings: dict[str, Any] = {"temperature": 295.15, "pressure": 101_325.0, "relative_humidity": 0.5}
    number: Any = 288.15
    one = fluegas.heat_account(
        fluegas.AccountInput(fuel, fluegas.Air(**surroundings), fluegas.FlueReadings(**plain), number)
    )
    assert one.shape == ()
    assert float(one["efficiency.gross"]) == pytest.approx(float(account["efficiency.gross"][0]), rel=1e-12)
