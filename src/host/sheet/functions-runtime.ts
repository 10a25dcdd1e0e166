// Runs the built worksheet functions outside a spreadsheet program: a stand-in for the vendor's `CustomFunctions` object, and the
// two files of the contract (functions.json, functions.js) made into functions that can be called.

/** What a cell of an argument holds; an error in a cell comes as an object with its code. */
export type Argument = (number | string | boolean | null | { code: string })[][];

/** A worksheet function as the bundle registers it: rows of cells in (null for an argument left out), rows of cells out. A repeating parameter takes a list. */
export type Implementation = (...args: (Argument | null | Argument[])[]) => unknown[][];

export interface ParameterMetadata {
  name: string;
  description?: string;
  optional?: boolean;
  /** Whether it takes all the arguments from its place on; only the last parameter may. */
  repeating?: boolean;
}

export interface FunctionMetadata {
  id: string;
  name: string;
  description?: string;
  parameters: ParameterMetadata[];
}

/** The part of functions.json that a host needs. */
export interface FunctionsMetadata {
  functions: FunctionMetadata[];
}

/** The contract of every host, loaded. */
export interface WorksheetFunctions {
  /** In the order of functions.json. */
  metadata: FunctionMetadata[];
  /** By id. */
  implementations: Map<string, Implementation>;
}

/** What stands before a function's name in a formula: `FOLD.ZONE`. */
export const NAMESPACE = 'FOLD';

/**
 * Loads functions.json and the text of functions.js.
 * @throws Error where the two files do not belong together
 */
export function loadFunctions(metadata: FunctionsMetadata, script: string): WorksheetFunctions {
  const runtime = createRuntime();
  new Function('CustomFunctions', script)(runtime.customFunctions);
  return runtime.functions(metadata);
}

/** The stand-in, for a bundle that a page loads by a script tag: make it the global `CustomFunctions` first, ask for the functions after. */
export function createRuntime(): { customFunctions: StandIn; functions(metadata: FunctionsMetadata): WorksheetFunctions } {
  const implementations = new Map<string, Implementation>();
  const register = (id: string, implementation: Implementation) => implementations.set(id.toUpperCase(), implementation);
  return {
    customFunctions: {
      associate(ids, implementation) {
        if (typeof ids === 'string') register(ids, implementation!);
        else Object.entries(ids).forEach(([id, one]) => register(id, one));
      },
      Error: FunctionError,
      ErrorCode: { ...ERROR_CODES },
    },
    functions({ functions }) {
      const lacking = functions.filter(({ id }) => !implementations.has(id)).map(({ id }) => id);
      if (lacking.length > 0) throw new Error(`functions.json lists functions that functions.js lacks: ${lacking.join(', ')}.`);
      return { metadata: functions, implementations };
    },
  };
}

/** The vendor's object, as far as a bundle may use it. */
export interface StandIn {
  associate(ids: string | Record<string, Implementation>, implementation?: Implementation): void;
  Error: typeof FunctionError;
  ErrorCode: typeof ERROR_CODES;
}

/** The error object of the vendor's runtime: returned in a cell of a result, or thrown for the whole of it. */
export class FunctionError {
  constructor(readonly code: string, readonly message?: string) {}
}

const ERROR_CODES = {
  invalidValue: '#VALUE!',
  notAvailable: '#N/A',
  divisionByZero: '#DIV/0!',
  invalidNumber: '#NUM!',
  nullReference: '#NULL!',
  invalidName: '#NAME?',
  invalidReference: '#REF!',
} as const;

/** Calls a function as a spreadsheet program does: what it throws is the result, a single error. Arguments missing at the end are left out. */
export function callFunction(implementation: Implementation, parameters: ParameterMetadata[], args: (Argument | null)[]): unknown[][] {
  try {
    return implementation(...parameters.map(({ repeating }, i) => (repeating ? args.slice(i).filter((one) => one !== null) : args[i] ?? null)));
  } catch (error) {
    // Messages of other errors do not reach a cell in the spreadsheet either.
    return [[error instanceof FunctionError ? error : new FunctionError(ERROR_CODES.invalidValue)]];
  }
}
