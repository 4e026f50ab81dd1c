"""Where everything stands in a state, in degrees."""

from __future__ import annotations

from math import degrees

from benchlay.placing.placed import PlacedState
from benchlay.placing.pose import Pose
from benchlay.report.details import Pose as ReportedPose

_ROUNDS_TO_A_TURN = 5e-10  # degrees: printed with nine decimals this would read 360


def poses(state: PlacedState) -> dict[str, ReportedPose]:
    """Return the poses of all sources and elements, in name order.

    `facing` lies in [0, 360): where the front normal points, for a source the way its beam
    goes. What is out in this state is listed where it would stand.
    """
    found: dict[str, Pose] = {name: item.pose for name, item in state.sources.items()}
    found |= {name: item.pose for name, item in state.elements.items()}
    return {name: _reported(found[name]) for name in sorted(found)}


def _reported(pose: Pose) -> ReportedPose:
    facing = degrees(pose.facing_rad) % 360.0
    if 360.0 - facing < _ROUNDS_TO_A_TURN:
        facing = 0.0
    return ReportedPose(pose.at, facing, degrees(pose.pitch_rad))
