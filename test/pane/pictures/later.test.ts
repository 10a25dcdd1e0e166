import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { later } from '../../../src/pane/pictures/later';

beforeEach(() => vi.useFakeTimers());
afterEach(() => vi.useRealTimers());

describe('work that is done a little later', () => {
  it('is done once for inputs that change quickly, and not again for the same ones', () => {
    const done: number[] = [];
    const squares = later<number>(() => done.push(squares.value!));
    for (const x of [1, 2, 3, 3]) squares.ask(String(x), () => x * x);
    expect([squares.value, squares.fresh]).toEqual([null, false]);
    vi.runAllTimers();
    expect([squares.value, squares.fresh, done]).toEqual([9, true, [9]]);
    squares.ask('3', () => 0);
    vi.runAllTimers();
    expect(done).toEqual([9]);
  });

  it('keeps the last answer while it is at the next, and forgets what was asked in between', () => {
    const squares = later<number>(() => {});
    squares.ask('2', () => 4);
    vi.runAllTimers();
    squares.ask('5', () => 25);
    expect([squares.value, squares.fresh]).toEqual([4, false]);
    squares.ask('2', () => 0);
    expect(squares.fresh).toBe(true);
    vi.runAllTimers();
    expect(squares.value).toBe(4);
  });

  it('is not done once it was stopped', () => {
    const squares = later<number>(() => {});
    squares.ask('2', () => 4);
    squares.stop();
    vi.runAllTimers();
    expect(squares.value).toBeNull();
  });
});
