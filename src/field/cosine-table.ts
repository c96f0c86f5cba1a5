/** Reduction of cosines: the multiplication of the cyclotomic part of a real field. */
import { cyclotomicPolynomial } from './arithmetic.ts';

/** 2cos(2 pi k/N), 0 <= k < N, over the basis 1, c_1, …, c_{m-1}. */
export function reductionTable(n: number, m: number): number[][] {
  // Over the power basis of Q(zeta_N), zeta^k + zeta^-k; the c_j with j < m are triangular there up to sign,
  // so solve by the recursion c_{k+1} = c_1 c_k - c_{k-1} with the minimal relation found from Phi_N.
  const rows: number[][] = [];
  const unit = (j: number, v: number) => Array.from({ length: m }, (_, i) => (i === j ? v : 0));
  for (let k = 0; k < m; k++) rows.push(unit(k, k === 0 ? 2 : 1));
  // Phi_N is palindromic of degree 2m: a_0 c_m + … : sum over i of a_{m-i} c_i = 0 (a_m counted once)
  const phi = cyclotomicPolynomial(n);
  const relation = new Array<number>(m).fill(0);
  relation[0] = -phi[m]!;
  for (let i = 1; i < m; i++) relation[i] = -phi[m - i]!;
  rows.push(relation); // c_m, since phi[0] = phi[2m] = 1
  for (let k = m + 1; k < n; k++) {
    // c_k = c_1 c_{k-1} - c_{k-2}
    const prev = rows[k - 1]!;
    const out = new Array<number>(m).fill(0);
    for (let i = 0; i < m; i++) {
      const x = prev[i]!;
      if (x === 0) continue;
      if (i === 0) {
        if (m > 1) out[1] = out[1]! + x;
        else out[0] = out[0]! + x * relation[0]!;
        continue;
      }
      // c_1 c_i = c_{i+1} + c_{i-1}
      if (i + 1 < m) out[i + 1] = out[i + 1]! + x;
      else for (let l = 0; l < m; l++) out[l] = out[l]! + x * relation[l]!;
      out[i - 1] = out[i - 1]! + (i === 1 ? 2 * x : x);
    }
    const before = rows[k - 2]!;
    for (let i = 0; i < m; i++) out[i] = out[i]! - before[i]!;
    rows.push(out);
  }
  return rows;
}
