"""A case with a forecast and six past sizes, case to outcome: ``python -m
tests.benchmarks.forecast_speed``.

Printed, never a timed test: processor time, with ratios to the same case without a forecast.
"""

import statistics
import time
from collections.abc import Callable
from typing import Any

from assessment import assess
from assessment.forecast.case_forecast import SAMPLES
from tests.assessment.examples import surface
from tests.assessment.forecast.test_case_forecast import crack, grown

RUNS = 15


def main() -> None:
    sizes = grown()
    more = [(at + shift, d, w) for at, d, w in sizes[:-1] for shift in (0.0, 100.0)]
    six = crack([*more, sizes[-1]], sd=0.3)
    sharp = crack([*more, sizes[-1]], sd=0.03)
    cases = {
        "no forecast": _without(six),
        "forecast, no past sizes": surface(**{**six, "history": []}),
        "forecast, six past sizes": surface(**six),
        "forecast, six sharp past sizes": surface(**sharp),
    }
    plain = 0.0
    print(f"{SAMPLES} samples")
    for name, document in cases.items():
        seconds = _timed(lambda document=document: assess(document))
        median, p95 = statistics.median(seconds), statistics.quantiles(seconds, n=20)[-1]
        plain = plain or median
        print(
            f"{name:<32} median {median * 1e3:5.0f} ms   95th percentile {p95 * 1e3:5.0f} ms   "
            f"{median / plain:5.1f} times"
        )
    print("aim: 95 in 100 entries have their verdict within 300 ms")


def _without(changes: dict[str, Any]) -> dict[str, Any]:
    document = surface(**changes)
    del document["uncertainty"]
    return document


def _timed(work: Callable[[], object]) -> list[float]:
    work()
    seconds = []
    for _ in range(RUNS):
        begun = time.process_time()
        work()
        seconds.append(time.process_time() - begun)
    return seconds


if __name__ == "__main__":
    main()
