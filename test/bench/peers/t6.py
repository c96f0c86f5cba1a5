"""The small job with sympy: invariance, blocks, codimension, invariants and LaTeX of the three-fold planar quartic."""
import itertools

import sympy
from sympy import QQ, Matrix, Rational, eye, latex, sqrt, zeros
from sympy.polys.rings import ring

K = QQ.algebraic_field(sqrt(3))
R, q1, q2, p1, p2 = ring('q1,q2,p1,p2', K)
mu, a, b = 0, 1, 1
half, root = K.from_sympy(Rational(1, 2)), K.from_sympy(sqrt(3) / 2)
H = half * (p1**2 + p2**2) + a * (q1**3 - 3 * q1 * q2**2) + b * (q1**2 + q2**2) ** 2

turn = [(-half) * q1 - root * q2, root * q1 - half * q2, (-half) * p1 - root * p2, root * p1 - half * p2]
mirror = [q1, -q2, p1, -p2]
reversal = [q1, q2, -p1, -p2]
for images in (turn, mirror, reversal):
    assert H.compose(list(zip((q1, q2, p1, p2), images))) == H

c, s = Rational(-1, 2), sqrt(3) / 2
rotation = Matrix([[c, -s], [s, c]])
generators = [sympy.diag(m, m) for m in (rotation, sympy.diag(1, -1))]
elements = [eye(4)]
for x in elements:
    for g in generators:
        y = (g * x).applyfunc(sympy.nsimplify)
        if y not in elements:
            elements.append(y)
assert len(elements) == 6
norm = sum(x.trace() ** 2 for x in elements) / 6
J = Matrix(4, 4, lambda i, j: 1 if j == i + 2 else -1 if i == j + 2 else 0)
S = sympy.diag(0, 0, 1, 1)
L = J * S
unknown = Matrix(4, 4, sympy.symbols('x0:16'))
equations = []
for m in (L, *generators):
    equations += list(unknown * m - m * unknown)
equations += list(unknown.T * J + J * unknown)
system, _ = sympy.linear_eq_to_matrix(equations, list(unknown))
codimension = 16 - system.rank()
# invariants of the plane up to degree 4, from averages of monomials
V, x, y = ring('x,y', K)
found = []
for degree in (2, 3, 4):
    for e in itertools.product(range(degree + 1), repeat=2):
        if sum(e) != degree:
            continue
        total = V.zero
        for g in elements:
            u = K.from_sympy(g[0, 0]) * x + K.from_sympy(g[0, 1]) * y
            v = K.from_sympy(g[1, 0]) * x + K.from_sympy(g[1, 1]) * y
            total += u ** e[0] * v ** e[1]
        if total and total.monic() not in found:
            found.append(total.monic())
lines = [latex(H.as_expr()), latex(norm), latex(codimension), *(latex(f.as_expr()) for f in found)]
document = '\\documentclass{article}\\begin{document}\n' + '\n\n'.join(f'${x}$' for x in lines) + '\n\\end{document}\n'
print(document)
