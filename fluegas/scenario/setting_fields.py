"""Inputs of one setting: the readings at one way of firing, and what differs in it from the rest of the file."""

from dataclasses import replace

from fluegas.scenario.field import FUEL_RATE, SHARE, TEMPERATURE, Field

GAS_SHARE = ("fraction", "mass_concentration")
FLUE_LOW, FLUE_HIGH = 200.0, 3000.0


def _gas(key: str, label: str, species: str, text: str, high: float = 1.0) -> Field:
    return Field(
        "setting",
        key,
        label,
        dimensions=GAS_SHARE,
        low=0.0,
        high=high,
        example="45 ppm",
        help=text,
        species=species,
        measured=True,
    )


def _temperature(key: str, label: str, text: str) -> Field:
    return Field(
        "setting",
        key,
        label,
        dimensions=TEMPERATURE,
        low=FLUE_LOW,
        high=FLUE_HIGH,
        example="231 degC",
        help=text,
        measured=True,
    )


_READINGS = (
    Field(
        "setting",
        "o2",
        "O2",
        dimensions=SHARE,
        low=0.0,
        high=1.0,
        example="6.4 %",
        help="Oxygen in the flue gas where it leaves; dry from an extracting analyser, wet from a probe in the duct.",
        measured=True,
    ),
    Field(
        "setting",
        "co2",
        "CO2, dry",
        dimensions=SHARE,
        low=0.0,
        high=1.0,
        example="8.3 %",
        help="Carbon dioxide, dry; gives the excess air if there is no O2, else checks it.",
        measured=True,
    ),
    Field(
        "setting",
        "excess_air",
        "Excess air, given",
        dimensions=SHARE,
        low=-0.9,
        high=50.0,
        example="15 %",
        help="Given instead of a reading.",
    ),
    _gas("co", "CO, dry", "CO", "Carbon monoxide, dry, undiluted by purge or false air if possible."),
    _gas("h2", "H2, dry", "H2", "Hydrogen, dry; with CO it lets a fuel-rich gas be worked out."),
    _gas("ch4", "CH4, dry", "CH4", "Methane, dry."),
    _gas("no", "NO, dry", "NO", "Nitric oxide, dry."),
    _gas("no2", "NO2, dry", "NO2", "Nitrogen dioxide, dry; for the emissions, too little of it to enter the balances."),
    _gas("nox", "NOx as NO2, dry", "NO2", "Nitrogen oxides together, counted as NO2, dry; leads over NO and NO2."),
    _gas("so2", "SO2, dry", "SO2", "Sulfur dioxide, dry; worked out from the fuel's sulfur if not read."),
    _temperature("flue_temperature", "Flue gas", "Of the flue gas where it leaves the boundary, after an air heater."),
    _temperature("chamber_temperature", "Chamber", "Of the gas where it leaves the furnace chamber."),
    _temperature("metal_temperature", "Coldest metal", "Of the coldest metal that the flue gas touches."),
    Field(
        "setting",
        "unburned_carbon",
        "Carbon unburned",
        dimensions=SHARE,
        low=0.0,
        high=0.9,
        example="1.5 %",
        help="Share of the fuel's carbon that leaves in the ash.",
        measured=True,
    ),
    Field(
        "setting",
        "condensate",
        "Condensate",
        dimensions=("mass_flow",),
        low=0.0,
        high=1e6,
        example="120 kg/h",
        help="Measured condensate; replaces the rule that the gas leaves saturated.",
        measured=True,
    ),
    Field(
        "setting",
        "heat_input",
        "Heat input",
        dimensions=("power",),
        low=1.0,
        high=1e11,
        example="1.1 MW",
        help="This setting's own fuel heat, on the file's basis.",
        measured=True,
    ),
    Field(
        "setting",
        "fuel_rate",
        "Fuel rate",
        dimensions=FUEL_RATE,
        low=1e-9,
        high=1e6,
        example="61 kg/h",
        help="This setting's own fuel rate.",
        measured=True,
    ),
    Field(
        "setting",
        "useful_heat",
        "Useful heat",
        dimensions=("power",),
        low=0.0,
        high=1e11,
        help="Measured on the useful side, to hold against the account.",
        measured=True,
        unused=True,
    ),
)

_SETTING = (
    Field("setting", "name", "Setting", "text", help="Heads the column; every setting has its own."),
    Field("setting", "note", "Note", "text", help="Free text."),
    Field("setting", "baseline", "Baseline", "flag", help="True for the setting that others are compared with."),
    Field("setting", "compare_with", "Compare with", "text", help="Name of another setting to compare this one with."),
    Field(
        "setting",
        "load",
        "Load",
        dimensions=SHARE,
        low=0.0,
        high=2.0,
        example="60 %",
        unused=True,
        help="Useful heat over the rated output.",
    ),
    Field(
        "setting",
        "o2_basis",
        "O2 basis",
        "choice",
        choices=("dry", "wet"),
        default="dry",
        help="dry: the analyser dries its sample; wet: a probe in the duct.",
    ),
    *_READINGS,
    Field(
        "setting",
        "heat_withdrawn",
        "Heat withdrawn",
        later="it comes with the flame at chemical equilibrium",
        help="Heat taken from the flame in the chamber.",
    ),
    Field(
        "setting",
        "second",
        "Second point",
        "table",
        later="a second sampling point comes with a later version",
        help="Readings further downstream, which show air leaking in.",
    ),
    Field("setting", "recirculation", "Recirculation", "table", help="Flue gas led back to the burner."),
    Field("setting", "readings", "Repeat readings", "rows", help="Readings of one state, averaged first."),
    Field("setting", "air", "Air", "table", help="What of [air] differs in this setting."),
    Field("setting", "fuel", "Fuel", "table", help="What of [fuel] differs in this setting."),
    Field(
        "setting.recirculation",
        "share",
        "Recirculated gas",
        dimensions=("fraction", "mass_ratio"),
        low=0.0,
        high=5.0,
        example="15 %",
        help="Kilograms of wet flue gas per kilogram of air and fuel.",
    ),
    Field(
        "setting.recirculation",
        "temperature",
        "Recirculated at",
        dimensions=TEMPERATURE,
        low=FLUE_LOW,
        high=FLUE_HIGH,
        help="Temperature of the recirculated gas; the flue temperature if not given.",
    ),
)

SETTING_FIELDS = (*_SETTING, *(replace(field, table="setting.readings") for field in _READINGS if field.measured))
