// The client library that npm has knows no notes; the one on its vendor's site does. This adds them, made of the same pieces as the rest
// of the library, so that the requests are those that the library makes.

interface Pieces {
  ClientObject: new (context: unknown, path: unknown) => { _handleResult(value: unknown): void };
  Utility: { load(target: object, names: string): object };
  BatchApiHelper: {
    createPropertyObject(type: unknown, parent: object, name: string, isCollection: boolean, flags: number): object;
    createMethodObject(
      type: unknown, parent: object, name: string, operation: number, args: unknown[], isCollection: boolean, isInvalidAfterRequest: boolean, byId: null, flags: number,
    ): object;
    invokeMethod(target: object, name: string, operation: number, args: unknown[], flags: number, result: number): unknown;
    invokeSetProperty(target: object, name: string, value: unknown, flags: number): void;
  };
}

const READ = 1;

/** @param known whether the library is one that knows notes */
export function addNotes(known: boolean): void {
  const { OfficeExtension: { ClientObject, Utility, BatchApiHelper: helper } } = globalThis as unknown as { OfficeExtension: Pieces };
  if (!known) {
    Reflect.deleteProperty(Excel.Worksheet.prototype, 'notes');
    return;
  }

  class Note extends ClientObject {
    private text = '';

    get content(): string {
      return this.text;
    }

    set content(text: string) {
      this.text = text;
      helper.invokeSetProperty(this, 'Content', text, 0);
    }

    delete(): void {
      helper.invokeMethod(this, 'Delete', 0, [], 0, 0);
    }

    load(names: string): object {
      return Utility.load(this, names);
    }

    override _handleResult(value: { Content?: string } | null): void {
      super._handleResult(value);
      if (value?.Content !== undefined) this.text = value.Content;
    }
  }

  class NoteCollection extends ClientObject {
    add(address: string, content: string): object {
      return helper.createMethodObject(Note, this, 'Add', 0, [address, content], false, true, null, 0);
    }

    getItemOrNullObject(address: string): object {
      return helper.createMethodObject(Note, this, 'GetItemOrNullObject', READ, [address], false, false, null, 0);
    }
  }

  Object.defineProperty(Excel.Worksheet.prototype, 'notes', {
    configurable: true,
    get(this: object) {
      return helper.createPropertyObject(NoteCollection, this, 'Notes', true, 0);
    },
  });
}
