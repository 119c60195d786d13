/**
 * Makes tile-week.xlsx: the week of an invented tile works, with one of everything that a planner's workbook can
 * have around its numbers. Tests check that all of it survives a write to the byte.
 *
 *     npx tsx tests/golden/make-tile-week.ts
 */
import { writeFileSync } from 'node:fs';
import path from 'node:path';
import { fileURLToPath } from 'node:url';
import { buildZip } from '../support/zip-builder';
import { xlsxParts, type CellDescription, type XlsxDescription } from '../support/xlsx-builder';

const spreadsheet = 'application/vnd.openxmlformats-officedocument.spreadsheetml';
const main = 'http://schemas.openxmlformats.org/spreadsheetml/2006/main';
const drawing = 'http://schemas.openxmlformats.org/drawingml/2006';
const relationships = 'http://schemas.openxmlformats.org/officeDocument/2006/relationships';
const declaration = '<?xml version="1.0" encoding="UTF-8" standalone="yes"?>\n';

/** Product, square metres planned, margin a square metre, press and kiln hours a square metre. */
const products = [
  ['Wall tile white', 120, 4.2, 0.02, 0.05],
  ['Wall tile blue', 80, 4.6, 0.02, 0.06],
  ['Floor tile grey', 150, 5.1, 0.03, 0.08],
  ['Mosaic green', 40, 7.5, 0.05, 0.07],
] as const;

const plan: Record<string, CellDescription> = {
  A1: 'Tile works, week plan',
  A3: 'Product',
  B3: 'Square metres',
  C3: 'Margin',
  D3: 'Press h',
  E3: 'Kiln h',
  F3: 'Margin of product',
  A9: 'Margin of the week',
  A11: 'Limit',
  B11: 'Needed',
  C11: 'Relation',
  D11: 'There is',
  A12: 'Press hours',
  C12: '<=',
  D12: 12,
  A13: 'Kiln hours',
  C13: '<=',
  D13: 30,
  A15: 'Week begins',
  B15: { value: 46083, isDate: true },
};
let margin = 0;
let press = 0;
let kiln = 0;
products.forEach(([name, amount, each, pressHours, kilnHours], index) => {
  const row = 4 + index;
  margin += amount * each;
  press += amount * pressHours;
  kiln += amount * kilnHours;
  plan[`A${row}`] = name;
  plan[`B${row}`] = { value: amount, numberFormat: '#,##0.0' };
  plan[`C${row}`] = { value: each, numberFormat: '#,##0.00" EUR"' };
  plan[`D${row}`] = pressHours;
  plan[`E${row}`] = kilnHours;
  plan[`F${row}`] =
    index === 0
      ? { formula: 'B4*C4', sharedRange: 'F4:F7', value: amount * each }
      : { sharedFrom: 'F4', value: amount * each };
});
plan.B9 = { formula: 'SUMPRODUCT(B4:B7,C4:C7)', value: margin, numberFormat: '#,##0.00" EUR"' };
plan.B12 = { formula: 'SUMPRODUCT(B4:B7,D4:D7)', value: press };
plan.B13 = { formula: 'SUMPRODUCT(B4:B7,E4:E7)', value: kiln };

const description: XlsxDescription = {
  sheets: [
    {
      name: 'Plan',
      cells: plan,
      merges: ['A1:F1'],
      notes: { D13: 'One kiln, five days of six hours' },
      xmlBeforeCells:
        '<sheetPr><tabColor rgb="FF4472C4"/></sheetPr><dimension ref="A1:F15"/>' +
        '<sheetViews><sheetView workbookViewId="0"><pane ySplit="3" topLeftCell="A4" activePane="bottomLeft" state="frozen"/></sheetView></sheetViews>' +
        '<cols><col min="1" max="1" width="22" customWidth="1"/><col min="2" max="6" width="13" customWidth="1"/></cols>',
      xmlAfterCells:
        '<conditionalFormatting sqref="F4:F7"><cfRule type="colorScale" priority="1"><colorScale><cfvo type="min"/><cfvo type="max"/>' +
        '<color rgb="FFFFFFFF"/><color rgb="FF63BE7B"/></colorScale></cfRule></conditionalFormatting>' +
        '<conditionalFormatting sqref="B12:B13"><cfRule type="cellIs" dxfId="0" priority="2" operator="greaterThan"><formula>D12</formula></cfRule></conditionalFormatting>' +
        '<dataValidations count="1"><dataValidation type="decimal" operator="greaterThanOrEqual" allowBlank="1" sqref="B4:B7"><formula1>0</formula1></dataValidation></dataValidations>' +
        '<pageMargins left="0.7" right="0.7" top="0.75" bottom="0.75" header="0.3" footer="0.3"/>' +
        '<headerFooter><oddHeader>&amp;L&amp;"-,Bold"Week plan&amp;R&amp;D</oddHeader><oddFooter>&amp;CPage &amp;P</oddFooter></headerFooter>' +
        '<drawing r:id="rIdDrawing"/><legacyDrawing r:id="rIdNotes"/>',
      relationships: [
        ['rIdDrawing', 'drawing', '../drawings/drawing1.xml'],
        ['rIdNotes', 'vmlDrawing', '../drawings/vmlDrawing1.vml'],
      ],
    },
    {
      name: 'Cost data',
      cells: {
        A1: 'Material',
        B1: 'Cost',
        C1: 'Kg',
        A2: 'Clay',
        B2: 0.3,
        C2: 900,
        A3: 'Glaze',
        B3: 2.4,
        C3: 70,
        A4: 'Cartons',
        B4: 0.15,
        C4: 400,
        E1: { formula: 'B2:B4*C2:C4', arrayRange: 'E1:E3', value: 270 },
        E2: 168,
        E3: 60,
        G1: { formula: '_xlfn._xlws.SORT(B2:B4)', arrayRange: 'G1:G3', isDynamicArray: true, value: 0.15 },
        G2: 0.3,
        G3: 2.4,
      },
      names: { Rate: "'Cost data'!$B$2" },
    },
    { name: 'Calendar', visibility: 'hidden', cells: { A1: 'Holidays', A2: { value: 46113, isDate: true } } },
  ],
  tables: [{ name: 'Costs', sheet: 'Cost data', ref: 'A1:C4' }],
  names: {
    'Week.Constraint': 'Plan!$B$12:$D$13',
    'Week.Decision': 'Plan!$B$4:$B$7',
    'Week.Objective': 'Plan!$B$9',
    'Week.Sense': '"maximise"',
  },
  hiddenNames: { Checked: 'Plan!$A$1' },
  workbookRelationships: [
    ['calcChain', 'calcChain.xml'],
    ['sheetMetadata', 'metadata.xml'],
    ['customXml', '../customXml/item1.xml'],
  ],
  contentTypes: {
    'xl/calcChain.xml': `${spreadsheet}.calcChain+xml`,
    'xl/metadata.xml': `${spreadsheet}.sheetMetadata+xml`,
    'xl/drawings/drawing1.xml': 'application/vnd.openxmlformats-officedocument.drawing+xml',
    'xl/charts/chart1.xml': 'application/vnd.openxmlformats-officedocument.drawingml.chart+xml',
    'xl/drawings/vmlDrawing1.vml': 'application/vnd.openxmlformats-officedocument.vmlDrawing',
    'docProps/core.xml': 'application/vnd.openxmlformats-package.core-properties+xml',
    'customXml/itemProps1.xml': 'application/vnd.openxmlformats-officedocument.customXmlProperties+xml',
  },
  parts: {
    'xl/calcChain.xml': `${declaration}<calcChain xmlns="${main}">${[
      'F4',
      'F5',
      'F6',
      'F7',
      'B9',
      'B12',
      'B13',
    ]
      .map((cell) => `<c r="${cell}" i="1"/>`)
      .join('')}<c r="E1" i="2" a="1"/><c r="G1" i="2" a="1"/></calcChain>`,
    'xl/metadata.xml':
      `${declaration}<metadata xmlns="${main}" xmlns:xda="http://schemas.microsoft.com/office/spreadsheetml/2017/dynamicarray">` +
      '<metadataTypes count="1"><metadataType name="XLDAPR" minSupportedVersion="120000" copy="1" pasteAll="1" pasteValues="1" merge="1" splitFirst="1" rowColShift="1" clearFormats="1" clearComments="1" assign="1" coerce="1" cellMeta="1"/></metadataTypes>' +
      '<futureMetadata name="XLDAPR" count="1"><bk><extLst><ext uri="{bdbb8cdc-fa1e-496e-a857-3c3f30c029c3}"><xda:dynamicArrayProperties fDynamic="1" fCollapsed="0"/></ext></extLst></bk></futureMetadata>' +
      '<cellMetadata count="1"><bk><rc t="1" v="0"/></bk></cellMetadata></metadata>',
    'xl/drawings/drawing1.xml':
      `${declaration}<xdr:wsDr xmlns:xdr="${drawing}/spreadsheetDrawing" xmlns:a="${drawing}/main"><xdr:twoCellAnchor>` +
      '<xdr:from><xdr:col>7</xdr:col><xdr:colOff>0</xdr:colOff><xdr:row>17</xdr:row><xdr:rowOff>0</xdr:rowOff></xdr:from>' +
      '<xdr:to><xdr:col>13</xdr:col><xdr:colOff>0</xdr:colOff><xdr:row>32</xdr:row><xdr:rowOff>0</xdr:rowOff></xdr:to>' +
      '<xdr:graphicFrame macro=""><xdr:nvGraphicFramePr><xdr:cNvPr id="2" name="Margins"/><xdr:cNvGraphicFramePr/></xdr:nvGraphicFramePr>' +
      '<xdr:xfrm><a:off x="0" y="0"/><a:ext cx="0" cy="0"/></xdr:xfrm><a:graphic>' +
      `<a:graphicData uri="${drawing}/chart"><c:chart xmlns:c="${drawing}/chart" xmlns:r="${relationships}" r:id="rId1"/></a:graphicData>` +
      '</a:graphic></xdr:graphicFrame><xdr:clientData/></xdr:twoCellAnchor></xdr:wsDr>',
    'xl/drawings/_rels/drawing1.xml.rels':
      `${declaration}<Relationships xmlns="http://schemas.openxmlformats.org/package/2006/relationships">` +
      `<Relationship Id="rId1" Type="${relationships}/chart" Target="../charts/chart1.xml"/></Relationships>`,
    'xl/charts/chart1.xml':
      `${declaration}<c:chartSpace xmlns:c="${drawing}/chart" xmlns:a="${drawing}/main"><c:chart><c:plotArea><c:layout/>` +
      '<c:barChart><c:barDir val="col"/><c:grouping val="clustered"/><c:ser><c:idx val="0"/><c:order val="0"/>' +
      '<c:cat><c:strRef><c:f>Plan!$A$4:$A$7</c:f></c:strRef></c:cat><c:val><c:numRef><c:f>Plan!$F$4:$F$7</c:f></c:numRef></c:val></c:ser>' +
      '<c:axId val="1"/><c:axId val="2"/></c:barChart><c:catAx><c:axId val="1"/><c:scaling/><c:delete val="0"/><c:axPos val="b"/><c:crossAx val="2"/></c:catAx>' +
      '<c:valAx><c:axId val="2"/><c:scaling/><c:delete val="0"/><c:axPos val="l"/><c:crossAx val="1"/></c:valAx></c:plotArea></c:chart></c:chartSpace>',
    'xl/drawings/vmlDrawing1.vml':
      '<xml xmlns:v="urn:schemas-microsoft-com:vml" xmlns:o="urn:schemas-microsoft-com:office:office" xmlns:x="urn:schemas-microsoft-com:office:excel">' +
      '<v:shapetype id="_x0000_t202" coordsize="21600,21600" o:spt="202" path="m,l,21600r21600,l21600,xe"/>' +
      '<v:shape type="#_x0000_t202" style="position:absolute;visibility:hidden" fillcolor="#ffffe1"><x:ClientData ObjectType="Note">' +
      '<x:Anchor>4,15,12,2,6,15,16,4</x:Anchor><x:Row>12</x:Row><x:Column>3</x:Column></x:ClientData></v:shape></xml>',
    'docProps/core.xml':
      `${declaration}<cp:coreProperties xmlns:cp="http://schemas.openxmlformats.org/package/2006/metadata/core-properties" ` +
      'xmlns:dc="http://purl.org/dc/elements/1.1/"><dc:title>Week plan</dc:title></cp:coreProperties>',
    'customXml/item1.xml': '<routing xmlns="urn:example:tile-works"><plant>2</plant></routing>',
    'customXml/itemProps1.xml': `${declaration}<ds:datastoreItem ds:itemID="{0D2D1B44-73B5-4C1B-9E55-6C7F3A1E8B90}" xmlns:ds="http://schemas.openxmlformats.org/officeDocument/2006/customXml"><ds:schemaRefs/></ds:datastoreItem>`,
    'customXml/_rels/item1.xml.rels':
      `${declaration}<Relationships xmlns="http://schemas.openxmlformats.org/package/2006/relationships">` +
      `<Relationship Id="rId1" Type="${relationships}/customXmlProps" Target="itemProps1.xml"/></Relationships>`,
  },
};

/** The same bytes on every machine with this version of Node's zlib. */
export function makeTileWeek(): Uint8Array {
  const parts = xlsxParts(description);
  const change = (part: string, from: string, to: string): void => {
    const text = parts.get(part) as string;
    if (!text.includes(from)) throw new Error(`${part} has no ${from}`);
    parts.set(part, text.replace(from, to));
  };
  change(
    'xl/styles.xml',
    '</styleSheet>',
    '<dxfs count="1"><dxf><font><color rgb="FFC00000"/></font></dxf></dxfs></styleSheet>',
  );
  change('xl/workbook.xml', '</workbook>', '<calcPr calcId="191029"/></workbook>');
  change(
    '_rels/.rels',
    '</Relationships>',
    '<Relationship Id="rId2" Type="http://schemas.openxmlformats.org/package/2006/relationships/metadata/core-properties" Target="docProps/core.xml"/></Relationships>',
  );
  // One text with two fonts and one with a phonetic hint, as a spreadsheet program stores them.
  change(
    'xl/sharedStrings.xml',
    '<si><t xml:space="preserve">Tile works, week plan</t></si>',
    '<si><r><rPr><b/><sz val="14"/></rPr><t xml:space="preserve">Tile works, </t></r><r><t>week plan</t></r></si>',
  );
  return buildZip([...parts].map(([name, content]) => ({ name, content })));
}

if (process.argv[1] === fileURLToPath(import.meta.url)) {
  writeFileSync(path.join(path.dirname(process.argv[1]), 'tile-week.xlsx'), makeTileWeek());
}
