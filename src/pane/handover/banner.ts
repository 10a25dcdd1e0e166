// Above all sections: FOLD cells that show #NAME?, said once when a workbook is opened, and entered again on a click.

import { HostFault } from '../../host/port';
import { attempts } from '../attempt';
import { element, toDom } from '../element';
import { noticeList } from '../page';
import type { Surroundings } from '../section';
import { slot } from '../slot';
import { enterAgain, unknownCells } from './enter-again';
import { sentences } from './sentences';
import { unknownSentence } from './troubles';

export interface Banner {
  place: HTMLElement;
  /** Looks through the whole workbook. */
  look(): Promise<void>;
}

export function unknownBanner(surroundings: Surroundings): Banner {
  const { document, host } = surroundings;
  const attempt = attempts(surroundings);
  const place = toDom(document, element('div', { class: 'banner' })) as HTMLElement;
  const words = slot(document, 'plan-notices', { role: 'status' });
  const button = toDom(document, element('button', { type: 'button' })) as HTMLButtonElement;
  button.addEventListener('click', () => void attempt(async () => {
    await enterAgain(surroundings);
    await look();
  }));
  place.append(words.place, button);
  place.hidden = true;

  async function look(): Promise<void> {
    try {
      const unknown = await unknownCells(host);
      words.show(unknown.length > 0 ? [noticeList([unknownSentence(unknown)])] : []);
      button.textContent = sentences.reenter(unknown.length);
      place.hidden = unknown.length === 0;
    } catch (fault) {
      if (!(fault instanceof HostFault)) throw fault; // what can't be read is said where the plan is read
    }
  }

  return { place, look };
}
