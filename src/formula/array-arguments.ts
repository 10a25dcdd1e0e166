// Which functions take a whole range for an argument. A formula of one cell takes from a range elsewhere the cell beside it.

/** Arguments of a function that may be ranges, counted from 0; the last one stands for all that follow where `rest` is set. */
interface RangeArguments {
  places: number[];
  rest: boolean;
}

const TAKES_RANGES = new Map<string, RangeArguments>();

const declare = (names: string, places: number[], rest: boolean) => names.split(' ').forEach((name) => TAKES_RANGES.set(name, { places, rest }));
declare('SUM AVERAGE MIN MAX COUNT COUNTA COUNTBLANK PRODUCT MEDIAN MODE MODE.SNGL STDEV STDEV.S STDEV.P STDEVP STDEVA VAR VAR.S VAR.P VARP SUMSQ AVERAGEA MINA MAXA', [0], true);
declare('AND OR XOR SUMPRODUCT GCD LCM GEOMEAN HARMEAN DEVSQ AVEDEV CONCAT CORREL RSQ SLOPE INTERCEPT ROWS COLUMNS', [0], true);
declare('SUBTOTAL MATCH XMATCH VLOOKUP HLOOKUP LOOKUP RANK RANK.EQ RANK.AVG', [1], true);
declare('AGGREGATE TEXTJOIN', [2], true);
declare('INDEX LARGE SMALL PERCENTILE PERCENTILE.INC PERCENTILE.EXC QUARTILE QUARTILE.INC COUNTIF TRIMMEAN', [0], false);
declare('SUMIF AVERAGEIF', [0, 2], false);

/** Whether a range may stand as that argument of a function without making the formula fill more than one cell. */
export function takesRange(name: string, place: number): boolean {
  const known = TAKES_RANGES.get(name.toUpperCase());
  return known !== undefined && (known.places.includes(place) || (known.rest && place >= known.places.at(-1)!));
}

/** A function whose arguments are computed as arrays throughout. */
export const computesArrays = (name: string): boolean => name.toUpperCase() === 'SUMPRODUCT';

/** Functions of single values only: they too take the cell beside from a range. */
const OF_SINGLE_VALUES = new Set(`
  IF IFERROR IFNA NOT ISNUMBER ISTEXT ISBLANK ISERROR ISNA ISLOGICAL ABS SIGN INT TRUNC ROUND ROUNDUP ROUNDDOWN MROUND CEILING FLOOR CEILING.MATH
  FLOOR.MATH MOD QUOTIENT EVEN ODD SQRT POWER EXP LN LOG LOG10 SIN COS TAN ASIN ACOS ATAN ATAN2 SINH COSH TANH DEGREES RADIANS LEFT RIGHT MID LEN
  UPPER LOWER PROPER TRIM TEXT VALUE CONCATENATE SUBSTITUTE REPLACE FIND SEARCH EXACT REPT CHAR CODE FIXED DATE YEAR MONTH DAY
`.trim().split(/\s+/));

export const isOfSingleValues = (name: string): boolean => OF_SINGLE_VALUES.has(name.toUpperCase());

/** Functions whose results may fill more than one cell whatever their arguments are. */
const GIVES_ARRAY = new Set(`
  FILTER SORT SORTBY UNIQUE SEQUENCE RANDARRAY TRANSPOSE MMULT MINVERSE MUNIT FREQUENCY LINEST LOGEST TREND GROWTH MODE.MULT HSTACK VSTACK TAKE DROP
  TOCOL TOROW WRAPROWS WRAPCOLS CHOOSECOLS CHOOSEROWS EXPAND TEXTSPLIT MAP SCAN BYROW BYCOL MAKEARRAY OFFSET INDIRECT XLOOKUP REGEXEXTRACT
`.trim().split(/\s+/));

export const givesArray = (name: string): boolean => GIVES_ARRAY.has(name.toUpperCase());
