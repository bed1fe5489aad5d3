"""Time-dependent Gutzwiller in plain NumPy: 64 x 64 sites, 6 levels, 100 steps of 0.01.

    i df_n/dt = [U n(n-1)/2 + V r^2 n] f_n - J [Phi sqrt(n) f_(n-1) + conj(Phi) sqrt(n+1) f_(n+1)]

with J = 1, U = -2.1, V = -4/R^2, R = 0.3 * 64, open edges, the classical Runge-Kutta
method. At the start f = (sqrt(1-d), +-sqrt(d)) with d = 0.9 max(0, 1 - r^2/R^2) and
signs that alternate. The table holds the amplitudes of every 8th column of every
4th row.

Run: /usr/bin/python3 gutzwiller_rk4.py > gutzwiller_rk4.tsv   (needs python3-numpy)
"""
import numpy as np

SIDE, LEVELS, STEPS, DT = 64, 6, 100, 0.01
TUNNELLING, INTERACTION, CURVATURE = 1.0, -2.1, -4 / (0.3 * SIDE) ** 2

x = np.arange(SIDE) - (SIDE - 1) / 2
square = x[:, None] ** 2 + x[None, :] ** 2  # [y, x]
n = np.arange(LEVELS)
root = np.sqrt(n[1:])
diagonal = 0.5 * INTERACTION * n * (n - 1) + (CURVATURE * square)[..., None] * n


def rate(f):
    phi = (np.conj(f[..., :-1]) * f[..., 1:] * root).sum(-1)
    padded = np.pad(phi, 1)
    mean = TUNNELLING * (padded[2:, 1:-1] + padded[:-2, 1:-1] + padded[1:-1, 2:] + padded[1:-1, :-2])
    g = diagonal * f
    g[..., 1:] -= mean[..., None] * root * f[..., :-1]
    g[..., :-1] -= np.conj(mean)[..., None] * root * f[..., 1:]
    return -1j * g


def main():
    density = 0.9 * np.clip(1 - square / (0.3 * SIDE) ** 2, 0, 1)
    sign = 1 - 2 * (np.add.outer(np.arange(SIDE), np.arange(SIDE)) % 2)
    f = np.zeros((SIDE, SIDE, LEVELS), complex)
    f[..., 0] = np.sqrt(1 - density)
    f[..., 1] = np.sqrt(density) * sign
    for _ in range(STEPS):
        k1 = rate(f)
        k2 = rate(f + 0.5 * DT * k1)
        k3 = rate(f + 0.5 * DT * k2)
        k4 = rate(f + DT * k3)
        f = f + DT / 6 * (k1 + 2 * k2 + 2 * k3 + k4)
    print(f"# source: the equations of motion in testdata/gutzwiller_rk4.py, NumPy {np.__version__}")
    print("# generator: testdata/gutzwiller_rk4.py")
    print("# digits: 14 decimals; rounding adds up to about 1e-14")
    names = ["x/1", "y/1"] + [f"{part}{i}/1" for i in range(LEVELS) for part in ("re", "im")]
    print("\t".join(names))
    for row in range(0, SIDE, 4):
        for column in range(0, SIDE, 8):
            values = [f"{v:.14f}" for a in f[row, column] for v in (a.real, a.imag)]
            print("\t".join([str(column), str(row)] + values))


main()
