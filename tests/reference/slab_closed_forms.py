# SPDX-License-Identifier: Apache-2.0
# What slab_adding_doubling.py must give where the answer is known: closed forms, exact limits, published values.
"""python3 slab_adding_doubling.py --check prints one line a check and exits 1 if any fails."""
import math

from slab_adding_doubling import ORDER, directions, face_reflectance, rule, slabs


def one(index, g, albedo, thickness, entry, order=ORDER):
    """Shares of a single slab."""
    for _, name, reflected, passed in slabs(index, g, albedo, order, (thickness,)):
        if name == entry:
            return reflected, passed


def deep(index, g, albedo, entry):
    """Reflected share of a body without end: 160 free paths."""
    return [r for t, name, r, _ in slabs(index, g, albedo, ORDER, (2.5, 5.0, 10.0, 20.0, 40.0, 80.0, 160.0)) if name == entry][-1]


def integral(f, steps=20000):
    """Over [0, 1], by the midpoint rule."""
    return sum(f((i + 0.5) / steps) for i in range(steps)) / steps


def h_function(albedo):
    """Chandrasekhar 1950, Radiative Transfer, chapter 5: H of isotropic scattering, as a function of the cosine, by iteration of
    1 / H(m) = sqrt(1 - a) + a / 2 integral of x H(x) / (x + m)."""
    x, w = rule(64, False)
    h = [1.0] * len(x)

    def at(m):
        return 1.0 / (math.sqrt(1.0 - albedo) + 0.5 * albedo * sum(b * a * c / (a + m) for a, b, c in zip(x, w, h)))

    for _ in range(400):
        h = [at(m) for m in x]
    return at, x, w, h


def walsh(n):
    """Reflectance of a smooth face for even light from air: Walsh 1926, in the form of Duntley 1942, J. Opt. Soc. Am. 32: 61-70."""
    q = n * n
    return (0.5 + (n - 1) * (3 * n + 1) / (6 * (n + 1) ** 2) + q * (q - 1) ** 2 / (q + 1) ** 3 * math.log((n - 1) / (n + 1))
            - 2 * n ** 3 * (q + 2 * n - 1) / ((q + 1) * (q * q - 1)) + 8 * q * q * (q * q + 1) / ((q + 1) * (q * q - 1) ** 2) * math.log(n))


def checks():
    """(what, found, wanted, tolerance)."""
    for n in (1.0, 1.53, 1.63):  # no scattering: echoes between the faces sum to a geometric series
        def series(m, thickness, n=n):
            f, e = face_reflectance(m, n), math.exp(-thickness / m)
            return f * e * e * (1 - f) / (1 - (f * e) ** 2), e * (1 - f) / (1 - (f * e) ** 2)
        found = one(n, 0.6, 0.0, 1.25, "normal")
        yield from ((f"no scattering, normal, n {n}: {k}", x, y, 1e-7)
                    for k, x, y in zip(("reflected", "passed"), found, series(1.0, 1.25)))
        found = one(n, 0.6, 0.0, 1.25, "spread")
        for k in (0, 1):
            wanted = integral(lambda m, k=k: 2 * m * series(m, 1.25)[k])
            yield f"no scattering, spread, n {n}: {('reflected', 'passed')[k]}", found[k], wanted, 2e-6
    for n in (1.0, 1.4, 1.63):
        for g in (0.0, 0.6, 0.9):
            for entry in ("normal", "spread"):
                yield f"no absorption, {entry}, n {n}, g {g}: all", sum(one(n, g, 1.0, 5.0, entry)), 1.0, 1e-8
    for n in (1.4, 1.53, 1.63):  # what goes in by a face from air comes out by it, but for the squared index
        c, w = directions(n, ORDER)
        inside = sum(2 * a * b * face_reflectance(a, n) for a, b in zip(c, w))
        yield f"face from within, even light, n {n}", inside, 1 - (1 - walsh(n)) / (n * n), 1e-7
    # Milne's problem: even light passes a deep slab as 4/3 / (thickness + twice the extrapolated length), isotropic, no absorption.
    yield "deep slab without absorption", one(1.0, 0.0, 1.0, 20.0, "spread")[1], 4 / 3 / (20 + 2 * 0.7104460896), 1e-7
    for g in (0.6, 0.9):  # diffusion: each free path adds 3/4 (1 - g) to 1 / passed
        thick = {t: p for t, name, _, p in slabs(1.0, g, 1.0, ORDER, (20.0, 40.0, 80.0)) if name == "spread"}
        yield f"diffusion without absorption, g {g}", (1 / thick[80.0] - 1 / thick[40.0]) / 40, 0.75 * (1 - g), 1e-6
    for albedo in (0.7, 0.9, 0.99):
        at, x, w, h = h_function(albedo)
        loss = math.sqrt(1 - albedo)
        yield f"deep isotropic body, normal, albedo {albedo}", deep(1.0, 0.0, albedo, "normal"), 1 - loss * at(1.0), 1e-6
        even = 1 - 2 * loss * sum(a * b * c for a, b, c in zip(x, w, h))
        yield f"deep isotropic body, spread, albedo {albedo}", deep(1.0, 0.0, albedo, "spread"), even, 1e-6
    # van de Hulst 1980, vol. 2, and Giovanelli 1955, Optica Acta 2: 153-162 (with the 4 % of the outer face), both as quoted in
    # Wang, Jacques & Zheng 1995, Computer Methods and Programs in Biomedicine 47: 131-146.
    found = one(1.0, 0.75, 0.9, 2.0, "normal")
    yield "van de Hulst: reflected", found[0], 0.09739, 1e-5
    yield "van de Hulst: passed", found[1], 0.66096, 1e-5
    yield "Giovanelli: reflected", 0.04 + 0.96 * deep(1.5, 0.0, 0.9, "normal"), 0.2600, 1e-4
    for n in (1.0, 1.53):  # finer directions
        for g in (0.6, 0.9):
            for entry in ("normal", "spread"):
                for k, (x, y) in enumerate(zip(one(n, g, 0.99, 0.625, entry), one(n, g, 0.99, 0.625, entry, 32))):
                    yield f"finer directions, {entry}, n {n}, g {g}: {('reflected', 'passed')[k]}", x, y, 2e-5


def check():
    failed = 0
    for what, found, wanted, tolerance in checks():
        good = abs(found - wanted) <= tolerance
        failed += not good
        print(f"{'ok  ' if good else 'FAIL'} {what}: {found:.8f}, wanted {wanted:.8f} within {tolerance:g}")
    return 1 if failed else 0
