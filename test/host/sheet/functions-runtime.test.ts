import { readFileSync } from 'node:fs';
import path from 'node:path';
import { describe, expect, it } from 'vitest';
import { type FunctionsMetadata, FunctionError, callFunction, createRuntime, loadFunctions } from '../../../src/host/sheet/functions-runtime';
import { dist } from '../../support/browser';

const built = (file: string) => readFileSync(path.join(dist, file), 'utf8');
const metadata = JSON.parse(built('functions.json')) as FunctionsMetadata;

describe('the functions runtime', () => {
  const { implementations } = loadFunctions(metadata, built('functions.js'));
  const call = (id: string, ...args: Parameters<typeof callFunction>[2]) =>
    callFunction(implementations.get(id)!, metadata.functions.find((one) => one.id === id)!.parameters, args);

  it('runs the built functions, arguments left out as null', () => {
    expect(call('FREQ', [[70], [61.44]], [[100]], null)).toEqual([[30], [38.56]]);
  });

  it('gives a repeating parameter all that is left, without what is left out', () => {
    expect(call('SUMSNR', [[70]])).toEqual([[70]]);
    expect(call('SUMSNR', [[70], [70]], null, [['', 70, 70]])).toEqual(call('SUMSNR', [[70, 70], [70, 70]]));
  });

  it('gives an error in a row as an error of that row, with its sentence', () => {
    expect(call('FREQ', [[70], ['fast'], [{ code: '#REF!' }]], [[100]], null)).toEqual([
      [30], [new FunctionError('#VALUE!', 'frequency must be a number; got "fast".')], [new FunctionError('#REF!')],
    ]);
  });

  it('gives what a function throws as a single error', () => {
    expect(call('RATES', [[2]], [[1]], null, null, null, null, null, null)).toEqual([
      [new FunctionError('#VALUE!', 'low must not be above high; got 2 and 1.')],
    ]);
    const broken = () => {
      throw new Error('not for the cell');
    };
    expect(callFunction(broken, [], [])).toEqual([[new FunctionError('#VALUE!')]]);
  });

  it('refuses files that do not belong together', () => {
    const more = { functions: [...metadata.functions, { id: 'LATER', name: 'LATER', parameters: [] }] };
    expect(() => loadFunctions(more, built('functions.js'))).toThrow('functions.json lists functions that functions.js lacks: LATER.');
  });

  it('takes functions one by one and several at once, whatever the case of their ids', () => {
    const runtime = createRuntime();
    runtime.customFunctions.associate('one', () => [[1]]);
    runtime.customFunctions.associate({ two: () => [[2]] });
    const named = (id: string) => ({ id, name: id, parameters: [] });
    expect([...runtime.functions({ functions: [named('ONE'), named('TWO')] }).implementations.keys()]).toEqual(['ONE', 'TWO']);
  });
});
