"""The joints: open circles, and their names outside the truss where there is room."""

from __future__ import annotations

from spanwright.io.pictures.labels import Occupied, Words, place_near
from spanwright.io.pictures.lettering import height_of, width_of
from spanwright.io.pictures.sheet import Sheet, disc
from spanwright.io.pictures.style import INK, PAPER, SMALL, SOFT, THIN
from spanwright.truss.arrays import FloatArray
from spanwright.truss.model import Truss

ABOVE = (90.0, 75.0, 105.0, 55.0, 125.0, 30.0, 150.0, 180.0, 0.0)
BELOW = (270.0, 285.0, 255.0, 305.0, 235.0, 330.0, 210.0, 180.0, 0.0)
BESIDE = (180.0, 0.0, 135.0, 45.0, 270.0)
"""Directions in which the name of a joint of the top chord, of the bottom chord, or of neither or both is tried."""

STEPS = (1.2, 3.6, 6.0)
"""mm between a joint's circle and its name, tried in this order."""


def draw_joints(sheet: Sheet, joints: FloatArray, radius: float) -> None:
    """Draw circles about (j, 2) points on the sheet, mm."""
    sheet.areas([disc(joint, radius) for joint in joints], PAPER, edge=INK, width=THIN, order=3.5)


def draw_joint_names(sheet: Sheet, truss: Truss, joints: FloatArray, radius: float, occupied: Occupied) -> None:
    """Write the names beside (j, 2) points on the sheet where nothing stands; a name without room is left out."""
    for joint, name in enumerate(truss.joint_names):
        words = Words(width_of(name, SMALL), height_of(SMALL))
        for step in STEPS:
            place = place_near(joints, joint, words, radius + step, _bearings(truss, joint), occupied)
            if place is not None:
                sheet.text(place[0], place[1] - words.height / 2.0, name, SMALL, across="center", colour=SOFT)
                break


def _bearings(truss: Truss, joint: int) -> tuple[float, ...]:
    top, bottom = joint in truss.top.joints, joint in truss.bottom.joints
    if top == bottom:
        return BESIDE
    return ABOVE if top else BELOW
