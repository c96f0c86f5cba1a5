/** Birkhoff normal forms through the whole program. */
import { describe, expect, it } from 'vitest';
import { readModelText } from '../../src/model/declaration/index.ts';
import type { EllipticResult } from '../../src/study/elliptic.ts';
import { study } from '../../src/study/study.ts';

const elliptic = async (text: string, degree = 4) =>
  ((await study('reduce', { ...readModelText(text), degree }, { elliptic: true })).result as EllipticResult).birkhoff;

describe('reduce --elliptic', () => {
  it('the pendulum: I − I²/16 − I³/256 − 5 I⁴/8192 (action integral, checked numerically)', async () => {
    const b = await elliptic('coordinates: [q]\nmomenta: [p]\nhamiltonian: p^2/2 + 1 - cos(q)', 8);
    expect(b.expression).toBe('I1 - I1^2/16 - I1^3/256 - 5*I1^4/8192');
    expect(b.resonances).toEqual([]);
  });
  it('Hénon–Heiles on q1 = p1 = 0: −5/12 I² − 235/432 I³ (one-degree-of-freedom reduction)', async () => {
    const b = await elliptic('coordinates: [q1, q2]\nmomenta: [p1, p2]\nhamiltonian: (p1^2+p2^2+q1^2+q2^2)/2 + q1^2*q2 - q2^3/3', 6);
    expect(b.actions.replaceAll(' ', '')).toContain('-5*I1^2/12');
    expect(b.actions.replaceAll(' ', '')).toContain('-235*I2^3/432');
    expect(b.resonances).toMatchObject([{ relation: [1, -1], order: 2, generator: 'z1*conj(z2)' }]);
    expect(b.stability).toMatch(/nonlinearly stable/);
  });
  it('modes carry the labels of their components, signs those of their energies', async () => {
    const b = await elliptic(
      'coordinates: [q1, q2]\nmomenta: [p1, p2]\nhamiltonian: (p1^2+q1^2)/2 - (p2^2+2*q2^2)/2 + q1^4\nsymmetry: {generators: [{name: s, map: {q2: -q2}}]}',
    );
    expect(b.frequencies.map((f) => f.sign).sort()).toEqual([-1, 1]);
    expect(new Set(b.frequencies.map((f) => f.component)).size).toBe(2);
    expect(b.stability).toMatch(/indefinite/);
  });
  it('a saddle is refused', async () => {
    await expect(elliptic('coordinates: [q]\nmomenta: [p]\nhamiltonian: p^2/2 - q^2/2 + q^4')).rejects.toThrow(/elliptic/);
  });
});
