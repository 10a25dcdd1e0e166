// What the sheet suggests while a formula is typed: the names of the workbook first, and nothing more once a name is complete. Univer
// leaves out names that are spelled like a function and would turn `Rate` into `RATE(` when Enter is pressed.

import { type Univer, IUniverInstanceService, LifecycleService, LifecycleStages, UniverInstanceType } from '@univerjs/core';
import { FunctionType, IDefinedNamesService } from '@univerjs/engine-formula';
import { IDescriptionService } from '@univerjs/sheets-formula';

export async function suggestNames(univer: Univer): Promise<void> {
  const injector = univer.__getInjector();
  await injector.get(LifecycleService).onStage(LifecycleStages.Rendered);
  const service = injector.get(IDescriptionService);
  const suggested = service.getSearchListByNameFirstLetter.bind(service);
  service.getSearchListByNameFirstLetter = (typed) => {
    const unit = injector.get(IUniverInstanceService).getCurrentUnitOfType(UniverInstanceType.UNIVER_SHEET);
    const names = Object.values((unit && injector.get(IDefinedNamesService).getDefinedNameMap(unit.getUnitId())) ?? {});
    const text = typed.trim().toLowerCase();
    if (names.some(({ name }) => name.toLowerCase() === text)) return [];
    return [
      ...names.filter(({ name }) => name.toLowerCase().startsWith(text))
        .map(({ name, formulaOrRefString }) => ({ name, desc: formulaOrRefString, functionType: FunctionType.DefinedName })),
      ...suggested(typed).filter(({ functionType }) => functionType !== FunctionType.DefinedName),
    ];
  };
}
