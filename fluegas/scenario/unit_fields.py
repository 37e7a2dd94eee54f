"""Inputs of the file, the plant, the fuel, the air, accuracies and limits."""

from fluegas.scenario.field import Field

STATES = ("gas", "liquid", "solid")
FUEL_KINDS = (
    "natural gas",
    "liquefied petroleum gas",
    "propane",
    "butane",
    "coke-oven gas",
    "biogas",
    "distillate oil",
    "plant oil",
    "residual oil",
    "anthracite",
    "bituminous coal",
    "lignite",
    "wood",
    "wood bark",
    "other",
)
GASES = (
    "methane",
    "ethane",
    "propane",
    "n-butane",
    "isobutane",
    "n-pentane",
    "isopentane",
    "n-hexane",
    "n-heptane",
    "n-octane",
    "ethylene",
    "propylene",
    "1-butene",
    "isobutene",
    "cis-2-butene",
    "trans-2-butene",
    "acetylene",
    "benzene",
    "toluene",
    "methanol",
    "ethanol",
    "dimethyl ether",
    "hydrogen",
    "carbon monoxide",
    "hydrogen sulfide",
    "ammonia",
    "carbonyl sulfide",
    "carbon disulfide",
    "hydrogen cyanide",
    "carbon dioxide",
    "nitrogen",
    "oxygen",
    "argon",
    "helium",
    "water",
)
MASS_PARTS = ("carbon", "hydrogen", "oxygen", "nitrogen", "sulfur", "chlorine", "moisture", "ash")

SHARE = ("fraction",)
TEMPERATURE = ("temperature",)
HEATING_VALUE = ("energy_per_mass", "energy_per_amount")
FUEL_RATE = ("mass_flow", "amount_flow")

_TOP = (
    Field("top", "fluegas", "File format", "whole", low=1, example="1", help="Format of the file; this is format 1."),
    Field("top", "title", "Title", "text", example='"Boiler 2, autumn audit"', help="Heads every table and report."),
    Field("top", "note", "Note", "text", help="Free text."),
    Field(
        "top",
        "basis",
        "Basis",
        "choice",
        choices=("gross", "net"),
        default="gross",
        help="Heating value that is shown first and that percents, heat input and price refer to.",
    ),
    Field(
        "top",
        "reference_temperature",
        "Reference temp.",
        dimensions=TEMPERATURE,
        low=273.15,
        high=313.15,
        default="25 degC",
        help="At which heating values are stated and from which heat is counted; 0, 15, 20, 25 degC are usual.",
    ),
    *(
        Field("top", key, label, kind)
        for key, label, kind in (
            ("plant", "Plant", "table"),
            ("fuel", "Fuel", "table"),
            ("air", "Air", "table"),
            ("accuracy", "Accuracy", "table"),
            ("limits", "Limits", "table"),
            ("setting", "Setting", "rows"),
        )
    ),
    Field("top", "readings", "Readings log", "table", later="logger files come with a later version"),
)

_PLANT = (
    Field("plant", "name", "Unit", "text", help="Name of the unit."),
    Field("plant", "site", "Site", "text", help="Where it stands."),
    Field(
        "plant",
        "kind",
        "Kind of unit",
        "choice",
        choices=("boiler", "heater", "furnace", "dryer", "kiln", "other"),
        help="What kind of fired unit it is.",
    ),
    Field(
        "plant",
        "heat_input",
        "Heat input",
        dimensions=("power",),
        low=1.0,
        high=1e11,
        example="3.2 MW",
        help="Fuel heat of the baseline, on the file's basis, from the fuel meter and the heating value.",
    ),
    Field(
        "plant",
        "fuel_rate",
        "Fuel rate",
        dimensions=FUEL_RATE,
        low=1e-9,
        high=1e6,
        example="290 kg/h",
        help="Fuel of the baseline by mass or by normal volume; stands in for the heat input.",
    ),
    Field(
        "plant",
        "rated_output",
        "Rated output",
        dimensions=("power",),
        low=1.0,
        high=1e11,
        example="2.8 MW",
        help="Useful heat at full load, from the type plate; the surface loss can be estimated from it.",
    ),
    Field(
        "plant",
        "operating_hours",
        "Operating hours",
        dimensions=("time",),
        low=0.0,
        high=8784 * 3600.0,
        example="5200 h",
        help="Hours a year at the heat input given.",
    ),
    Field(
        "plant",
        "annual_fuel",
        "Annual fuel",
        dimensions=("energy", "mass", "amount"),
        low=0.0,
        high=1e20,
        example="14000 MWh",
        help="Fuel of a year at the baseline, by heat (file's basis), mass or normal volume; leads over hours.",
    ),
    Field(
        "plant",
        "surface_loss",
        "Surface loss",
        "quantity or word",
        dimensions=SHARE,
        low=0.0,
        high=0.5,
        choices=("estimate",),
        example="1.1 %",
        help="Radiation and convection of the baseline in percent of its heat input, or the word estimate.",
    ),
    Field(
        "plant",
        "other_losses",
        "Other losses",
        "table",
        help="Further losses by name, in percent of heat input on the file's basis.",
    ),
    Field(
        "plant",
        "reference_oxygen",
        "Reference oxygen",
        dimensions=SHARE,
        low=0.0,
        high=0.2,
        example="3 %",
        unused=True,
        help="Oxygen to which emission limits refer.",
    ),
)

_FUEL = (
    Field("fuel", "library", "Library fuel", "text", later="the fuel library comes with a later version"),
    Field("fuel", "name", "Fuel", "text", help="Name of the fuel or of the sample."),
    Field(
        "fuel",
        "kind",
        "Kind of fuel",
        "choice",
        choices=FUEL_KINDS,
        help="Chooses constants that standards give by kind of fuel; the account itself needs only the analysis.",
    ),
    Field("fuel", "state", "State", "choice", choices=STATES, help="Gas, liquid or solid as fired."),
    Field(
        "fuel",
        "temperature",
        "Fuel temperature",
        dimensions=TEMPERATURE,
        low=200.0,
        high=1000.0,
        example="15 degC",
        help="Where the fuel crosses the boundary, before the unit's own steam or flue gas heats it; the reference "
        "temperature if not given, so that it brings no heat.",
    ),
    Field(
        "fuel", "price", "Price", "price", example="38 EUR/MWh", help="By heat (file's basis), mass or normal volume."
    ),
    *(
        Field(
            "fuel",
            f"{basis}_heating_value",
            f"{basis.capitalize()} heating value",
            dimensions=HEATING_VALUE,
            low=1.0,
            high=2e8,
            example="45.5 MJ/kg",
            help=f"{basis.capitalize()} heating value on the basis of the analysis, at the reference temperature.",
        )
        for basis in ("gross", "net")
    ),
    Field(
        "fuel",
        "heating_value_at",
        "Heating value at",
        "choice",
        choices=("constant pressure", "constant volume"),
        default="constant pressure",
        help="A bomb calorimeter's value is at constant volume and is converted.",
    ),
    Field(
        "fuel",
        "analysis_basis",
        "Analysis basis",
        "choice",
        choices=("as fired", "dry", "dry ash-free"),
        default="as fired",
        help="What the mass analysis and the heating value refer to; moisture is always as fired.",
    ),
    Field(
        "fuel",
        "specific_heat",
        "Heat capacity",
        dimensions=("heat_capacity_mass",),
        low=100.0,
        high=20_000.0,
        example="2.0 kJ/kg K",
        help="Of the dry liquid or solid fuel; 2.0 (liquid) and 1.3 kJ/kg K (solid) if not given.",
    ),
    Field(
        "fuel", "density", "Density", dimensions=("density",), low=0.01, high=5000.0, unused=True, help="Of the fuel."
    ),
    Field(
        "fuel",
        "biogenic_share",
        "Biogenic share",
        dimensions=SHARE,
        low=0.0,
        high=1.0,
        default="0 %",
        help="Share of the carbon that is not fossil.",
    ),
    Field(
        "fuel",
        "so3_share",
        "SO3 share",
        dimensions=SHARE,
        low=0.0,
        high=0.5,
        example="2 %",
        help="SO3 over SO2, molar, for the acid dew point; 2 % for oil and 1 % for coal are common practice.",
    ),
    Field("fuel", "mole_percent", "Gas analysis", "table", help="Gas by gas in mole percent."),
    Field(
        "fuel", "mass_percent", "Mass analysis", "table", help="Element by element, moisture and ash in mass percent."
    ),
    Field("fuel", "ash_stream", "Ash streams", "rows", help="Where ash leaves and how much carbon it holds."),
    Field("fuel", "part", "Co-firing", "rows", later="co-firing comes with a later version"),
    *(
        Field("fuel.mole_percent", gas, gas, "percent", low=0.0, high=1e3, help=f"Mole percent of {gas}.")
        for gas in GASES
    ),
    *(
        Field("fuel.mass_percent", part, part, "percent", low=0.0, high=1e3, help=f"Mass percent of {part}.")
        for part in MASS_PARTS
    ),
    Field("fuel.ash_stream", "name", "Ash stream", "text", help="Where this ash leaves, such as grate or filter."),
    Field(
        "fuel.ash_stream",
        "ash_share",
        "Share of ash",
        dimensions=SHARE,
        low=0.0,
        high=1.0,
        example="70 %",
        help="Share of the fuel's ash that leaves here.",
    ),
    Field(
        "fuel.ash_stream",
        "carbon",
        "Carbon in residue",
        dimensions=SHARE,
        low=0.0,
        high=0.99,
        example="6 %",
        help="Mass share of carbon in this residue, from the laboratory.",
    ),
)

_AIR = (
    Field(
        "air",
        "temperature",
        "Air temperature",
        dimensions=TEMPERATURE,
        low=200.0,
        high=1500.0,
        example="22 degC",
        help="Of the combustion air, where its humidity is measured, usually at the fan's inlet.",
    ),
    Field("air", "relative_humidity", "Relative humidity", dimensions=SHARE, low=0.0, high=1.0, example="55 %"),
    Field("air", "wet_bulb", "Wet bulb", dimensions=TEMPERATURE, low=273.16, high=373.0, example="16 degC"),
    Field("air", "dew_point", "Air dew point", dimensions=TEMPERATURE, low=200.0, high=373.0, example="9 degC"),
    Field(
        "air",
        "pressure",
        "Air pressure",
        dimensions=("pressure",),
        low=1e4,
        high=1e7,
        default="1013.25 mbar",
        example="1002 mbar",
        help="Absolute, at the unit.",
    ),
    Field("air", "altitude", "Altitude", dimensions=("length",), low=-500.0, high=6000.0, example="340 m"),
    Field(
        "air",
        "oxygen",
        "Oxygen in oxidant",
        dimensions=SHARE,
        low=0.1,
        high=1.0,
        default="20.95 %",
        help="Share of oxygen in the dry oxidant.",
    ),
    Field(
        "air",
        "burner_temperature",
        "Air at burner",
        dimensions=TEMPERATURE,
        low=200.0,
        high=2000.0,
        example="280 degC",
        help="Of preheated air at the burner; say also where the heat comes from.",
    ),
    Field(
        "air",
        "preheat_from",
        "Preheated by",
        "choice",
        choices=("flue", "outside"),
        help="flue: the unit's own flue gas, which leaves the account as it is; outside: a credit.",
    ),
    Field("air", "coldest", "Coldest day", dimensions=TEMPERATURE, low=200.0, high=350.0, unused=True),
    Field("air", "hottest", "Hottest day", dimensions=TEMPERATURE, low=200.0, high=350.0, unused=True),
)

_LIMITS = (
    Field(
        "limits",
        "carbon_monoxide",
        "CO limit",
        dimensions=("fraction", "mass_concentration"),
        low=0.0,
        high=0.1,
        species="CO",
        default="100 ppm",
        help="CO in the undiluted dry gas above which a caution is given; 300 and 1000 ppm stay further limits.",
    ),
    Field("limits", "metal_temperature", "Coldest metal", dimensions=TEMPERATURE, low=200.0, high=2000.0),
)

UNIT_FIELDS = (*_TOP, *_PLANT, *_FUEL, *_AIR, *_LIMITS)
