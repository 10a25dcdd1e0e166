// Pictures on a sheet of the played workbook.

import { ProgramError, Served, ServedList } from './batch';
import type { WorksheetModel } from './workbook-model';

export class ShapesModel extends ServedList<ShapeModel> {
  readonly all: ShapeModel[] = [];
  private made = 0;

  constructor(private sheet: WorksheetModel) {
    super();
  }

  AddImage(base64: string): ShapeModel {
    if (this.sheet.isProtected) throw new ProgramError('AccessDenied');
    const shape = new ShapeModel((gone) => this.all.splice(this.all.indexOf(gone), 1), `{shape-${++this.made}}`, base64);
    this.all.push(shape);
    return shape;
  }

  protected found(id: string): ShapeModel | undefined {
    return this.all.find(({ Id }) => Id === id);
  }
}

export class ShapeModel extends Served {
  readonly Type = 'Image';
  LockAspectRatio = true;
  Left = 0;
  Top = 0;
  Width = 1;
  Height = 1;
  AltTextDescription = '';
  readonly #remove: (shape: ShapeModel) => void;

  constructor(remove: (shape: ShapeModel) => void, readonly Id: string, readonly base64: string) {
    super();
    this.#remove = remove;
  }

  Delete(): void {
    this.#remove(this);
  }
}
