import { MemoryWorkbook } from '../../addin/adapters/memory/memory-workbook';
import { XlsxWorkbook } from '../../addin/adapters/xlsx-file/xlsx-workbook';
import { buildXlsx } from '../support/xlsx-builder';
import { inMemory } from './describe-in-memory';
import { describeWorkbookContract } from './workbook-contract';

// Slow only on a busy machine, and never judged by time.
jest.setTimeout(60_000);

describeWorkbookContract('in an .xlsx file', (description) =>
  XlsxWorkbook.open(buildXlsx(description), 'week.xlsx'),
);

describeWorkbookContract('in an .xlsx file with its texts in the cells', (description) =>
  XlsxWorkbook.open(buildXlsx({ ...description, hasInlineStrings: true }), 'week.xlsx'),
);

describeWorkbookContract('in memory', (description) => MemoryWorkbook.of(inMemory(description)));
