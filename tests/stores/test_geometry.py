"""Sizes of faces and blocks: edges and corners, log-mean areas, nested layers and the mean paths through them."""

from __future__ import annotations

import math

import pytest
from hypothesis import given
from hypothesis import strategies as st

from app.stores.enclosure import conduction_area_m2, outside_area_m2
from app.stores.geometry import box_block, box_faces, cylinder_block, cylinder_faces, near_cubic_stack, slab_block

LENGTHS = st.floats(0.05, 3.0)
COUNTS = st.integers(1, 16)


def all_blocks(width_m, depth_m, height_m):
    """One block of every kind."""
    return (
        box_block(3, width_m, depth_m, height_m, stands=False),
        box_block(1, width_m, depth_m, height_m, stands=True),
        cylinder_block(2, width_m, height_m, height_m=height_m),
        slab_block(width_m * depth_m, height_m, height_m=0.5),
    )


@given(width=LENGTHS, depth=LENGTHS, height=LENGTHS)
def test_faces_of_a_box_own_its_area_its_twelve_edges_and_its_eight_corners(width, depth, height):
    faces = box_faces(width, depth, height).values()
    area = 2.0 * (width * depth + width * height + depth * height)
    assert sum(face.inside_m2 for face in faces) == pytest.approx(area)
    assert sum(face.edge_m for face in faces) == pytest.approx(4.0 * (width + depth + height))
    assert sum(face.corners for face in faces) == pytest.approx(8.0)


@given(width=LENGTHS, depth=LENGTHS, height=LENGTHS, thickness=st.floats(0.01, 0.3))
def test_edges_add_054_of_their_length_and_corners_015_of_the_thickness(width, depth, height, thickness):
    # Incropera and DeWitt, Fundamentals of Heat and Mass Transfer, Table 4.1: shape factor of an edge 0.54 D,
    # of a corner 0.15 L, both times the thickness to make an area
    faces = box_faces(width, depth, height).values()
    added = sum(conduction_area_m2(face, thickness, True) - face.inside_m2 for face in faces)
    by_hand = 0.54 * 4.0 * (width + depth + height) * thickness + 8.0 * 0.15 * thickness**2
    assert added == pytest.approx(by_hand, rel=1e-9)
    assert sum(conduction_area_m2(face, thickness, False) for face in faces) == pytest.approx(
        sum(face.inside_m2 for face in faces)
    )


@given(width=LENGTHS, depth=LENGTHS, height=LENGTHS, thickness=st.floats(0.01, 0.3))
def test_outside_of_a_box_is_the_box_that_is_thicker_all_round(width, depth, height, thickness):
    outside = sum(outside_area_m2(face, thickness) for face in box_faces(width, depth, height).values())
    a, b, c = (side + 2.0 * thickness for side in (width, depth, height))
    assert outside == pytest.approx(2.0 * (a * b + a * c + b * c))


@given(diameter=LENGTHS, height=LENGTHS)
def test_faces_of_a_cylinder_own_its_area_and_its_two_round_edges(diameter, height):
    faces = cylinder_faces(diameter, height)
    area = math.pi * diameter * height + math.pi * diameter**2 / 2.0
    assert sum(face.inside_m2 for face in faces.values()) == pytest.approx(area)
    assert sum(face.edge_m for face in faces.values()) == pytest.approx(2.0 * math.pi * diameter)
    assert sum(face.corners for face in faces.values()) == 0.0


@given(diameter=LENGTHS, height=LENGTHS, thickness=st.floats(0.005, 0.3))
def test_round_wall_conducts_through_its_log_mean_area(diameter, height, thickness):
    # 2 pi L k / ln(r2/r1), Incropera and DeWitt, ch. 3: as an area over the thickness
    wall = cylinder_faces(diameter, height)["walls"]
    ratio = (diameter / 2.0 + thickness) / (diameter / 2.0)
    by_hand = 2.0 * math.pi * height * thickness / math.log(ratio)
    assert conduction_area_m2(wall, thickness, False) == pytest.approx(by_hand, rel=1e-9)
    assert outside_area_m2(wall, thickness) == pytest.approx(math.pi * (diameter + 2.0 * thickness) * height)


@given(width=LENGTHS, depth=LENGTHS, height=LENGTHS, count=COUNTS)
def test_shells_of_any_block_hold_all_of_its_volume(width, depth, height, count):
    for block in all_blocks(width, depth, height):
        shells = block.shells(count)
        assert len(shells) == count
        assert sum(shell.volume_share for shell in shells) == pytest.approx(1.0)
        assert all(shell.volume_share > 0.0 for shell in shells)
        assert all(shell.outward_per_m > 0.0 for shell in shells)
        assert shells[-1].inward_per_m == 0.0


@given(width=LENGTHS, depth=LENGTHS, height=LENGTHS)
def test_nested_layers_of_a_block_add_up_to_its_own_volume(width, depth, height):
    for block in all_blocks(width, depth, height):
        inner = block.half_thickness_m
        depths = [inner * k / 2000.0 for k in range(2001)]
        areas = [block.area_at_m2(x) for x in depths]
        volume = inner / 2000.0 * (sum(areas) - 0.5 * (areas[0] + areas[-1]))
        assert volume == pytest.approx(block.volume_m3, rel=1e-5)  # trapezium rule over 2000 slices
        assert block.volume_share_outside(inner) == pytest.approx(1.0)
        assert block.volume_share_outside(0.0) == 0.0


@given(area=st.floats(0.01, 50.0), half=st.floats(0.001, 1.0), count=st.integers(2, 16))
def test_shells_of_a_slab_keep_its_whole_path(area, half, count):
    shells = slab_block(area, half, height_m=0.5).shells(count)
    path = sum(shell.outward_per_m + shell.inward_per_m for shell in shells)
    # all of it but the inner half of the innermost shell, behind whose middle no more heat goes
    assert path == pytest.approx(half * (1.0 - shells[-1].volume_share / 2.0) / area, rel=1e-6)


@given(area=st.floats(0.01, 50.0), half=st.floats(0.001, 1.0))
def test_mean_of_a_slab_lies_a_third_of_its_depth_behind_the_surface(area, half):
    (lump,) = slab_block(area, half, height_m=0.5).shells(1)
    # integral of (1 - x/L)² dx / A = L/3A; the table of 400 slices is good to 1e-4
    assert lump.outward_per_m == pytest.approx(half / 3.0 / area, rel=1e-4)


@given(radius=st.floats(0.01, 0.3))
def test_mean_of_a_long_cylinder_lies_a_quarter_of_its_radius_behind(radius):
    block = cylinder_block(1, 2.0 * radius, 1000.0 * radius, height_m=1.0)
    (lump,) = block.shells(1)
    # r/4A for the endless cylinder; ends of 1/500 of the length count for as much
    assert lump.outward_per_m == pytest.approx(radius / 4.0 / block.area_m2, rel=5e-3)


@given(side=st.floats(0.01, 1.0))
def test_mean_of_a_cube_lies_a_fifth_of_its_half_side_behind_as_in_a_sphere(side):
    block = box_block(1, side, side, side, stands=False)
    (lump,) = block.shells(1)
    # inner areas shrink with the square of the depth as in a sphere, where the path is r/5A
    assert lump.outward_per_m == pytest.approx(side / 2.0 / 5.0 / block.area_m2, rel=1e-4)


@given(width=LENGTHS, depth=LENGTHS, height=LENGTHS)
def test_box_that_stands_is_the_upper_half_of_one_twice_as_high(width, depth, height):
    stands = box_block(1, width, depth, height, stands=True)
    whole = box_block(1, width, depth, 2.0 * height, stands=False)
    assert stands.area_m2 == pytest.approx(width * depth + 2.0 * (width + depth) * height)
    assert stands.area_m2 == pytest.approx(whole.area_m2 / 2.0)
    assert stands.half_thickness_m == whole.half_thickness_m


@given(count=st.integers(2, 15))
def test_shells_get_thicker_inwards_and_the_innermost_is_six_times_the_outermost(count):
    shares = [shell.volume_share for shell in slab_block(1.0, 0.1, height_m=0.5).shells(count)]
    assert shares == sorted(shares)
    assert shares[-1] / shares[0] == pytest.approx(6.0)


@given(count=st.integers(1, 400), width=LENGTHS, depth=LENGTHS, height=LENGTHS)
def test_stack_keeps_the_volume_of_its_boxes_and_has_no_more_surface_than_a_row(count, width, depth, height):
    a, b, c = near_cubic_stack(count, width, depth, height)
    assert a * b * c == pytest.approx(count * width * depth * height)
    row = count * width * depth + depth * height + count * width * height
    assert a * b + b * c + a * c <= row * (1.0 + 1e-9)


def test_eight_cubes_make_a_cube_of_twice_the_side():
    assert near_cubic_stack(8, 0.2, 0.2, 0.2) == pytest.approx((0.4, 0.4, 0.4))
