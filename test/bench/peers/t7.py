"""Stability types of 10 000 Hamiltonian 12 x 12 matrices of a ring of six; typical: one after the other, best: closed formulas."""
import sys

import numpy as np
from clock import done, timed

COUNT = 10_000
rng = np.random.default_rng(1)
k = np.arange(6)
away = np.minimum(np.abs(k[:, None] - k), 6 - np.abs(k[:, None] - k))
# S = [[A, B], [Bᵀ, C]] with circulant symmetric A, B, C
a, b, c = (rng.normal(size=(COUNT, 4))[:, away] for _ in range(3))
l = np.concatenate([np.concatenate([b, c], axis=2), np.concatenate([-a, -b], axis=2)], axis=1)
basis = np.array([np.ones(6), np.cos(np.pi * k / 3), np.cos(2 * np.pi * k / 3), (-1.0) ** k])
basis /= np.linalg.norm(basis, axis=1)[:, None]


def loop():
    out = []
    for m in l:
        w = np.linalg.eigvals(m)
        scale = np.abs(w).max()
        out.append([int((np.abs(w) < 1e-7 * scale).sum()), int((np.abs(w.real) < 1e-7 * scale).sum())])
    return out


def closed():
    m = l.reshape(COUNT, 2, 6, 2, 6)
    blocks = np.einsum('ki,xaibj,kj->xkab', basis, m, basis, optimize=True)
    det = blocks[..., 0, 0] * blocks[..., 1, 1] - blocks[..., 0, 1] * blocks[..., 1, 0]
    return np.sign(det).astype(int)


timed('classify 10 000 matrices under D6', loop if sys.argv[1] == 'typical' else closed)
done()
