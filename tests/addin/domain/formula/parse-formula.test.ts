import { FormulaCache } from '../../../../addin/domain/formula/formula-cache';
import { parseFormula } from '../../../../addin/domain/formula/parse-formula';
import type { FormulaNode } from '../../../../addin/domain/formula/formula-syntax';
import { relativeKey } from '../../../../addin/domain/formula/relative-key';
import { MemoryWorkbook } from '../../../../addin/adapters/memory/memory-workbook';

const place = { row: 4, column: 2 };
const noNames = (): boolean => false;

function treeOf(text: string): FormulaNode {
  const parsed = parseFormula(text, place, noNames);
  if (parsed.kind === 'syntax-issue') {
    throw new Error(`${text}: ${parsed.code} at ${parsed.position}`);
  }
  return parsed.tree;
}

describe('references', () => {
  it('are kept as distances from the formula where they are not absolute', () => {
    expect(treeOf('B$3')).toEqual({
      kind: 'cell',
      sheet: null,
      corner: { row: 2, rowIsAbsolute: true, column: -1, columnIsAbsolute: false },
    });
  });

  it('keep their sheet, unquoted', () => {
    expect(treeOf("'It''s'!$A$1")).toMatchObject({ kind: 'cell', sheet: "It's" });
  });

  it('to whole columns and rows have no row or column', () => {
    expect(treeOf('A:B')).toMatchObject({ kind: 'range', first: { row: null, column: 0 } });
    expect(treeOf('$1:3')).toMatchObject({ kind: 'range', last: { row: 2, column: null } });
  });

  it('to a range of one cell stay a range', () => {
    expect(treeOf('A1:A1').kind).toBe('range');
  });

  it('to cells that are gone are #REF! with or without sheet or table', () => {
    for (const text of ['#REF!', 'Plan!#REF!', "'My plan'!#REF!", 'Costs[#REF!]']) {
      expect(treeOf(text)).toMatchObject({ kind: 'error', error: { code: '#REF!' } });
    }
  });

  it('to other workbooks and to several sheets are told apart', () => {
    expect(treeOf('[1]Costs!$A$1').kind).toBe('external');
    expect(treeOf('[1]!Rate').kind).toBe('external');
    expect(treeOf('Jan:Mar!B2')).toMatchObject({ kind: 'sheets', firstSheet: 'Jan', lastSheet: 'Mar' });
    expect(treeOf("'Jan 1:Mar 3'!A1:B2")).toMatchObject({ kind: 'sheets', lastSheet: 'Mar 3' });
  });

  it('to table columns know their sections', () => {
    expect(treeOf('Costs[[#This Row],[Clay]]')).toMatchObject({
      kind: 'table',
      table: 'Costs',
      columns: ['Clay'],
      sections: ['this row'],
    });
    expect(treeOf("Costs['[Clay'#1']]")).toMatchObject({ columns: ['[Clay#1]'] });
  });
});

describe('what files write otherwise', () => {
  it('prefixes of newer functions and their names are taken off', () => {
    expect(treeOf('_xlfn.LET(_xlpm.x,1,_xlpm.x)').kind).toBe('let');
    expect(treeOf('_xlfn._xlws.SORT(A1:A3)')).toMatchObject({ kind: 'call', name: 'SORT' });
    expect(treeOf('_xlfn.SINGLE(A1:A3)')).toMatchObject({ kind: 'unary', operator: '@' });
    expect(treeOf('_xlfn.ANCHORARRAY(A1)')).toMatchObject({ kind: 'unary', operator: '#' });
  });

  it('a blank before a bracket makes a call, unless a name stands before it', () => {
    expect(treeOf('SUM (A1,B2)')).toMatchObject({ kind: 'call', name: 'SUM' });
    const parsed = parseFormula('Rates (A1:A3)', place, (name) => name === 'Rates');
    expect(parsed).toMatchObject({ tree: { kind: 'binary', operator: ' ' } });
  });
});

describe('what cannot be read is an issue with its place', () => {
  it.each(['', '1+', 'SUM(A1', ')', '"open', 'A1:', '{1,2', '=1', "'C:\\dir\\[Book.xlsx]S'!A1"])(
    '%s',
    (text) => {
      expect(parseFormula(text, place, noNames)).toMatchObject({
        kind: 'syntax-issue',
        code: 'formula-syntax',
      });
    },
  );

  it('the position is where the reader stopped, from 0 behind the equals sign', () => {
    expect(parseFormula('1+)', place, noNames)).toMatchObject({ position: 3 });
  });

  it.each([
    ['brackets', '('.repeat(20_000) + '1' + ')'.repeat(20_000)],
    ['signs', '-'.repeat(5000) + '1'],
    ['functions', 'ABS('.repeat(3000) + '1' + ')'.repeat(3000)],
  ])('%s nested without end are too deep', (_what, text) => {
    expect(parseFormula(text, place, noNames)).toMatchObject({ code: 'too-deep' });
  });

  it('sums of thousands of terms and hundreds of brackets are not too deep', () => {
    const sum = Array.from({ length: 2700 }, (_term, at) => `A${at + 1}`).join('+');
    expect(parseFormula(sum, place, noNames)).toMatchObject({ kind: 'formula' });
    expect(parseFormula('('.repeat(300) + '1' + ')'.repeat(300), place, noNames).kind).toBe('formula');
  });

  it('a number beyond range is the error value that Excel makes of it', () => {
    expect(treeOf('1E400')).toMatchObject({ kind: 'error', error: { code: '#NUM!' } });
  });
});

describe('shared trees', () => {
  const cache = new FormulaCache(MemoryWorkbook.of({ sheets: { Plan: {} } }).snapshot());

  it('formulas that mean the same from their cells are one tree', () => {
    const first = cache.parse('SUM(A1:B1)*$D$1', { row: 0, column: 2 });
    expect(cache.parse('SUM(A2:B2)*$D$1', { row: 1, column: 2 })).toBe(first);
    expect(cache.parse('SUM(A2:B2)*$D$2', { row: 1, column: 2 })).not.toBe(first);
  });

  it('whole columns, trimmed ranges and names that look like cells are not mixed up', () => {
    const second = { row: 1, column: 4 };
    for (const text of [
      'SUM(A:A)',
      'SUM(A1.:.A10)',
      'Jan1:Mar3!A1',
      'A1048577',
      '"A1"',
      "'A1'!B1",
      'T1[A1]',
    ]) {
      const moved = cache.parse(text, second);
      expect(moved).toEqual(parseFormula(text, second, noNames));
      expect(cache.parse(text, place)).toEqual(parseFormula(text, place, noNames));
    }
  });

  it('the key counts each cell of the text once', () => {
    expect(relativeKey('A1+B$2*SUM($C3:D$4)+LOG10(E5)+1E5', 0, 0).referenceCount).toBe(5);
    expect(relativeKey('"A1"&\'B2\'!C3&Tbl[D4]', 0, 0).referenceCount).toBe(1);
  });
});
