"""Water: the published check values, two reference libraries, round trips, heats, limits."""

import iapws
import numpy as np
import pytest
from CoolProp.CoolProp import PropsSI
from hypothesis import given
from hypothesis import strategies as st
from iapws._iapws import _Sublimation_Pressure

from fluegas.errors import RangeError
from fluegas.thermo.polynomials import FloatArray
from fluegas.thermo.water import (
    heat_of_evaporation,
    liquid_enthalpy,
    saturation_pressure,
    saturation_temperature,
    vapour_enthalpy,
)
from tests.reference.tables import column, table


def test_iapws_if97_table_35() -> None:
    """IAPWS R7-97(2012), table 35: saturation pressure to the nine printed digits."""
    printed = np.array([0.353658941e-2, 0.263889776e1, 0.123443146e2]) * 1e6
    np.testing.assert_allclose(saturation_pressure([300.0, 500.0, 600.0]), printed, rtol=5e-9)


def test_iapws_if97_table_36() -> None:
    """IAPWS R7-97(2012), table 36: saturation temperature to the nine printed digits."""
    printed = [0.372755919e3, 0.453035632e3, 0.584149488e3]
    np.testing.assert_allclose(saturation_temperature([0.1e6, 1e6, 10e6]), printed, rtol=2e-9)


def test_iapws_sublimation_pressure() -> None:
    """IAPWS R14-08(2011), check value at 230 K: 8.94735 Pa."""
    assert float(saturation_pressure(230.0)) == pytest.approx(8.94735, abs=5e-6)


def test_triple_and_critical_point() -> None:
    """IAPWS R14-08(2011): 611.657 Pa at the triple point; IAPWS R7-97(2012): 22.064 MPa at the critical one."""
    assert float(saturation_pressure(273.16)) == pytest.approx(611.657, abs=1e-3)
    assert float(saturation_pressure(647.096)) == pytest.approx(22.064e6, rel=1e-5)
    assert float(saturation_temperature(611.657)) == pytest.approx(273.16, abs=1e-6)


def test_the_iapws_package_agrees_over_liquid() -> None:
    """Near the critical point the package comes by way of its region 3 and its density: 1e-5."""
    for low, high, tolerance in ((273.16, 623.0, 1e-12), (624.0, 640.0, 1e-5)):
        temperatures = np.linspace(low, high, 40)
        expected = [1e6 * iapws.IAPWS97(T=float(t), x=0).P for t in temperatures]
        np.testing.assert_allclose(saturation_pressure(temperatures), expected, rtol=tolerance)


def test_the_iapws_package_agrees_over_ice() -> None:
    temperatures = np.linspace(200.0, 273.0, 60)
    expected = [1e6 * _Sublimation_Pressure(float(t)) for t in temperatures]
    np.testing.assert_allclose(saturation_pressure(temperatures), expected, rtol=1e-12)


def test_the_reference_equation_agrees() -> None:
    """IAPWS-95 in CoolProp: the industrial formulation's saturation line lies within 0.02 % of it."""
    temperatures = np.linspace(273.17, 640.0, 60)
    expected = [PropsSI("P", "T", float(t), "Q", 0, "Water") for t in temperatures]
    np.testing.assert_allclose(saturation_pressure(temperatures), expected, rtol=2e-4)


def test_an_engineering_table_agrees() -> None:
    """Saturation table at whole degrees; printed to 1 Pa on an older formulation: 0.1 %."""
    rows = table("water_saturation")
    temperatures = np.array(column(rows, "celsius")) + 273.15
    np.testing.assert_allclose(saturation_pressure(temperatures), column(rows, "pressure"), rtol=1.1e-3)


@given(st.lists(st.floats(190.0, 647.096), min_size=1, max_size=6))
def test_temperature_comes_back_from_pressure(temperatures: list[float]) -> None:
    """At the triple point the two formulas differ by 1e-11 of the pressure."""
    np.testing.assert_allclose(saturation_temperature(saturation_pressure(temperatures)), temperatures, rtol=1e-10)


@given(st.floats(0.0324, 22.063e6))
def test_pressure_comes_back_from_temperature(pressure: float) -> None:
    assert float(saturation_pressure(saturation_temperature(pressure))) == pytest.approx(pressure, rel=1e-10)


def test_pressure_rises_with_temperature_across_the_triple_point() -> None:
    pressures = saturation_pressure(np.linspace(190.0, 647.0, 5000))
    assert np.all(np.diff(pressures) > 0)


def test_shapes() -> None:
    grid = np.array([[250.0, 273.16, 300.0], [200.0, 400.0, 640.0]])
    assert saturation_pressure(300.0).shape == ()
    for function in (saturation_pressure, lambda t: saturation_temperature(saturation_pressure(t))):
        assert function(grid).shape == (2, 3)
        singles: FloatArray = np.array([[float(function(t)) for t in row] for row in grid])
        np.testing.assert_allclose(function(grid), singles, rtol=1e-14)
    assert saturation_pressure(np.empty(0)).shape == (0,)
    assert saturation_temperature(np.empty(0)).shape == (0,)
    assert liquid_enthalpy(np.empty(0)).shape == (0,)


@pytest.mark.parametrize(
    ("celsius", "name"),
    [(0.0, "0 degC"), (15.0, "15 degC"), (140 / 9, "15.55 degC"), (20.0, "20 degC"), (25.0, "25 degC")],
)
def test_heat_of_evaporation_is_that_of_iso_6976(celsius: float, name: str) -> None:
    """The standard's enthalpy of vaporisation to the ideal gas, 0.02 % above the species data's: within 0.03 %."""
    row = next(row for row in table("iso_6976_gross") if row["gas"] == "H2O")
    assert float(heat_of_evaporation(celsius + 273.15)) / 1000 == pytest.approx(float(row[name]), rel=3e-4)


def test_heat_of_evaporation_is_near_that_of_the_real_fluid() -> None:
    """CoolProp (IAPWS-95): the saturated vapour is not ideal, 0.1 % at 40 degC and 0.2 % at 60 degC, growing."""
    for temperature, tolerance in ((298.15, 6e-4), (313.15, 1e-3), (333.15, 2e-3), (373.15, 6e-3)):
        vapour, liquid = (PropsSI("Hmolar", "T", temperature, "Q", quality, "Water") for quality in (1, 0))
        assert float(heat_of_evaporation(temperature)) == pytest.approx(vapour - liquid, rel=tolerance)


def test_liquid_water_warms_as_the_real_fluid_does() -> None:
    """CoolProp (IAPWS-95) at saturation: two independent sets of data, measured to lie within 0.13 %."""
    temperatures = np.array([278.15, 288.15, 333.15, 373.15])
    real = [
        PropsSI("Hmolar", "T", float(t), "Q", 0, "Water") - PropsSI("Hmolar", "T", 298.15, "Q", 0, "Water")
        for t in temperatures
    ]
    found = liquid_enthalpy(temperatures) - liquid_enthalpy(298.15)
    np.testing.assert_allclose(found, real, rtol=1.5e-3)


def test_formation_of_liquid_and_vapour() -> None:
    """CODATA key values (Cox, 1989; from memory): -285.830 and -241.826 kJ/mol at 298.15 K."""
    assert float(liquid_enthalpy(298.15)) == pytest.approx(-285_830.0, abs=0.1)
    assert float(vapour_enthalpy(298.15)) == pytest.approx(-241_826.0, abs=0.1)


def test_liquid_enthalpy_joins_at_its_inner_joint() -> None:
    """The report's two ranges meet at 373.15 K within 0.16 J/mol, 2 mK of warming."""
    step = float(liquid_enthalpy(np.nextafter(373.15, 400.0)) - liquid_enthalpy(373.15))
    assert abs(step) < 0.2


LIMITS = "(IAPWS R7-97 and R14-08)"


@pytest.mark.parametrize(("temperature", "said"), [(189.0, "189"), (648.0, "648"), (float("nan"), "nan")])
def test_temperatures_without_saturation_are_told(temperature: float, said: str) -> None:
    with pytest.raises(RangeError) as caught:
        saturation_pressure([300.0, temperature])
    assert str(caught.value) == (
        f"temperature of saturation is {said} K; it must be between 190 and 647.096 K {LIMITS}"
    )


@pytest.mark.parametrize(("pressure", "said"), [(0.01, "0.01"), (23e6, "2.3e+07"), (-5.0, "-5")])
def test_pressures_without_saturation_are_told(pressure: float, said: str) -> None:
    with pytest.raises(RangeError) as caught:
        saturation_temperature([1000.0, pressure])
    lowest = float(saturation_pressure(190.0))
    assert str(caught.value) == (
        f"partial pressure of water is {said} Pa; it must be between {lowest:g} and 2.2064e+07 Pa {LIMITS}"
    )


@pytest.mark.parametrize(("temperature", "said"), [(272.0, "272"), (601.0, "601")])
def test_temperatures_without_liquid_are_told(temperature: float, said: str) -> None:
    for function in (liquid_enthalpy, heat_of_evaporation):
        with pytest.raises(RangeError) as caught:
            function([300.0, temperature])
        start = f"temperature of liquid water is {said} K; it must be between 273.15 and 600 K "
        assert str(caught.value).startswith(start)
