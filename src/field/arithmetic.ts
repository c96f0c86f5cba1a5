/** Elementary number theory on small and big integers: factors, totients, cyclotomic polynomials, modular powers. */

/** Prime factors of n >= 1 with exponents, by trial division. */
export function factorize(n: number): Array<[prime: number, exponent: number]> {
  const out: Array<[number, number]> = [];
  for (let p = 2; p * p <= n; p += p === 2 ? 1 : 2) {
    let e = 0;
    while (n % p === 0) {
      n /= p;
      e++;
    }
    if (e > 0) out.push([p, e]);
  }
  if (n > 1) out.push([n, 1]);
  return out;
}

export function gcdInt(a: number, b: number): number {
  a = Math.abs(a);
  b = Math.abs(b);
  while (b !== 0) [a, b] = [b, a % b];
  return a;
}

export function lcmInt(a: number, b: number): number {
  return a === 0 || b === 0 ? 0 : (a / gcdInt(a, b)) * b;
}

/** Euler's totient. */
export function totient(n: number): number {
  let r = n;
  for (const [p] of factorize(n)) r = (r / p) * (p - 1);
  return r;
}

/** Divisors of n in increasing order. */
export function divisors(n: number): number[] {
  const out: number[] = [];
  for (let d = 1; d * d <= n; d++)
    if (n % d === 0) {
      out.push(d);
      if (d * d !== n) out.push(n / d);
    }
  return out.sort((a, b) => a - b);
}

const cyclotomicCache = new Map<number, readonly number[]>();

/** Coefficients of the n-th cyclotomic polynomial, constant term first (length totient(n) + 1). */
export function cyclotomicPolynomial(n: number): readonly number[] {
  const known = cyclotomicCache.get(n);
  if (known !== undefined) return known;
  // Phi_n = product over d | n of (x^d - 1)^{mu(n/d)}: multiply first, then divide exactly.
  const square = factorize(n);
  let numerator: number[] = [1];
  const denominators: number[] = [];
  const subsets = 1 << square.length;
  for (let mask = 0; mask < subsets; mask++) {
    let d = n;
    let bits = 0;
    square.forEach(([p], i) => {
      if (mask & (1 << i)) {
        d /= p;
        bits++;
      }
    });
    if (bits % 2 === 0) {
      const next = new Array<number>(numerator.length + d).fill(0);
      numerator.forEach((c, i) => {
        next[i + d] = next[i + d]! + c;
        next[i] = next[i]! - c;
      });
      numerator = next;
    } else denominators.push(d);
  }
  for (const d of denominators) {
    // exact division by x^d - 1, from the top
    const q = new Array<number>(numerator.length - d).fill(0);
    const r = numerator.slice();
    for (let i = r.length - 1; i >= d; i--) {
      const c = r[i]!;
      q[i - d] = c;
      r[i] = 0;
      r[i - d] = r[i - d]! + c;
    }
    numerator = q;
  }
  while (numerator.length > 1 && numerator.at(-1) === 0) numerator.pop();
  cyclotomicCache.set(n, numerator);
  return numerator;
}

/** a^e mod m for bigints, e >= 0. */
export function powMod(a: bigint, e: bigint, m: bigint): bigint {
  let r = 1n;
  a %= m;
  if (a < 0n) a += m;
  while (e > 0n) {
    if (e & 1n) r = (r * a) % m;
    a = (a * a) % m;
    e >>= 1n;
  }
  return r;
}

/** Primes by which small factors are found before anything dearer. */
const SMALL_PRIMES = [2, 3, 5, 7, 11, 13, 17, 19, 23, 29, 31, 37, 41, 43, 47];

/**
 * Primality of n < 2^31: small factors, then Miller's test with the bases 2, 3, 5, 7, which no composite below 3 215 031 751
 * passes (C. Pomerance, J. L. Selfridge, S. S. Wagstaff, The pseudoprimes to 25·10⁹, 1980).
 */
export function isPrime(n: number): boolean {
  if (n < 2) return false;
  for (const p of SMALL_PRIMES) if (n % p === 0) return n === p;
  if (n < 53 * 53) return true;
  // a b mod n by halves of b: every product stays below 2^53
  const times = (a: number, b: number) => (((a * (b >>> 16)) % n) * 65536 + a * (b & 65535)) % n;
  const twos = 31 - Math.clz32((n - 1) & (1 - n));
  const odd = (n - 1) / 2 ** twos;
  return [2, 3, 5, 7].every((base) => {
    let x = 1;
    let square = base;
    for (let e = odd; e > 0; e >>>= 1) {
      if (e & 1) x = times(x, square);
      square = times(square, square);
    }
    if (x === 1 || x === n - 1) return true;
    for (let i = 1; i < twos; i++) {
      x = times(x, x);
      if (x === n - 1) return true;
    }
    return false;
  });
}

/** Integer square root, floor, of n >= 0. */
export function isqrt(n: bigint): bigint {
  if (n < 2n) return n;
  let x = BigInt(Math.floor(Math.sqrt(Number(n))));
  for (;;) {
    const y = (x + n / x) >> 1n;
    if (y === x || y === x + 1n || y === x - 1n) {
      x = y;
      while (x * x > n) x--;
      while ((x + 1n) * (x + 1n) <= n) x++;
      return x;
    }
    x = y;
  }
}
