/**
 * LinearProgram → MPS text in the free form, for bug reports and for checks with other solvers.
 *
 * Reading the text again gives the same problem, with these exceptions, which the format forces:
 *   - names are made fit: every character but printable ASCII becomes an underscore, what then repeats is numbered;
 *   - a finite bound of magnitude 1e30 or more is read as infinite;
 *   - the far end of a ranged row is stated by its distance from the near end; where no double added to one end gives
 *     the other, it comes back one unit in the last place off.
 * Numbers are written with as many digits as it takes to read the same double again.
 */
import type { LinearProgram } from '../linear-program/linear-program';
import { mpsInfinity } from './mps-statement';

/** The problem as MPS text that ends with a line feed. */
export function writeMps(problem: LinearProgram): string {
  const lines: string[] = [];
  const rowNames = fitNames([problem.objectiveName, ...problem.rowNames]);
  const columnNames = fitNames(problem.columnNames);
  const rows = problem.rowNames.map((_, row) => stateRow(problem.rowLower[row], problem.rowUpper[row]));

  lines.push(`NAME ${fitName(problem.name)}`.trimEnd());
  if (problem.sense === 'maximise') {
    lines.push('OBJSENSE', ' MAX');
  }
  lines.push('ROWS', ` N ${rowNames[0]}`);
  rows.forEach(({ type }, row) => lines.push(` ${type} ${rowNames[row + 1]}`));
  writeColumns(lines, problem, rowNames, columnNames);

  lines.push('RHS');
  if (problem.objectiveConstant !== 0) {
    lines.push(` RHS ${rowNames[0]} ${-problem.objectiveConstant}`);
  }
  rows.forEach(({ rightSide }, row) => {
    if (rightSide !== 0) {
      lines.push(` RHS ${rowNames[row + 1]} ${rightSide}`);
    }
  });

  const ranges = rows.flatMap(({ range }, row) =>
    range === undefined ? [] : [` RANGE ${rowNames[row + 1]} ${range}`],
  );
  if (ranges.length > 0) {
    lines.push('RANGES', ...ranges);
  }
  const bounds = columnNames.flatMap((name, column) =>
    stateBounds(problem, column).map(
      ({ type, value }) => ` ${type} BOUND ${name}${value === undefined ? '' : ` ${value}`}`,
    ),
  );
  if (bounds.length > 0) {
    lines.push('BOUNDS');
    // One by one: a spread of all would exceed what a call can take.
    for (const bound of bounds) {
      lines.push(bound);
    }
  }
  lines.push('ENDATA', '');
  return lines.join('\n');
}

function writeColumns(
  lines: string[],
  problem: LinearProgram,
  rowNames: readonly string[],
  columnNames: readonly string[],
): void {
  const { columnStart, rowIndex, value } = problem.matrix;
  let isBetweenMarkers = false;
  let markerCount = 0;
  const setMarker = (isInteger: boolean): void => {
    if (isInteger !== isBetweenMarkers) {
      lines.push(` MARKER${++markerCount} 'MARKER' ${isInteger ? "'INTORG'" : "'INTEND'"}`);
      isBetweenMarkers = isInteger;
    }
  };

  lines.push('COLUMNS');
  for (let column = 0; column < problem.columnCount; column++) {
    setMarker(problem.isInteger[column] === 1);
    const start = columnStart[column];
    const end = columnStart[column + 1];
    // A column without entries still needs a line that names it: its cost, even of 0.
    if (problem.cost[column] !== 0 || start === end) {
      lines.push(` ${columnNames[column]} ${rowNames[0]} ${problem.cost[column]}`);
    }
    for (let entry = start; entry < end; entry++) {
      lines.push(` ${columnNames[column]} ${rowNames[rowIndex[entry] + 1]} ${value[entry]}`);
    }
  }
  setMarker(false);
}

interface StatedRow {
  readonly type: 'L' | 'G' | 'E';
  readonly rightSide: number;
  readonly range: number | undefined;
}

function stateRow(lower: number, upper: number): StatedRow {
  if (lower === upper) {
    return { type: 'E', rightSide: upper, range: undefined };
  }
  if (lower === -Infinity) {
    // A free row is an L row without an end; as a further N row it would be left out by readers.
    return { type: 'L', rightSide: upper === Infinity ? mpsInfinity : upper, range: undefined };
  }
  if (upper === Infinity) {
    return { type: 'G', rightSide: lower, range: undefined };
  }
  return stateRangedRow(lower, upper);
}

/** From the end and with the distance that give back the other end exactly, if any do. */
function stateRangedRow(lower: number, upper: number): StatedRow {
  const distance = upper - lower;
  for (const range of [distance, distance * (1 - Number.EPSILON), distance * (1 + Number.EPSILON)]) {
    if (lower + range === upper) {
      return { type: 'G', rightSide: lower, range };
    }
    if (upper - range === lower) {
      return { type: 'L', rightSide: upper, range };
    }
  }
  return { type: 'G', rightSide: lower, range: distance };
}

interface StatedBound {
  readonly type: 'LO' | 'UP' | 'FX' | 'FR' | 'MI' | 'PL';
  readonly value: number | undefined;
}

function stateBounds(problem: LinearProgram, column: number): readonly StatedBound[] {
  const lower = problem.columnLower[column];
  const upper = problem.columnUpper[column];
  if (lower === upper) {
    return [{ type: 'FX', value: lower }];
  }
  if (lower === -Infinity && upper === Infinity) {
    return [{ type: 'FR', value: undefined }];
  }
  const bounds: StatedBound[] = [];
  if (lower === -Infinity) {
    bounds.push({ type: 'MI', value: undefined });
  } else if (lower !== 0) {
    bounds.push({ type: 'LO', value: lower });
  }
  if (upper !== Infinity) {
    bounds.push({ type: 'UP', value: upper });
  } else if (problem.isInteger[column] === 1) {
    // Said outright: a whole-number column without bounds would be read as one between 0 and 1.
    bounds.push({ type: 'PL', value: undefined });
  }
  return bounds;
}

/** Names without blanks or characters beyond ASCII, each once. */
function fitNames(names: readonly string[]): readonly string[] {
  const taken = new Set<string>();
  const timesMade = new Map<string, number>();
  return names.map((name) => {
    const base = fitName(name) || '_';
    let fit = base;
    while (taken.has(fit)) {
      const times = (timesMade.get(base) ?? 1) + 1;
      timesMade.set(base, times);
      fit = `${base}_${times}`;
    }
    taken.add(fit);
    return fit;
  });
}

/** Long enough for any name a person gives, short enough for every reader. */
const longestName = 240;

function fitName(name: string): string {
  return name.replace(/[^!-~]/g, '_').slice(0, longestName);
}
