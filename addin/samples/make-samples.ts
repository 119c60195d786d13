/**
 * Writes the sample workbooks that stand in this folder: `npm run samples`. The same bytes come out on every machine.
 */
import { writeFile } from 'node:fs/promises';
import path from 'node:path';
import { fileURLToPath } from 'node:url';
import { tileWorksWeek } from './tile-works-week';
import { packSampleWorkbook } from './workbook-parts';

const folder = path.dirname(fileURLToPath(import.meta.url));
await writeFile(path.join(folder, 'week-plan.xlsx'), await packSampleWorkbook(tileWorksWeek()));
