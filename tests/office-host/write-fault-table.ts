/** Runs the fault matrix and writes its tables: npx tsx tests/office-host/write-fault-table.ts */
import { writeFileSync } from 'node:fs';
import path from 'node:path';
import { checkoutFolder } from '../support/needs';
import { runFaultMatrix } from './fault-matrix';
import { faultTable, faultTablePath } from './fault-table';

writeFileSync(path.join(checkoutFolder, faultTablePath), faultTable(await runFaultMatrix()));
console.log(`${faultTablePath} is written.`);
