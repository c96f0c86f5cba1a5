"""Molien series to degree 30 in floats: characteristic polynomials of one element of each class, inverted as power series."""
import numpy as np
from clock import done, timed
from groups import TAU, cartan, classes, close, cycle, orbit, reflections, swap

DEGREE = 30


def doubled(matrices):
    return [np.kron(np.eye(2), m) for m in matrices]


def permutations(perms):
    return [np.eye(len(p))[:, np.argsort(p)] for p in perms]


ACTIONS = [
    (doubled(reflections(cartan((-1, -1), (-2, -1)))), 48),
    (doubled(reflections(cartan((-3, -1)))), 12),
    (doubled(reflections(cartan((-TAU, -TAU), (-1, -1)))), 120),
    (doubled(permutations([swap(5), cycle(5)])), 120),
    (reflections(cartan((-1, -1), (-2, -1), (-1, -1))), 1152),
    (reflections(cartan((-TAU, -TAU), (-1, -1), (-1, -1))), 14400),
]


def molien(matrices):
    n = len(matrices[0])
    generators = orbit(list(np.eye(n)), matrices)
    elements, find = close(generators)
    class_of, count = classes(elements, find, generators)
    # an element's matrix from the images of the basis vectors, the first points of the orbit
    points = [np.eye(n)[i] for i in range(n)]
    key = lambda v: tuple(np.round(v, 9) + 0.0)
    place = {key(v): i for i, v in enumerate(points)}
    i = 0
    while i < len(points):
        for m in matrices:
            w = m @ points[i]
            if key(w) not in place:
                place[key(w)] = len(points)
                points.append(w)
        i += 1
    points = np.array(points)
    _, first = np.unique(class_of, return_index=True)
    size = np.bincount(class_of)
    total = np.zeros(DEGREE + 1)
    for c, f in enumerate(first):
        m = points[elements[f][:n]].T
        p = np.real(np.poly(m))  # det(x - m); reversed: det(1 - t m)
        series = np.zeros(DEGREE + 1)
        for d in range(DEGREE + 1):
            series[d] = (d == 0) - sum(p[j] * series[d - j] for j in range(1, min(n, d) + 1))
        total += size[c] * series
    return len(elements), np.round(total / len(elements)).astype(int)


found = timed('Molien series, six actions', lambda: [molien(m) for m, _ in ACTIONS])
assert [n for n, _ in found] == [n for _, n in ACTIONS], found
done()
