"""The house as it is drawn: which room may import which, how large a module may grow, what no file may say."""

from __future__ import annotations

import ast
import re
import subprocess
from collections.abc import Iterator
from pathlib import Path

import pytest

ROOT = Path(__file__).parents[1]
APP = ROOT / "app"

BASE = {"units", "errors", "compiled"}
MAY_IMPORT: dict[str, set[str]] = {
    "units": set(),
    "errors": set(),
    "compiled": set(),
    "settings": set(),
    "middleware": set(),
    "workers": {"errors"},
    "physics": BASE,
    "reference": {"units", "errors"},
    "engine": BASE | {"physics"},
    "stores": BASE | {"physics", "reference", "engine"},
    "answers": BASE | {"physics", "reference", "engine", "stores"},
    "api": BASE | {"reference", "engine", "stores", "answers", "workers"},
    "web": BASE | {"reference", "engine", "stores", "answers", "workers"},
}
"""The arrows of DEVELOPERS.md; main and __main__ put everything together and may import all."""

NOT_IN_PHYSICS = {"pydantic", "fastapi", "starlette", "jinja2", "csv", "sqlite3", "json"}
LARGEST_BYTES = 24_000
UNSAID = re.compile(
    "|".join(["lec" + "ture", "trans" + "cript", r"\bTO" + "DO\b", r"\bFIX" + "ME\b", "/wo" + "rk/", r"/ro" + "ot/"]),
    re.IGNORECASE,
)


def modules() -> list[Path]:
    return [path for path in sorted(APP.rglob("*.py")) if "__pycache__" not in path.parts]


def imported(path: Path) -> Iterator[str]:
    """Full names that a module imports."""
    for node in ast.walk(ast.parse(path.read_text(encoding="utf-8"))):
        if isinstance(node, ast.Import):
            yield from (alias.name for alias in node.names)
        elif isinstance(node, ast.ImportFrom):
            assert node.level == 0, f"{path} imports by a relative name"
            yield node.module or ""
            if node.module == "app":
                yield from (f"app.{alias.name}" for alias in node.names)


def room_of(path: Path) -> str:
    return path.relative_to(APP).parts[0].removesuffix(".py")


@pytest.mark.parametrize("path", modules(), ids=lambda path: str(path.relative_to(APP)))
def test_imports_follow_the_arrows(path):
    room = room_of(path)
    if room in ("main", "__main__", "__init__"):
        return
    allowed = MAY_IMPORT[room] | {room}
    rooms = {name.split(".")[1] for name in imported(path) if name.startswith("app.")}
    assert rooms <= allowed, f"{path.name} imports {sorted(rooms - allowed)}"


@pytest.mark.parametrize("path", sorted((APP / "physics").glob("*.py")), ids=lambda path: path.name)
def test_physics_knows_no_web_and_no_tables(path):
    assert not {name.split(".")[0] for name in imported(path)} & NOT_IN_PHYSICS


def test_every_room_is_drawn():
    rooms = {room_of(path) for path in modules()} - {"main", "__main__", "__init__"}
    assert rooms == set(MAY_IMPORT)


@pytest.mark.parametrize("path", modules(), ids=lambda path: str(path.relative_to(APP)))
def test_modules_stay_small_and_say_what_they_are_for(path):
    assert path.stat().st_size <= LARGEST_BYTES
    assert ast.get_docstring(ast.parse(path.read_text(encoding="utf-8"))), f"{path} has no docstring"


def test_packages_name_at_most_a_dozen_and_a_half_of_public_names():
    for package in sorted(APP.glob("*/__init__.py")):
        tree = ast.parse(package.read_text(encoding="utf-8"))
        named = [node for node in tree.body if isinstance(node, ast.Assign) and node.targets[0].id == "__all__"]
        assert len(named) == 1, f"{package} has no __all__"
        assert len(ast.literal_eval(named[0].value)) <= 18


def test_no_file_says_what_must_not_be_said():
    listed = subprocess.run(["git", "ls-files"], cwd=ROOT, capture_output=True, text=True, check=True).stdout.split()
    for name in listed:
        path = ROOT / name
        if path.suffix in (".png", ".lock") or not path.is_file():
            continue
        found = UNSAID.search(path.read_text(encoding="utf-8"))
        assert found is None, f"{name}: {found[0] if found else ''}"


def test_top_level_holds_only_what_belongs_there():
    listed = subprocess.run(["git", "ls-files"], cwd=ROOT, capture_output=True, text=True, check=True).stdout.split()
    tops = {name.split("/")[0] for name in listed}
    belongs = {"README.md", "DEVELOPERS.md", "LICENSE", "pyproject.toml", "app", "templates", "static", "tests"}
    belongs |= {"sample_cases", "requirements.lock", "requirements-tests.lock"}
    assert {top for top in tops if not top.startswith(".")} <= belongs
