#!/usr/bin/env python3
"""Writes canonical.tsv: canonical averages of small Bose-Hubbard systems.

Independent of the library in language and method: N numbered particles on an open
or closed chain, one-body operators of each of them added up, U where two of them
meet, projected on the symmetric states. NumPy's eigh (LAPACK) does the rest.

    python3 testdata/canonical.py > testdata/canonical.tsv
"""
import itertools
import math

import numpy

# name, sites, periodic, atoms, tunnelling, U, curvature, tilt
SYSTEMS = [
    ("attractive open chain on an anti-trap", 5, 0, 4, 1.0, -2.1, -0.15, 0.0),
    ("repulsive open chain in a trap", 5, 0, 4, 1.0, 4.0, 0.15, 0.0),
    ("attractive even ring", 4, 1, 5, 1.0, -2.1, 0.0, 0.0),
    ("frustrated triangle", 3, 1, 5, 1.0, -2.1, 0.0, 0.0),
    ("tilted chain with J < 0", 4, 0, 4, -0.7, 1.3, 0.0, 0.4),
    ("two sites", 2, 0, 7, 1.0, 0.6, 0.0, 0.35),
]
BETAS = [-3.0, -0.4, -0.01, 0.0, 0.2, 1.5]


def chain(sites, periodic, tunnelling, curvature, tilt):
    one = numpy.zeros((sites, sites))
    for i in range(sites):
        x = i - (sites - 1) / 2
        one[i, i] = curvature * x * x + tilt * x
        if i + 1 < sites:
            one[i, i + 1] = one[i + 1, i] = -tunnelling
    if periodic and sites > 2:
        one[0, sites - 1] = one[sites - 1, 0] = -tunnelling
    return one


def added(one, atoms):
    """The sum over numbered particles of a one-body operator."""
    places = len(one)
    total = numpy.zeros((places**atoms, places**atoms))
    for p in range(atoms):
        left, right = numpy.eye(places**p), numpy.eye(places ** (atoms - p - 1))
        total += numpy.kron(numpy.kron(left, one), right)
    return total


def symmetric(places, atoms):
    columns = {}
    for index, where in enumerate(itertools.product(range(places), repeat=atoms)):
        columns.setdefault(tuple(sorted(where)), []).append(index)
    matrix = numpy.zeros((places**atoms, len(columns)))
    for column, rows in enumerate(columns.values()):
        matrix[rows, column] = 1 / math.sqrt(len(rows))
    return matrix


def meetings(places, atoms):
    where = numpy.array(list(itertools.product(range(places), repeat=atoms)))
    return sum((where[:, p] == where[:, q]).astype(float) for p in range(atoms) for q in range(p))


def main():
    print("# source: Bose-Hubbard model with numbered particles projected on the symmetric states, dense diagonalisation")
    print(f"# generator: testdata/canonical.py, NumPy {numpy.__version__} eigh (LAPACK)")
    print("# digits: 12 significant; occupation and its square on the first site, correlation of the first two sites")
    print("name/1\tsites/1\tperiodic/1\tatoms/1\ttunnelling/Hz\tinteraction/Hz\tcurvature/Hz\ttilt/Hz\tbeta/Hz-1"
          "\tenergy/Hz\tentropy/kB\tvariance/Hz2\toccupation/1\tsquare/1\tcorrelation/1")
    for name, sites, periodic, atoms, tunnelling, interaction, curvature, tilt in SYSTEMS:
        basis = symmetric(sites, atoms)
        h = added(chain(sites, periodic, tunnelling, curvature, tilt), atoms) + numpy.diag(interaction * meetings(sites, atoms))
        values, vectors = numpy.linalg.eigh(basis.T @ h @ basis)
        states = basis @ vectors
        first, hop = numpy.zeros((sites, sites)), numpy.zeros((sites, sites))
        first[0, 0], hop[0, 1] = 1, 1
        n, b = added(first, atoms), added(hop, atoms)
        per_state = [numpy.einsum("ik,ik->k", states, operator @ states) for operator in (n, n @ n, b)]
        for beta in BETAS:
            weight = numpy.exp(-beta * (values - (values[0] if beta >= 0 else values[-1])))
            z = weight.sum()
            p = weight / z
            energy = p @ values
            entropy = -(p[p > 0] * numpy.log(p[p > 0])).sum()
            row = [energy, entropy, p @ (values - energy) ** 2] + [p @ o for o in per_state]
            cells = [name, str(sites), str(periodic), str(atoms), f"{tunnelling:g}", f"{interaction:g}", f"{curvature:g}", f"{tilt:g}", f"{beta:g}"]
            print("\t".join(cells + [f"{x:.14g}" for x in row]))


main()
