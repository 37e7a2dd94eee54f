"""A scenario as an immutable snapshot: what the user wrote, as measures that keep their text, table by table."""

from collections.abc import Callable, Mapping
from dataclasses import dataclass, field
from types import MappingProxyType
from typing import Union

from fluegas.units import Measure, Price

Value = Union[Measure, Price, str, bool, int, float, "Table", tuple["Table", ...], tuple[str, ...], "Refused"]


@dataclass(frozen=True)
class Refused:
    """Stands where an entry could not be used, so that no check calls it missing. No Scenario holds one."""


@dataclass(frozen=True)
class Table:
    """The entries of one table of a scenario file, by key, in the file's order."""

    entries: Mapping[str, Value] = field(default_factory=lambda: MappingProxyType({}))

    def measure(self, key: str) -> Measure | None:
        """Return the quantity under `key`, None if it is absent or not a quantity."""
        value = self.entries.get(key)
        return value if isinstance(value, Measure) else None

    def number(self, key: str) -> float | None:
        """Return the SI value of the quantity (or the plain number) under `key`, None if it is absent."""
        value = self.entries.get(key)
        if isinstance(value, Measure):
            return value.value
        if isinstance(value, int | float) and not isinstance(value, bool):
            return float(value)
        return None

    def text(self, key: str) -> str | None:
        """Return the text under `key`, None if it is absent or not a text."""
        value = self.entries.get(key)
        return value if isinstance(value, str) else None

    def refused(self, key: str) -> bool:
        """Return whether there was an entry under `key` that could not be used."""
        return isinstance(self.entries.get(key), Refused)

    def flag(self, key: str) -> bool:
        """Return whether `key` is true."""
        return self.entries.get(key) is True

    def price(self, key: str) -> Price | None:
        """Return the price under `key`, None if it is absent."""
        value = self.entries.get(key)
        return value if isinstance(value, Price) else None

    def table(self, key: str) -> "Table | None":
        """Return the table under `key`, None if it is absent."""
        value = self.entries.get(key)
        return value if isinstance(value, Table) else None

    def rows(self, key: str) -> tuple["Table", ...]:
        """Return the tables of the array under `key`, none if it is absent."""
        value = self.entries.get(key)
        if not isinstance(value, tuple):
            return ()
        return tuple(row for row in value if isinstance(row, Table))


@dataclass(frozen=True)
class Scenario:
    """A scenario file that was read without problems. `name` is the file's name for messages, `source` its text."""

    name: str
    source: str
    top: Table
    plant: Table
    fuel: Table
    air: Table
    limits: Table
    accuracy: Table
    settings: tuple[Table, ...]
    line_finder: Callable[[str, tuple[str | int, ...]], int | None] = field(compare=False, repr=False)

    @property
    def baseline_index(self) -> int:
        """Place of the baseline: the setting that says so, else the first."""
        for place, setting in enumerate(self.settings):
            if setting.flag("baseline"):
                return place
        return 0

    def line_of(self, path: tuple[str | int, ...]) -> int | None:
        """Return the line at which the table or key at `path` stands, None if it cannot be told."""
        return self.line_finder(self.source, path)
