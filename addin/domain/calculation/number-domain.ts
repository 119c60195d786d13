/**
 * What the evaluator needs of its numbers. Worksheets calculate with plain numbers; to find out how a cell depends on
 * the decisions, the same evaluator calculates with affine forms in their place.
 *
 * The rule that keeps this safe is to fail closed: a number that depends on decisions is an object that no function
 * can mistake for a plain number. Only what this interface offers, and only functions that a domain lets in, can do
 * anything with it.
 */

/** A number that depends on decisions. What it is made of is its domain's business. */
export interface DependentNumber {
  readonly dependsOnDecisions: true;
}

export type Amount = number | DependentNumber;

/** A sum under way. */
export interface AmountSum {
  add(amount: Amount): void;
  addMultiple(amount: Amount, factor: number): void;
  total(): Amount;
}

export interface NumberDomain {
  /** Whether dependent numbers occur at all. */
  readonly hasDependentNumbers: boolean;
  newSum(): AmountSum;
  /** factor × amount. */
  scale(amount: DependentNumber, factor: number): DependentNumber;
  divide(amount: DependentNumber, divisor: number): DependentNumber;
  /** a + sign × b, at least one of them dependent; sign is 1 or −1. */
  add(a: Amount, b: Amount, sign: 1 | -1): DependentNumber;
  /** The product where it stays within the domain, otherwise undefined. */
  multiply(a: DependentNumber, b: DependentNumber): DependentNumber | undefined;
  /** The plain number that a dependent one always equals, or undefined where the decisions matter. */
  constantValue(amount: DependentNumber): number | undefined;
  /** The same amount in a form that is cheap to take up many times. */
  keep(amount: DependentNumber): DependentNumber;
  /** Whether a function keeps within the domain when this argument (from 0) depends on decisions. */
  acceptsDependent(functionName: string, argument: number): boolean;
}

/** The numbers of a worksheet. */
export const plainNumbers: NumberDomain = {
  hasDependentNumbers: false,
  newSum: () => new PlainSum(),
  scale: notPlain,
  divide: notPlain,
  add: notPlain,
  multiply: notPlain,
  constantValue: notPlain,
  keep: notPlain,
  acceptsDependent: () => false,
};

class PlainSum implements AmountSum {
  private sum = 0;

  add(amount: Amount): void {
    this.sum += amount as number;
  }

  addMultiple(amount: Amount, factor: number): void {
    this.sum += (amount as number) * factor;
  }

  total(): number {
    return this.sum;
  }
}

function notPlain(): never {
  throw new TypeError('A dependent number has come among plain numbers.');
}
