/**
 * One week of an invented tile works, as its planner keeps it: a sheet with the plan and its limits, a sheet with the
 * loading worked out from it, a sheet with rates, prices and hours in tables.
 */
import { absoluteRangeText } from '../domain/sheet/cell-range';
import { costSheet } from './cost-sheet';
import { loadingSheet } from './loading-sheet';
import { planSheet } from './plan-sheet';
import type { SampleWorkbook } from './sample-workbook';
import {
  costSheetName,
  fixedCostsRow,
  firstLimitRow,
  firstProductRow,
  lastProductRow,
  planSheetName,
} from './sheet-layout';
import { weekLimits } from './week-limits';

/** The range of the week plan's sheet as a defined name refers to it; rows as numbered on the sheet. */
function planRange(firstColumn: number, firstRow: number, lastColumn: number, lastRow: number): string {
  return absoluteRangeText({
    sheet: planSheetName,
    top: firstRow - 1,
    left: firstColumn,
    bottom: lastRow - 1,
    right: lastColumn,
  });
}

/** The whole workbook, with the plan stated in it by names. */
export function tileWorksWeek(): SampleWorkbook {
  const [a, b, c, f, g, h] = [0, 1, 2, 5, 6, 7];
  const lastLimitRow = firstLimitRow + weekLimits().length - 1;
  return {
    title: 'Week plan of a tile works',
    sheets: [planSheet(), loadingSheet(), costSheet()],
    names: {
      FixedCosts: `${costSheetName}!$B$${fixedCostsRow}`,
      'Week.Decision': planRange(h, firstProductRow, h, lastProductRow),
      'Week.DecisionLabel': planRange(a, firstProductRow, a, lastProductRow),
      'Week.Lower': planRange(f, firstProductRow, f, lastProductRow),
      'Week.Upper': planRange(g, firstProductRow, g, lastProductRow),
      'Week.Objective': planRange(b, 3, b, 3),
      'Week.Sense': planRange(c, 3, c, 3),
      'Week.Constraint': planRange(f, firstLimitRow, h, lastLimitRow),
      'Week.ConstraintLabel': planRange(a, firstLimitRow, a, lastLimitRow),
    },
  };
}
