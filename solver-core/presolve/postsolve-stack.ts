/**
 * The records of what presolve did, in order; postsolve undoes them last to first.
 */
import type { PostsolveSolution } from './postsolve-solution';
import type { Reduction, ReductionName } from './reduction';
import { SavedEntries } from './saved-entries';

export class PostsolveStack {
  readonly entries = new SavedEntries();
  private readonly undos: ((solution: PostsolveSolution) => void)[] = [];
  private readonly appliedTimes = new Map<ReductionName, number>();

  get length(): number {
    return this.undos.length;
  }

  /** How often each reduction was applied. */
  get counts(): ReadonlyMap<ReductionName, number> {
    return this.appliedTimes;
  }

  push<Record>(reduction: Reduction<Record>, record: Record): void {
    this.undos.push((solution) => reduction.undo(record, solution, this));
    this.appliedTimes.set(reduction.name, (this.appliedTimes.get(reduction.name) ?? 0) + 1);
  }

  /** Turns a solution of the reduced problem into one of the stated problem. The stack stays as it is. */
  undoAll(solution: PostsolveSolution): void {
    for (let step = this.undos.length - 1; step >= 0; step--) this.undos[step](solution);
  }
}
