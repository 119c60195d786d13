/**
 * When new factors pay: each update makes every later solve a little dearer, and new factors cost once what many
 * solves cost. The average cost of an iteration since the last factorization falls at first and then rises; it is
 * least where the latest iteration costs as much as the average, and that is where the factors are renewed.
 *
 * Source: the classical argument, as in Maros (2003), "Computational Techniques of the Simplex Method", §5.4. Costs are
 * work units, so that the path is the same on every machine.
 */

/** Updates before the rule may speak: the first iterations say little. */
const fewestUpdates = 8;
/** Weight of the latest iteration in what is taken as the present cost: single ones vary. */
const latestWeight = 0.25;
/**
 * What a unit of factorization takes compared with a unit of a solve: its inner loops are shorter and less regular.
 * Chosen by trial over Netlib and sheet-sized plans.
 */
const factorizationWeight = 12;

export class RenewalPolicy {
  private factorizationCost = 0;
  private solveWork = 0;
  private updates = 0;
  private present = 0;

  /**
   * @param work units that the factorization took
   * @param renewal units of everything else that is done anew with it
   */
  noteFactorization(work: number, renewal: number): void {
    this.factorizationCost = factorizationWeight * work + renewal;
    this.solveWork = 0;
    this.updates = 0;
    this.present = 0;
  }

  /** @param work units of all solves since the last update or factorization */
  noteUpdate(work: number): void {
    this.solveWork += work;
    this.updates++;
    this.present = this.updates === 1 ? work : this.present + latestWeight * (work - this.present);
  }

  /** New factors would make the next iterations cheaper on average. */
  get isDue(): boolean {
    if (this.updates < fewestUpdates) return false;
    return this.present * this.updates > this.factorizationCost + this.solveWork;
  }
}
