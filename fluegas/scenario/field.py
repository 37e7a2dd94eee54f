"""What a declared input consists of."""

from dataclasses import dataclass

SHARE = ("fraction",)
TEMPERATURE = ("temperature",)
FUEL_RATE = ("mass_flow", "amount_flow")
"""Dimensions that many inputs have."""


@dataclass(frozen=True)
class Field:
    """One input of a scenario file.

    table, key: where it stands. label: its standard term, short enough for a row of a table. kind: what its value is:
    "quantity", "text", "choice", "flag", "whole" (number), "percent" (bare number), "price", "quantity or word",
    "table" or "rows" (array of tables). dimensions: names of the units floor. low, high: limits in SI, inclusive.
    choices: words. default: as a user would write it, None without. example, help: words for people. species: gas whose
    share may also be given as mass per normal volume. measured: a reading, which may be repeated and have an accuracy.
    unused: understood but without effect in this version. later: why this version answers "not yet supported".
    """

    table: str
    key: str
    label: str
    kind: str = "quantity"
    dimensions: tuple[str, ...] = ()
    low: float | None = None
    high: float | None = None
    choices: tuple[str, ...] = ()
    default: str | None = None
    example: str = ""
    help: str = ""
    species: str | None = None
    measured: bool = False
    unused: bool = False
    later: str | None = None

    @property
    def name(self) -> str:
        """Dotted name, as messages and the key table give it."""
        return self.key if self.table == "top" else f"{self.table}.{self.key}"
