"""Writes the parts of README.md that come from the program: `python -m tests.readme`. A test holds them up to date."""

import contextlib
import io
import os
import re
from pathlib import Path

from fluegas.__main__ import main
from fluegas.scenario.field import Field
from fluegas.scenario.fields import FIELDS_OF
from fluegas.units import label

ROOT = Path(__file__).resolve().parent.parent
README = ROOT / "README.md"
DEMO = "laundry-boiler.toml"

_PART = "<!-- from the program: {name} -->\n{body}<!-- end -->\n"


def parts() -> dict[str, str]:
    """Return every part by name."""
    return {"account": f"```text\n{printed_account()}```\n", "keys": key_table()}


def printed_account() -> str:
    """Return what the README's first command prints in a terminal of 80 columns, without colour."""
    out = io.StringIO()
    before = os.environ.get("COLUMNS")
    os.environ["COLUMNS"] = "80"
    try:
        with contextlib.redirect_stdout(out):
            status = main(["account", str(ROOT / "scenarios" / DEMO)])
    finally:
        if before is None:
            del os.environ["COLUMNS"]
        else:
            os.environ["COLUMNS"] = before
    assert status == 0
    return out.getvalue()


def key_table() -> str:
    """Return the table of every key of the scenario file, from its declarations."""
    lines = ["| key | value | default | what it is |", "|---|---|---|---|"]
    for table, fields in FIELDS_OF.items():
        if table in ("fuel.mole_percent", "fuel.mass_percent"):
            names = ", ".join(f'`"{key}"`' if " " in key else f"`{key}`" for key in fields)
            lines.append(f"| `[{table}]` | percent, a plain number | | {names} |")
            continue
        if table == "setting.readings":
            continue
        if table == "fuel.part":
            fields = {key: field for key, field in fields.items() if key in ("share", "share_of")}
            lines.append("| `[[fuel.part]]` | tables | | A fuel burnt with others: the keys of `[fuel]`, and: |")
        lines.extend(_row(table, field) for field in fields.values() if field.later is None)
    return "\n".join(lines) + "\n"


def _row(table: str, field: Field) -> str:
    name = field.key if table == "top" else f"{table}.{field.key}"
    note = " (understood, without effect in this version)" if field.unused else ""
    return f"| `{name}` | {_value(field)} | {field.default or ''} | {field.help}{note} |"


def _value(field: Field) -> str:
    if field.choices and field.kind != "quantity or word":
        return ", ".join(f"`{choice}`" for choice in field.choices)
    if field.kind in ("quantity", "quantity or word"):
        kinds = " or ".join(label(dimension) for dimension in field.dimensions)
        words = "".join(f" or `{word}`" for word in field.choices)
        example = f", e.g. `{field.example}`" if field.example else ""
        return f"{kinds}{words}{example}"
    return {"whole": "whole number", "rows": "tables", "flag": "true or false"}.get(field.kind, field.kind)


def written(text: str) -> str:
    """Return the README's `text` with every part as the program gives it now."""
    for name, body in parts().items():
        pattern = re.compile(rf"<!-- from the program: {name} -->\n.*?<!-- end -->\n", re.DOTALL)
        if len(pattern.findall(text)) != 1:
            raise ValueError(f"README.md must hold the part {name!r} once")
        part = _PART.format(name=name, body=body)
        text = pattern.sub(lambda _, part=part: part, text)  # type: ignore[misc]  # default binds the loop's value
    return text


if __name__ == "__main__":
    README.write_text(written(README.read_text(encoding="utf-8")), encoding="utf-8")
