/** The built program as a person runs it: streams, statuses, files, pipes. */
import { execFileSync, spawn, spawnSync } from 'node:child_process';
import { existsSync, mkdtempSync, readdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, describe, expect, it } from 'vitest';
import { commandNames } from '../../src/cli/records/index.ts';

const root = new URL('../../', import.meta.url).pathname;
const program = join(root, 'dist/cli/main.js');
const folder = mkdtempSync(join(tmpdir(), 'symcodim-'));
afterAll(() => {
  rmSync(folder, { recursive: true });
});

const run = (words: readonly string[], input = '', env: Record<string, string> = {}) =>
  spawnSync(process.execPath, [program, ...words], {
    encoding: 'utf8',
    cwd: root,
    input,
    env: { ...process.env, ...env },
    maxBuffer: 1 << 26,
  });
const has = (name: string): boolean => spawnSync('sh', ['-c', `command -v ${name}`]).status === 0;

const rotating = ['--group', 'cyclic:3', '--on', 'q1,p1', '--quadratic', 'mu*(q1^2+p1^2)/2', '--vary', 'mu'];
const sample = 'samples/three-resonator-ring.yaml';

describe('answers', () => {
  it('codim of a sample: text, status, nothing on standard error', () => {
    const { status, stdout, stderr } = run(['codim', sample]);
    expect([status, stderr]).toEqual([0, '']);
    expect(stdout).toMatch(/generic/i);
    expect(stdout).not.toContain('\u001b');
  });

  it('--json prints one JSON object', () => {
    const { status, stdout } = run(['codim', ...rotating, '--set', 'mu=0', '--json']);
    expect(status).toBe(0);
    expect(JSON.parse(stdout)).toMatchObject({ schema: 'symcodim/1', command: 'codim', verdict: { answer: 'generic' } });
  });

  it('a model on standard input', () => {
    const text = readFileSync(join(root, sample), 'utf8');
    expect(JSON.parse(run(['codim', '-', '--json'], text).stdout).verdict.answer).toBe('generic');
  });

  it('an answer of no has status 1', () => {
    const none = ['--quadratic', 'mu*(q1^2+p1^2)/2', '--set', 'mu=0', '--json'];
    expect(run(['codim', ...none]).status).toBe(1);
    expect(run(['codim', ...none, '--parameters', '3']).status).toBe(0);
    expect(run(['check', '--group', 'cyclic:3', '--on', 'q1,q2', '--hamiltonian', '(p1^2+p2^2)/2 + q1^2 + 2*q2^2']).status).toBe(1);
  });

  it('catalogue and one group', () => {
    expect(run(['groups']).stdout).toContain('dihedral:N');
    expect(JSON.parse(run(['groups', 'dihedral:3', '--json']).stdout).group.order).toBe(6);
  });

  it('the version is that of the package', () => {
    expect(run(['--version']).stdout).toBe(`symcodim ${JSON.parse(readFileSync(join(root, 'package.json'), 'utf8')).version}\n`);
  });

  it.each(commandNames)('%s --help', (name) => {
    const { status, stdout, stderr } = run([name, '--help']);
    expect([status, stderr]).toEqual([0, '']);
    expect(stdout).toContain(`symcodim ${name}`);
  });

  it('works without the code cache of the build, and with one that does not fit', () => {
    const copy = join(folder, 'copy');
    execFileSync('mkdir', ['-p', join(copy, 'dist')]);
    execFileSync('cp', ['-r', join(root, 'dist/cli'), join(copy, 'dist/cli')]);
    execFileSync('cp', ['-r', join(root, 'package.json'), join(root, 'groups'), copy]);
    const cache = readdirSync(join(copy, 'dist/cli')).filter((file) => file.endsWith('.cache'));
    expect(cache).toHaveLength(1);
    const there = () => spawnSync(process.execPath, [join(copy, 'dist/cli/main.js'), 'groups', 'Oh'], { encoding: 'utf8' });
    writeFileSync(join(copy, 'dist/cli', cache[0]!), 'no code cache');
    expect(there().stdout).toContain('order 48');
    rmSync(join(copy, 'dist/cli', cache[0]!));
    expect(there().stdout).toContain('order 48');
  });
});

describe('wrong use and wrong input', () => {
  writeFileSync(join(folder, 'binary.yaml'), Buffer.from([0, 1, 2, 255]));
  writeFileSync(join(folder, 'empty.yaml'), '');
  writeFileSync(join(folder, 'typo.yaml'), 'coordinates: [q1]\nhamiltonain: p1^2\n');
  writeFileSync(
    join(folder, 'bomb.yaml'),
    `a: &a [x]\n${Array.from({ length: 25 }, (_, k) => `b${k}: &b${k} [*${k === 0 ? 'a' : `b${k - 1}`}, *${k === 0 ? 'a' : `b${k - 1}`}]`).join('\n')}\n`,
  );
  writeFileSync(join(folder, 'long.yaml'), `coordinates: [q1]\nhamiltonian: p1^2${' + q1^2'.repeat(800_000)}\n`);
  const quadratic = (text: string) => ['codim', '--quadratic', text];

  it.each([
    ['no command', []],
    ['unknown command', ['codmi']],
    ['unknown option', ['codim', sample, '--jsn']],
    ['unknown group', ['codim', '--group', 'cyclick:3', '--on', 'q1,p1', '--quadratic', 'q1^2+p1^2']],
    ['no model', ['codim']],
    ['missing file', ['codim', join(folder, 'none.yaml')]],
    ['a folder', ['codim', folder]],
    ['binary data', ['codim', join(folder, 'binary.yaml')]],
    ['an empty file', ['codim', join(folder, 'empty.yaml')]],
    ['a misspelt key', ['codim', join(folder, 'typo.yaml')]],
    ['an alias bomb', ['codim', join(folder, 'bomb.yaml')]],
    ['a 5 MB expression', ['codim', join(folder, 'long.yaml')]],
    ['NaN', quadratic('NaN*q1^2')],
    ['10 000 nested brackets', quadratic(`${'('.repeat(10_000)}q1${')'.repeat(10_000)}^2`)],
    ['a huge exponent', quadratic('q1^2*1e999999999')],
    ['a huge power', quadratic('2^999999999*q1^2')],
    ['a name of the language', quadratic('constructor*q1^2')],
    ['__proto__', quadratic('__proto__*q1^2')],
    ['member access', quadratic('q1.constructor')],
    ['a call', quadratic('eval(q1)')],
    ['an assignment', quadratic('q1 = 2')],
    ['a mirror that is not symplectic', ['codim', '--group', 'dihedral:5', '--on', 'q1,p1', '--quadratic', 'q1^2+p1^2']],
    ['H that is not invariant', ['codim', '--group', 'cyclic:3', '--on', 'q1,q2', '--hamiltonian', 'p1^2+p2^2+q1^2+2*q2^2']],
    ['no equilibrium', ['codim', '--hamiltonian', 'p1^2/2 + q1']],
    ['an unknown parameter', ['codim', sample, '--set', 'kk=1']],
    ['a file that cannot be written', ['codim', sample, '--latex', join(folder, 'none', 'a.tex')]],
    ['two documents on standard output', ['report', sample, '--latex', '-', '--html', '-']],
  ])('%s: one clear message, status 2, nothing on standard output', (_, words) => {
    const { status, stdout, stderr } = run(words);
    expect(status, stderr).toBe(2);
    expect(stdout).toBe('');
    expect(stderr.trim()).not.toBe('');
    expect(stderr).not.toMatch(/\n\s+at |node:internal|\bundefined\b|\[object/);
    expect(stderr.length).toBeLessThan(5000);
  });

  it('names file, key, what was expected and what to do', () => {
    const { stderr } = run(['codim', join(folder, 'typo.yaml')]);
    for (const piece of ['typo.yaml', 'hamiltonain', 'hamiltonian', 'expected:']) expect(stderr).toContain(piece);
    expect(run(['codim', '--group', 'cyclick:3', '--on', 'q1,p1', '--quadratic', 'q1^2']).stderr).toContain('cyclic:3');
  });
});

describe('pipes and batches', () => {
  it('a closed pipe is success', async () => {
    const child = spawn(process.execPath, [program, 'man'], { cwd: root, stdio: ['ignore', 'pipe', 'pipe'] });
    child.stdout.destroy();
    let messages = '';
    child.stderr.on('data', (chunk) => {
      messages += chunk;
    });
    const status = await new Promise((resolve) => child.on('close', resolve));
    expect([status, messages]).toEqual([0, '']);
  });

  const points = [0, 1, -2].map((mu) => `{"mu": ${mu}}`);
  it.each([['1'], ['2']])('parameter points on %s threads: answers in order, a bad line stops nothing', (jobs) => {
    const input = [points[0], 'nonsense', points[1], '', points[2]].join('\n');
    const { status, stdout } = run(['batch', ...rotating, '--jobs', jobs], input);
    const answers = stdout
      .trim()
      .split('\n')
      .map((line) => JSON.parse(line));
    expect(status).toBe(2);
    expect(answers.map(({ line, status: of }) => [line, of])).toEqual([
      [1, 0],
      [2, 2],
      [3, 0],
      [5, 0],
    ]);
    expect(answers[0].zero).toMatchObject({ codimension: 1, motion: 'passes' });
    expect(answers[2]).toMatchObject({ zero: null, verdict: { answer: 'no event' } });
    expect(answers[1].error.kind).toBe('input');
  });

  it('each line a model', () => {
    const models = [{ quadratic: 'p1^2/2' }, { quadratic: 'p1^2/2', symmetry: { timeReversal: true } }, { quadratic: 'q1^' }];
    const { status, stdout } = run(['batch', '--command', 'check'], models.map((model) => JSON.stringify(model)).join('\n'));
    const answers = stdout
      .trim()
      .split('\n')
      .map((line) => JSON.parse(line));
    expect(status).toBe(2);
    expect(answers.map(({ status: of, group }) => [of, group?.order])).toEqual([
      [0, 1],
      [0, 2],
      [2, undefined],
    ]);
  });

  it('a model that cannot be read stops a batch before its first line', () => {
    const { status, stdout } = run(['batch', join(folder, 'none.yaml')], points.join('\n'));
    expect([status, stdout]).toEqual([2, '']);
  });

  it.runIf(has('parallel'))('shards under GNU parallel', () => {
    const input = `${Array.from({ length: 12 }, (_, k) => `{"mu": ${k % 3}}`).join('\n')}\n`;
    const words = ['--pipe', '-N', '3', '--keep-order', '--quote', process.execPath, program, 'batch', '--jobs', '1', ...rotating];
    const { stdout } = spawnSync('parallel', words, { encoding: 'utf8', input });
    const answers = stdout
      .trim()
      .split('\n')
      .map((line) => JSON.parse(line).verdict.answer);
    expect(answers).toEqual(Array.from({ length: 12 }, (_, k) => (k % 3 === 0 ? 'generic' : 'no event')));
  });
});

describe('README', () => {
  const readme = readFileSync(join(root, 'README.md'), 'utf8');
  const shown = [...readme.matchAll(/```console\n\$ symcodim ([^\n]*)\n([\s\S]*?)```/g)].map((match) => [match[1]!, match[2]!] as const);

  it('shows what the program prints', () => {
    expect(shown.length).toBeGreaterThan(0);
  });

  it.each(shown)('symcodim %s', (line, text) => {
    const words = [...line.matchAll(/"([^"]*)"|(\S+)/g)].map((match) => match[1] ?? match[2]!);
    const { stdout } = run(words);
    // Dots stand for what is left out at the end.
    const beginning = text.replace(/…\n$/, '');
    expect(stdout.slice(0, beginning.length)).toBe(beginning);
    if (beginning === text) expect(stdout).toBe(text);
  });
});

describe('shells and manual', () => {
  it.each(['bash', 'zsh', 'fish'].filter(has))('%s reads its completions', (shell) => {
    const script = run(['completions', shell]).stdout;
    const file = join(folder, `completion.${shell}`);
    writeFileSync(file, script);
    const { status, stderr } = spawnSync(shell, ['-n', file], { encoding: 'utf8' });
    expect([status, stderr]).toEqual([0, '']);
  });

  it.runIf(has('bash'))('bash offers commands, options and values', () => {
    const file = join(folder, 'completion.bash');
    writeFileSync(file, run(['completions', 'bash']).stdout);
    const offer = (...words: string[]): string[] => {
      const line = `source ${file}; COMP_WORDS=(symcodim ${words.map((word) => `'${word}'`).join(' ')}); COMP_CWORD=${words.length}; _symcodim; printf '%s\\n' "\${COMPREPLY[@]}"`;
      return execFileSync('bash', ['-c', line], { encoding: 'utf8' }).trim().split('\n');
    };
    expect(offer('cod')).toEqual(['codim']);
    expect(offer('codim', '--hami')).toEqual(['--hamiltonian']);
    expect(offer('codim', '--group', 'icos')).toEqual(['icosahedral']);
    expect(offer('codim', '--group', 'dih')).toEqual(['dihedral:']);
    expect(offer('completions', 'f')).toEqual(['fish']);
    expect(offer('codim', '--neutral', '')).toEqual(['find']);
  });

  it.runIf(has('fish'))('fish offers commands, options and values', () => {
    const file = join(folder, 'completion.fish');
    writeFileSync(file, run(['completions', 'fish']).stdout);
    const offer = (line: string): string[] =>
      execFileSync('fish', ['-c', `source ${file}; complete -C '${line}'`], { encoding: 'utf8' })
        .trim()
        .split('\n')
        .map((entry) => entry.split('\t')[0]!);
    expect(offer('symcodim cod')).toEqual(['codim']);
    expect(offer('symcodim codim --hami')).toEqual(['--hamiltonian']);
    expect(offer('symcodim codim --group icos')).toEqual(['icosahedral']);
    expect(offer('symcodim completions b')).toEqual(['bash']);
  });

  it.runIf(has('groff'))('groff sets the manual page without a warning', () => {
    const { status, stdout, stderr } = spawnSync('groff', ['-man', '-Kutf8', '-Tutf8', '-P-cbou', '-ww'], {
      encoding: 'utf8',
      input: run(['man']).stdout,
    });
    expect([status, stderr]).toEqual([0, '']);
    expect(stdout).toContain('EXIT STATUS');
  });

  it('the table of the README is written to a file', () => {
    const file = join(folder, 'table.md');
    expect(run(['man', '--markdown', file]).status).toBe(0);
    expect(readFileSync(file, 'utf8')).toBe(run(['man', '--markdown', '-']).stdout);
    expect(existsSync(file)).toBe(true);
  });
});
