"""F2(-2) by Gauss-Legendre and structured elimination at one order with mpmath, nodes given. Prints seconds as JSON."""
import json
import sys
import time

try:
    import mpmath as mp
except ImportError as error:
    print(json.dumps({"error": str(error)}))
    sys.exit(0)

request = json.load(sys.stdin)
out = {"mpmath": mp.__version__, "backend": mp.libmp.BACKEND, "rows": []}
for row in request:
    mp.mp.dps = row["digits"] + 10
    nodes = [mp.mpf(t) for t in row["nodes"]]
    weights = [mp.mpf(t) for t in row["weights"]]
    half = mp.mpf(row["length"]) / 2
    start = time.perf_counter()
    x = [-2 + half * (1 + t) for t in nodes]
    a = [mp.airyai(t) for t in x]
    b = [mp.airyai(t, derivative=1) for t in x]
    e = [q * q - t * p * p for t, p, q in zip(x, a, b)]
    w = [half * t for t in weights]
    sampled = time.perf_counter()
    det = mp.mpf(1)
    n = len(x)
    for q in range(n):
        m = 1 - w[q] * e[q]
        det *= m
        f = w[q] / m
        sa, sb = a[q] * f, b[q] * f
        aq, bq, xq = a[q], b[q], x[q]
        for i in range(q + 1, n):
            v = (a[i] * bq - b[i] * aq) / (x[i] - xq)
            a[i] += v * sa
            b[i] += v * sb
            e[i] += v * v * f
    end = time.perf_counter()
    out["rows"].append({"samples": sampled - start, "elimination": end - sampled, "value": mp.nstr(det, row["digits"])})
print(json.dumps(out))
