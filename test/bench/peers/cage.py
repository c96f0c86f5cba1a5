"""Sixty masses at the corners of the truncated icosahedron, with springs: stiffness and generators, with numpy."""
import numpy as np

PHI = (1 + 5 ** 0.5) / 2
FIVE = np.array([[1 / PHI, -PHI, 1], [PHI, 1, 1 / PHI], [-1, 1 / PHI, PHI]]) / 2  # a fifth of a turn
THREE = np.array([[0.0, 0, 1], [1, 0, 0], [0, 1, 0]])
MATRICES = [THREE, np.diag([-1.0, -1, 1]), FIVE, -np.eye(3)]


def orbit(seed):
    key = lambda v: tuple(np.round(v, 6) + 0.0)
    points, place, images = [np.array(seed)], {key(np.array(seed)): 0}, [[] for _ in MATRICES]
    i = 0
    while i < len(points):
        for g, m in enumerate(MATRICES):
            w = m @ points[i]
            if key(w) not in place:
                place[key(w)] = len(points)
                points.append(w)
            images[g].append(place[key(w)])
        i += 1
    return np.array(points), images


def stiffness(points):
    n = len(points)
    k = np.zeros((n, 3, n, 3))
    for s in range(n):
        for t in range(n):
            if s == t:
                continue
            d = points[s] - points[t]
            length = np.linalg.norm(d)
            strength = 1.0 if length < 2.01 else 0.25 if length < 3.5 else 0.0
            if strength == 0:
                continue
            x = strength * np.outer(d, d) / length ** 2
            k[s, :, s, :] += x
            k[s, :, t, :] -= x
    return k.reshape(3 * n, 3 * n)
