/**
 * Seeded random problems in shapes that are hard on a simplex code, each in two sizes: `small` ones (up to 12 rows
 * and 14 columns, some more where rows are planted) for the exact oracle, `large` ones of 60 to 200 rows.
 *
 * All numbers are binary fractions of few digits, units are powers of two, and right sides are laid around a point:
 * so every sum is exact, equations that follow from others do so to the last bit, and the exact oracle means the same
 * problem as everyone else. Three in four have costs of the form Aᵀ y + d with y and d of signs that the bounds allow:
 * these cannot be unbounded.
 */
import type { LinearProgram } from '../../solver-core/linear-program/linear-program';
import { LinearProgramBuilder } from '../../solver-core/linear-program/linear-program-builder';
import { SeededRandom } from '../../solver-core/numerics/seeded-random';

export const programShapes = [
  'degenerate',
  'ill-scaled',
  'redundant',
  'infeasible',
  'unbounded',
  'free',
  'fixed',
  'ranged',
] as const;

/** `infeasible` and `unbounded` only lean that way; what each problem truly is, the references say. */
export type ProgramShape = (typeof programShapes)[number];

export type ProgramSize = 'small' | 'large';

export interface ShapedProgram {
  readonly problem: LinearProgram;
  /**
   * The same problem in plain units, which has the same status and objective. Of the shape `ill-scaled`, whose rows and
   * columns have units from 2^−20 to 2^20, it is what a reference can be asked about; otherwise it is the problem.
   */
  readonly plain: LinearProgram;
}

interface Column {
  cost: number;
  lower: number;
  upper: number;
  /** Its value at the point around which rows are laid. */
  readonly at: number;
}

interface Row {
  /** Coefficient by column. */
  readonly entries: ReadonlyMap<number, number>;
  readonly lower: number;
  readonly upper: number;
}

/** The share into which a contradiction is planted. */
const shareOfContradictions: Readonly<Record<ProgramShape, number>> = {
  degenerate: 0.05,
  'ill-scaled': 0.15,
  redundant: 0.1,
  infeasible: 0.7,
  unbounded: 0,
  free: 0.1,
  fixed: 0.1,
  ranged: 0.1,
};

type Bounds = readonly [lower: number, upper: number];

export function shapedProgram(seed: number, shape: ProgramShape, size: ProgramSize): ShapedProgram {
  return new ShapedPlan(new SeededRandom(seed), shape, size).build();
}

class ShapedPlan {
  private readonly columns: Column[] = [];
  private readonly rows: Row[] = [];

  constructor(
    private readonly random: SeededRandom,
    private readonly shape: ProgramShape,
    private readonly size: ProgramSize,
  ) {}

  build(): ShapedProgram {
    const { random, shape, size } = this;
    const [columnCount, rowCount] =
      size === 'small'
        ? [random.nextInteger(1, 14), random.nextInteger(1, 12)]
        : [random.nextInteger(40, 240), random.nextInteger(60, 200)];
    for (let k = 0; k < columnCount; k++) this.addColumn();
    for (let k = 0; k < rowCount; k++) this.addRow(this.randomEntries());
    if (shape === 'redundant') this.plantRedundance();
    if (random.next() < shareOfContradictions[shape]) this.plantContradiction();
    this.setCosts();
    if (shape === 'unbounded' && random.next() < 0.7) this.plantRay();
    const state = this.inSense();
    const ones = (lines: readonly unknown[]): number[] => lines.map(() => 1);
    const plain = state(ones(this.columns), ones(this.rows));
    if (shape !== 'ill-scaled') return { problem: plain, plain };
    const reach = random.pick([4, 8, 12, 20]);
    const units = (lines: readonly unknown[]): number[] =>
      lines.map(() => 2 ** random.nextInteger(-reach, reach));
    return { problem: state(units(this.columns), units(this.rows)), plain };
  }

  private addColumn(): void {
    const { random } = this;
    const [lower, upper] = this.columnBounds();
    const least = lower > -Infinity ? lower : Math.min(upper, 0) - 5;
    const greatest = Math.min(upper, least + 9);
    const at = random.pick([
      least,
      least,
      greatest,
      random.nextInteger(Math.ceil(least), Math.floor(greatest)),
    ]);
    this.columns.push({ cost: 0, lower, upper, at });
  }

  private columnBounds(): Bounds {
    const { random, shape } = this;
    const low = random.nextInteger(-6, 4);
    const box: Bounds = [low, low + random.nextInteger(0, 12)];
    const above: Bounds = [random.pick([0, 0, low]), Infinity];
    const below: Bounds = [-Infinity, low];
    const free: Bounds = [-Infinity, Infinity];
    switch (shape) {
      case 'degenerate':
        return random.pick<Bounds>([
          [0, Infinity],
          [0, Infinity],
          [0, 1],
        ]);
      case 'free':
        return random.pick([free, free, free, above, box]);
      case 'fixed':
        return random.pick<Bounds>([[low, low], [low, low], [low, low + 1], box, above]);
      case 'ranged':
        return random.pick([box, box, box, above]);
      case 'unbounded':
        return random.pick([above, above, below, free, box]);
      default:
        return random.pick([above, above, box, below, free]);
    }
  }

  private coefficient(): number {
    const { random, shape } = this;
    if (shape === 'degenerate') return random.pick([1, 1, 1, -1, 2]);
    return random.pick([
      random.nextInteger(1, 9),
      random.pick([-1, 1]),
      random.nextInteger(1, 72) / random.pick([8, -8]),
    ]);
  }

  /** Small: any share of the columns. Large: a few, seldom many. */
  private randomEntries(): Map<number, number> {
    const { random, size } = this;
    const entries = new Map<number, number>();
    const n = this.columns.length;
    const share = size === 'small' ? random.pick([0.3, 0.5, 0.8, 1]) : random.next() < 0.03 ? 0.5 : 0;
    if (share > 0) {
      for (let column = 0; column < n; column++) {
        if (random.next() < share) entries.set(column, this.coefficient());
      }
    } else {
      const count = random.nextInteger(1, 9);
      for (let k = 0; k < count; k++) entries.set(random.nextInteger(0, n - 1), this.coefficient());
    }
    return entries;
  }

  private activity(entries: ReadonlyMap<number, number>): number {
    let sum = 0;
    entries.forEach((value, column) => (sum += value * this.columns[column].at));
    return sum;
  }

  /** A row that the point meets; in `infeasible` one in ten (large: in a hundred) is laid past it. */
  private addRow(entries: ReadonlyMap<number, number>): void {
    const { random, shape, size } = this;
    const isPast = shape === 'infeasible' && random.next() < (size === 'small' ? 0.1 : 0.01);
    const activity = this.activity(entries) + (isPast ? random.nextInteger(-20, 20) : 0);
    const room = (): number => (shape === 'degenerate' ? 0 : random.pick([0, random.nextInteger(0, 20)]));
    const equation: Bounds = [activity, activity];
    const atMost: Bounds = [-Infinity, activity + room()];
    const atLeast: Bounds = [activity - room(), Infinity];
    const range: Bounds = [activity - room(), activity + random.nextInteger(0, 9)];
    const [lower, upper] =
      shape === 'ranged'
        ? random.pick([range, range, atMost])
        : shape === 'free'
          ? random.pick([equation, equation, atMost, atLeast, range])
          : random.pick([atMost, atMost, atLeast, equation, range]);
    this.rows.push({ entries, lower, upper });
  }

  /** For one row in four another one that says the same, less, or the same in other units; sums of two rows too. */
  private plantRedundance(): void {
    const { random } = this;
    const count = Math.ceil(this.rows.length / 4);
    for (let k = 0; k < count; k++) {
      const [first, second] = [random.pick(this.rows), random.pick(this.rows)];
      const [ratio, other] = [random.pick([1, 2, -1, -0.5]), random.pick([0, 0, 1, -1])];
      const row = this.combined(
        new Map(
          second === first
            ? [[first, ratio]]
            : [
                [first, ratio],
                [second, other],
              ],
        ),
      );
      const slack = random.pick([0, 0, random.nextInteger(1, 9)]);
      // Where both ends are one, the copy is an equation that follows; a looser one says nothing.
      this.rows.push({ ...row, lower: row.lower - slack, upper: row.upper + slack });
    }
  }

  /** Σ factor × row: its entries, and the bounds that follow from theirs. */
  private combined(factors: ReadonlyMap<Row, number>): Row {
    const entries = new Map<number, number>();
    let [lower, upper] = [0, 0];
    factors.forEach((factor, row) => {
      if (factor === 0) return;
      row.entries.forEach((value, column) => {
        const sum = (entries.get(column) ?? 0) + factor * value;
        if (sum === 0) entries.delete(column);
        else entries.set(column, sum);
      });
      lower += factor * (factor > 0 ? row.lower : row.upper);
      upper += factor * (factor > 0 ? row.upper : row.lower);
    });
    return { entries, lower, upper };
  }

  /** A row that denies by a little what some others together say; where they say nothing, none. */
  private plantContradiction(): void {
    const { random } = this;
    const isAbove = random.next() < 0.5;
    const factors = new Map<Row, number>();
    const count = random.nextInteger(1, 5);
    for (let k = 0; k < count; k++) {
      const row = random.pick(this.rows);
      const sign = row.upper < Infinity === isAbove ? 1 : -1;
      factors.set(row, sign * random.pick([1, 1, 2, 0.5]));
    }
    const { entries, lower, upper } = this.combined(factors);
    const by = random.pick([0.125, 1, random.nextInteger(1, 9)]);
    if (isAbove && upper < Infinity) this.rows.push({ entries, lower: upper + by, upper: Infinity });
    if (!isAbove && lower > -Infinity) this.rows.push({ entries, lower: -Infinity, upper: lower - by });
  }

  private setCosts(): void {
    const { random, shape } = this;
    const step = (): number => (shape === 'degenerate' ? 1 : random.pick([0.25, 1, 2]));
    /** A multiplier of a sign that is allowed: above 0 at a lower bound, below 0 at an upper one. */
    const multiplier = ({ lower, upper }: { lower: number; upper: number }): number => {
      const amount = random.pick([0, random.nextInteger(0, 6)]) * step();
      const signs = [...(lower > -Infinity ? [1] : []), ...(upper < Infinity ? [-1] : [])];
      return signs.length === 0 ? 0 : amount * random.pick(signs);
    };
    if (random.next() < 0.75) {
      this.columns.forEach((column) => (column.cost = multiplier(column)));
      for (const row of this.rows) {
        const y = multiplier(row);
        row.entries.forEach((value, column) => (this.columns[column].cost += y * value));
      }
    } else {
      this.columns.forEach((column) => (column.cost = random.pick([0, random.nextInteger(-9, 9)])));
    }
  }

  /** Takes away what stands in the way of a direction, and lets the costs gain along it (minimising). */
  private plantRay(): void {
    const { random } = this;
    const direction = new Map<number, number>();
    const count = random.nextInteger(1, 4);
    for (let k = 0; k < count; k++) {
      direction.set(random.nextInteger(0, this.columns.length - 1), random.pick([1, -1, 2]));
    }
    let gain = 0;
    direction.forEach((rate, index) => {
      const column = this.columns[index];
      if (rate > 0) column.upper = Infinity;
      else column.lower = -Infinity;
      gain -= column.cost * rate;
    });
    this.rows.forEach((row, index) => {
      let rate = 0;
      row.entries.forEach((value, column) => (rate += value * (direction.get(column) ?? 0)));
      if (rate === 0) return;
      this.rows[index] = {
        ...row,
        lower: rate < 0 ? -Infinity : row.lower,
        upper: rate > 0 ? Infinity : row.upper,
      };
    });
    const [index, rate] = [...direction][0];
    if (gain <= 0) this.columns[index].cost += (gain - random.nextInteger(1, 9)) / rate;
  }

  /** To minimise, or turned into one to maximise. @returns what states the problem for units of columns and rows */
  private inSense(): (columnUnits: readonly number[], rowUnits: readonly number[]) => LinearProgram {
    const turned = this.random.pick([1, -1]);
    const constant = this.random.pick([0, 0, 12.5]);
    return (columnUnits, rowUnits) => {
      const builder = new LinearProgramBuilder({ sense: turned < 0 ? 'maximise' : 'minimise' });
      builder.objectiveConstant = constant;
      this.columns.forEach(({ cost, lower, upper }, column) => {
        const unit = columnUnits[column];
        builder.addColumn({ cost: (turned * cost) / unit, lower: lower * unit, upper: upper * unit });
      });
      this.rows.forEach(({ entries, lower, upper }, index) => {
        const unit = rowUnits[index];
        const row = builder.addRow({ lower: lower * unit, upper: upper * unit });
        entries.forEach((value, column) =>
          builder.addEntry(row, column, (value * unit) / columnUnits[column]),
        );
      });
      return builder.build();
    };
  }
}
