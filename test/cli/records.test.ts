/** The records as data: what every one of them must satisfy, and that all that is made of them holds them all. */
import { describe, expect, it } from 'vitest';
import { completionScript } from '../../src/cli/completions.ts';
import { commandHelp, programHelp } from '../../src/cli/help.ts';
import { manPage } from '../../src/cli/man.ts';
import { parse } from '../../src/cli/parse.ts';
import { commandNames, commandRecord, commands, options, optionsOf, spelling } from '../../src/cli/records/index.ts';
import { referenceTable } from '../../src/cli/reference-table.ts';

const style = { width: 80, heading: (text: string) => text };
const groups = ['cyclic:N', 'dihedral:N', 'Oh'];

/** Words of a command line, quotes taken off, as a shell does. */
function shellWords(line: string): string[] {
  return [...line.matchAll(/"([^"]*)"|(\S+)/g)].map((match) => match[1] ?? match[2]!);
}

describe('records', () => {
  it('name every command once, in the order of the list', () => {
    expect(commands.map(({ name }) => name)).toEqual([...commandNames]);
  });

  it('name every option and letter once', () => {
    const names = options.flatMap(({ name, letter }) => (letter === undefined ? [name] : [name, letter]));
    expect(new Set(names).size).toBe(names.length);
  });

  it.each(options.map((option) => [option.name, option] as const))(
    '--%s is described in short, at length and by an example',
    (_, option) => {
      expect(option.name).toMatch(/^[a-z]+(-[a-z]+)*$/);
      expect(option.short.length).toBeLessThanOrEqual(80);
      expect(option.short).not.toMatch(/\.$/);
      expect(option.long).toMatch(/\.$/);
      expect(option.example).toContain(`--${option.name}`);
      expect(option.commands.length).toBeGreaterThan(0);
      if (option.choices !== undefined) expect(option.value).toBeDefined();
    },
  );

  it.each(options.filter(({ group }) => group !== 'general').map((option) => [option.name, option] as const))(
    'the example of --%s is understood by each of its commands',
    (_, option) => {
      for (const name of option.commands) {
        const command = commandRecord(name);
        const needed = command.argument?.required === true ? [command.argument.choices?.[0] ?? 'x'] : [];
        expect(parse([name, ...needed, ...shellWords(option.example)]).kind).toBe('invocation');
      }
    },
  );

  it.each(commands.map((command) => [command.name, command] as const))('the examples of %s are understood', (name, command) => {
    expect(command.long).toMatch(/\.$/);
    expect(command.short).not.toMatch(/\.$/);
    for (const example of command.examples) {
      for (const part of example.split(/&&|\||>|</).filter((piece) => /(^|\s)symcodim /.test(piece))) {
        const words = shellWords(part.slice(part.indexOf('symcodim ') + 'symcodim '.length));
        const parsed = parse(words);
        expect(parsed.kind).toBe('invocation');
      }
      expect(example).toContain(name === 'man' ? 'symcodim man' : `symcodim ${name}`);
    }
  });
});

describe('what is made of the records', () => {
  it('program help lists every command', () => {
    for (const command of commands) expect(programHelp(style)).toContain(`  ${command.name} `);
  });

  it.each(commandNames)('help of %s lists its options and no others', (name) => {
    const text = commandHelp(name, style);
    for (const option of options) {
      expect(text.includes(`  ${spelling(option)}`)).toBe(optionsOf(name).includes(option));
    }
  });

  it.each([40, 60, 80, 100])('help keeps to a width of %i but for words and examples', (width) => {
    for (const name of commandNames) {
      for (const line of commandHelp(name, { ...style, width }).split('\n')) {
        if (line.includes('symcodim ')) continue;
        const longestWord = Math.max(
          ...line
            .trim()
            .split(' ')
            .map((word) => word.length),
        );
        expect(line.length, line).toBeLessThanOrEqual(Math.max(width, 30 + 32, longestWord));
      }
    }
  });

  it('man page and README table hold every command and option', () => {
    const man = manPage('1.2.3').replaceAll('\\-', '-');
    const table = referenceTable();
    for (const option of options) {
      expect(man).toContain(`.B ${spelling(option)}`.replaceAll('…', '...'));
      expect(table).toContain(`\`${spelling(option)}\``);
    }
    for (const command of commands) {
      expect(man).toContain(`.B symcodim ${command.name}`);
      expect(table).toContain(`\`symcodim ${command.name}`);
    }
    expect(man).toContain('symcodim 1.2.3');
  });

  it('man page guards what troff would obey', () => {
    for (const line of manPage('0').split('\n')) expect(line).toMatch(/^(\.(TH|SH|SS|TP|B|I|RI|PP|nf|fi|br)( |$)|[^.'])/);
  });

  it.each(['bash', 'zsh', 'fish'] as const)('completions for %s offer every command, option and group', (shell) => {
    const script = completionScript(shell, groups);
    for (const command of commands) expect(script).toContain(command.name);
    for (const option of options) expect(script).toContain(shell === 'fish' ? `-l ${option.name}` : `--${option.name}`);
    expect(script).toContain('cyclic');
    expect(script).not.toContain('cyclic:N');
    expect(script).toContain('Oh');
  });
});
