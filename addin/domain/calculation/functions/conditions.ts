/**
 * IF and its kin. What decides must be a constant; what is decided between may depend on decisions.
 */
import { CellError } from '../../sheet/cell-value';
import type { FormulaNode } from '../../formula/formula-syntax';
import { compareValues, toBoolean, toInteger } from '../coercions';
import { errorValue, isDependent, isScalar, Matrix, type Scalar, type Value } from '../evaluated-value';
import { dependentValueRefusal, errorSignal } from '../evaluation-refusal';
import {
  generalFunction,
  lazyFunction,
  scalarFunction,
  type FunctionContext,
  type FunctionTable,
} from '../worksheet-function';

/** One value as such; more than one as an array, to be decided element by element. */
function oneOrMany(value: Value, context: FunctionContext): Scalar | Matrix {
  if (isScalar(value)) {
    return value;
  }
  const matrix = context.matrixOf(value);
  return matrix.values.length === 1 ? matrix.values[0] : matrix;
}

function chooseByCondition(nodes: readonly FormulaNode[], context: FunctionContext): Value {
  const condition = oneOrMany(context.evaluateBranch(nodes[0]), context);
  const branch = (at: number): Value => (at < nodes.length ? context.evaluateBranch(nodes[at]) : false);
  if (!(condition instanceof Matrix)) {
    return branch(toBoolean(condition) ? 1 : 2);
  }
  return context.lift([condition, branch(1), branch(2)], ([decides, yes, no]) =>
    decides instanceof CellError ? decides : toBoolean(decides) ? yes : no,
  );
}

function firstTrue(nodes: readonly FormulaNode[], context: FunctionContext): Value {
  for (let at = 0; at + 1 < nodes.length; at += 2) {
    if (toBoolean(context.scalarOf(context.evaluateBranch(nodes[at])))) {
      return context.evaluateBranch(nodes[at + 1]);
    }
  }
  return errorValue.notAvailable;
}

function choose(nodes: readonly FormulaNode[], context: FunctionContext): Value {
  const choice = oneOrMany(context.evaluateBranch(nodes[0]), context);
  if (!(choice instanceof Matrix)) {
    const at = toInteger(choice);
    return at >= 1 && at < nodes.length ? context.evaluateBranch(nodes[at]) : errorValue.value;
  }
  const options = nodes.slice(1).map((node) => context.evaluateBranch(node));
  return context.lift([choice, ...options], ([which, ...values]) => {
    const at = toInteger(which);
    return at >= 1 && at <= values.length ? values[at - 1] : errorValue.value;
  });
}

function switchOn(nodes: readonly FormulaNode[], context: FunctionContext): Value {
  const wanted = context.scalarOf(context.evaluateBranch(nodes[0]));
  if (wanted instanceof CellError) {
    return wanted;
  }
  let at = 1;
  for (; at + 1 < nodes.length; at += 2) {
    if (compareValues(context.scalarOf(context.evaluateBranch(nodes[at])), wanted) === 0) {
      return context.evaluateBranch(nodes[at + 1]);
    }
  }
  return at < nodes.length ? context.evaluateBranch(nodes[at]) : errorValue.notAvailable;
}

/** An affine form is no error, whatever the decisions are, so it passes. */
function replaceErrors(isReplaced: (error: CellError) => boolean) {
  return lazyFunction(2, 2, (nodes, context) => {
    const value = oneOrMany(context.evaluateBranch(nodes[0]), context);
    const isHit = (scalar: Scalar): boolean => scalar instanceof CellError && isReplaced(scalar);
    if (!(value instanceof Matrix)) {
      return isHit(value) ? context.evaluateBranch(nodes[1]) : value;
    }
    return value.values.some(isHit)
      ? context.lift([value, context.evaluateBranch(nodes[1])], ([scalar, instead]) =>
          isHit(scalar) ? instead : scalar,
        )
      : value;
  });
}

function truthValues(values: readonly Value[], context: FunctionContext): boolean[] {
  const truths: boolean[] = [];
  for (const value of values) {
    context.forEachFilled(value, (element, isCell) => {
      if (element instanceof CellError) {
        throw errorSignal(element);
      }
      if (isDependent(element)) {
        throw dependentValueRefusal('condition');
      }
      if (!(isCell && typeof element === 'string')) {
        truths.push(toBoolean(element));
      }
    });
  }
  if (truths.length === 0) {
    throw errorSignal(errorValue.value);
  }
  return truths;
}

export const conditions: FunctionTable = {
  IF: lazyFunction(1, 3, chooseByCondition),
  IFS: lazyFunction(2, 254, firstTrue),
  CHOOSE: lazyFunction(2, 255, choose),
  SWITCH: lazyFunction(3, 254, switchOn),
  IFERROR: replaceErrors(() => true),
  IFNA: replaceErrors((error) => error === errorValue.notAvailable),
  AND: generalFunction(1, 255, (values, context) => truthValues(values, context).every((truth) => truth)),
  OR: generalFunction(1, 255, (values, context) => truthValues(values, context).some((truth) => truth)),
  XOR: generalFunction(
    1,
    255,
    (values, context) => truthValues(values, context).filter((truth) => truth).length % 2 === 1,
  ),
  NOT: scalarFunction(1, 1, ([value]) => !toBoolean(value)),
  TRUE: scalarFunction(0, 0, () => true),
  FALSE: scalarFunction(0, 0, () => false),
};
