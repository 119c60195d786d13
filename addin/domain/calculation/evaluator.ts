/**
 * Works out formula cells: one evaluator for plain numbers and for affine forms, by the number domain it is given.
 *
 * From cell to cell there are no calls. A formula that meets a cell not yet worked out is put aside, that cell is
 * worked out, and the formula starts again. Given the cells in the order of a DependencyGraph, that hardly ever
 * happens.
 */
import type { CellAddress } from '../sheet/cell-address';
import { CellError } from '../sheet/cell-value';
import type { FormulaNode } from '../formula/formula-syntax';
import {
  ArrayPart,
  InputCell,
  type CalculationGrid,
  type FormulaCell,
  type GridEntry,
  type GridNode,
} from './calculation-grid';
import { isConstantEntry } from './dependency-graph';
import { Matrix, Reference, type Area, type Scalar } from './evaluated-value';
import { DependentValueRefusal, ErrorValueSignal, EvaluationRefusal } from './evaluation-refusal';
import type { NumberDomain } from './number-domain';
import { TreeEvaluator } from './tree-evaluator';

/** What became of a formula cell. */
export type CellOutcome =
  | { readonly kind: 'value'; readonly value: Scalar | Matrix }
  /** Its own formula cannot be worked out. */
  | { readonly kind: 'refused'; readonly refusal: EvaluationRefusal }
  /** It builds on a cell that cannot be worked out. */
  | { readonly kind: 'blocked' };

export interface EvaluatorSettings {
  readonly domain: NumberDomain;
  /** Values of the inputs, by their index. */
  readonly inputs: readonly Scalar[];
  /** Date and time of TODAY and NOW, as a serial date of the workbook. */
  readonly now: number;
  /** Whether the value stored beside a formula does not do. */
  readonly needsEvaluation: (cell: FormulaCell) => boolean;
  /** Looks at each cell's value as soon as it is worked out, and may put another of the same worth in its place. */
  readonly settle?: (cell: FormulaCell, value: Scalar | Matrix) => Scalar | Matrix;
}

const blockedOutcome: CellOutcome = { kind: 'blocked' };

/** A formula has met a cell that is not yet worked out. */
class CellNeeded extends Error {}
/** A formula has met a cell that cannot be worked out. */
class CellBlocked extends Error {}
const cellNeeded = new CellNeeded();
const cellBlocked = new CellBlocked();

export class Evaluator {
  private readonly tree: TreeEvaluator;
  private readonly outcomes: (CellOutcome | undefined)[] = [];
  private readonly isUnderWay: boolean[] = [];
  private needed: FormulaCell | undefined;

  constructor(
    grid: CalculationGrid,
    private readonly settings: EvaluatorSettings,
  ) {
    this.tree = new TreeEvaluator(grid, settings.domain, settings.now, (node) => this.valueOfNode(node));
  }

  /** The cell whose formula is being worked out. */
  get currentCell(): CellAddress {
    return this.tree.currentCell;
  }

  /** Works out a cell, whether or not its stored value would do. */
  outcomeOf(cell: FormulaCell): CellOutcome {
    return this.outcomes[cell.id] ?? this.workOut(cell);
  }

  /** What an entry of the grid is worth: an array formula's first cell gives its first value. */
  entryOutcome(entry: GridEntry | undefined): CellOutcome {
    if (entry === undefined) {
      return { kind: 'value', value: null };
    }
    if (isConstantEntry(entry)) {
      return { kind: 'value', value: entry };
    }
    if (entry instanceof InputCell) {
      return { kind: 'value', value: this.settings.inputs[entry.index] };
    }
    const cell = entry instanceof ArrayPart ? entry.anchor : entry;
    if (!this.settings.needsEvaluation(cell)) {
      const stored = entry instanceof ArrayPart ? entry.stored : cell.cell.value;
      if (stored !== undefined) {
        return { kind: 'value', value: stored };
      }
    }
    const outcome = this.outcomeOf(cell);
    return outcome.kind === 'value' ? { kind: 'value', value: partOf(entry, cell, outcome.value) } : outcome;
  }

  /**
   * The cells that a reference within a cell's formula stands for, worked out with this evaluator's values; undefined
   * where it stands for none or cannot be told.
   */
  resolveReference(cell: FormulaCell, node: FormulaNode): readonly Area[] | undefined {
    for (;;) {
      try {
        const value = this.tree.partOf(cell, node);
        return value instanceof Reference ? value.areas : value instanceof CellError ? undefined : [];
      } catch (error) {
        if (error === cellNeeded) {
          this.workOut(this.needed!);
          continue;
        }
        if (isRefusal(error) || error instanceof ErrorValueSignal || error instanceof RangeError) {
          return undefined;
        }
        throw error;
      }
    }
  }

  // From cell to cell.

  private workOut(wanted: FormulaCell): CellOutcome {
    // In the graph's order, this is all there is to it.
    const direct = this.tryFormula(wanted);
    if (direct !== undefined) {
      this.outcomes[wanted.id] = direct;
      return direct;
    }
    const pending = [wanted];
    while (pending.length > 0) {
      const cell = pending[pending.length - 1];
      if (this.outcomes[cell.id] !== undefined) {
        pending.pop();
        continue;
      }
      this.isUnderWay[cell.id] = true;
      const outcome = this.tryFormula(cell);
      if (outcome !== undefined) {
        this.finish(cell, outcome);
        pending.pop();
        continue;
      }
      const needed = this.needed!;
      if (this.isUnderWay[needed.id]) {
        // The formulas from the needed cell up to this one wait for each other.
        const circle = pending.slice(pending.indexOf(needed));
        const refusal = new EvaluationRefusal({ code: 'circular-reference', cells: circle });
        circle.forEach((member) => this.finish(member, { kind: 'refused', refusal }));
        continue;
      }
      pending.push(needed);
    }
    return this.outcomes[wanted.id]!;
  }

  private finish(cell: FormulaCell, outcome: CellOutcome): void {
    this.outcomes[cell.id] = outcome;
    this.isUnderWay[cell.id] = false;
  }

  /** undefined: another cell is needed first. */
  private tryFormula(cell: FormulaCell): CellOutcome | undefined {
    const { formula } = cell;
    if (formula.kind === 'syntax-issue') {
      const reason =
        formula.code === 'too-deep'
          ? { code: formula.code }
          : { code: formula.code, position: formula.position };
      return { kind: 'refused', refusal: new EvaluationRefusal(reason) };
    }
    try {
      const value = this.tree.resultOf(cell, formula.tree);
      return { kind: 'value', value: this.settings.settle?.(cell, value) ?? value };
    } catch (error) {
      if (error === cellNeeded) {
        return undefined;
      }
      if (error === cellBlocked) {
        return blockedOutcome;
      }
      if (error instanceof ErrorValueSignal) {
        return { kind: 'value', value: error.value };
      }
      if (error instanceof EvaluationRefusal) {
        return { kind: 'refused', refusal: error };
      }
      if (error instanceof DependentValueRefusal) {
        const operation = error.operation ?? 'function';
        return {
          kind: 'refused',
          refusal: new EvaluationRefusal({ code: 'not-affine', operation, by: '' }),
        };
      }
      // A lambda that calls itself without end runs out of stack.
      if (error instanceof RangeError) {
        return { kind: 'refused', refusal: new EvaluationRefusal({ code: 'too-deep' }) };
      }
      throw error;
    }
  }

  /** @throws cellNeeded, cellBlocked */
  private valueOfNode(node: GridNode): Scalar {
    if (node instanceof InputCell) {
      return this.settings.inputs[node.index];
    }
    const cell = node instanceof ArrayPart ? node.anchor : node;
    const outcome = this.outcomes[cell.id];
    if (outcome === undefined) {
      if (!this.settings.needsEvaluation(cell)) {
        const stored = node instanceof ArrayPart ? node.stored : cell.cell.value;
        if (stored !== undefined) {
          return stored;
        }
      }
      this.needed = cell;
      throw cellNeeded;
    }
    if (outcome.kind !== 'value') {
      throw cellBlocked;
    }
    return outcome.value instanceof Matrix ? partOf(node, cell, outcome.value) : outcome.value;
  }
}

function isRefusal(error: unknown): boolean {
  return (
    error instanceof EvaluationRefusal || error instanceof DependentValueRefusal || error === cellBlocked
  );
}

/** The value that falls to one cell of an array formula. */
function partOf(entry: GridNode, anchor: FormulaCell, value: Scalar | Matrix): Scalar {
  if (!(value instanceof Matrix)) {
    return value;
  }
  return value.at(entry.row - anchor.row, entry.column - anchor.column) ?? 0;
}
