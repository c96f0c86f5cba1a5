/** Which numbers are exact, which are floating, and what the result says of it. By hand throughout. */
import { describe, expect, it } from 'vitest';
import { answer, json, refusal, run, words } from './support/program.ts';

/** codim of p^2/2 + (value)*q^2/2: a zero event exactly where the value is 0. */
const stiffness = (value: string, more = ''): Promise<Awaited<ReturnType<typeof answer>>> =>
  answer(`codim --coordinates q --momenta p --quadratic "p^2/2 + (${value})*q^2/2" ${more}`);

describe.concurrent('exact', () => {
  it('these are exactly 0', async () => {
    const values = [
      '0.1 - 1/10',
      '1e-3 - 1/1000',
      '0.1 + 0.2 - 0.3',
      '2.50e2 - 250',
      'sqrt(2)^2 - 2',
      'sqrt(2)*sqrt(3) - sqrt(6)',
      'sqrt(8) - 2*sqrt(2)',
      'sqrt(1/2) - sqrt(2)/2',
      'sqrt(0.25) - 1/2',
      'cos(pi/3) - 1/2',
      'sin(pi/12) - (sqrt(6) - sqrt(2))/4',
      'cos(2*pi/5) - (sqrt(5) - 1)/4',
      'tan(pi/4) - 1',
      'tan(pi/3) - sqrt(3)',
      'tan(pi/8) - sqrt(2) + 1',
      'cos(2*pi/7) + cos(4*pi/7) + cos(6*pi/7) + 1/2',
      '8*cos(pi/7)*cos(2*pi/7)*cos(4*pi/7) + 1',
      'sin(pi/10)*sin(3*pi/10) - 1/4',
      'cos(0.25*pi) - sqrt(2)/2',
      '1/(sqrt(2) - 1) - sqrt(2) - 1',
      '(1 + sqrt(5))/2*(1 - sqrt(5))/2 + 1',
      'log(2) - log(2)',
      'exp(1) - exp(1)',
      '2^(1/3) - 2^(1/3)',
      'log(1)',
      'sin(pi)',
      'exp(0) - 1',
      'pi - pi',
      '3*pi/pi - 3',
      'sqrt(2)^-2 - 1/2',
      '4^(1/2) - 2',
      '8^(1/3) - 2',
      '(2^(1/3))^3 - 2',
      'exp(log(2)) - 2',
      'sqrt(3 + 2*sqrt(2)) - 1 - sqrt(2)',
    ];
    const lines = values.map((value) => JSON.stringify({ coordinates: ['q'], momenta: ['p'], quadratic: `p^2/2 + (${value})*q^2/2` }));
    const got = await run(['batch'], `${lines.join('\n')}\n`);
    const answers = got.stdout
      .trim()
      .split('\n')
      .map((line) => JSON.parse(line));
    const seen = values.map((value, i) => {
      const r = answers[i].result ?? answers[i];
      return `${value}: ${r.arithmetic} ${r.zero?.blocks} ${r.verdict?.answer}`;
    });
    expect(seen).toEqual(values.map((value) => `${value}: exact 2 generic`));
  });
  it.each([
    ['0.1', '1/10'],
    ['1e-3', '1/1000'],
    ['-2.50', '-5/2'],
    ['12345678901234567890.5', '24691357802469135781/2'],
    ['sqrt(2)/2', 'sqrt(2)/2'],
  ])('%s as a value of a parameter is %s in the result', async (typed, shown) => {
    const r = await json(`codim --coordinates q --momenta p --quadratic "p^2 + q^2 + a*q^2*0" --set a=${typed}`);
    expect([r.arithmetic, r.model.parameters.a]).toEqual(['exact', shown]);
  });
  it('differences far below a double are seen', async () => {
    expect((await stiffness('1e-40')).zero).toBeNull();
    expect((await stiffness('10^30 + 1 - 10^30 - 1')).zero.blocks).toEqual([2]);
    // a Pell solution: 665857/470832 is sqrt(2) to 12 digits
    expect((await stiffness('sqrt(2) - 665857/470832')).zero).toBeNull();
  });
  it('values are strings, floating ones numbers', async () => {
    const exact = await stiffness('1/3');
    expect(exact.equilibrium.gradient).toBe('0');
    const floating = await stiffness('1/3', '--floating');
    expect(typeof floating.equilibrium.gradient).toBe('number');
    expect(floating.arithmetic).toBe('floating');
  });
});

describe.concurrent('floating', () => {
  it.each([
    ['2^(1/3)', /2\^\(1\/3\)|root/],
    ['exp(1)', /exp\(1\)/],
    ['log(2)', /log\(2\)/],
    ['pi', /pi/],
    ['sin(1)', /sin\(1\)/],
    ['sqrt(pi)', /pi/],
    ['sqrt(1 + sqrt(2))', /sqrt\(/],
  ])('%s makes it floating, and the result says so', async (value, term) => {
    const got = await run(words(`codim --coordinates q --momenta p --quadratic "p^2/2 + (${value})*q^2/2" --json`));
    const r = JSON.parse(got.stdout);
    expect([got.status, r.arithmetic, r.zero]).toEqual([0, 'floating', null]);
    expect(JSON.stringify({ ...r, model: undefined, certificate: undefined })).toMatch(term);
  });
  it('a floating zero is found, at the tolerance', async () => {
    const r = await stiffness('log(6) - log(2) - log(3)');
    expect([r.zero?.blocks, r.verdict.answer]).toEqual([[2], 'generic']);
    const f = await stiffness('sqrt(2)^2 - 2', '--floating');
    expect([f.arithmetic, f.zero.blocks, f.zero.codimension, f.verdict.answer]).toEqual(['floating', [2], 1, 'generic']);
  });
  it('between the two: undecided, status 3', async () => {
    // One of two modes is almost at rest: balanced, its entries are sqrt(2e-14) = 1.4e-7 beside 1.
    const line = 'codim --floating --quadratic "p1^2/2 + p2^2/2 + q2^2/2 + 2e-14*q1^2/2" --json';
    const got = await run(words(line));
    const r = JSON.parse(got.stdout);
    expect([got.status, r.verdict.answer]).toEqual([3, 'undecided']);
    expect(r.verdict.because).toMatch(/e-[78]/);
    expect((await answer(`${line} --tolerance 1e-10`)).verdict.answer).toBe('no event');
    // then all of that mode counts as zero: [1, 1], codimension 3
    expect((await answer(`${line} --tolerance 1e-5`)).zero).toMatchObject({ blocks: [1, 1], codimension: 3 });
    expect((await json(line.replace('--floating ', ''))).verdict.answer).toBe('no event');
  });
  it('--floating polishes the equilibrium and reports the step; exact input must satisfy it exactly', async () => {
    const model = 'coordinates: [q]\nmomenta: [p]\nhamiltonian: p^2/2 + q^4/4 - q^2/2\nequilibrium: {q: 1.0000001}\n';
    expect(await refusal('codim -', model)).toMatch(/equilibrium/);
    const r = await json('codim - --floating', model);
    expect(r.equilibrium.holds).toBe(true);
    expect(r.equilibrium.polished.step).toBeGreaterThan(1e-8);
    expect(r.equilibrium.polished.step).toBeLessThan(1e-6);
    const file = await json('codim -', `${model}numbers: floating\n`);
    expect([file.arithmetic, file.zero]).toEqual(['floating', null]);
    // far from any equilibrium: refused
    await refusal('codim - --floating', 'coordinates: [q]\nmomenta: [p]\nhamiltonian: p^2/2 + q\n');
  });
});

describe.concurrent('spellings', () => {
  it.each([
    '1/2*q1^2*p1/q1',
    '2 q1 q1',
    '1/2 q1^2',
    'q1(q1+1)',
    'a(q1)',
    '2^3^2*q1^2',
    '-q1^2^2',
    'q1^p1',
    'q1**2',
    'q1 = 1',
    'q1;p1',
    '[q1]',
    'q1.a',
    'q1!',
    "q1'",
    'f(q1)',
    'sin q1',
    'sqrt()',
    'sqrt(q1, 2)',
    '1..2*q1',
    '1e400*q1^2*1e400^99',
    '0x10*q1^2',
    'q1 % 2',
    'q1 > 0',
    'true',
    '"q1"',
    'i^2*q1^2',
    'q1?1:2',
    'NaN*q1^2',
    'Infinity*q1^2',
    '',
    ' ',
    '+',
    '(q1',
    'q1)',
    'q1^1e9',
    'q1^99999999',
    '(q1+p1)^5000',
    '1/0*q1^2',
    '0^0*q1^2/0',
    'log(0)*q1^2',
    'sqrt(-1)*q1^2',
    'tan(pi/2)*q1^2',
    'constructor*q1^2',
    '__proto__*q1^2',
    'q1.constructor',
    'toString()',
  ])('%s is refused or read, never a crash', async (text) => {
    const got = await run(['codim', '--hamiltonian', text, '--json', '--set', 'unused=1']);
    expect([0, 1, 2, 3], got.stderr.slice(0, 400)).toContain(got.status);
    expect(got.stderr).not.toMatch(/\n\s+at |node:internal|undefined|\[object/);
    if (got.status === 2) expect([got.stdout, got.stderr.length > 20]).toEqual(['', true]);
    else JSON.parse(got.stdout);
    expect(got.seconds).toBeLessThan(20);
  });
  it('ambiguous spellings are refused with the clear one', async () => {
    expect(await refusal('codim --hamiltonian "p1^2/2 q1"')).toMatch(/\*/);
    expect(await refusal('codim --hamiltonian "p1^2 + a(q1+1)" --set a=1')).toMatch(/a\*\(|\*/);
  });
});
