"""Units at the border: factors against an independent registry and published figures, spellings, hostile texts."""

import re
import subprocess
import sys
from fractions import Fraction

import numpy as np
import pint
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from fluegas import units
from fluegas.errors import DataError, QuantityError
from fluegas.resources import data_text
from fluegas.units._table import folded_form, plain_form, table

EVERY = [(name, spelling) for name in units.dimensions() for spelling in units.spellings(name)]

# How the words of a spelling are called in pint's own default registry. Written-down exceptions, where pint's word of
# that name is something else: kcal and Btu are those of the International Steam Tables here (pint: thermochemical kcal,
# ISO Btu), the therm is 1e5 of those Btu, kt is 1000 t (pint: knot), a year is 8760 h (pint: 365.25 d), and the units
# that pint does not know.
MOLES_PER_M3 = {"N": 1000 / 22.41396954, "S": 42.292543, "scf": 1.1952869}
ORACLE_WORDS = {
    "kWth": "kW", "MWth": "MW", "d": "day", "h": "hour", "a": "(8760 * hour)", "hr": "hour", "hrs": "hour",
    "yr": "(8760 * hour)", "year": "(8760 * hour)", "years": "(8760 * hour)", "l": "liter", "L": "liter",
    "kcal": "(1000 * cal_it)", "Mcal": "(1e6 * cal_it)", "Gcal": "(1e9 * cal_it)", "Btu": "Btu_it",
    "kBtu": "(1e3 * Btu_it)", "MMBtu": "(1e6 * Btu_it)", "therm": "(1e5 * Btu_it)", "therms": "(1e5 * Btu_it)",
    "thm": "(1e5 * Btu_it)", "Btuh": "(Btu_it / hour)", "kBtuh": "(1e3 * Btu_it / hour)",
    "MMBtuh": "(1e6 * Btu_it / hour)", "boiler hp": "(9809.50 * watt)", "lbs": "lb", "pph": "(lb / hour)",
    "ton": "short_ton", "short ton": "short_ton", "short tons": "short_ton", "gr": "grain",
    "kt": "(1e6 * kg)", "h/a": "hour",
    "lbmol": "(453.59237 * mol)", "Nm3": f"({MOLES_PER_M3['N']} * mol)", "m3(n)": f"({MOLES_PER_M3['N']} * mol)",
    "Sm3": f"({MOLES_PER_M3['S']} * mol)", "scf": f"({MOLES_PER_M3['scf']} * mol)",
    "scfm": f"({MOLES_PER_M3['scf']} * mol / minute)", "scfh": f"({MOLES_PER_M3['scf']} * mol / hour)",
    "scfd": f"({MOLES_PER_M3['scf']} * mol / day)", "MMscf": f"(1e6 * {MOLES_PER_M3['scf']} * mol)",
    "MMscfd": f"(1e6 * {MOLES_PER_M3['scf']} * mol / day)", "cf": "ft ** 3", "cu ft": "ft ** 3",
    "cfm": "(ft ** 3 / minute)", "acfm": "(ft ** 3 / minute)", "cfh": "(ft ** 3 / hour)",
    "gpm": "(gallon / minute)", "gph": "(gallon / hour)", "psia": "psi", "kPa(a)": "kPa", "mbar(a)": "mbar",
    "bar(a)": "bar", '"Hg': "inHg", '"H2O': "inH2O", "in": "inch", "kgf": "kilogram_force",
    "K": "delta_degC", "°C": "delta_degC", "°F": "delta_degF", "degC": "delta_degC", "degF": "delta_degF",
    "F": "delta_degF", "C": "delta_degC", "degR": "(5 / 9 * delta_degC)", "°R": "(5 / 9 * delta_degC)",
    "-": "dimensionless", "%": "0.01", "‰": "0.001", "pct": "0.01", "ppmv": "ppm", "vpm": "ppm", "ppb": "1e-9",
    "ppbv": "1e-9",
}  # fmt: skip


@pytest.fixture(scope="module")
def oracle() -> "pint.UnitRegistry[float]":
    registry: pint.UnitRegistry[float] = pint.UnitRegistry()
    return registry


def oracle_expression(spelling: str) -> str:
    """Turn a spelling into an expression of pint's default registry, word by word."""
    if re.fullmatch(r"(vol|mol|mass|wt|)-?%(vol)?", spelling):
        return "0.01"

    def word(text: str) -> str:
        if text in ORACLE_WORDS:
            return f"({ORACLE_WORDS[text]})"
        return re.sub(r"(?<=[a-z])([23])$", r"**\1", text)

    if spelling in ORACLE_WORDS:
        return ORACLE_WORDS[spelling]
    numerator, *rest = re.sub(r"\((\w+) (\S+)\)$", r"\1/\2", spelling).split("/")
    return "/".join([word(numerator), *map(word, rest)])


@pytest.mark.parametrize(("name", "spelling"), [case for case in EVERY if case[0] != "temperature"])
def test_factor_agrees_with_an_independent_registry(
    oracle: "pint.UnitRegistry[float]", name: str, spelling: str
) -> None:
    reference = oracle.parse_expression(oracle_expression(spelling)) / oracle.parse_expression(
        oracle_expression(units.si_unit(name))
    )
    expected = oracle.Quantity(reference).to("dimensionless").magnitude
    assert units.to_si(1.0, name, spelling) == pytest.approx(expected, rel=5e-8)


@pytest.mark.parametrize("spelling", units.spellings("temperature"))
def test_temperature_agrees_with_an_independent_registry(oracle: "pint.UnitRegistry[float]", spelling: str) -> None:
    known = {"K": "kelvin", "C": "degC", "F": "degF", "°C": "degC", "°F": "degF", "°R": "degR"}
    word = known.get(spelling, {"celsius": "degC", "fahrenheit": "degF", "rankine": "degR"}.get(spelling, spelling))
    for degrees in (60.0, 412.0):
        expected = oracle.Quantity(degrees, word).to("kelvin").magnitude
        assert units.to_si(degrees, "temperature", spelling) == pytest.approx(expected, rel=1e-14)


# SP 811: NIST Special Publication 811 (2008), appendix B. CODATA: CODATA 2018 recommended values. All from memory.
@pytest.mark.parametrize(
    ("text", "name", "si", "digits"),
    [
        ("1 kWh", "energy", 3.6e6, 1e-15),  # exact
        ("1 Btu", "energy", 1055.056, 5e-7),  # SP 811, Btu_IT
        ("1 kcal", "energy", 4186.8, 1e-15),  # SP 811, calorie_IT, exact
        ("1 therm", "energy", 1.05506e8, 5e-6),  # SP 811, therm (EC)
        ("1 Btu/h", "power", 0.2930711, 2e-7),  # SP 811
        ("1 boiler hp", "power", 9809.50, 1e-15),  # SP 811, horsepower (boiler)
        ("1 boiler hp", "power", 33475 * 0.2930711, 2e-4),  # 33 475 Btu/h, common practice, no source
        ("1 Btu/lb", "energy_per_mass", 2326.0, 1e-12),  # SP 811, exact
        ("1 Btu/(lb degF)", "heat_capacity_mass", 4186.8, 1e-12),  # SP 811, exact
        ("1 Btu/ft3", "energy_per_volume", 37258.95, 2e-7),  # SP 811
        ("1 psi", "pressure", 6894.757, 1e-7),  # SP 811
        ("1 inHg", "pressure", 3386.389, 2e-7),  # SP 811, conventional
        ("1 inH2O", "pressure", 249.0889, 2e-7),  # SP 811, conventional
        ("1 mmHg", "pressure", 133.3224, 2e-7),  # SP 811, conventional
        ("1 atm", "pressure", 101325.0, 1e-15),  # exact
        ("1 kgf/cm2", "pressure", 98066.5, 1e-15),  # SP 811, exact
        ("1 short ton", "mass", 907.18474, 1e-15),  # SP 811, exact
        ("1 lb/ft3", "density", 16.01846, 3e-7),  # SP 811
        ("1 gal", "volume", 3.785412e-3, 2e-7),  # SP 811
        ("1 cfm", "volume_flow", 4.719474e-4, 2e-7),  # SP 811
        ("1 lb/MMBtu", "emission_per_energy", 0.4299226e-9, 2e-7),  # 0.45359237 kg / 1055.05585 MJ, recomputed
        ("53.06 kg/MMBtu", "emission_per_energy", 116.977 * 0.4299226e-9, 1e-5),  # gas, 40 CFR 98 table C-1
        ("22.41396954 kmol", "amount", 22413.96954, 1e-15),
        ("22.41396954e-3 Nm3", "amount", 1.0, 1e-9),  # CODATA, molar volume of ideal gas (273.15 K, 101.325 kPa)
        ("23.644836 Nm3", "amount", 23.644836 / 22.41396954e-3, 1e-9),
        ("23.6448 Sm3", "amount", 1000.0, 2e-6),  # ideal gas at 288.15 K: 22.41397 x 288.15 / 273.15
        ("379.48 scf", "amount", 453.59237, 2e-5),  # ft3 per lbmol at 60 degF and 14.696 psia, common practice
        ("37.3258 scf", "amount", 44.615033, 1e-6),  # recomputed by hand: 1 Nm3
        ("32 degF", "temperature", 273.15, 1e-15),
        ("212 °F", "temperature", 373.15, 1e-15),
        ("-40 degF", "temperature", 233.15, 1e-15),
        ("18 degF", "temperature_difference", 10.0, 1e-15),
        ("5200 h", "time", 1.872e7, 1e-15),
        ("1 a", "time", 3.1536e7, 1e-15),  # 8760 h
    ],
)
def test_published_factors(text: str, name: str, si: float, digits: float) -> None:
    assert units.parse(text, name).value == pytest.approx(si, rel=digits)


def test_normal_volumes_are_ideal_gas_amounts() -> None:
    gas_constant = 8.31446261815324  # J/(mol K), CODATA 2018, exact
    for spelling, volume, temperature in (
        ("Nm3", 1.0, 273.15),
        ("Sm3", 1.0, 288.15),
        ("scf", 0.3048**3, (60 + 459.67) * 5 / 9),
    ):
        expected = 101325 * volume / (gas_constant * temperature)
        assert units.to_si(1.0, "amount", spelling) == pytest.approx(expected, rel=1e-14)


@pytest.mark.parametrize(("name", "spelling"), EVERY)
def test_every_spelling_is_read_as_listed(name: str, spelling: str) -> None:
    number = 7000.0 if name == "temperature" else 7.25
    measure = units.parse(f"{number} {spelling}", name)
    assert (measure.unit, measure.dimension, measure.text) == (spelling, name, f"{number} {spelling}")
    assert measure.value == units.to_si(number, name, spelling)
    assert units.parse(f"{number}{spelling}", name).value == measure.value
    assert units.from_si(measure.value, name, spelling) == pytest.approx(number, rel=1e-14)


@pytest.mark.parametrize("change", [str.upper, str.lower, str.swapcase, str.capitalize])
@pytest.mark.parametrize(("name", "spelling"), EVERY)
def test_another_case_is_the_same_unit_or_refused(name: str, spelling: str, change: object) -> None:
    assert callable(change)
    try:
        value = units.parse(f"7.25 {change(spelling)}", name).value
    except QuantityError as error:
        assert "did you mean" in str(error) or "can mean" in str(error)  # noqa: PT017
    else:
        assert value == units.to_si(7.25, name, spelling)


def test_spellings_of_a_dimension_never_collide() -> None:
    for kind in table().dimensions.values():
        seen: dict[str, str] = {}
        for spelling, expression in kind.expressions.items():
            assert seen.setdefault(folded_form(plain_form(spelling)), expression) == expression, spelling
            assert plain_form(spelling).casefold() not in table().refused


@pytest.mark.parametrize("name", units.dimensions())
def test_each_dimension_is_complete(name: str) -> None:
    assert units.label(name)
    assert units.to_si(3.0, name, units.si_unit(name)) == 3.0
    assert units.parse(units.example(name), name).dimension == name
    for system in ("si", "us"):
        assert units.display_unit(name, system) in units.spellings(name)


def test_texts_as_typed() -> None:
    for text, name, unit, value in (
        ("412F", "temperature", "F", (412 + 459.67) * 5 / 9),
        ("−5 °C", "temperature", "°C", 268.15),
        ("-5 º C", "temperature", "°C", 268.15),
        ("231 deg. C", "temperature", "degC", 504.15),
        ("231 DegC", "temperature", "degC", 504.15),
        ("3,2%", "fraction", "%", 0.032),
        ("45 PPM", "fraction", "ppm", 45e-6),
        ("45 µmol/mol", "trace_fraction", "umol/mol", 45e-6),
        ("1.234,5 kw", "power", "kW", 1234.5e3),
        ("1 234,5 kW", "power", "kW", 1234.5e3),
        ("12 mmbtu/hr", "power", "MMBtu/h", 12e6 * 1055.05585262 / 3600),
        ("3 GJ/year", "power", "GJ/a", 3e9 / 3.1536e7),
        ("100 nm³ / hr", "amount_flow", "Nm3/h", 100 * 44.615033 / 3600),
        ("2 kJ/kg K", "heat_capacity_mass", "kJ/(kg K)", 2000.0),
        ("2 kJ/(kg·K)", "heat_capacity_mass", "kJ/(kg K)", 2000.0),
        ("2 kJ/kg.K", "heat_capacity_mass", "kJ/(kg K)", 2000.0),
        ("840 kg/m^3", "density", "kg/m3", 840.0),
        ("840 kg / m**3", "density", "kg/m3", 840.0),
        ("100 KPA", "pressure", "kPa", 1e5),
        ("29.92\tinHg", "pressure", "inHg", 29.92 * 3386.38864),
        (" 3.2 MW ", "power", "MW", 3.2e6),
    ):
        measure = units.parse(text, name)
        assert (measure.unit, measure.text) == (unit, text)
        assert measure.value == pytest.approx(value, rel=2e-8)


def test_the_first_fitting_dimension_is_taken() -> None:
    assert units.parse("290 kg/h", "mass_flow", "amount_flow").dimension == "mass_flow"
    assert units.parse("310 Nm3/h", "mass_flow", "amount_flow").dimension == "amount_flow"
    assert units.parse("2 K", "temperature_difference", "temperature").dimension == "temperature_difference"
    assert units.parse("80 mg/Nm3", "trace_fraction", "mass_concentration").dimension == "mass_concentration"


def test_a_volume_may_be_meant_as_one() -> None:
    assert units.parse("3600 m3/h", "volume_flow").value == pytest.approx(1.0, rel=1e-15)


def test_arrays_keep_their_shape() -> None:
    fahrenheit = np.array([[32.0, 212.0, -40.0]])
    kelvin = units.to_si(fahrenheit, "temperature", "degF")
    np.testing.assert_allclose(kelvin, [[273.15, 373.15, 233.15]], rtol=1e-15)
    np.testing.assert_allclose(units.from_si(kelvin, "temperature", "degF"), fahrenheit, rtol=1e-14)


def test_factors_are_rounded_once() -> None:
    assert units.to_si(1.0, "power", "Btu/h") == float(Fraction("1055.05585262") / 3600)
    assert units.to_si(1.0, "fraction", "ppm") == 1e-6


@given(st.sampled_from(EVERY), st.floats(1e-6, 1e9))
@settings(deadline=None, derandomize=True)
def test_what_is_written_reads_back(case: tuple[str, str], si: float) -> None:
    name, spelling = case
    number = units.from_si(si, name, spelling)
    if abs(number) > 1e15 or 0 < abs(number) < 1e-30:
        return
    assert units.parse(f"{number!r} {spelling}", name).value == pytest.approx(si, rel=1e-12, abs=1e-10)


@given(st.text(max_size=80), st.sampled_from(units.dimensions()))
@settings(deadline=None, derandomize=True)
def test_any_text_is_read_or_refused(text: str, name: str) -> None:
    for attempt in (text, f"3.2 {text}", f"{text} MW"):
        try:
            measure = units.parse(attempt, name)
        except QuantityError as error:
            assert str(error).isprintable()  # noqa: PT017
        else:
            assert measure.unit in units.spellings(name)


def test_a_cubic_metre_is_no_word_of_the_registry() -> None:
    """With a unit "m3" the prefix m would make "mm3" a thousandth of a cubic metre."""
    assert not re.search(r"^m3\b|= *m3\b", data_text("units.txt"), re.MULTILINE)
    for kind in table().dimensions.values():
        assert not any("m3" in expression.split() for expression in kind.expressions.values())


@pytest.mark.parametrize("damage", ["[power", "x = 3", "[refused]\n[power]\nlabel = 'power'"])
def test_damaged_data_are_named(monkeypatch: pytest.MonkeyPatch, damage: str) -> None:
    monkeypatch.setattr("fluegas.units._table.data_text", lambda name: damage)
    with pytest.raises(DataError, match=r"the data file 'spellings\.toml' is damaged"):
        table.__wrapped__()


def test_unknown_dimension_is_named() -> None:
    with pytest.raises(KeyError, match="no dimension 'colour'; there are temperature, "):
        units.parse("3 K", "colour")


def test_importing_loads_neither_pint_nor_numpy() -> None:
    code = (
        "import sys; from fluegas import units; units.spellings('power'); units.parse_number('3')\n"
        "print(sorted({'pint', 'numpy'} & set(sys.modules)))"
    )
    run = subprocess.run([sys.executable, "-c", code], capture_output=True, encoding="utf-8", check=True)
    assert run.stdout.strip() == "[]"
