/** Sums of products as text, in the language of model files and in LaTeX. */

const GREEK = new Set(
  (
    'alpha beta gamma delta epsilon zeta eta theta iota kappa lambda mu nu xi pi rho sigma tau upsilon phi chi psi omega ' +
    'Gamma Delta Theta Lambda Xi Pi Sigma Upsilon Phi Psi Omega'
  ).split(' '),
);

/** A name as LaTeX: q1 -> q_{1}, mu -> \mu, omega0 -> \omega_{0}, k_a -> k_{a}, rate -> \mathit{rate}. */
export function latexName(name: string): string {
  const match = /^([A-Za-z]+)_?(.*)$/.exec(name);
  if (match === null) return `\\mathit{${name.replace(/_/g, '\\_')}}`;
  const [, stem, rest] = match as unknown as [string, string, string];
  const head = GREEK.has(stem) ? `\\${stem}` : stem.length === 1 ? stem : `\\mathit{${stem}}`;
  const index = rest.split('_').filter((s) => s !== '');
  return index.length === 0 ? head : `${head}_{${index.join(',')}}`;
}

/** True if the text is a sum (or difference) at its top level. */
export function isSum(text: string): boolean {
  let depth = 0;
  for (let i = 0; i < text.length; i++) {
    const c = text[i]!;
    if (c === '(' || c === '[' || c === '{') depth++;
    else if (c === ')' || c === ']' || c === '}') depth--;
    else if (depth === 0 && i > 0 && (c === '+' || c === '-')) return true;
  }
  return false;
}

/** Place of the only slash at top level, or -1 if there is none or more than one. */
function slash(text: string): number {
  let depth = 0;
  let found = -1;
  for (let i = 0; i < text.length; i++) {
    const c = text[i]!;
    if (c === '(') depth++;
    else if (c === ')') depth--;
    else if (depth === 0 && c === '/') {
      if (found >= 0) return -1;
      found = i;
    }
  }
  return found;
}

/** coefficient * product, the coefficient being text of a number or an expression. */
export function writeTerm(coefficient: string, product: string): string {
  if (product === '') return coefficient;
  if (coefficient === '1') return product;
  if (coefficient === '-1') return `-${product}`;
  if (isSum(coefficient)) return `(${coefficient})*${product}`;
  const cut = slash(coefficient);
  if (cut < 0) return `${coefficient}*${product}`;
  const numerator = coefficient.slice(0, cut);
  return `${writeTerm(numerator, product)}/${coefficient.slice(cut + 1)}`;
}

/** The same in LaTeX. */
export function latexTerm(coefficient: string, product: string): string {
  if (product === '') return coefficient;
  if (coefficient === '1') return product;
  if (coefficient === '-1') return `-${product}`;
  return isSum(coefficient) ? `\\left(${coefficient}\\right) ${product}` : `${coefficient} ${product}`;
}

/** Terms joined with their signs; a bare sum among several terms is put in parentheses by the caller's writeTerm only where it multiplies. */
export function joinTerms(terms: readonly string[]): string {
  if (terms.length === 0) return '0';
  let out = terms[0]!;
  for (const t of terms.slice(1)) out += t.startsWith('-') ? ` - ${t.slice(1)}` : ` + ${t}`;
  return out;
}
