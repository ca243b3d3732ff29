"""Growth in batches beside what is usually written: ``python -m tests.benchmarks.growth_speed``.

Ratios of CPU time in one process, beside what they are to be; printed, never a timed test. A crack
in the surface of a plate in tension, Paris' law with a threshold, the failure assessment diagram
as its end. The other way is SciPy's solve_ivp over plain math functions, sample by sample.
"""

import math
import time
from concurrent.futures import ProcessPoolExecutor

import numpy as np
from scipy.integrate import solve_ivp

from assessment.failure.diagram import option_1
from assessment.growth import CycleBlock, Paris, grow, grow_batch
from assessment.kinds import KINDS

KIND = KINDS["plate-surface"]
T, W = 0.02, 0.4
BODY = {"thickness": T, "width": W}
PEAK, RANGE, THRESHOLD = 120.0, 80.0, 2.0
STEEL = (350.0, 500.0, 210e3, "continuous")
SAMPLES, ONE_BY_ONE = 10_000, 150
SPECTRUM = tuple(
    CycleBlock({"membrane": RANGE * n / 20}, 0.1, None, 10.0 ** (2.5 * (1 - n / 20)))
    for n in range(1, 21)
)
ONE = (CycleBlock({"membrane": RANGE}, 0.1, None, 1.0),)


def draws(count, different=False):
    rng = np.random.default_rng(4)
    spread = 0.4 if different else 0.08
    a = 0.003 * np.exp(rng.normal(0, spread, count))
    c = a * (1.6 + (rng.uniform(0, 2, count) if different else rng.normal(0, 0.1, count)))
    each = {"log10_c": rng.normal(-11.1, 0.15, count), "m": rng.normal(3.0, 0.1, count)}
    return np.stack([a, c]), each, rng.normal(90.0, 8.0, count)


def batch(drawn, blocks=ONE, **options):
    x0, each, toughness = drawn

    def margin(x, rows):
        loads = {"membrane": np.asarray(PEAK)}
        k = np.max(KIND.stress_intensity(x, loads, BODY), axis=0)
        lr = KIND.reference_stress(x, loads, BODY) / STEEL[0]
        return option_1(lr, *STEEL) - k / toughness[rows]

    law = Paris(1e-11, 3.0, THRESHOLD)
    return grow_batch(KIND, x0, BODY, law, blocks, margin, each=each, **options)


def scalar_k(a, c):
    """Newman and Raju's two values for 1 MPa, in math functions."""
    s, d = a / c, (a / T) ** 2
    if s <= 1.0:
        m = 1.13 - 0.09 * s + d * (-0.54 + 0.89 / (0.2 + s))
        m += d * d * (0.5 - 1.0 / (0.65 + s) + 14.0 * (1.0 - s) ** 24)
        deep, side, q = m, m * math.sqrt(s) * (1.1 + 0.35 * d), 1.0 + 1.464 * s**1.65
    else:
        i = 1.0 / s
        m = math.sqrt(i) * (1 + 0.04 * i) + d * (0.2 * i**4 - 0.11 * i**4 * d)
        deep, side, q = m * math.sqrt(i), m * (1.1 + 0.35 * i * d), 1.0 + 1.464 * i**1.65
    root = math.sqrt(math.pi * a / q / math.cos(math.pi * c / W * math.sqrt(a / T)))
    return deep * root, side * root


def one_by_one(drawn, method, rtol, dense=False):
    """Lives in s, as in the product, which is kind to the solver too."""
    x0, each, toughness = drawn
    sigma_y, sigma_u, modulus, _ = STEEL
    mu, n = min(0.001 * modulus / sigma_y, 0.6), 0.3 * (1 - sigma_y / sigma_u)
    cut = (sigma_y + sigma_u) / (2 * sigma_y)

    def limit(lr):
        if lr > cut:
            return 0.0
        low = min(lr, 1.0)
        f = (0.3 + 0.7 * math.exp(-mu * low**6)) / math.sqrt(1 + 0.5 * low**2)
        return f if lr <= 1 else f * lr ** ((n - 1) / (2 * n))

    found = []
    for j in range(x0.shape[1]):
        c_, m_, k_mat = 10.0 ** each["log10_c"][j], float(each["m"][j]), float(toughness[j])

        def slope(s, y, c_=c_, m_=m_):
            a, c = float(y[0]), float(y[1])
            rates = [
                c_ * (RANGE * k) ** m_ if RANGE * k > THRESHOLD else 0.0 for k in scalar_k(a, c)
            ]
            v = rates[0] / a + rates[1] / c
            return (rates[0] / v, rates[1] / v, 1.0 / v)

        def end(s, y, k_mat=k_mat):
            a, c = float(y[0]), float(y[1])
            if a >= T or 2 * c >= 0.5 * W:
                return -1.0
            alpha = (a / T) / (1 + T / c)
            lr = PEAK / (1 - alpha) ** 2 / sigma_y
            return limit(lr) - PEAK * max(scalar_k(a, c)) / k_mat

        end.terminal = True
        run = solve_ivp(
            slope, (0, 15), (*x0[:, j], 0.0), method, events=end, rtol=rtol, atol=1e-12,
            dense_output=dense,
        )  # fmt: skip
        if dense:
            run.sol(np.linspace(0, run.t[-1], 200))
        found.append(run.y[2, -1])
    return np.array(found)


def curve(index, drawn):
    """One run with its curve, by the adaptive way for single cases."""
    x0, each, toughness = drawn
    law = Paris(10.0 ** each["log10_c"][index], each["m"][index], THRESHOLD)

    def margin(x):
        loads = {"membrane": np.asarray(PEAK)}
        k = np.max(KIND.stress_intensity(x, loads, BODY), axis=0)
        lr = KIND.reference_stress(x, loads, BODY) / STEEL[0]
        return option_1(lr, *STEEL) - k / toughness[index]

    return grow(KIND, x0[:, index], BODY, law, ONE, margin)


def seconds(work, times=3):
    """The least CPU time of some, and what was found."""
    best, found = math.inf, None
    for _ in range(times):
        begun = time.process_time()
        found = work()
        best = min(best, time.process_time() - begun)
    return best, found


def _work(cracks):
    drawn = draws(2000)
    for _ in range(cracks):
        batch(drawn)
    return cracks


def two_processes(cracks=24):
    """Elapsed time of one process over that of two; other work on the machine lowers it."""
    taken = []
    for processes in (1, 2):
        with ProcessPoolExecutor(processes) as pool:
            list(pool.map(_work, [1] * processes))
            begun = time.perf_counter()
            list(pool.map(_work, [cracks // 12] * 12))
            taken.append(time.perf_counter() - begun)
    return taken[0] / taken[1]


def row(words, found, bar, more_is_better=True):
    met = found >= bar if more_is_better else found <= bar
    sign = "at least" if more_is_better else "at most"
    print(f"{words:<58} {found:8.2f}   {sign} {bar:g}{'' if met else '   MISSED'}")


def main():
    drawn = draws(SAMPLES)
    few = (drawn[0][:, :ONE_BY_ONE], {n: v[:ONE_BY_ONE] for n, v in drawn[1].items()}, drawn[2])
    one, lives = seconds(lambda: one_by_one(few, "LSODA", 1e-6), 2)
    many, found = seconds(lambda: batch(drawn))
    off = np.max(np.abs(found.usage[:ONE_BY_ONE] / lives - 1))
    print(f"largest difference of life on {ONE_BY_ONE} samples: {off:.3%} (to be under 0.5 %)")
    print(f"one sample: LSODA {one / ONE_BY_ONE * 1e3:.3f} ms, batch {many / SAMPLES * 1e3:.4f} ms")
    row(
        "10,000 samples, times LSODA 1e-6 sample by sample",
        one / ONE_BY_ONE / (many / SAMPLES),
        300,
    )
    dates = np.linspace(0.1, 0.9, 6) * np.median(found.usage)
    dated, _ = seconds(lambda: batch(drawn, at_usage=dates))
    row("with sizes at six dates, times without", dated / many, 1.6, False)
    other, _ = seconds(lambda: batch(draws(SAMPLES, different=True)))
    row("10,000 different cracks, times the samples", other / many, 2.0, False)
    bins, _ = seconds(lambda: batch(drawn, SPECTRUM), 1)
    row("20 bins with sharp thresholds, times one", bins / many, 2.5, False)
    dense, _ = seconds(lambda: one_by_one(_first(few), "RK45", 1e-6, dense=True))
    single, _ = seconds(lambda: curve(0, drawn))
    row("one run with its curve, times RK45 with dense output", dense / single, 10)
    row("two processes, times one (elapsed)", two_processes(), 1.8)


def _first(drawn):
    return drawn[0][:, :1], {n: v[:1] for n, v in drawn[1].items()}, drawn[2]


if __name__ == "__main__":
    main()
