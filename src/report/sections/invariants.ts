/** Molien series, generators of the invariant ring, relations, equivariants, and H in its invariants. */
import { type Block, cite, column, type Line, math, paragraph, type Section } from '../document.ts';
import { type Formula, formula, list, relation, sign } from '../mathematics/index.ts';
import type { ReportView } from '../view.ts';
import { count, integer, within } from './words.ts';

/** Signs of polynomials in the lists of a document, and entries; a reader wants no more. */
const GENERATORS = 12_000;
const RELATIONS = 5000;
const FIELDS = 8000;
const ENTRIES = 40;
/** A longer expression is left to the JSON result. */
const EXPRESSION = 8000;
/** A longer polynomial is not printed in a table: its terms are counted. */
const CELL = 700;

interface Series {
  readonly numerator: readonly number[];
  readonly denominator: readonly number[];
  readonly series: readonly number[];
}

/** sum of c_d t^d in the language of model files; vanishing terms are left out. */
function polynomialText(coefficients: readonly number[]): string {
  const terms = coefficients.flatMap((c, d) => {
    if (c === 0) return [];
    const power = d === 0 ? '' : d === 1 ? 't' : `t^${d}`;
    const size = Math.abs(c);
    const body = power === '' ? String(size) : size === 1 ? power : `${size}*${power}`;
    return [`${c < 0 ? '- ' : '+ '}${body}`];
  });
  if (terms.length === 0) return '0';
  return terms.join(' ').replace(/^\+ /, '').replace(/^- /, '-');
}

/** (1 - t^d)… with powers for repeated degrees. */
function denominatorText(degrees: readonly number[]): string {
  const counts = new Map<number, number>();
  for (const d of [...degrees].sort((a, b) => a - b)) counts.set(d, (counts.get(d) ?? 0) + 1);
  return [...counts].map(([d, n]) => `(1 - ${d === 1 ? 't' : `t^${d}`})${n === 1 ? '' : `^${n}`}`).join('*');
}

/** Numerator over denominator. */
function rationalFormula(series: Series): Formula {
  const top = polynomialText(series.numerator);
  if (series.denominator.length === 0) return formula(top);
  const below = formula(`${denominatorText(series.denominator)}`);
  const above = formula(top);
  const several = series.denominator.length > 1;
  return {
    text: `${/ /.test(top) ? `(${top})` : top}/${several ? `(${below.text})` : below.text}`,
    // written as one fraction by hand: numerators of series belong on the fraction line
    tree: { kind: 'quotient', numerator: above.tree, denominator: below.tree, whole: true },
  };
}

function seriesFormula(series: Series): Formula {
  const terms = formula(polynomialText(series.series));
  const dots = sign('...', '\\cdots', 1.2);
  const known = terms.tree.kind === 'sum' ? terms.tree.terms : [{ negative: false, tree: terms.tree }];
  return { text: `${terms.text} + ...`, tree: { kind: 'sum', terms: [...known, { negative: false, tree: dots.tree }] } };
}

function seriesBlocks(name: string, letter: string, series: Series): readonly Block[] {
  const left = sign(name, letter, 2.5);
  const blocks: Block[] = [{ kind: 'display', formula: relation(left, '=', rationalFormula(series)) }];
  if (series.series.length > 0) blocks.push({ kind: 'display', formula: relation(left, '=', seriesFormula(series)) });
  return blocks;
}

export function invariantsSection(view: ReportView): Section | null {
  const { molien, generators } = view;
  if (molien === undefined && generators === undefined) return null;
  const blocks: Block[] = [];
  if (molien !== undefined) {
    blocks.push({
      kind: 'paragraph',
      line: ['Molien series, whose coefficients count the independent invariants of each degree ', cite('stanley-1979'), ':'],
    });
    blocks.push(...seriesBlocks('M(t)', 'M(t)', molien));
  }
  if (generators !== undefined) {
    blocks.push({
      kind: 'paragraph',
      line: [
        `${count(generators.length, 'generator')} of the invariant ring`,
        view.complete === undefined ? '' : view.complete ? ', a complete set' : ', complete only up to the degree reached',
        view.proof === undefined || view.proof === '' ? '.' : `: ${view.proof}`,
      ],
    });
    const first = new Set(within(generators.slice(0, ENTRIES), (g) => Math.min(CELL, g.polynomial.length), GENERATORS));
    // and those that H is made of
    const used = new Set((view.hamiltonian?.expression ?? '').match(/[A-Za-z_]\w*/g) ?? []);
    const shown = generators.filter((g) => first.has(g) || used.has(g.name));
    const readable = shown.some((g) => g.readable !== undefined);
    blocks.push({
      kind: 'table',
      caption: 'Generators of the ring of invariants.',
      columns: [column('name'), column('degree', 'right'), column('polynomial'), ...(readable ? [column('short form')] : [])],
      rows: shown.map((g): readonly Line[] => [
        [math(formula(g.name))],
        [integer(g.degree)],
        polynomialCell(g.polynomial),
        ...(readable ? [g.readable === undefined ? ['–'] : [math(formula(g.readable))]] : []),
      ]),
    });
    blocks.push(...rest(generators.length - shown.length, 'generator'));
  }
  if (view.relations !== undefined && view.relations.length > 0) {
    blocks.push({ kind: 'paragraph', line: [`${count(view.relations.length, 'relation')} among them:`] });
    const shown = within(view.relations.slice(0, ENTRIES), (r) => r.length, RELATIONS);
    blocks.push({ kind: 'list', items: shown.map((r) => [math(equation(r))]) }, ...rest(view.relations.length - shown.length, 'relation'));
  }
  if (view.equivariants !== undefined) {
    blocks.push({
      kind: 'paragraph',
      line: ['Equivariant vector fields, counted by degree ', cite('golubitsky-stewart-schaeffer-1988'), ':'],
    });
    blocks.push(...seriesBlocks('E(t)', 'E(t)', view.equivariants));
    const all = view.equivariants.generators ?? [];
    const fields = within(all.slice(0, ENTRIES), (f) => Math.min(CELL, f.field.join().length), FIELDS);
    if (fields.length > 0)
      blocks.push({
        kind: 'table',
        caption: 'Generators of the equivariant vector fields as a module over the invariants.',
        columns: [column('degree', 'right'), column('field')],
        rows: fields.map((f) => [[integer(f.degree)], fieldCell(f.field)]),
      });
    blocks.push(...rest(all.length - fields.length, 'field'));
  }
  return { id: 'invariants', title: 'Invariants', blocks };
}

/** Terms of a polynomial in the language of model files: signs outside of brackets part them. */
function terms(polynomial: string): number {
  let depth = 0;
  let found = 1;
  for (let i = 0; i < polynomial.length; i++) {
    const c = polynomial[i];
    if (c === '(') depth++;
    else if (c === ')') depth--;
    else if (depth === 0 && (c === '+' || c === '-') && polynomial[i - 1] === ' ') found++;
  }
  return found;
}

function polynomialCell(polynomial: string): Line {
  return polynomial.length > CELL ? [`${count(terms(polynomial), 'term')}, in the JSON result`] : [math(formula(polynomial))];
}

function fieldCell(field: readonly string[]): Line {
  if (field.join().length <= CELL) return [math(list(field.map((x) => formula(x))))];
  const all = field.filter((x) => x !== '0').reduce((sum, x) => sum + terms(x), 0);
  return [`${count(all, 'term')}, in the JSON result`];
}

/** What a list leaves out. */
function rest(missing: number, noun: string): readonly Block[] {
  return missing === 0 ? [] : [paragraph(`${count(missing, `further ${noun}`)} ${missing === 1 ? 'is' : 'are'} left to the JSON result.`)];
}

/** A relation is a polynomial that vanishes, unless it is an equation already. */
function equation(text: string): Formula {
  const sides = text.split('=');
  return sides.length === 2 ? relation(formula(sides[0]!), '=', formula(sides[1]!)) : relation(formula(text), '=', formula('0'));
}

const awayFromOrigin = (view: ReportView): boolean => Object.values(view.equilibrium?.point ?? {}).some((v) => v !== 0 && v !== '0');

export function hamiltonianSection(view: ReportView): Section | null {
  const h = view.hamiltonian;
  if (h === undefined || h === null) return null;
  const blocks: Block[] = [...expressionBlocks('H', h.expression)];
  const exact = h.remainder === '0' || h.remainder === '';
  blocks.push(
    paragraph(
      ...(h.degree === undefined ? [] : ['Taylor terms up to degree ', integer(h.degree), '. ']),
      ...(awayFromOrigin(view) ? ['Coordinates are counted from the equilibrium. '] : []),
      exact ? 'The remainder is ' : 'What the invariants do not give:',
      ...(exact ? [math(formula('0')), ', exactly.'] : []),
    ),
  );
  if (!exact) blocks.push(...expressionBlocks('R', h.remainder));
  if (h.breaking !== undefined && h.breaking !== '' && h.breaking !== '0')
    blocks.push(paragraph('Terms that break the symmetry:'), ...expressionBlocks('B', h.breaking));
  return { id: 'hamiltonian', title: 'The Hamiltonian in its invariants', blocks };
}

function expressionBlocks(name: string, expression: string): readonly Block[] {
  if (expression.length > EXPRESSION)
    return [paragraph(math(formula(name)), ` has ${expression.length} signs, too many to be printed; the JSON result has it.`)];
  return [{ kind: 'display', formula: relation(formula(name), '=', formula(expression)) }];
}
