/** Normal spaces as quadratic Hamiltonians: invariant, as many as the codimension, transversal to the orbit. */
import { describe, expect, it } from 'vitest';
import { embedSparse } from '../../src/action/index.ts';
import { freeUnfoldingForms, quadraticText, unfoldingForms } from '../../src/event/unfolding.ts';
import { versality } from '../../src/event/versality.ts';
import type { Algebraic } from '../../src/field/index.ts';
import { dense, fromColumns, type Matrix, sparse, sparseCongruence, sparseEquals } from '../../src/linear/index.ts';
import { action, canonical, diag, eventOf, F, lift, rotation } from '../support/actions.ts';
import { randomModel } from '../support/random-models.ts';

describe('unfoldings', () => {
  it('the planar oscillator under D3: |q|² (worked by hand)', () => {
    const act = action(F, canonical(F, 2), [lift(rotation(F, 1, 3)), lift(diag(F, 1, -1))]);
    const event = eventOf(act, diag(F, 0, 0, 1, 1));
    const names = ['q1', 'q2', 'p1', 'p2'];
    expect(unfoldingForms(event, act)!.map((q) => quadraticText(q, names, act.field))).toEqual(['q1^2 + q2^2']);
    expect(freeUnfoldingForms(event, act, diag(F, 0, 0, 1, 1))!).toHaveLength(4);
  });
  it('one degree of freedom: q² for [2], all three squares for the zero Hessian (Galin 1982)', () => {
    const act = action(F, canonical(F, 1), []);
    const write = (s: Matrix<Algebraic>) => unfoldingForms(eventOf(act, s), act)!.map((q) => quadraticText(q, ['q', 'p'], act.field));
    expect(write(diag(F, 0, 1))).toEqual(['q^2']);
    expect(write(diag(F, 0, 0)).sort()).toEqual(['p^2', 'q*p', 'q^2']);
    expect(write(diag(F, 1, 1))).toEqual([]);
  });
  it('random models: the forms are invariant and a family along them is versal, along all but one it is not', () => {
    let seen = 0;
    for (let seed = 1; seen < 25; seed++) {
      const model = randomModel(seed);
      if (model === undefined) continue;
      const act = action(model.field, model.w, model.generators);
      const s = embedSparse(sparse(model.s), model.field, act.field);
      const event = eventOf(act, model.s);
      if (event.codimension === 0 || event.codimension > 6) continue;
      seen++;
      const forms = unfoldingForms(event, act)!;
      expect(forms).toHaveLength(event.codimension);
      for (const q of forms)
        for (const g of act.generators) expect(sparseEquals(sparseCongruence(g.matrix, sparse(q)), sparse(q))).toBe(true);
      const n = act.dimension;
      const none = new Array<Algebraic>(n).fill(act.field.zero);
      const family = (list: readonly Matrix<Algebraic>[]) =>
        versality(event, {
          field: act.field,
          hessian: s,
          hessianBy: list.map((q) => sparse(q)),
          gradientBy: list.map(() => none),
          cubicAlong: () => ({ ...s, index: s.index.map(() => []), value: s.value.map(() => []) }),
          fixed: fromColumns<Algebraic>(act.field, [], n),
          branch: list.map(() => none),
        });
      expect(family(forms).versal).toBe(true);
      expect(family(forms.slice(1)).spanned).toBe(event.codimension - 1);
      expect(dense(s).rows).toBe(n);
    }
    expect(seen).toBeGreaterThan(5);
  });
});
