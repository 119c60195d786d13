/**
 * Choosing, starting, copying, renaming and deleting plans.
 */
import type { PlanListing } from '../domain/model-from-sheet/naming-convention';
import type { WorkbookSnapshot } from '../domain/sheet/sheet-snapshot';
import { describePlan, type StatedPlan } from '../domain/statement-to-sheet/describe-plans';
import {
  deletePlan,
  duplicatePlan,
  findPlanNameFault,
  freePlanName,
  newPlanListing,
  renamePlan,
  setPart,
  setSense,
  suggestedPlanName,
  usersOfPlanNames,
} from '../domain/statement-to-sheet/statement-edits';
import { paneTexts } from '../wording/pane-texts';
import type { Updated } from './pane-events';
import type { PaneState, Question } from './pane-state';
import { isBusy, only, writeStatement, type EventOf } from './update-steps';

export type PlansEvent = EventOf<
  'plan-chosen' | 'name-asked' | 'name-typed' | 'deletion-asked' | 'question-confirmed' | 'question-cancelled'
>;

export function updatePlans(state: PaneState, event: PlansEvent): Updated {
  const { workbook, chosen, question } = state;
  if (workbook === null || isBusy(state)) {
    return only(state);
  }
  switch (event.kind) {
    case 'plan-chosen': {
      const plan = state.plans.find(({ listing }) => listing.name === event.name);
      return only(plan === undefined ? state : withPlan(state, plan));
    }
    case 'name-asked':
      return only({
        ...state,
        question: {
          kind: 'name',
          purpose: event.purpose,
          text: suggestedName(workbook, chosen, event.purpose),
          fault: null,
        },
      });
    case 'name-typed':
      return only(
        question?.kind === 'name'
          ? { ...state, question: { ...question, text: event.text, fault: null } }
          : state,
      );
    case 'deletion-asked':
      return only(
        chosen === null
          ? state
          : {
              ...state,
              question: { kind: 'delete', users: usersOfPlanNames(workbook, chosen.listing) },
            },
      );
    case 'question-cancelled':
      return only({ ...state, question: null });
    case 'question-confirmed':
      return question === null ? only(state) : afterConfirmation(state, workbook, question);
  }
}

function suggestedName(
  workbook: WorkbookSnapshot,
  chosen: StatedPlan | null,
  purpose: 'new' | 'duplicate' | 'rename',
): string {
  if (purpose === 'new' || chosen === null) {
    return suggestedPlanName(workbook, paneTexts.suggestedName);
  }
  const { prefix } = chosen.listing;
  return purpose === 'rename' ? prefix : freePlanName(workbook, prefix);
}

/** Another plan is at hand: what was known of the last one is not shown with it. */
function withPlan(state: PaneState, chosen: StatedPlan | null): PaneState {
  return {
    ...state,
    chosen,
    check: null,
    result: null,
    question: null,
    fieldFault: null,
    openFields: [],
    view: 'statement',
  };
}

function afterConfirmation(state: PaneState, workbook: WorkbookSnapshot, question: Question): Updated {
  const { chosen } = state;
  switch (question.kind) {
    case 'point-elsewhere':
      return chosen === null
        ? only({ ...state, question: null })
        : writeStatement(
            { ...state, question: null },
            setPart(chosen.listing, question.part.role, question.part.number, question.to),
          );
    case 'delete':
      return chosen === null
        ? only({ ...state, question: null })
        : writeStatement(withPlan(state, null), deletePlan(workbook, chosen.listing), null);
    case 'name':
      return afterNaming(state, workbook, question);
  }
}

function afterNaming(
  state: PaneState,
  workbook: WorkbookSnapshot,
  question: Extract<Question, { kind: 'name' }>,
): Updated {
  const { chosen } = state;
  const prefix = question.text.trim();
  const own = question.purpose === 'rename' ? (chosen?.listing ?? null) : null;
  const fault = findPlanNameFault(workbook, prefix, own);
  if (fault !== null) {
    return only({ ...state, question: { ...question, fault } });
  }
  if (question.purpose === 'new' || chosen === null) {
    const listing = newPlanListing(prefix);
    const started = withPlan(state, describePlan(workbook, listing));
    return writeStatement(started, setSense(listing, 'maximise'), listing);
  }
  const { listing } = chosen;
  const name = listing.scope === null ? prefix : `${prefix} @ ${listing.scope}`;
  const next: PlanListing = { ...listing, prefix, name };
  return question.purpose === 'duplicate'
    ? writeStatement(withPlan(state, chosen), duplicatePlan(workbook, listing, prefix), next)
    : writeStatement({ ...state, question: null }, renamePlan(workbook, listing, prefix), next);
}
