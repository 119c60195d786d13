import { recordOfXml, xmlOfRecord } from '../../../../addin/adapters/excel-host/excel-record';
import { newRecordParts } from '../../../../addin/adapters/xlsx-file/record-part';

const records = ['{}', '{"plan":"Week","text":"<&> ü \\n 😀"}', '[1,2]', '', '"a \\u0007 b"'];

it.each(records)('%j comes back from its part', (json) => {
  expect(recordOfXml(xmlOfRecord(json))).toBe(json);
});

it('the part that a file has is read as well', () => {
  for (const json of records) expect(recordOfXml(newRecordParts(json).item)).toBe(json);
});

it('other spellings of the same part are understood', () => {
  const inNamespace = 'xmlns:p="urn:planrow:record:1"';
  expect(
    recordOfXml(`<?xml version="1.0"?>\r\n<p:record ${inNamespace}>{"a":"&#x42;&#67;&quot;"}</p:record>\n`),
  ).toBe('{"a":"BC""}');
  expect(recordOfXml('<record xmlns="urn:planrow:record:1"/>')).toBe('');
});

it('a part of another form holds no record', () => {
  for (const xml of ['', 'no xml', '<other/>', '<record><inner/></record>', '<record>a</other>']) {
    expect([xml, recordOfXml(xml)]).toEqual([xml, null]);
  }
});

it('a lone half of a character becomes an escape that means the same', () => {
  const json = JSON.stringify({ text: 'a' }).replace('a', '\uD800');
  expect(JSON.parse(recordOfXml(xmlOfRecord(json))!)).toEqual({ text: '\uD800' });
});
