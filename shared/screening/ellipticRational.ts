/**
 * The elliptic rational function R_N(x) with discrimination k1 = ε/√(10^(As/10)−1), |R_N| ≤ 1 for |x| ≤ 1 and ≥ 1/k1 in the
 * stop band, by its poles and zeros (Lutovac, Tošić & Evans 2001, chapter 12) from Jacobi functions computed with Landen's
 * transformation (Abramowitz & Stegun 1964, sections 16.12 to 16.14); chapter and sections from memory, the values are
 * checked against SciPy vectors.
 * @param x frequency over the pass-band edge
 */
export function ellipticRational(order: number, discrimination: number, x: number): number {
  const modulus = solveDegreeEquation(order, discrimination);
  const half = Math.floor(order / 2);
  let value = order % 2 === 1 ? x : 1;
  for (let i = 1; i <= half; i++) {
    const zero = jacobiCd((2 * i - 1) / order, modulus);
    const pole = 1 / (modulus * zero);
    value *= ((x * x - zero * zero) / (x * x - pole * pole)) * ((1 - pole * pole) / (1 - zero * zero));
  }
  return value;
}

function landenSequence(modulus: number): number[] {
  const sequence: number[] = [];
  let k = modulus;
  for (let step = 0; step < 12 && k > 1e-18; step++) {
    const complement = Math.sqrt(1 - k * k);
    k = (k / (1 + complement)) ** 2;
    sequence.push(k);
  }
  return sequence;
}

/** cd(u·K, k) for real u, by descending and ascending Landen steps. */
function jacobiCd(u: number, modulus: number): number {
  let value = Math.cos((u * Math.PI) / 2);
  for (const k of landenSequence(modulus).reverse()) value = ((1 + k) * value) / (1 + k * value * value);
  return value;
}

/** sn(u·K, k). */
function jacobiSn(u: number, modulus: number): number {
  let value = Math.sin((u * Math.PI) / 2);
  for (const k of landenSequence(modulus).reverse()) value = ((1 + k) * value) / (1 + k * value * value);
  return value;
}

/** The modulus k that belongs to order and discrimination: k' = k1'^N · Π sn⁴(u_i·K(k1'), k1'). */
function solveDegreeEquation(order: number, discrimination: number): number {
  const complement = Math.sqrt(1 - discrimination * discrimination);
  let product = complement ** order;
  for (let i = 1; i <= Math.floor(order / 2); i++) product *= jacobiSn((2 * i - 1) / order, complement) ** 4;
  return Math.sqrt(Math.max(0, 1 - product * product));
}
