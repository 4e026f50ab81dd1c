import mpmath
import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st
from scipy.stats import ncx2, norm

from benchlay.optics.shares import inside, partition
from tests.optics.quadrature import Figure, referee, to_shapes

AGREE = 2e-9  # the referee's own error over forty scenes stays below this


def divide(*scene):
    """Shares of the bodies of one scene, and the free part."""
    shapes = to_shapes([list(scene)])
    result = partition(shapes, 1)
    return result.share[shapes.hole_of < 0], result.free[0]


def disc(radius, at=(0.0, 0.0), depth=0.0, **more):
    return Figure((depth, 0.0, 0.0), centre=at, axes=((radius, 0.0), (0.0, radius)), **more)


def box(x0, y0, x1, y1, depth=0.0, **more):
    corners = [(x0, y0), (x1, y0), (x1, y1), (x0, y1)]
    return Figure((depth, 0.0, 0.0), corners=corners, **more)


def turned(figure, angle):
    c, s = np.cos(angle), np.sin(angle)
    matrix = np.array([[c, -s], [s, c]])
    d0, slope = figure.depth[0], matrix @ figure.depth[1:]
    corners = figure.corners and [tuple(matrix @ p) for p in figure.corners]
    axes = tuple(map(tuple, matrix @ np.array(figure.axes)))
    centre = tuple(matrix @ figure.centre)
    holes = [turned(hole, angle) for hole in figure.holes]
    return Figure((d0, *slope), corners, centre, axes, figure.order, holes)


def random_figure(rng, order, with_holes=True):
    depth = rng.choice([10.0, 20.0, 30.0, rng.uniform(5.0, 40.0)])
    slope = rng.choice([0, 1]) * rng.normal(0.0, 3.0, 2)
    centre, size = rng.normal(0.0, 1.0, 2), rng.choice([0.5, 1.0, 2.0, 6.0])
    figure = Figure((depth, *slope), centre=tuple(centre), order=order)
    if rng.random() < 0.5:
        figure.axes = tuple(map(tuple, rng.normal(0.0, 1.0, (2, 2))))
    else:
        n = rng.integers(3, 8)
        turn = np.linspace(0.0, 2.0 * np.pi, n + 1)[:-1] + rng.uniform(0.0, 0.9, n)
        point = centre + size * np.stack((np.cos(turn), np.sin(turn)), axis=1)
        figure.corners = [tuple(p) for p in point]
    if with_holes and rng.random() < 0.5:
        figure.holes = [random_figure(rng, 0, with_holes=False)]
    return figure


def random_scene(seed):
    rng = np.random.default_rng(seed)
    return [random_figure(rng, order) for order in range(rng.integers(1, 7))]


# ---------------------------------------------------------------- against a second way


def stands(scene, share, free):
    return np.abs(np.append(share, free) - referee(scene)).max() < AGREE


@pytest.mark.parametrize("seed", range(40))
def test_referee_agrees(seed):
    scene = random_scene(seed)
    assert stands(scene, *divide(*scene))


def lattice_scene(seed):
    """Few round numbers: outlines meet, touch, coincide and pass through the axis."""
    rng = np.random.default_rng(seed)
    scene = []
    for order in range(rng.integers(2, 6)):
        depth, (x, y) = rng.integers(1, 4), rng.integers(-2, 3, 2) / 2
        slope = rng.choice([0, 0, 1], 2)
        figure = Figure((depth, *slope), centre=(x, y), order=order)
        if rng.random() < 0.5:
            figure.axes = tuple(map(tuple, np.diag(rng.choice([0.5, 1.0, 1.5], 2))))
        else:
            w, h = rng.choice([0.5, 1.0, 2.0], 2)
            figure.corners = [(x - w, y - h), (x + w, y - h), (x + w, y + h), (x - w, y + h)]
            figure.corners = figure.corners[: rng.integers(3, 5)]
        if rng.random() < 0.4:
            radius = rng.choice([0.25, 0.5, 1.0])
            figure.holes = [disc(radius, at=(x, y))]
        scene.append(figure)
    return scene


@pytest.mark.parametrize("seed", [*range(39), 163])
def test_referee_agrees_where_outlines_coincide(seed):
    scene = lattice_scene(seed)
    assert stands(scene, *divide(*scene))


def test_referee_sees_a_share_wrong_by_one_part_in_a_hundred_thousand():
    scene = random_scene(1)
    share, free = divide(*scene)
    assert not stands(scene, share, free + 1e-5)
    for k in range(len(share)):
        wrong = share.copy()
        wrong[k] += 1e-5
        assert not stands(scene, wrong, free)


def test_many_problems_at_once_are_each_as_alone():
    scenes = [random_scene(seed) for seed in range(12)] + [[]]
    shapes = to_shapes(scenes)
    result = partition(shapes, len(scenes))
    for problem, scene in enumerate(scenes[:-1]):
        alone = divide(*scene)
        here = (shapes.problem == problem) & (shapes.hole_of < 0)
        np.testing.assert_allclose(result.share[here], alone[0], rtol=1e-13, atol=1e-16)
    assert result.free[-1] == 1.0


def test_planes_that_cut_through_each_other_change_owner_at_the_line():
    tilted = Figure((10.0, 4.0, 0.0), corners=[(-9, -9), (9, -9), (9, 9), (-9, 9)])
    upright = box(-9, -9, 9, 9, depth=12.0)
    share, free = divide(tilted, upright)  # equal depth at xi1 = 0.5
    np.testing.assert_allclose(share, [norm.cdf(1.0), norm.sf(1.0)], rtol=1e-9)
    assert free < 1e-17


# ---------------------------------------------------------------- closed forms


@pytest.mark.parametrize("radius", [1e-5, 1e-3, 0.1, 1.0, 2.0, 3.5])
def test_central_disc(radius):
    share, free = divide(disc(radius))
    assert share[0] == pytest.approx(-np.expm1(-2.0 * radius**2), rel=1e-12)
    assert free == pytest.approx(np.exp(-2.0 * radius**2), rel=1e-9)


@pytest.mark.parametrize("edge", [-3.0, -1.0, -1e-9, 0.0, 1e-12, 1e-5, 0.5, 1.0, 2.5, 3.0])
@pytest.mark.parametrize("angle", [0.0, 0.7, np.pi / 2, 4.0])
def test_half_plane(edge, angle):
    share, free = divide(turned(box(edge, -1e4, 1e4, 1e4), angle))
    # Corners at 1e4 w place the edge to 1e-12 w only, of which 2.4 (1 + 4 edge) shows.
    assert share[0] == pytest.approx(norm.sf(2.0 * edge), rel=2e-11, abs=1e-11 * (edge < 1))
    assert free == pytest.approx(norm.cdf(2.0 * edge), rel=2e-11)


# Edge at w/2, -w, w beyond the axis: 0.841345, 0.022750, 0.977250 (normal distribution
# tables at 1, -2 and 2 standard deviations, e.g. Abramowitz & Stegun 1964, table 26.1).
@pytest.mark.parametrize(("edge", "passes"), [(0.5, 0.841345), (-1, 0.022750), (1, 0.977250)])
def test_edge_by_tables(edge, passes):
    assert divide(box(edge, -50, 50, 50))[1] == pytest.approx(passes, abs=5e-7)


def test_edge_two_and_a_half_radii_out():
    share, _ = divide(box(2.5, -40, 60, 50))  # Q(5), Abramowitz & Stegun table 26.2
    assert share[0] == pytest.approx(2.8665157187919391e-7, rel=1e-10)


@pytest.mark.parametrize(
    ("a", "d"), [(1, 0.5), (2, 1), (1, 2), (5, 5), (0.5, 3), (1, 1), (20, 19), (3, 0.2)]
)
def test_decentred_disc(a, d):
    share, free = divide(disc(a, at=(0.6 * d, 0.8 * d)))
    expected = ncx2.cdf((2 * a) ** 2, 2, (2 * d) ** 2)
    assert share[0] == pytest.approx(expected, rel=1e-9)
    assert free == pytest.approx(1.0 - expected, abs=1e-12)


@pytest.mark.parametrize("width", [1e-4, 1e-2, 1.0])
@pytest.mark.parametrize("at", [(0.0, 0.0), (-0.3, -0.7), (1.5, 0.2), (2.4, -1.0)])
def test_small_square_keeps_its_digits(width, at):
    x, y = at
    share, _ = divide(box(x, y, x + width, y + width))
    with mpmath.workdps(30):
        part = [
            (mpmath.ncdf(2 * (mpmath.mpf(t + width))) - mpmath.ncdf(2 * mpmath.mpf(t)))
            for t in (x, y)
        ]
        expected = float(part[0] * part[1])
    assert share[0] == pytest.approx(expected, rel=1e-9 if expected > 1e-9 else 1e-6)


# Round optics seen obliquely: only the axis across the tilt is foreshortened. 2-D quadrature.
@pytest.mark.parametrize(
    ("w", "half", "expected"),
    [
        ((8.0, 8.0), (12.7 * np.cos(np.pi / 4), 12.7), 0.960892),
        ((8.0, 8.0), (12.7, 12.7), 0.993528),
        ((10.0, 4.0), (12.7 * np.cos(np.pi / 4), 12.7), 0.923663),
        ((10.0, 4.0), (12.7, 12.7 * np.cos(np.pi / 4)), 0.986079),
    ],
)
def test_tilted_round_optic(w, half, expected):
    share, _ = divide(Figure((0, 0, 0), axes=((half[0] / w[0], 0), (0, half[1] / w[1]))))
    assert share[0] == pytest.approx(expected, abs=6e-7)


def test_elliptical_beam_with_axes_at_thirty_degrees():
    c, s = np.cos(np.pi / 6), np.sin(np.pi / 6)
    root = np.array([[c, -s], [s, c]]) @ np.diag([2.0, 1.0]) @ np.array([[c, s], [-s, c]])
    inverse = np.linalg.inv(root)
    axes = tuple(map(tuple, 3.0 * inverse))
    share, _ = divide(Figure((0, 0, 0), centre=tuple(inverse @ [1.0, 0.5]), axes=axes))
    assert share[0] == pytest.approx(0.966846, abs=6e-7)


def test_corner_at_the_axis_is_a_quarter():
    share, free = divide(box(0, 0, 70, 90))
    assert share[0] == pytest.approx(0.25, abs=1e-14)
    assert free == pytest.approx(0.75, abs=1e-14)


# ---------------------------------------------------------------- precedence


def test_equal_outlines_at_equal_depth_go_to_the_lower_order():
    share, _ = divide(disc(1.0, order=1), disc(1.0, order=0), disc(1.0, depth=9.0))
    np.testing.assert_allclose(share, [0.0, 1.0 - np.exp(-2.0), 0.0], atol=1e-15)


def test_equal_order_goes_to_the_lower_row():
    assert divide(disc(1.0), disc(1.0))[0][1] == 0.0


def test_depths_within_a_millionth_of_a_micrometre_are_equal():
    behind = disc(1.0, depth=5.0 + 0.9e-9)
    assert divide(disc(1.0, depth=5.0, order=1), behind)[0][0] == 0.0
    behind = disc(1.0, depth=5.0 + 1.1e-9)
    assert divide(disc(1.0, depth=5.0, order=1), behind)[0][1] == 0.0


def test_clear_aperture_and_rim_of_a_tilted_optic():
    plane = (100.0, 3.0, -2.0)
    clear = Figure(plane, axes=((0.9, 0), (0, 1.2)), order=0)
    rim = Figure(plane, axes=((1.0, 0), (0, 1.3)), order=1)
    share, _ = divide(clear, rim)
    assert share[0] == divide(clear)[0][0]
    assert share[1] == pytest.approx(divide(rim)[0][0] - share[0], rel=1e-12)


# ---------------------------------------------------------------- hard cases


def test_touching_circles_and_tiles():
    share, free = divide(disc(1.0, at=(-1.0, 0.0)), disc(1.0, at=(1.0, 0.0)))
    assert share[0] == pytest.approx(share[1], rel=1e-12)
    assert share.sum() + free == pytest.approx(1.0, abs=1e-13)
    share, free = divide(box(-9, -9, 0.3, 9), box(0.3, -9, 9, 9))
    np.testing.assert_allclose(share, [norm.cdf(0.6), norm.sf(0.6)], rtol=1e-12)
    assert free < 1e-17


def test_an_ellipse_that_touches_the_middle_of_an_edge_leaves_the_edge_alone():
    front = box(-3, -0.5, 1, 0.5)
    alone = divide(front)
    inside_it = Figure((3, 0, 0), centre=(-0.5, 0), axes=((1.5, 0), (0, 0.5)))
    share, free = divide(front, inside_it)
    assert share[0] == pytest.approx(alone[0][0], rel=1e-13)
    assert free == pytest.approx(alone[1], rel=1e-13)
    assert share[1] == 0.0


@pytest.mark.parametrize("gap", [0.0, 1e-15, 1e-12, 1e-9, 1e-6, 1e-3])
def test_circles_that_nearly_touch_from_within(gap):
    inner = disc(0.5, at=(0.8 + 0.5 - gap, 0.2))
    share, _ = divide(inner, disc(1.0, at=(0.8, 0.2), depth=3.0))
    both = divide(inner)[0][0] + share[1]
    assert both == pytest.approx(divide(disc(1.0, at=(0.8, 0.2)))[0][0], abs=1e-12)


def test_repeated_and_collinear_corners_change_nothing():
    plain = divide(box(-1, -0.5, 0.7, 2))[0][0]
    many = [(-1, -0.5), (0, -0.5), (0, -0.5), (1e-13, -0.5), (0.7, -0.5), (0.7, 2), (-1, 2)]
    assert divide(Figure((0, 0, 0), corners=many))[0][0] == pytest.approx(plain, rel=1e-11)


def test_slivers_are_left_out():
    share, free = divide(box(-1e-17, -9, 0.0, 9), Figure((0, 0, 0), axes=((1, 1), (1, 1))))
    assert share.tolist() == [0.0, 0.0]
    assert free == 1.0


def test_nothing_beyond_the_tail():
    share, free = divide(disc(1.0, at=(9.0, 0.0)), box(6, -1e4, 1e4, 1e4))
    assert share.tolist() == [0.0, 0.0]
    assert free == 1.0


def test_a_wall_takes_all():
    share, free = divide(box(-1e4, -1e4, 1e4, 1e4, depth=1e3))
    assert share[0] == pytest.approx(1.0, abs=1e-15)
    assert free == 0.0


def test_a_number_that_is_none_spoils_its_own_problem_only():
    bad = disc(1.0, at=(np.nan, 0.0))
    shapes = to_shapes([[disc(1.0)], [bad, disc(2.0)], [disc(1.0)]])
    result = partition(shapes, 3)
    np.testing.assert_array_equal(np.isnan(result.free), [False, True, False])
    np.testing.assert_array_equal(np.isnan(result.share), [False, True, True, False])


def test_a_hole_of_a_body_left_out_is_harmless():
    share, free = divide(disc(0.5, at=(40, 0), holes=[disc(1.0)]), disc(0.7, depth=1.0))
    assert share[0] == 0.0
    assert share[1] + free == pytest.approx(1.0, abs=1e-14)


def test_no_shapes():
    result = partition(to_shapes([]), 2)
    assert result.free.tolist() == [1.0, 1.0]


def test_large_calls_go_in_blocks():
    scene = random_scene(3)
    shapes = to_shapes([scene] * 900)
    result = partition(shapes, 900)
    np.testing.assert_allclose(result.free, result.free[0], rtol=1e-12)
    assert np.ptp(result.share.reshape(900, -1), axis=0).max() < 1e-14


@pytest.mark.parametrize(
    ("change", "match"),
    [
        ({"problem": [1, 0]}, "non-decreasing"),
        ({"problem": [0, 5]}, "problem must lie in"),
        ({"hole_of": [-1, 0], "problem": [0, 1]}, "same problem"),
    ],
)
def test_contract(change, match):
    shapes = to_shapes([[disc(1.0), disc(2.0)]])._replace(**change)
    with pytest.raises(ValueError, match=match):
        partition(shapes, 2)


def test_inputs_are_not_written_to():
    shapes = to_shapes([random_scene(2)])
    before = [column.copy() for column in shapes]
    partition(shapes, 1)
    for column, copy in zip(shapes, before, strict=True):
        np.testing.assert_array_equal(column, copy)


def test_inside_is_the_plain_test():
    scene = [disc(1.0, at=(0.2, 0)), box(-1, -1, 0, 0)]
    point = [(0.0, 0.0), (1.1, 0.0), (-0.5, -0.5), (3.0, 3.0)]
    assert inside(to_shapes([scene]), point).tolist() == [
        [True, True, True, False],
        [True, False, True, False],
    ]


# ---------------------------------------------------------------- properties

seeds = st.integers(100, 10**6)
quick = settings(max_examples=40, deadline=None)


@given(seeds)
@quick
def test_the_parts_make_the_whole(seed):
    share, free = divide(*random_scene(seed))
    assert (share >= 0.0).all()
    assert share.sum() + free == pytest.approx(1.0, abs=1e-12)


@given(seeds, st.floats(-4.0, 4.0))
@quick
def test_turning_everything_changes_nothing(seed, angle):
    scene = random_scene(seed)
    share, free = divide(*scene)
    again, left = divide(*(turned(figure, angle) for figure in scene))
    np.testing.assert_allclose(again, share, atol=1e-12, rtol=1e-9)
    assert left == pytest.approx(free, abs=1e-12, rel=1e-9)


@given(seeds)
@quick
def test_a_wall_behind_takes_exactly_what_was_free(seed):
    scene = random_scene(seed)
    share, free = divide(*scene)
    again, left = divide(*scene, box(-1e3, -1e3, 1e3, 1e3, depth=1e4))
    np.testing.assert_allclose(again[:-1], share, atol=1e-13, rtol=1e-10)
    assert again[-1] == pytest.approx(free, abs=1e-13, rel=1e-10)
    assert left == 0.0


@given(seeds, st.floats(0.1, 0.9))
@quick
def test_a_body_in_two_pieces_takes_as_much(seed, part):
    scene = random_scene(seed)
    slope = scene[0].depth
    whole = Figure(slope, corners=[(-1.0, -1.2), (1.5, -0.7), (0.6, 1.4)])
    cut = (-1.0 + 2.5 * part, -1.2 + 0.5 * part)
    first = Figure(slope, corners=[(-1.0, -1.2), cut, (0.6, 1.4)])
    second = Figure(slope, corners=[cut, (1.5, -0.7), (0.6, 1.4)])
    share, free = divide(whole, *scene)
    again, left = divide(first, second, *scene)
    assert again[:2].sum() == pytest.approx(share[0], abs=1e-12)
    np.testing.assert_allclose(again[2:], share[1:], atol=1e-12)
    assert left == pytest.approx(free, abs=1e-12)


@given(seeds)
@quick
def test_a_plugged_hole_is_no_hole(seed):
    scene = random_scene(seed)
    plate = (15.0, 1.0, -0.5)
    outline, hole = [(-2, -2), (2, -2), (2, 2), (-2, 2)], ((0.7, 0.2), (-0.1, 0.9))
    solid = Figure(plate, corners=outline)
    pierced = Figure(plate, corners=outline, holes=[Figure(plate, axes=hole)])
    share, free = divide(*scene, solid)
    again, left = divide(*scene, pierced, Figure(plate, axes=hole, order=0))
    assert again[-2:].sum() == pytest.approx(share[-1], abs=1e-12)
    np.testing.assert_allclose(again[:-2], share[:-1], atol=1e-12)
    assert left == pytest.approx(free, abs=1e-12)


def test_slivers_beyond_every_ray_take_nothing():
    """Sides seen edge-on that pass the axis a hundred radii away: nothing is met, all is free."""
    shares, free = divide(
        Figure((0.0, 0.0, 0.0), corners=[(1e4, 4e4), (5.8e2, 2.3e3), (-3.6e2, -2.4e3)]),
        Figure((0.0, 0.0, 0.0), corners=[(20.0, -60.0), (20.0, 60.0), (19.9, 0.0)]),
    )
    assert shares.tolist() == [0.0, 0.0]
    assert free == 1.0
