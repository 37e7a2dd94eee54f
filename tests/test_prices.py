"""Prices as people write them."""

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from fluegas import units
from fluegas.errors import QuantityError


@pytest.mark.parametrize(
    ("text", "value", "currency", "unit", "dimension"),
    [
        ("38 EUR/MWh", 38 / 3.6e9, "EUR", "MWh", "energy"),
        ("12 €/MWh", 12 / 3.6e9, "EUR", "MWh", "energy"),
        ("€12/MWh", 12 / 3.6e9, "EUR", "MWh", "energy"),
        ("EUR 38,50 / MWh", 38.5 / 3.6e9, "EUR", "MWh", "energy"),
        ("$8.00/MMBtu", 8 / 1055.05585262e6, "$", "MMBtu", "energy"),
        ("US$ 8/mmbtu", 8 / 1055.05585262e6, "USD", "MMBtu", "energy"),
        ("8 USD/MMBtu", 8 / 1055.05585262e6, "USD", "MMBtu", "energy"),
        ("0.05 £/kWh", 0.05 / 3.6e6, "GBP", "kWh", "energy"),
        ("0.41 EUR/kg", 0.41, "EUR", "kg", "mass"),
        ("1 250 SEK/t", 1.25, "SEK", "t", "mass"),
        ("-5 USD/short ton", -5 / 907.18474, "USD", "short ton", "mass"),
        ("-$5/short ton", -5 / 907.18474, "$", "short ton", "mass"),
        ("0.45 EUR/Nm³", 0.45 / 44.615033, "EUR", "Nm3", "amount"),
    ],
)
def test_prices(text: str, value: float, currency: str, unit: str, dimension: str) -> None:
    price = units.parse_price(text)
    assert price.value == pytest.approx(value, rel=1e-8)
    assert (price.currency, price.unit, price.dimension, price.text) == (currency, unit, dimension, text)


def test_published_saving() -> None:
    """US Department of Energy, Steam Tip Sheet 4: 29 482 MMBtu a year at $8.00/MMBtu are $235 856 a year."""
    saving = units.parse("29482 MMBtu", "energy").value * units.parse_price("$8.00/MMBtu").value
    assert saving == pytest.approx(235_856, rel=1e-12)


@pytest.mark.parametrize(
    ("text", "message"),
    [
        ("", "a price is missing; write e.g. 38 EUR/MWh"),
        ("38 EUR", "'38 EUR' does not say what the price is per; write e.g. 38 EUR/MWh"),
        ("38 EUR/", "'38 EUR/' does not say what the price is per; write e.g. 38 EUR/MWh"),
        ("38/MWh", "'38/MWh' names no currency; write e.g. 38 EUR/MWh"),
        ("38", "'38' names no currency; write e.g. 38 EUR/MWh"),
        ("EUR/MWh", "'EUR/MWh' has no number; write e.g. 38 EUR/MWh"),
        ("$38 USD/MWh", "'$38 USD/MWh' names two currencies; write e.g. 38 EUR/MWh"),
        ("38 eur/MWh", "unknown currency 'eur'; did you mean EUR?"),
        (
            "3.8 ct/kWh",
            "unknown currency 'ct'; write a code of three capital letters (EUR, USD) or one of € £ ₹ $ ¥, and no cents",
        ),
        ("3,500 EUR/t", "'3,500' is unclear; write 3500 or 3.500"),
        ("--5 EUR/t", "'--5' is not a number; write it like 1234.5"),
        ("38 EUR/MBtu", "MBtu can mean a thousand or a million Btu; write kBtu or MMBtu"),
        ("80 USD/ton", "ton can mean 1000 kg or 2000 lb; write t or short ton"),
        ("38 EUR/MWhh", "unknown unit 'MWhh'; did you mean MWh?"),
        ("38 EUR/xyz", "unknown unit 'xyz'; write e.g. 38 EUR/MWh"),
        ("38 EUR/kW", "kW is a unit of power; here an energy, mass or amount of gas is needed, e.g. 38 EUR/MWh"),
        ("1.1 EUR/l", "l is a unit of volume; here an energy, mass or amount of gas is needed, e.g. 38 EUR/MWh"),
        (
            "0.5 EUR/m3",
            "m3 does not say which normal volume; write Nm3 (0 degC), Sm3 (15 degC) or scf (60 degF)",
        ),
    ],
)
def test_messages(text: str, message: str) -> None:
    with pytest.raises(QuantityError) as caught:
        units.parse_price(text)
    assert str(caught.value) == message


@given(st.text(max_size=80))
@settings(deadline=None, derandomize=True)
def test_any_text_is_read_or_refused(text: str) -> None:
    for attempt in (text, f"{text}/MWh", f"3 {text}/MWh", f"3 EUR/{text}"):
        try:
            price = units.parse_price(attempt)
        except QuantityError as error:
            assert str(error).isprintable()  # noqa: PT017
        else:
            assert price.dimension in ("energy", "mass", "amount")
