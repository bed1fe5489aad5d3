#!/usr/bin/env python3
"""Writes spectra.tsv: both ends of small Bose-Hubbard spectra.

Independent of the library in language and method: N numbered particles, each
with the one-body matrix of the lattice, U where two of them meet, projected on
the symmetric states. No factor sqrt(n) is put in; it comes out. NumPy's eigvalsh
(LAPACK) does the rest.

    python3 testdata/spectra.py > testdata/spectra.tsv
"""
import itertools
import math

import numpy

# name, sites per axis, periodic, atoms, tunnelling, U, curvature, tilt (per axis)
SYSTEMS = [
    ("open chain in a trap with a tilt", [6], [0], 4, [1.0], 4.0, [0.15], [-0.3]),
    ("attractive odd ring", [5], [1], 4, [1.0], -2.1, [0.0], [0.0]),
    ("rectangle with two tunnellings", [2, 3], [0, 0], 4, [1.0, 0.4], 7.5, [0.0, -0.2], [0.0, 0.0]),
    ("cube", [2, 2, 2], [0, 0, 0], 3, [1.0, 1.0, 1.0], -3.0, [0.0, 0.0, 0.0], [0.1, 0.2, -0.4]),
    ("cylinder with J < 0 and an anti-trap", [3, 3], [1, 0], 3, [-1.0, -0.8], -1.3, [-0.25, -0.1], [0.0, 0.0]),
    ("ten atoms on two sites", [2], [0], 10, [1.0], 0.7, [0.0], [0.35]),
]


def one_body(sites, periodic, tunnelling, curvature, tilt):
    """The one-body matrix as a Kronecker sum over the axes, first axis fastest."""
    total = numpy.zeros((1, 1))
    for n, ring, j, v, f in zip(sites, periodic, tunnelling, curvature, tilt):
        axis = numpy.zeros((n, n))
        for i in range(n):
            x = i - (n - 1) / 2
            axis[i, i] = v * x * x + f * x
            if i + 1 < n:
                axis[i, i + 1] = axis[i + 1, i] = -j
        if ring and n > 2:
            axis[0, n - 1] = axis[n - 1, 0] = -j
        total = numpy.kron(axis, numpy.eye(len(total))) + numpy.kron(numpy.eye(n), total)
    return total


def many_body(one, atoms, interaction):
    """H of numbered particles on all places**atoms product states."""
    places = len(one)
    total = numpy.zeros((places**atoms, places**atoms))
    for p in range(atoms):
        left, right = numpy.eye(places**p), numpy.eye(places ** (atoms - p - 1))
        total += numpy.kron(numpy.kron(left, one), right)
    for index, where in enumerate(itertools.product(range(places), repeat=atoms)):
        meetings = sum(where[p] == where[q] for p in range(atoms) for q in range(p))
        total[index, index] += interaction * meetings
    return total


def symmetric(places, atoms):
    """The symmetric states as orthonormal columns."""
    columns = {}
    for index, where in enumerate(itertools.product(range(places), repeat=atoms)):
        columns.setdefault(tuple(sorted(where)), []).append(index)
    matrix = numpy.zeros((places**atoms, len(columns)))
    for column, rows in enumerate(columns.values()):
        matrix[rows, column] = 1 / math.sqrt(len(rows))
    return matrix


def text(numbers):
    return ",".join(f"{x:g}" for x in numbers)


def main():
    print("# source: Bose-Hubbard model with numbered particles projected on the symmetric states, dense diagonalisation")
    print(f"# generator: testdata/spectra.py, NumPy {numpy.__version__} eigvalsh (LAPACK)")
    print("# digits: 12 significant; lists run over the axes; positions count from the centre of each axis")
    print("name/1\tsites/1\tperiodic/1\tatoms/1\ttunnelling/Hz\tinteraction/Hz\tcurvature/Hz\ttilt/Hz\tdimension/1\tlowest/Hz\thighest/Hz")
    for name, sites, periodic, atoms, tunnelling, interaction, curvature, tilt in SYSTEMS:
        one = one_body(sites, periodic, tunnelling, curvature, tilt)
        basis = symmetric(len(one), atoms)
        values = numpy.linalg.eigvalsh(basis.T @ many_body(one, atoms, interaction) @ basis)
        cells = [name, text(sites), text(periodic), str(atoms), text(tunnelling), f"{interaction:g}", text(curvature), text(tilt)]
        print("\t".join(cells + [str(len(values)), f"{values[0]:.14g}", f"{values[-1]:.14g}"]))


if __name__ == "__main__":
    main()
