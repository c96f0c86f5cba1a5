/** Command lines as they are typed, and what is understood. */
import { describe, expect, it } from 'vitest';
import type { Invocation } from '../../src/cli/invocation.ts';
import { parse } from '../../src/cli/parse.ts';
import { options } from '../../src/cli/records/index.ts';
import { UsageError } from '../../src/errors/index.ts';
import { DECLARING_OPTIONS, declare, SETTING_OPTIONS } from '../../src/model/declaration/options.ts';

function understood(...words: string[]): Invocation {
  const parsed = parse(words);
  if (parsed.kind !== 'invocation') throw new Error(parsed.kind);
  return parsed.invocation;
}

function refused(...words: string[]): UsageError {
  try {
    parse(words);
  } catch (error) {
    if (error instanceof UsageError) return error;
    throw error;
  }
  throw new Error('understood');
}

/** The command line as the model layer reads it. */
function declared(...words: string[]): ReturnType<typeof declare> {
  return declare({}, understood(...words).uses);
}

describe('understood command lines', () => {
  it('a model file with values of parameters, in the order typed', () => {
    const { command, argument, uses, study } = understood(
      'codim',
      'ring.yaml',
      '--set',
      'c=-1/3,k=2',
      '--vary',
      'c,k',
      '--vary=d',
      '--parameters',
      '2',
    );
    expect({ command, argument, study }).toEqual({ command: 'codim', argument: 'ring.yaml', study: { find: false, elliptic: false } });
    expect(uses).toEqual([
      { name: 'set', value: 'c=-1/3,k=2' },
      { name: 'vary', value: 'c,k' },
      { name: 'vary', value: 'd' },
      { name: 'parameters', value: '2' },
    ]);
  });

  it('an action belongs to the list after it, and lists keep their order', () => {
    const { groups } = declared(
      'components',
      '--group',
      'dihedral:3',
      '--on',
      'qa,qb',
      '--action',
      'ring',
      '--on',
      'q1,q2,q3',
      '--on',
      'qu, qv',
    );
    expect(groups[0]?.on).toEqual([{ on: ['qa', 'qb'] }, { action: 'ring', on: ['q1', 'q2', 'q3'] }, { on: ['qu', 'qv'] }]);
  });

  it('values may begin with a dash or hold an equals sign', () => {
    expect(declared('codim', '--quadratic', '-q1^2').energy).toEqual({ kind: 'quadratic', text: '-q1^2' });
    expect(declared('codim', '--quadratic=-q1^2').energy).toEqual({ kind: 'quadratic', text: '-q1^2' });
    expect(declared('codim', '--quadratic', 'd^2', '--define', 'd=q1-q2').define).toEqual(new Map([['d', 'q1-q2']]));
    expect(declared('sweep', '--quadratic', 'c*q1^2', '--range', 'c=-1/2:sqrt(2):40').range).toEqual(
      new Map([['c', { from: '-1/2', to: 'sqrt(2)', steps: 40 }]]),
    );
  });

  it('switches, standard input, a lone --', () => {
    expect(understood('check', '--find', '-')).toMatchObject({ argument: '-', study: { find: true } });
    expect(understood('check', '--', '--odd-name.yaml').argument).toBe('--odd-name.yaml');
    expect(
      declared('codim', '--quadratic', 'q1^2', '--floating', '--time-reversal', '--tolerance', '1e-7', '--neutral', 'find'),
    ).toMatchObject({
      numbers: 'floating',
      timeReversal: true,
      tolerance: '1e-7',
      neutralFind: true,
    });
    expect(understood('groups', 'Oh', '--order-limit', '50')).toMatchObject({ orderLimit: 50, uses: [] });
    expect(understood('batch', '--command', 'check', '--jobs', '3').batch).toEqual({ command: 'check', jobs: 3 });
  });

  it('output goes where it is sent', () => {
    expect(understood('report', 'm.yaml', '--latex', '-', '--fragment', '-q', '--no-color').output).toEqual({
      json: false,
      quiet: true,
      color: false,
      fragment: true,
      files: { latex: '-' },
    });
    expect(understood('codim', 'm.yaml', '--json', '--svg', 'a.svg').output.files).toEqual({ svg: 'a.svg' });
  });

  it('nothing that was not typed is handed on', () => {
    expect(understood('codim', 'm.yaml')).toEqual({
      command: 'codim',
      argument: 'm.yaml',
      uses: [],
      study: { find: false, elliptic: false },
      output: { json: false, quiet: false, color: true, fragment: false, files: {} },
    });
  });

  it('the model layer knows every option that is handed to it, and no other is marked', () => {
    const marked = options.filter(({ model }) => model === true).map(({ name }) => name);
    expect(marked.sort()).toEqual([...DECLARING_OPTIONS, ...SETTING_OPTIONS].sort());
  });

  it('help and version', () => {
    expect(parse([])).toEqual({ kind: 'help' });
    expect(parse(['help', 'codim'])).toEqual({ kind: 'help', command: 'codim' });
    expect(parse(['codim', 'x.yaml', '-h'])).toEqual({ kind: 'help', command: 'codim' });
    expect(parse(['completions', '--help'])).toEqual({ kind: 'help', command: 'completions' });
    expect(parse(['--version'])).toEqual({ kind: 'version' });
  });
});

describe('refused command lines', () => {
  it.each([
    [['codmi', 'm.yaml'], "unknown command 'codmi'", 'symcodim codim'],
    [['m.yaml'], "unknown command 'm.yaml'", 'symcodim codim m.yaml'],
    [['constructor'], "unknown command 'constructor'", 'symcodim --help'],
    [['--json', 'codim'], 'command is missing', 'symcodim --help'],
    [['codim', '--jsno'], "unknown option '--jsno'", '--json'],
    [['codim', '--constructor'], "unknown option '--constructor'", 'symcodim codim --help'],
    [['check', '--elliptic'], 'check has no option --elliptic', 'symcodim check --help'],
    [['codim', '--json=yes'], '--json takes no value', 'symcodim codim --help'],
    [['codim', '--group'], '--group has no value', 'dihedral:3'],
    [['codim', 'a.yaml', 'b.yaml'], "'b.yaml'", 'symcodim codim --help'],
    [['man', 'codim'], "'codim'", 'symcodim man --help'],
    [['completions'], 'SHELL', 'symcodim completions --help'],
    [['completions', 'bahs'], "'bahs'", 'bash'],
    [['codim', '--neutral', 'finds'], "'finds'", 'find'],
    [['codim', '--group', 'a', '--group', 'b'], 'twice', 'remove one'],
    [['groups', '--order-limit', '0'], "'0'", '--order-limit 1000000'],
    [['groups', '--order-limit', '9999999999999999'], '9999999999999999', '--order-limit 1000000'],
    [['batch', '--jobs', '1.5'], "'1.5'", '--jobs 2'],
    [['batch', '--command', 'report'], "'report'", '--command'],
    [['report', '--latex', '-', '--html', '-'], 'both write to standard output', 'file name'],
    [['report', '--json', '--html', '-'], '--json and --html -', 'file name'],
    [['report', '--latex', 'a', '--html', 'a'], "'a'", ''],
    [['report', '--fragment'], '--fragment goes with --latex', '--latex FILE --fragment'],
    [['report', '--latex', ''], 'empty file name', ''],
  ])('%j', (words, message, next) => {
    const error = refused(...words);
    expect(error.message).toContain(message);
    expect(error.culprit.next ?? '').toContain(next);
  });

  it.each([
    ['codim', 'm.yaml', '--group', 'cyclic:3'],
    ['codim', '--group', 'cyclic:3', '--action', 'ring'],
    ['codim', '--group', 'cyclic:3', '--on', 'q1,,q2'],
    ['codim', '--quadratic', 'q1^2', '--set', 'mu'],
    ['codim', '--quadratic', 'q1^2', '--parameters', '-1'],
    ['codim', '--quadratic', 'q1^2', '--tolerance', 'NaN'],
    ['sweep', '--quadratic', 'q1^2', '--range', 'c=0:1:0'],
  ])('the model layer refuses %s %s %s %s', (...words) => {
    const { argument, uses } = understood(...words);
    expect(() => declare(argument === undefined ? {} : { path: argument }, uses)).toThrow(UsageError);
  });

  it('a long value is shown in part', () => {
    const error = refused('groups', '--order-limit', 'x'.repeat(100_000));
    expect(error.message.length).toBeLessThan(200);
  });
});
