/**
 * What every Workbook must do, whatever it keeps its cells in. An adapter's test calls this with the way to open a
 * workbook from a description.
 */
import type { CellAddress } from '../../addin/domain/sheet/cell-address';
import { CellError } from '../../addin/domain/sheet/cell-value';
import { findSheet, type SheetCell } from '../../addin/domain/sheet/sheet-snapshot';
import type { WorkbookWrite } from '../../addin/domain/results-to-sheet/write-plan';
import { WorkbookError, type Workbook } from '../../addin/ports/workbook';
import type { XlsxDescription } from '../support/xlsx-builder';

/** Descriptions use no shared formulas, no parts and no XML of their own: what any workbook can be made of. */
export type OpenWorkbook = (description: XlsxDescription) => Workbook | Promise<Workbook>;

const week: XlsxDescription = {
  sheets: [
    {
      name: 'Plan',
      cells: {
        A1: 'Wall tile',
        B1: { value: 5, numberFormat: '0.00' },
        C1: { formula: 'B1*2', value: 10 },
        D1: { formula: 'B1+1' },
        E1: { value: 45000, isDate: true },
        A2: true,
        B2: { error: '#N/A' },
        G1: { formula: 'B1:B3*2', arrayRange: 'G1:G3', value: 10 },
        G2: 0,
        G3: 0,
        A5: 'over three columns',
      },
      merges: ['A5:C5'],
      hiddenRows: [2],
      hiddenColumns: ['D'],
    },
    { name: 'Cost data', cells: { A1: 3 }, names: { Rate: "'Cost data'!$A$1" } },
  ],
  names: { 'Week.Decision': 'Plan!$B$1' },
  hiddenNames: { Kept: 'Plan!$A$1' },
};

function at(sheet: string, text: string): CellAddress {
  const match = /^([A-Z])([0-9]+)$/.exec(text)!;
  return { sheet, row: Number(match[2]) - 1, column: match[1].charCodeAt(0) - 65 };
}

async function cellOf(workbook: Workbook, sheet: string, text: string): Promise<SheetCell | undefined> {
  const { row, column } = at(sheet, text);
  return findSheet(await workbook.read(), sheet)?.cell(row, column);
}

export interface WorkbookTraits {
  /** Its formulas are calculated by whoever keeps it open: stored values are theirs, and are never missing. */
  readonly calculatesItself: boolean;
}

export function describeWorkbookContract(
  implementation: string,
  open: OpenWorkbook,
  { calculatesItself }: WorkbookTraits = { calculatesItself: false },
): void {
  describe(`a workbook (${implementation})`, () => {
    const value = (text: string, written: number | string | boolean | null): WorkbookWrite => ({
      kind: 'value',
      cell: at('Plan', text),
      value: written,
    });
    const opened = async (): Promise<Workbook> => open(week);
    const expectRefusal = async (workbook: Workbook, plan: WorkbookWrite[], code: string): Promise<void> => {
      const refusal: unknown = await workbook.apply(plan).catch((error: unknown) => error);
      expect(refusal).toBeInstanceOf(WorkbookError);
      expect((refusal as WorkbookError).code).toBe(code);
    };

    it('gives values, formulas, formats and what is hidden', async () => {
      const workbook = await opened();
      const snapshot = await workbook.read();
      expect(snapshot.sheets.map(({ name }) => name)).toEqual(['Plan', 'Cost data']);
      expect((await cellOf(workbook, 'Plan', 'A1'))?.value).toBe('Wall tile');
      expect((await cellOf(workbook, 'Plan', 'B1'))?.numberFormat).toBe('0.00');
      expect((await cellOf(workbook, 'Plan', 'C1'))?.formula).toBe('B1*2');
      expect((await cellOf(workbook, 'Plan', 'C1'))?.value).toBe(10);
      expect((await cellOf(workbook, 'Plan', 'D1'))?.value).toBe(calculatesItself ? 6 : undefined);
      expect((await cellOf(workbook, 'Plan', 'E1'))?.isDate).toBe(true);
      expect((await cellOf(workbook, 'Plan', 'A2'))?.value).toBe(true);
      expect((await cellOf(workbook, 'Plan', 'B2'))?.value).toBe(CellError.of('#N/A'));
      expect((await cellOf(workbook, 'Plan', 'G1'))?.arrayRange?.bottom).toBe(2);
      expect(await cellOf(workbook, 'Plan', 'Z9')).toBeUndefined();
      const plan = snapshot.sheets[0];
      expect([plan.isRowHidden(0), plan.isRowHidden(1)]).toEqual([false, true]);
      expect([plan.isColumnHidden(2), plan.isColumnHidden(3)]).toEqual([false, true]);
      expect(plan.mergedRanges).toEqual([{ sheet: 'Plan', top: 4, left: 0, bottom: 4, right: 2 }]);
      expect(snapshot.names).toEqual(
        expect.arrayContaining([
          { name: 'Week.Decision', scope: null, formula: 'Plan!$B$1', isHidden: false },
          { name: 'Kept', scope: null, formula: 'Plan!$A$1', isHidden: true },
          { name: 'Rate', scope: 'Cost data', formula: "'Cost data'!$A$1", isHidden: false },
        ]),
      );
      expect(snapshot.record).toBeNull();
    });

    it('writes values of every kind into full and empty cells, and clears a cell', async () => {
      const workbook = await opened();
      await workbook.apply([
        value('B1', 1 / 3),
        value('B2', 'Größe <&> "x"\n second line '),
        value('A2', false),
        value('H9', 12.5),
        value('A1', null),
        value('A5', 'anchor of a merged cell'),
      ]);
      expect((await cellOf(workbook, 'Plan', 'B1'))?.value).toBe(1 / 3);
      expect((await cellOf(workbook, 'Plan', 'B1'))?.numberFormat).toBe('0.00');
      expect((await cellOf(workbook, 'Plan', 'B2'))?.value).toBe('Größe <&> "x"\n second line ');
      expect((await cellOf(workbook, 'Plan', 'A2'))?.value).toBe(false);
      expect((await cellOf(workbook, 'Plan', 'H9'))?.value).toBe(12.5);
      expect(await cellOf(workbook, 'Plan', 'A1')).toBeUndefined();
      expect((await cellOf(workbook, 'Plan', 'A5'))?.value).toBe('anchor of a merged cell');
      expect((await cellOf(workbook, 'Plan', 'C1'))?.formula).toBe('B1*2');
    });

    it('writes a negative zero as zero, and refuses what is no number', async () => {
      const workbook = await opened();
      await workbook.apply([value('B1', -0)]);
      expect((await cellOf(workbook, 'Plan', 'B1'))?.value).toBe(0);
      for (const impossible of [NaN, Infinity, -Infinity]) {
        await expectRefusal(workbook, [value('B1', impossible)], 'write-failed');
      }
    });

    it('takes the number format of another cell, and nothing else of it', async () => {
      const workbook = await opened();
      await workbook.apply([
        { kind: 'value', cell: at('Plan', 'H1'), value: 7, numberFormatOf: at('Plan', 'B1') },
        { kind: 'value', cell: at('Plan', 'H2'), value: 8, numberFormatOf: at('Plan', 'H1') },
      ]);
      expect((await cellOf(workbook, 'Plan', 'H1'))?.numberFormat).toBe('0.00');
      expect((await cellOf(workbook, 'Plan', 'H1'))?.value).toBe(7);
      expect((await cellOf(workbook, 'Plan', 'H2'))?.numberFormat).toBe('0.00');
    });

    it('never writes over a formula, into an array, or into the covered part of a merged cell', async () => {
      for (const text of ['C1', 'D1', 'G1', 'G2', 'B5', 'C5']) {
        const workbook = await opened();
        await expectRefusal(workbook, [value(text, 1)], 'would-overwrite');
        await expectRefusal(workbook, [value(text, null)], 'would-overwrite');
        await expectRefusal(
          workbook,
          [{ kind: 'formula', cell: at('Plan', text), formula: 'B1', value: 5 }],
          'would-overwrite',
        );
      }
    });

    it('carries out a plan whole or not at all', async () => {
      const workbook = await opened();
      await expectRefusal(
        workbook,
        [
          value('B1', 99),
          { kind: 'name', name: 'Week.Slack', scope: null, formula: 'Plan!$H$1' },
          { kind: 'addSheet', name: 'Week results' },
          { kind: 'record', json: '{}' },
          value('C1', 1),
        ],
        'would-overwrite',
      );
      const snapshot = await workbook.read();
      expect((await cellOf(workbook, 'Plan', 'B1'))?.value).toBe(5);
      expect(snapshot.sheets).toHaveLength(2);
      expect(snapshot.names.some(({ name }) => name === 'Week.Slack')).toBe(false);
      expect(snapshot.record).toBeNull();
    });

    it('renews the stored value of a formula and leaves the formula as it is', async () => {
      const workbook = await opened();
      await workbook.apply([
        { kind: 'storedValue', cell: at('Plan', 'C1'), value: 42 },
        { kind: 'storedValue', cell: at('Plan', 'D1'), value: 'text' },
        { kind: 'storedValue', cell: at('Plan', 'G1'), value: CellError.of('#DIV/0!') },
        { kind: 'storedValue', cell: at('Plan', 'G2'), value: 4 },
      ]);
      expect((await cellOf(workbook, 'Plan', 'C1'))?.formula).toBe('B1*2');
      expect((await cellOf(workbook, 'Plan', 'G1'))?.formula).toBe('B1:B3*2');
      expect((await cellOf(workbook, 'Plan', 'G2'))?.formula).toBeUndefined();
      const stored = calculatesItself ? [10, 6, 10, 0] : [42, 'text', CellError.of('#DIV/0!'), 4];
      for (const [position, text] of ['C1', 'D1', 'G1', 'G2'].entries()) {
        expect((await cellOf(workbook, 'Plan', text))?.value).toBe(stored[position]);
      }
    });

    it('drops the stored value of a formula that nobody can calculate', async () => {
      const workbook = await opened();
      await workbook.apply([
        { kind: 'storedValue', cell: at('Plan', 'C1'), value: undefined },
        { kind: 'recalculateOnOpening' },
      ]);
      expect((await cellOf(workbook, 'Plan', 'C1'))?.formula).toBe('B1*2');
      expect((await cellOf(workbook, 'Plan', 'C1'))?.value).toBe(calculatesItself ? 10 : undefined);
    });

    it('renews no stored value where there is no formula', async () => {
      const workbook = await opened();
      await expectRefusal(
        workbook,
        [{ kind: 'storedValue', cell: at('Plan', 'B1'), value: 1 }],
        'write-failed',
      );
    });

    it('puts a formula into an empty cell with its value, and into no other', async () => {
      const workbook = await opened();
      const formula = (text: string): WorkbookWrite => ({
        kind: 'formula',
        cell: at('Plan', text),
        formula: 'IF(B1<3,"a&b",Plan!B1)',
        value: 5,
        numberFormatOf: at('Plan', 'B1'),
      });
      await workbook.apply([formula('H1')]);
      expect((await cellOf(workbook, 'Plan', 'H1'))?.formula).toBe('IF(B1<3,"a&b",Plan!B1)');
      expect((await cellOf(workbook, 'Plan', 'H1'))?.value).toBe(5);
      expect((await cellOf(workbook, 'Plan', 'H1'))?.numberFormat).toBe('0.00');
      await expectRefusal(workbook, [formula('B1')], 'would-overwrite');
      await expectRefusal(workbook, [formula('H1')], 'would-overwrite');
      await workbook.apply([value('B2', null), formula('B2')]);
      expect((await cellOf(workbook, 'Plan', 'B2'))?.value).toBe(5);
    });

    it('takes a sheet behind all others, and writes on it at once', async () => {
      const workbook = await opened();
      await workbook.apply([
        { kind: 'addSheet', name: 'Week & results' },
        { kind: 'value', cell: at('Week & results', 'A1'), value: 'Wall tile' },
        { kind: 'formula', cell: at('Week & results', 'B1'), formula: 'Plan!B1', value: 5 },
        { kind: 'columnWidth', sheet: 'Week & results', column: 0, width: 20 },
        { kind: 'name', name: 'Week.Optimum', scope: 'Week & results', formula: "'Week & results'!$B$1" },
      ]);
      const snapshot = await workbook.read();
      expect(snapshot.sheets.map(({ name }) => name)).toEqual(['Plan', 'Cost data', 'Week & results']);
      expect((await cellOf(workbook, 'Week & results', 'A1'))?.value).toBe('Wall tile');
      expect((await cellOf(workbook, 'Week & results', 'B1'))?.formula).toBe('Plan!B1');
      expect(snapshot.names).toContainEqual({
        name: 'Week.Optimum',
        scope: 'Week & results',
        formula: "'Week & results'!$B$1",
        isHidden: false,
      });
      await expectRefusal(workbook, [{ kind: 'addSheet', name: 'WEEK & results' }], 'would-overwrite');
    });

    it('creates names, points them elsewhere without regard to case, and keeps names of other scopes', async () => {
      const workbook = await opened();
      await workbook.apply([
        { kind: 'name', name: 'WEEK.DECISION', scope: null, formula: 'Plan!$B$1:$B$3' },
        { kind: 'name', name: 'kept', scope: null, formula: 'Plan!$A$2' },
        { kind: 'name', name: 'Rate', scope: null, formula: '"a<b"' },
        { kind: 'name', name: 'Rate', scope: 'cost data', formula: "'Cost data'!$A$2" },
      ]);
      const { names } = await workbook.read();
      expect(names).toHaveLength(4);
      expect(names).toEqual(
        expect.arrayContaining([
          { name: 'Week.Decision', scope: null, formula: 'Plan!$B$1:$B$3', isHidden: false },
          { name: 'Kept', scope: null, formula: 'Plan!$A$2', isHidden: true },
          { name: 'Rate', scope: null, formula: '"a<b"', isHidden: false },
          { name: 'Rate', scope: 'Cost data', formula: "'Cost data'!$A$2", isHidden: false },
        ]),
      );
    });

    it('takes names away without regard to case, leaves those of other scopes, and can create them anew', async () => {
      const workbook = await opened();
      await workbook.apply([
        { kind: 'removeName', name: 'WEEK.decision', scope: null },
        { kind: 'removeName', name: 'Rate', scope: null },
        { kind: 'removeName', name: 'Never.There', scope: null },
        { kind: 'name', name: 'Week.Sense', scope: null, formula: '"maximise"' },
      ]);
      const namesOf = async (): Promise<string[]> =>
        (await workbook.read()).names.map(({ name }) => name).sort();
      expect(await namesOf()).toEqual(['Kept', 'Rate', 'Week.Sense']);
      await workbook.apply([
        { kind: 'removeName', name: 'Week.Sense', scope: null },
        { kind: 'removeName', name: 'Kept', scope: null },
        { kind: 'removeName', name: 'Rate', scope: 'Cost data' },
      ]);
      expect(await namesOf()).toEqual([]);
      await workbook.apply([{ kind: 'name', name: 'Week.Decision', scope: null, formula: 'Plan!$B$1' }]);
      expect(await namesOf()).toEqual(['Week.Decision']);
    });

    it('keeps a record, and replaces it whole', async () => {
      const workbook = await opened();
      await workbook.apply([{ kind: 'record', json: '{"plan":"Week","text":"<&> ü \\n"}' }]);
      expect((await workbook.read()).record).toBe('{"plan":"Week","text":"<&> ü \\n"}');
      await workbook.apply([{ kind: 'record', json: '[]' }]);
      expect((await workbook.read()).record).toBe('[]');
    });

    it('does the writes of a plan in their order: the last one counts', async () => {
      const workbook = await opened();
      await workbook.apply([value('B1', 1), value('B1', 2), value('H1', 'x'), value('H1', null)]);
      expect((await cellOf(workbook, 'Plan', 'B1'))?.value).toBe(2);
      expect((await cellOf(workbook, 'Plan', 'H1'))?.value ?? null).toBeNull();
    });

    it('refuses a sheet that is not there', async () => {
      const workbook = await opened();
      const nowhere: WorkbookWrite = { kind: 'value', cell: at('Nowhere', 'A1'), value: 1 };
      await expectRefusal(workbook, [nowhere], 'write-failed');
      await expectRefusal(
        workbook,
        [{ kind: 'columnWidth', sheet: 'Nowhere', column: 0, width: 9 }],
        'write-failed',
      );
    });

    it('gives a snapshot that later writes do not change', async () => {
      const workbook = await opened();
      const before = await workbook.read();
      await workbook.apply([value('B1', 99), { kind: 'addSheet', name: 'More' }]);
      expect(before.sheets).toHaveLength(2);
      expect(before.sheets[0].cell(0, 1)?.value).toBe(5);
      expect((await cellOf(workbook, 'Plan', 'B1'))?.value).toBe(99);
    });
  });
}
