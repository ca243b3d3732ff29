"""What surface cracks with a depth and a length share."""

from collections.abc import Callable

import numpy as np

from assessment.validity import Floats

from . import parts
from .base import Body, Loads, WorkingStep

AT = ("deepest", "surface")


def front(depth: float | None, length: float | None, body: Body) -> Floats:
    """x[0] = a, x[1] = c, half the length along the surface."""
    return np.asarray(two(depth, length) * np.array([1.0, 0.5]))


def two(depth: float | None, length: float | None) -> Floats:
    """Depth and length as they are."""
    if depth is None or length is None:
        raise ValueError("this kind needs depth and length")
    return np.asarray([depth, length], dtype=float)


def deeper_than_wall(x: Floats, body: Body) -> str | None:
    if x[0] > body["thickness"]:
        return (
            f"the crack ({parts.millimetres(x[0])}) is deeper than the wall "
            f"({parts.millimetres(body['thickness'])})."
        )
    return None


def k_steps(
    x: Floats,
    loads: Loads,
    body: Body,
    k: Callable[..., Floats],
    formula: str,
    source: str,
    words: tuple[str, str] = ("deepest point (φ = 90°)", "surface point (φ = 0)"),
) -> tuple[WorkingStep, ...]:
    """A line for each of the two points."""
    values = k(x, loads, body)
    formula = parts.with_integral(formula, loads)
    numbers = f"a = {parts.millimetres(x[0])}, c = {parts.millimetres(x[1])}, "
    numbers += parts.said(loads, body)
    return tuple(
        parts.step_k(word, formula, numbers, value, source)
        for word, value in zip(words, values, strict=True)
    )
