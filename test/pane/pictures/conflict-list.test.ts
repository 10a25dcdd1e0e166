import { describe, expect, it } from 'vitest';
import { conflictList, conflictSentence } from '../../../src/pane/pictures/conflict-list';
import { standingOf, standingWords } from '../../../src/pane/pictures/standing';
import { rulesOf } from '../../../src/pane/ruler/rules';
import { type GivenRow, planOf } from '../ladder/plans';
import { markup } from '../markup';

function sentencesAt(rows: GivenRow[], rate: number, { guard = 0, ppm = 0, harmonics = 1, cores = 1 } = {}): string[] {
  const rules = rulesOf(planOf(rows, { guard, ppm }), { harmonics, cores });
  return standingOf(rules, rate).conflicts.map((conflict) => conflictSentence(conflict, rules));
}

describe('conflicts in words', () => {
  it.each<[string, GivenRow[], number, object, string[]]>([
    //                        bands                                     rate
    ['a band on an edge', [['A', 45, 55]], 100, {}, ['A crosses the zone edge 50 by 5.']],
    ['a band near an edge', [['A', 40, 49]], 100, { guard: 2 }, ['A is 1 from the zone edge 50, less than the guard.']],
    ['images that overlap', [['A', 10, 20], ['B', 115, 118, 'unwanted']], 100, {}, ['A and B overlap by 5.']],
    ['images too near', [['A', 10, 20], ['B', 121, 122]], 100, { guard: 2 }, ['A and B are 1 apart, less than the guard.']],
    ['a harmonic', [['A', 30, 31], ['B', 84, 84, 'unwanted']], 100, { harmonics: 2, guard: 3 }, ['A and harmonic 2 of B are 1 apart, less than the guard.']],
    ['its own image', [['A', 24, 25]], 100, { cores: 2, guard: 2 }, ['A and its own image 1/2 are 0 apart, less than the guard.']],
    ['an offset tone', [['A', 20, 30]], 100, { cores: 4, guard: 0 }, ['A and its own image 2/4 overlap by 10.', 'A and offset tone 1/4 overlap by 5.']],
    ['bands that nothing can part', [['A', 10, 20], ['B', 15, 16]], 100, {}, ['A and B overlap, or come nearer than the guard, before sampling, so no rate helps.']],
    ['a band that holds 0', [['A', -1, 20]], 100, {}, ['A holds 0 or lies nearer to it than the guard, so no rate helps.']],
  ])('tell %s', (_, rows, rate, options, expected) => {
    expect(sentencesAt(rows, rate, options)).toEqual(expected);
  });

  it('stand worst first, five in view and the others behind a count, each leading to its row', () => {
    const rows = Array.from({ length: 7 }, (_, i): GivenRow => [`Band ${i}`, 100 * i + 45, 100 * i + 51 + i * 0.5]);
    const rules = rulesOf(planOf(rows), { harmonics: 1, cores: 1 });
    const standing = standingOf(rules, 100);
    const [list, rest] = conflictList(standing, 100, rules);
    expect(list!.children).toHaveLength(5);
    expect(markup(rest!)).toContain(`<summary>${standing.conflicts.length - 5} more</summary>`);
    const worst = standing.conflicts[0]!;
    expect(markup(list!).split('\n')[2]).toContain(`data-row="${rules.rows[worst.band]!.index}"`);
  });

  it('say when there are none, when they are not known yet, and why they cannot be', () => {
    const rules = rulesOf(planOf([['A', 10, 20]]), { harmonics: 1, cores: 1 });
    const text = (standing: Parameters<typeof conflictList>[0]) => conflictList(standing, 100, rules).map((tree) => markup(tree)).join();
    expect(text(standingOf(rules, 100))).toBe('<p>Nothing speaks against 100.</p>');
    expect(text(null)).toContain('Computing');
    const refused = standingOf(rulesOf(planOf([['A', 10, 20, 'unwanted']]), { harmonics: 1, cores: 1 }), 100);
    expect(text(refused)).toContain('role must be &quot;wanted&quot; or blank in at least one row; got no such row.');
  });
});

describe('a rate in one line', () => {
  const lineAt = (rate: number, ppm: number) => standingWords(standingOf(rulesOf(planOf([['A', 40, 49]], { ppm }), { harmonics: 1, cores: 1 }), rate));

  it.each([
    //  rate  ppm    line
    [100, 0, '100 works: the rate may move 20000 ppm either way before a rule breaks.'],
    [100, 25000, '100 breaks one rule under the clock tolerance; without it the rate may move 20000 ppm.'],
    [90, 0, '90 breaks one rule.'],
  ])('%d with a tolerance of %d ppm', (rate, ppm, line) => {
    expect(lineAt(rate, ppm)).toBe(line);
  });
});
