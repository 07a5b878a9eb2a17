"""Joints and bars as they grow out of drawn lines: the value that the steps of clean-up hand on, and their remarks."""

from __future__ import annotations

from dataclasses import dataclass
from typing import NamedTuple

import numpy as np

from spanwright.truss.arrays import FloatArray, IntArray


class Remark(NamedTuple):
    """A finding in the plane of drawing, before its place is known in the drawing.

    source : index of the line it is about, or -1. at : x, y in mm, or ().
    """

    code: str
    text: str
    done: str = ""
    source: int = -1
    at: tuple[float, ...] = ()


@dataclass(frozen=True, eq=False)
class Network:
    """Joints and bars.

    xy : (j, 2) mm. ends : (b, 2) joints. sources : (b,) the line that each bar was drawn as.
    """

    xy: FloatArray
    ends: IntArray
    sources: IntArray

    def vectors(self) -> FloatArray:
        """(b, 2) mm, from the first end to the second."""
        steps: FloatArray = self.xy[self.ends[:, 1]] - self.xy[self.ends[:, 0]]
        return steps

    def lengths(self) -> FloatArray:
        """(b,) mm."""
        steps = self.vectors()
        return np.hypot(steps[:, 0], steps[:, 1])

    def degrees(self) -> IntArray:
        """(j,) how many bars end at each joint."""
        return np.bincount(self.ends.ravel(), minlength=len(self.xy))

    def used(self) -> Network:
        """Return the network without the joints that no bar reaches."""
        joints, compact = np.unique(self.ends, return_inverse=True)
        return Network(self.xy[joints], compact.reshape(-1, 2).astype(np.intp), self.sources)

    def place(self, joint: int) -> tuple[float, float]:
        """Return x and y of a joint, mm."""
        x, y = self.xy[joint].tolist()
        return x, y
