// Taking a picture out of the pane: into the sheet, as a file, onto the clipboard.

import type { LiveHost } from '../../host/port';
import { parseAddress, addressOf, referenceTo } from '../address';
import { attempts } from '../attempt';
import { type Tree, element, toDom } from '../element';
import type { Surroundings } from '../section';
import { button, group } from './buttons';
import { sentences } from './sentences';

/** A picture that can be taken out, whatever the width of the pane is. */
export interface Picture {
  tree: Tree;
  /** What it shows, in words. */
  facts: string;
  fileName: string;
}

export interface TakeOut {
  place: HTMLElement;
  /** There may be nothing to take out. */
  able(on: boolean): void;
}

/** Twice as many pixels as it is large, so that it stays sharp in print. */
const DENSITY = 2;

/** @param current the picture as it now is, null where there is none */
export function takeOut(surroundings: Surroundings, name: string, current: () => Picture | null): TakeOut {
  const { document, host, tell } = surroundings;
  const attempt = attempts(surroundings);
  const withPicture = (act: (picture: Picture) => Promise<void>) => () => {
    const picture = current();
    if (picture) void attempt(() => act(picture));
  };
  const insert = button(document, sentences.insert, withPicture((picture) => insertPicture(document, host, picture, tell)));
  const save = button(document, sentences.save, withPicture(async (picture) => {
    saveFile(document, picture.fileName, new Blob([svgText(document, picture)], { type: 'image/svg+xml' }));
    tell(sentences.saved(picture.fileName), 'news');
  }));
  const copy = button(document, sentences.copy, withPicture((picture) => copyPicture(document, picture, tell)));
  const place = group(document, name, insert, save, copy);
  const { addPicture: why } = host.cannot;
  if (why !== undefined) {
    const note = toDom(document, element('p', { class: 'quiet' }, why)) as HTMLElement;
    note.id = `cannot-insert-${++notes}`;
    insert.setAttribute('aria-describedby', note.id);
    place.append(note);
  }
  return {
    place,
    able(on) {
      insert.disabled = !on || why !== undefined;
      save.disabled = !on;
      copy.disabled = !on;
    },
  };
}

let notes = 0;

async function insertPicture(document: Document, host: LiveHost, picture: Picture, tell: Surroundings['tell']): Promise<void> {
  const selected = await host.selection();
  const cells = selected && parseAddress(selected.address);
  if (!cells) {
    tell(sentences.selectFirst, 'fault');
    return;
  }
  const corner = referenceTo(selected.sheet, addressOf({ ...cells, rows: 1, columns: 1 }));
  const png = await pngOf(document, picture);
  if (!png) {
    tell(sentences.notDrawn, 'fault');
    return;
  }
  await host.addPicture(corner, { png: new Uint8Array(await png.arrayBuffer()), ...sizeOf(picture), alternativeText: picture.facts });
  tell(sentences.inserted(corner), 'news');
}

/** The clipboard takes the picture as a promise, because it must be asked while the click is fresh. */
async function copyPicture(document: Document, picture: Picture, tell: Surroundings['tell']): Promise<void> {
  const view = document.defaultView!;
  const png = pngOf(document, picture);
  const drawn = png.then((blob) => blob ?? Promise.reject(new Error(sentences.notDrawn)));
  try {
    await view.navigator.clipboard.write([new view.ClipboardItem({ 'image/png': drawn })]);
    tell(sentences.copied, 'news');
  } catch {
    tell((await png) ? sentences.copyRefused : sentences.notDrawn, 'fault');
  }
}

function saveFile(document: Document, name: string, content: Blob): void {
  const link = document.createElement('a');
  link.href = URL.createObjectURL(content);
  link.download = name;
  link.click();
  setTimeout(() => URL.revokeObjectURL(link.href), 60_000);
}

async function pngOf(document: Document, picture: Picture): Promise<Blob | null> {
  const { width, height } = sizeOf(picture);
  const image = new (document.defaultView!.Image)();
  image.src = `data:image/svg+xml;charset=utf-8,${encodeURIComponent(svgText(document, picture))}`;
  try {
    await image.decode();
  } catch {
    return null;
  }
  const canvas = document.createElement('canvas');
  canvas.width = width * DENSITY;
  canvas.height = height * DENSITY;
  canvas.getContext('2d')!.drawImage(image, 0, 0, canvas.width, canvas.height);
  return new Promise((made) => canvas.toBlob(made, 'image/png'));
}

const sizeOf = ({ tree }: Picture): { width: number; height: number } => ({ width: Math.ceil(Number(tree.attributes.width)), height: Math.ceil(Number(tree.attributes.height)) });

/**
 * The picture as a file of its own, in the colours of the light theme: what the style sheet gives its parts stands on the parts themselves,
 * and what serves the pane alone is gone.
 */
export function svgText(document: Document, { tree, facts }: Picture): string {
  const frame = toDom(document, element('div', { class: 'foldplan taken-out', 'data-theme': 'light' }, tree)) as HTMLElement;
  document.body.append(frame);
  const svg = frame.firstElementChild!;
  const view = document.defaultView!;
  try {
    const surface = view.getComputedStyle(frame).backgroundColor;
    const all = [svg, ...svg.querySelectorAll('*')];
    const looks = all.map((part) => lookOf(view.getComputedStyle(part), part));
    all.forEach((part, i) => {
      for (const { name } of [...part.attributes]) if (/^(class|role|tabindex|aria-|data-)/.test(name)) part.removeAttribute(name);
      for (const [name, value] of looks[i]!) part.setAttribute(name, value);
    });
    svg.setAttribute('font-family', 'sans-serif');
    svg.setAttribute('role', 'img');
    svg.querySelector(':scope > desc')!.textContent = facts;
    const ground = document.createElementNS('http://www.w3.org/2000/svg', 'rect');
    for (const [name, value] of Object.entries({ width: '100%', height: '100%', fill: surface })) ground.setAttribute(name, value);
    svg.querySelector(':scope > desc')!.after(ground);
    return new view.XMLSerializer().serializeToString(svg);
  } finally {
    frame.remove();
  }
}

/** Properties that the style sheet may give, with what a picture takes where nothing is said. */
const PROPERTIES: Record<string, string> = {
  fill: 'rgb(0, 0, 0)', stroke: 'none', 'stroke-width': '1px', 'stroke-dasharray': 'none', 'stroke-linejoin': 'miter', opacity: '1', 'font-weight': '400', 'paint-order': 'normal',
};

function lookOf(style: CSSStyleDeclaration, part: Element): [string, string][] {
  if (['title', 'desc', 'defs', 'pattern', 'svg', 'g'].includes(part.tagName)) return [];
  // A pattern's address is written out with its page in some browsers; in the picture it stands as it was given.
  const pattern = part.getAttribute('fill')?.startsWith('url(') ?? false;
  return Object.entries(PROPERTIES).flatMap(([name, usual]): [string, string][] => {
    const value = style.getPropertyValue(name);
    return (pattern && name === 'fill') || value === usual || value === '' ? [] : [[name, value]];
  });
}
