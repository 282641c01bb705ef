"""Every public relation says what it takes, in which unit, where it holds, and where it comes from."""

from __future__ import annotations

import importlib
import inspect
import pkgutil
import re
from collections.abc import Callable

import pytest

import app.physics

ENGINE_FORMS = {
    "segment_enthalpy",
    "segment_temperature",
    "segment_slope",
    "segment_ice",
    "segment_ice_slope",
}
"""The curve's formulas once more as bare numbers for the engine; ``Segment`` documents what they take."""

_HEADING = re.compile(r"^(\w[\w ]*)\n-{3,}$", re.MULTILINE)
_PARAMETER = re.compile(r"^(\w+) : .+$", re.MULTILINE)
_UNIT = re.compile(r"\[[^\]]+\]")


def public_functions() -> list[Callable[..., object]]:
    found = []
    for module_info in pkgutil.iter_modules(app.physics.__path__):
        module = importlib.import_module(f"app.physics.{module_info.name}")
        for name, member in vars(module).items():
            function = getattr(member, "py_func", member)  # compiled functions keep the plain one
            if inspect.isfunction(function) and function.__module__ == module.__name__ and name[0] != "_":
                found.append(function)
    return [function for function in found if function.__name__ not in ENGINE_FORMS]


def sections_of(function: Callable[..., object]) -> dict[str, str]:
    text = inspect.getdoc(function) or ""
    parts = _HEADING.split(text)
    return {"Summary": parts[0], **dict(zip(parts[1::2], parts[2::2], strict=True))}


def named(function: Callable[..., object]) -> str:
    return f"{function.__module__.rsplit('.', 1)[1]}.{function.__name__}"


FUNCTIONS = public_functions()


def test_there_are_functions_to_look_at():
    assert len(FUNCTIONS) > 40
    assert {named(f) for f in FUNCTIONS} > {"films.film_flow_w", "foods.food_curve", "walls.dynamic_wall"}


@pytest.mark.parametrize("function", FUNCTIONS, ids=named)
def test_documented_parameters_are_those_of_the_signature(function):
    documented = _PARAMETER.findall(sections_of(function).get("Parameters", ""))
    assert documented == list(inspect.signature(function).parameters)


@pytest.mark.parametrize("function", FUNCTIONS, ids=named)
def test_every_parameter_and_result_has_a_unit(function):
    sections = sections_of(function)
    pieces = _PARAMETER.split(sections.get("Parameters", ""))[1:]
    for name, text in zip(pieces[::2], pieces[1::2], strict=True):
        assert _UNIT.search(text), f"{name} has no unit"
    assert _UNIT.search(sections["Returns"])


@pytest.mark.parametrize("function", FUNCTIONS, ids=named)
def test_range_example_and_source_are_given(function):
    sections = sections_of(function)
    for heading in ("Notes", "Examples", "References"):
        assert sections[heading].strip()
    assert ">>> " in sections["Examples"]


@pytest.mark.parametrize("function", FUNCTIONS, ids=named)
def test_errors_are_documented_where_they_are_raised(function):
    if re.search(r"^\s+raise (\w+)", inspect.getsource(function), re.MULTILINE):
        assert sections_of(function)["Raises"].strip()


@pytest.mark.parametrize("function", FUNCTIONS, ids=named)
def test_more_than_two_numbers_of_one_type_are_given_by_name(function):
    if function.__name__ == "film_flow_w":
        return  # compiled code calls it by position
    parameters = inspect.signature(function).parameters.values()
    by_position = [p for p in parameters if p.kind is p.POSITIONAL_OR_KEYWORD and p.annotation == "float"]
    assert len(by_position) <= 3 if named(function).startswith("convection.") else len(by_position) <= 2
