"""The species table: molar masses, formation, elements, and what happens to a damaged file."""

import re
from collections.abc import Callable, Iterator

import pytest

from fluegas import resources
from fluegas.errors import DataError, InputError
from fluegas.resources import data_text
from fluegas.thermo import species as species_module
from fluegas.thermo.mixture import GasSet
from fluegas.thermo.species import atomic_weight, species, species_table, symbol_of
from tests.reference.tables import table

GASES = [symbol for symbol, entry in species_table().items() if entry.is_gas]

# CIAAW abridged standard atomic weights [g/mol], IUPAC 2021, typed again here.
ATOMIC_WEIGHTS = {
    "H": 1.0080,
    "He": 4.0026,
    "C": 12.011,
    "N": 14.007,
    "O": 15.999,
    "S": 32.06,
    "Cl": 35.45,
    "Ar": 39.95,
}


def formula_of(symbol: str) -> dict[str, int]:
    """Return the atoms that a symbol such as "i-C4H10" or "H2O(l)" spells."""
    bare = re.sub(r"^([nict]-|1-|[ct]-2-)|\(.*\)$", "", symbol)
    atoms: dict[str, int] = {}
    for element, count in re.findall(r"(Cl|He|Ar|[CHONS])(\d*)", bare):
        atoms[element] = atoms.get(element, 0) + int(count or 1)
    return atoms


@pytest.mark.parametrize("symbol", species_table())
def test_elements_are_those_that_the_symbol_spells(symbol: str) -> None:
    assert dict(species(symbol).elements) == formula_of(symbol)


@pytest.mark.parametrize("symbol", species_table())
def test_molar_mass_is_the_sum_of_the_atomic_weights(symbol: str) -> None:
    expected = sum(ATOMIC_WEIGHTS[element] * count for element, count in formula_of(symbol).items())
    assert species(symbol).molar_mass == pytest.approx(1e-3 * expected, rel=1e-12)


def test_molar_masses_are_those_of_iso_6976() -> None:
    """The standard of 2016 took older weights: sulfur 32.065 (-1.5e-4), carbon 12.0107, hydrogen 1.00794 (+6e-5)."""
    for row in table("iso_6976_gross"):
        tolerance = 1.6e-4 if "S" in row["gas"] else 7e-5
        assert species(row["gas"]).molar_mass == pytest.approx(1e-3 * float(row["molar_mass"]), rel=tolerance)


def test_atomic_weight_is_in_kilograms_per_mole() -> None:
    assert atomic_weight("Ar") == pytest.approx(0.03995)


@pytest.mark.parametrize("symbol", GASES)
def test_polynomials_give_the_enthalpy_of_formation(symbol: str) -> None:
    """Printed digits of the report's b1 leave up to 0.001 J/mol."""
    enthalpy = float(GasSet.of(symbol).enthalpies(298.15)[0])
    assert enthalpy == pytest.approx(species(symbol).enthalpy_of_formation, abs=2e-3)


def test_formation_agrees_with_a_textbook_table() -> None:
    """Moran and Shapiro, table A-25. Acetylene and hydroxyl have been revised since (Ruscic 2002 for OH)."""
    revised = {"C2H2": 1.6, "OH": 2.3}
    for row in table("heats_of_formation"):
        found = species(row["species"]).enthalpy_of_formation / 1000
        assert found == pytest.approx(float(row["formation"]), abs=revised.get(row["species"], 0.9)), row["species"]


@pytest.mark.parametrize("symbol", GASES)
def test_every_gas_spans_the_ranges_that_the_mixture_assumes(symbol: str) -> None:
    assert species(symbol).temperatures == (200.0, 1000.0, 6000.0)


def test_a_symbol_is_found_by_its_plain_name() -> None:
    assert symbol_of("carbon dioxide") == "CO2"
    assert symbol_of("helium") == "He"
    assert {symbol_of(species(gas).name) for gas in GASES} == set(GASES)


def test_unknown_species_and_names_are_told() -> None:
    with pytest.raises(InputError, match=r"^no species 'XeF2' in the table; it has N2, O2, "):
        species("XeF2")
    with pytest.raises(InputError, match=r"^no gas named 'phlogiston' in the species table$"):
        symbol_of("phlogiston")


def test_liquids_have_no_gas_name() -> None:
    with pytest.raises(InputError, match="no gas named 'liquid water'"):
        symbol_of("liquid water")


def test_the_table_cannot_be_changed() -> None:
    with pytest.raises(TypeError):
        species_table()["N2"] = species("O2")  # type: ignore[index]
    with pytest.raises(TypeError):
        species("N2").elements["N"] = 3  # type: ignore[index]


@pytest.fixture
def fresh_table() -> Iterator[None]:
    species_module._tables.cache_clear()
    yield
    species_module._tables.cache_clear()


DAMAGES: dict[str, Callable[[str], str]] = {
    "cut off": lambda text: text[: len(text) // 2],
    "no atomic weights": lambda text: text.replace("[atomic_weights]", "[weights]"),
    "unknown element": lambda text: text.replace("elements = { N = 2 }", "elements = { Nn = 2 }", 1),
    "no phase": lambda text: text.replace('phase = "gas"', "", 1),
    "word for a number": lambda text: text.replace("22103.71497", '"twenty"', 1),
    "coefficient lost": lambda text: text.replace("22103.71497, ", "", 1),
    "joint lost": lambda text: text.replace("[200.0, 1000.0, 6000.0]", "[200.0, 6000.0]", 1),
    "species no table": lambda text: text.split("[species.", 1)[0] + "species = 3\n",
    "empty": lambda text: "",
}


@pytest.mark.parametrize("damage", DAMAGES)
@pytest.mark.usefixtures("fresh_table")
def test_a_damaged_file_is_told(damage: str, monkeypatch: pytest.MonkeyPatch) -> None:
    text = data_text("species.toml")
    damaged = DAMAGES[damage](text)
    assert damaged != text
    monkeypatch.setattr(resources, "data_text", lambda name: damaged)
    with pytest.raises(DataError, match=r"^data/species\.toml is damaged: .*; install fluegas again$"):
        species("N2")


@pytest.mark.usefixtures("fresh_table")
def test_a_missing_file_is_told(monkeypatch: pytest.MonkeyPatch) -> None:
    original = data_text
    monkeypatch.setattr(resources, "data_text", lambda name: original("absent-" + name))
    with pytest.raises(DataError, match=r"^the data file 'absent-species\.toml' is missing from this installation$"):
        species("N2")
