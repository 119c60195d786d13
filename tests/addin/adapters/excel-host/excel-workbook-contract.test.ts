/**
 * The workbook in Excel does what every workbook does, through the genuine library.
 */
import { ExcelBatches } from '../../../../addin/adapters/excel-host/excel-batch';
import { ExcelWorkbook } from '../../../../addin/adapters/excel-host/excel-workbook';
import { MemoryWorkbook } from '../../../../addin/adapters/memory/memory-workbook';
import { inMemory } from '../../../contracts/describe-in-memory';
import { describeWorkbookContract } from '../../../contracts/workbook-contract';
import { startOfficeHost } from '../../../office-host/node-host';
import type { OfficeHostOptions } from '../../../office-host/office-host';

const hosts: [string, OfficeHostOptions][] = [
  ['in Excel', {}],
  ['in Excel, where filled cells show their values', { arrayFormulasShow: 'first' }],
];

for (const [name, options] of hosts) {
  describeWorkbookContract(
    name,
    (description) => {
      startOfficeHost(MemoryWorkbook.of(inMemory(description)).snapshot(), options);
      return new ExcelWorkbook(new ExcelBatches());
    },
    { calculatesItself: true },
  );
}
