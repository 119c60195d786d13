/**
 * How large an array may get.
 */
import { EvaluationRefusal } from './evaluation-refusal';

/** More cells than this are not held in one array: a formula's slip, such as SEQUENCE(1E9), must not end the program. */
export const maximumArrayCells = 4_000_000;

/** @throws EvaluationRefusal array-too-large */
export function refuseTooLarge(cellCount: number): void {
  if (cellCount > maximumArrayCells) {
    throw new EvaluationRefusal({ code: 'array-too-large' });
  }
}
