// Work that may take a second: done in a task of its own once its inputs rest, and once for the same inputs.

export interface Later<T> {
  /** What came out last; null before anything did. */
  readonly value: T | null;
  /** Whether that is of the inputs that were asked for last. */
  readonly fresh: boolean;
  /** Asks for the work on inputs that `key` tells apart. */
  ask(key: string, work: () => T): void;
  stop(): void;
}

/** Milliseconds that inputs rest before work begins: less than a person notices, more than between two steps of a drag. */
const REST = 90;

/** @param done called when a value is new */
export function later<T>(done: () => void): Later<T> {
  let value: T | null = null;
  let asked: string | null = null;
  let answered: string | null = null;
  let waiting: ReturnType<typeof setTimeout> | undefined;
  return {
    get value() { return value; },
    get fresh() { return asked === answered; },
    ask(key, work) {
      if (key === asked) return;
      asked = key;
      clearTimeout(waiting);
      if (asked === answered) return;
      waiting = setTimeout(() => {
        value = work();
        answered = key;
        done();
      }, REST);
    },
    stop: () => clearTimeout(waiting),
  };
}
