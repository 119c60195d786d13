/**
 * Which of a workbook's plans is meant. A workbook with one plan needs no name.
 */
import type { WorkbookSnapshot } from '../domain/sheet/sheet-snapshot';
import { listPlans, type PlanListing } from '../domain/model-from-sheet/naming-convention';

/** Why no plan could be chosen. */
export interface NoSuchPlan {
  readonly kind: 'no-such-plan';
  /** None: the workbook holds no plan. Several: one must be named. Unknown: none has the given name. */
  readonly reason: 'none' | 'several' | 'unknown';
  /** The name asked for; null where none was. */
  readonly wanted: string | null;
  /** The names there are. */
  readonly planNames: readonly string[];
}

export interface ChosenPlan {
  readonly kind: 'plan';
  readonly listing: PlanListing;
}

/** @param wanted case and outer blanks do not count; null where no name was given */
export function choosePlan(workbook: WorkbookSnapshot, wanted: string | null): ChosenPlan | NoSuchPlan {
  const plans = listPlans(workbook);
  const planNames = plans.map((plan) => plan.name);
  const none = (reason: NoSuchPlan['reason']): NoSuchPlan => ({
    kind: 'no-such-plan',
    reason,
    wanted,
    planNames,
  });
  if (plans.length === 0) {
    return none('none');
  }
  if (wanted === null) {
    return plans.length === 1 ? { kind: 'plan', listing: plans[0] } : none('several');
  }
  const key = wanted.trim().toLowerCase();
  const listing = plans.find((plan) => plan.name.toLowerCase() === key);
  return listing === undefined ? none('unknown') : { kind: 'plan', listing };
}
