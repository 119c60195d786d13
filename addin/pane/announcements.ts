/**
 * What a screen reader is told when a piece of work has ended: the gist of what then stands on the pane.
 */
import type { SolvedOutcome } from '../domain/results-to-sheet/plan-outcome';
import type { PlanCheck } from '../ports/plan-engine';
import { bindingText, paneTexts } from '../wording/pane-texts';
import { statusSentence } from '../wording/status-sentences';
import { amountText } from '../wording/word-forms';

export function sentenceOfCheck({ issues, size }: PlanCheck): string {
  const errors = issues.filter(({ severity }) => severity === 'error').length;
  if (issues.length === 0 && size !== null) {
    return paneTexts.noIssues(size.decisions, size.constraints);
  }
  return `${paneTexts.issues}: ${paneTexts.issueCounts(errors, issues.length - errors)}.`;
}

export function sentenceOfSolved(outcome: SolvedOutcome): string {
  const { status, objective, constraints } = outcome;
  const parts = [statusSentence(status, objective !== null)];
  if (objective !== null) {
    const binding = constraints.filter(({ isBinding }) => isBinding).length;
    parts.push(`${paneTexts.objective} ${amountText(objective)}.`, bindingText(binding, constraints.length));
  }
  return parts.join(' ');
}
