"""Inputs of the fuel: its state, heating value, price, analyses and ash."""

from fluegas.scenario.field import SHARE, TEMPERATURE, Field

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

HEATING_VALUE = ("energy_per_mass", "energy_per_amount")

FUEL_FIELDS = (
    Field(
        "fuel",
        "library",
        "Library fuel",
        "text",
        example='"wood chips"',
        help="A fuel of the library by name; entries beside it lead, and mass_percent.moisture alone wets it anew.",
    ),
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
    Field(
        "fuel",
        "part",
        "Co-firing",
        "rows",
        help="Fuels fired together, each with its share of the heat or of the mass.",
    ),
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
