"""Finite groups by permutations: Coxeter groups on their roots, and a few small ones, with numpy only."""
import numpy as np

TAU = (1 + 5 ** 0.5) / 2


def cartan(*bonds):
    n = len(bonds) + 1
    a = 2 * np.eye(n)
    for i, (up, down) in enumerate(bonds):
        a[i, i + 1], a[i + 1, i] = up, down
    return a


def reflections(a):
    """Simple reflections in the basis of simple roots."""
    n = len(a)
    out = []
    for i in range(n):
        m = np.eye(n)
        m[i] -= a[i]
        out.append(m)
    return out


def orbit(vectors, matrices):
    """Permutations of the orbit of the vectors; coordinates are compared to nine digits."""
    key = lambda v: tuple(np.round(v, 9) + 0.0)
    points, place = [], {}
    for v in vectors:
        if key(v) not in place:
            place[key(v)] = len(points)
            points.append(v)
    images = [[] for _ in matrices]
    i = 0
    while i < len(points):
        for g, m in enumerate(matrices):
            w = m @ points[i]
            k = key(w)
            if k not in place:
                place[k] = len(points)
                points.append(w)
            images[g].append(place[k])
        i += 1
    return [np.array(p) for p in images]


def coxeter(*bonds):
    m = reflections(cartan(*bonds))
    return orbit(list(np.eye(len(m))), m)


def close(generators):
    """All elements as rows, level by level, with the numbers of the rows by a random hash."""
    generators = np.array(generators)
    weights = np.random.default_rng(0).integers(1, 1 << 40, generators.shape[1])
    elements = np.arange(generators.shape[1])[None, :]
    hashes = elements @ weights
    front = elements
    while len(front):
        new = np.concatenate([g[front] for g in generators])
        h, first = np.unique(new @ weights, return_index=True)
        fresh = ~np.isin(h, hashes)
        front = new[first[fresh]]
        hashes = np.concatenate([hashes, h[fresh]])
        elements = np.concatenate([elements, front])
    order = np.argsort(hashes)
    ordered = hashes[order]

    def find(rows):
        return order[np.searchsorted(ordered, rows @ weights)]

    return elements, find


def classes(elements, find, generators):
    """Number of the class of each element."""
    n = len(elements)
    conjugates = []
    for g in generators:
        conjugates.append(find(g[elements[:, np.argsort(g)]]))
    class_of = np.arange(n)
    while True:
        before = class_of.copy()
        for c in conjugates:
            np.minimum.at(class_of, c, class_of.copy())
            class_of = np.minimum(class_of, class_of[c])
        if (before == class_of).all():
            break
    _, class_of = np.unique(class_of, return_inverse=True)
    return class_of, class_of.max() + 1


def table(generators):
    """Complex character table by simultaneous eigenvectors of a random class sum (W. Burnside's class algebra)."""
    elements, find = close(generators)
    class_of, count = classes(elements, find, generators)
    n = len(elements)
    _, first = np.unique(class_of, return_index=True)
    size = np.bincount(class_of)
    inverses = np.argsort(elements, axis=1)
    inverse = class_of[find(inverses[first])]
    weights = np.random.default_rng(1).normal(size=count)
    a = np.zeros((count, count))
    for k in range(count):
        # for every x: the class of x^-1 z
        y = class_of[find(inverses[:, elements[first[k]]])]
        np.add.at(a[:, k], y, weights[class_of])
    _, vectors = np.linalg.eig(a)
    rows = []
    for v in vectors.T:
        v = v / v[class_of[0]]
        degree = np.sqrt(n / np.real(np.sum(v * v[inverse] / size)))
        rows.append(degree * v / size)
    return np.array(rows), n


cycle = lambda n: np.roll(np.arange(n), -1)
swap = lambda n: np.array([1, 0, *range(2, n)])
turn = np.array([[0, -1], [1, 0]])
mirror = np.array([[1, 0], [0, -1]])


def matrix_orbit(matrices):
    return orbit(list(np.eye(len(matrices[0]))), matrices)


def kron_both(m):
    return [np.kron(m, np.eye(2)), np.kron(np.eye(2), m)]


LEFT = [np.kron(np.eye(2), turn), np.kron(turn, mirror)]
GROUPS = {
    'H4': lambda: coxeter((-TAU, -TAU), (-1, -1), (-1, -1)),
    'S5': lambda: [swap(5), cycle(5)],
    'S6': lambda: [swap(6), cycle(6)],
    'O_h': lambda: coxeter((-1, -1), (-2, -1)),
    'I_h': lambda: coxeter((-TAU, -TAU), (-1, -1)),
    'F4': lambda: coxeter((-1, -1), (-2, -1), (-1, -1)),
    'D100': lambda: [cycle(100), (-np.arange(100)) % 100],
    '2+': lambda: matrix_orbit([*kron_both(turn), *kron_both(mirror)]),
    '2-': lambda: matrix_orbit([*[np.kron(m, np.eye(4)) for m in (turn, mirror)], *[np.kron(np.eye(2), m) for m in LEFT]]),
}
