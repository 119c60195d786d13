import { builtInFormat } from '../../../../addin/adapters/xlsx-file/number-formats';
import { isDateFormat } from '../../../../addin/domain/sheet/date-format';

describe('number formats', () => {
  // By hand, from the meaning of the codes (ECMA-376 Part 1, §18.8.31).
  it.each([
    'yyyy-mm-dd',
    'd/m/yy;@',
    'dddd',
    'mmmm\\ yyyy',
    'h:mm',
    'h:mm AM/PM',
    '[h]:mm:ss',
    '[mm]:ss',
    'mm:ss.0',
    'mm:ss.000',
    '[$-409]d\\-mmm\\-yyyy',
    '[Red]yyyy',
    '"Week of" d.m.',
    '[$-F800]dddd\\,\\ mmmm\\ dd\\,\\ yyyy',
  ])('%s shows a date or a time', (code) => {
    expect(isDateFormat(code)).toBe(true);
  });

  it.each([
    'General',
    'General "days"',
    '0',
    '#,##0.00',
    '0.00E+00',
    '0 "days"',
    '0\\d',
    '#,##0.00" EUR"',
    '[$€-407] #,##0.00',
    '[$-409]#,##0.00" hrs"',
    '[Red]-0;[Green]0',
    '[>=1000]0.0,"k";0',
    '# ?/?',
    '0%',
    '@',
    '_(* #,##0_)',
    '_d0',
    '""',
    ';;;',
    '0 m²',
  ])('%s shows a number or a text', (code) => {
    expect(isDateFormat(code)).toBe(false);
  });

  it('that are built in are known by their number', () => {
    expect(builtInFormat(0)).toBe('General');
    expect(builtInFormat(4)).toBe('#,##0.00');
    expect(builtInFormat(14)).toBe('mm-dd-yy');
    expect(builtInFormat(49)).toBe('@');
    expect(builtInFormat(23)).toBeUndefined();
    for (const id of [14, 15, 16, 17, 18, 19, 20, 21, 22, 27, 36, 45, 46, 47, 50, 58]) {
      expect([id, isDateFormat(builtInFormat(id)!)]).toEqual([id, true]);
    }
    for (const id of [0, 1, 2, 3, 4, 9, 10, 11, 12, 13, 37, 38, 39, 40, 41, 42, 43, 44, 48, 49]) {
      expect([id, isDateFormat(builtInFormat(id)!)]).toEqual([id, false]);
    }
  });
});
