/**
 * Fast floating values, gradients and Hessians: an expression becomes a list of steps on a vector of doubles (no
 * code is generated). The gradient is one backward sweep (reverse mode), a column of the Hessian one forward and
 * one backward sweep with tangents (Griewank and Walther, Evaluating Derivatives, 2008, chs. 3 and 5).
 */
import { ratioToNumber } from '../../field/index.ts';
import { type Expression, type FunctionName, fold } from './ast.ts';
import { unknownName } from './expand.ts';

type Vector = ArrayLike<number>;

type Operation = 'sum' | 'product' | 'negate' | 'quotient' | 'power' | FunctionName;

/** Slot `out` gets the operation of slots `from`. */
interface Step {
  readonly operation: Operation;
  readonly out: number;
  readonly from: readonly number[];
}

interface Program {
  /** Slots 0 … n-1 hold the names; constants are prepared. */
  readonly initial: Float64Array;
  readonly steps: readonly Step[];
  readonly result: number;
  readonly names: number;
  /** Whether a slot depends on the names. */
  readonly active: readonly boolean[];
}

function compile(root: Expression, names: readonly string[]): Program {
  const index = new Map(names.map((name, i) => [name, i]));
  const initial: number[] = names.map(() => 0);
  const active: boolean[] = names.map(() => true);
  const steps: Step[] = [];
  const constant = (x: number) => {
    active.push(false);
    return initial.push(x) - 1;
  };
  const result = fold<number>(root, (e, from) => {
    if (e.kind === 'number') return constant(ratioToNumber(e.n, e.d));
    if (e.kind === 'pi') return constant(Math.PI);
    if (e.kind === 'symbol') {
      const i = index.get(e.name);
      if (i === undefined) throw unknownName(e.name, names);
      return i;
    }
    const step = (operation: Operation, operands: readonly number[]) => {
      const out = initial.push(0) - 1;
      active.push(operands.some((i) => active[i]!));
      steps.push({ operation, out, from: operands });
      return out;
    };
    // products two factors at a time
    if (e.kind === 'product') return from.reduce((left, right) => step('product', [left, right]));
    return step(e.kind === 'call' ? e.name : e.kind, from);
  });
  return { initial: Float64Array.from(initial), steps, result, names: names.length, active };
}

/** Whole exponents by repeated products, so that negative bases and their derivatives are right. */
function powerOf(b: number, e: number): number {
  return e === 2 ? b * b : b ** e;
}

function value(step: Step, v: Float64Array): number {
  const { from } = step;
  const a = v[from[0]!]!;
  switch (step.operation) {
    case 'sum': {
      let s = a;
      for (let i = 1; i < from.length; i++) s += v[from[i]!]!;
      return s;
    }
    case 'product':
      return a * v[from[1]!]!;
    case 'negate':
      return -a;
    case 'quotient':
      return a / v[from[1]!]!;
    case 'power':
      return powerOf(a, v[from[1]!]!);
    default:
      return Math[step.operation](a);
  }
}

/** First and second derivative of a function of one variable; y is its value. */
function derivatives(name: FunctionName, x: number, y: number): readonly [number, number] {
  switch (name) {
    case 'sqrt':
      return [0.5 / y, -0.25 / (y * x)];
    case 'exp':
      return [y, y];
    case 'log':
      return [1 / x, -1 / (x * x)];
    case 'sin':
      return [Math.cos(x), -y];
    case 'cos':
      return [-Math.sin(x), -y];
    case 'tan':
      return [1 + y * y, 2 * y * (1 + y * y)];
    case 'sinh':
      return [Math.cosh(x), y];
    case 'cosh':
      return [Math.sinh(x), y];
    case 'tanh':
      return [1 - y * y, -2 * y * (1 - y * y)];
  }
}

/** Values of all slots at x. */
function forward(p: Program, x: Vector): Float64Array {
  const v = p.initial.slice();
  for (let i = 0; i < p.names; i++) v[i] = x[i]!;
  for (const step of p.steps) v[step.out] = value(step, v);
  return v;
}

/** A step as the edges of the graph: d out / d from, and the second derivatives between pairs of its operands. */
interface Edge {
  readonly from: number;
  readonly first: number;
  /** Σ over operands j of second[j][1] times the tangent of second[j][0] is the tangent of `first`. */
  readonly second: ReadonlyArray<readonly [number, number]>;
}

function edges(step: Step, p: Program, v: Float64Array): Edge[] {
  const { from, out } = step;
  const a = from[0]!;
  const b = from[1] ?? a;
  const x = v[a]!;
  const y = v[b]!;
  switch (step.operation) {
    case 'sum':
      return from.map((i) => ({ from: i, first: 1, second: [] }));
    case 'negate':
      return [{ from: a, first: -1, second: [] }];
    case 'product':
      return [
        { from: a, first: y, second: [[b, 1]] },
        { from: b, first: x, second: [[a, 1]] },
      ];
    case 'quotient':
      return [
        { from: a, first: 1 / y, second: [[b, -1 / (y * y)]] },
        {
          from: b,
          first: -x / (y * y),
          second: [
            [a, -1 / (y * y)],
            [b, (2 * x) / (y * y * y)],
          ],
        },
      ];
    case 'power': {
      const low = y === 0 ? 0 : y * x ** (y - 1);
      const lower = y === 0 || y === 1 ? 0 : y * (y - 1) * x ** (y - 2);
      if (!p.active[b]) return [{ from: a, first: low, second: [[a, lower]] }];
      const log = Math.log(x);
      const mixed = x ** (y - 1) * (1 + y * log);
      return [
        {
          from: a,
          first: low,
          second: [
            [a, lower],
            [b, mixed],
          ],
        },
        {
          from: b,
          first: v[out]! * log,
          second: [
            [a, mixed],
            [b, v[out]! * log * log],
          ],
        },
      ];
    }
    default: {
      const [first, second] = derivatives(step.operation, x, v[out]!);
      return [{ from: a, first, second: [[a, second]] }];
    }
  }
}

/**
 * The function x -> e(x) in double precision, x in the order of the names (NaN or infinite outside its domain).
 * Throws InputError if another name occurs.
 */
export function compileNumeric(e: Expression, names: readonly string[]): (x: Vector) => number {
  const p = compile(e, names);
  const v = p.initial.slice();
  return (x) => {
    for (let i = 0; i < p.names; i++) v[i] = x[i]!;
    for (const step of p.steps) v[step.out] = value(step, v);
    return v[p.result]!;
  };
}

/** x -> gradient, a new vector each time. */
export function gradientNumeric(e: Expression, names: readonly string[]): (x: Vector) => Float64Array {
  const p = compile(e, names);
  return (x) => {
    const v = forward(p, x);
    const adjoint = new Float64Array(v.length);
    adjoint[p.result] = 1;
    for (let s = p.steps.length - 1; s >= 0; s--) {
      const step = p.steps[s]!;
      const g = adjoint[step.out]!;
      if (g === 0 || !p.active[step.out]) continue;
      for (const edge of edges(step, p, v)) if (p.active[edge.from]) adjoint[edge.from] = adjoint[edge.from]! + g * edge.first;
    }
    return adjoint.slice(0, p.names);
  };
}

/** x -> Hessian, row after row. */
export function hessianNumeric(e: Expression, names: readonly string[]): (x: Vector) => Float64Array {
  const p = compile(e, names);
  const n = names.length;
  return (x) => {
    const v = forward(p, x);
    const graph = p.steps
      .filter((step) => p.active[step.out])
      .map((step) => ({ out: step.out, edges: edges(step, p, v).filter((g) => p.active[g.from]) }));
    const adjoint = new Float64Array(v.length);
    adjoint[p.result] = 1;
    for (let s = graph.length - 1; s >= 0; s--) {
      const { out, edges: list } = graph[s]!;
      const g = adjoint[out]!;
      if (g !== 0) for (const edge of list) adjoint[edge.from] = adjoint[edge.from]! + g * edge.first;
    }
    const hessian = new Float64Array(n * n);
    for (let column = 0; column < n; column++) {
      const tangent = new Float64Array(v.length);
      tangent[column] = 1;
      for (const { out, edges: list } of graph) {
        let t = 0;
        for (const edge of list) t += edge.first * tangent[edge.from]!;
        tangent[out] = t;
      }
      const dot = new Float64Array(v.length); // tangents of the adjoints
      for (let s = graph.length - 1; s >= 0; s--) {
        const { out, edges: list } = graph[s]!;
        const g = adjoint[out]!;
        const h = dot[out]!;
        if (g === 0 && h === 0) continue;
        for (const edge of list) {
          let d = h * edge.first;
          for (const [j, w] of edge.second) d += g * w * tangent[j]!;
          dot[edge.from] = dot[edge.from]! + d;
        }
      }
      for (let i = 0; i < n; i++) hessian[i * n + column] = dot[i]!;
    }
    // equal but for rounding: make it symmetric
    for (let i = 0; i < n; i++)
      for (let j = 0; j < i; j++) {
        const mean = (hessian[i * n + j]! + hessian[j * n + i]!) / 2;
        hessian[i * n + j] = mean;
        hessian[j * n + i] = mean;
      }
    return hessian;
  };
}
