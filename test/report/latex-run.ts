/** Runs pdflatex on a text and reads its log; a missing program is a failure that says what to install. */
import { spawnSync } from 'node:child_process';
import { mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';

export interface LatexRun {
  readonly status: number | null;
  readonly log: string;
  /** Lines about boxes that are too wide. */
  readonly overfull: readonly string[];
  readonly errors: readonly string[];
  readonly pages: number;
  /** The words of the PDF. */
  readonly text: string;
}

const MISSING = 'these tests compile documents: apt-get install texlive-latex-base texlive-latex-recommended poppler-utils';

function run(program: string, parameters: readonly string[], folder: string): { status: number | null; output: string } {
  const result = spawnSync(program, [...parameters], { cwd: folder, encoding: 'utf8', timeout: 60_000 });
  if (result.error !== undefined) throw new Error(`${program} cannot be run (${result.error.message}); ${MISSING}`);
  return { status: result.status, output: result.stdout };
}

/** Compiles the source in a folder of its own, with reading and writing outside of it switched off. */
export function compileLatex(source: string): LatexRun {
  const folder = mkdtempSync(join(tmpdir(), 'symcodim-latex-'));
  try {
    writeFileSync(join(folder, 'report.tex'), source);
    const { status } = run('pdflatex', ['-interaction=nonstopmode', '-halt-on-error', '-no-shell-escape', 'report.tex'], folder);
    // the log breaks its lines at 79 signs, also within words
    const log = readFileSync(join(folder, 'report.log'), 'latin1');
    const words = status === 0 && log.includes('Output written') ? run('pdftotext', ['-layout', 'report.pdf', '-'], folder).output : '';
    return {
      status,
      log,
      overfull: log.split('\n').filter((line) => line.startsWith('Overfull')),
      errors: log.split('\n').filter((line) => line.startsWith('!')),
      pages: Number(/Output written on report\.pdf \((\d+) page/.exec(log)?.[1] ?? 0),
      text: words,
    };
  } finally {
    rmSync(folder, { recursive: true, force: true });
  }
}
