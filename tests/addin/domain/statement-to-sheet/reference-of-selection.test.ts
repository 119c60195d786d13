/** What a name refers to when cells are selected for it. Expected texts by the rules of structured references. */
import { MemoryWorkbook } from '../../../../addin/adapters/memory/memory-workbook';
import { resolveReferenceText } from '../../../../addin/domain/formula/resolve-reference';
import type { CellRange } from '../../../../addin/domain/sheet/cell-range';
import { referenceOfSelection } from '../../../../addin/domain/statement-to-sheet/reference-of-selection';

const workbook = MemoryWorkbook.of({
  sheets: {
    Costs: {
      A1: [
        ['Tile', 'Clay', "Kiln [h]'s", 'Glaze'],
        ['Floor', 1, 2, 3],
        ['Wall', 1, 2, 3],
      ],
    },
    'Week plan': { B7: 1 },
  },
  tables: [{ name: 'Rates', sheet: 'Costs', ref: 'A1:D3' }],
}).snapshot();

const range = (sheet: string, top: number, left: number, bottom: number, right: number): CellRange => ({
  sheet,
  top,
  left,
  bottom,
  right,
});

it('plain cells come as they are, with $ and the sheet quoted where it must be', () => {
  expect(referenceOfSelection(workbook, [range('Week plan', 1, 1, 6, 1)])).toBe("'Week plan'!$B$2:$B$7");
});

it('a whole column of a table becomes a structured reference, so that it grows', () => {
  expect(referenceOfSelection(workbook, [range('Costs', 1, 1, 2, 1)])).toBe('Rates[Clay]');
  expect(referenceOfSelection(workbook, [range('Costs', 1, 0, 2, 1)])).toBe('Rates[[Tile]:[Clay]]');
});

it('signs that mean something in a structured reference are escaped, and the reference is read back', () => {
  const cells = range('Costs', 1, 2, 2, 2);
  const text = referenceOfSelection(workbook, [cells])!;
  expect(text).toBe("Rates[Kiln '[h']''s]");
  expect(resolveReferenceText(workbook, text, null)).toEqual({ kind: 'ranges', ranges: [cells] });
});

it('a part of a column, or one with its heading, stays plain', () => {
  expect(referenceOfSelection(workbook, [range('Costs', 1, 1, 1, 1)])).toBe('Costs!$B$2');
  expect(referenceOfSelection(workbook, [range('Costs', 0, 1, 2, 1)])).toBe('Costs!$B$1:$B$3');
});

it('several areas of one sheet are joined; areas of two sheets and nothing at all give nothing', () => {
  const areas = [range('Week plan', 1, 1, 2, 1), range('Week plan', 5, 1, 5, 1)];
  expect(referenceOfSelection(workbook, areas)).toBe("'Week plan'!$B$2:$B$3,'Week plan'!$B$6");
  expect(referenceOfSelection(workbook, [areas[0], range('Costs', 0, 0, 0, 0)])).toBeUndefined();
  expect(referenceOfSelection(workbook, [])).toBeUndefined();
});

it('whole columns and rows end where the contents end', () => {
  expect(referenceOfSelection(workbook, [range('Week plan', 0, 1, 1_048_575, 1)])).toBe(
    "'Week plan'!$B$1:$B$7",
  );
  expect(referenceOfSelection(workbook, [range('Week plan', 6, 0, 6, 16_383)])).toBe("'Week plan'!$A$7:$B$7");
});
