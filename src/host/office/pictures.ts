// Pictures on a sheet.

import type { Picture } from '../port';
import { POINTS_PER_PIXEL } from './looks';
import type { Found } from './references';

/** Puts a picture at the upper left corner of cells, or leaves the sheet without it. */
export async function addPicture(context: Excel.RequestContext, { range, sheet }: Found, { png, width, height, alternativeText }: Picture): Promise<void> {
  const { shapes } = sheet;
  range.load('left,top');
  shapes.load('items/id');
  await context.sync();
  const before = new Set(shapes.items.map(({ id }) => id));
  try {
    const picture = shapes.addImage(base64(png));
    picture.lockAspectRatio = false; // else the height would follow the width
    picture.left = range.left;
    picture.top = range.top;
    picture.width = width * POINTS_PER_PIXEL;
    picture.height = height * POINTS_PER_PIXEL;
    picture.altTextDescription = alternativeText;
    await context.sync();
  } catch (error) {
    shapes.load('items/id,items/type');
    await context.sync();
    for (const shape of shapes.items) if (!before.has(shape.id) && shape.type === 'Image') shape.delete();
    await context.sync();
    throw error;
  }
}

function base64(bytes: Uint8Array): string {
  let text = '';
  for (const byte of bytes) text += String.fromCharCode(byte);
  return btoa(text);
}
