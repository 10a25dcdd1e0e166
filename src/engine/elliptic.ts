// Elliptic integrals and functions by the arithmetic-geometric mean, for moduli however near to 0 and 1: a modulus and its complement
// are passed together, so that neither is lost in the other's rounding.

/** A modulus k and its complement k' with k² + k'² = 1. */
export interface Modulus {
  readonly k: number;
  readonly complement: number;
}

export const modulus = (k: number): Modulus => ({ k, complement: Math.sqrt((1 - k) * (1 + k)) });

/** The arithmetic-geometric mean of two numbers above 0. */
export function mean(a: number, b: number): number {
  while (Math.abs(a - b) > 2 * Number.EPSILON * a) [a, b] = [(a + b) / 2, Math.sqrt(a * b)];
  return a;
}

/** The complete elliptic integral K(k). */
export const completeIntegral = ({ complement }: Modulus): number => Math.PI / 2 / mean(1, complement);

/** K(k') / K(k). */
export const integralRatio = ({ k, complement }: Modulus): number => mean(1, complement) / mean(1, k);

/** The modulus whose integral ratio is given, above 0: by its nome, which is exp(−π·ratio). */
export function modulusOfRatio(ratio: number): Modulus {
  // Of a ratio and its inverse one has the smaller nome, whose series converge at once.
  if (ratio < 1) {
    const { k, complement } = modulusOfRatio(1 / ratio);
    return { k: complement, complement: k };
  }
  const q = Math.exp(-Math.PI * ratio);
  const [theta2, theta3, theta4] = [1, 1, 1].map((_, kind) => {
    let sum = 1;
    for (let n = 1; n < 12; n++) sum += kind === 0 ? q ** (n * (n + 1)) : 2 * (kind === 2 && n % 2 ? -1 : 1) * q ** (n * n);
    return sum;
  }) as [number, number, number];
  return { k: 4 * Math.sqrt(q) * (theta2 / theta3) ** 2, complement: (theta4 / theta3) ** 2 };
}

/** The Jacobi elliptic function cd(u·K, k), u from 0 to 1: 1 at 0, 0 at 1. */
export function cd(u: number, { k, complement }: Modulus): number {
  // Landen's transformation down to a modulus of 0, where cd is the cosine, and back.
  const moduli: number[] = [];
  let [a, b] = [1, complement];
  let c = k;
  while (c > Number.EPSILON * a && moduli.length < 60) {
    // k of the next step is (1 − k')/(1 + k'), without the difference: (k/(1 + k'))².
    const next = (c / (a + b)) ** 2;
    moduli.push(next);
    [a, b, c] = [1, (2 * Math.sqrt(b / a)) / (1 + b / a), next];
  }
  let value = Math.cos((u * Math.PI) / 2);
  for (const step of moduli.reverse()) value = ((1 + step) * value) / (1 + step * value ** 2);
  return value;
}
