/** Wrong input: one clear message on standard error, status 2, nothing on standard output, soon, in bounded memory. */
import { describe, expect, it } from 'vitest';
import { faults, refusal, run, scratch, validResult } from './support/program.ts';

const { write } = scratch();
const commands = ['check', 'components', 'codim', 'events', 'invariants', 'reduce', 'branches', 'report'];
const model = (h: string, more = ''): string => `coordinates: [q]\nmomenta: [p]\nhamiltonian: ${h}\n${more}`;

describe.concurrent('hostile input', () => {
  it('10 000 nested brackets', async () => {
    await refusal(['codim', '-'], model(`${'('.repeat(10000)}q${')'.repeat(10000)}`));
    await refusal(['codim', '-'], model(`${'sin('.repeat(10000)}q${')'.repeat(10000)}`));
    await refusal(['codim', '-'], model(`${'-'.repeat(10000)}q`));
    await refusal(['codim', '-'], model(`q${'^q'.repeat(10000)}`));
    await refusal(['codim', '-'], `hamiltonian: ${'['.repeat(10000)}${']'.repeat(10000)}\n`);
  });
  it('nesting of 200 is read, of 201 refused', async () => {
    expect((await run(['codim', '-'], model(`p^2 + ${'('.repeat(199)}q${')'.repeat(199)}^2`))).status).toBe(0);
    await refusal(['codim', '-'], model(`p^2 + ${'('.repeat(201)}q${')'.repeat(201)}^2`));
  });
  it('an expression of 5 MB is refused by its length', async () => {
    const text = await refusal(['codim', '-'], model(`${'q^2+'.repeat(1310720)}p^2`));
    expect(text).toMatch(/kB|long|256/);
  });
  it('an expression just below 256 kB is read', async () => {
    const got = await run(['codim', '-', '--json'], model(`${'q^2+'.repeat(60000)}p^2`));
    expect([got.status, got.stderr]).toEqual([0, '']);
    await refusal(['codim', '-'], model(`${'q^2+'.repeat(66000)}p^2`));
  });
  it('huge exponents and numbers', async () => {
    for (const h of [
      'q^999999999',
      'p^2 + q^2*10^999999999',
      'p^2 + q^2*2^(2^(2^100))',
      '(p+q)^100000',
      'p^2 + q^2*1e999999999',
      'p^2 + q^2*1e-999999999',
      '(1+q)^(10^9)',
      '((((q^99)^99)^99)^99)^99 + p^2',
    ]) {
      const got = await run(['codim', '-'], model(h));
      expect([0, 1, 2], `${h}: ${got.stderr.slice(0, 200)}`).toContain(got.status);
      if (got.status === 2) expect(got.stdout).toBe('');
      expect(got.stderr).not.toMatch(/\n\s+at |Maximum/);
      expect(got.seconds, h).toBeLessThan(20);
    }
  });
  it('names of the prototype are names without a value', async () => {
    for (const name of ['constructor', '__proto__', 'toString', 'hasOwnProperty', 'valueOf', 'prototype']) {
      expect(await refusal(['codim', '-'], model(`p^2 + ${name}*q^2`))).toContain(name);
      await refusal(['codim', '-'], `coordinates: [q]\nmomenta: [p]\nhamiltonian: p^2\n${name}: 1\n`);
    }
    expect((await run(['codim', '-'], model('p^2 + __proto__*q^2', 'parameters: {__proto__: 1}\n'))).status).toBe(0);
    await refusal(['groups', '__proto__']);
    await refusal(['codim', '--group', 'constructor', '--on', 'q1', '--quadratic', 'q1^2']);
    await refusal(['__proto__']);
  });
  it('member access, calls, assignments, strings, code', async () => {
    for (const h of [
      'q.constructor("return 1")()',
      'q["a"]',
      'f(q)',
      'q = 2',
      'q := 2',
      'a = b = q',
      'process.exit(1)',
      'import("fs")',
      'eval("1")',
      '`q`',
      '{q: 1}',
      'q; p',
      '() => q',
      'x -> q',
      '// q',
      '# q',
      'cos',
      'sin(cos)',
      'sqrt',
      'function(q)',
      'unit(5, cm)',
      '5 cm*q',
    ])
      await refusal(['codim', '--hamiltonian', h]);
  });
  it('an alias bomb in YAML', async () => {
    const lines = ['a0: &a0 [x, x, x, x, x, x, x, x, x, x]'];
    for (let k = 1; k < 12; k++) lines.push(`a${k}: &a${k} [${Array.from({ length: 10 }, () => `*a${k - 1}`).join(', ')}]`);
    await refusal(['codim', '-'], `${lines.join('\n')}\nhamiltonian: *a11\n`);
    await refusal(['codim', '-'], 'hamiltonian: &h [*h]\n');
    await refusal(['codim', '-'], 'hamiltonian: !!js/function "function(){}"\ncoordinates: [q]\n');
    await refusal(['codim', '-'], '<<: {hamiltonian: q1^2}\n');
    await refusal(['codim', '-'], 'hamiltonian: p1^2\n---\nhamiltonian: q1^2\n');
  });
  it('NaN and the infinite in every place', async () => {
    for (const value of ['NaN', '.nan', 'Infinity', '.inf', '-.inf', 'null', '~'])
      await refusal(['codim', '-'], model('p^2 + a*q^2', `parameters: {a: ${value}}\n`));
    await refusal(['codim', '-'], 'mass: [[1]]\nstiffness: [[NaN]]\n');
    const file = write('nan.mtx', '%%MatrixMarket matrix array real general\n1 1\nNaN\n');
    await refusal(['codim', '-'], `mass: [[1]]\nstiffness: ${file}\n`);
    const csv = write('inf.csv', 'inf\n');
    await refusal(['codim', '-'], `mass: [[1]]\nstiffness: ${csv}\n`);
    await refusal(['codim', '--quadratic', 'q1^2 + p1^2', '--set', 'a=NaN']);
    await refusal(['codim', '-', '--floating'], model('p^2 + log(q - 1)'));
    await refusal(['codim', '-', '--floating'], model('p^2 + q^2/0.0'));
  });
  it('a model that fails stops every command but check, which answers 1', async () => {
    const broken =
      'coordinates: [q1, q2]\nmomenta: [p1, p2]\nparameters: {mu: 0}\nvary: [mu]\nhamiltonian: p1^2 + p2^2 + q1^2 + 2*q2^2 + mu*q1^4\nsymmetry: {generators: [{name: swap, permutation: [2, 1]}]}\n';
    for (const command of commands) {
      if (command === 'check') {
        const got = await run(['check', '-', '--json'], broken);
        expect(got.status).toBe(1);
        expect(JSON.parse(got.stdout).symmetry.holds).toBe(false);
        expect(JSON.parse(got.stdout).equilibrium.holds).toBe(true);
      } else if (command !== 'events' && command !== 'invariants')
        expect(await refusal([command, '-'], broken), command).toMatch(/symcodim check/);
    }
    const moving = model('p^2/2 + q');
    for (const command of ['codim', 'reduce', 'branches'])
      expect(await refusal([command, '-'], moving.replace('q\n', 'q + 0*mu\nparameters: {mu: 0}\nvary: [mu]\n'))).toMatch(/symcodim check/);
    expect((await run(['check', '-'], moving)).status).toBe(1);
  });
  it('a group without end, a group past the limit, for every command', async () => {
    const shear =
      'coordinates: [q1, q2]\nmomenta: [p1, p2]\nhamiltonian: p1^2 + q1^2*0\nsymmetry: {generators: [{name: g, matrix: [[3/5, -4/5], [4/5, 3/5]]}]}\n';
    for (const command of ['codim', 'components', 'events', 'invariants'])
      await refusal([command, '-'], shear.replace('p1^2 + q1^2*0', 'p1^2 + p2^2'));
    await refusal([
      'components',
      '--group',
      'symmetric:9',
      '--action',
      'permutation',
      '--on',
      'q1,q2,q3,q4,q5,q6,q7,q8,q9',
      '--quadratic',
      '0',
    ]);
    // check gives its full result: the answer is no
    const check = await run(['check', '-', '--json'], shear.replace('p1^2 + q1^2*0', 'p1^2 + p2^2'));
    const found = JSON.parse(check.stdout);
    validResult(found);
    expect([check.status, faults(validResult), found.group.order, found.symmetry.generators[0].invariant]).toEqual([1, '', 0, true]);
    await refusal(['groups', 'symmetric:12']);
    await refusal(['groups', 'cyclic:1000000']);
  });
  it('messages name file, key, value, what was expected and what next', async () => {
    const file = write('named.yaml', model('p^2 + q^2', 'symmetry: {generators: [{name: g, permutation: [7]}]}\n'));
    const text = await refusal(['codim', file]);
    expect(text).toContain('named.yaml');
    expect(text).toMatch(/permutation/);
    expect(text).toMatch(/7/);
    expect(text).toMatch(/expected/);
  });
  it('output that cannot be written', async () => {
    await refusal(['codim', 'samples/three-resonator-ring.yaml', '--latex', '/nonexistent/folder/x.tex']);
    await refusal(['codim', 'samples/three-resonator-ring.yaml', '--json', '--markdown', '-']);
  });
});
