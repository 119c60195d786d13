/**
 * Where the shared folder of test problems is: PLANROW_LP, or beside the checkout. It may be missing.
 */
import path from 'node:path';
import { fileURLToPath } from 'node:url';

export const lpFolder =
  process.env.PLANROW_LP ??
  path.resolve(path.dirname(fileURLToPath(import.meta.url)), '..', '..', '..', 'shared', 'lp');
