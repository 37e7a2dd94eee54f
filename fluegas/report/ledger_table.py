"""The ledger as a table model: settings are columns, figures are rows in groups. Text and CSV both come from it.

Rows that say nothing for a scenario (no such gas, a loss that is zero everywhere) are left out.
"""

from collections.abc import Iterable, Sequence
from dataclasses import dataclass

import numpy as np

from fluegas.accounting.emission_figures import LABELS
from fluegas.accounting.emissions import COUNTED_AS, ORIGINS, origins, per_year
from fluegas.accounting.figures import CREDIT_LABELS, LOSS_LABELS, figures
from fluegas.accounting.inputs import BASES
from fluegas.accounting.ledger import other_losses
from fluegas.report.numbers import MISSING, in_unit, shown, unit_of
from fluegas.scenario.fields import FIELDS_OF
from fluegas.scenario.model import Table
from fluegas.scenario.result import Result
from fluegas.thermo.polynomials import FloatArray
from fluegas.units import Measure, Price, from_si

SMALLEST_SHOWN = 5e-5
"""A credit below this share of the heat input in every setting would show as 0.00 %; its row is left out."""


@dataclass(frozen=True)
class Row:
    """One line: the figure's dotted `name`, `label` and `unit`, for each setting a number (or None) and its text."""

    name: str
    label: str
    unit: str
    numbers: tuple[float | None, ...]
    texts: tuple[str, ...]
    is_sum: bool = False


@dataclass(frozen=True)
class Group:
    """Rows under one heading."""

    title: str
    rows: tuple[Row, ...]


@dataclass(frozen=True)
class LedgerTable:
    """The whole ledger: names of the settings, the place of the baseline, groups of rows."""

    settings: tuple[str, ...]
    baseline: int
    groups: tuple[Group, ...]


def ledger_table(result: Result, *, system: str, basis: str) -> LedgerTable:
    """Return the table model of `result` in "si" or "us" units, with the account on `basis` ("gross" or "net")."""
    groups = (
        Group("entered", tuple(_entered(result))),
        Group("mixture", tuple(_mixture(result, system))),
        Group(f"heat account, {basis}", tuple(_heat_account(result, basis))),
        Group("beside the account", tuple(_beside(result, system, basis))),
        Group("limits", tuple(_limits(result, system))),
        Group(f"emissions, {basis} input", tuple(_emissions(result, system, basis))),
        *_against(result, system),
    )
    names = tuple(column.name for column in result.case.columns)
    return LedgerTable(names, result.case.unit.baseline, tuple(group for group in groups if group.rows))


def _entered(result: Result) -> Iterable[Row]:
    """Yield what was entered for the settings, in the words and units of the file."""
    settings = result.scenario.settings
    for key, field in FIELDS_OF["setting"].items():
        if field.kind == "quantity" or key == "o2_basis":
            yield from _text_row(f"entered.{key}", field.label, [_reading(setting, key) for setting in settings])
    columns = result.case.columns
    for name, wholes in (
        ("air", [column.air_entry for column in columns]),
        ("fuel", [column.entry for column in columns]),
    ):
        overrides = [setting.table(name) or Table() for setting in settings]
        for key in dict.fromkeys(key for override in overrides for key in _named(override)):
            field = FIELDS_OF[name][key]
            if field.kind not in ("table", "rows"):
                yield from _text_row(
                    f"entered.{name}.{key}", field.label, [_as_written(whole, key) for whole in wholes]
                )
        for analysis in ("mole_percent", "mass_percent"):
            inner = [override.table(analysis) or Table() for override in overrides]
            for key in dict.fromkeys(key for table in inner for key in table.entries):
                own = [table.number(key) for table in inner]
                base = [(whole.table(analysis) or Table()).number(key) for whole in wholes]
                texts = [_percent_text(b if o is None else o) for o, b in zip(own, base, strict=True)]
                yield from _text_row(f"entered.{name}.{analysis}.{key}", key.capitalize(), texts)


def _named(override: Table) -> Iterable[str]:
    """Yield the keys of an override; a library fuel and a blend are shown by the fuel's name."""
    for key in override.entries:
        yield "name" if key in ("library", "part") else key


def _text_row(name: str, label: str, texts: Sequence[str]) -> Iterable[Row]:
    if any(text != MISSING for text in texts):
        yield Row(name, label, "", (None,) * len(texts), tuple(texts))


def _as_written(table: Table, key: str) -> str:
    value = table.entries.get(key)
    return value.text.strip() if isinstance(value, Measure | Price) else MISSING if value is None else str(value)


def _percent_text(value: float | None) -> str:
    return MISSING if value is None else f"{value:g} %"


def _reading(setting: Table, key: str) -> str:
    """Return a reading as it was written; of repeat readings the mean in the unit of the first, and their number."""
    repeats = [measure for row in setting.rows("readings") if (measure := row.measure(key)) is not None]
    if not repeats:
        return _as_written(setting, key)
    first = repeats[0]
    if any(measure.dimension != first.dimension for measure in repeats):
        return f"{len(repeats)} readings"
    mean = sum(measure.value for measure in repeats) / len(repeats)
    return f"{from_si(mean, first.dimension, first.unit):.4g} {first.unit} ({len(repeats)})"


def figure_row(name: str, label: str, dimension: str, values: FloatArray, system: str, *, signed: bool = False) -> Row:
    """Return one line of SI `values` of a `dimension` in units of the `system`; `signed` puts a plus before gains."""
    unit = unit_of(dimension, system)
    numbers = tuple(in_unit(float(value), dimension, unit) for value in values)
    texts = tuple(shown(float(value), dimension, unit, signed=signed) for value in values)
    return Row(name, label, unit, numbers, texts)


def _figures(result: Result, names: Iterable[str], system: str) -> Iterable[Row]:
    for name in names:
        values = result.ledger.account[name]
        if np.all(np.isnan(values)):
            continue
        figure = figures()[name]
        yield figure_row(name, figure.label, figure.dimension, values, system)


def _mixture(result: Result, system: str) -> Iterable[Row]:
    yield from _figures(result, ("excess_air", "air_per_fuel", "flue_gas.dry.O2", "flue_gas.dry.CO2"), system)
    for gas in ("SO2", "HCl"):
        name = f"flue_gas.dry.{gas}"
        values = result.ledger.account[name]
        if np.any(values > 0):
            yield figure_row(name, f"{gas}, dry", "trace_fraction", values, system)
    yield from _figures(result, ("flue_gas.wet.H2O",), system)


def _percent(name: str, label: str, values: FloatArray, *, signed: bool = False, is_sum: bool = False) -> Row:
    row = figure_row(name, label, "fraction", values, "si", signed=signed)
    return Row(row.name, row.label, row.unit, row.numbers, row.texts, is_sum)


def _heat_account(result: Result, basis: str) -> Iterable[Row]:
    account = result.ledger.account
    for name, (label, _) in LOSS_LABELS.items():
        if name == "other":
            for other, values in other_losses(result.case.data, basis).items():
                whole = np.broadcast_to(values, account.shape)
                yield _percent(f"losses.{basis}.other.{other}", other, whole)
        elif name in ("dry_gas", "fuel_water") or np.any(np.nan_to_num(account[f"losses.{basis}.{name}"])):
            yield _percent(f"losses.{basis}.{name}", label, account[f"losses.{basis}.{name}"])
    for name, (label, _) in CREDIT_LABELS.items():
        values = account[f"credits.{basis}.{name}"]
        if np.any(np.abs(np.nan_to_num(values)) >= SMALLEST_SHOWN):
            yield _percent(f"credits.{basis}.{name}", label, values, signed=True)
    other_basis = next(each for each in BASES if each != basis)
    yield _percent(f"efficiency.{basis}", f"Useful heat, {basis}", account[f"efficiency.{basis}"], is_sum=True)
    yield _percent(f"efficiency.{other_basis}", f"Useful heat, {other_basis}", account[f"efficiency.{other_basis}"])
    name = f"efficiency_all_input.{basis}"
    yield _percent(name, figures()[name].label, account[name])


def _beside(result: Result, system: str, basis: str) -> Iterable[Row]:
    names = (
        "stack_loss_from_air.rigorous",
        "stack_loss_from_air.short_formula",
        f"available_heat.{basis}",
        "flame_temperature.complete",
    )
    yield from _figures(result, names, system)


def _limits(result: Result, system: str) -> Iterable[Row]:
    days = ("o2_coldest", "o2_hottest", "excess_air_coldest", "excess_air_hottest")
    names = ("dew_point.water", "dew_point.acid", *(f"air_density.{day}" for day in days))
    yield from _figures(result, names, system)


def _emissions(result: Result, system: str, basis: str) -> Iterable[Row]:
    """Yield carbon dioxide and each gas that was read or that the fuel's sulfur makes; NOx stands for NO and NO2."""
    case, account = result.case, result.ledger.account
    year = per_year(account, result.ledger.annual_heat, case.data.basis)
    stems = ("co2", "all_co2") if np.any(case.data.biogenic_share) else ("co2",)
    for stem in stems:
        yield from _figures(result, (f"emissions.{stem}_per_useful", f"emissions.{stem}_per_input.{basis}"), system)
        yield from _a_year(stem, "Fossil CO2" if stem == "co2" else "All CO2", "mass", year[stem], system)
    found = [gas for gas in COUNTED_AS if _matters(account[f"emissions.{gas}.dry"])]
    if "nox" in found:
        found = [gas for gas in found if gas not in ("no", "no2")]
    if found:
        yield from _figures(result, ("emissions.reference_oxygen",), system)
    forms = ("concentration", "at_reference_oxygen") if system == "si" else ("dry", "dry_at_reference_oxygen")
    for gas in found:
        if gas in ORIGINS:
            labels = [text or MISSING for text in origins(case.data)[gas].tolist()]
            yield from _text_row(f"emissions.{gas}.origin", f"{LABELS[gas]} by", labels)
        yield from _figures(result, [f"emissions.{gas}.{form}" for form in forms], system)
        if gas == "co":
            yield from _figures(result, ("emissions.co.air_free",), system)
        yield from _figures(result, (f"emissions.{gas}.per_input.{basis}",), system)
        yield from _a_year(gas, LABELS[gas], "trace_mass", year[gas], system)


def _matters(values: FloatArray) -> bool:
    """Return whether a gas is there in any setting."""
    return bool(np.any(np.nan_to_num(values) > 0))


def _a_year(stem: str, label: str, dimension: str, values: FloatArray, system: str) -> Iterable[Row]:
    if not np.all(np.isnan(values)):
        yield figure_row(f"emissions.{stem}.per_year", f"{label} a year", dimension, values, system)


def _against(result: Result, system: str) -> Iterable[Group]:
    """Yield the comparison, if there is more than one setting."""
    if len(result.case.columns) < 2:
        return
    comparison, columns = result.ledger.comparison, result.case.columns
    baseline = result.case.unit.baseline
    others = comparison.compared_with
    plain = all(other == baseline for other in others)
    rows: list[Row] = []
    if not plain:
        names = tuple(columns[other].name if other != place else MISSING for place, other in enumerate(others))
        rows.append(Row("against_baseline.compared_with", "Compared with", "", (None,) * len(names), names))
    rows.append(_percent("against_baseline.fuel", "Fuel", comparison.fuel, signed=True))
    if len({id(column.entry) for column in columns}) > 1:
        rows.append(_percent("against_baseline.fuel_gross", "Fuel, gross", comparison.fuel_gross, signed=True))
        rows.append(_percent("against_baseline.fuel_net", "Fuel, net", comparison.fuel_net, signed=True))
    if not _unknown(comparison.heat, others):
        rows.append(figure_row("against_baseline.heat", "Heat a year", "energy", comparison.heat, system, signed=True))
    if not _unknown(comparison.cost, others):
        texts = tuple(MISSING if np.isnan(cost) else f"{cost:+,.0f}".replace(",", " ") for cost in comparison.cost)
        numbers = tuple(None if np.isnan(cost) else float(cost) for cost in comparison.cost)
        rows.append(Row("against_baseline.cost", "Cost a year", result.case.currency or "", numbers, texts))
    if not _unknown(comparison.carbon_dioxide, others):
        carbon = comparison.carbon_dioxide
        rows.append(figure_row("against_baseline.co2", "Fossil CO2 a year", "mass", carbon, system, signed=True))
    yield Group("against baseline" if plain else "against", tuple(rows))


def _unknown(values: FloatArray, others: Sequence[int]) -> bool:
    """Return whether every setting that is compared with another one lacks the figure."""
    return all(np.isnan(value) for place, value in enumerate(values) if others[place] != place)
