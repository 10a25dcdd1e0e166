// The port over the spreadsheet program's own client library. `Excel` and `Office` are touched only in calls, never while this file loads.

import type { Block, CellInput, Change, FormulaBlock, LiveHost, Picture, Place, Table } from '../port';
import { attempt, follow } from './batches';
import { makeChange } from './changes';
import { cellValue, checkFit, contentsOf, isFormula, putBack, spilledCells, writeCells } from './contents';
import { faults, isOfficeError } from './office-faults';
import { addPicture } from './pictures';
import { find, withinUse, withoutSheet } from './references';

export class OfficeHost implements LiveHost {
  readonly cannot = {};

  // What is there

  read(reference: string): Promise<Block | null> {
    return attempt(`${reference} was not read`, async (context) => {
      const found = await find(context, reference);
      return found && readBlock(context, found.sheet.name, withinUse(found));
    });
  }

  formulas(reference: string): Promise<FormulaBlock | null> {
    return attempt(`${reference} was not read`, async (context) => {
      const found = await find(context, reference);
      if (!found) return null;
      const range = withinUse(found);
      range.load('address,values,formulas,hasSpill');
      await context.sync();
      const [spilled] = await spilledCells(context, [range]);
      const own = (formula: unknown, r: number, c: number) => (isFormula(formula, range.values[r]![c]) && !spilled?.[r]![c] ? formula : null);
      return { sheet: found.sheet.name, address: withoutSheet(range.address), formulas: range.formulas.map((row, r) => row.map((formula, c) => own(formula, r, c))) };
    });
  }

  spills(sheet: string): Promise<string[]> {
    return attempt(`${sheet} was not read`, async (context) => {
      const used = context.workbook.worksheets.getItemOrNullObject(sheet).getUsedRangeOrNullObject(true);
      used.load('values,formulas,hasSpill');
      await context.sync();
      if (used.isNullObject || used.hasSpill === false) return [];
      const blocks = used.formulas.flatMap((row, r) => row.flatMap((formula, c) => {
        if (!isFormula(formula, used.values[r]![c])) return [];
        const block = used.getCell(r, c).getSpillingToRangeOrNullObject();
        block.load('address');
        return [block];
      }));
      await context.sync();
      return [...new Set(blocks.flatMap((block) => (block.isNullObject ? [] : [withoutSheet(block.address)])))];
    });
  }

  surroundings(reference: string): Promise<Block | null> {
    return attempt(`${reference} was not read`, async (context) => {
      const found = await find(context, reference);
      if (!found) return null;
      const range = withinUse(found);
      range.load('valueTypes');
      const region = range.getSurroundingRegion();
      const block = await readBlock(context, found.sheet.name, region);
      return range.valueTypes.flat().every((type) => type === 'Empty') ? null : block;
    });
  }

  sheets(): Promise<Place[]> {
    return attempt('The sheets were not read', async (context) => {
      const { worksheets } = context.workbook;
      worksheets.load('items/name');
      await context.sync();
      const used = worksheets.items.map((sheet) => sheet.getUsedRangeOrNullObject(true));
      for (const range of used) range.load('address');
      await context.sync();
      return worksheets.items.map(({ name }, i) => ({ sheet: name, address: used[i]!.isNullObject ? '' : withoutSheet(used[i]!.address) }));
    });
  }

  tables(): Promise<Table[]> {
    return attempt('The tables were not read', async (context) => {
      const { tables } = context.workbook;
      tables.load('items/name');
      await context.sync();
      const places = tables.items.map((table) => ({ name: table.name, range: table.getRange(), sheet: table.worksheet }));
      for (const { range, sheet } of places) {
        range.load('address');
        sheet.load('name');
      }
      await context.sync();
      return places.map(({ name, range, sheet }) => ({ name, sheet: sheet.name, address: withoutSheet(range.address) }));
    });
  }

  names(): Promise<Record<string, string>> {
    return attempt('The names were not read', async (context) => {
      const { names } = context.workbook;
      names.load('items/name,items/formula');
      await context.sync();
      return Object.fromEntries(names.items.map(({ name, formula }) => [name, String(formula).replace(/^=/, '')]));
    });
  }

  // What the user is at

  selection(): Promise<Place | null> {
    return attempt('The selection was not read', async (context) => {
      const { range, sheet } = withSheet(context.workbook.getSelectedRange());
      range.load('address');
      sheet.load('name');
      try {
        await context.sync();
      } catch (error) {
        if (isOfficeError(error) && error.code === 'InvalidSelection') return null; // a chart, or several ranges
        throw error;
      }
      return { sheet: sheet.name, address: withoutSheet(range.address) };
    });
  }

  select(reference: string): Promise<void> {
    return attempt(`${reference} was not selected`, async (context) => {
      const found = await find(context, reference);
      if (!found) throw faults.unknown(reference);
      found.sheet.activate();
      found.range.select();
      await context.sync();
    });
  }

  onSelected(listener: () => void): Promise<() => Promise<void>> {
    return follow('The selection cannot be followed', ({ worksheets }) => [worksheets.onSelectionChanged, worksheets.onActivated], listener);
  }

  onEdited(listener: () => void): Promise<() => Promise<void>> {
    return follow('Edits cannot be followed', ({ worksheets }) => [worksheets.onChanged], listener);
  }

  onRecalculated(listener: () => void): Promise<() => Promise<void>> {
    // An edit counts as well: a plan without formulas is never calculated.
    return follow('Recalculation cannot be followed', ({ worksheets }) => [worksheets.onCalculated, worksheets.onChanged], listener);
  }

  // Changes

  write(reference: string, cells: CellInput[][]): Promise<void> {
    return attempt(`${reference} was not written`, async (context) => {
      const found = await find(context, reference);
      if (!found) throw faults.unknown(reference);
      const { range } = found;
      checkFit(reference, range, cells);
      const [before] = await contentsOf(context, [range]);
      try {
        writeCells(range, cells, before!);
        await context.sync();
      } catch (error) {
        await putBack(context, [{ range, before: before! }]).catch(() => {
          throw isOfficeError(error) ? faults.halfWritten(reference, error) : error;
        });
        throw error;
      }
    });
  }

  change(change: Change): Promise<() => Promise<void>> {
    return makeChange(change);
  }

  addPicture(reference: string, picture: Picture): Promise<void> {
    return attempt('The picture was not inserted', async (context) => {
      const found = await find(context, reference);
      if (!found) throw faults.unknown(reference);
      await addPicture(context, found, picture);
    });
  }

  async startWithWorkbook(): Promise<void> {
    try {
      await Office.addin.setStartupBehavior(Office.StartupBehavior.load);
    } catch {
      throw faults.noStart();
    }
  }
}

const withSheet = (range: Excel.Range) => ({ range, sheet: range.worksheet });

async function readBlock(context: Excel.RequestContext, sheet: string, range: Excel.Range): Promise<Block> {
  range.load('address,values,valueTypes');
  await context.sync();
  return { sheet, address: withoutSheet(range.address), values: range.values.map((row, r) => row.map((value, c) => cellValue(value, range.valueTypes[r]![c]!))) };
}
