/** The reference of commands and options in Markdown, as the README holds it; made from the records. */
import { exitStatuses, groupHeadings } from './help.ts';
import { commandNames, commands, type OptionRecord, optionGroups, options, spelling, usage } from './records/index.ts';

const cell = (text: string): string => text.replaceAll('|', '\\|');
const code = (text: string): string => `\`${cell(text)}\``;

/** The commands that take an option, put as briefly as they can be. */
function where(option: OptionRecord): string {
  const others = commands.filter((command) => command.argument?.name === 'MODEL');
  if (others.length === option.commands.length && others.every(({ name }) => option.commands.includes(name))) return 'all with MODEL';
  const missing = commandNames.filter((name) => !option.commands.includes(name));
  if (missing.length === 0) return 'all';
  return option.commands.length > 6 ? `all but ${missing.join(', ')}` : option.commands.join(', ');
}

/** The whole reference: commands, options, exit statuses. */
export function referenceTable(): string {
  const lines = ['| command | what it answers |', '|---|---|'];
  for (const command of commands) lines.push(`| ${code(usage(command))} | ${cell(command.short)} |`);
  for (const group of optionGroups) {
    lines.push('', `**${groupHeadings[group]}**`, '', '| option | meaning | commands | example |', '|---|---|---|---|');
    for (const option of options.filter((entry) => entry.group === group)) {
      const repeat = option.repeatable === true ? ' (repeatable)' : '';
      lines.push(`| ${code(spelling(option))} | ${cell(option.short)}${repeat} | ${where(option)} | ${code(option.example)} |`);
    }
  }
  lines.push('', '| exit status | meaning |', '|---|---|');
  for (const [status, meaning] of exitStatuses) lines.push(`| ${status} | ${cell(meaning)} |`);
  return lines.join('\n');
}
