/** The manual page in the man macros of troff, made from the records. */
import { exitStatuses, groupHeadings, purpose } from './help.ts';
import { commands, optionGroups, options, spelling, usage } from './records/index.ts';

/** Text with the signs guarded that troff gives a meaning to. */
export function troff(text: string): string {
  return text
    .replaceAll('\\', '\\(rs')
    .replaceAll('-', '\\-')
    .replaceAll('−', '\\(mi')
    .replaceAll('↦', '\\(->')
    .replaceAll('…', '...')
    .replaceAll('^', '\\(ha')
    .replaceAll('~', '\\(ti')
    .replace(/^([.'])/gm, '\\&$1');
}

/** The manual page of the given version. */
export function manPage(version: string): string {
  const lines = [
    `.TH SYMCODIM 1 "" "symcodim ${version}" "User Commands"`,
    '.SH NAME',
    'symcodim \\- zero\\-eigenvalue events of symmetric Hamiltonian systems',
  ];
  lines.push('.SH SYNOPSIS', '.B symcodim', '.I COMMAND', '.RI [ MODEL ]', '.RI [ OPTIONS ]', '.SH DESCRIPTION', troff(purpose));
  lines.push(
    '.PP',
    troff('MODEL is the path of a model file in YAML or JSON, or - for standard input. Without it the model is declared by options.'),
    '.SH COMMANDS',
  );
  for (const command of commands) lines.push('.TP', `.B ${troff(usage(command))}`, troff(command.long));
  lines.push('.SH OPTIONS');
  for (const group of optionGroups) {
    lines.push(`.SS ${groupHeadings[group]}`);
    for (const option of options.filter((entry) => entry.group === group)) {
      lines.push('.TP', `.B ${troff(spelling(option))}`, troff(option.long), '.br', troff(`Example: ${option.example}`));
      if (option.group !== 'general') lines.push('.br', troff(`Commands: ${option.commands.join(', ')}.`));
    }
  }
  lines.push('.SH EXIT STATUS');
  for (const [status, meaning] of exitStatuses) lines.push('.TP', `.B ${status}`, troff(`${meaning}.`));
  lines.push('.SH ENVIRONMENT', '.TP', '.B NO_COLOR', 'No colour on the terminal when set to anything but the empty text.', '.SH EXAMPLES');
  for (const command of commands) for (const example of command.examples) lines.push('.PP', '.nf', troff(example), '.fi');
  return lines.join('\n');
}
