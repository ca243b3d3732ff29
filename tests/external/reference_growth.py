"""A slow, plain reference for growth: scipy's DOP853 in cycles, one case at a time.

It shares nothing with the growth code but the kind's stress intensity: the laws are typed again,
the independent variable is usage itself, and thresholds and ends are events.
"""

import numpy as np
from scipy.integrate import solve_ivp


def paris(c, m):
    return lambda high, low: c * (high - low) ** m


def walker(c, m, gamma):
    return lambda high, low: c * ((high - low) / (1 - low / high) ** (1 - gamma)) ** m


def reference_life(kind, body, x0, blocks, law, threshold, margin, tolerance=1e-10):
    """Usage from x0 until ``margin(x)`` is nil.

    x0 : m; blocks : (maxima by load, minima by load, cycles per unit of usage), MPa, the crack open
    throughout; law : (K_max, K_min) in MPa√m to m/cycle; threshold : MPa√m, on K_max − K_min, which
    is Paris' own: with another law give nil. Returns usage and the size there.
    """

    def ends(x):
        return [
            tuple(
                kind.stress_intensity(x, {n: np.asarray(s) for n, s in side.items()}, body)
                for side in block[:2]
            )
            for block in blocks
        ]

    def awake(x):
        return np.array([high - low > threshold for high, low in ends(x)])

    def distance(x):
        return np.array([high - low - threshold for high, low in ends(x)]).ravel()

    usage, x = 0.0, np.asarray(x0, dtype=float)
    while True:
        on = awake(x)

        def slope(_, y, on=on):
            rate = np.zeros_like(y)
            for row, (high, low), block in zip(on, ends(y), blocks, strict=True):
                rate += block[2] * np.where(row, law(high, low), 0.0)
            return rate

        events = [lambda _, y: margin(y)]
        events += [
            (lambda _, y, i=i: distance(y)[i]) for i in np.flatnonzero(~on.ravel()) if threshold
        ]
        for event in events:
            event.terminal = True
        solved = solve_ivp(
            slope, (0.0, 1e15), x, "DOP853", rtol=tolerance, atol=1e-16, events=events
        )
        assert solved.status == 1
        usage, x = usage + solved.t[-1], solved.y[:, -1]
        if len(solved.t_events[0]):
            return usage, x
        x = x * (1 + 1e-12)
