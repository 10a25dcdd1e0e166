import { describe, expect, it } from 'vitest';
import { rowReference } from '../../../src/pane/pictures/rows';
import type { Places } from '../../../src/pane/plan';
import { planOf } from '../ladder/plans';

const at = (sheet: string, address: string) => ({ sheet, address });
const down: Places = { name: at('Plan', 'A8:A20'), low: at('Plan', 'B8:B20'), high: at('Plan', 'C8:C20'), role: at('Plan', 'D8:D20') };

describe('where a row of the plan stands', () => {
  it.each<[string, Places, number, string | null]>([
    ['from its name to its role          ', down, 2, 'Plan!A10:D10'],
    ['in a sheet whose name needs quotes ', { low: at("Bob's plan", 'B2:B9'), high: at("Bob's plan", 'C2:C9') }, 0, "'Bob''s plan'!B2:C2"],
    ['without what stands in other rows  ', { ...down, role: at('Plan', 'D30:D42') }, 0, 'Plan!A8:C8'],
    ['without what stands in other sheets', { ...down, name: at('Names', 'A8:A20') }, 0, 'Plan!B8:D8'],
    ['in a plan that lies on its side    ', { name: at('Plan', 'B1:K1'), low: at('Plan', 'B2:K2'), high: at('Plan', 'B3:K3') }, 3, 'Plan!E1:E3'],
    ['nowhere where no column is known   ', {}, 0, null],
  ])('%s', (_, places, index, reference) => {
    expect(rowReference({ ...planOf([]), places }, index)).toBe(reference);
  });
});
