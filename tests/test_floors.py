"""The floors of the house: a file imports only floors below its own, and each floor only the packages it may."""

import ast
import sys
from collections.abc import Iterator
from pathlib import Path

import pytest

PACKAGE = Path(__file__).resolve().parent.parent / "fluegas"

FLOORS = [
    ("errors", "resources", "units"),
    ("thermo",),
    ("combustion",),
    ("accounting",),
    ("scenario",),
    ("report",),
    ("cli",),
    ("__main__",),
]
"""From the ground up. Rooms on one floor do not import each other, except resources -> errors and units -> both."""

SAME_FLOOR = {"resources": {"errors"}, "units": {"errors", "resources"}}

PACKAGES = {
    "errors": set(),
    "resources": set(),
    "units": {"pint", "numpy"},
    "thermo": {"numpy"},
    "combustion": {"numpy"},
    "accounting": {"numpy"},
    "scenario": {"numpy", "tomlkit"},
    "report": {"numpy", "rich", "matplotlib"},
    "cli": {"click", "rich"},
    "__main__": {"click"},
    "__init__": set[str](),
}
"""Third-party packages that the files of a floor may import."""

LATE = {"pint": "units", "tomlkit": "scenario", "matplotlib": "report"}
"""Heavy packages that may be imported only inside a function (or for types)."""

LEVEL = {room: level for level, rooms in enumerate(FLOORS) for room in rooms}


def files() -> list[Path]:
    return sorted(PACKAGE.rglob("*.py"))


def room_of(file: Path) -> str:
    return file.relative_to(PACKAGE).parts[0].removesuffix(".py")


def imports(file: Path) -> Iterator[tuple[int, str, bool]]:
    """Yield line, module and whether the import runs with the module itself."""
    tree = ast.parse(file.read_text(encoding="utf-8"))
    inside = {
        id(node)
        for block in ast.walk(tree)
        if isinstance(block, ast.FunctionDef | ast.AsyncFunctionDef | ast.Lambda) or _is_for_types(block)
        for node in ast.walk(block)
    }
    for node in ast.walk(tree):
        if isinstance(node, ast.Import):
            for name in node.names:
                yield node.lineno, name.name, id(node) not in inside
        elif isinstance(node, ast.ImportFrom):
            assert node.level == 0, f"{file}:{node.lineno}: relative import"
            assert node.module is not None
            if node.module == "fluegas":
                for name in node.names:
                    yield node.lineno, f"fluegas.{name.name}", id(node) not in inside
            else:
                yield node.lineno, node.module, id(node) not in inside


def _is_for_types(block: ast.AST) -> bool:
    return isinstance(block, ast.If) and isinstance(block.test, ast.Name) and block.test.id == "TYPE_CHECKING"


def test_every_room_has_a_floor() -> None:
    rooms = {room_of(file) for file in files()}
    assert rooms - {"__init__"} == set(LEVEL)
    assert rooms == set(PACKAGES)


@pytest.mark.parametrize("file", files(), ids=lambda file: str(file.relative_to(PACKAGE)))
def test_a_file_imports_only_what_lies_below(file: Path) -> None:
    room = room_of(file)
    wrong = []
    for line, module, at_import in imports(file):
        parts = module.split(".")
        if room == "__init__" and not at_import:
            continue  # the package's own file names what it loads late, for types only
        if parts[0] == "fluegas" and len(parts) > 1 and parts[1] != "__version__":
            other = parts[1]
            if other == room or other in SAME_FLOOR.get(room, set()):
                continue
            if room == "__init__" or LEVEL[other] >= LEVEL[room]:
                wrong.append(f"{file.name}:{line}: {room} imports {module}")
    assert not wrong


@pytest.mark.parametrize("file", files(), ids=lambda file: str(file.relative_to(PACKAGE)))
def test_a_file_imports_only_the_packages_of_its_floor(file: Path) -> None:
    room = room_of(file)
    wrong = []
    for line, module, at_import in imports(file):
        package = module.split(".")[0]
        if package == "fluegas" or package in sys.stdlib_module_names:
            continue
        if package not in PACKAGES[room]:
            wrong.append(f"{file.name}:{line}: {room} imports {package}")
        if package in LATE and at_import:
            wrong.append(f"{file.name}:{line}: {package} must be imported where it is used")
    assert not wrong


def test_the_check_sees_a_wrong_import(tmp_path: Path) -> None:
    file = tmp_path / "wrong.py"
    file.write_text("import scipy\n\ndef late() -> None:\n    import pint\n", encoding="utf-8")
    assert list(imports(file)) == [(1, "scipy", True), (4, "pint", False)]
