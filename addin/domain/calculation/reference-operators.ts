/**
 * The operators between references: the rectangle around both (`:`), both together (`,`), what both hold (a blank).
 */
import { CellError } from '../sheet/cell-value';
import type { BinaryNode, ReferenceOperator } from '../formula/formula-syntax';
import { errorValue, Reference, type Area, type Value } from './evaluated-value';

export function isReferenceOperator(operator: BinaryNode['operator']): operator is ReferenceOperator {
  return operator === ':' || operator === ',' || operator === ' ';
}

export function combineReferences(operator: ReferenceOperator, left: Value, right: Value): Value {
  for (const side of [left, right]) {
    if (side instanceof CellError) {
      return side;
    }
  }
  if (!(left instanceof Reference) || !(right instanceof Reference)) {
    return errorValue.value;
  }
  if (operator === ',') {
    return new Reference([...left.areas, ...right.areas]);
  }
  const [first] = left.areas;
  const [second] = right.areas;
  if (first.grid !== second.grid) {
    return errorValue.value;
  }
  if (operator === ':') {
    const all = [...left.areas, ...right.areas];
    return new Reference([
      {
        grid: first.grid,
        top: Math.min(...all.map((area) => area.top)),
        left: Math.min(...all.map((area) => area.left)),
        bottom: Math.max(...all.map((area) => area.bottom)),
        right: Math.max(...all.map((area) => area.right)),
      },
    ]);
  }
  const shared: Area = {
    grid: first.grid,
    top: Math.max(first.top, second.top),
    left: Math.max(first.left, second.left),
    bottom: Math.min(first.bottom, second.bottom),
    right: Math.min(first.right, second.right),
  };
  return shared.top > shared.bottom || shared.left > shared.right
    ? errorValue.noIntersection
    : new Reference([shared]);
}
