/** Models that are not what they claim: what check says, and that the other commands stop. */
import { describe, expect, it } from 'vitest';
import { readModelText } from '../../src/model/declaration/index.ts';
import type { CheckResult } from '../../src/study/check.ts';
import { study } from '../../src/study/study.ts';

const broken = readModelText(`
coordinates: [q1, q2]
momenta: [p1, p2]
hamiltonian: (p1^2+p2^2)/2 + (q1^2+q2^2)/2 + q1^3 - 3*q1*q2^2 + q1^4
symmetry: {group: 'dihedral:3', on: [[q1, q2]], timeReversal: true}`);

describe('an H that breaks the declared symmetry', () => {
  it('check names the part that breaks it and the subgroup that survives: q1⁴ less its mean 3/8 |q|⁴ (by hand)', async () => {
    const { result, status } = await study('check', broken);
    const { broken: b } = result as CheckResult;
    expect(status).toBe(1);
    expect(b?.part).toBe('5*q1^4/8 - 3*q1^2*q2^2/4 - 3*q2^4/8');
    expect(b?.survives).toMatchObject({ order: 4, reversing: 2 });
  });
  it('codim, invariants, reduce and branches stop and send to check', async () => {
    for (const command of ['codim', 'invariants', 'reduce', 'branches'] as const)
      await expect(study(command, broken)).rejects.toMatchObject({ culprit: { next: expect.stringContaining('symcodim check') } });
  });
  it('a model that holds has nothing to say of it', async () => {
    const { result } = await study('check', readModelText('coordinates: [q]\nmomenta: [p]\nhamiltonian: (p^2+q^2)/2'));
    expect((result as CheckResult).broken).toBeUndefined();
  });
  it('reduce and branches answer with nothing where nothing is at zero', async () => {
    const quiet = readModelText('coordinates: [q]\nmomenta: [p]\nparameters: {k: 1}\nvary: [k]\nhamiltonian: (p^2+k*q^2)/2');
    expect((await study('reduce', quiet)).result).toMatchObject({ reduced: null });
    expect((await study('branches', quiet)).result).toMatchObject({ isotropy: [], branches: [] });
  });
});
