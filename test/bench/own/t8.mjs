import { RealField } from '../../../dist/field/index.js';
import { fromColumns } from '../../../dist/linear/index.js';
import { doubles } from '../../../dist/model/expression/constants.js';
import { reduceToKernel } from '../../../dist/normalform/splitting.js';
import { PolynomialRing, RationalFunctionField } from '../../../dist/polynomial/index.js';
import { done, expect, timed } from './clock.mjs';

/** Twelve sites s q²/2·2 + a q³/3 + b q⁴/4 with coupling c/2 (q_i - q_{i+1})², s = -c/2: mode 2 is critical. */
function twelve(f, cosine, c, a, b) {
  const names = Array.from({ length: 12 }, (_, i) => `q${i + 1}`);
  const ring = new PolynomialRing(f, names);
  const site = [f.mul(f.fromRational(-1n, 2n), c), f.mul(f.fromRational(1n, 3n), a), f.mul(f.fromRational(1n, 4n), b)];
  const half = f.fromRational(1n, 2n);
  const parts = [];
  for (let i = 0; i < 12; i++) {
    site.forEach((x, e) => {
      parts.push(ring.scale(ring.power(ring.variable(i), e + 2), x));
    });
    const d = ring.sub(ring.variable(i), ring.variable((i + 1) % 12));
    parts.push(ring.scale(ring.mul(d, d), f.mul(half, c)));
  }
  const kernel = [];
  const columns = [];
  for (let k = 0; k <= 6; k++) {
    const cos = Array.from({ length: 12 }, (_, i) => cosine(k * i));
    const sin = Array.from({ length: 12 }, (_, i) => cosine(k * i - 3));
    (k === 2 ? kernel : columns).push(...(k % 6 === 0 ? [cos] : [cos, sin]));
  }
  return {
    ring,
    dimension: 12,
    hamiltonian: ring.sum(parts),
    kernel: fromColumns(f, kernel, 12),
    complement: fromColumns(f, columns, 12),
    degree: 6,
  };
}

const exact = RealField.of({ squareRoots: [3n] });
const exactCosine = (k) => exact.cos(((k % 12) + 12) % 12, 12);
const symbols = new RationalFunctionField(new PolynomialRing(exact, ['c', 'a', 'b']));
const numeric = twelve(doubles, (k) => Math.cos((Math.PI * k) / 6), 1, 1, 1);
const symbolic = twelve(symbols, (k) => symbols.fromConstant(exactCosine(k)), ...['c', 'a', 'b'].map((x) => symbols.symbol(x)));

const which = process.argv[2];
for (const [name, input] of [
  ['splitting lemma, numbers', numeric],
  ['splitting lemma, three symbols', symbolic],
]) {
  if (which !== undefined && which !== name) continue;
  const h = timed(name, () => reduceToKernel(input)).h;
  expect(h.monomials.length > 0, true, name);
}
done();
