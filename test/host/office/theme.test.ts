import { expect, it } from 'vitest';
import { isDark } from '../../../src/host/office/theme';

it.each([
  ['#FFFFFF', false],
  ['#e6e6e6', false],
  ['#262626', true],
  ['0a0a0a',  true],
  ['#0000FF', true], // blue looks dark
  ['#00FF00', false],
  ['',        null],
  ['black',   null],
])('a program on a ground of "%s" is dark: %s', (bodyBackgroundColor, dark) => {
  expect(isDark({ bodyBackgroundColor })).toBe(dark);
});

it('a program that tells of no theme leaves it to the system', () => {
  expect(isDark(undefined)).toBe(null);
});
