"""Band edges of the sinusoidal lattice as characteristic values of Mathieu's equation.

With Q = s/4 and energies in Er (DLMF section 28.2):
  bottom of band 0: s/2 + a0   top of band 0: s/2 + b1
  bottom of band 1: s/2 + a1   top of band 1: s/2 + b2   bottom of band 2: s/2 + a2

SciPy's values are compared with the eigenvalues of the recurrences of DLMF 28.4
(80 terms); the script stops if the two differ by more than half of the last digit.

Run: /usr/bin/python3 mathieu.py > mathieu.tsv   (needs python3-numpy, python3-scipy)
"""
import sys

import numpy as np
import scipy
from scipy.special import mathieu_a, mathieu_b

DEPTHS = [0.01, 0.1, 0.5, 1, 2, 3, 5, 6.1, 8, 10, 15, 20, 22, 30, 40, 50, 75, 100, 150, 200, 250, 300, 350, 400]
DECIMALS = 12
NAMES = ["a0", "b1", "a1", "b2", "a2"]


def recurrence(first, shift, scale, q, terms=80):
    """Eigenvalues for the wave numbers first, first+2, ..."""
    matrix = np.diag((first + 2.0 * np.arange(terms)) ** 2) + q * (np.eye(terms, k=1) + np.eye(terms, k=-1))
    matrix[0, 0] += shift
    matrix[0, 1] *= scale
    matrix[1, 0] *= scale
    return np.linalg.eigvalsh(matrix)


def dense(q):
    even = recurrence(0, 0, np.sqrt(2), q)
    return [even[0], recurrence(1, -q, 1, q)[0], recurrence(1, q, 1, q)[0], recurrence(2, 0, 1, q)[0], even[1]]


def main():
    lines, worst = [], 0.0
    for s in DEPTHS:
        q = s / 4
        values = [mathieu_a(0, q), mathieu_b(1, q), mathieu_a(1, q), mathieu_b(2, q), mathieu_a(2, q)]
        worst = max(worst, *(abs(v - d) for v, d in zip(values, dense(q))))
        lines.append("\t".join([f"{s:g}"] + [f"{v:.{DECIMALS}f}" for v in values]))
    if worst > 0.5 * 10.0**-DECIMALS:
        sys.exit(f"SciPy and the recurrences differ by {worst:.1e}")
    print(f"# source: characteristic values of Mathieu's equation, DLMF 28.2, at Q = s/4 (SciPy {scipy.__version__})")
    print("# generator: testdata/mathieu.py")
    print(f"# digits: {DECIMALS} decimals; SciPy and the recurrences of DLMF 28.4 (NumPy {np.__version__}) agree to {worst:.1e}")
    print("\t".join(["s/Er"] + [n + "/1" for n in NAMES]))
    print("\n".join(lines))


main()
