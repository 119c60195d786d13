/**
 * Questions about values. None of them may be asked of a number that depends on decisions, N apart.
 */
import { CellError } from '../../sheet/cell-value';
import { toInteger } from '../coercions';
import { errorValue, isDependent, type Scalar } from '../evaluated-value';
import { dependentValueRefusal } from '../evaluation-refusal';
import { scalarFunction, type FunctionTable } from '../worksheet-function';

function question(answer: (value: Scalar) => boolean) {
  return scalarFunction(1, 1, ([value]) => {
    if (isDependent(value)) {
      throw dependentValueRefusal();
    }
    return answer(value);
  });
}

export const information: FunctionTable = {
  ISNUMBER: question((value) => typeof value === 'number'),
  ISTEXT: question((value) => typeof value === 'string'),
  ISNONTEXT: question((value) => typeof value !== 'string'),
  ISLOGICAL: question((value) => typeof value === 'boolean'),
  ISBLANK: question((value) => value === null),
  ISERROR: question((value) => value instanceof CellError),
  ISERR: question((value) => value instanceof CellError && value !== errorValue.notAvailable),
  ISNA: question((value) => value === errorValue.notAvailable),
  ISEVEN: scalarFunction(1, 1, ([value]) => toInteger(value) % 2 === 0),
  ISODD: scalarFunction(1, 1, ([value]) => toInteger(value) % 2 !== 0),
  NA: scalarFunction(0, 0, () => errorValue.notAvailable),
  /** A number stays itself, also one that depends on decisions; TRUE is 1, everything else 0. */
  N: scalarFunction(1, 1, ([value]) => {
    if (typeof value === 'number' || value instanceof CellError || isDependent(value)) {
      return value;
    }
    return value === true ? 1 : 0;
  }),
  T: scalarFunction(1, 1, ([value]) =>
    typeof value === 'string' || value instanceof CellError ? value : '',
  ),
};
