"""`fluegas fuel` and `fluegas fuels`: kept outputs, table and JSON agree, files and names, units, basis, refusals."""

import json
import re
from pathlib import Path
from typing import Any

import pytest
from rich.cells import cell_len

from fluegas.__main__ import main
from fluegas.accounting.fuel_figures import fuel_figure_table
from fluegas.scenario.library import library_names
from tests.cli.accounts import DEMOS, ESCAPE, demo
from tests.cli.golden_files import assert_golden
from tests.scenario.documents import Document, document, setting, text_of


def ran(capsys: pytest.CaptureFixture[str], *words: str) -> tuple[int, str, str]:
    status = main(list(words))
    out, err = capsys.readouterr()
    return status, out, err


def printed(capsys: pytest.CaptureFixture[str], *words: str) -> str:
    status, out, err = ran(capsys, *words)
    assert status == 0, err
    return out


def fuels(capsys: pytest.CaptureFixture[str], *words: str) -> list[dict[str, Any]]:
    whole = json.loads(printed(capsys, *words, "--json"))
    assert whole["format"] == 1
    listed: list[dict[str, Any]] = whole["fuels"]
    return listed


def written(folder: Path, plain: Document) -> str:
    file = folder / "unit.toml"
    file.write_text(text_of(plain), encoding="utf-8")
    return str(file)


@pytest.mark.parametrize(
    ("name", "words"),
    [
        ("fuel-pipeline-gas-si", ("fuel", "pipeline gas")),
        ("fuel-pipeline-gas-us", ("fuel", "pipeline-gas", "--units", "us")),
        ("fuel-wood-chips-net", ("fuel", "wood chips", "--basis", "net")),
        ("fuel-light-oil", ("fuel", "light oil")),
        ("fuels-si", ("fuels",)),
        ("fuels-us", ("fuels", "--units", "us")),
    ],
)
def test_kept_outputs(name: str, words: tuple[str, ...], capsys: pytest.CaptureFixture[str]) -> None:
    assert_golden(f"{name}.txt", printed(capsys, *words))


@pytest.mark.parametrize("name", [demo(name) for name in DEMOS], ids=DEMOS)
@pytest.mark.parametrize("units", ["si", "us"])
def test_demos_fit_eighty_columns(name: str, units: str, capsys: pytest.CaptureFixture[str]) -> None:
    text = printed(capsys, "fuel", name, "--units", units)
    assert text
    assert ESCAPE not in text
    assert max(cell_len(line) for line in text.splitlines()) <= 80
    assert not any(line.endswith(" ") for line in text.splitlines())


def test_the_table_agrees_with_the_json(capsys: pytest.CaptureFixture[str]) -> None:
    (fuel,) = fuels(capsys, "fuel", "propane")
    lines = printed(capsys, "fuel", "propane").splitlines()

    def row(label: str, unit: str) -> list[float]:
        (line,) = [line for line in lines if re.match(rf"\s*{re.escape(label)}\s+{re.escape(unit)} ", line)]
        cells = re.split(r"\s{2,}", line.strip())[2:]
        return [float(cell.replace(" ", "")) for cell in cells]

    values = [fuel[f"{basis}_heating_value"] / 1e6 for basis in ("gross", "net")]
    assert row("Heating value", "MJ/kg") == pytest.approx(values, abs=5e-4)
    factors = [fuel["carbon_dioxide"][basis]["fossil"] * 3.6e9 for basis in ("gross", "net")]
    assert row("Fossil CO2", "kg/MWh") == pytest.approx(factors, abs=0.05)
    meterings = ("0 degC", "15 degC", "20 degC", "60 degF")
    for label, unit, key, factor, step in (
        ("Gross Wobbe index", "MJ/m3", "gross_wobbe_index", 1e-6, 5e-4),
        ("Density", "kg/m3", "density", 1.0, 5e-5),
        ("Compression factor", "-", "compression_factor", 1.0, 5e-6),
    ):
        expected = [fuel["real_gas"][metering][key] * factor for metering in meterings]
        assert row(label, unit) == pytest.approx(expected, abs=step), label
    assert row("Maximum CO2, dry", "%") == pytest.approx([100 * fuel["maximum_carbon_dioxide"]], abs=5e-3)
    assert row("F factor, dry (Fd)", "m3/GJ") == pytest.approx([fuel["f_factor"]["dry"] * 1e9], abs=0.05)


def test_the_json_has_every_figure_and_null_where_there_is_none(capsys: pytest.CaptureFixture[str]) -> None:
    listed = fuels(capsys, "fuels")
    assert [fuel["library"] for fuel in listed] == list(library_names())
    for fuel in listed:
        for name in fuel_figure_table():
            value = fuel
            for part in name.split("."):
                value = value[part]
            is_volume = name.startswith(("molar.", "real_gas.")) or name.endswith("volume_ratio")
            has_carbon = fuel["carbon_dioxide"]["gross"] != {"fossil": 0.0, "biogenic": 0.0}
            if (is_volume and fuel["state"] != "gas") or (name == "f_factor.ratio" and not has_carbon):
                assert value is None, name
            else:
                assert isinstance(value, float), (fuel["name"], name)
        assert fuel["origin"]
        assert (fuel["composition"]["mole"] is None) == (fuel["state"] != "gas")


def test_basis_and_units_change_the_table_alone(capsys: pytest.CaptureFixture[str]) -> None:
    plain = printed(capsys, "fuel", "straw", "--json")
    assert printed(capsys, "fuel", "straw", "--json", "--units", "us", "--basis", "net") == plain
    gross, net = (printed(capsys, "fuel", "straw", "--basis", basis).split() for basis in ("gross", "net"))
    assert gross.index("gross") < gross.index("net")
    assert net.index("net") < net.index("gross")


def test_a_file_shows_its_basis_first_and_each_of_its_fuels(tmp_path: Path, capsys: pytest.CaptureFixture[str]) -> None:
    settings = [setting("Oil"), setting("Oil, less air", o2="4 %"), setting("Wood", fuel={"library": "wood chips"})]
    file = written(tmp_path, document({"library": "light oil"}, *settings, basis="net"))
    text = printed(capsys, "fuel", file)
    assert text.index("  net") < text.index("  gross")
    assert "burnt in: Oil, Oil, less air\n" in text
    assert "burnt in: Wood\n" in text
    first, second = fuels(capsys, "fuel", file)
    assert (first["library"], first["settings"]) == ("light oil", ["Oil", "Oil, less air"])
    assert (second["library"], second["settings"]) == ("wood chips", ["Wood"])


def test_a_blend_of_a_file(tmp_path: Path, capsys: pytest.CaptureFixture[str]) -> None:
    parts = [
        {"library": "pipeline gas", "share": "50 %", "share_of": "heat"},
        {"library": "light oil", "share": "50 %", "share_of": "heat"},
    ]
    file = written(tmp_path, document({"part": parts}))
    (fuel,) = fuels(capsys, "fuel", file)
    assert fuel["name"] == "Pipeline gas, high calorific with Light heating oil"
    assert fuel["library"] is None
    assert fuel["composition"]["mole"] is None
    apart = [fuels(capsys, "fuel", name)[0] for name in ("pipeline gas", "light oil")]
    factor = sum(each["carbon_dioxide"]["gross"]["fossil"] for each in apart) / 2
    assert fuel["carbon_dioxide"]["gross"]["fossil"] == pytest.approx(factor, rel=1e-9)
    assert "cautions: 2" in printed(capsys, "fuel", file)


@pytest.mark.parametrize("name", library_names())
def test_every_library_name_works_in_a_file_by_the_command(
    name: str, tmp_path: Path, capsys: pytest.CaptureFixture[str]
) -> None:
    file = written(tmp_path, document({"library": name}, setting("A", o2="6 %")))
    (account,) = json.loads(printed(capsys, "account", file, "--json"))["settings"]
    (fuel,) = fuels(capsys, "fuel", name)
    assert account["gross_heating_value"] == pytest.approx(fuel["gross_heating_value"])
    assert "fuel_from_library" in [caution["code"] for caution in account["cautions"]]


def test_another_reference_temperature(capsys: pytest.CaptureFixture[str]) -> None:
    """ISO 6976:2016 table A.4: methane 892.92 kJ/mol at 0 degC, 890.58 at 25."""
    (cold,) = fuels(capsys, "fuel", "methane", "--reference-temperature", "0degC")
    (warm,) = fuels(capsys, "fuel", "methane")
    assert cold["reference_temperature"] == 273.15
    assert cold["molar"]["gross_heating_value"] == pytest.approx(892_920, rel=5e-5)
    assert warm["molar"]["gross_heating_value"] == pytest.approx(890_580, rel=5e-5)


@pytest.mark.parametrize(
    ("words", "message"),
    [
        (("fuel", "propan"), "no such file, and there is no library fuel 'propan'; did you mean 'propane'?"),
        (("fuel", "missing.toml"), "there is no such file"),
        (("fuel", "folder/missing"), "there is no such file"),
        (("fuel",), "Missing argument"),
        (("fuel", "coke", "--reference-temperature", "warm"), "--reference-temperature"),
        (("fuel", "coke", "--reference-temperature", "90 degC"), "it must be at most"),
        (("fuel", demo("laundry-boiler.toml"), "--reference-temperature", "0 degC"), "for library fuels"),
        (("fuel", "coke\x1b[31m"), "no library fuel"),
        (("fuel", "x\x00y"), "no library fuel"),
        (("fuels", "coke"), "unexpected extra argument"),
    ],
)
def test_refusals(words: tuple[str, ...], message: str, capsys: pytest.CaptureFixture[str]) -> None:
    status, out, err = ran(capsys, *words)
    assert status == 2
    assert out == ""
    assert message in err
    assert "Traceback" not in err
    assert ESCAPE not in err


def test_a_file_comes_before_a_library_fuel_of_its_name(
    tmp_path: Path, capsys: pytest.CaptureFixture[str], monkeypatch: pytest.MonkeyPatch
) -> None:
    monkeypatch.chdir(tmp_path)
    Path("propane").write_text(text_of(document({"library": "coke"})), encoding="utf-8")
    assert fuels(capsys, "fuel", "propane")[0]["library"] == "coke"
    assert fuels(capsys, "fuel", "butane")[0]["library"] == "butane"


def test_text_of_a_file_is_shown_literally(tmp_path: Path, capsys: pytest.CaptureFixture[str]) -> None:
    file = written(tmp_path, document({"library": "coke", "name": "[bold]C[/] :smile:"}))
    assert printed(capsys, "fuel", file).startswith("[bold]C[/] :smile:\n")
