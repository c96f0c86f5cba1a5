// Writes into README.md what the built program prints: the reference, and the output under every "$ symcodim …".
// A block that ends with … keeps its number of lines.
import { spawnSync } from 'node:child_process';
import { readFileSync, writeFileSync } from 'node:fs';

const root = new URL('..', import.meta.url).pathname;
const run = (words) => spawnSync(process.execPath, [`${root}dist/cli/main.js`, ...words], { encoding: 'utf8', cwd: root }).stdout;
const words = (line) => [...line.matchAll(/"([^"]*)"|(\S+)/g)].map((match) => match[1] ?? match[2]);

const text = readFileSync(`${root}README.md`, 'utf8')
  .replace(/(<!-- reference -->\n)[\s\S]*?(<!-- end of reference -->)/, (_, open, close) => open + run(['man', '--markdown', '-']) + close)
  .replace(/(```console\n\$ symcodim ([^\n]*)\n)([\s\S]*?)```/g, (_, open, line, old) => {
    const all = run(words(line));
    const kept = old.endsWith('…\n')
      ? `${all
          .split('\n')
          .slice(0, old.split('\n').length - 2)
          .join('\n')}\n…\n`
      : all;
    return `${open}${kept}\`\`\``;
  });
writeFileSync(`${root}README.md`, text);
