"""What every crack kind offers to failure, growth and the decision.

A kind joins a stress intensity relation, a reference stress relation and the words of the case
document. The rest of the computation knows cracks only through this door.

Symbols
-------
x : array, shape (front variables, ...) in m
    The *front variables*: distances from the mouth or middle of the crack to the named points of
    its front, in the order of ``Kind.points``. A semi-elliptical surface crack has
    x[0] = a (depth, to the deepest point) and x[1] = c (half the surface length, to the surface
    point); a through crack in the centre has x[0] = a (half the tip-to-tip length).
    Trailing axes are samples and broadcast.
loads : mapping of load name to array in MPa (kN for forces)
    Names are those of the case document without unit: ``membrane``, ``bending``, ``pressure``.
    K and reference stress are linear in ``loads`` taken together.
body : mapping of body key without unit to float in m (``table`` keys hold tuples)
"""

from collections.abc import Callable, Mapping
from dataclasses import dataclass, field
from typing import Any

from assessment.validity import Floats, Mark, Validity

Loads = Mapping[str, Floats]
Body = Mapping[str, Any]


@dataclass(frozen=True)
class WorkingStep:
    """One line of the printed working: step in words, formula, numbers put in, value, source."""

    step: str
    formula: str
    numbers: str
    value: float | str
    unit: str
    source: str


def _as_it_is(depth: float | None, length: float | None, loads: frozenset[str], body: Body) -> Body:
    return body


@dataclass(frozen=True)
class Kind:
    """A crack kind of the case document.

    name : the plain word of the document, e.g. ``plate-surface``
    words : the kind in a sentence a mechanic reads
    body_keys : required body keys as in the document (``width_mm`` …)
    optional_body_keys : body keys that may be left out
    load_keys : loads as in the document's peak (``membrane_mpa`` …); at least one must be given
    sizes : document sizes that are needed (``depth_mm``, ``length_mm``)
    optional_sizes : document sizes that may be given
    points : names of the points of the front, in the order of the front variables
    through : True where the crack already goes through the wall
    front : (depth_m | None, length_m | None, body) -> x, shape (front variables,)
    sizes_of : (x, body) -> (depth_m | None, length_m | None) arrays, as in the document
    stress_intensity : (x, loads, body) -> K in MPa√m, shape (points, ...)
    reference_stress : (x, loads, body) -> MPa, shape (...); positive
    nominal_stress : (loads, body) -> MPa, what the geometry factor is divided by, or None where
        membrane + bending is nil
    impossible : (x, body) -> sentence naming what cannot be, or None (one single case)
    wall : (x, body) -> room left before the front reaches the far wall or edge, per front
        variable, in m, shape (front variables, ...); the crack has broken through where any is <= 0
    inside : (x, body) -> bool array: every relation used is inside its published range
    marks : (x, body) -> tuple of Mark for one single case
    relations : the validity records of the relations used
    working : (x, loads, body) -> tuple of WorkingStep for one single case
    placed : (depth_m | None, length_m | None, loads, body) -> body with what else the document
        fixes and growth leaves alone: where the middle of an inner crack lies, whether there is
        a pin load. loads : names of those that are not nil in peak, cycles or residual stress
    becomes : (x, body) -> (kind name, depth_m | None, length_m, body) of the through crack that it
        is assessed as when its depth reaches the wall, or None
    profile_over : the body length that a stress profile runs over from the cracked surface, where
        the kind has a weight function; else None
    residual_names : membrane and bending of residual stress under the load names by which
        stress_intensity takes them, where they act otherwise than the same of a load
    leaks_to : as ``becomes``, for a pressure boundary: what it is once it leaks. It does not go on
        in service as that; see leak.py
    """

    name: str
    words: str
    body_keys: tuple[str, ...]
    load_keys: tuple[str, ...]
    sizes: tuple[str, ...]
    points: tuple[str, ...]
    front: Callable[[float | None, float | None, Body], Floats]
    sizes_of: Callable[[Floats, Body], tuple[Floats | None, Floats | None]]
    stress_intensity: Callable[[Floats, Loads, Body], Floats]
    reference_stress: Callable[[Floats, Loads, Body], Floats]
    nominal_stress: Callable[[Loads, Body], float | None]
    impossible: Callable[[Floats, Body], str | None]
    wall: Callable[[Floats, Body], Floats]
    inside: Callable[[Floats, Body], Any]
    marks: Callable[[Floats, Body], tuple[Mark, ...]]
    relations: tuple[Validity, ...]
    working: Callable[[Floats, Loads, Body], tuple[WorkingStep, ...]]
    becomes: Callable[[Floats, Body], tuple[str, float | None, float, Body] | None]
    placed: Callable[[float | None, float | None, frozenset[str], Body], Body] = _as_it_is
    leaks_to: Callable[[Floats, Body], tuple[str, float | None, float, Body]] | None = None
    profile_over: str | None = None
    residual_names: Mapping[str, str] = field(default_factory=dict)
    through: bool = False
    optional_body_keys: tuple[str, ...] = ()
    optional_sizes: tuple[str, ...] = ()
