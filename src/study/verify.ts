/**
 * `verify`: a result file checked against itself. The numbers of the linear analysis are found again from the
 * certified matrices by other routes (verify-linear.ts); the declaration in the certificate is checked against its
 * digest, studied afresh, and every key of the file compared with what comes out.
 */
import { InputError } from '../errors/index.ts';
import type { Declaration } from '../model/declaration/index.ts';
import { type Certificate, decode, digestOf, type Encoded } from './certificate.ts';
import type { Outcome, ResultObject, StudyCommand, StudyOptions } from './outcome.ts';
import { differences } from './verify-compare.ts';
import { checkLinear, type Disagreement } from './verify-linear.ts';

export type { Disagreement } from './verify-linear.ts';

export interface VerifyResult extends ResultObject {
  readonly command: 'verify';
  readonly of: string;
  readonly agrees: boolean;
  /** Numbers found again by another route, and leaves compared with a new study. */
  readonly checks: number;
  readonly compared: number;
  /** The other routes that were taken. */
  readonly routes: readonly string[];
  readonly disagreements: readonly Disagreement[];
}

const COMMANDS: readonly string[] = ['check', 'components', 'codim', 'events', 'invariants', 'reduce', 'branches', 'sweep', 'report'];

/** Disagreements that are listed one by one. */
const LISTED = 20;

/**
 * Checks the text of a result file. `source` names it in messages; `tolerance` is relative, for floating numbers
 * (default 0: the same arithmetic gives the same digits). Throws InputError for a file that is no result with a certificate.
 */
export async function verifyOutcome(text: string, source: string, tolerance = 0): Promise<Outcome> {
  const result = await verifyResult(text, source, tolerance);
  return {
    result,
    status: result.agrees ? 0 : 1,
    text: () => verifyText(result, source),
    documents: {},
    notes: [],
  };
}

/** The same as data. */
export async function verifyResult(text: string, source: string, tolerance = 0): Promise<VerifyResult> {
  const file = readResult(text, source);
  const certificate = file.certificate as unknown as Certificate;
  const wrong: Disagreement[] = [];
  const routes = new Set<string>();
  let checks = 0;
  const compare = (key: string, found: unknown, expected: unknown, route: string): void => {
    checks++;
    routes.add(route);
    const known = wrong.some((w) => w.key === key && w.route === route);
    if (found !== expected && !known) wrong.push({ key, expected: show(expected), found: show(found), route });
  };
  compare('certificate.digest', certificate.digest, digestOf(certificate.declaration), 'SHA-256 of the declaration');
  if (certificate.linear !== undefined) {
    try {
      checkLinear(file as Record<string, unknown>, certificate.linear, compare);
    } catch (error) {
      // matrices that cannot be read, or that are no longer what they must be
      wrong.push({
        key: 'certificate.linear',
        expected: 'matrices of an equilibrium with its symmetry',
        found: message(error),
        route: 'reading',
      });
    }
  }
  let compared = 0;
  // a declaration that is not the one of the digest is not studied: it may be anything
  if (certificate.digest === digestOf(certificate.declaration)) {
    const found = differences(file, await studyAgain(file, certificate), tolerance);
    compared = found.compared;
    const known = new Set(wrong.map((w) => w.key));
    for (const d of found.differences) if (!known.has(d.key)) wrong.push({ ...d, route: 'a new study of the declaration' });
  }
  return {
    schema: 'symcodim/1',
    command: 'verify',
    of: String(file.command),
    agrees: wrong.length === 0,
    checks,
    compared,
    routes: [...routes],
    disagreements: wrong,
  };
}

const message = (error: unknown): string => (error instanceof Error ? error.message : String(error));

function show(value: unknown): string {
  return typeof value === 'string' ? value : (JSON.stringify(value) ?? 'nothing');
}

function readResult(text: string, source: string): ResultObject {
  let value: unknown;
  try {
    value = JSON.parse(text);
  } catch (error) {
    throw new InputError(`${source} is not JSON: ${message(error)}`, {
      file: source,
      expected: 'the result of a command with --json',
      next: 'make it with symcodim codim MODEL --json',
    });
  }
  const wrong = (key: string, found: unknown, expected: string): InputError =>
    new InputError(`${source} is no result that can be verified`, {
      file: source,
      key,
      value: show(found),
      expected,
      next: 'make it with --json',
    });
  if (typeof value !== 'object' || value === null || Array.isArray(value)) throw wrong('', value, 'a JSON object');
  const file = value as ResultObject;
  if (file.schema !== 'symcodim/1') throw wrong('schema', file.schema, 'symcodim/1');
  if (!COMMANDS.includes(file.command)) throw wrong('command', file.command, `one of ${COMMANDS.join(', ')}`);
  const certificate = file.certificate as Partial<Certificate> | undefined;
  if (
    typeof certificate !== 'object' ||
    certificate === null ||
    typeof certificate.declaration !== 'object' ||
    typeof certificate.digest !== 'string'
  )
    throw wrong('certificate', certificate, 'a certificate with declaration and digest');
  return file;
}

async function studyAgain(file: ResultObject, certificate: Certificate): Promise<Encoded> {
  const declaration = decode(certificate.declaration) as Declaration;
  const options = (decode(certificate.options ?? {}) ?? {}) as StudyOptions;
  const { study } = await import('./study.ts');
  const { result } = await study(file.command as StudyCommand, declaration, options);
  return JSON.parse(JSON.stringify(result)) as Encoded;
}

function verifyText(r: VerifyResult, source: string): string {
  if (r.agrees)
    return [
      `${source}: every number agrees.`,
      `${r.checks} numbers found again by other routes, ${r.compared} values compared with a new study of the model. Routes:`,
      ...r.routes.map((route) => `  ${route}`),
    ].join('\n');
  const shown = r.disagreements.slice(0, LISTED);
  const more = r.disagreements.length - shown.length;
  return [
    `${source}: ${r.disagreements.length} ${r.disagreements.length === 1 ? 'value disagrees' : 'values disagree'}.`,
    ...shown.map((d) => `  ${d.key}: the file says ${d.found}, ${d.route} gives ${d.expected}`),
    ...(more > 0 ? [`  and ${more} more`] : []),
  ].join('\n');
}
