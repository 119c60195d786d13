/**
 * The operators between single values.
 */
import { CellError } from '../sheet/cell-value';
import type { ArithmeticOperator, BinaryOperator, ComparisonOperator } from '../formula/formula-syntax';
import { compareValues, toAmount, toText } from './coercions';
import { errorValue, isDependent, type Scalar } from './evaluated-value';
import { ErrorValueSignal, EvaluationRefusal, type NonAffineOperation } from './evaluation-refusal';
import type { Amount, DependentNumber, NumberDomain } from './number-domain';

export type ScalarOperator = Exclude<BinaryOperator, ':' | ',' | ' '>;

/** @throws EvaluationRefusal where the result would not stay within the domain */
export function applyOperator(
  operator: ScalarOperator,
  left: Scalar,
  right: Scalar,
  domain: NumberDomain,
): Scalar {
  if (typeof left === 'number' && typeof right === 'number') {
    switch (operator) {
      case '+':
        return finite(left + right);
      case '-':
        return finite(left - right);
      case '*':
        return finite(left * right);
      case '/':
        return right === 0 ? errorValue.division : finite(left / right);
      default:
    }
  }
  if (left instanceof CellError) {
    return left;
  }
  if (right instanceof CellError) {
    return right;
  }
  switch (operator) {
    case '+':
    case '-':
    case '*':
    case '/':
    case '^':
      return arithmetic(operator, left, right, domain);
    case '&':
      refuseDependents(left, right, 'concatenation', operator);
      return toText(left) + toText(right);
    default:
      refuseDependents(left, right, 'comparison', operator);
      return holds(operator, compareValues(left, right));
  }
}

/** Minus and percent. */
export function applyUnary(operator: '-' | '%', operand: Scalar, domain: NumberDomain): Scalar {
  if (operand instanceof CellError) {
    return operand;
  }
  return catchingErrors(() => {
    const amount = toAmount(operand);
    if (typeof amount === 'number') {
      return operator === '-' ? -amount : amount / 100;
    }
    return operator === '-' ? domain.scale(amount, -1) : domain.divide(amount, 100);
  });
}

/** @returns the error value that the work ends in, where it does */
export function catchingErrors(work: () => Scalar): Scalar {
  try {
    return work();
  } catch (error) {
    if (error instanceof ErrorValueSignal) {
      return error.value;
    }
    throw error;
  }
}

/** What is no number in a worksheet is an error there. */
export function finite(value: number): number | CellError {
  return Number.isFinite(value) ? value : errorValue.number;
}

export function power(base: number, exponent: number): Scalar {
  if (base === 0 && exponent === 0) {
    return errorValue.number;
  }
  if (base === 0 && exponent < 0) {
    return errorValue.division;
  }
  return finite(base ** exponent);
}

function arithmetic(operator: ArithmeticOperator, left: Scalar, right: Scalar, domain: NumberDomain): Scalar {
  return catchingErrors(() => {
    const a = toAmount(left);
    const b = toAmount(right);
    if (typeof a === 'number' && typeof b === 'number') {
      return operator === '^' ? power(a, b) : applyOperator(operator, a, b, domain);
    }
    switch (operator) {
      case '+':
        return domain.add(a, b, 1);
      case '-':
        return domain.add(a, b, -1);
      case '*':
        return multiplyAmounts(a, b, domain, operator);
      case '/':
        return divideAmounts(a, b, domain);
      case '^':
        throw new EvaluationRefusal({ code: 'not-affine', operation: 'power', by: '^' });
    }
  });
}

/** @param by the operator or function that multiplies, for the refusal */
export function multiplyAmounts(a: Amount, b: Amount, domain: NumberDomain, by: string): Amount {
  if (typeof a === 'number') {
    return typeof b === 'number' ? a * b : domain.scale(b, a);
  }
  if (typeof b === 'number') {
    return domain.scale(a, b);
  }
  const product = domain.multiply(a, b);
  if (product === undefined) {
    throw new EvaluationRefusal({ code: 'not-affine', operation: 'product', by });
  }
  return product;
}

function divideAmounts(dividend: Amount, divisor: Amount, domain: NumberDomain): Scalar {
  const constant = typeof divisor === 'number' ? divisor : domain.constantValue(divisor);
  if (constant === undefined) {
    throw new EvaluationRefusal({ code: 'not-affine', operation: 'division', by: '/' });
  }
  if (constant === 0) {
    return errorValue.division;
  }
  return typeof dividend === 'number'
    ? domain.add(domain.scale(divisor as DependentNumber, 0), dividend / constant, 1)
    : domain.divide(dividend, constant);
}

function refuseDependents(left: Scalar, right: Scalar, operation: NonAffineOperation, by: string): void {
  if (isDependent(left) || isDependent(right)) {
    throw new EvaluationRefusal({ code: 'not-affine', operation, by });
  }
}

function holds(operator: ComparisonOperator, order: number): boolean {
  switch (operator) {
    case '=':
      return order === 0;
    case '<>':
      return order !== 0;
    case '<':
      return order < 0;
    case '>':
      return order > 0;
    case '<=':
      return order <= 0;
    case '>=':
      return order >= 0;
  }
}
