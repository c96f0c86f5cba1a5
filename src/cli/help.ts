/** Help texts, made from the records. */
import { type CommandName, commandRecord, commands, type OptionGroup, optionGroups, optionsOf, spelling, usage } from './records/index.ts';
import { columns, wrapParagraph } from './wrap.ts';

/** Exit statuses, in the words of help, man page and README. */
export const exitStatuses: readonly (readonly [status: number, meaning: string])[] = [
  [0, 'answered'],
  [1, 'answered, and the answer is no: check finds a failure, the zero event is not generic (codim, report), verify disagrees'],
  [2, 'wrong use or wrong input; the message says where and what to do'],
  [3, 'undecided at the stated tolerance'],
  [70, 'a defect of the program'],
];

/** What the program is for, in one sentence. */
export const purpose =
  'How does an equilibrium of a Hamiltonian system with a finite symmetry group lose stability, and is a multiple zero eigenvalue forced by the symmetry or an accident?';

/** How help is to be set. */
export interface HelpStyle {
  readonly width: number;
  /** Makes a heading stand out, where the terminal can. */
  readonly heading: (text: string) => string;
}

/** Two columns: what is typed, and what it does. */
function table(rows: readonly (readonly [string, string])[], width: number): string {
  const left = Math.min(26, Math.max(...rows.map(([typed]) => columns(typed))));
  return rows
    .map(([typed, does]) => {
      const text = wrapParagraph(does, width - left - 4).replaceAll('\n', `\n${' '.repeat(left + 4)}`);
      const gap = columns(typed) > left ? `\n${' '.repeat(left + 4)}` : ' '.repeat(left + 2 - columns(typed));
      return `  ${typed}${gap}${text}`;
    })
    .join('\n');
}

/** The help of the whole program. */
export function programHelp(style: HelpStyle): string {
  const rows = commands.map((command) => [command.name, command.short] as const);
  return [
    wrapParagraph(`symcodim: ${purpose}`, style.width),
    `${style.heading('Usage:')} symcodim COMMAND [MODEL] [OPTIONS]`,
    `${style.heading('Commands')}\n${table(rows, style.width)}`,
    `${style.heading('Examples')}\n${['symcodim codim samples/three-resonator-ring.yaml', 'symcodim groups dihedral:3', 'symcodim codim --help'].map((line) => `  ${line}`).join('\n')}`,
    `${style.heading('Exit status')}\n${table(
      exitStatuses.map(([status, meaning]) => [String(status), meaning] as const),
      style.width,
    )}`,
    wrapParagraph(
      'symcodim COMMAND --help lists the options of a command; symcodim man prints the manual page; symcodim --version the version.',
      style.width,
    ),
  ].join('\n\n');
}

/** Headings of the groups of options. */
export const groupHeadings: Readonly<Record<OptionGroup, string>> = {
  symmetry: 'Symmetry',
  Hamiltonian: 'Hamiltonian',
  study: 'Study',
  output: 'Output',
  general: 'General',
};

/** The help of one command. */
export function commandHelp(name: CommandName, style: HelpStyle): string {
  const record = commandRecord(name);
  const parts = [`${style.heading('Usage:')} ${usage(record)}`, wrapParagraph(record.long, style.width)];
  if (record.argument !== undefined)
    parts.push(table([[record.argument.name, withChoices(record.argument.short, record.argument.choices)]], style.width));
  for (const group of optionGroups) {
    const rows = optionsOf(name)
      .filter((option) => option.group === group)
      .map((option) => [spelling(option), option.repeatable === true ? `${option.short} (repeatable)` : option.short] as const);
    if (rows.length > 0) parts.push(`${style.heading(groupHeadings[group])}\n${table(rows, style.width)}`);
  }
  parts.push(`${style.heading('Examples')}\n${record.examples.map((line) => `  ${line}`).join('\n')}`);
  return parts.join('\n\n');
}

function withChoices(text: string, choices: readonly string[] | undefined): string {
  return choices === undefined ? text : `${text}: ${choices.join(', ')}`;
}
