/**
 * Small problems as text that a reader can solve by hand:
 *
 *     maximise 30 plates + 50 bowls + 7
 *     press:  2 plates + bowls <= 40
 *     kiln:   10 <= plates + 3 bowls <= 60
 *     plates <= 12
 *     -5 <= bowls <= 5
 *     stock free
 *     whole plates, bowls
 *
 * The first line is the objective. A line with a label is a row; one without states bounds of a single column.
 * Columns come in the order in which they are first named; they lie above 0 unless bounds say otherwise.
 */
import type { LinearProgram } from '../../solver-core/linear-program/linear-program';
import { LinearProgramBuilder } from '../../solver-core/linear-program/linear-program-builder';

interface Expression {
  readonly terms: readonly (readonly [column: string, coefficient: number])[];
  readonly constant: number;
}

interface Bounds {
  lower: number;
  upper: number;
}

/** @throws Error at a line that is not in the notation */
export function lp(text: string): LinearProgram {
  const lines = text
    .split('\n')
    .map((line) => line.trim())
    .filter((line) => line !== '');
  const objectiveLine = /^(minimise|maximise)\b(.*)$/.exec(lines[0] ?? '');
  if (objectiveLine === null) {
    throw new Error(`The first line must be an objective: ${lines[0]}`);
  }
  const objective = parseExpression(objectiveLine[2]);
  const columns = new Map<string, Bounds>();
  const boundsOf = (name: string): Bounds => {
    const known = columns.get(name) ?? { lower: 0, upper: Infinity };
    columns.set(name, known);
    return known;
  };
  objective.terms.forEach(([name]) => boundsOf(name));

  const rows: { name: string; expression: Expression; bounds: Bounds }[] = [];
  const wholeColumns = new Set<string>();
  for (const line of lines.slice(1)) {
    const row = /^(\w+)\s*:(.*)$/.exec(line);
    const free = /^(\w+)\s+free$/.exec(line);
    const whole = /^whole\s+(.*)$/.exec(line);
    if (row !== null) {
      const [expression, bounds] = parseRelations(row[2]);
      expression.terms.forEach(([name]) => boundsOf(name));
      rows.push({ name: row[1], expression, bounds });
    } else if (free !== null) {
      Object.assign(boundsOf(free[1]), { lower: -Infinity, upper: Infinity });
    } else if (whole !== null) {
      whole[1].split(',').forEach((name) => wholeColumns.add(name.trim()));
    } else {
      const [expression, bounds] = parseRelations(line);
      if (expression.terms.length !== 1 || expression.terms[0][1] !== 1) {
        throw new Error(`A line without a label states bounds of one column: ${line}`);
      }
      const known = boundsOf(expression.terms[0][0]);
      if (bounds.lower > -Infinity) known.lower = bounds.lower;
      if (bounds.upper < Infinity) known.upper = bounds.upper;
    }
  }

  const builder = new LinearProgramBuilder({ sense: objectiveLine[1] as 'minimise' | 'maximise' });
  builder.objectiveConstant = objective.constant;
  const costs = new Map<string, number>();
  objective.terms.forEach(([name, cost]) => costs.set(name, (costs.get(name) ?? 0) + cost));
  const place = new Map<string, number>();
  for (const [name, { lower, upper }] of columns) {
    const isInteger = wholeColumns.has(name);
    place.set(name, builder.addColumn({ name, cost: costs.get(name) ?? 0, lower, upper, isInteger }));
  }
  for (const { name, expression, bounds } of rows) {
    const { constant } = expression;
    const row = builder.addRow({ name, lower: bounds.lower - constant, upper: bounds.upper - constant });
    expression.terms.forEach(([column, coefficient]) =>
      builder.addEntry(row, place.get(column)!, coefficient),
    );
  }
  return builder.build();
}

/** `10 <= a + b <= 60`, `a >= 3` or `a = 3`: the expression and what it must lie between. */
function parseRelations(text: string): [Expression, Bounds] {
  const parts = text.split(/(<=|>=|=)/).map((part) => part.trim());
  const bounds: Bounds = { lower: -Infinity, upper: Infinity };
  if (parts.length === 3) {
    applyRelation(bounds, parts[1], parseNumber(parts[2]));
    return [parseExpression(parts[0]), bounds];
  }
  if (parts.length === 5 && parts[1] === '<=' && parts[3] === '<=') {
    return [parseExpression(parts[2]), { lower: parseNumber(parts[0]), upper: parseNumber(parts[4]) }];
  }
  throw new Error(`Not a relation: ${text}`);
}

function applyRelation(bounds: Bounds, relation: string, rightSide: number): void {
  if (relation !== '<=') bounds.lower = rightSide;
  if (relation !== '>=') bounds.upper = rightSide;
}

function parseExpression(text: string): Expression {
  const terms: [string, number][] = [];
  let constant = 0;
  const rest = text.replace(
    /([+-]?)\s*(\d*\.?\d+(?:e[+-]?\d+)?)?\s*([a-z]\w*)?/gi,
    (whole, sign, digits, name) => {
      if (String(whole).trim() === '') {
        return '';
      }
      const value = (sign === '-' ? -1 : 1) * (digits === undefined ? 1 : Number(digits));
      if (name === undefined) {
        constant += value;
      } else {
        terms.push([String(name), value]);
      }
      return '';
    },
  );
  if (rest.trim() !== '') {
    throw new Error(`Not an expression: ${text}`);
  }
  return { terms, constant };
}

function parseNumber(text: string): number {
  const value = Number(text);
  if (text === '' || Number.isNaN(value)) {
    throw new Error(`Not a number: ${text}`);
  }
  return value;
}
