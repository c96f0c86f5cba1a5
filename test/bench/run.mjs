/**
 * One table of times: symcodim beside bare Node and beside scripts over general-purpose libraries, interleaved in one
 * run. Every measurement is a fresh process; seconds inside it start after the imports, unless the row says wall.
 * Arguments are row names (T1 … T8, start, samples); without any, all rows. Writes no file.
 */
import { spawnSync } from 'node:child_process';
import { fileURLToPath } from 'node:url';
import { rows } from './rows.mjs';

const here = (name) => fileURLToPath(new URL(name, import.meta.url));

/** What a contender measured: seconds by task, or the reason why not. */
function measure({ command, task, wall }) {
  const [program, ...words] = command;
  const start = performance.now();
  const run = spawnSync(program, words, { encoding: 'utf8', cwd: here('../..'), maxBuffer: 1 << 26, timeout: 120_000 });
  const seconds = (performance.now() - start) / 1000;
  if (run.error !== undefined || run.status !== 0)
    return {
      failure: String(run.error?.message ?? run.stderr)
        .trim()
        .split('\n')
        .at(-1),
    };
  return wall ? { [task ?? 'wall']: seconds } : JSON.parse(run.stdout.trim().split('\n').at(-1));
}

function missingPeer() {
  const run = spawnSync('python3', ['-c', 'import numpy, sympy'], { encoding: 'utf8' });
  if (run.error !== undefined) return 'python3 is missing';
  return run.status === 0 ? undefined : run.stderr.trim().split('\n').at(-1);
}

const median = (list) => {
  const sorted = [...list].sort((a, b) => a - b);
  const k = sorted.length >> 1;
  return sorted.length % 2 === 1 ? sorted[k] : (sorted[k - 1] + sorted[k]) / 2;
};
const written = (s) => (s === undefined ? '–' : s < 0.1 ? `${(1000 * s).toFixed(s < 0.01 ? 2 : 1)} ms` : `${s.toFixed(2)} s`);
const widths = [39, 11, 11, 11, 11, 9, 9];
const line = (cells) => `${cells.map((c, i) => (i === 0 ? c.padEnd(widths[i]) : c.padStart(widths[i]))).join(' ')}\n`;
const out = (text) => process.stdout.write(text);

const asked = process.argv.slice(2);
const known = rows.map((r) => r.name);
const unknown = asked.filter((name) => !known.includes(name));
if (unknown.length > 0) {
  process.stderr.write(`no row ${unknown.join(', ')}; the rows are ${known.join(', ')}\n`);
  process.exit(2);
}

const noPeer = missingPeer();
out(line(['task', 'at most', 'symcodim', 'typical', 'best', 'typical:', 'best:']));
let late = 0;
for (const row of rows.filter((r) => asked.length === 0 || asked.includes(r.name))) {
  const peers = row.peers.map((p) => ({ ...p, missing: p.command[0] === 'python3' ? noPeer : undefined }));
  const contenders = [row.own, ...peers.filter((p) => p.missing === undefined)];
  const found = new Map(contenders.map((c) => [c, []]));
  for (let i = 0; i < (row.repeats ?? 5); i++) for (const c of contenders) if (i < (c.repeats ?? Infinity)) found.get(c).push(measure(c));
  const value = (c, task) => {
    const list = (found.get(c) ?? []).map((r) => r[task]).filter((x) => typeof x === 'number');
    return list.length === 0 ? undefined : median(list);
  };
  for (const [task, most] of Object.entries(row.tasks)) {
    const own = value(row.own, task);
    const by = (kind) => peers.filter((p) => p.kind === kind).map((p) => value(p, task))[0];
    const ratio = (x) => (x === undefined || own === undefined ? '–' : `${(x / own).toFixed(x / own < 10 ? 2 : 0)}x`);
    const limit = typeof most === 'function' ? most(by('floor') ?? Number.NaN) : most;
    const missed = limit !== undefined && !(own <= limit);
    if (missed) late++;
    const cells = [written(limit), `${written(own)}${missed ? '!' : ''}`, written(by('typical') ?? by('floor')), written(by('best'))];
    out(line([`${row.name} ${task}`, ...cells, ratio(by('typical') ?? by('floor')), ratio(by('best'))]));
  }
  for (const c of [row.own, ...peers]) {
    const failure = c.missing ?? (found.get(c) ?? []).find((r) => r.failure !== undefined)?.failure;
    if (failure !== undefined) out(`   ${c === row.own ? 'symcodim' : `peer (${c.kind})`}: ${failure}\n`);
  }
  if (row.note !== undefined) out(`   ${row.note}\n`);
}
out(late === 0 ? 'every time is within its limit\n' : `${late} time${late > 1 ? 's' : ''} beyond the limit (!)\n`);
