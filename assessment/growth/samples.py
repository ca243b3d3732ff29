"""What drives many samples of one crack: their loads and growth laws, row by row.

Each sample may have its own constants of the law and its own factor on stress. A view of some of
the samples is taken with ``take``; nothing here mixes one sample with another.
"""

from collections.abc import Mapping
from dataclasses import dataclass, fields, replace
from typing import Any, Protocol, Self

import numpy as np
from numpy.typing import NDArray

from assessment.kinds.base import Body, Kind
from assessment.validity import Floats

from .laws import GrowthLaw, TwoStage, threshold_at
from .rates import Drive, effective_ranges, grows, k_by_load, rates_from, unstable

Rows = NDArray[np.int_]
Flags = NDArray[Any]


class Samples(Protocol):
    """``seen`` is what a size gives once for thresholds and rates; its last axis is samples."""

    def take(self, rows: Rows) -> Self:
        """Some of the samples."""
        ...

    def see(self, x: Floats) -> Floats: ...

    def flags(self, seen: Floats) -> Flags:
        """Which cycles grow which point, last axis samples; nil or False where none does."""
        ...

    def gap(self, seen: Floats, flags: Flags) -> Floats:
        """Per sample: above nil as long as the flags hold, falling through nil where one flips."""
        ...

    def rates(self, seen: Floats, flags: Flags) -> Floats:
        """m per unit of usage, shape (points, samples)."""
        ...

    def unstable(self, seen: Floats) -> NDArray[np.bool_]:
        """Per sample: the law's own K_c is reached."""
        ...


def law_of_samples(law: GrowthLaw, each: Mapping[str, Floats], samples: int) -> Any:
    """The law with arrays for the constants that differ between samples.

    each : constant of the law to an array of shape (samples,); "log10_c" for the logarithm of "c"
    Raises ValueError for a constant that the law does not have, one given twice, a wrong shape, or
    a value that is not finite.
    """
    known = {field.name for field in fields(law)} - {"by_ratio"}  # type: ignore[arg-type]
    values: dict[str, Floats] = {}
    for name, given in each.items():
        plain = name.removeprefix("log10_")
        if plain not in known:
            raise ValueError(f"the law has no constant {name!r}; it has {', '.join(sorted(known))}")
        if plain in values:
            raise ValueError(f"{plain} is given twice, once as its logarithm")
        array = np.asarray(given, dtype=float)
        if array.shape != (samples,):
            raise ValueError(f"{name} has shape {array.shape}; one value a sample is ({samples},)")
        if not np.all(np.isfinite(array)):
            raise ValueError(f"{name} holds a value that is not finite")
        values[plain] = np.asarray(10.0**array) if plain != name else array
    return replace(law, **values)  # type: ignore[type-var]


@dataclass(frozen=True)
class AnySamples:
    """Any law and any cycles. ``seen`` is (2, blocks, points, samples): range and ratio."""

    kind: Kind
    body: Body
    law: Any
    drive: Drive
    factor: Floats

    def take(self, rows: Rows) -> "AnySamples":
        return replace(self, law=_law_rows(self.law, rows), factor=self.factor[rows])

    def see(self, x: Floats) -> Floats:
        unit_k = k_by_load(self.kind, x, self.drive.names, self.body)
        return np.stack(effective_ranges(self.drive, unit_k, self.law, self.factor))

    def flags(self, seen: Floats) -> Flags:
        growing = grows(seen[0], seen[1], self.law).astype(np.int8)
        if isinstance(self.law, TwoStage):
            # Where the second stage takes over, the rate bends: a step is split there too.
            growing += growing * (seen[0] >= self.law.crossing)
        return growing

    def gap(self, seen: Floats, flags: Flags) -> Floats:
        at = threshold_at(self.law, seen[1])
        above = np.where(at > 0.0, seen[0] / at - 1.0, np.inf)
        # Without a threshold only a crack that is pulled open starts to grow, which size alone
        # seldom does: half-way is then as good as any place to look.
        relative = np.where(flags > 0, above, -above)
        left = np.where(np.isinf(relative), 1.0, relative)
        if isinstance(self.law, TwoStage):
            bent = seen[0] / self.law.crossing - 1.0
            stage = np.where(flags > 1, bent, -bent)
            left = np.minimum(left, np.where(flags > 0, stage, 1.0))
        return np.asarray(np.min(left, axis=(0, 1)))

    def rates(self, seen: Floats, flags: Flags) -> Floats:
        return rates_from(self.drive, seen[0], seen[1], self.law, flags > 0)

    def unstable(self, seen: Floats) -> NDArray[np.bool_]:
        return unstable(seen[0], seen[1], self.law)


def _law_rows(law: Any, rows: Rows) -> Any:
    varied = {
        field.name: getattr(law, field.name)[rows]
        for field in fields(law)
        if isinstance(getattr(law, field.name), np.ndarray)
    }
    return replace(law, **varied) if varied else law
