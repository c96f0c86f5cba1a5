"""Components by characters and 360 eigenvalues of sixty masses; typical: eigenvalues of JS, best: of K alone. Both dense."""
import sys

import numpy as np
from cage import MATRICES, PHI, orbit, stiffness
from clock import done, timed

points, images = orbit([0, 1, 3 * PHI])
assert len(points) == 60
k = stiffness(points)
# characters of the rotation group by rotation angle, typed from a table: A, T1, T2, G, H
BY_TRACE = {
    3.0: [1, 3, 3, 4, 5],
    round(PHI, 6): [1, PHI, 1 - PHI, -1, 0],
    round(1 - PHI, 6): [1, 1 - PHI, PHI, -1, 0],
    0.0: [1, 0, 0, 1, -1],
    -1.0: [1, -1, -1, 0, 1],
}


def components():
    elements, queue = {}, [(np.arange(60), np.eye(3))]
    elements[queue[0][0].tobytes()] = queue[0]
    generators = [(np.array(p), m) for p, m in zip(images, MATRICES)]
    for p, m in queue:
        for q, g in generators:
            x = (q[p], g @ m)
            key = x[0].tobytes()
            if key not in elements:
                elements[key] = x
                queue.append(x)
    total = np.zeros((2, 5))
    for p, m in queue:
        parity = 1 if np.linalg.det(m) > 0 else -1
        own = BY_TRACE[round(parity * np.trace(m), 6) + 0.0]
        trace = np.count_nonzero(p == np.arange(60)) * np.trace(m)
        total += trace * np.array([own, [parity * x for x in own]])
    return len(queue), np.round(total / len(queue)).astype(int)


def run():
    found = components()
    if sys.argv[1] == 'best':
        w = np.linalg.eigvalsh(k)
        return found, np.sqrt(np.maximum(w, 0))
    zero, one = np.zeros_like(k), np.eye(len(k))
    return found, np.linalg.eigvals(np.block([[zero, one], [-k, zero]]))


(order, multiplicities), values = timed('60 masses: components, frequencies', run)
assert order == 120 and multiplicities.tolist() == [[2, 4, 4, 6, 8], [1, 5, 5, 6, 7]], (order, multiplicities)
done()
