/** Expressions as text in the language of model files, and as LaTeX. */
import { boundedText, type Expression, fold } from './ast.ts';

/** How tightly a text holds together: a sum, a signed or fractional product, a product, a power, one piece. */
const SUM = 0;
const SIGNED = 1;
const PRODUCT = 2;
const POWER = 3;
const ATOM = 4;

interface Piece {
  readonly text: string;
  readonly level: number;
}

/** The text of an expression; parsing it gives an equal expression. Throws LimitError past 16 MB. */
export function formatExpression(root: Expression): string {
  const wrap = (p: Piece, level: number) => (p.level >= level ? p.text : `(${p.text})`);
  const piece = (e: Expression, parts: readonly Piece[]): Piece => {
    switch (e.kind) {
      case 'number':
        return { text: e.d === 1n ? `${e.n}` : `${e.n}/${e.d}`, level: e.n < 0n ? SIGNED : e.d === 1n ? ATOM : PRODUCT };
      case 'pi':
        return { text: 'pi', level: ATOM };
      case 'symbol':
        return { text: e.name, level: ATOM };
      case 'sum':
        return { text: joinTerms(parts.map((p) => wrap(p, SIGNED))), level: SUM };
      case 'product':
        return {
          text: parts.map((p, i) => wrap(p, i === 0 ? SIGNED : PRODUCT)).join('*'),
          level: parts[0]!.level === SIGNED ? SIGNED : PRODUCT,
        };
      case 'negate':
        return { text: `-${wrap(parts[0]!, PRODUCT)}`, level: SIGNED };
      case 'quotient':
        return {
          text: `${wrap(parts[0]!, SIGNED)}/${wrap(parts[1]!, POWER)}`,
          level: parts[0]!.level === SIGNED ? SIGNED : PRODUCT,
        };
      case 'power':
        return { text: `${wrap(parts[0]!, ATOM)}^${wrap(parts[1]!, POWER)}`, level: POWER };
      case 'call':
        return { text: `${e.name}(${parts[0]!.text})`, level: ATOM };
    }
  };
  return fold<Piece>(root, (e, parts) => {
    const p = piece(e, parts);
    boundedText(p.text);
    return p;
  }).text;
}

/** a + b - c from signed texts. */
function joinTerms(terms: readonly string[]): string {
  if (terms.length === 0) return '0';
  return terms.map((t, i) => (i === 0 ? t : t.startsWith('-') ? ` - ${t.slice(1)}` : ` + ${t}`)).join('');
}

const GREEK: ReadonlySet<string> = new Set(
  (
    'alpha beta gamma delta epsilon zeta eta theta iota kappa lambda mu nu xi pi rho sigma tau upsilon phi chi psi omega ' +
    'Gamma Delta Theta Lambda Xi Pi Sigma Upsilon Phi Psi Omega varepsilon vartheta varrho varsigma varphi ell hbar'
  ).split(' '),
);
const LETTERS: ReadonlyMap<string, string> = new Map(
  Object.entries({
    α: 'alpha',
    β: 'beta',
    γ: 'gamma',
    δ: 'delta',
    ε: 'varepsilon',
    ζ: 'zeta',
    η: 'eta',
    θ: 'theta',
    ι: 'iota',
    κ: 'kappa',
    λ: 'lambda',
    μ: 'mu',
    ν: 'nu',
    ξ: 'xi',
    ρ: 'rho',
    ς: 'varsigma',
    σ: 'sigma',
    τ: 'tau',
    υ: 'upsilon',
    φ: 'varphi',
    χ: 'chi',
    ψ: 'psi',
    ω: 'omega',
    Γ: 'Gamma',
    Δ: 'Delta',
    Θ: 'Theta',
    Λ: 'Lambda',
    Ξ: 'Xi',
    Π: 'Pi',
    Σ: 'Sigma',
    Υ: 'Upsilon',
    Φ: 'Phi',
    Ψ: 'Psi',
    Ω: 'Omega',
    ϑ: 'vartheta',
    ϕ: 'phi',
    ϱ: 'varrho',
    ϵ: 'epsilon',
    ℏ: 'hbar',
  }),
);

/** A word of a name: a letter, a Greek letter, digits, or upright-free italics. */
function latexWord(word: string): string {
  if (GREEK.has(word)) return `\\${word}`;
  const letter = LETTERS.get(word);
  if (letter !== undefined) return `\\${letter}`;
  if (/^(\p{L}|\d+)$/u.test(word)) return word;
  return `\\mathit{${word.replaceAll('_', '\\_')}}`;
}

/** A name in LaTeX: `q1` is q_{1}, `alpha_1` is \alpha_{1}, `k_rot` is k_{\mathit{rot}}. */
export function latexName(name: string): string {
  const plain = /^(\p{L}+?)_?(\d+)$/u.exec(name) ?? /^(\p{L}+)_(\p{L}+\d*|\d+)$/u.exec(name);
  if (plain === null) return latexWord(name);
  return `${latexWord(plain[1]!)}_{${latexWord(plain[2]!)}}`;
}

/** An expression in LaTeX, without dollars. Throws LimitError past 16 MB. */
export function latexExpression(root: Expression): string {
  const wrap = (p: Piece, level: number) => (p.level >= level ? p.text : `\\left(${p.text}\\right)`);
  const piece = (e: Expression, parts: readonly Piece[]): Piece => {
    switch (e.kind) {
      case 'number': {
        if (e.d === 1n) return { text: `${e.n}`, level: e.n < 0n ? SIGNED : ATOM };
        return { text: `${e.n < 0n ? '-' : ''}\\tfrac{${e.n < 0n ? -e.n : e.n}}{${e.d}}`, level: e.n < 0n ? SIGNED : PRODUCT };
      }
      case 'pi':
        return { text: '\\pi', level: ATOM };
      case 'symbol':
        return { text: latexName(e.name), level: ATOM };
      case 'sum':
        return { text: joinTerms(parts.map((p) => wrap(p, SIGNED))), level: SUM };
      case 'product': {
        // a digit after another factor needs a dot
        const texts = parts.map((p, i) => wrap(p, i === 0 ? SIGNED : PRODUCT));
        const text = texts.reduce((left, t) => `${left}${/^\d|^\\tfrac/.test(t) ? ' \\cdot ' : ' '}${t}`);
        return { text, level: parts[0]!.level === SIGNED ? SIGNED : PRODUCT };
      }
      case 'negate':
        return { text: `-${wrap(parts[0]!, PRODUCT)}`, level: SIGNED };
      case 'quotient':
        return { text: `\\frac{${parts[0]!.text}}{${parts[1]!.text}}`, level: PRODUCT };
      case 'power':
        return { text: `${wrap(parts[0]!, ATOM)}^{${parts[1]!.text}}`, level: POWER };
      case 'call':
        return { text: e.name === 'sqrt' ? `\\sqrt{${parts[0]!.text}}` : `\\${e.name}\\left(${parts[0]!.text}\\right)`, level: ATOM };
    }
  };
  return fold<Piece>(root, (e, parts) => {
    const p = piece(e, parts);
    boundedText(p.text);
    return p;
  }).text;
}
