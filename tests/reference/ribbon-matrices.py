"""Levels of continuum ribbons by dense diagonalisation: reads jobs as JSON, prints their levels.

An independent writing-down of the staggered matrices: sites are enumerated with their positions, components and bonds,
and the Hermitian matrix is filled from them; LAPACK does the rest. Only numpy and scipy are used.
"""
import json
import sys

import numpy as np
from scipy.linalg import eigvalsh

HBAR_OVER_E = 6.62607015e-34 / (2 * np.pi) / 1.602176634e-19 * 1e18  # T nm^2


def profile(definition):
    kind = definition["kind"]
    if kind == "none":
        return lambda u: 0.0
    if kind == "polynomial":
        return lambda u: sum(c * u**n for n, c in enumerate(definition["coefficients"]))
    if kind == "sine":
        return lambda u: definition["amplitude"] * np.sin(2 * np.pi * u / definition["periodNm"] + definition["phase"])
    raise ValueError(kind)


def flux(definition, field):
    """Integral of the whole field from 0 to u."""
    kind = definition["kind"]
    if kind == "none":
        return lambda u: field * u
    if kind == "polynomial":
        return lambda u: field * u + sum(c * u ** (n + 1) / (n + 1) for n, c in enumerate(definition["coefficients"]))
    wave, phase, size = 2 * np.pi / definition["periodNm"], definition["phase"], definition["amplitude"]
    return lambda u: field * u + size * (np.cos(phase) - np.cos(wave * u + phase)) / wave


def matrix(job, k, tau, cells):
    edge, hv = job["edge"], job["diracVelocityEvNm"]
    kind, width = edge["kind"], job["widthNm"]
    v, m, odd, a = (profile(job[name]) for name in ("potentialEv", "massEv", "valleyMassEv", "gaugePerNm"))
    turn = flux(job["fieldProfileT"], job["fieldT"])
    phase = 0.0
    if kind == "zigzag":
        h = width / (cells + 0.5)
        names = ["B", "A"] * cells
        places = [(i + 1) * h / 2 for i in range(2 * cells)]
    elif kind == "infinite-mass":
        domain = edge["lowerSign"] != edge["upperSign"]
        h = width / (cells if domain else cells + 0.5)
        count = 2 * cells - (1 if domain else 0)
        first = ["S", "D"] if edge["lowerSign"] > 0 else ["D", "S"]
        names = [first[i % 2] for i in range(count)]
        places = [(i + 1) * h / 2 for i in range(count)]
    elif kind == "periodic":
        h = width / cells
        names = ["A", "B"] * cells
        places = [i * h / 2 for i in range(2 * cells)]
        phase = edge["blochPhaseRad"]
    else:
        h = 2 * width / cells
        names = ["A", "B"] * cells
        places = [-width + i * h / 2 for i in range(2 * cells)]
        phase = -2 * (4 * np.pi / (3 * np.sqrt(3) * job["bondLengthNm"])) * width

    def fold(x):
        return abs(x) - width / 2, (1.0 if x > 0 else -1.0 if x < 0 else 0.0)

    def momentum(x):
        u, side = fold(x)
        if kind == "armchair":
            return k + turn(u) / HBAR_OVER_E + side * a(u)
        return tau * (k - turn(u) / HBAR_OVER_E) + a(u)

    def masses(x):
        u, side = fold(x)
        if kind == "armchair":
            at_mirror = abs(abs(x) - width) < 1e-9 or abs(x) < 1e-9
            return m(u) + (0.0 if at_mirror else side * odd(u))
        return m(u) + tau * odd(u)

    n = len(names)
    hamiltonian = np.zeros((n, n), complex)
    for i in range(n):
        u = fold(places[i])[0]
        if kind == "infinite-mass":
            hamiltonian[i, i] = v(u) + (1 if names[i] == "S" else -1) * hv * momentum(places[i])
        else:
            hamiltonian[i, i] = v(u) + (1 if names[i] == "A" else -1) * masses(places[i])
    rings = kind in ("periodic", "armchair")
    for i in range(n if rings else n - 1):
        j = (i + 1) % n
        middle = places[i] + h / 4
        lower = names[i]
        if kind == "infinite-mass":
            # E S = hv (d/dy + mu) D
            value = hv * ((1 if lower == "S" else -1) / h + masses(middle) / hv / 2)
        elif kind == "armchair":
            # E A = hv (d/dx + Q) chi
            value = hv * ((1 if lower == "A" else -1) / h + momentum(middle) / 2)
        else:
            # E A = hv (Q - d/dy) B
            value = hv * ((-1 if lower == "A" else 1) / h + momentum(middle) / 2)
        # the site after the last one is the first one times the phase over the ring
        twist = np.exp(1j * phase) if j == 0 else 1.0
        hamiltonian[i, j] += value * twist
        hamiltonian[j, i] += value * np.conj(twist)
    return hamiltonian


def levels(job, k, tau):
    if job["grid"]["kind"] == "single":
        return eigvalsh(matrix(job, k, tau, job["grid"]["cells"]))
    raise ValueError("single grids only")


def main():
    jobs = json.load(sys.stdin)
    answer = []
    for job in jobs:
        rows = []
        for tau in job["valleySigns"]:
            for k in job["waveNumbers"]:
                every = levels(job, k, tau)
                order = np.argsort(np.abs(every - job["energyEv"]), kind="stable")
                rows.append(sorted(every[order[: job["count"]]].tolist()))
        answer.append(rows)
    json.dump(answer, sys.stdout)


main()
