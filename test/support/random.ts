// Seeded random input. Every test that uses it names its seed in its title, so a failure can be repeated.

export interface Random {
  /** From 0 to below 1. */
  unit(): number;
  /** A whole number from low to high, both included. */
  whole(low: number, high: number): number;
  pick<T>(list: readonly T[]): T;
  /** A decimal of so many significant digits, whose first digit stands at 10^exponent. */
  decimal(digits: number, exponent: number): number;
}

/** The generator known as mulberry32. */
export function seeded(seed: number): Random {
  let state = seed >>> 0;
  const unit = () => {
    state = (state + 0x6d2b79f5) >>> 0;
    let t = state;
    t = Math.imul(t ^ (t >>> 15), t | 1);
    t ^= t + Math.imul(t ^ (t >>> 7), t | 61);
    return ((t ^ (t >>> 14)) >>> 0) / 4294967296;
  };
  const whole = (low: number, high: number) => low + Math.floor(unit() * (high - low + 1));
  return {
    unit,
    whole,
    pick: (list) => list[whole(0, list.length - 1)]!,
    decimal(digits, exponent) {
      let text = String(whole(1, 9));
      while (text.length < digits) text += whole(0, 9);
      return Number(`${text}e${exponent - digits + 1}`);
    },
  };
}
