// The workbook that the embedded sheet shows, as the port asks for it: where references lead, and what cells hold.

import type { Injector, Workbook as UniverWorkbook, Worksheet } from '@univerjs/core';
import { FormulaDataModel, IDefinedNamesService } from '@univerjs/engine-formula';
import type { CellValue } from '../port';
import { type CellRange, parseReference } from './address';
import { plainValue } from './cell-values';
import { WHOLE_WORKBOOK, formulaAt } from './workbook-data';

export interface Found {
  sheet: Worksheet;
  range: CellRange;
}

export interface DefinedName {
  id: string;
  name: string;
  /** Without "=". */
  refersTo: string;
}

export class OpenWorkbook {
  private readonly formulas: FormulaDataModel;
  private readonly definedNames: IDefinedNamesService;

  constructor(readonly unit: UniverWorkbook, readonly injector: Injector) {
    this.formulas = injector.get(FormulaDataModel);
    this.definedNames = injector.get(IDefinedNamesService);
  }

  get id(): string {
    return this.unit.getUnitId();
  }

  get sheets(): Worksheet[] {
    return this.unit.getSheets();
  }

  sheetNamed(name: string): Worksheet | undefined {
    return this.sheets.find((sheet) => sheet.getName().toLowerCase() === name.toLowerCase());
  }

  /** The cells of a reference; null where the workbook has no such name or sheet. */
  find(reference: string): Found | null {
    const named = this.definedNames.getValueByName(this.id, reference.trim());
    const parsed = parseReference(named ? named.formulaOrRefString.replace(/^=/, '') : reference);
    if (!parsed || (named && parsed.sheet === null)) return null;
    const sheet = parsed.sheet === null ? this.unit.getActiveSheet() : this.sheetNamed(parsed.sheet);
    return sheet ? { sheet, range: parsed.range } : null;
  }

  /** Names of the whole workbook. */
  names(): DefinedName[] {
    return Object.values(this.definedNames.getDefinedNameMap(this.id) ?? {})
      .filter(({ localSheetId }) => localSheetId === undefined || localSheetId === WHOLE_WORKBOOK)
      .map(({ id, name, formulaOrRefString }) => ({ id, name, refersTo: formulaOrRefString.replace(/^=/, '') }));
  }

  /** What cells show. */
  values({ sheet, range }: Found): CellValue[][] {
    const cells = sheet.getCellMatrix();
    const spilled = this.filledIn(sheet);
    return eachOf(range, (r, c) => {
      const own = cells.getValue(r, c);
      return own?.f || own?.si ? plainValue(own) : plainValue(own) ?? plainValue(spilled?.[r]?.[c]);
    });
  }

  /** The formulas in cells themselves. */
  formulasOf({ sheet, range }: Found): (string | null)[][] {
    return eachOf(range, (r, c) => this.formulaAt(sheet, r, c));
  }

  formulaAt(sheet: Worksheet, row: number, column: number): string | null {
    return formulaAt(sheet, this.formulas, row, column) ?? null;
  }

  /** The smallest block with all cells of a sheet that hold anything; null where there are none. */
  used(sheet: Worksheet): CellRange | null {
    let range: CellRange | null = null;
    const add = (row: number, column: number) => {
      if (!this.holdsAnything(sheet, row, column)) return;
      range = {
        startRow: Math.min(range?.startRow ?? row, row), startColumn: Math.min(range?.startColumn ?? column, column),
        endRow: Math.max(range?.endRow ?? row, row), endColumn: Math.max(range?.endColumn ?? column, column),
      };
    };
    sheet.getCellMatrix().forValue(add);
    for (const [row, line] of Object.entries(this.filledIn(sheet) ?? {})) for (const column of Object.keys(line ?? {})) add(Number(row), Number(column));
    return range;
  }

  /** The filled block around cells, as far as the first blank row and column on every side; null where the cells are blank. */
  surroundings({ sheet, range }: Found): CellRange | null {
    const filled = ({ startRow, startColumn, endRow, endColumn }: CellRange) => {
      for (let r = startRow; r <= endRow; r++) for (let c = startColumn; c <= endColumn; c++) if (this.holdsAnything(sheet, r, c)) return true;
      return false;
    };
    if (!filled(range)) return null;
    const block = { ...range };
    for (let grown = true; grown;) {
      grown = false;
      // One more all around: what touches the block at a corner belongs to it.
      const around = { startRow: Math.max(0, block.startRow - 1), startColumn: Math.max(0, block.startColumn - 1), endRow: block.endRow + 1, endColumn: block.endColumn + 1 };
      for (const [side, other] of [['startRow', 'endRow'], ['endRow', 'startRow'], ['startColumn', 'endColumn'], ['endColumn', 'startColumn']] as const) {
        if (around[side] === block[side] || !filled({ ...around, [other]: around[side] })) continue;
        block[side] = around[side];
        grown = true;
      }
    }
    return block;
  }

  private holdsAnything(sheet: Worksheet, row: number, column: number): boolean {
    const own = sheet.getCellMatrix().getValue(row, column);
    return Boolean(own?.f ?? own?.si) || plainValue(own) !== null || plainValue(this.filledIn(sheet)?.[row]?.[column]) !== null;
  }

  /** What formulas of other cells fill. */
  private filledIn(sheet: Worksheet) {
    return this.formulas.getArrayFormulaCellData()?.[this.id]?.[sheet.getSheetId()];
  }
}

function eachOf<T>({ startRow, startColumn, endRow, endColumn }: CellRange, of: (row: number, column: number) => T): T[][] {
  return Array.from({ length: endRow - startRow + 1 }, (_r, r) => Array.from({ length: endColumn - startColumn + 1 }, (_c, c) => of(startRow + r, startColumn + c)));
}
