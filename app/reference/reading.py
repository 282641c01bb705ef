"""From the text of a table to checked rows: columns, numbers, bounds, sources, duplicate keys.

The first fault stops the load and names file, row and column: a table that is wrong must never be used.
Called by ``tables``.
"""

from __future__ import annotations

import csv
import io
from collections.abc import Iterable, Iterator, Mapping
from dataclasses import fields, replace
from typing import Any, Protocol, TypeVar, get_type_hints

from app.errors import TableFault
from app.reference.bounds import BOUNDS, STATUS_WORDS
from app.reference.rows import LimitPreset, LimitRow, PresetLimit, Source

UNKNOWN = "NA"
ESTIMATE = "estimate"

_MAY_BE_EMPTY = {"note", "edition", "clause"}
_FILLED_IN = "source_text"


class _Row(Protocol):
    @property
    def key(self) -> str: ...

    def faults(self) -> Iterator[str]: ...


RowT = TypeVar("RowT", bound=_Row)


def read_rows(file: str, text: str, row_type: type[RowT], sources: Mapping[str, Source] | None) -> tuple[RowT, ...]:
    """Every row of a table, in its order; ``sources`` is None for the table of sources itself.

    Raises ``TableFault`` for the first fault.
    """
    names = [field.name for field in fields(row_type) if field.name != _FILLED_IN]  # type: ignore[arg-type]
    rows: dict[str, RowT] = {}
    for number, cells in _cells(file, text, names):
        row = _row(file, number, cells, row_type)
        if row.key in rows:
            raise TableFault(file, number, f"{row.key!r} stands in the table already")
        if sources is not None:
            row = _with_source(file, number, row, cells, sources)
        rows[row.key] = row
    return tuple(rows.values())


def presets_of(file: str, rows: Iterable[LimitRow]) -> tuple[LimitPreset, ...]:
    """The presets of the rows of limits; raises ``TableFault`` where rows of one preset disagree."""
    presets: dict[str, LimitPreset] = {}
    for number, row in enumerate(rows, start=2):
        names = (row.preset, row.label, row.group, row.body, row.document, row.edition)
        known = presets.setdefault(row.preset, LimitPreset(*names, limits=()))
        if (known.key, known.label, known.group, known.body, known.document, known.edition) != names:
            raise TableFault(file, number, f"label, group or document differ from the first row of {row.preset!r}")
        shared = {field.name: getattr(row, field.name) for field in fields(PresetLimit)}
        presets[row.preset] = replace(known, limits=(*known.limits, PresetLimit(**shared)))
    return tuple(presets.values())


def source_text(source: Source) -> str:
    """A source in one line, for a person; what an earlier part already says is left out."""
    told: list[str] = []
    for part in (source.authors, source.title, source.publisher, source.year, source.page):
        if part != UNKNOWN and not any(part in earlier for earlier in told):
            told.append(part)
    return ", ".join(told)


def _cells(file: str, text: str, names: list[str]) -> Iterator[tuple[int, dict[str, str]]]:
    """Line number and cells by column name of every row below the header."""
    reader = csv.DictReader(io.StringIO(text), strict=True)
    try:
        _check_header(file, reader.fieldnames or (), names)
        for cells in reader:
            if None in cells or None in cells.values():
                message = f"has not {len(names)} cells; put text with commas between quotes"
                raise TableFault(file, reader.line_num, message)
            yield reader.line_num, cells
    except csv.Error as broken:
        raise TableFault(file, reader.line_num, f"cannot be read: {broken}") from broken


def _check_header(file: str, given: Iterable[str], wanted: list[str]) -> None:
    header = list(given)
    strange = [name for name in header if name not in wanted]
    missing = [name for name in wanted if name not in header]
    if strange or missing or len(header) != len(wanted):
        raise TableFault(
            file,
            1,
            f"unknown columns: {', '.join(strange) or 'none'}; missing: {', '.join(missing) or 'none'}",
        )


def _row(file: str, number: int, cells: Mapping[str, str], row_type: type[RowT]) -> RowT:
    hints = get_type_hints(row_type)
    values: dict[str, Any] = {name: _value(file, number, name, cell, hints[name]) for name, cell in cells.items()}
    row = row_type(**values)
    for name, cell in cells.items():
        if name.endswith("status") and cell not in STATUS_WORDS:
            raise TableFault(file, number, f"{name} is {cell!r}; allowed: {', '.join(STATUS_WORDS)}")
    for fault in row.faults():
        raise TableFault(file, number, fault)
    return row


def _value(file: str, number: int, name: str, cell: str, kind: object) -> str | float | None:
    """A cell as the type of its column."""
    if kind is str:
        if cell != cell.strip() or (not cell and name not in _MAY_BE_EMPTY):
            raise TableFault(file, number, f"{name} is empty or has blanks around it: {cell!r}")
        return cell
    if cell == UNKNOWN and kind is not float:
        return None
    try:
        value = float(cell)
    except ValueError:
        raise TableFault(file, number, f"{name} is {cell!r}, not a number") from None
    low, high = BOUNDS[name]
    if not low <= value <= high:
        raise TableFault(file, number, f"{name} is {cell}; plausible: {low:g} to {high:g}")
    return value


def _with_source(file: str, number: int, row: RowT, cells: Mapping[str, str], sources: Mapping[str, Source]) -> RowT:
    """The row with its sources in words; raises ``TableFault`` when one is not in the table of sources."""
    told: dict[str, list[str]] = {}
    for name, key in cells.items():
        if not name.endswith("source_key"):
            continue
        status = cells[name.removesuffix("source_key") + "status"]
        if key not in sources:
            raise TableFault(file, number, f"source {key!r} is not in sources.csv")
        if ESTIMATE in (key, status) and not cells["note"]:
            raise TableFault(file, number, "an estimate gives its reasoning in the note")
        known = told.setdefault(source_text(sources[key]), [])
        if status not in known:
            known.append(status)
    text = "; ".join(f"{document} ({', '.join(known)})" for document, known in told.items())
    return replace(row, source_text=text)  # type: ignore[type-var]
