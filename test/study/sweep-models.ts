/** Models of the published thresholds, written down by program. */

/** Ring of N pendulums with repulsive coupling kappa = -1. */
export function pendulumRing(n: number, group = `dihedral:${n}`): Record<string, unknown> {
  const q = Array.from({ length: n }, (_, i) => `q${i + 1}`);
  const p = q.map((_, i) => `p${i + 1}`);
  const next = (i: number) => q[(i + 1) % n]!;
  const bonds = n === 2 ? [`(q1 - q2)^2`, `(q2 - q1)^2`] : q.map((x, i) => `(${x} - ${next(i)})^2`);
  return {
    title: `Ring of ${n} pendulums`,
    coordinates: q,
    momenta: p,
    parameters: { g: '1' },
    vary: ['g'],
    range: { g: ['1/10', '5'] },
    hamiltonian: `(${p.map((x) => `${x}^2`).join(' + ')})/2 + g*(${n} - ${q.map((x) => `cos(${x})`).join(' - ')}) - (${bonds.join(' + ')})/2`,
    symmetry: { group, action: 'ring', on: [q], timeReversal: true },
  };
}

/**
 * Quadratic part at a ring of N equal vortices on the unit circle in the frame that turns with them, with the pairs
 * r = (radial), t = (tangential) displacements of each vortex: H = -Σ log|zi - zj| + (N-1)/4 Σ|z|², expanded to second order.
 * W is one half of the full weight, so that λ² of mode k is k(N-k)(k(N-k) - 2(N-1))/4 (T. H. Havelock 1931).
 */
export function vortexRing(n: number): Record<string, unknown> {
  const x = Array.from({ length: n }, (_, i) => `x${i + 1}`);
  const y = x.map((_, i) => `y${i + 1}`);
  const pairs: string[] = [];
  for (let i = 0; i < n; i++) for (let j = 0; j < i; j++) pairs.push(`log((${x[i]} - ${x[j]})^2 + (${y[i]} - ${y[j]})^2)/2`);
  const point = Object.fromEntries(
    x.flatMap((name, i) => [[name, `cos(2*pi*${i}/${n})`] as const, [y[i]!, `sin(2*pi*${i}/${n})`] as const]),
  );
  const [c, s] = [`cos(2*pi/${n})`, `sin(2*pi/${n})`];
  const map = Object.fromEntries(
    x.flatMap((name, i) => {
      const from = (i + n - 1) % n;
      return [[name, `${c}*${x[from]} - ${s}*${y[from]}`] as const, [y[i]!, `${s}*${x[from]} + ${c}*${y[from]}`] as const];
    }),
  );
  const mirror = Object.fromEntries(
    x.flatMap((name, i) => {
      const from = (n - i) % n;
      return [[name, x[from]!] as const, [y[i]!, `-${y[from]}`] as const];
    }),
  );
  return {
    title: `Ring of ${n} vortices`,
    coordinates: x,
    momenta: y,
    parameters: { Omega: `${n - 1}/2`, s: '1' },
    vary: ['s'],
    range: { s: ['1/2', '3/2'] },
    hamiltonian: `s*(-(${pairs.join(' + ')}) + Omega/2*(${x.map((name, i) => `${name}^2 + ${y[i]}^2`).join(' + ')}))`,
    equilibrium: point,
    symmetry: {
      generators: [
        { name: 'r', map },
        { name: 'm', reversing: 'true', map: mirror },
      ],
    },
  };
}

/** Potential energy of N equal masses m on a ring about a fixed centre of mass 1, in the frame that turns with the ring. */
export function maxwellRing(n: number): Record<string, unknown> {
  const x = Array.from({ length: n }, (_, i) => [`x${i + 1}`, `y${i + 1}`] as const);
  const q = x.flat();
  const p = x.flatMap((_, i) => [`u${i + 1}`, `v${i + 1}`]);
  const angle = (i: number) => `2*pi*${i}/${n}`;
  // the ring at radius 1 turns with Omega² = 1 + m Σ 1/(4 sin(pi j/N))
  const pull = Array.from({ length: n - 1 }, (_, j) => `1/sin(pi*${j + 1}/${n})`).join(' + ');
  const kinetic = p.map((name) => `${name}^2`).join(' + ');
  const spin = x.map(([a, b], i) => `${a}*v${i + 1} - ${b}*u${i + 1}`).join(' + ');
  const centre = x.map(([a, b]) => `1/sqrt(${a}^2 + ${b}^2)`).join(' + ');
  const pairs: string[] = [];
  for (let i = 0; i < n; i++)
    for (let j = 0; j < i; j++) pairs.push(`1/sqrt((${x[i]![0]} - ${x[j]![0]})^2 + (${x[i]![1]} - ${x[j]![1]})^2)`);
  const point: Record<string, string> = {};
  x.forEach(([a, b], i) => {
    point[a] = `cos(${angle(i)})`;
    point[b] = `sin(${angle(i)})`;
    point[`u${i + 1}`] = `-sqrt(1 + m*k)*sin(${angle(i)})`;
    point[`v${i + 1}`] = `sqrt(1 + m*k)*cos(${angle(i)})`;
  });
  const [c, s] = [`cos(2*pi/${n})`, `sin(2*pi/${n})`];
  const map: Record<string, string> = {};
  x.forEach(([a, b], i) => {
    const from = (i + n - 1) % n;
    const [fa, fb] = x[from]!;
    map[a] = `${c}*${fa} - ${s}*${fb}`;
    map[b] = `${s}*${fa} + ${c}*${fb}`;
    map[`u${i + 1}`] = `${c}*u${from + 1} - ${s}*v${from + 1}`;
    map[`v${i + 1}`] = `${s}*u${from + 1} + ${c}*v${from + 1}`;
  });
  return {
    title: `Ring of ${n} masses about a centre`,
    coordinates: q,
    momenta: p,
    parameters: { m: '1/1000', k: `(${pull})/4` },
    vary: ['m'],
    range: { m: [`22/${10 * n ** 3}`, `25/${10 * n ** 3}`] },
    hamiltonian: `(${kinetic})/2 - sqrt(1 + m*k)*(${spin}) - (${centre}) - m*(${pairs.join(' + ')})`,
    equilibrium: point,
    symmetry: { generators: [{ name: 'r', map }] },
  };
}
