import { describe, expect, it } from 'vitest';
import { headline } from '../../src/pane/words';
import { figures } from './ladder/plans';

describe('the rate at a glance', () => {
  // 3 × 571.165 − 1576.443 is 137.052: 0.052 beside 137, and a clock 20 ppm slow brings it 0.0342699 nearer.
  const ROWS: Parameters<typeof figures>[0] = [['Airband', 117.975, 137, 'wanted'], ['GPS', 1574.397, 1576.443, 'wanted']];

  it('works only nominally where images come nearer than the guard within the tolerance of the clock, and says which', () => {
    const { outcome, against, objections } = headline(figures(ROWS, { rate: 571.165, guard: 0.02, ppm: 20 }));
    expect({ outcome, against, objections }).toEqual({
      outcome: 'narrowly', against: 1,
      objections: ['Airband and GPS come nearer than the guard within ±20 ppm of the clock: 0.0177301 apart at worst.'],
    });
  });

  it('works where they keep it', () => {
    expect(headline(figures(ROWS, { rate: 571.165, guard: 0.01, ppm: 20 })).outcome).toBe('works');
    expect(headline(figures(ROWS, { rate: 571.165, guard: 0.02, ppm: 0 })).outcome).toBe('works');
  });
});
