"""Is the forecast as sure as it says? ``python -m tests.full.calibration [cracks]``, 500 by
default.

Cracks from the forecast's own model must pass; the same cracks with the sizing error misstated by a
factor of two must be caught. Cracks from a deliberately different world (another law, a rate that
wanders more, a sizing bias that nobody states) are shown, with a floor for the widest band; and
those of a basis that is plainly wrong, with none: no history of small sizes tells of a law that
bends later.
"""

import sys
import time

import numpy as np

from tests.assessment.forecast.calibration import (
    COVER,
    MODEL,
    OTHER,
    WRONG_BASIS,
    World,
    coverage,
    faults,
    ranks,
)

FLOOR = 0.80


def main(cracks: int = 500) -> int:
    wrong = []
    worlds = {
        "own model": (MODEL, False),
        "sizing error stated at half": (World(told=0.5), True),
        "sizing error stated at double": (World(told=2.0), True),
        "another world": (OTHER, None),
        "a basis that is wrong": (WRONG_BASIS, None),
    }
    for number, (name, (world, caught)) in enumerate(worlds.items()):
        begun = time.perf_counter()
        found = ranks(cracks, 100 + number, world)
        said = faults(found)
        print(f"{name}, {cracks} cracks, {time.perf_counter() - begun:.0f} s")
        for what, row in zip(("life", "size"), found, strict=True):
            _print(what, row)
        print(f"    {'; '.join(said) or 'nothing speaks against it'}", flush=True)
        if caught is not None and bool(said) != caught:
            wrong.append(name)
        if world is OTHER and coverage(found[0])[-1] < FLOOR:
            wrong.append(f"{name}: the 90 % band of life holds less than {FLOOR:.0%}")
    for name in wrong:
        print(f"NOT AS IT SHOULD BE: {name}")
    return 1 if wrong else 0


def _print(what: str, row: np.ndarray) -> None:
    bins = np.histogram(row, bins=10, range=(0.0, 1.0))[0]
    shares = "  ".join(f"{c:.0%}: {s:.0%}" for c, s in zip(COVER, coverage(row), strict=True))
    print(f"    {what}  {shares}  ranks {bins.tolist()}")


if __name__ == "__main__":
    sys.exit(main(*(int(a) for a in sys.argv[1:2])))
