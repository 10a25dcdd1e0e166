import { WorkbookFile, writeWorkbook } from '../../../src/host/file';
import { testHost } from '../../support/host-contract';
import { calculator } from './calculator';

testHost('an .xlsx file', async (workbook) => {
  const host = await WorkbookFile.open(await writeWorkbook(workbook));
  return { host, settle: async () => void await host.recalculate(calculator), close: async () => {} };
});
