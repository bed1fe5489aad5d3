#!/usr/bin/env python3
"""Writes evolution.tsv: small Bose-Hubbard systems carried through time.

Independent of the library in language and method: the state lives on numbered
particles (places**atoms product states), so no factor sqrt(n) is put in; SciPy's
expm carries it while H is constant, and its DOP853 with a relative tolerance of
1e-13 while H changes. Energies are E/h in Hz, times in seconds.

    /usr/bin/python3 testdata/evolution.py > testdata/evolution.tsv
"""
import itertools
import math

import numpy
import scipy.integrate
import scipy.linalg


def exponential(u):
    return math.expm1(4 * u) / math.expm1(4)


def smooth(u):
    return u**3 * (10 - 15 * u + 6 * u * u)


# name, places, ring, atoms per place, (J, U, V) before, after, duration, shape, hold
SYSTEMS = [
    ("chain in a trap that flips", 5, False, [0, 1, 2, 1, 0], (0.2, 6.0, 0.3), (1.0, -2.5, -0.15), 0.4, smooth, 0.5),
    ("ring of unequal filling", 4, True, [2, 0, 1, 1], (1.0, 3.0, 0.0), (0.6, 9.0, 0.0), 0.25, exponential, 0.8),
]


def parts(places, ring, atoms):
    """Kinetic, interaction and trap matrices for J = U = V = 1."""
    hop = numpy.zeros((places, places))
    for i in range(places - 1 + ring):
        j = (i + 1) % places
        hop[i, j] = hop[j, i] = -1
    x = numpy.arange(places) - (places - 1) / 2
    kinetic = numpy.zeros((places**atoms,) * 2)
    for p in range(atoms):
        kinetic += numpy.kron(numpy.kron(numpy.eye(places**p), hop), numpy.eye(places ** (atoms - p - 1)))
    where = numpy.array(list(itertools.product(range(places), repeat=atoms)))
    meetings = sum((where[:, p] == where[:, q]).astype(float) for p in range(atoms) for q in range(p))
    trap = (x[where] ** 2).sum(1)
    count = numpy.array([(where == i).sum(1) for i in range(places)])
    return kinetic, meetings, trap, count


def start(places, filling):
    """The symmetric state with the given atoms per place."""
    order = [i for i, n in enumerate(filling) for _ in range(n)]
    psi = numpy.zeros((places,) * len(order), complex)
    for where in set(itertools.permutations(order)):
        psi[where] = 1
    psi = psi.ravel()
    return psi / numpy.linalg.norm(psi)


def main():
    print("# source: numbered particles started in a symmetric state; SciPy expm and DOP853")
    print("# generator: evolution.py in this folder, SciPy", scipy.__version__)
    print("# digits: 10")
    print("system/1\ttime/s\tsite/1\toccupation/1\tsquared_occupation/1\tenergy/Hz\tkinetic/Hz")
    for name, places, ring, filling, before, after, duration, shape, hold in SYSTEMS:
        kinetic, meetings, trap, count = parts(places, ring, sum(filling))

        def couplings(t):
            f = shape(min(t / duration, 1))
            return [a + (b - a) * f for a, b in zip(before, after)]

        def rate(t, psi):
            j, u, v = couplings(t)
            return -2j * math.pi * (j * (kinetic @ psi) + (u * meetings + v * trap) * psi)

        def show(t, psi):
            j, u, v = couplings(t)
            weight = abs(psi) ** 2
            k = j * numpy.vdot(psi, kinetic @ psi).real
            energy = k + float(weight @ (u * meetings + v * trap))
            for site in range(places):
                n = count[site]
                print(f"{name}\t{t:.17g}\t{site}\t{weight @ n:.12g}\t{weight @ (n * n):.12g}\t{energy:.12g}\t{k:.12g}")

        psi = start(places, filling)
        begin = 0
        for t in (duration * f for f in (0.375, 0.75, 1.0)):  # no interpolation
            leg = scipy.integrate.solve_ivp(rate, (begin, t), psi, "DOP853", rtol=1e-13, atol=1e-15)
            begin, psi = t, leg.y[:, -1]
            show(t, psi)
        j, u, v = couplings(duration)
        step = scipy.linalg.expm(-2j * math.pi * hold / 2 * (j * kinetic + numpy.diag(u * meetings + v * trap)))
        for half in (1, 2):
            psi = step @ psi
            show(duration + hold * half / 2, psi)


if __name__ == "__main__":
    main()
