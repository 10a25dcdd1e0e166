// Requests to the spreadsheet program. `Excel` is touched only in calls, never while this file loads.

import { faults, isOfficeError } from './office-faults';

/** Runs a batch, in the context of an earlier one if need be; errors of the program become sentences. */
export async function attempt<T>(failed: string, batch: (context: Excel.RequestContext) => Promise<T>, earlier?: OfficeExtension.ClientRequestContext): Promise<T> {
  try {
    // While a cell is being edited the program takes no requests: wait for it.
    return await (earlier ? Excel.run(earlier, batch) : Excel.run({ delayForCellEdit: true }, batch));
  } catch (error) {
    throw isOfficeError(error) ? faults.refused(failed, error) : error;
  }
}

/** Objects of the program that tell when something happens. */
type Source = Pick<OfficeExtension.EventHandlers<unknown>, 'add'>;

/** Calls `listener` after each of the events, until the returned function is called; follows all of them or none. */
export async function follow(failed: string, sources: (workbook: Excel.Workbook) => Source[], listener: () => void): Promise<() => Promise<void>> {
  let following = true;
  const tell = async () => {
    if (following) listener();
  };
  try {
    const handlers = await attempt(failed, async (context) => {
      const added = sources(context.workbook).map((source) => source.add(tell));
      await context.sync();
      return added;
    });
    return () => {
      following = false;
      return attempt('The spreadsheet program goes on reporting', async (context) => {
        for (const handler of handlers) handler.remove();
        await context.sync();
      }, handlers[0]!.context);
    };
  } catch (fault) {
    following = false; // some of them may have been added
    throw fault;
  }
}
