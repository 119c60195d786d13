/**
 * A sample workbook as plain data: sheets, cells, tables, names, and what a planner's workbook carries besides (notes,
 * a chart, print setup). workbook-parts.ts turns it into the parts of an .xlsx package.
 */

/** How a cell looks. Equal looks share one format in the file. */
export interface CellLook {
  readonly isBold?: boolean;
  readonly isItalic?: boolean;
  /** Points; 10 where none is given. */
  readonly fontSize?: number;
  /** RRGGBB. */
  readonly textColor?: string;
  readonly fillColor?: string;
  readonly hasLineBelow?: boolean;
  readonly hasLineAbove?: boolean;
  readonly numberFormat?: string;
  readonly isCentred?: boolean;
  readonly isRightAligned?: boolean;
  readonly wrapsText?: boolean;
  readonly indent?: number;
}

export interface SampleCell {
  /** For a formula: the value stored beside it. null: the cell only has a look. */
  readonly value: number | string | null;
  /** Without `=`. */
  readonly formula?: string;
  readonly look?: CellLook;
  /** A note on the cell. */
  readonly note?: string;
}

export interface SampleTable {
  readonly name: string;
  /** Headings and data, `A4:M16`. */
  readonly range: string;
  /** Formulas of calculated columns, by heading, as a table stores them. */
  readonly columnFormulas?: Readonly<Record<string, string>>;
}

/** Bars lying on their side, one for each category. */
export interface BarChart {
  readonly title: string;
  readonly axisTitle: string;
  /** Columns and rows from 0: the cells that the chart covers. */
  readonly from: { readonly column: number; readonly row: number };
  readonly to: { readonly column: number; readonly row: number };
  /** One column each: `A7:A18`, on the chart's own sheet. */
  readonly categories: string;
  readonly values: string;
  readonly seriesNameCell: string;
  readonly barColor: string;
}

export interface SampleSheet {
  readonly name: string;
  /** By A1 text. */
  readonly cells: ReadonlyMap<string, SampleCell>;
  /** In characters of the default font, by column letter. */
  readonly columnWidths: Readonly<Record<string, number>>;
  /** In points, by row as numbered on the sheet. */
  readonly rowHeights?: Readonly<Record<number, number>>;
  /** The first cell that scrolls. */
  readonly frozenAt?: string;
  readonly merges?: readonly string[];
  readonly tables?: readonly SampleTable[];
  readonly chart?: BarChart;
  /** A pick list for the cells of a range. */
  readonly pickList?: { readonly range: string; readonly choices: readonly string[]; readonly hint: string };
  /** Cells of the range that reach the limit are shown in this colour. */
  readonly highlight?: { readonly range: string; readonly atLeast: number; readonly textColor: string };
  /** Printed upright; otherwise lying. */
  readonly isPortrait?: boolean;
  readonly printArea?: string;
  /** Rows printed on every page, `$6:$6`. */
  readonly printTitleRows?: string;
  readonly pageFooter?: string;
}

export interface SampleWorkbook {
  readonly title: string;
  readonly sheets: readonly SampleSheet[];
  /** Names of the whole workbook: what they refer to, without `=`. */
  readonly names: Readonly<Record<string, string>>;
}
