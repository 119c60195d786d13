import { listRanges, rangesOfAddress } from '../../../../addin/adapters/excel-host/excel-ranges';
import { formatCellRange } from '../../../../addin/domain/sheet/cell-range';

const texts = (sheet: string, address: string): string[] =>
  rangesOfAddress(sheet, address).map(formatCellRange);

it('addresses of one or several areas, with and without their sheets, are taken apart', () => {
  expect(texts('Plan', 'Plan!A1')).toEqual(['Plan!A1']);
  expect(texts('Plan', 'Plan!A1:B2,Plan!$D$5')).toEqual(['Plan!A1:B2', 'Plan!D5']);
  expect(texts('Cost, data', "'Cost, data'!B2:C3,'Cost, data'!E1")).toEqual([
    "'Cost, data'!B2:C3",
    "'Cost, data'!E1",
  ]);
  expect(texts("Jo's", "'Jo''s'!A1:A2")).toEqual(["'Jo''s'!A1:A2"]);
  expect(texts('Plan', 'B2:C3')).toEqual(['Plan!B2:C3']);
});

it('whole columns and rows reach to the end of the sheet', () => {
  expect(texts('Plan', 'Plan!C:D')).toEqual(['Plan!C1:D1048576']);
  expect(texts('Plan', 'Plan!4:5')).toEqual(['Plan!A4:XFD5']);
});

it('what is cut off in the middle is left out', () => {
  expect(texts('Plan', 'Plan!A1:B2,Plan!')).toEqual(['Plan!A1:B2']);
  expect(texts('Plan', '')).toEqual([]);
});

it('a sentence lists three ranges and counts the rest', () => {
  const ranges = ['A1', 'B1', 'C1', 'D1', 'E1'].flatMap((text) => rangesOfAddress('Plan', text));
  expect(listRanges(ranges.slice(0, 2))).toBe('Plan!A1, Plan!B1');
  expect(listRanges(ranges)).toBe('Plan!A1, Plan!B1, Plan!C1 and 2 more');
});
