/**
 * Everything that can be wrong with a plan on a sheet, as data: a union by code, each member with the facts that its
 * sentence is made of. The sentences stand in addin/wording/issue-sentences.ts; the list of codes in addin/SPEC.md.
 *
 * `name` in the facts is always a defined name as it stands in the workbook, such as `Week.Lower`.
 */
import type { FormulaIssue } from '../linearization/formula-issue';
import type { CellAddress } from '../sheet/cell-address';

export type IssueSeverity = 'error' | 'warning';

type FactValues = Readonly<Record<string, string | number | readonly string[]>>;

/** What a code's sentence is made of. Cells and ranges as text, shapes as `rows × columns`. */
interface StatementFacts {
  // Names: what is there, what is missing, what they refer to.
  'missing-decision': { plan: string; name: string };
  'missing-objective': { name: string };
  'missing-sense': { name: string };
  'missing-part': { name: string; present: string };
  'numbering-gap': { name: string; present: string };
  'duplicate-name': { names: readonly string[] };
  'name-without-block': { name: string; block: string };
  'unknown-sense': { name: string; text: string };
  'dead-name': { name: string };
  'external-name': { name: string };
  'unknown-name-target': { name: string; what: string };
  'computed-name': { name: string; function: string };
  'not-a-range': { name: string };
  'not-one-cell': { name: string; shape: string };
  'not-one-line': { name: string; shape: string };
  'unequal-lengths': { names: readonly string[]; lengths: readonly string[] };
  'wrong-shape': { name: string; shape: string; block: string; blockShape: string };
  'wrong-objective-shape': { name: string; shape: string; block: string; blockShape: string };
  'wrong-label-count': { name: string; count: number; expected: number };
  'wrong-constraint-shape': { name: string; shape: string; decisions: number };
  'scattered-block': { name: string };
  'repeated-cells': { name: string };

  // Decision cells.
  'decision-holds-formula': { name: string };
  'decision-holds-text': { name: string; text: string };
  'duplicate-decision': { names: readonly string[]; count: number };
  'shared-decision': { plan: string; count: number };

  // Values where an amount belongs.
  'text-for-number': { name: string; text: string };
  'text-looks-like-number': { name: string; text: string };
  'truth-value-for-number': { name: string };
  'error-value-for-number': { name: string; error: string };
  'date-for-amount': { name: string };
  'coefficient-depends': { name: string };
  'bound-depends': { name: string };

  // Blocks.
  'merged-cells': { name: string; merged: string };
  'hidden-rows': { names: readonly string[]; lines: string; count: number };
  'hidden-columns': { names: readonly string[]; lines: string; count: number };

  // Objective.
  'blank-objective': { name: string };
  'fixed-objective': { name: string };

  // Constraint rows.
  'blank-left-side': { name: string };
  'blank-right-side': { name: string };
  'missing-relation': { name: string };
  'strict-relation': { name: string; text: string };
  'unknown-relation': { name: string; text: string };
  'heading-in-block': { name: string };
  'no-constraint-rows': { name: string };
  'read-as-coefficient': { name: string };
  'blank-coefficient': { name: string; count: number; cells: readonly string[] };
  'fixed-row': { name: string; row: string };
  'impossible-row': { name: string; row: string; left: number; relation: string; right: number };

  // Bounds, lots, least runs.
  'crossing-bounds': { decision: string; lower: number; upper: number; isLowerGiven: 'yes' | 'no' };
  'lot-not-served': { name: string; count: number };
  'lot-dropped': { name: string; count: number };
  'least-run-not-served': { name: string; count: number };
  'negative-lot': { name: string; lot: number };
  'lot-out-of-reach': { decision: string; lot: number; lower: number; upper: number };
  'least-run-above-upper': { decision: string; leastRun: number; upper: number };
  'least-run-without-effect': { decision: string; leastRun: number; lower: number };
}

export type StatementIssueCode = keyof StatementFacts;

/** One fault or caution of one code. */
export interface IssueOf<Code extends string, Facts> {
  /** Stable, kebab-case. */
  readonly code: Code;
  readonly severity: IssueSeverity;
  /** The cell itself; null where the issue has none (the facts then name the role, such as Sense). */
  readonly cell: CellAddress | null;
  readonly facts: Readonly<Facts>;
}

/** What this room finds itself: the names, shapes and values of the statement. */
export type StatementIssue = {
  readonly [Code in StatementIssueCode]: IssueOf<Code, StatementFacts[Code]>;
}[StatementIssueCode];

/** What the formulas say: see linearization/formula-issue.ts. */
export type FormulaModelIssue = IssueOf<FormulaIssue['code'], FactValues>;

export type ModelIssue = StatementIssue | FormulaModelIssue;
export type IssueCode = ModelIssue['code'];

/** Codes after which the plan is solved all the same. Every other one is an error. */
export const warningCodes: ReadonlySet<IssueCode> = new Set<IssueCode>([
  'shared-decision',
  'date-for-amount',
  'hidden-rows',
  'hidden-columns',
  'fixed-objective',
  'no-constraint-rows',
  'read-as-coefficient',
  'blank-coefficient',
  'fixed-row',
  'lot-dropped',
  'least-run-above-upper',
  'least-run-without-effect',
  'stored-value-differs',
]);

/** An issue of the statement, its severity given by its code. */
export function statementIssue<Code extends StatementIssueCode>(
  code: Code,
  cell: CellAddress | null,
  facts: StatementFacts[Code],
): StatementIssue {
  return { code, severity: severityOf(code), cell, facts } as unknown as StatementIssue;
}

export function severityOf(code: IssueCode): IssueSeverity {
  return warningCodes.has(code) ? 'warning' : 'error';
}
