/**
 * Where things stand on the sheets of the tile works' week; rows as numbered on the sheet.
 */
import { products, purchasePrices, resources, weeklyCosts } from './tile-works-figures';

export const planSheetName = 'Week plan';
export const loadingSheetName = 'Loading';
export const costSheetName = 'Costs';

export const firstProductRow = 7;
export const lastProductRow = firstProductRow + products.length - 1;
export const firstLoadingRow = 6;
export const lastLoadingRow = firstLoadingRow + products.length - 1;
export const firstRateRow = 5;
export const lastRateRow = firstRateRow + products.length - 1;

/** The limits stand below the products: a total, a blank row and a heading come between. */
export const firstLimitRow = lastProductRow + 4;

/** On the costs sheet, below the rates: purchase prices, hours, and the costs of every week with their total. */
export const firstPriceRow = lastRateRow + 4;
export const lastPriceRow = firstPriceRow + purchasePrices.length - 1;
export const firstHoursRow = lastPriceRow + 4;
export const lastHoursRow = firstHoursRow + resources.length - 1;
export const firstCostRow = lastHoursRow + 4;
export const lastCostRow = firstCostRow + weeklyCosts.length - 1;
export const fixedCostsRow = lastCostRow + 1;
