"""Cracks beside each other in one plane: when they count as one, and how large that one is.

    c₁ + c₂ ≥ s: one crack of the length 2c₁ + s + 2c₂ and the larger depth

c half the length along the surface, s the metal left between the two. A crack that was made longer
is held against the others again, until nothing more joins.
"""

from collections.abc import Sequence
from dataclasses import dataclass, replace

from assessment.validity import Validity

INTERACTION = Validity(
    relation="interaction of cracks in one plane",
    source="API 579-1/ASME FFS-1 (2007), part 9: multiple crack-like flaws in one plane (criterion "
    "and combined size)",
    accuracy="two equal through cracks that just count as two have an inner stress intensity 4.8 % "
    "above that of one alone (closed form); part-through cracks less",
    ranges=(),
    witness="from memory; the exact solution of two collinear cracks (F. Erdogan, 1962)",
    tests=("tests/assessment/test_interaction.py",),
)


@dataclass(frozen=True)
class Neighbour:
    """name : as the book has it; sizes and separation in m, None where not known. The separation is
    the metal between the two tips along the surface."""

    name: str
    depth: float | None
    length: float
    separation: float | None


@dataclass(frozen=True)
class Combined:
    """depth, length : of what is assessed, in m; joined, apart : neighbours, each with why"""

    depth: float | None
    length: float
    joined: tuple[tuple[Neighbour, str], ...]
    apart: tuple[tuple[Neighbour, str], ...]


def combine(depth: float | None, length: float, neighbours: Sequence[Neighbour]) -> Combined:
    """The crack and its neighbours, as what they are assessed as. A neighbour without a separation
    is left out: the document refers the case."""
    whole = Combined(depth, length, (), ())
    left = [one for one in neighbours if one.separation is not None]
    while True:
        near = next((one for one in left if _interact(whole.length, one)), None)
        if near is None:
            apart = tuple((one, _why(whole.length, one, "<")) for one in left)
            return replace(whole, apart=apart)
        left.remove(near)
        why = _why(whole.length, near, "≥")
        whole = Combined(
            _deeper(whole.depth, near.depth),
            whole.length + float(near.separation or 0.0) + near.length,
            (*whole.joined, (near, why)),
            (),
        )


def _interact(length: float, other: Neighbour) -> bool:
    return (length + other.length) / 2.0 >= float(other.separation or 0.0)


def _deeper(one: float | None, other: float | None) -> float | None:
    known = [depth for depth in (one, other) if depth is not None]
    return max(known) if known else None


def _why(length: float, other: Neighbour, sign: str) -> str:
    half, theirs = 500.0 * length, 500.0 * other.length
    between = 1e3 * float(other.separation or 0.0)
    return f"c₁ + c₂ = {half:.4g} + {theirs:.4g} mm {sign} s = {between:.4g} mm"
