// Figures as text.

/** A figure to all the digits that a cell can show. */
export const exactFigure = (x: number): string => String(rounded(x, 15));

/** Writes figures of one picture, all in the same power of ten. */
export type FigureWriter = (x: number, digits?: number) => string;

/**
 * A writer for figures around a size: plain where they stay short, else with a power of ten in steps of three.
 * @example figureWriter(61.44)(1597.44) // => '1597.44'
 * @example figureWriter(61440000)(1597440000) // => '1597.44e6'
 */
export function figureWriter(size: number): FigureWriter {
  const plain = size >= 1e-2 && size < 1e5;
  const exponent = plain ? 0 : Math.floor(Math.log10(size) / 3) * 3;
  return (x, digits = 7) => {
    if (x === 0) return '0';
    const figure = rounded(x / 10 ** exponent, digits);
    if (figure >= 1e7) return x.toExponential(digits - 1).replace(/\.?0*e\+?/, 'e');
    return exponent === 0 ? String(figure) : `${figure}e${exponent}`;
  };
}

const rounded = (x: number, digits: number): number => Number(x.toPrecision(digits));
