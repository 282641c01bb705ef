"""Tables with faults: every kind is refused, with file, row and what is wrong."""

from __future__ import annotations

import csv
import io
from importlib.resources import files

import pytest

from app.errors import TableFault
from app.reference import sources
from app.reference.reading import presets_of, read_rows
from app.reference.rows import CoolantMaterial, Food, LimitRow, Material, OpeningKind, Source

TYPES = {
    "materials.csv": Material,
    "foods.csv": Food,
    "coolants.csv": CoolantMaterial,
    "limits.csv": LimitRow,
    "openings.csv": OpeningKind,
    "sources.csv": Source,
}


def text_of(file: str) -> str:
    """The text of a table as it stands."""
    return files("app.reference").joinpath(file).read_text(encoding="utf-8")


def changed(file: str, row: int, **cells: str) -> str:
    """The text of a table with some cells of one row changed; row 2 is the first below the header."""
    table = list(csv.DictReader(io.StringIO(text_of(file))))
    assert set(cells) <= set(table[0])
    table[row - 2].update(cells)
    text = io.StringIO()
    writer = csv.DictWriter(text, list(table[0]), lineterminator="\n")
    writer.writeheader()
    writer.writerows(table)
    return text.getvalue()


def row_of(file: str, key: str) -> int:
    """Number of the first row whose first column is this key."""
    table = csv.reader(io.StringIO(text_of(file)))
    return next(number for number, cells in enumerate(table, start=1) if cells[0] == key)


def read(file: str, text: str):
    """Read a table of this name from a text."""
    known = None if file == "sources.csv" else {row.source_key: row for row in sources()}
    return read_rows(file, text, TYPES[file], known)


def test_changing_no_cell_of_a_table_leaves_the_rest_as_it_is():
    assert read("materials.csv", changed("materials.csv", 2)) == read("materials.csv", text_of("materials.csv"))


@pytest.mark.parametrize(
    ("file", "key", "cells", "message"),
    [
        (
            "materials.csv",
            "cork_board",
            {"conductivity_w_per_m_k": "65", "conductivity_high_w_per_m_k": "70"},
            "conductivity_w_per_m_k 65 is not plausible for insulation: 0.002 to 0.12",
        ),
        ("materials.csv", "copper", {"density_kg_per_m3": "8900e3"}, "density_kg_per_m3 is 8900e3; plausible: 5"),
        ("materials.csv", "copper", {"density_kg_per_m3": "890"}, "890 is not plausible for metal: 2000 to 9500"),
        (
            "materials.csv",
            "glass",
            {"specific_heat_j_per_kg_k": "1750"},
            "specific_heat_j_per_kg_k 1750 is not plausible for glass",
        ),
        ("materials.csv", "glass", {"conductivity_low_w_per_m_k": "1.05"}, "does not lie between its low value 1.05"),
        ("materials.csv", "glass", {"group": "glas"}, "group is 'glas'; allowed: insulation, metal"),
        ("materials.csv", "glass", {"density_kg_per_m3": "2,5e3"}, "density_kg_per_m3 is '2,5e3', not a number"),
        ("materials.csv", "glass", {"density_kg_per_m3": "nan"}, "density_kg_per_m3 is nan; plausible"),
        ("materials.csv", "glass", {"density_kg_per_m3": "NA"}, "density_kg_per_m3 is 'NA', not a number"),
        ("materials.csv", "glass", {"label": ""}, "label is empty"),
        ("materials.csv", "glass", {"key": "glass "}, "key is empty or has blanks around it: 'glass '"),
        ("materials.csv", "glass", {"key": "concrete"}, "'concrete' stands in the table already"),
        ("materials.csv", "glass", {"status": "certain"}, "status is 'certain'; allowed: published, computed"),
        ("materials.csv", "glass", {"source_key": "hearsay"}, "source 'hearsay' is not in sources.csv"),
        ("materials.csv", "glass", {"capacity_source_key": "hearsay"}, "source 'hearsay' is not in sources.csv"),
        ("materials.csv", "polyethylene", {"note": ""}, "an estimate gives its reasoning in the note"),
        ("foods.csv", "cod", {"water_fraction": "0.7122"}, "the fractions add up to 0.9086"),
        ("foods.csv", "cod", {"water_fraction": "81.22"}, "water_fraction is 81.22; plausible: 0.02 to 0.98"),
        ("foods.csv", "cod", {"initial_freezing_c": "2.2"}, "initial_freezing_c is 2.2; plausible: -20 to -0.1"),
        ("foods.csv", "cod", {"group": "seafood"}, "group is 'seafood'"),
        ("coolants.csv", "ice", {"latent_j_per_kg": "333.43"}, "latent_j_per_kg is 333.43; plausible"),
        ("coolants.csv", "ice", {"latent_high_j_per_kg": "331000"}, "and its high value 331000"),
        ("coolants.csv", "ice", {"kind": "slush"}, "kind is 'slush'; allowed: water_ice, eutectic"),
        ("coolants.csv", "sodium_chloride_eutectic", {"melting_c": "21.1"}, "melts below 0 °C, not at 21.1 °C"),
        ("limits.csv", "cdc_fridge", {"temperature_c": "46"}, "temperature_c is 46; plausible: -100 to 40"),
        ("limits.csv", "cdc_fridge", {"kind": "over"}, "kind is 'over'; allowed: above, below, mean_kinetic"),
        ("limits.csv", "cdc_fridge", {"at": "middle"}, "at is 'middle'"),
        ("limits.csv", "cdc_fridge", {"on": "wall"}, "on is 'wall'"),
        ("limits.csv", "cdc_fridge", {"group": "vaccines"}, "group is 'vaccines'"),
        ("limits.csv", "cdc_fridge", {"window_h": "24"}, "mean_kinetic alone has one"),
        ("limits.csv", "cdc_fridge", {"kind": "mean_kinetic"}, "with a window of 0 h"),
        (
            "limits.csv",
            "cdc_fridge",
            {"kind": "mean_kinetic", "window_h": "24", "longer_than_h": "2"},
            "longer_than_h must be 0",
        ),
        ("openings.csv", "glass_door", {"u_low_w_per_m2_k": "2.5"}, "u_w_per_m2_k 2.3 does not lie between"),
        ("openings.csv", "glass_door", {"leak_high_l_per_s_m": "0.04"}, "leak_l_per_s_m 0.05 does not lie between"),
        ("sources.csv", "iso_10456", {"title": ""}, "title is empty"),
    ],
)
def test_a_row_with_a_fault_is_refused_with_file_and_row(file, key, cells, message):
    row = row_of(file, key)
    with pytest.raises(TableFault) as refused:
        read(file, changed(file, row, **cells))
    assert (refused.value.file, refused.value.row) == (file, row)
    assert message in str(refused.value)


def test_an_unknown_column_is_refused():
    text = text_of("materials.csv").replace("label,", "colour,", 1)
    with pytest.raises(TableFault, match="materials.csv, row 1: unknown columns: colour; missing: label"):
        read("materials.csv", text)


def test_a_column_that_stands_twice_is_refused():
    text = text_of("materials.csv").replace("key,label,", "key,label,label,", 1)
    with pytest.raises(TableFault, match="materials.csv, row 1"):
        read("materials.csv", text)


def test_an_empty_file_is_refused():
    with pytest.raises(TableFault, match="foods.csv, row 1: unknown columns: none; missing: key, label"):
        read("foods.csv", "")


@pytest.mark.parametrize("row", ["short,Short", ",".join(["long"] * 30)])
def test_a_row_with_too_few_or_too_many_cells_is_refused(row):
    rows = text_of("openings.csv").splitlines()
    with pytest.raises(TableFault, match="openings.csv, row 7: has not 11 cells"):
        read("openings.csv", "\n".join([*rows, row]))


def test_a_quote_that_never_closes_is_refused():
    with pytest.raises(TableFault, match="openings.csv, row .: cannot be read"):
        read("openings.csv", text_of("openings.csv") + '"open')


def test_a_preset_whose_rows_disagree_is_refused():
    second = row_of("limits.csv", "cdc_fridge") + 1
    rows = read("limits.csv", changed("limits.csv", second, label="Another name"))
    with pytest.raises(TableFault, match=f"limits.csv, row {second}: .*differ from the first row of 'cdc_fridge'"):
        presets_of("limits.csv", rows)


def test_the_same_limit_twice_in_a_preset_is_refused():
    second = row_of("limits.csv", "cdc_fridge") + 1
    with pytest.raises(TableFault, match="'cdc_fridge above 8 °C for 0 h' stands in the table already"):
        read("limits.csv", changed("limits.csv", second, kind="above", temperature_c="8", at="warmest"))
