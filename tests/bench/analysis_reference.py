"""The full analysis of a lot with numpy and scipy, the way somebody at home in them would write it.

Works beside shared/analysis in tests/bench/analysis.bench.ts: reads one job (JSON) from the first line of standard input,
then answers every further line with one analysis of the same readings, as JSON with its duration and the figures found.
Sums go through BLAS, searches through sorted order, special functions through scipy.special; nothing is slowed on purpose.
"""

import json
import sys
import time

import numpy as np
from scipy import special
from scipy.optimize import brentq

CONFIDENCE = 0.95
NODES, WEIGHTS = np.polynomial.legendre.leggauss(20)


def moments(x):
    n = x.size
    mean = x.mean()
    d = x - mean
    missed = d.sum() / n
    d -= missed
    d2 = d * d
    m2 = d2.sum() / n
    m3 = (d2 @ d) / n
    m4 = (d2 @ d2) / n
    g1 = m3 / m2**1.5
    g2 = m4 / (m2 * m2) - 3
    return {
        "mean": mean + missed,
        "sd": np.sqrt(m2 * n / (n - 1)),
        "skewness": g1 * np.sqrt(n * (n - 1)) / (n - 2),
        "kurtosis": (n - 1) / ((n - 2) * (n - 3)) * ((n + 1) * g2 + 6),
    }


def anderson_darling(ordered, mean, sd):
    n = ordered.size
    z = (ordered - mean) / sd
    weights = np.arange(1.0, 2 * n, 2)
    a2 = -n - (weights @ special.log_ndtr(z) + weights[::-1] @ special.log_ndtr(-z)) / n
    a = a2 * (1 + 0.75 / n + 2.25 / (n * n))
    if a < 0.2:
        p = 1 - np.exp(-13.436 + 101.14 * a - 223.73 * a * a)
    elif a < 0.34:
        p = 1 - np.exp(-8.318 + 42.796 * a - 59.938 * a * a)
    elif a < 0.6:
        p = np.exp(0.9177 - 4.279 * a - 1.38 * a * a)
    else:
        p = np.exp(1.2937 - 5.709 * a + 0.0186 * a * a) if a < 150 else 0.0
    return a2, p


def generalised_esd(ordered, most, alpha=0.05):
    low, high = 0, ordered.size
    centre = ordered[high // 2]
    d = ordered - centre
    s1, s2 = d.sum(), d @ d
    values, last = [], 0
    for step in range(most):
        n = high - low
        mean = centre + s1 / n
        sd = np.sqrt(max(0.0, s2 - s1 * s1 / n) / (n - 1))
        below, above = mean - ordered[low], ordered[high - 1] - mean
        take_high = above >= below
        value = ordered[high - 1] if take_high else ordered[low]
        t = -special.stdtrit(n - 2, alpha / (2 * n))
        critical = (n - 1) / np.sqrt(n) * np.sqrt(t * t / (n - 2 + t * t))
        values.append(value)
        if max(below, above) / sd > critical:
            last = step + 1
        if take_high:
            high -= 1
        else:
            low += 1
        away = value - centre
        s1 -= away
        s2 -= away * away
    return values[:last]


def reduced(ordered, groups=512):
    n = ordered.size
    size = n if n <= 2 * groups else groups
    starts = np.arange(size) * n // size
    counts = np.diff(np.append(starts, n)).astype(float)
    firsts = ordered[starts]
    d = ordered - np.repeat(firsts, counts.astype(int))
    s1 = np.add.reduceat(d, starts)
    s2 = np.add.reduceat(d * d, starts)
    return firsts + s1 / counts, counts, np.maximum(0, s2 - s1 * s1 / counts), float(n)


def climb(data, split, floor):
    means, counts, squares, n = data
    inner = squares / counts
    share = np.zeros(means.size)
    share[:split] = 1
    before = -np.inf
    for _ in range(200):
        w = counts * share
        v = counts - w
        w1, w2 = w.sum(), v.sum()
        if not (w1 > 1 and w2 > 1):
            return None
        m1, m2 = (w @ means) / w1, (v @ means) / w2
        d1, d2 = means - m1, means - m2
        q1, q2 = d1 * d1 + inner, d2 * d2 + inner
        sd1 = max(floor, np.sqrt((w @ q1) / w1))
        sd2 = max(floor, np.sqrt((v @ q2) / w2))
        la = np.log(w1 / n / sd1) - 0.5 / (sd1 * sd1) * q1
        lb = np.log(w2 / n / sd2) - 0.5 / (sd2 * sd2) * q2
        both = np.logaddexp(la, lb)
        likelihood = counts @ both - n * 0.5 * np.log(2 * np.pi)
        share = np.exp(la - both)
        gained = likelihood - before
        before = likelihood
        if gained < 1e-4 + 1e-9 * abs(likelihood):
            break
    groups = sorted([(m1, sd1, w1 / n), (m2, sd2, w2 / n)])
    return likelihood, groups


def two_clusters(ordered):
    steps = np.diff(ordered)
    resolution = steps[steps > 0].min()
    data = reduced(ordered)
    means, counts, squares, n = data
    origin = means[means.size // 2]
    d = means - origin
    s1 = counts @ d
    variance = (counts @ (d * d) + squares.sum() - s1 * s1 / n) / n
    floor = max(resolution / np.sqrt(12), 1e-6 * np.sqrt(variance))
    weight = np.cumsum(counts)[:-1]
    sums = np.cumsum(counts * (means - means[0]))
    gap = sums[:-1] / weight - (sums[-1] - sums[:-1]) / (n - weight)
    size = means.size
    splits = {int(np.argmax(weight * (n - weight) * gap * gap)) + 1, -(-size // 10), 9 * size // 10}
    fits = [fit for fit in (climb(data, split, floor) for split in splits) if fit]
    likelihood, (a, b) = max(fits)
    one = -n * (0.5 * np.log(2 * np.pi) + 0.5 * np.log(variance) + 0.5)
    separation = np.sqrt(2) * (b[0] - a[0]) / np.hypot(a[1], b[1])
    evidence = 2 * (likelihood - one) - 3 * np.log(n)
    x = np.linspace(a[0], b[0], 201)
    density = sum(g[2] / g[1] * np.exp(-0.5 * ((x - g[0]) / g[1]) ** 2) for g in (a, b))
    at = int(np.argmin(density))
    valley_p = 1.0
    if 0 < at < 200:
        reach = min(x[at] - a[0], b[0] - x[at]) / 2
        within = [
            np.searchsorted(ordered, c + reach, "left") - np.searchsorted(ordered, c - reach, "right")
            for c in (x[at], a[0], b[0])
        ]
        hump = min(within[1:])
        valley_p = special.bdtr(within[0], within[0] + hump, 0.5)
    return separation, evidence, valley_p


def clopper_pearson(found, n):
    half = (1 - CONFIDENCE) / 2
    low = 0.0 if found == 0 else special.betaincinv(found, n - found + 1, half)
    high = special.betaincinv(found + 1, n - found, 1 - half)
    return low, high, special.betaincinv(found + 1, n - found, CONFIDENCE)


def share_bounds(n, mean, sd, low, high):
    """Plug-in, unbiased and upper bound for two limits, and the capability with its bounds."""
    q = np.array([(mean - low) / sd, (high - mean) / sd])
    root = np.sqrt(n)
    plug_in = special.ndtr(-q).sum()
    half = n / 2 - 1
    unbiased = special.betainc(half, half, np.clip(0.5 - q * root / (2 * (n - 1)), 0, 1)).sum()
    each = (1 + CONFIDENCE) / 2
    upper = special.ndtr(-special.nctdtrinc(n - 1, each, q * root) / root).sum()
    ppk_bound = special.nctdtrinc(n - 1, CONFIDENCE, q.min() * root) / (3 * root)
    pp = (high - low) / (6 * sd)
    pp_bound = pp * np.sqrt(special.chdtri(n - 1, CONFIDENCE) / (n - 1))
    return plug_in, unbiased, min(1.0, upper), pp, pp_bound, q.min() / 3, ppk_bound


def tolerance_factor(n, share):
    """Exact two-sided factor: average over the mean by Gauss-Legendre, solved by Brent."""
    edges = np.linspace(0, 9, 5)
    z = np.concatenate([(b - a) / 2 * NODES + (a + b) / 2 for a, b in zip(edges, edges[1:])])
    w = np.concatenate([(b - a) / 2 * WEIGHTS for a, b in zip(edges, edges[1:])])
    x = z / np.sqrt(n)
    r = np.full(x.size, special.ndtri((1 + share) / 2)) + 0.5 * x * x
    for _ in range(30):
        gap = special.ndtr(x + r) - special.ndtr(x - r) - share
        slope = (np.exp(-0.5 * (x + r) ** 2) + np.exp(-0.5 * (x - r) ** 2)) / np.sqrt(2 * np.pi)
        r = r - gap / slope
        if np.abs(gap).max() < 1e-15:
            break
    density = np.exp(-0.5 * z * z) / np.sqrt(2 * np.pi)

    def short(k):
        return 2 * (w * density) @ special.chdtrc(n - 1, (n - 1) * (r / k) ** 2) - CONFIDENCE

    k = special.ndtri((1 + share) / 2) * np.sqrt((1 + 1 / n) * (n - 1) / special.chdtri(n - 1, CONFIDENCE))
    return brentq(short, 0.98 * k, 1.02 * k, xtol=1e-14)


def mean_bound(mean, variance, n):
    """Lesser of Chernoff-Hoeffding at 4/5 of the risk and empirical Bernstein at 1/5."""
    risk = 1 - CONFIDENCE
    reach = -np.log(0.8 * risk) / n

    def divergence(q):
        ones = mean * np.log(mean / q) if mean > 0 else 0.0
        return ones + (1 - mean) * (np.log1p(-mean) - np.log1p(-q)) - reach

    chernoff = 1.0 if mean >= 1 else brentq(divergence, mean, 1 - 1e-16, xtol=1e-18, rtol=1e-14)
    part = np.log(2 / (0.2 * risk))
    bernstein = mean + np.sqrt(2 * variance * part / n) + 7 * part / (3 * (n - 1))
    return min(1.0, chernoff, bernstein)


def beyond_uniform(x, tolerance, limit):
    if limit < 0:
        return np.ones(x.size)
    near = np.clip(x - (limit - tolerance), 0, 2 * tolerance)
    near += np.clip(-x - (limit - tolerance), 0, 2 * tolerance)
    near /= 2 * tolerance
    return np.minimum(near, 1, out=near)


def links(x, tolerance, symbol_rate, front_end):
    n = x.size
    left = beyond_uniform(x, tolerance, symbol_rate)
    outside = np.minimum(left, beyond_uniform(x, tolerance, front_end))
    answer = []
    for p in (left, left - outside, outside):
        mean = min(1.0, p.sum() / n)
        variance = max(0.0, p @ p - n * mean * mean) / (n - 1)
        answer += [mean, mean_bound(mean, variance, n)]
    return answer


def histogram(ordered, low, high, most):
    q1, q3 = np.quantile(ordered, [0.25, 0.75])
    width = 2 * (q3 - q1) / np.cbrt(ordered.size)
    width = max(width, (high - low) / most)
    bins = int(np.ceil((high - low) / width))
    inner = np.linspace(low, high, bins + 1)
    edges = np.concatenate([[min(ordered[0], low)], inner, [max(ordered[-1], high)]])
    return edges, np.diff(np.searchsorted(ordered, edges))


def probability_plot(ordered, most=512, tail=64):
    n = ordered.size
    stride = max(1, -(-(n - 2 * tail) // (most - 2 * tail)))
    at = np.unique(np.concatenate([np.arange(tail), np.arange(tail, n - tail, stride), np.arange(n - tail, n)]))
    return special.ndtri((at + 0.625) / (n + 0.25)), ordered[at]


def farthest(x, low, high, most=500):
    excess = np.maximum(low - x, x - high)
    at = np.flatnonzero(excess > 0)
    if at.size > most:
        at = at[np.argpartition(-excess[at], most)[:most]]
    return at[np.argsort(-excess[at], kind="stable")]


def analyse(x, job):
    low, high = job["lowPpm"], job["highPpm"]
    ordered = np.sort(x)
    n = ordered.size
    m = moments(x)
    quantiles = np.quantile(ordered, job["quantiles"])
    a2, p = anderson_darling(ordered, m["mean"], m["sd"])
    outliers = generalised_esd(ordered, min(10, n // 10))
    middle = quantiles[len(quantiles) // 2]
    body_low = [v for v in outliers if v < middle]
    body_high = [v for v in outliers if v >= middle]
    body = ordered[
        np.searchsorted(ordered, max(body_low), "right") if body_low else 0 :
        np.searchsorted(ordered, min(body_high), "left") if body_high else n
    ]
    of_body = {"mean": m["mean"], "sd": m["sd"]} if not outliers else moments(body)
    body_a2 = a2 if not outliers else anderson_darling(body, of_body["mean"], of_body["sd"])[0]
    separation, evidence, valley_p = two_clusters(ordered)
    count = int(np.searchsorted(ordered, low, "left") + n - np.searchsorted(ordered, high, "right"))
    plug_in, unbiased, upper, pp, pp_bound, ppk, ppk_bound = share_bounds(n, m["mean"], m["sd"], low, high)
    factor = tolerance_factor(n, 0.99)
    for limit in (low - job["guardPpm"], low + job["guardPpm"], high - job["guardPpm"], high + job["guardPpm"]):
        np.searchsorted(ordered, limit)
    histogram(ordered, low, high, 400)
    histogram(ordered, low, high, 60)
    probability_plot(ordered)
    farthest(x, max(low, -job["allowancePpm"]), min(high, job["allowancePpm"]))
    figures = {
        "mean": m["mean"],
        "standard deviation": m["sd"],
        "skewness": m["skewness"],
        "excess kurtosis": m["kurtosis"],
        "0.1 % quantile": quantiles[0],
        "median": middle,
        "Anderson-Darling": a2,
        "its p": p,
        "Anderson-Darling without outliers": body_a2,
        "outliers": len(outliers),
        "Ashman's D": separation,
        "beyond, counted": count,
        "beyond, upper bound": clopper_pearson(count, n)[2],
        "beyond, plug-in": plug_in,
        "beyond, unbiased": unbiased,
        "beyond, normal upper bound": upper,
        "Pp": pp,
        "Ppk": ppk,
        "Ppk, lower bound": ppk_bound,
        "tolerance interval, high": m["mean"] + factor * m["sd"],
    }
    for receiver in job["receivers"]:
        values = links(ordered, receiver["tolerancePpm"], receiver["symbolRatePpm"], receiver["frontEndPpm"])
        names = ("left", "left, bound", "several", "several, bound", "outside", "outside, bound")
        figures.update({f"{receiver['name']}: {name}": value for name, value in zip(names, values)})
    return figures


def peak_mib():
    with open("/proc/self/status") as status:
        return next(int(line.split()[1]) for line in status if line.startswith("VmHWM")) / 1024


def main():
    job = json.loads(sys.stdin.readline())
    x = np.fromfile(job["file"], dtype="<f8")
    before = peak_mib()
    print(json.dumps({"ready": True}), flush=True)
    for _ in sys.stdin:
        begin, cpu = time.perf_counter(), time.process_time()
        figures = analyse(x, job)
        ms = (time.perf_counter() - begin) * 1000
        cpu_ms = (time.process_time() - cpu) * 1000
        plain = {name: float(value) for name, value in figures.items()}
        answer = {"ms": ms, "cpuMs": cpu_ms, "beforeMiB": before, "peakMiB": peak_mib(), "figures": plain}
        print(json.dumps(answer), flush=True)


main()
