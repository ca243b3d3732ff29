"""Random cracks of every part-through kind, and their lives by a general-purpose solver.

The reference is SciPy's DOP853 (E. Hairer, S. P. Nørsett & G. Wanner, Solving Ordinary Differential
Equations I, 2nd ed. (1993), II.5) at 1e-10, restarted wherever a cycle passes its threshold, with
the laws written out again here in plain numbers. It shares the stress intensity with the product,
not the growth.
"""

from dataclasses import dataclass

import numpy as np
from scipy.integrate import solve_ivp

from assessment.growth import CycleBlock, Forman, FormanMettu, Paris, TwoStage, Walker, grow_batch
from assessment.growth.closure import opening
from assessment.growth.integrate import ENDS
from assessment.kinds import KINDS

FAILED, BROKEN, OUTSIDE, STOPPED = (
    ENDS.index(word) for word in ("failed", "break-through", "out of range", "no growth")
)
PLATE = {"thickness": 0.02, "width": 0.4}
PIPE = {"thickness": 0.02, "inner_radius": 0.2}
HOLE = {**PLATE, "hole_diameter": 0.03}
# Kind: body, load, first size over this length, second over first.
CASES = {
    "plate-surface": (PLATE, "membrane", 0.02, (1.0, 4.0)),
    "plate-corner": (PLATE, "membrane", 0.016, (0.8, 4.0)),
    "plate-embedded": ({**PLATE, "middle": 0.01}, "membrane", 0.008, (1.0, 4.0)),
    "cylinder-axial-inside": (PIPE, "pressure", 0.016, (1.0, 4.0)),
    "cylinder-axial-outside": (PIPE, "pressure", 0.016, (1.0, 4.0)),
    "cylinder-girth-inside": (PIPE, "membrane", 0.016, (1.0, 4.0)),
    "cylinder-girth-outside": (PIPE, "membrane", 0.016, (1.0, 4.0)),
    "bar-surface": ({"diameter": 0.04}, "membrane", 0.02, None),
    "hole-corner-one": (HOLE, "membrane", 0.016, (0.8, 1.5)),
    "hole-corner-two": (HOLE, "membrane", 0.016, (0.8, 1.5)),
    "lug-corner": (
        {"thickness": 0.02, "width": 0.1, "hole_diameter": 0.05, "head": 0.05},
        "pin_load",
        0.016,
        (0.8, 1.5),
    ),
}
LAWS = ("paris", "walker", "two-stage", "forman", "forman-mettu", "paris 20 bins")


@dataclass(frozen=True)
class Drawn:
    """Samples of one kind and law, with all that differs between them."""

    kind: object
    body: dict
    load: str
    law: object
    each: dict
    blocks: tuple
    x0: np.ndarray
    factor: np.ndarray
    toughness: np.ndarray

    def margin(self, x, rows):
        k = self.kind.stress_intensity(x, {self.load: 1.2 * self.factor[rows]}, self.body)
        return self.toughness[rows] - np.max(k, axis=0)

    def batch(self, **options):
        return grow_batch(
            self.kind, self.x0, self.body, self.law, self.blocks, self.margin,
            each=self.each, stress_factor=self.factor, **options,
        )  # fmt: skip


def draw(kind_name, law_name, count, seed=11):
    """Stress so that the largest range starts between 8 and 20 MPa√m; blocks wake on the way."""
    kind = KINDS[kind_name]
    body, load, most, shape = CASES[kind_name]
    rng = np.random.default_rng(seed)
    first = most * rng.uniform(0.08, 0.5, count)
    x0 = first[None] if shape is None else np.stack([first, first * rng.uniform(*shape, count)])
    unit = np.max(kind.stress_intensity(x0, {load: np.ones(count)}, body), axis=0)
    factor = rng.uniform(8.0, 20.0, count) / unit
    law, each = _law(law_name, rng, count)
    if law_name.endswith("bins"):
        blocks = [
            CycleBlock({load: size}, 0.1, None, 10.0 ** (3 - 2.5 * size))
            for size in np.arange(1, 21) / 20
        ]
    else:
        blocks = [
            CycleBlock({load: s}, r, None, n)
            for s, r, n in ((1.0, 0.1, 1.0), (0.35, 0.4, 80.0), (0.2, 0.0, 2000.0))
        ]
    toughness = rng.uniform(1.5, 6.0, count) * 1.2 * factor * unit
    return Drawn(kind, body, load, law, each, tuple(blocks), x0, factor, toughness)


def _law(name, rng, count):
    c, m = rng.normal(-11.0, 0.2, count), rng.normal(3.0, 0.15, count)
    k_c = rng.uniform(70.0, 120.0, count)
    if name == "walker":
        return Walker(1e-11, 3.0, 0.6, 2.5), {"log10_c": c, "m": m}
    if name == "two-stage":
        return TwoStage(1e-17, 8.0, 1e-11, 2.9, 2.5), {"log10_c2": c, "m2": m}
    if name == "forman":
        return Forman(1e-9, 3.0, 90.0, 2.5), {"log10_c": c + 2, "m": m, "k_c": k_c}
    if name == "forman-mettu":
        law = FormanMettu(1e-11, 3.0, 0.5, 0.5, 90.0, 2.0, 0.3, 2.5)
        return law, {"log10_c": c, "n": m, "k_c": k_c}
    return Paris(1e-11, 3.0, 2.5), {"log10_c": c, "m": m}


def _constants(drawn, index):
    values = {name: getattr(drawn.law, name) for name in drawn.law.__dataclass_fields__}
    for name, array in drawn.each.items():
        plain = name.removeprefix("log10_")
        values[plain] = 10.0 ** array[index] if plain != name else array[index]
    return values


def _range(law, v, size, ratio):
    return size / (1 - ratio) ** (1 - v["gamma"]) if law == "walker" else size


def _rate(law, v, k, ratio):
    """The laws as their sources print them, for one number."""
    if law == "two-stage":
        # The one line above the other before their crossing is below it after.
        crossing = (v["c1"] / v["c2"]) ** (1 / (v["m2"] - v["m1"]))
        return v["c1"] * k ** v["m1"] if k < crossing else v["c2"] * k ** v["m2"]
    if law == "forman":
        return v["c"] * k ** v["m"] / abs((1 - ratio) * v["k_c"] - k)
    if law == "forman-mettu":
        f = float(opening(np.asarray(ratio), v["constraint"], v["peak_over_flow"]))
        above = max(1 - v["threshold"] / k, 0.0) ** v["p"]
        below = abs(1 - k / (1 - ratio) / v["k_c"]) ** v["q"]
        return v["c"] * ((1 - f) / (1 - ratio) * k) ** v["n"] * above / below
    return v["c"] * k ** v["m"]


def tight(drawn, index):
    """(usage, end) of one sample."""
    law, v, rows = drawn.law.name, _constants(drawn, index), np.array([index])
    sizes = [
        (b.ranges[drawn.load] * drawn.factor[index], b.stress_ratio, b.per_usage)
        for b in drawn.blocks
    ]

    def unit(x):
        found = drawn.kind.stress_intensity(x[:, None], {drawn.load: np.ones(1)}, drawn.body)
        return [float(k) for k in found[:, 0]]

    def gaps(x):
        return np.array(
            [[_range(law, v, s * k, r) - v["threshold"] for s, r, _ in sizes] for k in unit(x)]
        )

    def slope(s, y, on):
        r = np.array(
            [
                sum(
                    n * _rate(law, v, _range(law, v, size * k, ratio), ratio)
                    for (size, ratio, n), grows in zip(sizes, here, strict=True)
                    if grows
                )
                for k, here in zip(unit(y[:-1]), on, strict=True)
            ]
        )
        speed = np.sum(r / y[:-1])
        return np.append(r, 1.0) / speed

    def over(x):
        if np.min(np.atleast_1d(drawn.kind.wall(x, drawn.body))) <= 0:
            return BROKEN
        if drawn.margin(x[:, None], rows)[0] <= 0:
            return FAILED
        if "k_c" in v and max(s / (1 - r) for s, r, _ in sizes) * max(unit(x)) >= v["k_c"]:
            return FAILED
        return None if bool(np.all(drawn.kind.inside(x, drawn.body))) else OUTSIDE

    def event(s, y, on):
        if not np.all(np.isfinite(y)) or over(y[:-1]) is not None:
            return -1.0
        # A cycle that is just at its threshold belongs to the state it is going to.
        found = np.where(on, gaps(y[:-1]) + 1e-9, 1e-9 - gaps(y[:-1]))
        return 1.0 if np.all(found > 0) else -1.0

    event.terminal = True
    y = np.append(drawn.x0[:, index], 0.0)
    for _ in range(400):
        end = over(y[:-1])
        if end is not None:
            return y[-1], end
        on = gaps(y[:-1]) > 0
        if not np.any(on):
            return y[-1], STOPPED
        with np.errstate(invalid="ignore"):
            run = solve_ivp(
                slope, (0, 20), y, "DOP853", args=(on,), events=event, rtol=1e-10, atol=1e-14,
                max_step=0.2,
            )  # fmt: skip
        y = run.y[:, -1] * (1 + 0.0)
        y[:-1] *= 1 + 1e-10  # beyond the event
    raise AssertionError("more flips than cycles")


def worst(kind_name, law_name, count, seed=11):
    """Largest relative error of life, and how many ends are not those of the reference."""
    drawn = draw(kind_name, law_name, count, seed)
    found = drawn.batch()
    errors, others = [0.0], 0
    for index in range(count):
        usage, end = tight(drawn, index)
        others += int(end != found.end[index])
        errors.append(abs(found.usage[index] - usage) / usage if usage else found.usage[index])
    return max(errors), others
