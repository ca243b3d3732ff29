"""The sizes that a measured crack may truly have: the corners of its sizing error.

A longer surface crack can have the lower stress intensity at its ends, so the largest depth with
the largest length is not always the worst: every corner of (depth ± error) × (length ± error) is
looked at, and the decision takes the worst. Where the depth of a corner reaches the far wall, the
corner is assessed as the through crack it becomes.
"""

from collections.abc import Mapping
from dataclasses import dataclass, replace
from typing import Any

import numpy as np

from assessment.document.case import Crack
from assessment.kinds import KINDS
from assessment.kinds.base import Kind
from assessment.validity import Floats


@dataclass(frozen=True)
class Corner:
    """One size to be assessed, in m, with the kind it is assessed as.

    broken : why the part is already through at this size and nothing is left to compute, or None
    """

    kind: Kind
    body: Mapping[str, Any]
    depth: float | None
    length: float | None
    x: Floats
    became: bool = False
    broken: str | None = None


def corners(crack: Crack, body: Mapping[str, Any], deviations: float) -> tuple[Corner, ...]:
    """All corners at so many standard deviations of the sizing error, after bias.

    Bias is how much too large the method reads on average, so it is taken off. A corner at or
    below nil size is no crack and is left out; the corner with all sizes at their largest is
    always there and comes first.
    """
    depths = _spread(crack.depth, *_error(crack, "depth", deviations))
    lengths = _spread(crack.length, *_error(crack, "length", deviations))
    sizes = [(depth, length) for depth in depths for length in lengths]
    if crack.depth_basis == "assumed" and crack.depth is not None and crack.length is not None:
        # The depth follows from the length by an assumed ratio, so it moves along with it.
        sizes = [(crack.depth * length / crack.length, length) for length in lengths if length]
    once = dict.fromkeys(sizes)
    return tuple(sizes_to_corner(crack.kind, body, *size) for size in once)


def _error(crack: Crack, which: str, deviations: float) -> tuple[float, float]:
    if crack.sizing is None:
        return 0.0, 0.0
    if which == "depth":
        return crack.sizing.depth_bias, deviations * crack.sizing.depth_sd
    return crack.sizing.length_bias, deviations * crack.sizing.length_sd


def _spread(size: float | None, bias: float, error: float) -> tuple[float | None, ...]:
    if size is None:
        return (None,)
    middle = size - bias
    smallest = middle - error
    return (middle + error, smallest) if 0.0 < smallest < middle else (middle + error,)


def sizes_to_corner(
    kind: Kind, body: Mapping[str, Any], depth: float | None, length: float | None
) -> Corner:
    """The crack to be assessed for a size: itself, or the through crack it has become."""
    x = np.asarray(kind.front(depth, length, body), dtype=float)
    room = np.atleast_1d(kind.wall(x, body))
    if bool(np.all(room > 0.0)) and kind.impossible(x, body) is None:
        return Corner(kind, body, depth, length, x)
    became = kind.becomes(x, body)
    if became is None:
        words = f"A crack of this size ({in_mm(depth, length)}) has broken through."
        return Corner(kind, body, depth, length, x, broken=words)
    name, new_depth, new_length, new_body = became
    new = KINDS[name]
    new_x = np.asarray(new.front(new_depth, new_length, new_body), dtype=float)
    broken = None
    if not bool(np.all(np.atleast_1d(new.wall(new_x, new_body)) > 0.0)):
        if not new.through:
            # An inner crack that reached one surface can have reached the other too.
            last = sizes_to_corner(new, new_body, new_depth, new_length)
            return replace(last, became=True)
        broken = f"A crack of this size ({in_mm(depth, length)}) parts the section."
    return Corner(new, new_body, new_depth, new_length, new_x, became=True, broken=broken)


def in_mm(depth: float | None, length: float | None) -> str:
    """The size in words."""
    words = []
    if depth is not None:
        words.append(f"depth {depth * 1e3:.4g} mm")
    if length is not None:
        words.append(f"length {length * 1e3:.4g} mm")
    return ", ".join(words)
