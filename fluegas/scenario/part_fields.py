"""Inputs of one part of a blend: those of a fuel, but for what holds for the blend as a whole, and its share."""

from dataclasses import replace

from fluegas.scenario.field import SHARE, Field
from fluegas.scenario.fuel_fields import FUEL_FIELDS

WHOLE_ONLY = ("temperature", "ash_stream", "part")
"""Inputs of a fuel that a part does not have: a blend has one temperature and its own ash streams."""

PART_FIELDS = (
    Field(
        "fuel.part",
        "share",
        "Share of blend",
        dimensions=SHARE,
        low=0.0,
        high=1.0,
        example="20 %",
        help="Share of this fuel in the blend as fired; all of them sum to 100 %.",
    ),
    Field(
        "fuel.part",
        "share_of",
        "Share of",
        "choice",
        choices=("heat", "mass"),
        help="What the share refers to: heat on the file's basis, or mass as fired; the same in every part.",
    ),
    *(
        replace(field, table="fuel.part")
        for field in FUEL_FIELDS
        if field.table == "fuel" and field.key not in WHOLE_ONLY
    ),
)
