// What a click sets off: one thing at a time, and what the host can't do is said.

import { HostFault } from '../host/port';
import type { Surroundings } from './section';
import { sentences } from './sentences';

/** Makes a runner of work. While something runs, nothing else begins. */
export function attempts({ tell }: Pick<Surroundings, 'tell'>): (work: () => Promise<void>) => Promise<void> {
  let running = false;
  return async (work) => {
    if (running) return;
    running = true;
    try {
      tell('', 'news');
      await work();
    } catch (fault) {
      tell(fault instanceof HostFault ? fault.message : sentences.failed, 'fault');
      if (!(fault instanceof HostFault)) throw fault;
    } finally {
      running = false;
    }
  };
}
