/**
 * Small seeded random problems, of kinds shaped to hit the corners of a simplex code.
 *
 * All numbers are binary fractions of few digits, so that the sums around which right sides are laid are exact and
 * the exact oracle means the same problem as everyone else. The kind `decimal` alone has tenths, whose sums are
 * rounded: there an equation too many can be impossible by the last bit, which only an exact oracle would see.
 * In `ill-scaled` every row and column has a unit of its own, from 2^−12 to 2^12 times the plain one.
 */
import type { LinearProgram } from '../../solver-core/linear-program/linear-program';
import { LinearProgramBuilder } from '../../solver-core/linear-program/linear-program-builder';
import { SeededRandom } from '../../solver-core/numerics/seeded-random';

export const randomKinds = [
  'boxed',
  'free',
  'ranged',
  'degenerate',
  'infeasible',
  'unbounded',
  'fixed',
  'equality',
  'ill-scaled',
  'mixed',
  'decimal',
] as const;

/** `wild`, apart from the others: entries of sizes from 2^−16 to 2^16 without rhyme, which no scaling can mend. */
export type RandomKind = (typeof randomKinds)[number] | 'wild';

/**
 * A problem of up to 12 rows and 14 columns with coefficients of few digits. `infeasible` and `unbounded` only lean
 * that way; what each truly is, the oracles say.
 */
export function randomLinearProgram(seed: number, kind: RandomKind): LinearProgram {
  const random = new SeededRandom(seed);
  const columnCount = random.nextInteger(1, 14);
  const rowCount = random.nextInteger(kind === 'boxed' ? 0 : 1, 12);
  const density = random.pick([0.3, 0.5, 0.8, 1]);
  const builder = new LinearProgramBuilder({ sense: random.pick(['minimise', 'maximise']) });
  builder.objectiveConstant = random.pick([0, 0, 12.5]);
  const parts = kind === 'decimal' ? 10 : 8;
  const fraction = (): number => random.nextInteger(-9 * parts, 9 * parts) / parts;
  const unit = (): number => (kind === 'ill-scaled' ? 2 ** random.nextInteger(-12, 12) : 1);
  const coefficient = (): number => {
    if (kind === 'degenerate') return random.pick([-1, 1, 1, 2]);
    const value = random.pick([fraction(), random.nextInteger(1, 9)]);
    return kind === 'wild' ? value * 2 ** random.nextInteger(-16, 16) : value;
  };

  // Right sides are laid around a point, so that most kinds are feasible.
  const point: number[] = [];
  const columnUnits: number[] = [];
  for (let column = 0; column < columnCount; column++) {
    const { lower, upper } = randomBounds(random, kind);
    const least = Math.max(lower, -10);
    const greatest = Math.max(least, Math.min(upper, least + 10));
    const place = random.nextInteger(Math.ceil(least), Math.max(Math.ceil(least), Math.floor(greatest)));
    const cost =
      kind === 'degenerate'
        ? random.nextInteger(-2, 2)
        : random.pick([0, fraction(), random.nextInteger(-9, 9)]);
    const columnUnit = unit();
    columnUnits.push(columnUnit);
    point.push(Math.min(place, upper) / columnUnit);
    builder.addColumn({ cost: cost * columnUnit, lower: lower / columnUnit, upper: upper / columnUnit });
  }
  for (let row = 0; row < rowCount; row++) {
    let activity = 0;
    const entries: [number, number][] = [];
    const rowUnit = unit();
    for (let column = 0; column < columnCount; column++) {
      if (random.next() >= density) continue;
      const value = coefficient() * columnUnits[column] * rowUnit;
      entries.push([column, value]);
      activity += value * point[column];
    }
    const slack = kind === 'degenerate' ? 0 : random.pick([0, random.nextInteger(0, 20)]);
    const shift = kind === 'infeasible' ? random.pick([0, -random.nextInteger(1, 60)]) : 0;
    const { lower, upper } = randomRow(random, kind, activity / rowUnit, slack, shift);
    const place = builder.addRow({ lower: lower * rowUnit, upper: upper * rowUnit });
    entries.forEach(([column, value]) => builder.addEntry(place, column, value));
  }
  return builder.build();
}

function randomBounds(random: SeededRandom, kind: RandomKind): { lower: number; upper: number } {
  const low = random.nextInteger(-6, 4);
  const high = low + random.nextInteger(0, 12);
  const above = { lower: random.pick([0, 0, low]), upper: Infinity };
  switch (kind) {
    case 'boxed':
    case 'wild':
      return { lower: low, upper: high };
    case 'free':
      return random.pick([{ lower: -Infinity, upper: Infinity }, above]);
    case 'fixed':
      return random.pick([{ lower: low, upper: low }, { lower: low, upper: high }, above]);
    case 'unbounded':
      return random.pick([
        above,
        above,
        { lower: -Infinity, upper: high },
        { lower: -Infinity, upper: Infinity },
      ]);
    case 'degenerate':
      return random.pick([
        { lower: 0, upper: Infinity },
        { lower: 0, upper: 1 },
      ]);
    case 'ill-scaled':
    case 'mixed':
      return random.pick([
        above,
        { lower: low, upper: high },
        { lower: low, upper: low },
        { lower: -Infinity, upper: high },
        { lower: -Infinity, upper: Infinity },
      ]);
    default:
      return random.pick([above, { lower: low, upper: high }]);
  }
}

/** A row around an activity: the point stays within unless `shift` moves the right side past it. */
function randomRow(
  random: SeededRandom,
  kind: RandomKind,
  activity: number,
  slack: number,
  shift: number,
): { lower: number; upper: number } {
  const atMost = { lower: -Infinity, upper: activity + slack + shift };
  const atLeast = { lower: activity - slack - shift, upper: Infinity };
  const equation = { lower: activity + shift, upper: activity + shift };
  const ranged = { lower: activity - slack, upper: activity + random.nextInteger(0, 9) };
  switch (kind) {
    case 'ranged':
      return random.pick([ranged, ranged, atMost]);
    case 'equality':
      return random.pick([equation, equation, atMost]);
    case 'ill-scaled':
    case 'mixed':
      return random.pick([atMost, atLeast, equation, ranged, { lower: -Infinity, upper: Infinity }]);
    case 'unbounded':
      return random.pick([atMost, atLeast]);
    default:
      return random.pick([atMost, atLeast, atMost, equation]);
  }
}
