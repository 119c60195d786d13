/**
 * Small seeded random problems with what presolve looks for planted in them: rows and columns that are empty, single,
 * fixed, parallel, forcing, redundant or dominated, equations of two columns, slacks, free and implied free columns.
 *
 * All numbers are binary fractions of few digits, so that parallel lines are so exactly and the exact oracle means the
 * same problem. Right sides are laid around a point, so that most problems are feasible; some are shifted past it.
 */
import { LinearProgramBuilder, type LinearProgram } from '#solver-core';
import { SeededRandom } from '../../solver-core/numerics/seeded-random';

interface Column {
  cost: number;
  lower: number;
  upper: number;
  /** Its value at the point around which rows are laid. */
  readonly at: number;
}

interface Row {
  readonly entries: Map<number, number>;
  lower: number;
  upper: number;
}

export function presolveShapedProgram(seed: number): LinearProgram {
  const plan = new ProgramPlan(new SeededRandom(seed));
  plan.addBase();
  plan.addPlants();
  return plan.build();
}

class ProgramPlan {
  private readonly columns: Column[] = [];
  private readonly rows: Row[] = [];
  private readonly senseFactor: 1 | -1;

  constructor(private readonly random: SeededRandom) {
    this.senseFactor = random.pick([1, 1, -1]);
  }

  /** A few ordinary rows and columns; costs lean toward bounded problems. */
  addBase(): void {
    const { random } = this;
    const columnCount = random.nextInteger(2, 10);
    for (let k = 0; k < columnCount; k++) this.addOrdinaryColumn();
    const rowCount = random.nextInteger(1, 8);
    for (let k = 0; k < rowCount; k++) {
      const entries = new Map<number, number>();
      this.columns.forEach((_, column) => {
        if (random.next() < 0.6) entries.set(column, this.coefficient());
      });
      this.addRowAround(entries);
    }
  }

  addPlants(): void {
    const plants: readonly (() => void)[] = [
      () => this.addRowAround(new Map()),
      () => this.addOrdinaryColumn(),
      () => this.plantFixedColumn(),
      () => this.addRowAround(new Map([[this.anyColumn(), this.coefficient()]])),
      () => this.plantEquationOfTwo(),
      () => this.plantParallelRow(),
      () => this.plantParallelColumn(),
      () => this.plantForcingRow(),
      () => this.plantRedundantRow(),
      () => this.plantSlack(),
      () => this.plantFreeSingleton(),
      () => this.plantDefinedColumn(),
      () => this.plantSatisfyingColumn(),
      () => this.plantBuyOrSell(),
    ];
    const count = this.random.nextInteger(2, 9);
    for (let k = 0; k < count; k++) this.random.pick(plants)();
    if (this.random.next() < 0.12) this.spoilRow();
  }

  build(): LinearProgram {
    const { random, senseFactor } = this;
    const builder = new LinearProgramBuilder({ sense: senseFactor < 0 ? 'maximise' : 'minimise' });
    builder.objectiveConstant = random.pick([0, 2.5, -40]);
    this.columns.forEach(({ cost, lower, upper }) => {
      // Nearly always the cost speaks against what has no end: else most problems would be unbounded.
      const hasNoEnd = cost > 0 ? lower === -Infinity : upper === Infinity && cost < 0;
      const isTurned = hasNoEnd && random.next() < 0.97;
      const kept = isTurned && lower === -Infinity && upper === Infinity ? 0 : isTurned ? -cost : cost;
      builder.addColumn({ cost: senseFactor * kept, lower, upper });
    });
    this.rows.forEach(({ entries, lower, upper }) => {
      const row = builder.addRow({ lower, upper });
      entries.forEach((value, column) => builder.addEntry(row, column, value));
    });
    return builder.build();
  }

  private coefficient(): number {
    return this.random.pick([1, 1, 1, -1, 2, -2, 0.5, 3, -1.5, 4]);
  }

  private anyColumn(): number {
    return this.random.nextInteger(0, this.columns.length - 1);
  }

  private addColumn(cost: number, lower: number, upper: number): number {
    const { random } = this;
    const low = Math.max(lower, -4);
    const at = Math.min(upper, low + random.pick([0, 0, random.nextInteger(0, 5)]));
    return this.columns.push({ cost, lower, upper, at: Math.max(at, Math.min(lower, upper)) }) - 1;
  }

  private addOrdinaryColumn(): void {
    const { random } = this;
    const low = random.nextInteger(-3, 3);
    const [lower, upper] = random.pick([
      [0, Infinity],
      [0, Infinity],
      [low, low + random.nextInteger(1, 9)],
      [low, low + random.nextInteger(1, 9)],
      [-Infinity, low],
      [-Infinity, Infinity],
    ]);
    const cost = random.pick([
      0,
      random.nextInteger(1, 9),
      random.nextInteger(1, 9),
      random.nextInteger(-6, 3),
    ]);
    this.addColumn(cost, lower, upper);
  }

  private activity(entries: ReadonlyMap<number, number>): number {
    let sum = 0;
    entries.forEach((value, column) => (sum += value * this.columns[column].at));
    return sum;
  }

  private addRowAround(entries: Map<number, number>): void {
    const { random } = this;
    const activity = this.activity(entries);
    const below = activity - random.pick([0, 0, random.nextInteger(1, 8)]);
    const above = activity + random.pick([0, 0, random.nextInteger(1, 8)]);
    const [lower, upper] = random.pick([
      [below, Infinity],
      [-Infinity, above],
      [activity, activity],
      [below, above],
      [-Infinity, Infinity],
    ]);
    this.rows.push({ entries, lower, upper });
  }

  private plantFixedColumn(): void {
    const at = this.random.nextInteger(-2, 6);
    const column = this.addColumn(this.random.nextInteger(-5, 5), at, at);
    this.putIntoSomeRows(column);
  }

  /** Into rows there are, whose bounds move with what the column has at the point. */
  private putIntoSomeRows(column: number): void {
    for (const row of this.rows) {
      if (this.random.next() < 0.5) this.putInto(row, column, this.coefficient());
    }
  }

  private putInto(row: Row, column: number, value: number): void {
    row.entries.set(column, value);
    row.lower += value * this.columns[column].at;
    row.upper += value * this.columns[column].at;
  }

  private plantEquationOfTwo(): void {
    const entries = new Map([
      [this.anyColumn(), this.coefficient()],
      [this.anyColumn(), this.coefficient()],
    ]);
    const activity = this.activity(entries);
    this.rows.push({ entries, lower: activity, upper: activity });
  }

  private plantParallelRow(): void {
    const { random } = this;
    const other = random.pick(this.rows);
    const ratio = random.pick([1, 2, -1, -0.5]);
    const entries = new Map([...other.entries].map(([column, value]) => [column, ratio * value]));
    this.addRowAround(entries);
  }

  private plantParallelColumn(): void {
    const { random } = this;
    const other = this.anyColumn();
    const ratio = random.pick([1, 2, -1, -0.5]);
    const low = random.nextInteger(-2, 3);
    const [lower, upper] = random.pick([
      [0, Infinity],
      [low, low + random.nextInteger(0, 6)],
      [-Infinity, low],
    ]);
    const cost = ratio * this.columns[other].cost + random.pick([0, 0, 1, -0.5]);
    const column = this.addColumn(cost, lower, upper);
    for (const row of this.rows) {
      const value = row.entries.get(other);
      if (value !== undefined) this.putInto(row, column, ratio * value);
    }
  }

  private boxedColumns(): number[] {
    return this.columns.flatMap(({ lower, upper }, column) =>
      Number.isFinite(lower) && Number.isFinite(upper) ? [column] : [],
    );
  }

  /** A row that can only just be met: all its columns at the bounds that help. */
  private plantForcingRow(): void {
    const chosen = this.boxedColumns().slice(0, 3);
    if (chosen.length < 2 || this.random.next() < 0.4) return;
    const entries = new Map(chosen.map((column) => [column, this.coefficient()]));
    let greatest = 0;
    entries.forEach((value, column) => {
      const { lower, upper } = this.columns[column];
      greatest += Math.max(value * lower, value * upper);
    });
    const isAtLeast = this.random.next() < 0.5;
    if (isAtLeast) this.rows.push({ entries, lower: greatest, upper: Infinity });
    else {
      const turned = new Map([...entries].map(([column, value]) => [column, -value]));
      this.rows.push({ entries: turned, lower: -Infinity, upper: -greatest });
    }
  }

  private plantRedundantRow(): void {
    const chosen = this.boxedColumns().slice(-3);
    const entries = new Map(chosen.map((column) => [column, this.coefficient()]));
    let greatest = this.random.nextInteger(0, 2);
    entries.forEach((value, column) => {
      const { lower, upper } = this.columns[column];
      greatest += Math.max(value * lower, value * upper);
    });
    this.rows.push({ entries, lower: -Infinity, upper: greatest });
  }

  private plantSlack(): void {
    const { random } = this;
    const row = random.pick(this.rows);
    const upper = random.pick([Infinity, random.nextInteger(1, 7)]);
    this.putInto(
      row,
      this.addColumn(random.pick([0, 0, 2, -1]), random.pick([0, -2]), upper),
      this.coefficient(),
    );
  }

  private plantFreeSingleton(): void {
    const { random } = this;
    const lower = random.pick([-Infinity, -Infinity, -1000]);
    this.putInto(
      random.pick(this.rows),
      this.addColumn(random.pick([0, 2, -1]), lower, Infinity),
      this.coefficient(),
    );
  }

  /** total = a sum of others, and total is used in another row: as sheets have it. */
  private plantDefinedColumn(): void {
    const { random } = this;
    const total = this.addColumn(random.pick([0, 1, 3]), random.pick([-Infinity, 0]), Infinity);
    const entries = new Map([[total, -1]]);
    for (let k = 0; k < 3; k++) {
      const part = this.anyColumn();
      if (part !== total) entries.set(part, random.pick([1, 2]));
    }
    const activity = this.activity(entries);
    this.rows.push({ entries, lower: activity, upper: activity });
    this.addRowAround(
      new Map([
        [total, 1],
        [this.anyColumn(), this.coefficient()],
      ]),
    );
  }

  /** A costless column that only helps its rows, without end. */
  private plantSatisfyingColumn(): void {
    const direction = this.random.pick([1, -1]);
    const column = this.addColumn(0, direction > 0 ? this.random.pick([0, -Infinity]) : -Infinity, Infinity);
    const oneSided = this.rows.filter(({ lower, upper }) => (lower === -Infinity) !== (upper === Infinity));
    for (const row of oneSided.slice(0, 2)) {
      this.putInto(row, column, row.upper === Infinity ? direction : -direction);
    }
  }

  /** A row of which one more can be bought, or one sold, at a price: bounds on its dual value. */
  private plantBuyOrSell(): void {
    const { random } = this;
    const price = random.nextInteger(1, 4);
    const made = this.addColumn(random.nextInteger(0, 9), 0, random.pick([5, Infinity]));
    const other = this.addColumn(random.nextInteger(0, 9), 0, Infinity);
    const entries = new Map([
      [made, random.pick([1, 2])],
      [other, 1],
    ]);
    const activity = this.activity(entries) + random.nextInteger(1, 9);
    const bought = this.addColumn(price, 0, Infinity);
    entries.set(bought, 1);
    this.rows.push({ entries, lower: activity, upper: Infinity });
    this.rows.push({
      entries: new Map([
        [made, 1],
        [other, random.pick([1, 3])],
      ]),
      lower: -Infinity,
      upper: 40,
    });
  }

  /** Moves a row past the point. */
  private spoilRow(): void {
    const row = this.random.pick(this.rows);
    if (row.upper < Infinity) row.upper -= this.random.nextInteger(3, 60);
    if (row.upper < row.lower) row.lower = row.upper;
  }
}
