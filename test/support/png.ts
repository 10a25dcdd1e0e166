/** Width and height of a PNG as the file itself tells. */
export function pngSize(file: Buffer): [number, number] {
  if (file.toString('latin1', 1, 4) !== 'PNG') throw new Error('This is no PNG file.');
  return [file.readUInt32BE(16), file.readUInt32BE(20)];
}
