// What a benchmark gives: times measured in one run, side by side, and how they compare.

export interface Row {
  what: string;
  /** Fastest of the rounds: what the machine can do when nothing else runs. */
  ms: number;
  /** This time over that of the row it is compared with. */
  ratio: number | null;
  comparedWith: string;
}

/** Times alternatives by turns, so that a slow moment of the machine hits all of them, and gives the fastest of each. */
export function race(rounds: number, alternatives: Record<string, () => unknown>): Record<string, number> {
  const times = Object.fromEntries(Object.keys(alternatives).map((name) => [name, Infinity]));
  for (let round = -2; round < rounds; round++) {
    for (const [name, run] of Object.entries(alternatives)) {
      const start = performance.now();
      run();
      const spent = performance.now() - start;
      if (round >= 0) times[name] = Math.min(times[name]!, spent); // the first two rounds warm up
    }
  }
  return times;
}

/** Rows as the table that the README shows. */
export function markdown(rows: readonly Row[]): string {
  const lines = rows.map(({ what, ms, ratio, comparedWith }) => `| ${what} | ${duration(ms)} | ${ratio === null ? '' : `${figure(ratio)} × ${comparedWith}`} |`);
  return ['| what | time | ratio |', '| --- | --- | --- |', ...lines].join('\n');
}

function duration(ms: number): string {
  if (ms < 10) return `${ms.toFixed(2)} ms`;
  if (ms < 10_000) return `${ms.toFixed(0)} ms`;
  return ms < 7_200_000 ? `${figure(ms / 1000)} s` : `${figure(ms / 3_600_000)} h`;
}

/** Large numbers to two digits: more would be noise. */
export const figure = (x: number): string => (x < 100 ? x.toFixed(2) : Number(x.toPrecision(2)).toLocaleString('en-US').replaceAll(',', ' '));
