/**
 * An exact oracle: the textbook tableau simplex in whole numbers without end, Bland's rule, two phases. Slow, small,
 * and with no code, no arithmetic and no form of the problem in common with the solver core. Doubles are taken as
 * the exact binary fractions that they are, so status and objective are those of the very problem stated.
 *
 * Form: every column is shifted, mirrored or split into columns that are ≥ 0; a box becomes a row; every row gets a
 * slack and, where the slack cannot start in the basis, an artificial. The tableau holds whole numbers over one
 * common denominator, the last pivot; every division in a pivot step comes out even.
 * Source: Bland (1977), "New finite pivoting rules for the simplex method"; Edmonds (1967), "Systems of distinct
 * representatives and linear algebra", for the pivot steps in whole numbers.
 */
import type { LinearProgram } from '../../solver-core/linear-program/linear-program';

export type ExactAnswer =
  | { readonly status: 'infeasible' | 'unbounded' }
  | {
      readonly status: 'optimal';
      /** Rounded once from the exact value. */
      readonly objective: number;
      readonly exactObjective: Fraction;
    };

/** numerator / denominator, denominator > 0. */
export interface Fraction {
  readonly numerator: bigint;
  readonly denominator: bigint;
}

/** The answer to the problem without whole-number demands. */
export function solveExactly(problem: LinearProgram): ExactAnswer {
  const form = toStandardForm(problem);
  const tableau = new Tableau(form);
  if (!tableau.reachFeasibility()) {
    return { status: 'infeasible' };
  }
  if (!tableau.optimise()) {
    return { status: 'unbounded' };
  }
  const exactObjective = addFractions(form.constant, tableau.objective(form.costScale));
  const stated = problem.sense === 'minimise' ? exactObjective : negated(exactObjective);
  return { status: 'optimal', objective: toNumber(stated), exactObjective: stated };
}

/** Minimise costs · z / costScale + constant, rows · z (≤, =) right sides, z ≥ 0, all whole numbers. */
interface StandardForm {
  readonly rows: readonly {
    readonly coefficients: readonly bigint[];
    readonly isEquation: boolean;
    readonly rightSide: bigint;
  }[];
  readonly costs: readonly bigint[];
  readonly costScale: bigint;
  readonly constant: Fraction;
}

/** One z ≥ 0 of the standard form: `sign` times it, plus a shift of its column, is part of the column's value. */
interface Part {
  readonly column: number;
  readonly sign: 1n | -1n;
}

function toStandardForm(problem: LinearProgram): StandardForm {
  const parts: Part[] = [];
  const shifts: Fraction[] = [];
  const boxes: { part: number; width: Fraction }[] = [];
  for (let column = 0; column < problem.columnCount; column++) {
    const lower = problem.columnLower[column];
    const upper = problem.columnUpper[column];
    if (lower > -Infinity) {
      shifts.push(fromNumber(lower));
      if (upper < Infinity) {
        boxes.push({ part: parts.length, width: subtractFractions(fromNumber(upper), fromNumber(lower)) });
      }
      parts.push({ column, sign: 1n });
    } else if (upper < Infinity) {
      shifts.push(fromNumber(upper));
      parts.push({ column, sign: -1n });
    } else {
      shifts.push(zero);
      parts.push({ column, sign: 1n }, { column, sign: -1n });
    }
  }

  const rows: { coefficients: bigint[]; isEquation: boolean; rightSide: bigint }[] = [];
  const addRow = (coefficients: readonly Fraction[], isEquation: boolean, rightSide: Fraction): void => {
    const scale = leastCommonDenominator([...coefficients, rightSide]);
    rows.push({
      coefficients: coefficients.map((fraction) => scaled(fraction, scale)),
      isEquation,
      rightSide: scaled(rightSide, scale),
    });
  };
  const dense = Array.from({ length: problem.rowCount }, () =>
    new Array<Fraction>(problem.columnCount).fill(zero),
  );
  const { columnStart, rowIndex, value } = problem.matrix;
  for (let column = 0; column < problem.columnCount; column++) {
    for (let entry = columnStart[column]; entry < columnStart[column + 1]; entry++) {
      dense[rowIndex[entry]][column] = fromNumber(value[entry]);
    }
  }
  dense.forEach((row, index) => {
    const shift = row.reduce(
      (sum, a, column) => addFractions(sum, multiplyFractions(a, shifts[column])),
      zero,
    );
    const coefficients = parts.map(({ column, sign }) => times(row[column], sign));
    const lower = problem.rowLower[index];
    const upper = problem.rowUpper[index];
    if (lower === upper) {
      addRow(coefficients, true, subtractFractions(fromNumber(upper), shift));
      return;
    }
    if (upper < Infinity) addRow(coefficients, false, subtractFractions(fromNumber(upper), shift));
    if (lower > -Infinity) {
      addRow(coefficients.map(negated), false, subtractFractions(shift, fromNumber(lower)));
    }
  });
  for (const { part, width } of boxes) {
    addRow(
      parts.map((_, other) => (other === part ? one : zero)),
      false,
      width,
    );
  }

  const sense = problem.sense === 'minimise' ? 1n : -1n;
  const statedCosts = Array.from(problem.cost, (cost) => times(fromNumber(cost), sense));
  const costScale = leastCommonDenominator(statedCosts);
  return {
    rows,
    costs: parts.map(({ column, sign }) => scaled(statedCosts[column], costScale) * sign),
    costScale,
    constant: statedCosts.reduce(
      (sum, cost, column) => addFractions(sum, multiplyFractions(cost, shifts[column])),
      times(fromNumber(problem.objectiveConstant), sense),
    ),
  };
}

/**
 * Rows of B⁻¹[A | slacks | artificials | b] times the common denominator, below them the reduced costs of both
 * phases. A basic column has the denominator in its row and 0 elsewhere.
 */
class Tableau {
  private readonly rows: bigint[][] = [];
  private readonly basic: number[] = [];
  private costRow: bigint[];
  private phaseOneRow: bigint[];
  private denominator = 1n;
  private readonly firstArtificial: number;
  private readonly width: number;

  constructor(form: StandardForm) {
    const partCount = form.costs.length;
    const slackCount = form.rows.filter((row) => !row.isEquation).length;
    const needsArtificial = form.rows.map((row) => row.isEquation || row.rightSide < 0n);
    this.firstArtificial = partCount + slackCount;
    this.width = this.firstArtificial + needsArtificial.filter(Boolean).length;
    let slack = partCount;
    let artificial = this.firstArtificial;
    form.rows.forEach((row, index) => {
      const sign = row.rightSide < 0n ? -1n : 1n;
      const line = new Array<bigint>(this.width + 1).fill(0n);
      row.coefficients.forEach((coefficient, part) => (line[part] = sign * coefficient));
      line[this.width] = sign * row.rightSide;
      if (!row.isEquation) line[slack] = sign;
      if (needsArtificial[index]) {
        line[artificial] = 1n;
        this.basic.push(artificial++);
      } else {
        this.basic.push(slack);
      }
      if (!row.isEquation) slack++;
      this.rows.push(line);
    });
    this.costRow = [...form.costs, ...new Array<bigint>(this.width + 1 - partCount).fill(0n)];
    // Phase one minimises the sum of the artificials: its reduced costs are minus the sum of their rows.
    this.phaseOneRow = new Array<bigint>(this.width + 1).fill(0n);
    this.rows.forEach((line, index) => {
      if (needsArtificial[index]) {
        line.forEach((entry, column) => {
          if (column < this.firstArtificial || column === this.width) this.phaseOneRow[column] -= entry;
        });
      }
    });
  }

  /** Phase one. @returns whether there is a feasible point */
  reachFeasibility(): boolean {
    if (!this.descend(() => this.phaseOneRow)) {
      throw new Error('phase one cannot be unbounded');
    }
    if (this.phaseOneRow[this.width] !== 0n) {
      return false;
    }
    // An artificial still basic stands at 0: out with it, or its row says nothing.
    for (let row = this.rows.length - 1; row >= 0; row--) {
      if (this.basic[row] < this.firstArtificial) continue;
      const column = this.rows[row].findIndex((entry, place) => place < this.firstArtificial && entry !== 0n);
      if (column >= 0) {
        this.pivot(row, column);
      } else {
        this.rows.splice(row, 1);
        this.basic.splice(row, 1);
      }
    }
    return true;
  }

  /** Phase two. @returns whether there is an optimum */
  optimise(): boolean {
    return this.descend(() => this.costRow);
  }

  /** Σ cost of the basic solution / costScale. */
  objective(costScale: bigint): Fraction {
    return reduced(-this.costRow[this.width], this.denominator * costScale);
  }

  /** Pivots by Bland's rule until no reduced cost is negative. @returns false when unbounded */
  private descend(reducedCosts: () => readonly bigint[]): boolean {
    for (;;) {
      const costs = reducedCosts();
      let entering = 0;
      while (entering < this.firstArtificial && costs[entering] >= 0n) entering++;
      if (entering === this.firstArtificial) {
        return true;
      }
      const leaving = this.leavingRow(entering);
      if (leaving === undefined) {
        return false;
      }
      this.pivot(leaving, entering);
    }
  }

  /** The row of the least ratio, of equal ones that of the first basic column. */
  private leavingRow(entering: number): number | undefined {
    let best: number | undefined;
    this.rows.forEach((line, row) => {
      if (line[entering] <= 0n) return;
      if (best === undefined) {
        best = row;
        return;
      }
      const difference =
        line[this.width] * this.rows[best][entering] - this.rows[best][this.width] * line[entering];
      if (difference < 0n || (difference === 0n && this.basic[row] < this.basic[best])) best = row;
    });
    return best;
  }

  private pivot(pivotRow: number, pivotColumn: number): void {
    const pivotLine = this.rows[pivotRow];
    let pivot = pivotLine[pivotColumn];
    if (pivot < 0n) {
      // Keeps the common denominator positive; only an artificial at 0 leaves on such a pivot.
      pivotLine.forEach((entry, column) => (pivotLine[column] = -entry));
      pivot = -pivot;
    }
    const eliminate = (line: readonly bigint[]): bigint[] =>
      line.map((entry, column) => (entry * pivot - line[pivotColumn] * pivotLine[column]) / this.denominator);
    this.rows.forEach((line, row) => {
      if (row !== pivotRow) this.rows[row] = eliminate(line);
    });
    this.costRow = eliminate(this.costRow);
    this.phaseOneRow = eliminate(this.phaseOneRow);
    this.denominator = pivot;
    this.basic[pivotRow] = pivotColumn;
  }
}

const zero: Fraction = { numerator: 0n, denominator: 1n };
const one: Fraction = { numerator: 1n, denominator: 1n };

/** The binary fraction that a finite double is. */
export function fromNumber(value: number): Fraction {
  let denominator = 1n;
  let whole = value;
  // Doubling is exact, and ends: a double has at most 1074 binary places.
  while (!Number.isInteger(whole)) {
    whole *= 2;
    denominator *= 2n;
  }
  return { numerator: BigInt(whole), denominator };
}

/** The double nearest to a fraction, to within one unit in the last place. */
export function toNumber({ numerator, denominator }: Fraction): number {
  const sign = numerator < 0n ? -1 : 1;
  const magnitude = numerator < 0n ? -numerator : numerator;
  // 64 significant bits are taken by a shift, then rounded by Number.
  const shift = denominator.toString(2).length - magnitude.toString(2).length + 64;
  const quotient =
    shift >= 0 ? (magnitude << BigInt(shift)) / denominator : magnitude / (denominator << BigInt(-shift));
  return sign * Number(quotient) * 2 ** -shift;
}

function reduced(numerator: bigint, denominator: bigint): Fraction {
  const divisor = greatestCommonDivisor(numerator < 0n ? -numerator : numerator, denominator);
  return { numerator: numerator / divisor, denominator: denominator / divisor };
}

function addFractions(a: Fraction, b: Fraction): Fraction {
  return reduced(a.numerator * b.denominator + b.numerator * a.denominator, a.denominator * b.denominator);
}

function subtractFractions(a: Fraction, b: Fraction): Fraction {
  return addFractions(a, negated(b));
}

function multiplyFractions(a: Fraction, b: Fraction): Fraction {
  return reduced(a.numerator * b.numerator, a.denominator * b.denominator);
}

function negated(a: Fraction): Fraction {
  return { numerator: -a.numerator, denominator: a.denominator };
}

function times(a: Fraction, sign: 1n | -1n): Fraction {
  return sign === 1n ? a : negated(a);
}

function scaled(a: Fraction, scale: bigint): bigint {
  return (a.numerator * scale) / a.denominator;
}

function leastCommonDenominator(fractions: readonly Fraction[]): bigint {
  return fractions.reduce(
    (common, { denominator }) => (common / greatestCommonDivisor(common, denominator)) * denominator,
    1n,
  );
}

function greatestCommonDivisor(a: bigint, b: bigint): bigint {
  while (b !== 0n) [a, b] = [b, a % b];
  return a === 0n ? 1n : a;
}
