"""Invariants of permutation and signed-permutation actions as orbit sums of monomials, in plain Python."""
from itertools import combinations_with_replacement

from clock import done, timed


def cycle(n):
    return [((i + 1) % n, 1) for i in range(n)]


def signed_closure(generators):
    identity = tuple((i, 1) for i in range(len(generators[0])))
    seen, queue = {identity}, [identity]
    for x in queue:
        for g in generators:
            y = tuple((g[i][0], g[i][1] * s) for i, s in x)
            if y not in seen:
                seen.add(y)
                queue.append(y)
    return queue


def doubled(g):
    n = len(g)
    return [*g, *((i + n, s) for i, s in g)]


def invariants(generators, degree):
    elements = signed_closure([doubled(g) for g in generators])
    n = len(elements[0])
    done_with, basis = set(), []
    for monomial in combinations_with_replacement(range(n), degree):
        if monomial in done_with:
            continue
        total = {}
        for g in elements:
            sign, image = 1, []
            for i in monomial:
                j, s = g[i]
                image.append(j)
                sign *= s
            image = tuple(sorted(image))
            total[image] = total.get(image, 0) + sign
        done_with.update(total)
        if total[monomial] != 0:
            basis.append(total)
    return basis


O_H = [[(1, 1), (2, 1), (0, 1)], [(1, 1), (0, 1), (2, 1)], [(0, -1), (1, 1), (2, 1)]]
D_6 = [cycle(6), [((-i) % 6, 1) for i in range(6)]]
S_5 = [cycle(5), [(1, 1), (0, 1), (2, 1), (3, 1), (4, 1)]]
timed('invariants O_h R6 degree 8', lambda: invariants(O_H, 8))
timed('invariants D6 R12 degree 4', lambda: invariants(D_6, 4))
timed('invariants S5 R10 degree 6', lambda: invariants(S_5, 6))
done()
