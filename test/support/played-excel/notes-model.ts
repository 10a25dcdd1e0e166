// Notes of a sheet of the played workbook.

import { ProgramError, Served, ServedList } from './batch';
import type { WorksheetModel } from './workbook-model';

export class NotesModel extends ServedList<NoteModel> {
  /** By address. */
  readonly texts = new Map<string, string>();
  /** Addresses of cells with a comment, which can have no note. */
  readonly commented = new Set<string>();

  constructor(private sheet: WorksheetModel) {
    super();
  }

  get all(): NoteModel[] {
    return [...this.texts.keys()].map((address) => new NoteModel(this, address));
  }

  Add(address: string, content: string): NoteModel {
    if (this.sheet.isProtected) throw new ProgramError('AccessDenied');
    if (this.texts.has(address) || this.commented.has(address)) throw new ProgramError('InvalidArgument', 'The cell has a note or a comment already.');
    this.texts.set(address, content);
    return new NoteModel(this, address);
  }

  protected found(address: string): NoteModel | undefined {
    return this.all.find((note) => note.address === address);
  }
}

class NoteModel extends Served {
  constructor(private notes: NotesModel, readonly address: string) {
    super();
  }

  get Content(): string {
    return this.notes.texts.get(this.address)!;
  }

  set Content(content: string) {
    this.notes.texts.set(this.address, content);
  }

  Delete(): void {
    this.notes.texts.delete(this.address);
  }
}
