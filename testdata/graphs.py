#!/usr/bin/env python3
"""Writes graphs.tsv: both ends of Bose-Hubbard spectra on other graphs than boxes.

Bonds are not listed but found: two sites are joined if they, or images of them on
a periodic patch, are one site apart, and the direction of the line between them
says which tunnelling joins them. The rest is that of spectra.py: numbered
particles, projected on the symmetric states, NumPy's eigvalsh (LAPACK).

    python3 testdata/graphs.py > testdata/graphs.tsv
"""
import math

import numpy

from spectra import many_body, symmetric, text

ROOT3 = math.sqrt(3)
# vectors of the cell, sites in it, angle in degrees of the bonds of each axis
SHAPES = {
    "chain": ([(1, 0)], [(0, 0)], [0]),
    "ladder": ([(1, 0), (0, 1)], [(0, 0)], [0, 90]),
    "square": ([(1, 0), (0, 1)], [(0, 0)], [0, 90]),
    "triangular": ([(1, 0), (0.5, ROOT3 / 2)], [(0, 0)], [0, 60, 120]),
    "honeycomb": ([(ROOT3, 0), (ROOT3 / 2, 1.5)], [(0, 0), (ROOT3 / 2, 0.5)], [30, 150, 90]),
    "kagome": ([(2, 0), (1, ROOT3)], [(0, 0), (1, 0), (0.5, ROOT3 / 2)], [0, 60, 120]),
}

# name, kind, cells, periodic, atoms, tunnelling by axis, second-neighbour tunnelling
# by axis, U, curvature and tilt by axis, most atoms on a site (0: no limit)
SYSTEMS = [
    ("ladder with weak rungs", "ladder", [3, 2], 0, 4, [1, 0.5], [0, 0], -2, [-0.1, 0], [0, 0], 0),
    ("closed ladder with J < 0 on the rungs", "ladder", [4, 2], 1, 3, [1, -0.7], [0, 0], 3, [0, 0], [0, 0.3], 0),
    ("triangular patch in an anti-trap", "triangular", [3, 2], 0, 4, [1, 1, 1], [0, 0, 0], -2.1, [-0.1, -0.1, 0], [0, 0, 0], 0),
    ("triangular torus", "triangular", [3, 3], 1, 3, [1, 1, 1], [0, 0, 0], 4, [0, 0, 0], [0, 0, 0], 0),
    ("frustrated triangular torus", "triangular", [3, 3], 1, 3, [-1, -1, -1], [0, 0, 0], 4, [0, 0, 0], [0, 0, 0], 0),
    ("three tunnellings, tilted", "triangular", [2, 3], 0, 4, [1, 0.6, -0.3], [0, 0, 0], 1.5, [0.1, 0.2, 0], [0.2, -0.1, 0], 0),
    ("honeycomb patch", "honeycomb", [2, 2], 0, 3, [1, 1, 1], [0, 0, 0], -3, [-0.2, -0.1, 0], [0, 0, 0], 0),
    ("honeycomb torus", "honeycomb", [2, 2], 1, 3, [1, 0.8, 1.2], [0, 0, 0], 2.5, [0, 0, 0], [0, 0, 0], 0),
    ("kagome patch in a trap", "kagome", [1, 2], 0, 4, [1, 1, 1], [0, 0, 0], 2, [0.1, 0.1, 0], [0, 0, 0], 0),
    ("kagome torus", "kagome", [2, 2], 1, 3, [1, 1, 1], [0, 0, 0], -2, [0, 0, 0], [0, 0, 0], 0),
    ("chain with a second neighbour", "chain", [6], 0, 4, [1], [-0.2], 4, [-0.1], [0], 0),
    ("ring with a second neighbour", "chain", [6], 1, 4, [1], [-0.2], -2, [0], [0], 0),
    ("chain with at most two on a site", "chain", [6], 0, 4, [1], [0], 1, [0.1], [0], 2),
    ("hard-core ring", "chain", [7], 1, 4, [1], [0], 0, [0], [0], 1),
    ("triangular with at most two", "triangular", [2, 3], 0, 4, [1, 1, 1], [0, 0, 0], -1, [0, 0, 0], [0, 0, 0], 2),
    ("two chains side by side", "square", [3, 2], 0, 4, [1, 0], [0, 0], -2, [-0.1, 0.3], [0, 0.05], 0),
]


def positions(kind, cells):
    """Sites cell by cell, the first vector fastest."""
    vectors, sites, _ = SHAPES[kind]
    counts = list(cells) + [1] * (2 - len(cells))
    vectors = list(vectors) + [(0, 0)] * (2 - len(vectors))
    return numpy.array([
        [i * vectors[0][a] + j * vectors[1][a] + s[a] for a in range(2)]
        for j in range(counts[1]) for i in range(counts[0]) for s in sites
    ], dtype=float)


def images(kind, cells, periodic):
    """Displacements to the patch itself and to its images."""
    vectors, _, _ = SHAPES[kind]
    closed = [bool(periodic)] * len(vectors)
    if kind == "ladder":
        closed[1] = False
    shifts = [numpy.zeros(2)]
    for vector, n, ring in zip(vectors, cells, closed):
        if ring:
            shifts = [s + k * n * numpy.array(vector, dtype=float) for s in shifts for k in (-1, 0, 1)]
    return shifts


def one_body(kind, cells, periodic, tunnelling, second, curvature, tilt):
    where = positions(kind, cells)
    angles = SHAPES[kind][2]
    total = numpy.zeros((len(where), len(where)))
    for length, amplitudes in ((1, tunnelling), (2, second)):
        for a in range(len(where)):
            for b in range(a):
                for shift in images(kind, cells, periodic):
                    line = where[a] - where[b] + shift
                    if abs(numpy.hypot(*line) - length) > 1e-9:
                        continue
                    angle = math.degrees(math.atan2(line[1], line[0])) % 180
                    for axis, wanted in enumerate(angles):
                        if amplitudes[axis] and min(abs(angle - wanted), 180 - abs(angle - wanted)) < 1e-6:
                            total[a, b] = total[b, a] = -amplitudes[axis]
    centred = where - where.mean(axis=0)
    for axis in range(2):
        if axis < len(curvature):
            x = centred[:, axis]
            total += numpy.diag(curvature[axis] * x * x + tilt[axis] * x)
    return total


def allowed(places, atoms, most):
    """The symmetric states with at most so many particles in one place."""
    matrix = symmetric(places, atoms)
    if most == 0:
        return matrix
    keep = []
    for column in range(matrix.shape[1]):
        index = int(numpy.nonzero(matrix[:, column])[0][0])
        where = [index // places**p % places for p in range(atoms)]
        if max(where.count(i) for i in range(places)) <= most:
            keep.append(column)
    return matrix[:, keep]


def main():
    print("# source: Bose-Hubbard model with numbered particles projected on the symmetric states, dense diagonalisation")
    print(f"# generator: testdata/graphs.py, NumPy {numpy.__version__} eigvalsh (LAPACK)")
    print("# digits: 12 significant; lists run over the axes; positions count from their mean; neighbours are one site apart")
    print("name/1\tkind/1\tcells/1\tperiodic/1\tatoms/1\ttunnelling/Hz\tsecond/Hz\tinteraction/Hz\tcurvature/Hz\ttilt/Hz\tmost/1\tdimension/1\tlowest/Hz\thighest/Hz")
    for name, kind, cells, periodic, atoms, tunnelling, second, interaction, curvature, tilt, most in SYSTEMS:
        one = one_body(kind, cells, periodic, tunnelling, second, curvature, tilt)
        basis = allowed(len(one), atoms, most)
        values = numpy.linalg.eigvalsh(basis.T @ many_body(one, atoms, interaction) @ basis)
        cells_of_row = [name, kind, text(cells), str(periodic), str(atoms), text(tunnelling), text(second), f"{interaction:g}",
                        text(curvature), text(tilt), str(most)]
        print("\t".join(cells_of_row + [str(len(values)), f"{values[0]:.14g}", f"{values[-1]:.14g}"]))


main()
