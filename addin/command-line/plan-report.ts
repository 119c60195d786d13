/**
 * The report of a plan in a workbook: its parts by label and cell.
 */
import { formatCellAddress, type CellAddress } from '../domain/sheet/cell-address';
import type { ModelIssue } from '../domain/model-from-sheet/model-issue';
import type { Relation } from '../domain/model-from-sheet/sheet-model';
import { constraintRowsOf, type ConstraintSolution } from '../domain/results-to-sheet/plan-solution';
import { lineCell } from '../domain/results-to-sheet/result-lines';
import type { ResultNotice } from '../domain/results-to-sheet/result-notice';
import type { SolvedModel } from '../use-cases/solve-model';
import { sentenceOfIssue } from '../wording/issue-sentences';
import { sentenceOfNotice } from '../wording/report-wording';
import type { ConstraintEntry, DecisionEntry, IssueEntry, SolveReport } from './solve-report';
import { solverFigures } from './solver-figures';

/** @param file the file written, null where none was */
export function reportOfPlan(solved: SolvedModel, file: string | null): Omit<SolveReport, 'seconds'> {
  const { model, result, solution, writes } = solved;
  const objective = solution?.objective ?? null;
  return {
    status: solved.status,
    plan: solved.planName,
    sense: model.sense,
    objective,
    ...solverFigures(result, objective, writes?.workbookObjective ?? null),
    decisions: model.decisions.map((decision, position): DecisionEntry => {
      const solvedDecision = solution?.decisions[position];
      return {
        name: decision.label,
        cell: formatCellAddress(decision.cell),
        value: solvedDecision?.value ?? null,
        lower: decision.lower,
        upper: decision.upper,
        reducedCost: solvedDecision?.reducedCost ?? null,
        costFrom: null,
        costTo: null,
      };
    }),
    constraints: constraintRowsOf(model).map((row, position): ConstraintEntry => {
      const solvedRow = solution?.constraints[position];
      return {
        name: row.label,
        cell: formatCellAddress(row.cell),
        leftSide: solvedRow?.leftSide ?? null,
        relation: row.relation,
        rightSide: solvedRow?.rightSide ?? null,
        ...limitsOf(row.relation, solvedRow),
        slack: solvedRow?.slack ?? null,
        dualValue: solvedRow?.dualValue ?? null,
        dualMore: null,
        dualLess: null,
        validFrom: null,
        validTo: null,
      };
    }),
    conflict: null,
    relaxation: null,
    written:
      file === null || writes === null
        ? null
        : {
            file,
            blocks: writes.columns.map(({ name, range }) => ({
              name,
              cell: formatCellAddress(lineCell(range, 0)),
            })),
          },
    issues: [...solved.issues.map(issueEntry), ...(writes?.notices ?? []).map(noticeEntry)],
  };
}

export function issueEntry(issue: ModelIssue): IssueEntry {
  const { code, severity, cell } = issue;
  return { code, severity, cell: cellText(cell), message: sentenceOfIssue(issue) };
}

function noticeEntry(notice: ResultNotice): IssueEntry {
  const { code, severity, cell } = notice;
  return { code, severity, cell: cellText(cell), message: sentenceOfNotice(notice) };
}

function cellText(cell: CellAddress | null): string | null {
  return cell === null ? null : formatCellAddress(cell);
}

/** What the left side may be at least and at most, given what the right side is at the plan. */
function limitsOf(
  relation: Relation,
  solved: ConstraintSolution | undefined,
): Pick<ConstraintEntry, 'lower' | 'upper'> {
  const limit = solved?.rightSide ?? null;
  return { lower: relation === '<=' ? null : limit, upper: relation === '>=' ? null : limit };
}
