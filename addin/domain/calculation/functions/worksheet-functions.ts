/**
 * Every worksheet function known here, by its name in upper case. A file per family; to add a function, add it to its
 * family's table, and to linearization/affine-functions.ts only if it keeps affine forms affine.
 */
import type { WorksheetFunction } from '../worksheet-function';
import { arrays } from './arrays';
import { conditionalSums } from './conditional-sums';
import { conditions } from './conditions';
import { dates } from './dates';
import { information } from './information';
import { lambdas } from './lambdas';
import { lookups } from './lookups';
import { matrices } from './matrices';
import { rounding } from './rounding';
import { statistics } from './statistics';
import { sums } from './sums';
import { texts } from './texts';

export const worksheetFunctions: ReadonlyMap<string, WorksheetFunction> = new Map(
  [
    sums,
    conditionalSums,
    statistics,
    conditions,
    information,
    rounding,
    lookups,
    matrices,
    arrays,
    lambdas,
    texts,
    dates,
  ].flatMap((family) => Object.entries(family)),
);
