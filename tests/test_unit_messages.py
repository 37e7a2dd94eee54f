"""What is said to a text that is not a number with a fitting unit, word for word; hostile texts."""

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from fluegas import units
from fluegas.errors import QuantityError


def refusal(text: str, *names: str) -> str:
    with pytest.raises(QuantityError) as caught:
        units.parse(text, *names)
    return str(caught.value)


@pytest.mark.parametrize(
    ("text", "name", "message"),
    [
        ("", "power", "a value is missing; write e.g. 3.2 MW (power)"),
        ("  ", "power", "a value is missing; write e.g. 3.2 MW (power)"),
        ("3.2", "power", "3.2 has no unit; write e.g. 3.2 MW (power)"),
        ("−3\u202f200,5", "power", "-3 200,5 has no unit; write e.g. -3 200,5 MW (power)"),
        ("MW", "power", "'MW' does not start with a number; write e.g. 3.2 MW (power)"),
        ("12 kW", "pressure", "kW is a unit of power; here a pressure is needed, e.g. 1013 mbar"),
        ("5 kg", "energy", "kg is a unit of mass; here an energy is needed, e.g. 14500 MWh"),
        ("12 kPax", "pressure", "unknown unit 'kPax'; did you mean kPa?"),
        ("12 xyz", "pressure", "unknown unit 'xyz'; write e.g. 1013 mbar (pressure)"),
        ("5 MBtu/hr", "power", "MBtu/h can mean a thousand or a million Btu/h; write kBtu/h or MMBtu/h"),
        ("5 mbtu", "energy", "MBtu can mean a thousand or a million Btu; write kBtu or MMBtu"),
        ("5 ton/hr", "mass_flow", "ton/h can mean 1000 kg or 2000 lb an hour; write t/h or short ton/h"),
        ("12 PSIG", "pressure", "psig counts from the air pressure; add the barometer and write psia"),
        ("2 bar(g)", "pressure", "bar(g) counts from the air pressure; add the barometer and write bar"),
        ("500 BHP", "power", "BHP can mean a brake's or a boiler's horsepower; write kW or boiler hp"),
        ("3,500 kW", "power", "'3,500' is unclear; write 3500 or 3.500"),
        ("-3,500e3 kW", "power", "'-3,500e3' is unclear; write -3500e3 or -3.500e3"),
        ("3.2.1 kW", "power", "'3.2.1' is not a number; write it like 1234.5"),
        ("1e99 kW", "power", "'1e99' is too large to be meant; the limit is 1e+15 in any unit"),
        ("1e-99 kW", "power", "'1e-99' is too small to be meant; write 0 or at least 1e-30"),
        ("-300 degC", "temperature", "'-300 degC' is below absolute zero (-273.15 degC)"),
        ("-1 K", "temperature", "'-1 K' is below absolute zero (0 K)"),
        ("٣ kW", "power", "'٣ kW' has digits other than 0 to 9; write it with those"),
        ("３.２ kW", "power", "'３.２ kW' has digits other than 0 to 9; write it with those"),
        (
            "3.2 mW",
            "power",
            "unknown unit 'mW'; capital and small letters are different prefixes (M a million, m a thousandth), "
            "did you mean MW?",
        ),
        (
            "1013 MBAR",
            "pressure",
            "unknown unit 'MBAR'; capital and small letters are different prefixes (M a million, m a thousandth), "
            "did you mean mbar?",
        ),
        (
            "310 m³/h",
            "amount_flow",
            "m3/h does not say which normal volume; write Nm3/h (0 degC), Sm3/h (15 degC) or scf/h (60 degF)",
        ),
        (
            "36 MJ/m3",
            "energy_per_amount",
            "MJ/m3 does not say which normal volume; write MJ/Nm3 (0 degC), MJ/Sm3 (15 degC) or Btu/scf (60 degF)",
        ),
        (
            "80 mg/m^3",
            "mass_concentration",
            "mg/m3 does not say which normal volume; write mg/Nm3 (0 degC), mg/Sm3 (15 degC) or lb/scf (60 degF)",
        ),
        ("5 cf", "amount", "cf does not say which normal volume; write Nm3 (0 degC), Sm3 (15 degC) or scf (60 degF)"),
        ("5 l", "amount", "l is a unit of volume; here an amount of gas is needed, e.g. 1000 Nm3"),
    ],
)
def test_messages(text: str, name: str, message: str) -> None:
    assert refusal(text, name) == message


def test_messages_name_all_dimensions_that_would_do() -> None:
    assert refusal("290", "mass_flow", "amount_flow") == (
        "290 has no unit; write e.g. 290 kg/h (mass flow) or 290 Nm3/h (gas flow)"
    )
    assert refusal("290 kW", "mass_flow", "amount_flow") == (
        "kW is a unit of power; here a mass flow or gas flow is needed, e.g. 290 kg/h or 310 Nm3/h"
    )
    assert refusal("290 m3/h", "mass_flow", "amount_flow").startswith("m3/h does not say which normal volume; ")


@pytest.mark.parametrize(
    "twins", ["mW", "mw", "mwh", "Mwh/kg", "mj/kg", "mJ/kg", "Mbar", "MBAR", "mPa", "MG/NM3", "gcal"]
)
def test_prefixes_are_never_mixed(twins: str) -> None:
    for name in ("power", "energy", "energy_per_mass", "pressure", "mass_concentration"):
        try:
            measure = units.parse(f"3 {twins}", name)
        except QuantityError:
            continue
        assert measure.unit == "MWh/kg", measure
    assert units.parse("3 MW", "power").value == 3e6
    assert units.parse("3 mbar", "pressure").value == 300.0


@pytest.mark.parametrize(
    "text",
    ["9**9**9", "9**9**9 kW", "__import__('os') kW", "3 * 4 kW", "0x10 kW", "1_000 kW", "(3) kW", "3+4 kW",
     "3 kW; 4 kW", "nan kW", "inf kW", "-inf kW", "infinity", "NaN", "1e9999 kW", "²3 kW", "½ kW", "--3 kW", "+-3 kW",
     "3..2 kW",
     "3 kW\n4 kW", "3 k\x00W", "\ud800 kW", "3 \ud800", "[3] kW", "3e kW", "5 -kW", "5,, kW", "5, kW"],
)  # fmt: skip
def test_hostile_texts_are_refused(text: str) -> None:
    assert refusal(text, "power").isprintable()


def test_control_characters_never_appear_raw() -> None:
    assert refusal("5 \x1b[31m", "power") == "unknown unit '\\x1b[31m'; write e.g. 3.2 MW (power)"
    assert refusal("\x1b]0;x\x07 kW", "power").startswith("'\\x1b]0;x\\x07 kW' does not start")
    assert refusal("5 \u202eWk", "power").startswith("unknown unit '\\u202eWk'")


def test_a_long_text_is_cut() -> None:
    assert refusal("9" * 100_000 + " kW", "power") == (
        f"'{'9' * 30}...' is 100003 characters long; a value with its unit takes at most 60"
    )


@pytest.mark.parametrize(
    ("text", "number"),
    [
        ("3", 3.0), ("3.5", 3.5), ("3,5", 3.5), (".5", 0.5), (",5", 0.5), ("5.", 5.0), ("+3", 3.0), ("−3", -3.0),
        ("1e3", 1000.0), ("1,5E−3", 0.0015), ("3.500", 3.5), ("0,500", 0.5), ("0,125", 0.125), ("1234,567", 1234.567),
        ("3,50", 3.5), ("3,5000", 3.5), ("1,234.5", 1234.5), ("1.234,5", 1234.5), ("1,234.567", 1234.567),
        ("1.234,567", 1234.567), ("1,234,567", 1234567.0), ("1.234.567", 1234567.0), ("1,234,567.8", 1234567.8),
        ("1.234.567,8", 1234567.8), ("1 234", 1234.0), ("1\u202f234\u202f567,8", 1234567.8), ("1'234.5", 1234.5),
        ("1’234’567", 1234567.0), ("1 234,567", 1234.567), ("-12 500", -12500.0), ("1e15", 1e15), ("0", 0.0),
        ("0e-99", 0.0),
    ],
)  # fmt: skip
def test_numbers_as_people_write_them(text: str, number: float) -> None:
    assert units.parse_number(text) == number
    assert units.parse_number(f" {text} ") == number


@pytest.mark.parametrize(
    "text",
    ["", "x", "3 kW", "1,2,3", "1.2.3", "1,23,456", "12,34.5", "1.23,4.5", "1 23", "1 2345", "1 234 56", "0,123,456",
     "1'234 567", "1,234.567,8", "01 234", "1 234.", "3,", ",", ".", "-", "e3", "3e", "3e1.5", "1e16", "-1e16",
     "1e-31"],
)  # fmt: skip
def test_what_is_not_a_number(text: str) -> None:
    with pytest.raises(QuantityError):
        units.parse_number(text)


@pytest.mark.parametrize("text", ["3,500", "12,345", "999,999", "-1,000", "1,000e2"])
def test_a_comma_before_three_digits_is_questioned(text: str) -> None:
    with pytest.raises(QuantityError, match="is unclear; write"):
        units.parse_number(text)


@given(st.floats(-1e15, 1e15).filter(lambda value: value == 0 or abs(value) > 1e-30))
@settings(deadline=None, derandomize=True)
def test_every_float_reads_back(value: float) -> None:
    assert units.parse_number(repr(value)) == value


@given(st.decimals(-(10**9), 10**9, places=2))
@settings(deadline=None, derandomize=True)
def test_grouped_numbers_read_back(value: object) -> None:
    english = f"{value:,}"
    german = english.translate(str.maketrans(",.", ".,"))
    spaced = english.replace(",", " ")
    for text in (english, german, spaced, spaced.replace(".", ",")):
        assert units.parse_number(text) == float(str(value))
