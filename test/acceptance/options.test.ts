/** The options that declare a model, run in the built program. Numbers by hand unless a source is named. */
import { describe, expect, it } from 'vitest';
import { components, json, refusal, scratch } from './support/program.ts';

const { write } = scratch();
const names = (r: { model: { coordinates: string[]; momenta: string[] } }): string => `${r.model.coordinates} | ${r.model.momenta}`;

describe.concurrent('names of coordinates', () => {
  it('natural order: q2 before q10; a q without its p gets one', async () => {
    expect(names(await json('components --quadratic "q10^2 + q2^2 + p2^2"'))).toBe('q2,q10 | p2,p10');
  });
  it('paired by their endings, bare q and p included', async () => {
    expect(names(await json('components --quadratic "qa^2 + q^2 + p^2 + pa*q_x"'))).toMatch(
      /^q,q_x,qa \| p,p_x,pa$|^q,qa,q_x \| p,pa,p_x$/,
    );
  });
  it('names in --on count, even where the expression lacks them', async () => {
    const r = await json('components --group dihedral:3 --action ring --on q1,q2,q3 --quadratic "0"');
    expect(names(r)).toBe('q1,q2,q3 | p1,p2,p3');
    // R^3 = A1 + E, twice
    expect(components(r)).toEqual(['1 real 2 false', '2 real 2 false']);
  });
  it('a p without its q belongs to a q that does not occur', async () => {
    expect(names(await json('components --quadratic "q1^2 + p2^2"'))).toBe('q1,q2 | p1,p2');
  });
  it('names given to --set or --vary are never coordinates', async () => {
    const set = await json('codim --quadratic "qq*q1^2 + pp*p1^2" --set qq=1 --set pp=1/2');
    expect(names(set)).toBe('q1 | p1');
    expect(set.model.parameters).toEqual({ qq: '1', pp: '1/2' });
    const varied = await json('components --quadratic "qq*q1^2 + p1^2" --vary qq');
    expect(names(varied)).toBe('q1 | p1');
  });
  it('--coordinates and --momenta name others, in the order given', async () => {
    expect(names(await json('components --coordinates y,x --momenta v,u --quadratic "x^2 + v^2"'))).toBe('y,x | v,u');
  });
  it('names in --define do not become coordinates, those in its expression do', async () => {
    const r = await json('codim --define d=q1-q2 --quadratic "d^2 + p1^2 + p2^2"', '', 0);
    expect(names(r)).toBe('q1,q2 | p1,p2');
    // (q1 − q2)^2 + p^2: kernel (1, 1), one block of size 2
    expect(r.zero).toMatchObject({ kernel: 1, blocks: [2], codimension: 1 });
  });
  it('e and i are ordinary names; pi is reserved', async () => {
    const r = await json('codim --quadratic "e*q1^2/2 + i*p1^2/2" --set e=0,i=1');
    expect(r.arithmetic).toBe('exact');
    expect(r.zero.blocks).toEqual([2]);
    expect(await refusal('codim --quadratic "q1^2 + p1^2" --set pi=3')).toContain('reserved');
    expect(await refusal('codim --quadratic "q1^2 + p1^2" --define pi=3')).toContain('reserved');
    expect(await refusal('codim --coordinates pi --momenta p --quadratic "pi^2 + p^2"')).toContain('reserved');
  });
});

describe.concurrent('--group, --action, --on', () => {
  it('coordinates only: the momenta follow by the cotangent lift', async () => {
    const r = await json('components --group cyclic:5 --on q1,q2 --quadratic "q1^2 + q2^2 + p1^2 + p2^2"');
    // rotation of q-plane and of p-plane: one irreducible of complex type, twice
    expect(components(r)).toEqual(['2 complex 2 true']);
    expect(r.group).toMatchObject({ order: 5, reversing: 0 });
  });
  it('coordinates and momenta: the matrices act as they are', async () => {
    const r = await json('components --group cyclic:5 --on q1,p1 --quadratic "q1^2 + p1^2"');
    expect(components(r)).toEqual(['2 complex 1 true']);
  });
  it('coordinates in no list are fixed', async () => {
    const r = await json('components --group cyclic:4 --on q1,q2 --quadratic "q1^2 + q2^2 + q3^2 + p3^2"');
    expect(components(r)).toEqual(['1 real 2 false', '2 complex 2 true']);
  });
  it('--on is repeatable', async () => {
    const r = await json('components --group cyclic:4 --on q1,q2 --on q3,q4 --quadratic "0"');
    expect(components(r)).toEqual(['2 complex 4 true']);
  });
  it('an --action applies to the --on after it, the first action to the others', async () => {
    const r = await json('components --group dihedral:3 --on q4,q5 --action ring --on q1,q2,q3 --quadratic "0"');
    // plane: E; ring: A1 + E; all of it twice
    expect(components(r)).toEqual(['1 real 2 false', '2 real 4 false']);
    await refusal('components --group dihedral:3 --on q1,q2,q3 --action ring --quadratic "0"');
  });
  it('ring*plane: sites with two components', async () => {
    const r = await json('components --group dihedral:3 --action ring*plane --on q1,q2,q3,q4,q5,q6 --quadratic "0"');
    // (A1 + E)(E) = A1 + A2 + 2E, twice
    expect(components(r)).toEqual(['1 real 2 false', '1 real 2 false', '2 real 4 false']);
  });
  it('ring*plane: the plane of site 1 comes first, and r carries it to site 2', async () => {
    // Only couplings of a site to the turned neighbour are invariant; H = |x2 − R x1|^2 + cyclic with R by 120 degrees.
    const turn = (x: string, y: string, u: string, v: string) => `(${u} + ${x}/2 + sqrt(3)*${y}/2)^2 + (${v} - sqrt(3)*${x}/2 + ${y}/2)^2`;
    const h = [turn('q1', 'q2', 'q3', 'q4'), turn('q3', 'q4', 'q5', 'q6'), turn('q5', 'q6', 'q1', 'q2')].join(' + ');
    const r = await json(['check', '--group', 'cyclic:3', '--action', 'ring*plane', '--on', 'q1,q2,q3,q4,q5,q6', '--quadratic', h]);
    expect(r.symmetry.holds).toBe(true);
    const swapped = h.replace(/q2/g, 'Q').replace(/q3/g, 'q2').replace(/Q/g, 'q3');
    await json(['check', '--group', 'cyclic:3', '--action', 'ring*plane', '--on', 'q1,q2,q3,q4,q5,q6', '--quadratic', swapped], '', 1);
  });
  it('plane: r turns by +2pi/N, s is (x, y) -> (x, -y)', async () => {
    // Re (x + iy)^3 is invariant under both, Im under r only.
    await json('check --group dihedral:3 --on q1,q2 --hamiltonian "q1^3 - 3*q1*q2^2"');
    await json('check --group dihedral:3 --on q1,q2 --hamiltonian "3*q1^2*q2 - q2^3"', '', 1);
    // +90 degrees with a twist: r on (q1, q2) and r on (p2, p1)... J-like pairing tells the direction
    await json('check --group cyclic:4 --on q1,q2 --on q3,q4 --hamiltonian "q1*q4 - q2*q3"');
  });
  it('ring: r sends the value at site i to site i+1, s fixes site 1', async () => {
    // q1^2 q2 + q2^2 q3 + ... is invariant under the shift either way, not under s.
    const chiral = 'q1^2*q2 + q2^2*q3 + q3^2*q4 + q4^2*q1';
    const r = await json(`check --group dihedral:4 --action ring --on q1,q2,q3,q4 --hamiltonian "${chiral}"`, '', 1);
    expect(r.symmetry.generators.map((g: { name: string; invariant: boolean }) => `${g.name} ${g.invariant}`)).toEqual([
      'r true',
      's false',
    ]);
    // s fixes sites 1 and 3: H = q1^4 + q3^2 has it, H = q2^2 has not
    const one = await json('check --group dihedral:4 --action ring --on q1,q2,q3,q4 --hamiltonian "q1^4 + q3^2"', '', 1);
    expect(one.symmetry.generators[1]).toMatchObject({ name: 's', invariant: true });
  });
  it('invariance of a quotient of polynomials is decided as a whole', async () => {
    const line = (h: string) => `check --group reflection --on q1 --hamiltonian "${h}"`;
    expect((await json(line('p1^2 + q1^2/(1 + q1^2)'))).symmetry.holds).toBe(true);
    // odd terms from degree 21 on
    const odd = await json(line('p1^2 + q1^2 + q1^21/(1 + q1^2)'), '', 1);
    expect(odd.symmetry.generators[0]).toMatchObject({ symplectic: true, invariant: false });
    await json(line('p1^2 + q1^2 + q1^41'), '', 1);
    // not rational: Taylor terms up to a degree that the result states, 4 or that of --degree
    const near = await json(line('p1^2 + cos(q1) + sin(q1)^5'));
    expect(near.invarianceDegree).toBe(4);
    const far = await json(`${line('p1^2 + cos(q1) + sin(q1)^5')} --degree 6`, '', 1);
    expect([far.invarianceDegree, far.symmetry.holds]).toEqual([6, false]);
  });
  it('reflection: -1 on each listed coordinate', async () => {
    const r = await json('components --group reflection --on q1,q2 --quadratic "q1*q2 + q3^2"');
    expect(components(r)).toEqual(['1 real 2 false', '1 real 4 false']);
  });
  it('symmetric:N permutes N coordinates by its action permutation', async () => {
    const r = await json('components --group symmetric:4 --action permutation --on q1,q2,q3,q4 --quadratic "0"');
    expect(components(r)).toEqual(['1 real 2 false', '3 real 2 false']);
  });
  it('space: two-fold axes of D_n along x, vertical mirrors contain x, Cs mirrors z', async () => {
    await json('check --group D3 --on q1,q2,q3 --hamiltonian "q1^3 - 3*q1*q2^2"');
    await json('check --group C3v --on q1,q2,q3 --hamiltonian "q1^3 - 3*q1*q2^2 + q3"', '', 1); // q3 is no equilibrium term
    await json('check --group C3v --on q1,q2,q3 --hamiltonian "q1^3 - 3*q1*q2^2 + q3^3"');
    await json('check --group Cs --on q1,q2,q3 --hamiltonian "q1^3 + q2^3 + q3^2"');
    await json('check --group Cs --on q1,q2,q3 --hamiltonian "q3^3"', '', 1);
  });
  it('quaternion: left multiplication on (1, i, j, k)', async () => {
    const r = await json('components --group quaternion --on q1,q2,q3,q4 --quadratic "0"');
    expect(components(r)).toEqual(['4 quaternionic 2 true']);
  });
  it('a product: its actions are made of those of the factors', async () => {
    const r = await json('components --group dihedral:3*reflection --action plane*sign --on q1,q2 --quadratic "0"');
    // the reflection acts by −1: E with a sign, twice
    expect(r.group.order).toBe(12);
    expect(components(r)).toEqual(['2 real 2 false']);
  });
  it('a group file', async () => {
    const r = await json('components --group groups/quaternion.json --on q1,q2,q3,q4 --quadratic "0"');
    expect(components(r)).toEqual(['4 quaternionic 2 true']);
    const broken = write('broken.json', '{"title": "no generators"}');
    expect(await refusal(['components', '--group', broken, '--on', 'q1,q2', '--quadratic', '0'])).toContain('broken.json');
  });
  it('wrong numbers of coordinates, unknown actions and groups are refused with what there is', async () => {
    expect(await refusal('codim --group dihedral:3 --on q1,q2,q3 --quadratic "q1^2"')).toMatch(/2/);
    expect(await refusal('codim --group dihedral:3 --action rung --on q1,q2 --quadratic "q1^2"')).toContain('ring');
    expect(await refusal('codim --group dihedrall:3 --on q1,q2 --quadratic "q1^2"')).toContain('dihedral');
    await refusal('codim --group dihedral:0 --on q1,q2 --quadratic "q1^2"');
    await refusal('codim --group dihedral:-3 --on q1,q2 --quadratic "q1^2"');
    await refusal('codim --group cyclic:99999999999 --on q1,q2 --quadratic "q1^2"');
    await refusal('codim --group dihedral:3 --on q1,q1 --quadratic "q1^2"');
    await refusal('codim --group dihedral:3 --quadratic "q1^2"');
  });
});

describe.concurrent('--reversing and --time-reversal', () => {
  it('--time-reversal adds (q, p) -> (q, -p): planar oscillator, D3 and C3', async () => {
    const line = (group: string, more: string) => `codim --group ${group} --on q1,q2 ${more} --quadratic "p1^2 + p2^2" --parameters 9`;
    expect((await json(line('cyclic:3', ''))).zero.codimension).toBe(2);
    const reversed = await json(line('cyclic:3', '--time-reversal'));
    expect([reversed.zero.codimension, reversed.zero.motion, reversed.group.order, reversed.group.reversing]).toEqual([1, 'splits', 6, 3]);
    expect((await json(line('dihedral:3', ''))).zero.codimension).toBe(1);
  });
  it('--time-reversal alone', async () => {
    const r = await json('codim --time-reversal --quadratic "p1^2"');
    expect(r.group).toMatchObject({ order: 2, reversing: 1 });
    expect(r.zero.codimension).toBe(1);
    // class 4 with k = 1: [1, 1] costs k(k+1) − k^2 + ... by hand: dim P = 2, the orbit of 0 is a point
    expect((await json('codim --time-reversal --quadratic "0*q1" --parameters 5')).zero).toMatchObject({
      codimension: 2,
      codimensionWithoutSymmetry: 3,
    });
  });
  it('--reversing with the plane (q, p): the mirror turns time round', async () => {
    const r = await json('codim --group dihedral:5 --on q1,p1 --reversing s --quadratic "0*q1*p1"');
    expect(r.group).toMatchObject({ order: 10, reversing: 5 });
    expect(r.symmetry.generators).toMatchObject([
      { name: 'r', reversing: false },
      { name: 's', reversing: true, symplectic: true },
    ]);
    expect(components(r)).toEqual(['2 real 1 true']);
    expect(await refusal('codim --group dihedral:5 --on q1,p1 --quadratic "0*q1*p1"')).toMatch(/check/);
    expect(await refusal('codim --group dihedral:5 --on q1,p1 --reversing r --quadratic "0*q1*p1"')).toMatch(/\br\b/);
  });
  it('--reversing with coordinates only: p goes by −A', async () => {
    const r = await json('codim --group cyclic:4 --on q1,q2 --reversing r --quadratic "0*q1" --parameters 9');
    // class 5 with k = 2: L = 0 costs dim P = k^2 = 4
    expect(r.zero).toMatchObject({ blocks: [1, 1, 1, 1], codimension: 4, codimensionWithoutSymmetry: 10 });
  });
  it('a comma list, an unknown name, a rotation of odd order', async () => {
    const r = await json('components --group dihedral:4 --on q1,q2 --reversing r,s --quadratic "0"');
    expect(r.group).toMatchObject({ order: 8, reversing: 4 });
    expect(await refusal('components --group dihedral:4 --on q1,q2 --reversing x --quadratic "0"')).toMatch(/x/);
    // r of order 3 that reverses time: (q, p) -> (Aq, −Ap) has order 6, and matrices with their signs are counted
    const six = await json('components --group cyclic:3 --on q1,q2 --reversing r --quadratic "0"');
    expect(six.group).toMatchObject({ order: 6, reversing: 3 });
  });
});

describe.concurrent('parameters', () => {
  const model = 'title: t\ncoordinates: [q]\nmomenta: [p]\nparameters: {a: 0, b: 2}\nvary: [a]\nhamiltonian: p^2/2 + a*q^2/2 + b*q^4\n';
  it('--set overrides the value of the file, --vary replaces its list', async () => {
    const plain = await json('codim -', model);
    expect([plain.model.title, plain.model.parameters, plain.model.vary]).toEqual(['t', { a: '0', b: '2' }, ['a']]);
    const set = await json('codim - --set a=1/2', model);
    expect([set.model.parameters.a, set.verdict.answer, set.zero]).toEqual(['1/2', 'no event', null]);
    const varied = await json('codim - --vary b', model);
    expect(varied.model.vary).toEqual(['b']);
    expect([plain.verdict.parameters, varied.verdict.parameters]).toEqual([1, 1]);
    const both = await json('codim - --vary a,b --set a=0.0,b=-1e-3', model);
    expect([both.model.vary, both.verdict.parameters, both.model.parameters]).toEqual([['a', 'b'], 2, { a: '0', b: '-1/1000' }]);
  });
  it('--vary is repeatable', async () => {
    expect((await json('codim - --vary a --vary b', model)).model.vary).toEqual(['a', 'b']);
  });
  it('--set takes exact expressions', async () => {
    const r = await json('codim - --set "a=sqrt(2)*sqrt(2)-2"', model);
    expect([r.arithmetic, r.zero?.blocks]).toEqual(['exact', [2]]);
  });
  it('--parameters counts, and never sets a value: default the number varied, at least 1', async () => {
    const line = 'codim --quadratic "mu*(q1^2+p1^2)/2" --set mu=0';
    const none = await json(line, '', 1);
    expect([none.verdict.parameters, none.verdict.answer, none.verdict.versal, none.zero.codimension]).toEqual([1, 'not generic', null, 3]);
    const three = await json(`${line} --parameters 3`);
    expect([three.verdict.parameters, three.verdict.answer, three.verdict.versal, three.zero.motion]).toEqual([
      3,
      'generic',
      null,
      'degenerate',
    ]);
    const two = await json(`${line} --vary mu --parameters 3`);
    expect([two.verdict.answer, two.verdict.versal]).toEqual(['generic', false]);
    await refusal(`${line} --parameters -1`);
    await refusal(`${line} --parameters two`);
    await refusal(`${line} --parameters 1.5`);
  });
  it('a parameter without a value: wrong input here, a symbol there', async () => {
    const given = '--group reflection --on q1 --hamiltonian "p1^2/2 + a*q1^2/2 + q1^4" --vary a';
    for (const command of ['codim', 'check', 'branches']) expect(await refusal(`${command} ${given}`)).toMatch(/\ba\b[\s\S]*--set/);
    expect(JSON.stringify((await json(`components ${given}`)).model.parameters)).toBe('{"a":null}');
    await json(`invariants ${given}`);
  });
  it('what is no coordinate and has no value', async () => {
    expect(await refusal('codim --quadratic "k*q1^2 + p1^2"')).toMatch(/\bk\b/);
    expect(await refusal('codim --quadratic "q1^2 + p1^2" --vary nu')).toMatch(/\bnu\b/);
    expect(await refusal('codim - --set c=1', model)).toMatch(/\bc\b/);
  });
  it('--define: exact, in terms of others, repeatable; circles are refused', async () => {
    const r = await json('codim --define u=q1-q2 --define v=u^2 --hamiltonian "p1^2 + p2^2 + v + u^4"');
    expect([r.arithmetic, r.zero.blocks]).toEqual(['exact', [2]]);
    await refusal('codim --define u=v --define v=u --hamiltonian "u*q1^2 + p1^2"');
    await refusal('codim --define u=u+1 --hamiltonian "u*q1^2 + p1^2"');
    await refusal('codim --define q1=2 --hamiltonian "q1^2 + p1^2"');
    await refusal('codim --define nonsense --hamiltonian "q1^2 + p1^2"');
  });
});

describe.concurrent('use of the command line', () => {
  it('unknown commands and options get the nearest one', async () => {
    expect(await refusal('codimm')).toContain('codim');
    expect(await refusal('codim --quadratik "q1^2"')).toContain('--quadratic');
    await refusal('codim');
    await refusal('codim --quadratic');
    await refusal('codim --quadratic "q1^2" --hamiltonian "q1^2"');
    await refusal('codim samples/water.yaml samples/methane.yaml');
    await refusal('codim --quadratic "q1^2+p1^2" --codimension 2');
    await refusal('codim --quadratic "q1^2+p1^2" --tolerance -1');
    await refusal('codim --quadratic "q1^2+p1^2" --tolerance NaN');
    await refusal('codim --quadratic "q1^2+p1^2" --neutral loose');
    await refusal('events --group cyclic:3 --on q1,p1 --codimension x');
    await refusal('codim --quadratic "q1^2+p1^2" --order-limit 0');
  });
  it('--order-limit', async () => {
    expect(
      await refusal('components --group symmetric:5 --action permutation --on q1,q2,q3,q4,q5 --quadratic "0" --order-limit 119'),
    ).toMatch(/119/);
    expect(
      (await json('components --group symmetric:5 --action permutation --on q1,q2,q3,q4,q5 --quadratic "0" --order-limit 120')).group.order,
    ).toBe(120);
  });
});
