/**
 * The public surface: models are declared from a file, a text, an object or options; each command of the command line
 * is a function that returns its result as typed data; results become text, LaTeX, HTML, Markdown or SVG. Nothing
 * here prints or ends the process, and what is wrong with an input is one of the typed errors.
 *
 * ```js
 * import { codim, declareFile, renderLatex } from 'symcodim';
 * const result = await codim(declareFile('ring.yaml', { set: { c: '-1/3' } }));
 * if (result.verdict.answer !== 'generic') console.log(await renderLatex(result, { fragment: true }));
 * ```
 */
import { InputError } from './errors/index.ts';
import type { Declaration } from './model/declaration/index.ts';
import { declare, type OptionUse } from './model/declaration/options.ts';
import type { BranchesResult } from './study/branches.ts';
import type { CheckResult } from './study/check.ts';
import type { EventsResult } from './study/events.ts';
import type { Outcome, ResultObject, StudyCommand, StudyOptions } from './study/outcome.ts';
import type { ReduceResult } from './study/reduce.ts';
import type { ReportResult } from './study/report.ts';
import type { CodimResult, ComponentsResult, InvariantsResult, StudyResult } from './study/result.ts';
import { study } from './study/study.ts';
import type { SweepResult } from './study/sweep.ts';
import type { VerifyResult } from './study/verify.ts';

export * from './errors/index.ts';
export type { Declaration } from './model/declaration/index.ts';
export type { BranchesResult } from './study/branches.ts';
export type { CheckResult } from './study/check.ts';
export type { EventsResult } from './study/events.ts';
export type { Outcome, ResultObject, StudyCommand, StudyOptions } from './study/outcome.ts';
export type { ReduceResult } from './study/reduce.ts';
export type { ReportResult } from './study/report.ts';
export type * from './study/result.ts';
export type { Answer } from './study/study.ts';
export type { Crossing, SweepResult } from './study/sweep.ts';
export type { Disagreement, VerifyResult } from './study/verify.ts';
export { study };

/** A number or its text in the language of models; texts are exact. */
export type NumberText = string | number | bigint;

/**
 * What can be said about a model beside its file, under the names of the options of the command line: maps for
 * `set`, `define` and `range`, lists for `vary`, numbers or true for the rest.
 */
export interface Settings {
  readonly set?: Readonly<Record<string, NumberText>>;
  readonly define?: Readonly<Record<string, string>>;
  readonly vary?: readonly string[];
  /** From, to, and perhaps a number of steps. */
  readonly range?: Readonly<Record<string, readonly [NumberText, NumberText] | readonly [NumberText, NumberText, number]>>;
  readonly parameters?: number;
  readonly degree?: number;
  readonly codimension?: number;
  readonly orderLimit?: number;
  readonly tolerance?: number;
  readonly timeReversal?: boolean;
  readonly floating?: boolean;
  readonly neutral?: 'find';
}

/** A model without a file. */
export interface OptionModel extends Settings {
  readonly group?: string;
  /** What the group acts on: lists of coordinates, each perhaps with the name of the action before it. */
  readonly on?: readonly (readonly string[] | { readonly action: string; readonly on: readonly string[] })[];
  readonly reversing?: readonly string[];
  readonly hamiltonian?: string;
  readonly quadratic?: string;
  readonly coordinates?: readonly string[];
  readonly momenta?: readonly string[];
}

function settingUses(settings: Settings): OptionUse[] {
  const uses: OptionUse[] = [];
  const add = (name: string, value: string) => uses.push({ name, value });
  for (const [name, value] of Object.entries(settings.set ?? {})) add('set', `${name}=${value}`);
  for (const [name, value] of Object.entries(settings.define ?? {})) add('define', `${name}=${value}`);
  if (settings.vary !== undefined && settings.vary.length > 0) add('vary', settings.vary.join(','));
  for (const [name, range] of Object.entries(settings.range ?? {})) add('range', `${name}=${range.join(':')}`);
  for (const name of ['parameters', 'degree', 'codimension', 'tolerance', 'neutral'] as const)
    if (settings[name] !== undefined) add(name, `${settings[name]}`);
  if (settings.orderLimit !== undefined) add('order-limit', `${settings.orderLimit}`);
  if (settings.timeReversal === true) add('time-reversal', '');
  if (settings.floating === true) add('floating', '');
  return uses;
}

/** A model file in YAML or JSON. Throws InputError or UsageError. */
export function declareFile(path: string, settings: Settings = {}): Declaration {
  return declare({ path }, settingUses(settings));
}

/** The text of a model file; relative paths in it start from the working folder. Throws InputError or UsageError. */
export function declareText(text: string, settings: Settings = {}): Declaration {
  return declare({ text }, settingUses(settings));
}

/** A model as an object with the keys of a model file. Numbers are taken as they print. Throws InputError or UsageError. */
export function declareObject(model: Readonly<Record<string, unknown>>, settings: Settings = {}): Declaration {
  const text = JSON.stringify(model, (_, value: unknown) => (typeof value === 'bigint' ? `${value}` : value));
  if (text === undefined) throw new InputError('the model is not an object', { expected: 'an object with the keys of a model file' });
  return declareText(text, settings);
}

/** A model declared without a file, as by the options of the command line. Throws UsageError. */
export function declareOptions(model: OptionModel): Declaration {
  const uses: OptionUse[] = [];
  const add = (name: string, value: string) => uses.push({ name, value });
  if (model.group !== undefined) add('group', model.group);
  for (const site of model.on ?? []) {
    if ('action' in site) {
      add('action', site.action);
      add('on', site.on.join(','));
    } else add('on', site.join(','));
  }
  if (model.reversing !== undefined) add('reversing', model.reversing.join(','));
  if (model.hamiltonian !== undefined) add('hamiltonian', model.hamiltonian);
  if (model.quadratic !== undefined) add('quadratic', model.quadratic);
  if (model.coordinates !== undefined) add('coordinates', model.coordinates.join(','));
  if (model.momenta !== undefined) add('momenta', model.momenta.join(','));
  return declare({}, [...uses, ...settingUses(model)]);
}

async function resultOf<R extends StudyResult>(command: StudyCommand, declaration: Declaration, options: StudyOptions): Promise<R> {
  const { result } = await study(command, declaration, options);
  return result as R;
}

/** Equilibrium, symplectic generators, invariance of H, order of the group; with `find`, which symmetry is there. */
export function check(declaration: Declaration, options: StudyOptions = {}): Promise<CheckResult> {
  return resultOf('check', declaration, options);
}

/** Isotypic components of the phase space, blocks of S and L, symmetry classes. */
export function components(declaration: Declaration, options: StudyOptions = {}): Promise<ComponentsResult> {
  return resultOf('components', declaration, options);
}

/** The zero event, its codimension with the symmetry and without, motion, and the verdict. */
export function codim(declaration: Declaration, options: StudyOptions = {}): Promise<CodimResult> {
  return resultOf('codim', declaration, options);
}

/** Every zero event that the action allows up to a codimension; needs no H. */
export function events(declaration: Declaration, options: StudyOptions = {}): Promise<EventsResult> {
  return resultOf('events', declaration, options);
}

/** Molien series, generators, equivariants, H in the invariants. */
export function invariants(declaration: Declaration, options: StudyOptions = {}): Promise<InvariantsResult> {
  return resultOf('invariants', declaration, options);
}

/** Reduced Hamiltonian on the kernel, nonlinear codimension, moduli, unfolding; with `elliptic`, the Birkhoff normal form. */
export function reduce(declaration: Declaration, options: StudyOptions = {}): Promise<ReduceResult> {
  return resultOf('reduce', declaration, options);
}

/** Isotropy subgroups and branches of equilibria, each confirmed on the full equations. */
export function branches(declaration: Declaration, options: StudyOptions = {}): Promise<BranchesResult> {
  return resultOf('branches', declaration, options);
}

/** Along a parameter: zeros and collisions, where they are and what happens there. */
export function sweep(declaration: Declaration, options: StudyOptions = {}): Promise<SweepResult> {
  return resultOf('sweep', declaration, options);
}

/** All of it; the document is made by a renderer from `stages`. */
export async function report(
  declaration: Declaration,
  options: StudyOptions = {},
): Promise<{ readonly result: ReportResult; readonly stages: readonly StudyResult[] }> {
  const { result, stages } = await study('report', declaration, options);
  return { result: result as ReportResult, stages: stages ?? [result] };
}

/** Re-checks the text of a result by other routes. Throws InputError for a text that is no result with a certificate. */
export async function verify(text: string, options: { readonly source?: string; readonly tolerance?: number } = {}): Promise<VerifyResult> {
  const { verifyResult } = await import('./study/verify.ts');
  return verifyResult(text, options.source ?? 'result', options.tolerance ?? 0);
}

/** The catalogue, or one group of it with its classes and characters. */
export async function groups(name?: string, options: { readonly orderLimit?: number } = {}): Promise<ResultObject> {
  const { groupsOutcome } = await import('./study/groups-command.ts');
  const outcome: Outcome = groupsOutcome(name, options.orderLimit);
  return outcome.result;
}

type Results = StudyResult | readonly StudyResult[];
const plain = (results: Results) => results as unknown as ResultObject | readonly ResultObject[];

/** For a terminal of that width, or of any; ends without a line break. */
export async function renderText(results: Results, options: { readonly width?: number } = {}): Promise<string> {
  return (await import('./report/render.ts')).renderText(plain(results), options);
}

/** A whole document for pdflatex, or with `fragment` a part of one. */
export async function renderLatex(results: Results, options: { readonly fragment?: boolean } = {}): Promise<string> {
  return (await import('./report/render.ts')).renderLatex(plain(results), { fragment: options.fragment ?? false });
}

/** One HTML file that refers to nothing outside of it. */
export async function renderHtml(results: Results): Promise<string> {
  return (await import('./report/render.ts')).renderHtml(plain(results));
}

export async function renderMarkdown(results: Results): Promise<string> {
  return (await import('./report/render.ts')).renderMarkdown(plain(results));
}

/** All pictures, one under the other; null where the results hold none. */
export async function renderSvg(results: Results): Promise<string | null> {
  return (await import('./report/render.ts')).renderSvg(plain(results));
}
