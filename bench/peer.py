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


out["f2batched"] = median_time(batched) / 200
x = np.linspace(-20, 20, 10000)
out["airy"] = median_time(lambda: airy(x)) / 10000
out["ndtr"] = median_time(lambda: ndtr(x)) / 10000
out["slogdet"], out["cholesky"], out["slogdetComplex"] = {}, {}, {}
for n in [20, 50, 100, 200, 500, 1000, 2000]:
    m = airy_matrix(-2.0, n, 10.0, np.polynomial.legendre.leggauss(n))
    seconds = 0.02 if n < 1000 else 0.001
    rounds = 9 if n < 1000 else 3
    out["slogdet"][n] = median_time(lambda: np.linalg.slogdet(m), seconds, rounds)
    out["cholesky"][n] = median_time(lambda: np.linalg.cholesky(m), seconds, rounds)
rng = np.random.default_rng(1)
for n in [64, 128, 256, 512]:
    m = np.eye(n) - (rng.standard_normal((n, n)) + 1j * rng.standard_normal((n, n))) / (3 * n**0.5)
    out["slogdetComplex"][n] = median_time(lambda: np.linalg.slogdet(m))
print(json.dumps(out))
