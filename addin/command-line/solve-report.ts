/**
 * What a solve has to say, for people (report.ts) and for programs (json-output.ts). Field by field the JSON object
 * of `planrow solve --json`; null is what is not known or does not apply, and JSON shows infinite numbers as null too.
 */
import type { Sense } from '#solver-core';

export type ReportStatus = 'optimal' | 'infeasible' | 'unbounded' | 'stopped' | 'imprecise' | 'invalid';

export interface DecisionEntry {
  readonly name: string;
  /** `Sheet!A1`; null for a problem that is no workbook. */
  readonly cell: string | null;
  readonly value: number | null;
  readonly lower: number;
  readonly upper: number;
  readonly reducedCost: number | null;
  /** Range of the objective coefficient over which this plan stays best. */
  readonly costFrom: number | null;
  readonly costTo: number | null;
}

export interface ConstraintEntry {
  readonly name: string;
  /** The relation's cell; the left cell where Relation is one constant. */
  readonly cell: string | null;
  /** The two sides at the plan. */
  readonly leftSide: number | null;
  readonly relation: '<=' | '>=' | '=' | 'range' | 'free';
  readonly rightSide: number | null;
  /** What the left side may be at least and at most, at the plan. */
  readonly lower: number | null;
  readonly upper: number | null;
  readonly slack: number | null;
  readonly dualValue: number | null;
  /** Worth of one more and of one less, where they differ. */
  readonly dualMore: number | null;
  readonly dualLess: number | null;
  /** Range of the right side over which the dual value holds. */
  readonly validFrom: number | null;
  readonly validTo: number | null;
}

export interface IssueEntry {
  readonly code: string;
  readonly severity: 'error' | 'warning';
  readonly cell: string | null;
  readonly message: string;
}

export interface SecondsEntry {
  readonly read: number | null;
  readonly build: number | null;
  readonly solve: number | null;
  readonly write: number | null;
  readonly total: number | null;
}

export interface SolveReport {
  /** null only where a bug of ours ended the run. */
  readonly status: ReportStatus | null;
  readonly plan: string | null;
  readonly sense: Sense | null;
  readonly objective: number | null;
  readonly bound: number | null;
  readonly gap: number | null;
  readonly iterations: number | null;
  readonly nodes: number | null;
  readonly seconds: SecondsEntry;
  readonly decisions: readonly DecisionEntry[];
  readonly constraints: readonly ConstraintEntry[];
  /** `plan`, or `fixed` when lots are held as they are. */
  readonly dualsOf: 'plan' | 'fixed' | null;
  readonly conflict: readonly { kind: 'row' | 'bound'; name: string; cell: string | null }[] | null;
  readonly relaxation: readonly { name: string; cell: string | null; by: number; cost: number }[] | null;
  readonly checks: {
    /** Largest violations, relative to 1 + the largest term. */
    readonly primal: number | null;
    readonly dual: number | null;
    readonly complementarity: number | null;
    readonly workbookObjective: number | null;
  };
  readonly written: {
    readonly file: string;
    readonly blocks: readonly { name: string; cell: string }[];
  } | null;
  readonly issues: readonly IssueEntry[];
}

/** A report in which nothing is known but that the run ended with these issues. */
export function reportOfIssues(status: ReportStatus | null, issues: readonly IssueEntry[]): SolveReport {
  return {
    status,
    plan: null,
    sense: null,
    objective: null,
    bound: null,
    gap: null,
    iterations: null,
    nodes: null,
    seconds: { read: null, build: null, solve: null, write: null, total: null },
    decisions: [],
    constraints: [],
    dualsOf: null,
    conflict: null,
    relaxation: null,
    checks: { primal: null, dual: null, complementarity: null, workbookObjective: null },
    written: null,
    issues,
  };
}

/** What `planrow check --json` prints. */
export interface CheckReport {
  readonly status: 'valid' | 'invalid' | null;
  readonly plan: string | null;
  readonly size: {
    readonly decisions: number;
    readonly constraints: number;
    readonly nonzeros: number;
    readonly definingRows: number;
  } | null;
  readonly issues: readonly IssueEntry[];
}

/** An error that concerns no cell, such as an unreadable file. */
export function errorEntry(code: string, message: string): IssueEntry {
  return { code, severity: 'error', cell: null, message };
}
