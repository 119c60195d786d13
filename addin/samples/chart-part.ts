/**
 * A bar chart as the chart and drawing parts of a package. The categories and values that the chart shows are stored
 * in it too, as spreadsheet programs do.
 * Source: ECMA-376 Part 1, §21.2 (charts) and §20.5 (spreadsheet drawings).
 */
import type { BarChart } from './sample-workbook';
import { escapeXml } from './xml-text';

const chartNamespace = 'http://schemas.openxmlformats.org/drawingml/2006/chart';
const drawingNamespace = 'http://schemas.openxmlformats.org/drawingml/2006/main';
const relationshipNamespace = 'http://schemas.openxmlformats.org/officeDocument/2006/relationships';

export interface ChartData {
  /** Absolute references with the sheet's name. */
  readonly categoriesReference: string;
  readonly valuesReference: string;
  readonly seriesNameReference: string;
  readonly seriesName: string;
  readonly categories: readonly string[];
  readonly values: readonly number[];
  readonly numberFormat: string;
}

export function chartXml(chart: BarChart, data: ChartData): string {
  const points = (values: readonly (string | number)[]): string =>
    `<c:ptCount val="${values.length}"/>` +
    values
      .map((value, position) => `<c:pt idx="${position}"><c:v>${escapeXml(String(value))}</c:v></c:pt>`)
      .join('');
  const series = [
    '<c:ser><c:idx val="0"/><c:order val="0"/>',
    `<c:tx><c:strRef><c:f>${escapeXml(data.seriesNameReference)}</c:f><c:strCache>${points([data.seriesName])}</c:strCache></c:strRef></c:tx>`,
    `<c:spPr><a:solidFill><a:srgbClr val="${chart.barColor}"/></a:solidFill></c:spPr><c:invertIfNegative val="0"/>`,
    `<c:cat><c:strRef><c:f>${escapeXml(data.categoriesReference)}</c:f><c:strCache>${points(data.categories)}</c:strCache></c:strRef></c:cat>`,
    `<c:val><c:numRef><c:f>${escapeXml(data.valuesReference)}</c:f><c:numCache><c:formatCode>${escapeXml(data.numberFormat)}</c:formatCode>${points(data.values)}</c:numCache></c:numRef></c:val>`,
    '</c:ser>',
  ].join('');
  return [
    '<?xml version="1.0" encoding="UTF-8" standalone="yes"?>\n',
    `<c:chartSpace xmlns:c="${chartNamespace}" xmlns:a="${drawingNamespace}" xmlns:r="${relationshipNamespace}">`,
    '<c:roundedCorners val="0"/>',
    `<c:chart>${titleXml(chart.title, 1200)}<c:autoTitleDeleted val="0"/><c:plotArea><c:layout/>`,
    `<c:barChart><c:barDir val="bar"/><c:grouping val="clustered"/><c:varyColors val="0"/>${series}`,
    '<c:gapWidth val="60"/><c:axId val="510001"/><c:axId val="510002"/></c:barChart>',
    // The first product stands at the top, as in the sheet.
    '<c:catAx><c:axId val="510001"/><c:scaling><c:orientation val="maxMin"/></c:scaling><c:delete val="0"/>',
    '<c:axPos val="l"/><c:numFmt formatCode="General" sourceLinked="0"/><c:majorTickMark val="none"/>',
    '<c:minorTickMark val="none"/><c:tickLblPos val="nextTo"/><c:crossAx val="510002"/><c:crosses val="autoZero"/>',
    '<c:auto val="1"/><c:lblAlgn val="ctr"/><c:lblOffset val="100"/><c:noMultiLvlLbl val="0"/></c:catAx>',
    '<c:valAx><c:axId val="510002"/><c:scaling><c:orientation val="minMax"/></c:scaling><c:delete val="0"/>',
    `<c:axPos val="b"/><c:majorGridlines/>${titleXml(chart.axisTitle, 900)}`,
    `<c:numFmt formatCode="${escapeXml(data.numberFormat)}" sourceLinked="0"/><c:majorTickMark val="out"/>`,
    '<c:minorTickMark val="none"/><c:tickLblPos val="nextTo"/><c:crossAx val="510001"/><c:crosses val="max"/>',
    '<c:crossBetween val="between"/></c:valAx></c:plotArea>',
    '<c:plotVisOnly val="1"/><c:dispBlanksAs val="gap"/></c:chart>',
    '</c:chartSpace>',
  ].join('');
}

/** @param size hundredths of a point */
function titleXml(text: string, size: number): string {
  return [
    '<c:title><c:tx><c:rich><a:bodyPr/><a:lstStyle/><a:p>',
    `<a:pPr><a:defRPr sz="${size}" b="0"/></a:pPr><a:r><a:rPr lang="en-GB" sz="${size}" b="0"/>`,
    `<a:t>${escapeXml(text)}</a:t></a:r></a:p></c:rich></c:tx><c:overlay val="0"/></c:title>`,
  ].join('');
}

/** The drawing that sets the chart on its sheet; the chart's relationship is rId1. */
export function drawingXml(chart: BarChart): string {
  const anchor = (tag: string, at: BarChart['from']): string =>
    `<xdr:${tag}><xdr:col>${at.column}</xdr:col><xdr:colOff>0</xdr:colOff><xdr:row>${at.row}</xdr:row><xdr:rowOff>0</xdr:rowOff></xdr:${tag}>`;
  return [
    '<?xml version="1.0" encoding="UTF-8" standalone="yes"?>\n',
    '<xdr:wsDr xmlns:xdr="http://schemas.openxmlformats.org/drawingml/2006/spreadsheetDrawing"',
    ` xmlns:a="${drawingNamespace}"><xdr:twoCellAnchor>`,
    anchor('from', chart.from),
    anchor('to', chart.to),
    '<xdr:graphicFrame macro=""><xdr:nvGraphicFramePr>',
    `<xdr:cNvPr id="2" name="Chart 1" descr="${escapeXml(chart.title)}"/><xdr:cNvGraphicFramePr/></xdr:nvGraphicFramePr>`,
    '<xdr:xfrm><a:off x="0" y="0"/><a:ext cx="0" cy="0"/></xdr:xfrm>',
    `<a:graphic><a:graphicData uri="${chartNamespace}">`,
    `<c:chart xmlns:c="${chartNamespace}" xmlns:r="${relationshipNamespace}" r:id="rId1"/>`,
    '</a:graphicData></a:graphic></xdr:graphicFrame><xdr:clientData/></xdr:twoCellAnchor></xdr:wsDr>',
  ].join('');
}
