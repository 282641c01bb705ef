"""Numbers as people type them: "2,5", "2.5 kg", a true minus sign; what could mean two things is asked about.

Ranges are not checked here: that belongs to the definition. Called by ``form_values``.
"""

from __future__ import annotations

import re
from dataclasses import dataclass

_NUMBER = re.compile(r"([+-]?[0-9.,]*[0-9][0-9.,]*(?:[eE][+-]?[0-9]{1,3})?)\s*(.*)", re.DOTALL)
_SPACES = str.maketrans({"\u00a0": " ", "\u2009": " ", "\u202f": " ", "\u2212": "-", "\u2013": "-"})
_GROUPED = re.compile(r"(?<=\d) (?=\d{3}(?!\d))")
_THOUSANDS = re.compile(r"[+-]?[1-9][0-9]{0,2},[0-9]{3}")
_PLAIN = str.maketrans({"²": "2", "³": "3", "°": "", "·": "", ".": "", " ": "", "(": "", ")": "", "*": "", "^": ""})
_SAME_UNITS = {
    "°C": ("c", "degc", "celsius"),
    "K": ("k", "kelvin"),
    "h": ("hour", "hours", "hr", "hrs", "oclock"),
    "kg": ("kgs", "kilo", "kilos"),
    "m": ("metre", "meter", "meters"),
}


@dataclass(frozen=True)
class TypedNumber:
    """A number that was read, or why it was not."""

    number: float | None = None
    fault: str = ""


def read_number(text: str, *, label: str, unit: str = "", words: str = "") -> TypedNumber:
    """The number in a text, with its unit or without."""
    tidy = _GROUPED.sub("", text.translate(_SPACES).strip())
    found = _NUMBER.fullmatch(tidy)
    if found is None:
        return TypedNumber(fault=f"{label} must be a number, like 2.5.")
    digits, rest = found.groups()
    scale = 0.01 if rest == "%" and not unit else 1.0
    if rest and scale == 1.0 and not _is_unit(rest, unit, words):
        wanted = f"in {words or unit}" if unit else "without a unit"
        return TypedNumber(fault=f"{label} is asked {wanted}: “{rest}” does not fit.")
    if _THOUSANDS.fullmatch(digits):
        whole, part = digits.split(",")
        return TypedNumber(fault=f"{label}: “{digits}” could mean {whole}.{part} or {whole}{part}. Type which.")
    if digits.count(",") + digits.count(".") > 1:
        return TypedNumber(fault=f"{label}: type “{digits}” without marks between the thousands.")
    return TypedNumber(number=float(digits.replace(",", ".")) * scale)


def _is_unit(rest: str, unit: str, words: str) -> bool:
    given = rest.lower().translate(_PLAIN)
    known = {unit.lower().translate(_PLAIN), words.lower().translate(_PLAIN), *_SAME_UNITS.get(unit, ())}
    return given in known - {""} if unit else False
