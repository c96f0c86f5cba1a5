/** Gaussian elimination modulo a prime p < 2^31 on Int32Array matrices with entries in [0, p), row-major. */
import { addRowInPlace, invMod, mulAddMod, mulMod } from '../field/index.ts';

export interface ModularMatrix {
  readonly p: number;
  readonly rows: number;
  readonly cols: number;
  readonly data: Int32Array;
}

export function modularMatrix(p: number, rows: number, cols: number, data: Int32Array = new Int32Array(rows * cols)): ModularMatrix {
  return { p, rows, cols, data };
}

/** Reduces `data` to row echelon form (reduced if asked); returns the pivot columns. Rows are permuted. */
function eliminateInPlace(data: Int32Array, rows: number, cols: number, p: number, reduced: boolean): number[] {
  const pivots: number[] = [];
  let done = 0;
  for (let j = 0; j < cols && done < rows; j++) {
    let i = done;
    while (i < rows && data[i * cols + j] === 0) i++;
    if (i === rows) continue;
    if (i !== done)
      for (let k = j; k < cols; k++) {
        const t = data[i * cols + k]!;
        data[i * cols + k] = data[done * cols + k]!;
        data[done * cols + k] = t;
      }
    const inv = invMod(data[done * cols + j]!, p);
    if (inv !== 1)
      for (let k = j; k < cols; k++) if (data[done * cols + k] !== 0) data[done * cols + k] = mulMod(inv, data[done * cols + k]!, p);
    for (let r = reduced ? 0 : done + 1; r < rows; r++) {
      const x = data[r * cols + j]!;
      if (x !== 0 && r !== done) addRowInPlace(data, r * cols, done * cols, j, cols, p - x, p);
    }
    pivots.push(j);
    done++;
  }
  return pivots;
}

export function modularRank(a: ModularMatrix): number {
  return eliminateInPlace(Int32Array.from(a.data), a.rows, a.cols, a.p, false).length;
}

export function modularEchelon(a: ModularMatrix): { matrix: ModularMatrix; pivots: number[] } {
  const data = Int32Array.from(a.data);
  const pivots = eliminateInPlace(data, a.rows, a.cols, a.p, true);
  return { matrix: { p: a.p, rows: pivots.length, cols: a.cols, data: data.slice(0, pivots.length * a.cols) }, pivots };
}

/** Basis of {x : a x = 0}, one vector a row. */
export function modularKernel(a: ModularMatrix): ModularMatrix {
  const { matrix: e, pivots } = modularEchelon(a);
  const isPivot = new Uint8Array(a.cols);
  for (const j of pivots) isPivot[j] = 1;
  const free: number[] = [];
  for (let j = 0; j < a.cols; j++) if (isPivot[j] === 0) free.push(j);
  const data = new Int32Array(free.length * a.cols);
  free.forEach((j, r) => {
    data[r * a.cols + j] = 1;
    pivots.forEach((c, i) => {
      const x = e.data[i * a.cols + j]!;
      data[r * a.cols + c] = x === 0 ? 0 : a.p - x;
    });
  });
  return { p: a.p, rows: free.length, cols: a.cols, data };
}

export function modularMultiply(a: ModularMatrix, b: ModularMatrix): ModularMatrix {
  const out = new Int32Array(a.rows * b.cols);
  for (let i = 0; i < a.rows; i++)
    for (let k = 0; k < a.cols; k++) {
      const x = a.data[i * a.cols + k]!;
      if (x !== 0)
        for (let j = 0; j < b.cols; j++) {
          const y = b.data[k * b.cols + j]!;
          if (y !== 0) out[i * b.cols + j] = mulAddMod(out[i * b.cols + j]!, x, y, a.p);
        }
    }
  return { p: a.p, rows: a.rows, cols: b.cols, data: out };
}

export function modularTranspose(a: ModularMatrix): ModularMatrix {
  const out = new Int32Array(a.rows * a.cols);
  for (let i = 0; i < a.rows; i++) for (let j = 0; j < a.cols; j++) out[j * a.rows + i] = a.data[i * a.cols + j]!;
  return { p: a.p, rows: a.cols, cols: a.rows, data: out };
}
