/**
 * Options of the command line to a declaration: alone, or over a model file. The options arrive in the order in
 * which they were typed, because `--action` applies to the `--on` after it.
 */
import { dirname } from 'node:path';
import { UsageError } from '../../errors/index.ts';
import { namesMatrixFile } from '../matrix-file/index.ts';
import { complete, type Draft } from './complete.ts';
import type { Declaration, EnergyDeclaration, GroupDeclaration, SiteDeclaration } from './declaration.ts';
import { readMatrixFile } from './matrix-value.ts';
import { draftFromFile, draftFromText } from './model-file.ts';
import { momentumOf, namesIn, numberedNames, pairedNames } from './names.ts';
import { didYouMean, listed } from './nearest.ts';
import { type Settings, settingsOf } from './option-settings.ts';
import { all, nameList, type OptionUse, single, splitList, usage } from './option-values.ts';
import { usedNames } from './texts.ts';

export type { OptionUse } from './option-values.ts';

/** Where the model comes from: a path, or text that the caller has read (standard input). */
export interface ModelSource {
  readonly path?: string;
  readonly text?: string;
}

/** Options that declare a model and therefore cannot stand beside a model file. */
export const DECLARING_OPTIONS = ['group', 'action', 'on', 'reversing', 'quadratic', 'hamiltonian', 'coordinates', 'momenta'] as const;
/** Options that settle how a model is studied; they also stand beside a model file. */
export const SETTING_OPTIONS = [
  'time-reversal',
  'define',
  'set',
  'vary',
  'parameters',
  'range',
  'degree',
  'codimension',
  'order-limit',
  'tolerance',
  'floating',
  'neutral',
] as const;

/** The lists of `--on`, each with the `--action` typed before it. */
function sitesOf(uses: readonly OptionUse[]): SiteDeclaration[] {
  const sites: SiteDeclaration[] = [];
  let action: string | undefined;
  for (const { name, value } of uses) {
    if (name === 'action') {
      if (action !== undefined)
        throw usage(
          'action',
          value,
          `--action ${action} has no --on before the next --action.`,
          'an --on after each --action',
          'write --action ring --on q1,q2,q3',
        );
      action = value;
    } else if (name === 'on') {
      const on = nameList('on', value);
      for (const [k, coordinate] of on.entries())
        if (on.indexOf(coordinate) !== k)
          throw usage('on', value, `${coordinate} is listed twice.`, 'each coordinate once', 'correct the list');
      sites.push(action === undefined ? { on } : { action, on });
      action = undefined;
    }
  }
  if (action !== undefined)
    throw usage(
      'action',
      action,
      '--action applies to the --on after it, and none follows.',
      'an --on after --action',
      `write --action ${action} --on q1,q2,q3`,
    );
  return sites;
}

function groupsOf(uses: readonly OptionUse[]): GroupDeclaration[] {
  const group = single(uses, 'group');
  const on = sitesOf(uses);
  const reversing = all(uses, 'reversing').flatMap((value) => splitList(value));
  if (group === undefined) {
    for (const name of ['on', 'action', 'reversing']) {
      const stray = uses.find((use) => use.name === name);
      if (stray !== undefined && name !== 'on')
        throw usage(name, stray.value, `--${name} is given without --group.`, '--group beside it', 'add --group dihedral:3 or the like');
      if (stray !== undefined && name === 'on')
        throw usage(name, stray.value, '--on is given without --group.', '--group beside it', 'add --group cyclic:3 or the like');
    }
    return [];
  }
  if (group.trim() === '')
    throw usage('group', group, '--group is empty.', 'a catalogue name or the path of a group file', 'see symcodim groups');
  if (on.length === 0)
    throw usage('group', group, '--group says which group, and no --on says what it acts on.', '--on LIST', 'add --on q1,q2');
  if (reversing.includes(''))
    throw usage(
      'reversing',
      reversing.join(','),
      '--reversing has an empty name.',
      'generator names separated by commas',
      'write --reversing s',
    );
  return [{ group: group.trim(), on, reversing, where: '--group' }];
}

function energyOf(uses: readonly OptionUse[]): EnergyDeclaration {
  const [hamiltonian, quadratic] = [single(uses, 'hamiltonian'), single(uses, 'quadratic')];
  if (hamiltonian !== undefined && quadratic !== undefined)
    throw usage('quadratic', quadratic, '--hamiltonian and --quadratic are both given.', 'one of them', 'remove one of them');
  const flat = (option: string, text: string): string => {
    const line = text.replace(/\s+/g, ' ').trim();
    if (line === '') throw usage(option, text, `--${option} is empty.`, 'an expression', `write --${option} "(p1^2+q1^2)/2"`);
    return line;
  };
  if (hamiltonian !== undefined) return { kind: 'hamiltonian', text: flat('hamiltonian', hamiltonian) };
  if (quadratic === undefined) return { kind: 'none' };
  if (!namesMatrixFile(quadratic)) return { kind: 'quadratic', text: flat('quadratic', quadratic) };
  const matrix = readMatrixFile(quadratic, '.', '--quadratic');
  if (matrix.rows !== matrix.cols || matrix.rows % 2 !== 0)
    throw usage(
      'quadratic',
      quadratic,
      `${quadratic} is ${matrix.rows} × ${matrix.cols}.`,
      'a square matrix of even size',
      'correct the matrix',
    );
  return { kind: 'hessian', matrix };
}

function phaseOf(
  uses: readonly OptionUse[],
  energy: EnergyDeclaration,
  groups: readonly GroupDeclaration[],
  settings: Settings,
): { coordinates: string[]; momenta: string[] } {
  const [given, paired] = [single(uses, 'coordinates'), single(uses, 'momenta')];
  if (given === undefined) {
    if (paired !== undefined)
      throw usage('momenta', paired, '--momenta is given without --coordinates.', 'both, in the same order', 'add --coordinates');
    if (energy.kind === 'hessian') return numberedNames(energy.matrix.rows / 2);
    const texts = energy.kind === 'hamiltonian' || energy.kind === 'quadratic' ? [energy.text, ...settings.define.values()] : [];
    const found = new Set(texts.flatMap((text) => [...namesIn(text)]));
    for (const { on } of groups) if (on !== 'points') for (const site of on) for (const name of site.on) found.add(name);
    const pairs = pairedNames(
      [...found].filter((name) => !settings.values.has(name) && !settings.vary?.includes(name) && !settings.define.has(name)),
    );
    if (pairs.coordinates.length === 0) {
      throw new UsageError('No coordinates were found: there is no model file, and no name q… or p… in an expression or in --on.', {
        key: '--coordinates',
        expected: 'a model file, or a model declared by options',
        next: 'name a model file, or write --hamiltonian "(p1^2+q1^2)/2"',
      });
    }
    return pairs;
  }
  const coordinates = nameList('coordinates', given);
  const momenta =
    paired === undefined
      ? coordinates.map((name) => {
          const momentum = momentumOf(name);
          if (momentum === undefined)
            throw usage('coordinates', given, `The momentum of ${name} cannot be guessed.`, '--momenta in the same order', 'add --momenta');
          return momentum;
        })
      : nameList('momenta', paired);
  if (momenta.length !== coordinates.length)
    throw usage(
      'momenta',
      paired ?? '',
      `There are ${coordinates.length} coordinates and ${momenta.length} momenta.`,
      'one momentum for each coordinate',
      'correct the lists',
    );
  if (energy.kind === 'hessian' && energy.matrix.rows !== 2 * coordinates.length)
    throw usage(
      'coordinates',
      given,
      `There are ${coordinates.length} coordinates and the matrix is ${energy.matrix.rows} × ${energy.matrix.cols}.`,
      `${energy.matrix.rows / 2} coordinates`,
      'correct the list or leave it out',
    );
  return { coordinates, momenta };
}

function draftFromOptions(uses: readonly OptionUse[], settings: Settings): Draft {
  const energy = energyOf(uses);
  const groups = groupsOf(uses);
  const { coordinates, momenta } = phaseOf(uses, energy, groups, settings);
  const phase = [...coordinates, ...momenta];
  for (const { on } of groups) {
    if (on === 'points') continue;
    for (const site of on) {
      const stranger = site.on.find((name) => !phase.includes(name));
      if (stranger !== undefined)
        throw usage(
          'on',
          site.on.join(','),
          `${stranger} is not a coordinate or momentum.${didYouMean(stranger, phase)}`,
          `names among ${listed(phase)}`,
          'correct --on, or name the coordinates with --coordinates',
        );
    }
  }
  const { timeReversal, numbers, neutralFind, ...rest } = settings.rest;
  return {
    source: 'options',
    folder: '.',
    title: energy.kind === 'hamiltonian' || energy.kind === 'quadratic' ? `H = ${energy.text}`.slice(0, 200) : 'Model declared by options',
    coordinates,
    momenta,
    parameters: settings.values,
    empty: [],
    vary: settings.vary ?? [],
    range: settings.range,
    define: settings.define,
    energy,
    equilibrium: new Map(),
    generators: [],
    groups,
    timeReversal: timeReversal ?? false,
    neutral: [],
    neutralFind: neutralFind ?? false,
    numbers: numbers ?? 'exact',
    ...rest,
  };
}

function overlaid(draft: Draft, settings: Settings): Draft {
  const phase = [...draft.coordinates, ...draft.momenta];
  const known = new Set([...draft.parameters.keys(), ...draft.empty, ...usedNames(draft), ...draft.vary]);
  for (const name of [...phase, ...draft.define.keys()]) known.delete(name);
  for (const [name, text] of settings.values) {
    if (known.has(name)) continue;
    const what = phase.includes(name)
      ? `${name} is a coordinate of ${draft.source}, not a parameter.`
      : `${draft.source} has no parameter ${name}.`;
    throw usage(
      'set',
      `${name}=${text}`,
      `${what}${didYouMean(name, known)}`,
      known.size === 0 ? 'a parameter; the model has none' : `one of ${listed(known)}`,
      'correct the name',
    );
  }
  return {
    ...draft,
    parameters: new Map([...draft.parameters, ...settings.values]),
    empty: draft.empty.filter((name) => !settings.values.has(name)),
    vary: settings.vary ?? draft.vary,
    range: new Map([...draft.range, ...settings.range]),
    define: new Map([...draft.define, ...settings.define]),
    ...settings.rest,
  };
}

/**
 * The declaration that a command line makes: of a model file or text with the setting options over it, or of
 * options alone. Throws UsageError for the options and InputError for the file. Options that declare nothing
 * about the model (`json`, `latex`, …) must not be passed.
 */
export function declare(model: ModelSource, uses: readonly OptionUse[]): Declaration {
  const allowed: readonly string[] = [...DECLARING_OPTIONS, ...SETTING_OPTIONS];
  for (const { name, value } of uses) {
    if (!allowed.includes(name))
      throw usage(name, value, `There is no model option --${name}.${didYouMean(name, allowed)}`, 'a known option', 'see symcodim --help');
  }
  const settings = settingsOf(uses);
  if (model.path === undefined && model.text === undefined) return complete(draftFromOptions(uses, settings));
  const stray = uses.find(({ name }) => (DECLARING_OPTIONS as readonly string[]).includes(name));
  if (stray !== undefined) {
    throw usage(
      stray.name,
      stray.value,
      `--${stray.name} declares a model, and a model file is given as well.`,
      'a model file or a model declared by options',
      `leave out the file, or write it into the file`,
    );
  }
  const draft =
    model.text === undefined
      ? draftFromFile(model.path!)
      : draftFromText(model.text, model.path ?? '-', model.path === undefined ? '.' : dirname(model.path));
  return complete(overlaid(draft, settings));
}
