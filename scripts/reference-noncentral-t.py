"""Reference points of the noncentral t, both tails: the normal tail averaged over the
scale by quadrature at 40 digits. Usage: python3 scripts/reference-noncentral-t.py"""
import json
import os

import mpmath as mp

mp.mp.dps = 40
POINTS = [(2, 10, 1.5), (-3, 4, 2), (100, 4, -2), (1, 1, 3), (35, 500, 38), (5, 1e5, 4), (0.5, 2.5, -1), (30, 16, 8.08), (0, 7, 2)]


def tail(t, df, shift, upper):
    t, df, shift = mp.mpf(t), mp.mpf(df), mp.mpf(shift)
    half = df / 2
    constant = mp.log(2) + half * mp.log(half) - mp.loggamma(half)

    def integrand(w):  # w = log of chi / sqrt(df)
        scale = mp.e**w
        edge = t * scale - shift
        return mp.e ** (constant + df * w - half * scale * scale) * mp.erfc((edge if upper else -edge) / mp.sqrt(2)) / 2

    # The left side falls off as exp(df w), the right one faster than any exponential.
    left = max(20 / mp.sqrt(df), 150 / df)
    right = min(20 / mp.sqrt(df), mp.mpf(5))
    steps = [-left * k / mp.mpf(120) for k in range(120, 0, -1)] + [right * k / mp.mpf(40) for k in range(41)]
    return mp.quad(integrand, steps)


points = [
    dict(fn="sf" if upper else "cdf", params=[df, shift], x=t, expected=float(tail(t, df, shift, upper)))
    for t, df, shift in POINTS
    for upper in (True, False)
]
out = os.path.join(os.path.dirname(os.path.abspath(__file__)), "..", "tests", "reference", "noncentral-t.json")
head = dict(
    topic="noncentral-t",
    source="mpmath %s, adaptive quadrature at 40 digits, arguments taken as exact doubles" % mp.__version__,
    meaning="params: degrees of freedom, noncentrality. cdf: P(T<=x). sf: P(T>x).",
    tolerance=dict(rel=1e-11, abs=0),
    count=len(points),
)
body = ",\n".join("  " + json.dumps(point) for point in points)
with open(out, "w") as file:
    file.write(json.dumps(head, indent=1)[:-2] + ',\n "cases": [\n' + body + "\n ]\n}\n")
