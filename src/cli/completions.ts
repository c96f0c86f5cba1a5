/** Completion scripts for the shells, made from the records. */
import { type CommandName, type Completion, commandNames, commands, optionsOf } from './records/index.ts';

export type Shell = 'bash' | 'zsh' | 'fish';

/**
 * The script for a shell, to be written where the shell looks for it. `groups` are the names of the
 * catalogue; of a family such as cyclic:N the beginning is offered, and the number is typed.
 */
export function completionScript(shell: Shell, groups: readonly string[]): string {
  const names = groups.map((name) => name.replace(/:N$/, ':'));
  if (shell === 'bash') return bash(names);
  return shell === 'zsh' ? zsh(names) : fish(names);
}

const flags = (name: CommandName): string[] =>
  optionsOf(name).flatMap((option) => [...(option.letter === undefined ? [] : [`-${option.letter}`]), `--${option.name}`]);

/** What bash offers for a value or an argument. */
function bashOffer(completion: Completion | undefined, choices: readonly string[] | undefined, groups: readonly string[]): string {
  if (choices !== undefined) return `COMPREPLY=($(compgen -W '${choices.join(' ')}' -- "$word"))`;
  // After the beginning of a family, such as dihedral:, the number is typed without a blank.
  if (completion === 'group')
    return `COMPREPLY=($(compgen -W '${groups.join(' ')}' -- "$word")); [[ $COMPREPLY == *: ]] && compopt -o nospace 2>/dev/null`;
  if (completion === 'file') return `COMPREPLY=($(compgen -f -- "$word"))`;
  return 'COMPREPLY=()';
}

function bash(groups: readonly string[]): string {
  const lines = [
    '# bash completion for symcodim',
    '_symcodim() {',
    '  local word command previous',
    '  COMPREPLY=()',
    // Bash parts words at = and :, which stand in our values.
    '  word="$' + '{COMP_WORDS[COMP_CWORD]}"; previous="$' + '{COMP_WORDS[COMP_CWORD-1]}"; command="$' + '{COMP_WORDS[1]}"',
    '  if [ "$COMP_CWORD" -eq 1 ]; then',
    `    COMPREPLY=($(compgen -W '${commandNames.join(' ')} --help --version' -- "$word")); return`,
    '  fi',
    '  case "$command $previous" in',
  ];
  for (const command of commands) {
    for (const option of optionsOf(command.name)) {
      if (option.value !== undefined)
        lines.push(`    '${command.name} --${option.name}') ${bashOffer(option.completion, option.choices, groups)}; return ;;`);
    }
  }
  lines.push('  esac', '  case "$command" in');
  for (const command of commands) {
    lines.push(
      `    ${command.name})`,
      `      case "$word" in`,
      `        -*) COMPREPLY=($(compgen -W '${flags(command.name).join(' ')}' -- "$word")) ;;`,
    );
    lines.push(`        *) ${bashOffer(command.argument?.completion, command.argument?.choices, groups)} ;;`, '      esac ;;');
  }
  lines.push('  esac', '}', 'complete -o filenames -o bashdefault -F _symcodim symcodim');
  return lines.join('\n');
}

/** Text inside single quotes of zsh's _arguments: brackets and colons carry meaning there. */
const zshText = (text: string): string => text.replace(/[[\]:\\]/g, '\\$&').replaceAll("'", "'\\''");

function zshOffer(completion: Completion | undefined, choices: readonly string[] | undefined, groups: readonly string[]): string {
  if (choices !== undefined) return `(${choices.join(' ')})`;
  if (completion === 'group') return `(${groups.map((name) => name.replace(':', '\\:')).join(' ')})`;
  return completion === 'file' ? '_files' : ' ';
}

function zsh(groups: readonly string[]): string {
  const lines = ['#compdef symcodim', '_symcodim() {', '  local -a commands', '  commands=('];
  for (const command of commands) lines.push(`    '${command.name}:${command.short.replaceAll("'", "'\\''").replaceAll(':', '\\:')}'`);
  lines.push('  )', '  if (( CURRENT == 2 )); then', "    _describe 'command' commands", '    return', '  fi');
  lines.push('  local command=$words[2]', '  shift words; (( CURRENT-- ))', '  case $command in');
  for (const command of commands) {
    lines.push(`    ${command.name})`, '      _arguments \\');
    for (const option of optionsOf(command.name)) {
      const star = option.repeatable === true ? '*' : '';
      const value = option.value === undefined ? '' : `:${zshText(option.value)}:${zshOffer(option.completion, option.choices, groups)}`;
      lines.push(`        '${star}--${option.name}[${zshText(option.short)}]${value}' \\`);
      if (option.letter !== undefined) lines.push(`        '-${option.letter}[${zshText(option.short)}]' \\`);
    }
    const argument = command.argument;
    lines.push(
      argument === undefined
        ? "        ':: :'"
        : `        '::${zshText(argument.name)}:${zshOffer(argument.completion, argument.choices, groups)}'`,
      '      ;;',
    );
  }
  lines.push('  esac', '}', '_symcodim "$@"');
  return lines.join('\n');
}

const fishText = (text: string): string => `'${text.replaceAll('\\', '\\\\').replaceAll("'", "\\'")}'`;

function fish(groups: readonly string[]): string {
  const lines = ['# fish completion for symcodim', 'complete -c symcodim -f'];
  for (const command of commands)
    lines.push(`complete -c symcodim -n __fish_use_subcommand -a ${command.name} -d ${fishText(command.short)}`);
  for (const command of commands) {
    const when = `-n '__fish_seen_subcommand_from ${command.name}'`;
    const argument = command.argument;
    if (argument?.completion === 'file') lines.push(`complete -c symcodim ${when} -F`);
    if (argument?.completion === 'group') lines.push(`complete -c symcodim ${when} -a ${fishText(groups.join(' '))}`);
    if (argument?.choices !== undefined) lines.push(`complete -c symcodim ${when} -a ${fishText(argument.choices.join(' '))}`);
    for (const option of optionsOf(command.name)) {
      const letter = option.letter === undefined ? '' : ` -s ${option.letter}`;
      const choices = option.choices ?? (option.completion === 'group' ? groups : undefined);
      const value =
        option.value === undefined
          ? ''
          : choices !== undefined
            ? ` -x -a ${fishText(choices.join(' '))}`
            : option.completion === 'file'
              ? ' -r -F'
              : ' -x';
      lines.push(`complete -c symcodim ${when}${letter} -l ${option.name}${value} -d ${fishText(option.short)}`);
    }
  }
  return lines.join('\n');
}
