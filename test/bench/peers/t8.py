"""Splitting lemma of a ring of twelve with critical mode 2, degree 6: truncated power series in two variables with numpy."""
import numpy as np
from clock import done, timed

N, DEGREE = 12, 6
TERMS = [(i, j) for i in range(DEGREE + 1) for j in range(DEGREE + 1 - i)]


def times(a, b, degree):
    out = np.zeros_like(a)
    for i, j in TERMS:
        if i + j > degree:
            continue
        x = a[:, i, j]
        if not x.any():
            continue
        w = degree - i - j + 1
        out[:, i : i + w, j : j + w] += x[:, None, None] * b[:, :w, :w]
    for i in range(DEGREE + 1):
        out[:, i, max(0, degree - i + 1) :] = 0
    return out


def reduce(c=1.0, a=1.0, b=1.0):
    site = np.arange(N)
    modes = np.array([np.cos(np.pi * k * site / 6) for k in range(7)] + [np.sin(np.pi * k * site / 6) for k in range(1, 6)])
    critical = [2, 8]
    others = [i for i in range(N) if i not in critical]
    kernel, complement = modes[critical].T, modes[others].T
    s = -c * np.eye(N) + c * (2 * np.eye(N) - np.roll(np.eye(N), 1, 0) - np.roll(np.eye(N), -1, 0))
    inverse = np.linalg.inv(complement.T @ s @ complement)
    x = np.zeros((N, DEGREE + 1, DEGREE + 1))
    x[:, 1, 0], x[:, 0, 1] = kernel[:, 0], kernel[:, 1]
    start = x.copy()
    for degree in (2, 3):
        square = times(x, x, degree)
        force = a * square + b * times(square, x, degree)
        v = -np.tensordot(inverse @ complement.T, force, axes=(1, 0))
        x = start + np.tensordot(complement, v, axes=(1, 0))
    square = times(x, x, DEGREE)
    h = a / 3 * times(square, x, DEGREE) + b / 4 * times(square, square, DEGREE)
    quadratic = times(x, np.tensordot(s, x, axes=(1, 0)), DEGREE) / 2
    return (h + quadratic).sum(axis=0)


h = timed('splitting lemma, numbers', reduce)
assert abs(h[1, 1]) < 1e-12 and abs(h[2, 0]) < 1e-12
done()
