/**
 * A family whose matrices are doubles: S along the parameter, and its blocks in units of its own. Coordinates and
 * momenta are measured by the largest entries of their corners of S, so that one tolerance fits both.
 */

import { rationals } from '../field/index.ts';
import { type NumberMatrix, numberCombine, numberCongruence, numberMatrix, numberScale, toNumberMatrix } from '../linear/index.ts';
import { type Declaration, type EnergyDeclaration, numberedFamilies, usedNames } from '../model/declaration/index.ts';
import { compileNumeric, resolveDefinitions, substituteSymbols } from '../model/expression/index.ts';
import { fileValue } from '../model/file-family.ts';
import { energyOfMatrices } from '../model/floating-matrices.ts';
import { readQuantities } from '../model/quantities.ts';
import { toleranceOf } from './floating-prepare.ts';
import type { BlocksAt, CurvePoint } from './sweep-curve.ts';
import type { SweepFamily } from './sweep-family.ts';
import type { Range } from './sweep-range.ts';

export interface FloatingMatrices {
  readonly family: SweepFamily;
  readonly blocks: (p: CurvePoint) => BlocksAt;
  readonly hessian: (mu: number) => NumberMatrix;
  /** Size of the corner of S on the diagonal, for each coordinate and momentum. */
  readonly levels: Float64Array;
}

/** The family of a frame without energy, with the matrices of its declaration. Throws the errors of `energyOfMatrices`. */
export function floatingMatrices(frame: SweepFamily, range: Range): FloatingMatrices {
  const { declaration, names } = frame;
  const { parameter } = range;
  const n = names.length;
  const quantities = readQuantities(declaration);
  const free = new Map([...quantities.valueExpressions].filter(([k]) => k !== parameter));
  const others = resolveDefinitions(free);
  const values = [...others].map(([k, e]) => [k, compileNumeric(substituteSymbols(e, others), [parameter])] as const);
  const energyAt = (mu: number) =>
    energyOfMatrices(declaration, quantities.definitions, new Map([...values.map(([k, f]) => [k, f([mu])] as const), [parameter, mu]]), []);
  const files = numberedFamilies(declaration.energy).filter((f) => f.parameter === parameter);
  const nodes = [...new Set(files.flatMap((f) => f.nodes.map((node) => rationals.toNumber(fileValue(node)))))]
    .filter((x) => x >= range.from && x <= range.to)
    .concat([range.from, range.to])
    .sort((a, b) => a - b)
    .filter((x, k, all) => k === 0 || x !== all[k - 1]);
  const origin = new Float64Array(n);
  const known = new Map<number, NumberMatrix>();
  const levels = new Float64Array(n);
  for (const mu of nodes) {
    const energy = energyAt(mu);
    known.set(mu, energy.hessian(origin));
    const { common, hessian: terms } = energy.sizes(origin);
    for (let i = 0; i < n; i++) levels[i] = Math.max(levels[i]!, (common ?? terms).data[i * n + i]!);
  }
  for (let i = 0; i < n; i++) if (!(levels[i]! > 0)) levels[i] = 1;
  const hessian = (mu: number) => known.get(mu) ?? energyAt(mu).hessian(origin);
  // a column on coordinates and momenta alike is measured by the larger of the two
  const scaled = (basis: NumberMatrix, factor: (level: number) => number): NumberMatrix => {
    const out = numberMatrix(basis.rows, basis.cols);
    for (let j = 0; j < basis.cols; j++) {
      let level = 0;
      for (let i = 0; i < basis.rows; i++) if (basis.data[i * basis.cols + j] !== 0) level = Math.max(level, levels[i]!);
      for (let i = 0; i < basis.rows; i++) out.data[i * basis.cols + j] = basis.data[i * basis.cols + j]! * factor(level);
    }
    return out;
  };
  const middle = Math.sqrt(levels[0]! * levels[n - 1]!);
  const bases = frame.adapted.map((b) => scaled(toNumberMatrix(b.basis, frame.field), (level) => 1 / Math.sqrt(level)));
  const flows = frame.flow.map((b) => scaled(toNumberMatrix(b.basis, frame.field), (level) => Math.sqrt(middle / level)));
  const fixedForm = frame.formAt(range.from) === frame.formAt(range.to);
  const forms = flows.map((b) => numberCongruence(b, frame.formAt(range.from)));
  const form = (i: number, mu: number) => (fixedForm ? forms[i]! : numberCongruence(flows[i]!, frame.formAt(mu)));
  const cut = (s: NumberMatrix) => ({
    components: bases.map((b) => numberCongruence(b, s)),
    flows: flows.map((b) => numberCongruence(b, s)),
  });
  const straight = isPiecewiseLinear(declaration, parameter) ? nodes.map((mu) => cut(known.get(mu)!)) : undefined;
  const blocks = ({ mu }: CurvePoint): BlocksAt => {
    if (straight !== undefined) {
      let k = 0;
      for (let high = nodes.length - 1; high - k > 1; ) {
        const m = (k + high) >> 1;
        if (mu >= nodes[m]!) k = m;
        else high = m;
      }
      const [a, b] = [nodes[k]!, nodes[k + 1]!];
      const [left, right] = [(b - mu) / (b - a), (mu - a) / (b - a)];
      const mix = (x: NumberMatrix, y: NumberMatrix) => numberCombine(numberScale(x, left), y, right);
      const [low, high] = [straight[k]!, straight[k + 1]!];
      return {
        component: (i) => mix(low.components[i]!, high.components[i]!),
        flow: (i) => ({ s: mix(low.flows[i]!, high.flows[i]!), w: form(i, mu) }),
      };
    }
    let s: NumberMatrix | undefined;
    const whole = () => {
      s ??= hessian(mu);
      return s;
    };
    return {
      component: (i) => numberCongruence(bases[i]!, whole()),
      flow: (i) => ({ s: numberCongruence(flows[i]!, whole()), w: form(i, mu) }),
    };
  };
  const family: SweepFamily = {
    ...frame,
    range,
    ranges: [range],
    declaredValue: undefined,
    tolerance: toleranceOf(declaration.tolerance),
  };
  return { family, blocks, hessian, levels };
}

/** Whether the parameter enters by the files of the stiffness or of S alone: then S is linear from file to file. */
export function isPiecewiseLinear(declaration: Declaration, parameter: string): boolean {
  const { energy } = declaration;
  const nothing = { rows: 0, cols: 0, terms: new Map(), where: '' };
  let rest: EnergyDeclaration;
  if (energy.kind === 'hessian') rest = { kind: 'none' };
  else if (energy.kind === 'mechanical') rest = { ...energy, stiffness: nothing };
  else return false;
  const stiff = energy.kind === 'mechanical' ? energy.stiffness.files : energy.files;
  return (
    stiff?.parameter === parameter && !usedNames({ ...declaration, energy: rest, range: new Map(), equilibrium: new Map() }).has(parameter)
  );
}
