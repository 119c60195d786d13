/**
 * A plan of the size that the design's figures speak of: press programmes for thousands of tile orders, each limit a
 * SUMPRODUCT over some of the decisions.
 */
import type { CellDescription, WorkbookDescription } from '../../../../addin/adapters/memory/memory-workbook';
import { columnLetters } from '../../../../addin/domain/sheet/cell-address';

/** First row, from 1, of decisions and of limits. */
const firstRow = 2;

/**
 * Minimise the cost of the orders' amounts; each limit asks for a least total over its share of the orders.
 * @param termCount cells in each limit's SUMPRODUCT
 */
export function largePlan(decisionCount: number, limitCount: number, termCount: number): WorkbookDescription {
  const lastDecision = firstRow + decisionCount - 1;
  const lastLimit = firstRow + limitCount - 1;
  const rates: number[][] = Array.from({ length: limitCount }, (_, limit) =>
    Array.from({ length: termCount }, (_, term) => 1 + ((limit * 7 + term * 3) % 11) / 4),
  );
  const lastRate = columnLetters(9 + termCount);
  const limits: (CellDescription | string | number)[][] = rates.map((ofLimit, limit) => {
    const first = firstRow + ((limit * 5) % (decisionCount - termCount));
    const row = firstRow + limit;
    const cells = `Orders!$C$${first}:$C$${first + termCount - 1}`;
    return [
      { formula: `SUMPRODUCT(TRANSPOSE(K${row}:${lastRate}${row}),${cells})`, value: 0 },
      '>=',
      ofLimit.length * 10 + (limit % 13),
    ];
  });
  return {
    sheets: {
      Plan: { A1: [['Total', 'Relation', 'Least']], A2: limits, K2: rates },
      Orders: {
        A1: [['Order', 'Cost', 'Amount']],
        A2: Array.from({ length: decisionCount }, (_, order) => [
          `Order ${order + 1}`,
          1 + (order % 17) / 8,
          0,
        ]),
        E2: `=SUMPRODUCT(B${firstRow}:B${lastDecision},C${firstRow}:C${lastDecision})`,
      },
    },
    names: {
      'Week.Decision': `Orders!$C$${firstRow}:$C$${lastDecision}`,
      'Week.Objective': 'Orders!$E$2',
      'Week.Sense': '"minimise"',
      'Week.Constraint': `Plan!$A$${firstRow}:$C$${lastLimit}`,
    },
  };
}
