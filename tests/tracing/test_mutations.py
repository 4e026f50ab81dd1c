"""Every factor that divides power, wrong by 1e-5 together with its complement, is noticed.

The ledger closes all the same, which shows that its closing proves little; some figure of
some scene must disagree with its referee each time.
"""

import importlib
from functools import partial

import numpy as np
import pytest

from benchlay.scene.tables import BULKS, SINK, Mode
from benchlay.tracing import faces, section
from benchlay.tracing.outlines import BESIDE, BODY, CORE, OPTIC
from tests.tracing.bench import SCENES, Bench

for name in ("plates", "glasses", "states", "lenses", "cuts", "bodies", "landings"):
    importlib.import_module(f"tests.tracing.scenes.{name}")

trace_module = importlib.import_module("benchlay.tracing.trace")  # a function hides the name
WRONG = 1e-5


def _scene_with(change):
    """Replace tables of every compiled scene."""

    def patch(monkeypatch):
        compiled = trace_module.compile_scene
        monkeypatch.setattr(trace_module, "compile_scene", lambda placed: change(compiled(placed)))

    return patch


def _faces(column):
    def change(scene):
        wrong = getattr(scene.faces, column) * (1 + WRONG)
        return scene._replace(faces=scene.faces._replace(**{column: np.minimum(wrong, 1.0)}))

    return _scene_with(change)


def _solids(scene):
    wrong = scene.solids.specular * (1 + WRONG)
    return scene._replace(solids=scene.solids._replace(specular=wrong))


def _bulks(kind, column):
    def change(scene):
        b = scene.bulks
        mine = (b.kind == BULKS.index(kind))[:, None]
        values = getattr(b, column)
        # A share cannot exceed 1; one of 1 is made too small instead.
        wrong = np.where(values * (1 + WRONG) > 1.0, values * (1 - WRONG), values * (1 + WRONG))
        return scene._replace(bulks=b._replace(**{column: np.where(mine, wrong, values)}))

    return _scene_with(change)


def _share(amplitude, other, chosen, sign):
    """|a|^2 by a factor; what that takes or gives goes to the other amplitude."""
    share, rest = np.abs(amplitude) ** 2, np.abs(other) ** 2
    step = np.where(chosen, WRONG * share * sign, 0.0)
    step = np.where(rest - step < 0.0, 0.0, step)
    more = np.sqrt(np.divide(share + step, share, out=np.ones_like(share), where=share > 0))
    less = np.sqrt(np.divide(rest - step, rest, out=np.ones_like(rest), where=rest > 0))
    return amplitude * more, other * less


def _bare(which, polarization):
    """R or T of bare glass, of s or p light."""

    def patch(monkeypatch):
        whole = faces._amplitudes

        def wrong(meeting, scene):
            r_s, r_p, t_s, t_p, lost = whole(meeting, scene)
            bare = scene.faces.mode[meeting.row, meeting.wave] == Mode.BARE
            pair = [r_s, t_s] if polarization == "s" else [r_p, t_p]
            first, second = (0, 1) if which == "R" else (1, 0)
            pair[first], pair[second] = _share(pair[first], pair[second], bare, 1.0)
            if polarization == "s":
                return pair[0], r_p, pair[1], t_p, lost
            return r_s, pair[0], t_s, pair[1], lost

        monkeypatch.setattr(faces, "_amplitudes", wrong)

    return patch


def _metal(polarization):
    """R of metal, with what it swallows."""

    def patch(monkeypatch):
        whole = faces._amplitudes

        def wrong(meeting, scene):
            r_s, r_p, t_s, t_p, lost = whole(meeting, scene)
            metal = scene.faces.mode[meeting.row, meeting.wave] == Mode.METAL
            if not metal.any():
                return r_s, r_p, t_s, t_p, lost
            r = r_s if polarization == "s" else r_p
            step = np.where(metal, WRONG * np.abs(r) ** 2, 0.0)
            r = r * np.where(metal, np.sqrt(1 + WRONG), 1.0)
            if polarization == "s":
                return r, r_p, t_s, t_p, (lost[0] - step, lost[1])
            return r_s, r, t_s, t_p, (lost[0], lost[1] - step)

        monkeypatch.setattr(faces, "_amplitudes", wrong)

    return patch


def _partition(chosen):
    """The share of some shapes, taken from the largest other share of their cross-section."""

    def patch(monkeypatch):
        gathered, divide = section.gather, section.partition
        last = []

        def gather(*arguments):
            last[:] = [gathered(*arguments)]
            return last[0]

        def wrong(shapes, problems, *more):
            result = divide(shapes, problems, *more)
            outlines = last[0]
            share, free = result.share.copy(), result.free.copy()
            for problem in range(problems):
                rows = np.flatnonzero(outlines.problem == problem)
                mine = rows[chosen(outlines, rows)]
                step = WRONG * share[mine].sum()
                others = np.setdiff1d(rows, mine)
                share[mine] *= 1 + WRONG
                if len(others) and share[others].max() > max(free[problem], step):
                    share[others[share[others].argmax()]] -= step
                elif free[problem] >= step:
                    free[problem] -= step
                else:
                    share[mine] /= 1 + WRONG
            return result._replace(share=share, free=free)

        monkeypatch.setattr(section, "gather", gather)
        monkeypatch.setattr(section, "partition", wrong)

    return patch


def _role(role, outlines, rows):
    return outlines.role[rows] == role


def _landing(sink, outlines, rows):
    beside = (outlines.role[rows] == BESIDE) | (outlines.role[rows] == BODY)
    return beside & (outlines.sink[rows] == SINK[sink])


MUTATIONS = {
    "R of bare glass, s": (_bare("R", "s"), ["plate_straight_on", "plate_at_45_s"]),
    "R of bare glass, p": (_bare("R", "p"), ["plate_at_45_p"]),
    "T of bare glass, s": (_bare("T", "s"), ["plate_at_45_s"]),
    "T of bare glass, p": (_bare("T", "p"), ["plate_at_45_p"]),
    "coating, s": (_faces("share_s"), ["cube_both_ways", "splitter_with_a_wedge"]),
    "coating, p": (_faces("share_p"), ["cube_both_ways", "splitter_with_a_wedge"]),
    "what a coating swallows, s": (_faces("loss_s"), ["lossy_mirror"]),
    "what a coating swallows, p": (_faces("loss_p"), ["lossy_mirror"]),
    "metal, s": (_metal("s"), ["metal_mirrors"]),
    "metal, p": (_metal("p"), ["metal_mirrors"]),
    "polarizer, along": (_bulks("polarizer", "passes"), ["two_polarizers_with_their_faces"]),
    "polarizer, across": (
        _bulks("polarizer", "refused"),
        ["crossed_polarizers_pass_by_their_extinction"],
    ),
    "coloured glass": (_bulks("absorber", "passes"), ["density_grows_with_the_path_inside"]),
    "shine of a target": (_faces("specular"), ["specular_shares_and_bodies"]),
    "shine of a body": (_scene_with(_solids), ["shine_of_a_panel"]),
    "share of the core": (
        _partition(partial(_role, CORE)),
        ["round_opening_met_in_and_off_the_middle"],
    ),
    "share of a further optic": (
        _partition(partial(_role, OPTIC)),
        ["spill_past_a_mirror_on_a_further_optic"],
    ),
    "share of a rim": (_partition(partial(_landing, "rim")), ["an_overfilled_mirror_in_its_mount"]),
    "share of a body": (_partition(partial(_landing, "body")), ["knife_edges"]),
    "share of a screen": (_partition(partial(_landing, "screen")), ["a_screen_that_takes_a_share"]),
    "share of a panel": (_partition(partial(_landing, "panel")), ["a_level_edge_of_a_panel"]),
    "share of a target": (_partition(partial(_landing, "target")), ["a_target_beside_the_beam"]),
    "share of a dump": (_partition(partial(_landing, "dump")), ["a_dump_that_takes_a_wing"]),
    "share of the bench": (_partition(partial(_landing, "bench")), ["the_bench_under_a_wide_beam"]),
    "share of a wall": (_partition(partial(_landing, "wall")), ["a_wall_behind_a_target"]),
}


@pytest.mark.parametrize("mutation", MUTATIONS)
def test_a_wrong_share_is_noticed_and_the_ledger_closes(mutation, monkeypatch):
    patch, scenes = MUTATIONS[mutation]
    assert all(c.holds for name in scenes for c in SCENES[name]()), "right before it is made wrong"
    patch(monkeypatch)
    closing = []
    original = Bench.__init__

    def watched(self, *arguments, **keys):
        original(self, *arguments, **keys)
        for state in self.states:
            closing.append(abs(sum(self.sinks(state).values()) / self.emitted(state) - 1))

    monkeypatch.setattr(Bench, "__init__", watched)
    wrong = [c for name in scenes for c in SCENES[name]() if not c.holds]
    assert wrong, "no figure of these scenes disagrees"
    assert max(closing) < 1e-9
