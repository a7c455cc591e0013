#!/usr/bin/env python3
# SPDX-License-Identifier: Apache-2.0
# Light in a scattering slab by adding and doubling: the reference that the random walk is tested against.
"""Run it with Python 3.8 or later, nothing else needed; about two minutes:

    python3 slab_adding_doubling.py --check          the solver against closed forms and published values
    python3 slab_adding_doubling.py > slab_fluxes.csv

The slab is plane, its optical thickness counts free paths, its phase function is that of Henyey & Greenstein, its faces are
smooth and reflect by Fresnel's equations; outside is air. Light starts just within the first face, either along the normal or
evenly spread (radiance the same in all directions, as a frosted face sends it in). Shares of its flux: `reflected` leaves by
the first face, `passed` by the second.

Method: van de Hulst 1980, Multiple Light Scattering; with faces, Prahl, van Gemert & Welch 1993, Applied Optics 32(4): 559-568.
A layer so thin that one difference step describes it (Wiscombe 1976, J. Quant. Spectrosc. Radiat. Transfer 16: 477-489), doubled;
the faces are added last. The forward peak is cut off by Wiscombe's delta-M (1977, J. Atmos. Sci. 34: 1408-1422). No random
number, no single path, no code in common with the program.
"""
import math
import sys
from operator import mul

INDICES = (1.0, 1.4, 1.53, 1.63)
ANISOTROPIES = (0.0, 0.6, 0.9)
ALBEDOS = (0.7, 0.9, 0.99, 1.0)
THICKNESSES = (0.625, 1.25, 2.5, 5.0, 10.0, 20.0)  # each twice the one before
ORDER = 24     # directions each within and beyond the critical angle; 32 move no share by more than 2e-5
HALVINGS = 18  # of the least thickness: 2.4e-6 then


# Matrices are lists of rows.
def product(a, b):
    columns = list(zip(*b))
    return [[sum(map(mul, row, column)) for column in columns] for row in a]


def total(a, b, factor=1.0):
    return [[x + factor * y for x, y in zip(p, q)] for p, q in zip(a, b)]


def identity(n):
    return [[float(i == j) for j in range(n)] for i in range(n)]


def solve(a, b):
    """x with a x = b, by elimination with row exchange."""
    n = len(a)
    rows = [list(p) + list(q) for p, q in zip(a, b)]
    for i in range(n):
        best = max(range(i, n), key=lambda k: abs(rows[k][i]))
        rows[i], rows[best] = rows[best], rows[i]
        head = rows[i] = [x / rows[i][i] for x in rows[i]]
        for k in range(n):
            if k != i and rows[k][i] != 0.0:
                factor = rows[k][i]
                rows[k] = [x - factor * y for x, y in zip(rows[k], head)]
    return [row[n:] for row in rows]


def legendre(count, x):
    """P_0 .. P_count at x."""
    p = [1.0, x]
    for k in range(2, count + 1):
        p.append(((2 * k - 1) * x * p[k - 1] - (k - 1) * p[k - 2]) / k)
    return p[:count + 1]


def rule(n, radau):
    """Nodes and weights on [0, 1], by Gauss; or by Radau, whose last node is 1."""
    def value(x):
        p = legendre(n, x)
        return p[n - 1] - p[n] if radau else p[n]

    scan = [-math.cos(math.pi * i / (40 * n)) for i in range(40 * n)]
    nodes = []
    for a, b in zip(scan, scan[1:]):
        if (value(a) < 0.0) != (value(b) < 0.0):
            for _ in range(60):
                c = 0.5 * (a + b)
                a, b = (c, b) if (value(a) < 0.0) == (value(c) < 0.0) else (a, c)
            nodes.append(0.5 * (a + b))
    if radau:
        weights = [(1.0 + x) / (n * legendre(n, x)[n - 1]) ** 2 for x in nodes] + [2.0 / n ** 2]
        nodes.append(1.0)
    else:
        weights = [2.0 * (1.0 - x * x) / (n * legendre(n, x)[n - 1]) ** 2 for x in nodes]
    assert len(nodes) == n
    return [0.5 * (1.0 + x) for x in nodes], [0.5 * w for w in weights]


def directions(index, order):
    """Cosines within the slab with their weights. The reflection at the face bends like a root at the critical angle, so beyond it
    nodes are chosen by the cosine in air, of which it is a smooth function."""
    x, w = rule(order, False)
    edge = math.sqrt(1.0 - 1.0 / index ** 2) if index > 1.0 else 0.3
    cosines, weights = [edge * a for a in x], [edge * a for a in w]
    x, w = rule(order, True)
    for a, b in zip(x, w):
        if index > 1.0:
            cosine = math.sqrt(1.0 - (1.0 - a * a) / index ** 2)
            cosines.append(cosine)
            weights.append(b * a / (index ** 2 * cosine))
        else:
            cosines.append(edge + (1.0 - edge) * a)
            weights.append((1.0 - edge) * b)
    return cosines, weights


def face_reflectance(cosine, index):
    """Fresnel from within, unpolarised."""
    sine2 = index ** 2 * (1.0 - cosine * cosine)
    if sine2 >= 1.0:
        return 1.0
    outside = math.sqrt(1.0 - sine2)
    s = (index * cosine - outside) / (index * cosine + outside)
    p = (index * outside - cosine) / (index * outside + cosine)
    return 0.5 * (s * s + p * p)


def thin_layer(cosines, weights, albedo, g, thickness):
    """Reflection and transmission of radiance by a layer of almost no thickness."""
    n = len(cosines)
    moments = n  # as many as the rules integrate exactly between them
    peak = g ** moments
    thickness *= 1.0 - albedo * peak
    albedo = albedo * (1.0 - peak) / (1.0 - albedo * peak)
    p = [legendre(moments - 1, c) for c in cosines]
    terms = [(2 * k + 1) * (g ** k - peak) / (1.0 - peak) for k in range(moments)]
    signs = [(-1) ** k for k in range(moments)]
    onward = [[sum(t * a * b for t, a, b in zip(terms, p[i], p[j])) for j in range(n)] for i in range(n)]
    back = [[sum(t * s * a * b for t, s, a, b in zip(terms, signs, p[i], p[j])) for j in range(n)] for i in range(n)]
    for i in range(n):  # what is scattered is neither more nor less than all: mended in the forward direction
        missing = 2.0 - sum(w * (x + y) for w, x, y in zip(weights, onward[i], back[i]))
        onward[i][i] += missing / weights[i]
    a = [[0.5 * thickness / cosines[i] * ((i == j) - 0.5 * albedo * onward[i][j] * weights[j]) for j in range(n)] for i in range(n)]
    b = [[0.5 * thickness / cosines[i] * 0.5 * albedo * back[i][j] * weights[j] for j in range(n)] for i in range(n)]
    one = identity(n)
    straight = total(one, a)
    inner = solve(straight, b)
    g_matrix = solve(total(straight, product(b, inner), -1.0), one)
    reflection = [[2.0 * x for x in row] for row in product(inner, g_matrix)]
    transmission = total([[2.0 * x for x in row] for row in g_matrix], one, -1.0)
    return reflection, transmission


def doubled(r, t):
    """Two equal layers, one on the other."""
    between = solve(total(identity(len(r)), product(r, r), -1.0), t)
    return total(r, product(t, product(r, between))), product(t, between)


def with_faces(r, t, faces, start):
    """Radiance up at the first face and down at the second, where light of radiance `start` goes down from the first."""
    n = len(r)
    one = identity(n)
    reflected = [[x * f for x, f in zip(row, faces)] for row in r]             # r F
    down = solve(total(one, reflected, -1.0), t)                               # at the second face, of what goes down at the first
    k = total(r, product([[x * f for x, f in zip(row, faces)] for row in t], down))
    echo = [[f * x for x in row] for f, row in zip(faces, k)]
    first = solve(total(one, echo, -1.0), [[s] for s in start])
    return [x[0] for x in product(k, first)], [x[0] for x in product(down, first)]


def slabs(index, g, albedo, order=ORDER, thicknesses=THICKNESSES):
    """(thickness, entry, reflected, passed) for thicknesses that double from one to the next."""
    cosines, weights = directions(index, order)
    faces = [face_reflectance(c, index) for c in cosines]
    r, t = thin_layer(cosines, weights, albedo, g, thicknesses[0] / 2 ** HALVINGS)
    for _ in range(HALVINGS):
        r, t = doubled(r, t)
    for thickness in thicknesses:
        if thickness != thicknesses[0]:
            r, t = doubled(r, t)
        for entry in ("normal", "spread"):
            start = [1.0] * len(cosines) if entry == "spread" else [float(c == 1.0) for c in cosines]
            up, down = with_faces(r, t, faces, start)
            entered = sum(c * w * s for c, w, s in zip(cosines, weights, start))
            out = [sum(c * w * (1.0 - f) * x for c, w, f, x in zip(cosines, weights, faces, side)) / entered for side in (up, down)]
            yield thickness, entry, out[0], out[1]


def main():
    print("index,anisotropy,albedo,thickness,entry,reflected,passed")
    for index in INDICES:
        for g in ANISOTROPIES:
            for albedo in ALBEDOS:
                for thickness, entry, reflected, passed in slabs(index, g, albedo):
                    print(f"{index:g},{g:g},{albedo:g},{thickness:g},{entry},{reflected:.6f},{passed:.6f}")
                sys.stdout.flush()


if __name__ == "__main__":
    if sys.argv[1:] == ["--check"]:
        sys.dont_write_bytecode = True
        from slab_closed_forms import check
        sys.exit(check())
    main()
