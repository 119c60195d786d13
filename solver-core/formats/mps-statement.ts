/**
 * What an MPS text states, gathered line by line, and its meaning as a LinearProgram.
 *
 * Rules where readings differ (solver-core/SPEC.md, SC-40 …): the first N row is the objective, further ones are left
 * out; the objective's right side is minus its constant; a range on an E row goes up from the right side where it is
 * positive and down where it is negative; a negative upper bound without a lower one takes the lower bound away; a
 * bound or right side of magnitude 1e30 or more is infinite; a whole-number column from markers that no BOUNDS line
 * mentions lies between 0 and 1.
 */
import type { LinearProgram, Sense } from '../linear-program/linear-program';
import { LinearProgramBuilder } from '../linear-program/linear-program-builder';
import type { MpsErrorCode } from './mps-errors';
import { MpsSyntaxError } from './mps-errors';
import { MpsWarningTally } from './mps-warning-tally';

/** A bound or right side of at least this magnitude is infinite: the format has no word for it. */
export const mpsInfinity = 1e30;

export type RowType = 'N' | 'L' | 'G' | 'E';

/** The kinds of bounds that can be stated. SC, a semi-continuous column, is refused by the parser. */
export type BoundType = 'UP' | 'LO' | 'FX' | 'FR' | 'MI' | 'PL' | 'BV' | 'LI' | 'UI';

interface StatedRow {
  readonly type: RowType;
  readonly name: string;
  rightSide: number | undefined;
  range: number | undefined;
  /** The column whose entry in this row was read last: an entry that repeats is found without a search. */
  lastColumn: number;
}

interface StatedColumn {
  readonly name: string;
  readonly line: number;
  readonly isFromMarkers: boolean;
  isInteger: boolean;
  cost: number;
  lower: number;
  upper: number;
  isLowerStated: boolean;
  boundTypes: readonly BoundType[];
}

const noBoundTypes: readonly BoundType[] = [];

/** Where the objective and the rows left out stand in place of an index. */
const objectiveRow = -1;
const ignoredRow = -2;

export class MpsStatement {
  name = '';
  sense: Sense = 'minimise';
  readonly warnings = new MpsWarningTally();

  private readonly rows: StatedRow[] = [];
  private readonly columns: StatedColumn[] = [];
  private readonly rowPlaces = new Map<string, number>();
  private readonly columnPlaces = new Map<string, number>();
  /** Coefficients, as row, column, value in step. */
  private readonly entryRows: number[] = [];
  private readonly entryColumns: number[] = [];
  private readonly entryValues: number[] = [];
  private objective: StatedRow | undefined;

  addRow(type: RowType, name: string, line: number): void {
    if (this.rowPlaces.has(name)) {
      throw fault('repeated-row', line, `row "${name}" stands in ROWS twice.`);
    }
    const row: StatedRow = { type, name, rightSide: undefined, range: undefined, lastColumn: -1 };
    if (type !== 'N') {
      this.rowPlaces.set(name, this.rows.push(row) - 1);
    } else if (this.objective === undefined) {
      this.objective = row;
      this.rowPlaces.set(name, objectiveRow);
    } else {
      this.rowPlaces.set(name, ignoredRow);
      this.warnings.add('ignored-free-row', line, name);
    }
  }

  addColumn(name: string, isInteger: boolean, line: number): void {
    if (this.columnPlaces.has(name)) {
      throw fault('repeated-column', line, `column "${name}" comes back after other columns.`);
    }
    const place = this.columns.push({
      name,
      line,
      isFromMarkers: isInteger,
      isInteger,
      cost: 0,
      lower: 0,
      upper: Infinity,
      isLowerStated: false,
      boundTypes: noBoundTypes,
    });
    this.columnPlaces.set(name, place - 1);
  }

  hasColumn(name: string): boolean {
    return this.columnPlaces.has(name);
  }

  // hot: once an entry of the file
  /** An entry of the column that was added last. */
  addEntry(rowName: string, value: number, line: number): void {
    const place = this.placeOfRow(rowName, line);
    if (place === ignoredRow) return;
    const column = this.columns.length - 1;
    const row = place === objectiveRow ? this.objective! : this.rows[place];
    if (row.lastColumn === column) {
      throw fault(
        'repeated-entry',
        line,
        `column "${this.columns[column].name}" has two entries in row "${rowName}".`,
      );
    }
    row.lastColumn = column;
    if (place === objectiveRow) {
      this.columns[column].cost = value;
    } else {
      this.entryRows.push(place);
      this.entryColumns.push(column);
      this.entryValues.push(value);
    }
  }

  setRightSide(rowName: string, value: number, line: number): void {
    const place = this.placeOfRow(rowName, line);
    if (place === ignoredRow) return;
    const row = place === objectiveRow ? this.objective! : this.rows[place];
    if (row.rightSide !== undefined) {
      throw fault('repeated-entry', line, `row "${rowName}" has two right sides.`);
    }
    if (place === objectiveRow && !Number.isFinite(value)) {
      throw fault('not-a-number', line, 'the right side of the objective must be finite.');
    }
    row.rightSide = value;
  }

  setRange(rowName: string, value: number, line: number): void {
    const place = this.placeOfRow(rowName, line);
    if (place < 0) {
      this.warnings.add('ignored-range', line, rowName);
      return;
    }
    if (this.rows[place].range !== undefined) {
      throw fault('repeated-entry', line, `row "${rowName}" has two ranges.`);
    }
    this.rows[place].range = value;
  }

  /** @param value of the bound; of no account for FR, MI, PL and BV */
  setBound(type: BoundType, columnName: string, value: number, line: number): void {
    const place = this.columnPlaces.get(columnName);
    if (place === undefined) {
      throw fault('unknown-column', line, `column "${columnName}" is not in COLUMNS.`);
    }
    const column = this.columns[place];
    if (column.boundTypes.includes(type)) {
      throw fault('repeated-bound', line, `column "${columnName}" has two ${type} bounds.`);
    }
    column.boundTypes = [...column.boundTypes, type];
    if (type === 'LI' || type === 'UI' || type === 'BV') {
      column.isInteger = true;
    }
    switch (type) {
      case 'LO':
      case 'LI':
        this.setLower(column, value);
        return;
      case 'UP':
      case 'UI':
        column.upper = orInfinite(value);
        return;
      case 'FX':
        this.setLower(column, value);
        column.upper = orInfinite(value);
        return;
      case 'FR':
        this.setLower(column, -Infinity);
        column.upper = Infinity;
        return;
      case 'MI':
        this.setLower(column, -Infinity);
        return;
      case 'PL':
        column.upper = Infinity;
        return;
      case 'BV':
        this.setLower(column, 0);
        column.upper = 1;
    }
  }

  private setLower(column: StatedColumn, value: number): void {
    column.lower = orInfinite(value);
    column.isLowerStated = true;
  }

  private placeOfRow(name: string, line: number): number {
    const place = this.rowPlaces.get(name);
    if (place === undefined) {
      throw fault('unknown-row', line, `row "${name}" is not in ROWS.`);
    }
    return place;
  }

  /**
   * The problem stated.
   * @param line last line of the text, for a warning that no line bears alone
   * @throws InvalidProblemError where bounds cross or cannot be met by any number
   */
  toLinearProgram(line: number): LinearProgram {
    const builder = new LinearProgramBuilder({ name: this.name, sense: this.sense });
    if (this.objective === undefined) {
      this.warnings.add('no-objective', line, '');
    } else {
      builder.objectiveName = this.objective.name;
      // 0 − r and not −r: no constant is 0, never −0.
      builder.objectiveConstant = 0 - (this.objective.rightSide ?? 0);
    }
    for (const row of this.rows) {
      builder.addRow({ name: row.name, ...rowBounds(row) });
    }
    for (const column of this.columns) {
      builder.addColumn({
        name: column.name,
        cost: column.cost,
        isInteger: column.isInteger,
        ...this.columnBounds(column),
      });
    }
    for (let entry = 0; entry < this.entryValues.length; entry++) {
      builder.addEntry(this.entryRows[entry], this.entryColumns[entry], this.entryValues[entry]);
    }
    return builder.build();
  }

  private columnBounds(column: StatedColumn): { lower: number; upper: number } {
    const { lower, upper } = column;
    if (column.isFromMarkers && column.boundTypes.length === 0) {
      this.warnings.add('integer-without-bounds', column.line, column.name);
      return { lower: 0, upper: 1 };
    }
    if (upper < 0 && !column.isLowerStated) {
      this.warnings.add('negative-upper-bound', column.line, column.name);
      return { lower: -Infinity, upper };
    }
    return { lower, upper };
  }
}

function rowBounds(row: StatedRow): { lower: number; upper: number } {
  const rightSide = orInfinite(row.rightSide ?? 0);
  const { range } = row;
  const width = orInfinite(Math.abs(range ?? 0));
  switch (row.type) {
    case 'L':
      return { lower: range === undefined ? -Infinity : rightSide - width, upper: rightSide };
    case 'G':
      return { lower: rightSide, upper: range === undefined ? Infinity : rightSide + width };
    default:
      // E: no range or one of 0 leaves an equation.
      return range !== undefined && range < 0
        ? { lower: rightSide - width, upper: rightSide }
        : { lower: rightSide, upper: rightSide + width };
  }
}

function orInfinite(value: number): number {
  return value >= mpsInfinity ? Infinity : value <= -mpsInfinity ? -Infinity : value;
}

function fault(code: MpsErrorCode, line: number, sentence: string): MpsSyntaxError {
  return new MpsSyntaxError(code, line, sentence);
}
