// Widths and heights: a file counts widths in digits of the plain font and heights in points, the port counts pixels.

/** Width of a digit of the plain font. */
const DIGIT = 7;

/** Pixels of a column that has no width of its own. */
export const STANDARD_WIDTH = 64;

export const widthInPixels = (digits: number): number => Math.trunc(((256 * digits + Math.trunc(128 / DIGIT)) / 256) * DIGIT);

/** `widthInDigits(64) // => 9.140625` */
export const widthInDigits = (pixels: number): number => Math.trunc((pixels / DIGIT) * 256) / 256;

export const heightInPixels = (points: number): number => Math.round((points * 4) / 3);

export const heightInPoints = (pixels: number): number => pixels * 0.75;
