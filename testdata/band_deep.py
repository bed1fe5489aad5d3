"""Tunnelling and mean energy of the lowest band to 15 digits at any depth.

Every E0(q) is a root of the characteristic polynomial of the plane-wave matrix, by
Newton's method in 80-digit arithmetic; integrals over the zone use evenly spaced
midpoints, half as many again until nothing changes. In a deep lattice the
tunnelling is far below the rounding of double precision; this table shows
whether the program keeps its digits there.

Run: /usr/bin/python3 band_deep.py > band_deep.tsv   (needs python3-numpy, python3-mpmath; about ten seconds)
"""
import mpmath as mp
import numpy as np

mp.mp.dps = 80
DEPTHS = ["0.05", "0.1", "0.5", "1", "2", "5", "10", "22", "25", "30", "40", "60", "100", "150", "200", "300", "500"]


def top(s):
    """Largest |l|: the coefficients beyond are below 1e-25."""
    return int(8 + 6 * float(s) ** 0.25)


def start(s, q):
    k = 2.0 * np.arange(-top(s), top(s) + 1) + q
    matrix = np.diag(k**2 + s / 2) - s / 4 * (np.eye(len(k), k=1) + np.eye(len(k), k=-1))
    return np.linalg.eigvalsh(matrix)[0]


def polynomial(s, q, e):
    """The ratio p/p' in e, and de/ds on the curve p = 0, both from the continued fraction."""
    one, couple = mp.mpf(1), s * s / 16
    total, by_e, by_s = -e + q * q + s / 2, -one, one / 2
    for side in (1, -1):
        d, d_e, d_s = (2 * side * top(s) + q) ** 2 + s / 2 - e, -one, one / 2
        for l in range(top(s) - 1, 0, -1):
            back = couple / d
            d_e, d_s = -one + back / d * d_e, one / 2 - s / 8 / d + back / d * d_s
            d = (2 * side * l + q) ** 2 + s / 2 - e - back
        total -= couple / d
        by_e += couple / d**2 * d_e
        by_s += -s / 8 / d + couple / d**2 * d_s
    return total / by_e, -by_s / by_e


def lowest(s, q):
    e = mp.mpf(start(float(s), float(q)))
    for _ in range(8):
        step, slope = polynomial(s, q, e)
        e -= step
        if abs(step) < mp.mpf(10) ** -72:
            return e, slope
    raise ArithmeticError(f"no convergence at s = {s}, q = {q}")


def averages(s, half):
    sums = [mp.mpf(0)] * 5
    for i in range(half):
        q = (i + mp.mpf(1) / 2) / half
        e, slope = lowest(s, q)
        terms = [e, slope] + [-e * mp.cos(mp.pi * q * r) for r in (1, 2, 3)]
        sums = [a + b for a, b in zip(sums, terms)]
    return [x / half for x in sums]


def main():
    print("# source: plane waves, 80-digit arithmetic")
    print("# generator: testdata/band_deep.py")
    print("# digits: 15 significant digits")
    print("\t".join(["s/Er", "mean/Er", "mean_slope/1", "J1/Er", "J2/Er", "J3/Er"]))
    for text in DEPTHS:
        s = mp.mpf(text)
        half = max(12, int(52 / float(s)))
        values = averages(s, half)
        while True:
            half = half * 3 // 2
            finer = averages(s, half)
            if all(abs(a - b) < abs(b) * mp.mpf(10) ** -16 for a, b in zip(values, finer)):
                break
            values = finer
        print("\t".join([text] + [mp.nstr(v, 15) for v in finer]), flush=True)


main()
