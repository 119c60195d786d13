/**
 * Labels of decision cells and constraint rows: named by the planner, or found beside the cells.
 *
 * A label found is the nearest text to the left in the row or above in the column; both are joined as `row · column`
 * where one alone does not tell the cells apart. Labels that are equal all the same get their cell appended.
 */
import { cellKey, formatCellAddress, type CellAddress } from '../sheet/cell-address';
import { cellCountOf, cellsOf, type CellRange } from '../sheet/cell-range';
import { findSheet, type SheetSnapshot, type WorkbookSnapshot } from '../sheet/sheet-snapshot';
import { isBlankText, readRelation, saysFree } from './statement-words';

/** One part of the plan that needs a label. */
export interface LabelSubject {
  /** Where the search starts: a decision cell, or the first cell of a constraint row. */
  readonly cell: CellAddress;
  /** The cell to append where labels are equal. */
  readonly ownCell: CellAddress;
  /** The cell that the planner named as its label, if any. */
  readonly labelCell: CellAddress | undefined;
}

/** The subjects of one block; their labels are told apart in the same way. */
export interface LabelGroup {
  readonly subjects: readonly LabelSubject[];
  /** Whether the subjects follow each other along a row: their own texts then stand above them. */
  readonly isLying: boolean;
}

/** A merged range larger than this is a band across the sheet and no label. */
const largestMergedLabel = 5_000;

export class LabelFinder {
  private readonly texts = new Map<string, SheetTexts>();

  /** @param noLabels cells whose text is never a label, such as the plan's sense */
  constructor(
    private readonly workbook: WorkbookSnapshot,
    private readonly noLabels: readonly CellAddress[] = [],
  ) {}

  /** One label a subject, group by group in their order; no label twice. */
  labelsOf(groups: readonly LabelGroup[]): string[][] {
    const candidates = groups.map((group) => this.candidatesOf(group));
    const own = groups.map((group, g) => labelsWithinGroup(group, candidates[g]));
    const isShared = sharedAcrossGroups(own);
    const labels = groups.map((_, g) =>
      own[g].map((label, i) => (isShared[g] ? joined(candidates[g][i], label) : label)),
    );
    return appendCells(groups, labels);
  }

  /** What a single cell would be called: the text beside it, otherwise the one above. */
  textBeside(cell: CellAddress): string | undefined {
    const texts = this.textsOf(cell.sheet);
    return texts.leftOf(cell) ?? texts.above(cell);
  }

  private candidatesOf(group: LabelGroup): Candidate[] {
    return group.subjects.map(({ cell, labelCell }) => {
      const texts = this.textsOf(cell.sheet);
      return {
        named: labelCell === undefined ? undefined : this.textsOf(labelCell.sheet).labelIn(labelCell),
        // Looked for only where they are needed: most plans are told apart by one direction.
        get row() {
          return texts.leftOf(cell);
        },
        get column() {
          return texts.above(cell);
        },
      };
    });
  }

  private textsOf(sheet: string): SheetTexts {
    let texts = this.texts.get(sheet);
    if (texts === undefined) {
      texts = new SheetTexts(
        findSheet(this.workbook, sheet),
        new Set(
          this.noLabels.filter((cell) => cell.sheet === sheet).map((cell) => cellKey(cell.row, cell.column)),
        ),
      );
      this.texts.set(sheet, texts);
    }
    return texts;
  }
}

interface Candidate {
  readonly named: string | undefined;
  readonly row: string | undefined;
  readonly column: string | undefined;
}

/**
 * The texts beside an upright block, or above a lying one, where they tell its cells apart; joined with those of the
 * other direction where they do not, as in a grid; those of the other direction where there are no others.
 */
function labelsWithinGroup(group: LabelGroup, candidates: readonly Candidate[]): string[] {
  const first = (candidate: Candidate): string | undefined =>
    group.isLying ? candidate.column : candidate.row;
  const second = (candidate: Candidate): string | undefined =>
    group.isLying ? candidate.row : candidate.column;
  const found = candidates.filter((candidate) => candidate.named === undefined);
  const distinctOf = (text: (candidate: Candidate) => string | undefined): number =>
    new Set(found.map(text)).size;
  const distinctFirst = distinctOf(first);
  const isJoined = distinctFirst < found.length && distinctOf(bothTexts) > distinctFirst;
  return candidates.map(
    (candidate, i) =>
      candidate.named ??
      (isJoined ? bothTexts(candidate) : first(candidate)) ??
      second(candidate) ??
      formatCellAddress(group.subjects[i].ownCell),
  );
}

function bothTexts({ row, column }: Candidate): string | undefined {
  return row === undefined || column === undefined || row === column ? (row ?? column) : `${row} · ${column}`;
}

/** Which groups have a label that stands in another group too. */
function sharedAcrossGroups(labels: readonly (readonly string[])[]): boolean[] {
  const groupsOf = new Map<string, Set<number>>();
  labels.forEach((ofGroup, g) => {
    for (const label of ofGroup) {
      groupsOf.set(label, (groupsOf.get(label) ?? new Set<number>()).add(g));
    }
  });
  return labels.map((ofGroup) => ofGroup.some((label) => groupsOf.get(label)!.size > 1));
}

function joined(candidate: Candidate, label: string): string {
  return candidate.named ?? bothTexts(candidate) ?? label;
}

function appendCells(groups: readonly LabelGroup[], labels: readonly string[][]): string[][] {
  const count = new Map<string, number>();
  for (const label of labels.flat()) {
    count.set(label, (count.get(label) ?? 0) + 1);
  }
  return labels.map((ofGroup, g) =>
    ofGroup.map((label, i) => {
      if (count.get(label) === 1) {
        return label;
      }
      const cell = formatCellAddress(groups[g].subjects[i].ownCell);
      return label === cell ? label : `${label} (${cell})`;
    }),
  );
}

/** Looks along the rows and columns of one sheet; each cell is looked at once a direction. */
class SheetTexts {
  private readonly leftText = new Map<number, string | undefined>();
  private readonly aboveText = new Map<number, string | undefined>();
  private readonly mergedInto = new Map<number, CellAddress>();

  constructor(
    private readonly sheet: SheetSnapshot | undefined,
    private readonly noLabels: ReadonlySet<number>,
  ) {
    for (const range of sheet?.mergedRanges ?? []) {
      this.noteMerged(range);
    }
  }

  private noteMerged(range: CellRange): void {
    if (cellCountOf(range) <= largestMergedLabel) {
      const anchor = { sheet: range.sheet, row: range.top, column: range.left };
      for (const { row, column } of cellsOf(range)) {
        this.mergedInto.set(cellKey(row, column), anchor);
      }
    }
  }

  leftOf(cell: CellAddress): string | undefined {
    return this.nearest(this.leftText, cell.row, cell.column, 0, -1);
  }

  above(cell: CellAddress): string | undefined {
    return this.nearest(this.aboveText, cell.row, cell.column, -1, 0);
  }

  /** What a cell named as a label says: a text, or a number as it stands. */
  labelIn({ row, column }: CellAddress): string | undefined {
    const value = this.valueAt(row, column);
    if (typeof value === 'number') {
      return String(value);
    }
    return typeof value === 'string' && !isBlankText(value) ? tidied(value) : undefined;
  }

  private nearest(
    known: Map<number, string | undefined>,
    fromRow: number,
    fromColumn: number,
    rowStep: number,
    columnStep: number,
  ): string | undefined {
    const passed: number[] = [];
    let row = fromRow;
    let column = fromColumn;
    let text: string | undefined;
    while (row >= 0 && column >= 0) {
      const key = cellKey(row, column);
      if (known.has(key)) {
        text = known.get(key);
        break;
      }
      passed.push(key);
      row += rowStep;
      column += columnStep;
      text = row >= 0 && column >= 0 ? this.textAt(row, column) : undefined;
      if (text !== undefined) {
        break;
      }
    }
    for (const key of passed) {
      known.set(key, text);
    }
    return text;
  }

  private textAt(row: number, column: number): string | undefined {
    const value = this.valueAt(row, column);
    const isLabel =
      typeof value === 'string' &&
      !isBlankText(value) &&
      readRelation(value) === undefined &&
      !saysFree(value) &&
      !this.noLabels.has(cellKey(row, column));
    return isLabel ? tidied(value) : undefined;
  }

  private valueAt(row: number, column: number): unknown {
    const own = this.sheet?.cell(row, column)?.value;
    if (own !== undefined && own !== null) {
      return own;
    }
    const anchor = this.mergedInto.get(cellKey(row, column));
    return anchor && this.sheet?.cell(anchor.row, anchor.column)?.value;
  }
}

/** On one line, single blanks. */
function tidied(text: string): string {
  return text.replace(/\s+/g, ' ').trim();
}
