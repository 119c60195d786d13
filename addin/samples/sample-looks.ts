/**
 * The looks that the sheets of a sample workbook share.
 */
import type { CellLook } from './sample-workbook';

const ink = '1F3A4D';
const pale = 'EEF3F6';
export const looks = {
  title: { isBold: true, fontSize: 16, textColor: ink },
  heading: { isBold: true, textColor: ink, fillColor: pale, hasLineBelow: true, wrapsText: true },
  numberHeading: {
    isBold: true,
    textColor: ink,
    fillColor: pale,
    hasLineBelow: true,
    wrapsText: true,
    isRightAligned: true,
  },
  group: { isItalic: true, textColor: '5A6B75' },
  text: {},
  indented: { indent: 1 },
  amount: { numberFormat: '#,##0' },
  exactAmount: { numberFormat: '#,##0.0' },
  rate: { numberFormat: '0.00' },
  price: { numberFormat: '#,##0.00 "€"' },
  money: { numberFormat: '#,##0 "€"' },
  result: { numberFormat: '#,##0.00 "€"', isBold: true, fontSize: 12 },
  share: { numberFormat: '0%' },
  date: { numberFormat: 'd mmm yyyy', isRightAligned: true },
  // What the planner types in: the amounts to make.
  decision: { numberFormat: '#,##0.0', fillColor: 'FBF6E4' },
  relation: { isCentred: true },
  total: { numberFormat: '#,##0', isBold: true, hasLineAbove: true },
  totalText: { isBold: true, hasLineAbove: true },
  remark: { isItalic: true, textColor: '5A6B75', fontSize: 9 },
} satisfies Record<string, CellLook>;
