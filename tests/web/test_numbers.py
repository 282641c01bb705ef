"""Numbers as people type them."""

from __future__ import annotations

import pytest

from app.web.numbers import read_number


@pytest.mark.parametrize(
    ("text", "number"),
    [
        ("2.5", 2.5),
        ("2,5", 2.5),
        (" \u221218 ", -18.0),
        ("2.5 kg", 2.5),
        ("2,5 kilograms", 2.5),
        ("1 500", 1500.0),
        ("0,500", 0.5),
        ("1e-05", 1e-05),
        (".5", 0.5),
    ],
)
def test_a_number_is_read_as_people_type_it(text: str, number: float) -> None:
    assert read_number(text, label="Mass", unit="kg", words="kilograms").number == number


@pytest.mark.parametrize(("text", "unit"), [("-18 °C", "°C"), ("0,3 W/m2K", "W/m²·K"), ("1.5 m3/h", "m³/h")])
def test_a_unit_is_known_in_plain_letters_too(text: str, unit: str) -> None:
    assert read_number(text, label="It", unit=unit).number is not None


def test_a_comma_before_three_digits_is_asked_about() -> None:
    fault = read_number("1,500", label="Mass", unit="kg", words="kilograms").fault
    assert "1.500" in fault
    assert "1500" in fault


@pytest.mark.parametrize("text", ["heavy", "nan", "inf", "-", "1.2.3", "1,500.5", "60 mm", "5 lb", "0x10", "\u0665"])
def test_what_is_no_number_of_the_unit_is_refused_in_words(text: str) -> None:
    read = read_number(text, label="Mass", unit="kg", words="kilograms")
    assert read.number is None
    assert read.fault.startswith("Mass")


def test_per_cent_is_taken_for_a_plain_fraction() -> None:
    assert read_number("74 %", label="Water").number == pytest.approx(0.74, rel=1e-12)
