/** What characters need of the classes of a group: their members and their power maps; sign homomorphisms. */
import { InputError } from '../errors/errors.ts';
import type { FiniteGroup } from './group.ts';

/** Element numbers of each class, increasing. */
export function classMembers(group: FiniteGroup): Int32Array[] {
  const members = group.classes.map((c) => new Int32Array(c.size));
  const filled = new Int32Array(members.length);
  for (let i = 0; i < group.order; i++) {
    const c = group.classOf[i]!;
    members[c]![filled[c]!++] = i;
  }
  return members;
}

/** Entry [c][k] is the class of g^k for g in class c, 0 <= k < order of g. */
export function powerClasses(group: FiniteGroup): Int32Array[] {
  return group.classes.map(({ representative, order }) => {
    const row = new Int32Array(order);
    for (let k = 0, x = 0; k < order; k++) {
      row[k] = group.classOf[x]!;
      x = group.multiply(x, representative);
    }
    return row;
  });
}

/**
 * The homomorphism to {+1, -1} with given values on the generators, one entry for each element.
 * Throws InputError if there is none.
 */
export function signFromGenerators(group: FiniteGroup, signs: readonly (1 | -1)[]): Int8Array {
  const sigma = new Int8Array(group.order);
  sigma[0] = 1;
  for (let i = 1; i < group.order; i++) sigma[i] = sigma[group.parent[i]!]! * signs[group.via[i]!]!;
  // Multiplicative on generators times elements, hence everywhere.
  const distinct = new Map<number, 1 | -1>();
  group.generators.forEach((g, s) => {
    if (sigma[g] !== signs[s] || (distinct.has(g) && distinct.get(g) !== signs[s])) throw noSign(s);
    distinct.set(g, signs[s]!);
  });
  for (const [g, sign] of distinct)
    for (let i = 0; i < group.order; i++) if (sigma[group.multiply(g, i)] !== sigma[i]! * sign) throw noSign(group.generators.indexOf(g));
  return sigma;
}

function noSign(generator: number): InputError {
  return new InputError(`the signs of the generators do not extend to the group (generator ${generator})`, {
    expected: 'a homomorphism to {+1, -1}: every relation between the generators has an even number of reversing ones',
    next: 'check which generators reverse time',
  });
}

/** Values on the classes of a sign given on the elements. */
export function signOnClasses(group: FiniteGroup, sigma: Int8Array): Int8Array {
  return Int8Array.from(group.classes, (c) => sigma[c.representative]!);
}
