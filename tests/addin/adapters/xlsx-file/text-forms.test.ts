import { serialOfIsoDate } from '../../../../addin/adapters/xlsx-file/iso-dates';
import { parseCell, parseRange } from '../../../../addin/adapters/xlsx-file/cell-reference';
import { excerpt } from '../../../../addin/adapters/xlsx-file/file-faults';
import {
  escapeCellText,
  escapeXml,
  escapeXmlText,
  unescapeCellText,
} from '../../../../addin/adapters/xlsx-file/xml-escapes';

describe('texts in XML', () => {
  it('keep their characters in elements and in attributes', () => {
    expect(escapeXmlText('a<b>&"\n\t\r')).toBe('a&lt;b&gt;&amp;"\n\t&#13;');
    expect(escapeXml('a<b>&"\n\t\r')).toBe('a&lt;b&gt;&amp;&quot;&#10;&#9;&#13;');
  });

  it('come back from the form in which cells keep what XML cannot hold', () => {
    for (const text of [
      'plain',
      '_x0041_',
      '_x005F_x0041_',
      '__x0041_x0041_',
      '_x00e4_',
      '\u0000\u0008\u000b\u000c\r\u001f',
      '\ud800',
      '\udc00\ud800',
      '😀',
      'a_b_xyz_',
    ]) {
      const escaped = escapeCellText(text);

      expect(/[\u0000-\u0008\u000b\u000c\r\u000e-\u001f]/.test(escaped)).toBe(false);
      expect(unescapeCellText(escaped)).toBe(text);
    }
    expect(escapeCellText('_x0041_')).toBe('_x005F_x0041_');
    expect(escapeCellText('a\r\n')).toBe('a_x000D_\n');
  });

  it('are cut and laid on one line for a sentence', () => {
    expect(excerpt(' a\u0000b\n\u202ec ')).toBe('a b c');
    expect(excerpt('x'.repeat(41))).toBe(`${'x'.repeat(40)}…`);
  });
});

describe('references', () => {
  it('are cells of a sheet or nothing', () => {
    expect(parseCell('B7')).toEqual({ row: 6, column: 1 });
    expect(parseCell('$xfd$1048576')).toEqual({ row: 1_048_575, column: 16_383 });
    for (const text of [
      '',
      'A',
      '7',
      'A0',
      'A01',
      'XFE1',
      'A1048577',
      'AAAA1',
      'A1 ',
      'A1:B2',
      'A-1',
      'Ä1',
    ]) {
      expect(parseCell(text)).toBeUndefined();
    }
    expect(parseRange('Plan', 'C9:B7')).toEqual({ sheet: 'Plan', top: 6, left: 1, bottom: 8, right: 2 });
    expect(parseRange('Plan', 'B7')?.right).toBe(1);
    expect(parseRange('Plan', 'A1:B2:C3')).toBeUndefined();
  });
});

describe('dates written as text', () => {
  // Serial numbers as the spreadsheet program shows them (ECMA-376 Part 1, §18.17.4.1): 1 is 1 January 1900, 61 is
  // 1 March 1900, 45000 is 15 March 2023; in the 1904 system 0 is 1 January 1904.
  it.each([
    ['1900-01-01', false, 1],
    ['1900-02-28', false, 59],
    ['1900-03-01', false, 61],
    ['2023-03-15', false, 45000],
    ['2023-03-15T18:00:00', false, 45000.75],
    ['2023-03-15T06:00:00.000Z', false, 45000.25],
    ['12:00:00', false, 0.5],
    ['T06:00', false, 0.25],
    ['1904-01-01', true, 0],
    ['2023-03-15', true, 43538],
  ])('%s (1904: %s) is %d', (text, usesDates1904, serial) => {
    expect(serialOfIsoDate(text, usesDates1904)).toBe(serial);
  });

  it.each(['', 'Z', '2023-02-29', '2023-13-01', '15.03.2023', '2023-03-15T25:00:00', '45000', '12:61'])(
    '"%s" is none',
    (text) => {
      expect(serialOfIsoDate(text, false)).toBeUndefined();
    },
  );
});
