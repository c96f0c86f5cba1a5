"""Codimension of the orbit of L among Hamiltonian matrices with the symmetry: nullity of all equations on n² unknowns."""
import numpy as np
from clock import done, timed


def codimension(half, generators, stiffness):
    n = 2 * half
    zero, one = np.zeros((half, half)), np.eye(half)
    j = np.block([[zero, one], [-one, zero]])
    l = j @ np.block([[stiffness, zero], [zero, one]])
    unit = np.eye(n)
    rows = [np.kron(l, unit) - np.kron(unit, l.T)]  # L X - X L, X by rows
    for g in generators:
        rho = np.kron(np.eye(2), g)
        rows.append(np.kron(rho, unit) - np.kron(unit, rho.T))
    # XᵀJ + JX = 0
    transpose = np.zeros((n * n, n * n))
    for a in range(n):
        for b in range(n):
            transpose[a * n + b, b * n + a] = 1
    rows.append(np.kron(unit, j.T) @ transpose + np.kron(j, unit))
    m = np.concatenate(rows)
    return n * n - np.linalg.matrix_rank(m)


turn = np.array([[-0.5, -(3 ** 0.5) / 2], [3 ** 0.5 / 2, -0.5]])
mirror = np.diag([1.0, -1.0])
shift = np.roll(np.eye(6), 1, axis=0)
flip = np.eye(6)[[0, 5, 4, 3, 2, 1]]
ring = 2 * np.eye(6) - shift - shift.T
found = timed('codimension D3 n=4', lambda: codimension(2, [turn, mirror], np.zeros((2, 2))))
assert found == 1, found
# the zero pair, and one for each of the three other blocks
found = timed('codimension D6 n=12', lambda: codimension(6, [shift, flip], ring))
assert found == 4, found
done()
