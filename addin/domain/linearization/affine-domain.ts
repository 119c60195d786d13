/**
 * Affine forms as the evaluator's numbers.
 */
import type { Amount, AmountSum, DependentNumber, NumberDomain } from '../calculation/number-domain';
import { AffineForm } from './affine-form';
import { acceptsDependent } from './affine-functions';

/** @param keep names a form that is long, see NamedForms */
export function affineForms(keep: (form: AffineForm) => AffineForm): NumberDomain {
  return {
    hasDependentNumbers: true,
    newSum: () => new AffineSum(),
    scale: (amount, factor) => formOf(amount).scaled(factor),
    divide: (amount, divisor) => formOf(amount).dividedBy(divisor),
    add: addForms,
    multiply: multiplyForms,
    constantValue: (amount) => (formOf(amount).isConstant ? formOf(amount).constant : undefined),
    keep: (amount) => keep(formOf(amount)),
    acceptsDependent,
  };
}

function formOf(amount: DependentNumber): AffineForm {
  return amount as AffineForm;
}

function addForms(a: Amount, b: Amount, sign: 1 | -1): AffineForm {
  if (typeof b === 'number') {
    return formOf(a as DependentNumber).plusConstant(sign * b);
  }
  return typeof a === 'number' ? formOf(b).scaled(sign).plusConstant(a) : formOf(a).plus(formOf(b), sign);
}

/** Affine only where one of the two has no term left, and so is a plain number after all. */
function multiplyForms(a: DependentNumber, b: DependentNumber): AffineForm | undefined {
  const left = formOf(a);
  const right = formOf(b);
  if (left.isConstant) {
    return right.scaled(left.constant);
  }
  return right.isConstant ? left.scaled(right.constant) : undefined;
}

/** Collects terms as they come and puts them in order once, at the end. */
class AffineSum implements AmountSum {
  private constant = 0;
  private isDependent = false;
  private isAscending = true;
  private readonly variables: number[] = [];
  private readonly coefficients: number[] = [];

  add(amount: Amount): void {
    if (typeof amount === 'number') {
      this.constant += amount;
    } else {
      this.addMultiple(amount, 1);
    }
  }

  addMultiple(amount: Amount, factor: number): void {
    if (typeof amount === 'number') {
      this.constant += amount * factor;
      return;
    }
    this.isDependent = true;
    const form = formOf(amount);
    this.constant += form.constant * factor;
    if (factor === 0) {
      return;
    }
    let last = this.variables.length === 0 ? -1 : this.variables[this.variables.length - 1];
    for (let at = 0; at < form.variables.length; at++) {
      const variable = form.variables[at];
      this.isAscending &&= variable > last;
      last = variable;
      this.variables.push(variable);
      this.coefficients.push(form.coefficients[at] * factor);
    }
  }

  total(): Amount {
    if (!this.isDependent) {
      return this.constant;
    }
    if (this.isAscending && !this.coefficients.includes(0)) {
      return AffineForm.fromSorted(this.constant, this.variables, this.coefficients);
    }
    const terms = new Map<number, number>();
    this.variables.forEach((variable, at) =>
      terms.set(variable, (terms.get(variable) ?? 0) + this.coefficients[at]),
    );
    return AffineForm.fromTerms(this.constant, terms);
  }
}
