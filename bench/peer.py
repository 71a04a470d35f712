"""The same work with numpy and scipy, one thread. Prints one JSON object: seconds a call (medians)."""
import json
import sys
import time

try:
    import numpy as np
    from scipy.special import airy, ndtr
except ImportError as error:
    print(json.dumps({"error": str(error)}))
    sys.exit(0)


def median_time(call, seconds=0.02, rounds=9):
    calls = 1
    while True:
        start = time.perf_counter()
        for _ in range(calls):
            call()
        spent = time.perf_counter() - start
        if spent > seconds:
            break
        calls = max(calls + 1, int(calls * min(10, 1.2 * seconds / max(spent, 1e-9))))
    times = []
    for _ in range(rounds):
        start = time.perf_counter()
        for _ in range(calls):
            call()
        times.append((time.perf_counter() - start) / calls)
    return sorted(times)[rounds // 2]


out = {"numpy": np.__version__}
T, W = np.polynomial.legendre.leggauss(24)


def airy_matrix(s, n=24, length=10.0, rule=(T, W)):
    t, w = rule
    x = s + 0.5 * length * (t + 1)
    r = np.sqrt(0.5 * length * w)
    a, ap, _, _ = airy(x)
    with np.errstate(divide="ignore", invalid="ignore"):
        k = (np.outer(a, ap) - np.outer(ap, a)) / np.subtract.outer(x, x)
    np.fill_diagonal(k, ap * ap - x * a * a)
    return np.eye(n) - r[:, None] * k * r[None, :]


out["f2"] = median_time(lambda: np.linalg.det(airy_matrix(-2.0)))
out["f2value"] = float(np.linalg.det(airy_matrix(-2.0)))


def batched(m=200):
    s = np.linspace(-3, 1, m)
    x = s[:, None] + 5.0 * (T + 1)
    r = np.sqrt(5.0 * W)
    a, ap, _, _ = airy(x)
    with np.errstate(divide="ignore", invalid="ignore"):
        k = (a[:, :, None] * ap[:, None, :] - ap[:, :, None] * a[:, None, :]) / (x[:, :, None] - x[:, None, :])
    i = np.arange(24)
    k[:, i, i] = ap * ap - x * a * a
    return np.linalg.det(np.eye(24) - r[:, None] * k * r[None, :])


def eliminate(d, a, b, e):
    """Structured elimination by row operations; d(q) gives the gaps of pivot q. In place, e ends as 1 - pivots."""
    for q in range(len(e)):
        v = (a[q + 1 :] * b[q] - b[q + 1 :] * a[q]) / d(q)
        t = v * (1 / (1 - e[q]))
        a[q + 1 :] += t * a[q]
        b[q + 1 :] += t * b[q]
        e[q + 1 :] += t * v
    return e


def structured_batched(m):
    """F2 at m points at once, every row operation over all of them."""
    s = np.linspace(-3, 1, m)
    x = s[None, :] + 5.0 * (T + 1)[:, None]
    r = np.sqrt(5.0 * W)[:, None]
    a, ap, _, _ = airy(x)
    e = r * r * (ap * ap - x * a * a)
    gaps = 5.0 * T[:, None]
    return np.prod(1 - eliminate(lambda q: gaps[q + 1 :] - gaps[q], r * a, r * ap, e), axis=0)


assert np.allclose(structured_batched(200), batched(), rtol=0, atol=1e-13)
out["f2batched"] = median_time(batched) / 200
out["f2structured"] = min(median_time(lambda: structured_batched(m)) / m for m in [200, 500, 1000])
x = np.linspace(-20, 20, 10000)
out["airy"] = median_time(lambda: airy(x)) / 10000
out["ndtr"] = median_time(lambda: ndtr(x)) / 10000
out["slogdet"], out["cholesky"], out["structured"], out["slogdetComplex"] = {}, {}, {}, {}
for n in [20, 50, 100, 200, 500, 1000, 2000]:
    rule = np.polynomial.legendre.leggauss(n)
    m = airy_matrix(-2.0, n, 10.0, rule)
    nodes = -2.0 + 5.0 * (rule[0] + 1)
    root = np.sqrt(5.0 * rule[1])
    ai, prime, _, _ = airy(nodes)
    diagonal = root * root * (prime * prime - nodes * ai * ai)

    def structured():
        e = eliminate(lambda q: nodes[q + 1 :] - nodes[q], root * ai, root * prime, diagonal.copy())
        return np.log1p(-e).sum()

    assert abs(structured() - np.linalg.slogdet(m)[1]) < 1e-11
    seconds = 0.02 if n < 1000 else 0.001
    rounds = 9 if n < 1000 else 3
    out["slogdet"][n] = median_time(lambda: np.linalg.slogdet(m), seconds, rounds)
    out["cholesky"][n] = median_time(lambda: np.linalg.cholesky(m), seconds, rounds)
    out["structured"][n] = median_time(structured, seconds, rounds)
rng = np.random.default_rng(1)
for n in [64, 128, 256, 512]:
    m = np.eye(n) - (rng.standard_normal((n, n)) + 1j * rng.standard_normal((n, n))) / (3 * n**0.5)
    out["slogdetComplex"][n] = median_time(lambda: np.linalg.slogdet(m))
print(json.dumps(out))
