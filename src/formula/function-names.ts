// Names of functions: a file writes some of them otherwise than a sheet shows them.

/**
 * The name that a sheet shows for a function in a file: `FOLD.ZONE` for `_xldudf_FOLD_ZONE`, `SORT` for `_xlfn._xlws.SORT`. Other
 * programs change the case of names that they don't know.
 */
export function sheetFunctionName(inFile: string): string {
  const name = inFile.replace(/^(_xlfn\.|_xlws\.|_xludf\.|_xlpm\.)+/i, '');
  const ours = /^(?:_xldudf_)?fold\.(.+)$/i.exec(name) ?? /^_xldudf_fold_(.+)$/i.exec(name);
  return ours ? `FOLD.${ours[1]!.toUpperCase()}` : name;
}

/** The reverse: the name that a file writes for a function of a sheet. */
export function fileFunctionName(inSheet: string): string {
  const name = inSheet.toUpperCase();
  if (isOurs(name)) return `_xldudf_${name.replaceAll('.', '_')}`;
  if (WORKSHEET_ONLY.has(name)) return `_xlfn._xlws.${name}`;
  return LATER.has(name) ? `_xlfn.${name}` : inSheet;
}

/** Whether a name, as a sheet shows it, is that of one of our functions. */
export const isOurs = (inSheet: string): boolean => /^FOLD\./i.test(inSheet);

const WORKSHEET_ONLY = new Set(['FILTER', 'SORT', 'PY']);

/** Functions that came after the file format; a file marks them, so that older programs keep their values. */
const LATER = new Set(`
  ACOT ACOTH AGGREGATE ANCHORARRAY ARABIC ARRAYTOTEXT BASE BETA.DIST BETA.INV BINOM.DIST BINOM.DIST.RANGE BINOM.INV BITAND BITLSHIFT BITOR
  BITRSHIFT BITXOR BYCOL BYROW CEILING.MATH CEILING.PRECISE CHISQ.DIST CHISQ.DIST.RT CHISQ.INV CHISQ.INV.RT CHISQ.TEST CHOOSECOLS CHOOSEROWS
  COMBINA CONCAT CONFIDENCE.NORM CONFIDENCE.T COT COTH COVARIANCE.P COVARIANCE.S CSC CSCH DAYS DECIMAL DETECTLANGUAGE DROP ENCODEURL
  ERF.PRECISE ERFC.PRECISE EXPAND EXPON.DIST F.DIST F.DIST.RT F.INV F.INV.RT F.TEST FIELDVALUE FILTERXML FLOOR.MATH FLOOR.PRECISE
  FORECAST.ETS FORECAST.ETS.CONFINT FORECAST.ETS.SEASONALITY FORECAST.ETS.STAT FORECAST.LINEAR FORMULATEXT GAMMA GAMMA.DIST GAMMA.INV
  GAMMALN.PRECISE GAUSS GROUPBY HSTACK HYPGEOM.DIST IFNA IFS IMAGE IMCOSH IMCOT IMCSC IMCSCH IMSEC IMSECH IMSINH IMTAN ISFORMULA ISOMITTED
  ISOWEEKNUM LAMBDA LET LOGNORM.DIST LOGNORM.INV MAKEARRAY MAP MAXIFS MINIFS MODE.MULT MODE.SNGL MUNIT NEGBINOM.DIST NORM.DIST NORM.INV
  NORM.S.DIST NORM.S.INV NUMBERVALUE PDURATION PERCENTILE.EXC PERCENTILE.INC PERCENTOF PERCENTRANK.EXC PERCENTRANK.INC PERMUTATIONA PHI
  PIVOTBY POISSON.DIST QUARTILE.EXC QUARTILE.INC RANDARRAY RANK.AVG RANK.EQ REDUCE REGEXEXTRACT REGEXREPLACE REGEXTEST RRI SCAN SEC SECH
  SEQUENCE SHEET SHEETS SINGLE SKEW.P SORTBY STDEV.P STDEV.S STOCKHISTORY SWITCH T.DIST T.DIST.2T T.DIST.RT T.INV T.INV.2T T.TEST TAKE
  TEXTAFTER TEXTBEFORE TEXTJOIN TEXTSPLIT TOCOL TOROW TRANSLATE TRIMRANGE UNICHAR UNICODE UNIQUE VALUETOTEXT VAR.P VAR.S VSTACK WEBSERVICE
  WEIBULL.DIST WRAPCOLS WRAPROWS XLOOKUP XMATCH XOR Z.TEST
`.trim().split(/\s+/));
