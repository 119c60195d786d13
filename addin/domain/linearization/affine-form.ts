/**
 * An affine form: constant + Σ coefficient × variable. Variables 0 … decisionCount − 1 are the plan's decision cells
 * in their order; higher ones are cells that many others build on (see defining-rows.ts).
 */
export class AffineForm {
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

  get isConstant(): boolean {
    return this.variables.length === 0;
  }
}
