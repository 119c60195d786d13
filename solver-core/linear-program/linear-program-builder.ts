/**
 * The mutable builder of a problem: columns, rows and entries in any order, frozen by `build` into a LinearProgram.
 */
import { InvalidProblemError } from '../control/solver-errors';
import { TripletBuilder } from '../sparse/triplet-builder';
import type { LinearProgram, Sense } from './linear-program';
import { validateLinearProgram } from './validate-linear-program';

export interface ColumnStatement {
  /** Unique among the columns; made up by `build` where it is left out. */
  readonly name?: string;
  /** Objective coefficient as stated. Default 0. */
  readonly cost?: number;
  /** Default 0; −Infinity for none. */
  readonly lower?: number;
  /** Default Infinity: none. */
  readonly upper?: number;
  /** Must the column take a whole number? Default false. */
  readonly isInteger?: boolean;
}

export interface RowStatement {
  /** Unique among the rows; made up by `build` where it is left out. */
  readonly name?: string;
  /** −Infinity for none. */
  readonly lower: number;
  /** Infinity for none. */
  readonly upper: number;
}

export class LinearProgramBuilder {
  /** Added to the objective, as stated. */
  objectiveConstant = 0;
  objectiveName = 'objective';

  private readonly name: string;
  private readonly sense: Sense;
  private readonly columns: ColumnStatement[] = [];
  private readonly rows: RowStatement[] = [];
  private readonly entries = new TripletBuilder();

  constructor(statement: { readonly name?: string; readonly sense: Sense }) {
    this.name = statement.name ?? '';
    this.sense = statement.sense;
  }

  get columnCount(): number {
    return this.columns.length;
  }

  get rowCount(): number {
    return this.rows.length;
  }

  /** @returns the new column's index */
  addColumn(column: ColumnStatement = {}): number {
    return this.columns.push(column) - 1;
  }

  /** @returns the new row's index */
  addRow(row: RowStatement): number {
    return this.rows.push(row) - 1;
  }

  /** Adds a coefficient; one that stands at the same place already is added to, and a sum of exactly 0 dropped. */
  addEntry(row: number, column: number, value: number): void {
    this.entries.add(row, column, value);
  }

  /**
   * The problem stated so far. The builder may go on afterwards; what it gave out does not change.
   * @throws InvalidProblemError when the problem cannot be solved as stated (validate-linear-program.ts)
   * @throws BrokenInvariantError when an entry names a row or column that was never added
   */
  build(): LinearProgram {
    const { columns, rows } = this;
    const problem: LinearProgram = {
      name: this.name,
      sense: this.sense,
      rowCount: rows.length,
      columnCount: columns.length,
      matrix: this.entries.build(rows.length, columns.length),
      cost: Float64Array.from(columns, (column) => column.cost ?? 0),
      objectiveConstant: this.objectiveConstant,
      rowLower: Float64Array.from(rows, (row) => row.lower),
      rowUpper: Float64Array.from(rows, (row) => row.upper),
      columnLower: Float64Array.from(columns, (column) => column.lower ?? 0),
      columnUpper: Float64Array.from(columns, (column) => column.upper ?? Infinity),
      isInteger: Uint8Array.from(columns, (column) => (column.isInteger ? 1 : 0)),
      rowNames: completeNames(rows, 'row'),
      columnNames: completeNames(columns, 'column'),
      objectiveName: this.objectiveName,
    };
    validateLinearProgram(problem);
    return problem;
  }
}

/** The names given, and for the unnamed `row1`, `row2` … by position, lengthened until no one else has it. */
function completeNames(
  statements: readonly { readonly name?: string }[],
  kind: 'row' | 'column',
): readonly string[] {
  const taken = new Set<string>();
  for (const { name } of statements) {
    if (name === undefined) {
      continue;
    }
    if (taken.has(name)) {
      throw new InvalidProblemError('duplicate-name', `Two ${kind}s are named "${name}".`);
    }
    taken.add(name);
  }
  return statements.map(({ name }, index) => {
    if (name !== undefined) {
      return name;
    }
    let made = `${kind}${index + 1}`;
    while (taken.has(made)) {
      made += '_';
    }
    taken.add(made);
    return made;
  });
}
