"""Scenario texts that the tests share."""

from fluegas.errors import ScenarioError
from fluegas.scenario.reading import parse_scenario

SAMPLE = """\
fluegas = 1                              # file format
title = "Dye house boiler 2, autumn audit"
basis = "gross"                          # or "net": what is shown first, and what percents and prices refer to
reference_temperature = "25 degC"

[plant]
name = "Boiler 2"
heat_input = "3.2 MW"                    # the baseline's; or fuel_rate = "290 kg/h" / "310 Nm3/h" / "11000 scf/h"
operating_hours = "5200 h"               # a year
surface_loss = "1.1 %"

[fuel]
name = "Pipeline gas, sample 14"
state = "gas"
temperature = "15 degC"
price = "38 EUR/MWh"
[fuel.mole_percent]
methane = 93.1
ethane = 4.2
propane = 0.8
nitrogen = 1.2
"carbon dioxide" = 0.7

[air]
temperature = "22 degC"
relative_humidity = "55 %"
pressure = "1013 mbar"

[accuracy]
o2 = { shared = "0.2 vol%", random = "0.1 vol%" }
co = { shared = ["10 ppm", "5 % of reading"] }          # the larger
flue_temperature = { shared = "2 K", random = "1 K" }

[[setting]]                              # the first is the baseline unless baseline = true stands elsewhere
name = "As found"
o2 = "6.4 %"
co = "45 ppm"
flue_temperature = "231 degC"

[[setting]]
name = "Trimmed"
o2 = "3.2 %"
co = "60 ppm"
flue_temperature = "222 degC"

[[setting]]
name = "Cooled"
o2 = "3.2 %"
co = "60 ppm"
flue_temperature = "148 degC"
"""
"""A whole scenario, as a person writes it."""

HEAD = "fluegas = 1\n"
GAS = '[fuel]\nstate = "gas"\n[fuel.mole_percent]\nmethane = 97.0\nnitrogen = 3.0\n'
SOLID = '[fuel]\nstate = "solid"\n[fuel.mass_percent]\ncarbon = 60.0\nhydrogen = 5.0\nash = 15.0\nmoisture = 20.0\n'
SETTING = '[[setting]]\nname = "As found"\no2 = "6.4 %"\nflue_temperature = "231 degC"\n'
SMALL = HEAD + GAS + SETTING
"""The least that a scenario needs."""


def problems_of(text: str) -> list[str]:
    """Return the problems of a scenario text as "line key: message", none if it can be read."""
    try:
        parse_scenario(text, "some.toml")
    except ScenarioError as error:
        return [f"{problem.line} {problem.key}: {problem.message}" for problem in error.problems]
    return []
