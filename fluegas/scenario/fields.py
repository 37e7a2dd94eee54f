"""Every input of a scenario file, format 1, declared once: pure data.

Reading, messages, tables and help take label, dimension, limits and words from here. Limits are generous: they
refuse what cannot be, not what is unusual. The declarations are in `unit_fields.py` (file, plant, air, limits),
`fuel_fields.py`, `part_fields.py` and `setting_fields.py`.
"""

from collections.abc import Mapping
from types import MappingProxyType

from fluegas.scenario.field import Field
from fluegas.scenario.part_fields import PART_FIELDS
from fluegas.scenario.setting_fields import SETTING_FIELDS
from fluegas.scenario.unit_fields import UNIT_FIELDS

FORMAT = 1
LARGEST_FILE = 256_000
"""Bytes of a scenario file at most."""
MOST_SETTINGS = 400
LONGEST_NAME = 200

FIELDS: tuple[Field, ...] = (*UNIT_FIELDS, *SETTING_FIELDS, *PART_FIELDS)
"""Every field, table by table."""

FREE_TABLES = frozenset({"plant.other_losses"})
"""Tables whose keys the user names; their values are shares."""


def _by_table() -> Mapping[str, Mapping[str, Field]]:
    tables: dict[str, dict[str, Field]] = {}
    for field in FIELDS:
        tables.setdefault(field.table, {})[field.key] = field
    return MappingProxyType({name: MappingProxyType(fields) for name, fields in tables.items()})


FIELDS_OF = _by_table()
"""Fields by table and key; "top" is the file's top level, "setting.readings" one repeat reading, and so on."""
