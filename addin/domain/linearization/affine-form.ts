/**
 * An affine form: constant + Σ coefficient × variable. Variables 0 … decisionCount − 1 are the plan's decision cells
 * in their order; higher ones are cells that many others build on (see defining-rows.ts).
 *
 * A form is a number that depends on decisions even where no term is left of it (0 × decision): whether a cell
 * depends on decisions is a matter of how it is made, not of today's coefficients.
 */
import type { DependentNumber } from '../calculation/number-domain';

export class AffineForm implements DependentNumber {
  private constructor(
    readonly constant: number,
    /** Ascending, no variable twice. */
    readonly variables: readonly number[],
    /** As long as `variables`; none is 0. */
    readonly coefficients: readonly number[],
  ) {}

  static constant(value: number): AffineForm {
    return new AffineForm(value, [], []);
  }

  static variable(variable: number): AffineForm {
    return new AffineForm(0, [variable], [1]);
  }

  /** Terms in any order, repeated variables summed, zero coefficients dropped. */
  static fromTerms(constant: number, terms: ReadonlyMap<number, number>): AffineForm {
    const variables = [...terms.keys()].filter((variable) => terms.get(variable) !== 0).sort((a, b) => a - b);
    return new AffineForm(
      constant,
      variables,
      variables.map((variable) => terms.get(variable) as number),
    );
  }

  /** Terms as they are to be kept: variables ascending, none twice, no coefficient 0. The arrays become the form's. */
  static fromSorted(
    constant: number,
    variables: readonly number[],
    coefficients: readonly number[],
  ): AffineForm {
    return new AffineForm(constant, variables, coefficients);
  }

  get dependsOnDecisions(): true {
    return true;
  }

  get isConstant(): boolean {
    return this.variables.length === 0;
  }

  /** The form's value where variable i has the value `values[i]`. */
  valueAt(values: readonly number[]): number {
    let value = this.constant;
    for (let at = 0; at < this.variables.length; at++) {
      value += this.coefficients[at] * values[this.variables[at]];
    }
    return value;
  }

  /** factor × form. */
  scaled(factor: number): AffineForm {
    return this.mapped((value) => value * factor);
  }

  /** form / divisor, each number divided: /3 is not × 0.333…. */
  dividedBy(divisor: number): AffineForm {
    return this.mapped((value) => value / divisor);
  }

  /** this + sign × other. */
  plus(other: AffineForm, sign: 1 | -1): AffineForm {
    const constant = this.constant + sign * other.constant;
    if (other.variables.length === 0) {
      return new AffineForm(constant, this.variables, this.coefficients);
    }
    const variables: number[] = [];
    const coefficients: number[] = [];
    const a = this.variables;
    const b = other.variables;
    let i = 0;
    let j = 0;
    while (i < a.length || j < b.length) {
      const next = j >= b.length || (i < a.length && a[i] < b[j]) ? a[i] : b[j];
      let coefficient = 0;
      if (i < a.length && a[i] === next) {
        coefficient += this.coefficients[i++];
      }
      if (j < b.length && b[j] === next) {
        coefficient += sign * other.coefficients[j++];
      }
      if (coefficient !== 0) {
        variables.push(next);
        coefficients.push(coefficient);
      }
    }
    return new AffineForm(constant, variables, coefficients);
  }

  /** this + addend. */
  plusConstant(addend: number): AffineForm {
    return new AffineForm(this.constant + addend, this.variables, this.coefficients);
  }

  private mapped(change: (value: number) => number): AffineForm {
    const variables: number[] = [];
    const coefficients: number[] = [];
    for (let at = 0; at < this.variables.length; at++) {
      const coefficient = change(this.coefficients[at]);
      if (coefficient !== 0) {
        variables.push(this.variables[at]);
        coefficients.push(coefficient);
      }
    }
    return new AffineForm(change(this.constant), variables, coefficients);
  }
}
