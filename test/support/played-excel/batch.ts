// Answers the batches of the spreadsheet program's client library from a model of a workbook. A batch names objects by paths
// (`workbook` → `worksheets` → `getItem("Plan")`) and then acts on them in order, until an action fails; what was done before stays done.

/** An object of the model as the library knows it: its members carry the names of the protocol, with a capital. */
export class Served {
  /** The library keeps some objects by name over several batches. */
  readonly _ReferenceId?: string;
  _KeepReference(): void {}
  _RemoveReference(): void {}
}

/** Objects that are loaded one by one: `items/name`. */
export abstract class ServedList<T extends Served> extends Served {
  abstract readonly all: readonly T[];

  GetItemAt(index: number): T {
    const item = this.all[index];
    if (!item) throw new ProgramError('InvalidArgument');
    return item;
  }

  GetItem(key: string): T {
    const item = this.found(key);
    if (!item) throw new ProgramError('ItemNotFound', 'The requested resource does not exist.');
    return item;
  }

  GetItemOrNullObject(key: string): T | null {
    return this.found(key) ?? null;
  }

  protected abstract found(key: string): T | undefined;
}

/** An error with one of the program's own codes. */
export class ProgramError extends Error {
  constructor(readonly code: string, message = `The program says ${code}.`) {
    super(message);
  }
}

export interface Batch {
  Actions: Action[];
  ObjectPaths: Record<string, ObjectPath>;
}

interface Action {
  Id: number;
  ActionType: number;
  Name: string;
  ObjectPathId: number;
  ArgumentInfo?: Arguments;
  QueryInfo?: { Select?: string[] };
}

interface ObjectPath {
  ObjectPathType: number;
  Name: string;
  ParentObjectPathId?: number;
  ArgumentInfo?: Arguments;
}

interface Arguments {
  Arguments?: unknown[];
  ReferencedObjectPathIds?: (number | null)[];
}

export interface Answer {
  Results: { ActionId: number; Value: unknown }[];
  Error?: { Code: string; Message: string; Location: string; ActionIndex: number; HttpStatusCode: number };
}

/** What a batch can reach: the workbook, objects made by name, and those kept from earlier batches. */
export interface Root {
  workbook: Served;
  made: Record<string, Served>;
  kept: Map<string, Served>;
}

/** @param before called before each action; an error that it throws is that action's */
export function answerBatch(root: Root, batch: Batch, before: () => void = () => {}): Answer {
  const objects = new Map<number, Served | null>();

  const object = (id: number): Served | null => {
    if (!objects.has(id)) objects.set(id, keep(reach(batch.ObjectPaths[id]!)));
    return objects.get(id)!;
  };
  const reach = ({ ObjectPathType: type, Name: name, ParentObjectPathId: parentId, ArgumentInfo }: ObjectPath): unknown => {
    if (type === PATH.root) return root.workbook;
    if (type === PATH.made) return root.made[name];
    if (type === PATH.kept) return root.kept.get(name);
    if (type === PATH.nothing) return null;
    const parent = object(parentId!);
    if (parent === null) return null; // a member of nothing is nothing
    if (type === PATH.property) return member(parent, name);
    return method(parent, type === PATH.item ? 'GetItem' : name)(...values(ArgumentInfo));
  };
  const keep = (found: unknown): Served | null => {
    if (found === null) return null;
    if (!(found instanceof Served)) throw new ProgramError('NotImplemented', 'The model of the workbook has no such object.');
    if (found._ReferenceId) root.kept.set(found._ReferenceId, found);
    return found;
  };
  const values = (info?: Arguments): unknown[] => (info?.Arguments ?? []).map((value, i) => {
    const id = info!.ReferencedObjectPathIds?.[i];
    return id ? object(id) : value;
  });
  const act = ({ ActionType: type, Name: name, ObjectPathId: id, ArgumentInfo, QueryInfo }: Action): unknown => {
    if (type === ACTION.trace) return null;
    const target = object(id);
    if (target === null) return null;
    if (type === ACTION.instantiate) return identity(target);
    if (type === ACTION.query) return { ...identity(target), ...query(target, QueryInfo?.Select ?? []) };
    if (type === ACTION.method) return method(target, name)(...values(ArgumentInfo)) ?? null;
    if (type !== ACTION.set) throw new ProgramError('NotImplemented', `The model of the workbook knows no action of type ${type}.`);
    member(target, name);
    (target as unknown as Record<string, unknown>)[name] = values(ArgumentInfo)[0];
    return null;
  };

  const results: Answer['Results'] = [];
  for (const [index, action] of batch.Actions.entries()) {
    try {
      before();
      results.push({ ActionId: action.Id, Value: act(action) });
    } catch (error) {
      if (!(error instanceof ProgramError)) throw error;
      return { Results: results, Error: { Code: error.code, Message: error.message, Location: '', ActionIndex: index, HttpStatusCode: 400 } };
    }
  }
  return { Results: results };
}

const PATH = { root: 1, made: 2, method: 3, property: 4, item: 5, kept: 6, nothing: 7 };
const ACTION = { instantiate: 1, query: 2, method: 3, set: 4, trace: 5 };

function member(target: Served, name: string): unknown {
  if (!(name in target)) throw new ProgramError('NotImplemented', `The model of the workbook lacks ${target.constructor.name}.${name}.`);
  return (target as unknown as Record<string, unknown>)[name];
}

function method(target: Served, name: string): (...args: unknown[]) => unknown {
  return (member(target, name) as (...args: unknown[]) => unknown).bind(target);
}

function identity(target: Served): object {
  const { _ReferenceId, Id } = target as { _ReferenceId?: string; Id?: string };
  return { ...(_ReferenceId && { _ReferenceId }), ...(Id && { Id }) };
}

/** Of a list, the library asks for the members of its items. */
function query(target: Served, names: string[]): object {
  const asked = names.filter((name) => name !== 'isNullObject').map((name) => name[0]!.toUpperCase() + name.slice(1));
  const own = target instanceof ServedList ? asked.filter((name) => name in target) : asked;
  const values = Object.fromEntries(own.map((name) => [name, member(target, name)]));
  const ofItems = asked.filter((name) => !own.includes(name));
  if (ofItems.length === 0) return values;
  return { ...values, _Items: (target as ServedList<Served>).all.map((item) => ({ ...identity(item), ...query(item, ofItems) })) };
}
