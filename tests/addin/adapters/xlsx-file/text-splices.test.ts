import { asOpenTag, withAttribute, withAttributes } from '../../../../addin/adapters/xlsx-file/start-tag';
import { TextSplices } from '../../../../addin/adapters/xlsx-file/text-splices';

describe('splices', () => {
  it('replace and insert by places of the original, whatever their order', () => {
    const splices = new TextSplices('0123456789');
    splices.replace(6, 8, 'six');
    splices.insert(2, 'a');
    splices.insert(2, 'b');
    splices.replace(2, 3, 'two');
    splices.insert(10, 'end');
    expect(splices.apply()).toBe('01abtwo345six89end');
  });

  it('leave a text without changes as it is, and refuse changes that overlap', () => {
    const splices = new TextSplices('tile');
    expect(splices.apply()).toBe('tile');
    splices.replace(0, 3, 'x');
    splices.replace(2, 4, 'y');
    expect(() => splices.apply()).toThrow(RangeError);
  });
});

describe('a start tag', () => {
  it('gets, changes and loses an attribute; the others keep order, quotes and spaces', () => {
    const tag = `<x:c  r='B7'   s = "4" note="a > b s='9'" />`;
    expect(withAttribute(tag, 's', '12')).toBe(`<x:c  r='B7' s="12" note="a > b s='9'" />`);
    expect(withAttribute(tag, 's', undefined)).toBe(`<x:c  r='B7' note="a > b s='9'" />`);
    expect(withAttribute(tag, 't', 'n&"')).toBe(
      `<x:c  r='B7'   s = "4" note="a > b s='9'" t="n&amp;&quot;" />`,
    );
    expect(withAttribute(tag, 'absent', undefined)).toBe(tag);
    expect(withAttribute('<c>', 'r', 'A1')).toBe('<c r="A1">');
    expect(withAttribute('<c/>', 'r', 'A1')).toBe('<c r="A1"/>');
    expect(withAttributes('<c r="A1">', { r: 'B1', t: undefined, s: '3' })).toBe('<c r="B1" s="3">');
  });

  it('is opened where it was an empty element', () => {
    expect(asOpenTag('<row r="1" />')).toBe('<row r="1">');
    expect(asOpenTag('<row r="a/>b">')).toBe('<row r="a/>b">');
  });
});
