"""Ranges of published relations, held as data that the code obeys.

Each relation owns one ``Validity``. The check of a case, the methods page and the record all read
the same object, so a range cannot say one thing in prose and another in code. A range that the
source does not state is written as ``stated=False`` and shown as "none stated": unstated is not
unlimited.
"""

from collections.abc import Mapping
from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

Floats = NDArray[np.float64]


@dataclass(frozen=True)
class Range:
    """One dimensionless (or dimensioned, then ``unit`` says so) bound of a published relation."""

    symbol: str
    meaning: str
    low: float | None = None
    high: float | None = None
    low_open: bool = False
    high_open: bool = False
    unit: str = ""
    stated: bool = True
    basis: str = "published"
    """What the bound rests on: "published", or "confirmed here" by an own computation."""

    def words(self) -> str:
        """The bound in words, with what it rests on."""
        if not self.stated:
            return f"{self.meaning}: none stated"
        return f"{self.meaning}: {self.symbols()} ({self.basis})"

    def symbols(self) -> str:
        """The bound as an inequality with its unit."""
        low = "" if self.low is None else f"{self.low:g} {'<' if self.low_open else '≤'} "
        high = "" if self.high is None else f" {'<' if self.high_open else '≤'} {self.high:g}"
        unit = f" {self.unit}" if self.unit else ""
        return f"{low}{self.symbol}{high}{unit}"

    def holds(self, value: Floats | float) -> NDArray[np.bool_]:
        """True where the value lies inside; NaN lies outside."""
        v = np.asarray(value, dtype=float)
        inside = ~np.isnan(v)
        if self.low is not None:
            inside &= (v > self.low) if self.low_open else (v >= self.low)
        if self.high is not None:
            inside &= (v < self.high) if self.high_open else (v <= self.high)
        return np.asarray(inside)


@dataclass(frozen=True)
class Validity:
    """Where one published relation holds, who published it, and how exact it says it is."""

    relation: str
    source: str
    accuracy: str
    ranges: tuple[Range, ...]
    witness: str = ""
    """How the coefficients were confirmed here: read in the source, or recalled and confirmed by
    which independent computation."""
    tests: tuple[str, ...] = ()
    """The tests that hold it to its witness, as pytest names them: a file, or a file::test."""

    def holds(self, values: Mapping[str, Floats | float]) -> NDArray[np.bool_]:
        """True where every range holds. ``values`` maps each symbol to its value."""
        inside = np.asarray(True)
        for r in self.ranges:
            inside = inside & r.holds(values[r.symbol])
        return inside

    def marks(self, values: Mapping[str, float]) -> tuple["Mark", ...]:
        """The ranges that one single case leaves, in words; empty when it is inside all."""
        return tuple(
            Mark(self.relation, r, float(values[r.symbol]), self.source)
            for r in self.ranges
            if not bool(r.holds(values[r.symbol]))
        )


@dataclass(frozen=True)
class Mark:
    """One value that lies outside the range of one relation."""

    relation: str
    range: Range
    value: float
    source: str

    def sentence(self) -> str:
        """The mark in words, for outcome, page and record."""
        r = self.range
        unit = f" {r.unit}" if r.unit else ""
        return (
            f"{r.meaning} ({r.symbol}) is {self.value:.4g}{unit}; {self.relation} is {r.basis} for "
            f"{r.symbols()}. An engineer decides."
        )
