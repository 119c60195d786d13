/**
 * Random workbooks. Their formulas are made together with the affine form that each must have, from rules of algebra
 * alone: the forms read must be those, and the formulas, evaluated at random plans, must give what the forms give.
 * Then one formula in each workbook is spoilt, and must be caught, named, and block exactly what builds on it.
 */
import { MemoryWorkbook, type CellContent } from '../../addin/adapters/memory/memory-workbook';
import { recalculate } from '../../addin/domain/calculation/recalculate';
import { linearize, type Linearization } from '../../addin/domain/linearization/linearize';
import type { AffineForm } from '../../addin/domain/linearization/affine-form';
import { formatCellAddress, type CellAddress } from '../../addin/domain/sheet/cell-address';
import type { WorkbookSnapshot } from '../../addin/domain/sheet/sheet-snapshot';

const workbooksPerSeed = 30;
const seeds = Array.from({ length: 20 }, (_seed, at) => 20_261_201 + at);
const now = 46_358;

/** Constant, then a coefficient a decision. */
type Form = readonly number[];

/** Linear congruential, constants of Knuth and Lewis as in Press et al. (1992), Numerical Recipes, §7.1. */
function randomNumbers(seed: number): { below: (count: number) => number; amount: () => number } {
  let state = seed >>> 0;
  const next = (): number => {
    state = (Math.imul(state, 1_664_525) + 1_013_904_223) >>> 0;
    return state / 2 ** 32;
  };
  return {
    below: (count) => Math.floor(next() * count),
    amount: () => (Math.floor(next() * 41) - 20) / 4,
  };
}
type Random = ReturnType<typeof randomNumbers>;

interface Piece {
  readonly text: string;
  readonly form: Form;
}

const plus = (a: Form, b: Form, sign = 1): Form => a.map((value, at) => value + sign * b[at]);
const times = (a: Form, factor: number): Form => a.map((value) => value * factor);
const over = (a: Form, divisor: number): Form => a.map((value) => value / divisor);
const total = (forms: readonly Form[]): Form => forms.reduce((sum, form) => plus(sum, form));

/**
 * The sheet: decisions in column A, constants in B (numbers) and C (texts), formulas in D, one below another, each
 * building on decisions, constants and earlier formulas.
 */
class RandomSheet {
  readonly cells: Record<string, CellContent> = {};
  readonly forms: Form[] = [];
  /** As typed in column D, without `=`. */
  readonly formulas: string[] = [];
  readonly decisionCount: number;
  private readonly constants: number[] = [];
  private readonly texts: string[] = [];

  constructor(
    private readonly random: Random,
    readonly formulaCount: number,
  ) {
    this.decisionCount = 2 + random.below(7);
    for (let row = 1; row <= 8; row++) {
      this.constants.push(random.amount());
      this.texts.push(['wall', 'floor', 'trim'][random.below(3)]);
      this.cells[`B${row}`] = this.constants[row - 1];
      this.cells[`C${row}`] = this.texts[row - 1];
    }
    for (let row = 1; row <= this.decisionCount; row++) {
      this.cells[`A${row}`] = random.below(3) === 0 ? null : random.below(50);
    }
    for (let row = 1; row <= formulaCount; row++) {
      const { text, form } = this.formula(2);
      this.cells[`D${row}`] = `=${text}`;
      this.forms.push(form);
      this.formulas.push(text);
    }
  }

  get decisions(): CellAddress[] {
    return Array.from({ length: this.decisionCount }, (_cell, row) => ({ sheet: 'Plan', row, column: 0 }));
  }

  get targets(): CellAddress[] {
    return Array.from({ length: this.formulaCount }, (_cell, row) => ({ sheet: 'Plan', row, column: 3 }));
  }

  get workbook(): WorkbookSnapshot {
    const names = { Made: `Plan!$A$1:$A$${this.decisionCount}`, FirstRate: 'Plan!$B$1', Quarter: '0.25' };
    return MemoryWorkbook.of({ sheets: { Plan: this.cells, Other: { A1: '=Plan!A1*2' } }, names }).snapshot();
  }

  private constantForm(value: number): Form {
    return [value, ...new Array<number>(this.decisionCount).fill(0)];
  }

  private decisionForm(decision: number): Form {
    return this.constantForm(0).map((value, at) => (at === decision + 1 ? 1 : value));
  }

  /** A cell that may depend: a decision, or an earlier formula. */
  private cell(): Piece {
    if (this.forms.length > 0 && this.random.below(2) === 0) {
      // Mostly the latest ones, so that chains arise.
      const back = Math.min(this.forms.length, 1 + this.random.below(3));
      const row = this.forms.length - back;
      return { text: this.random.below(2) === 0 ? `D${row + 1}` : `$D$${row + 1}`, form: this.forms[row] };
    }
    const decision = this.random.below(this.decisionCount);
    return { text: `A${decision + 1}`, form: this.decisionForm(decision) };
  }

  /** A run of cells in one column, with their forms. */
  private run(): { readonly text: string; readonly forms: readonly Form[]; readonly first: number } {
    const usesFormulas = this.forms.length > 1 && this.random.below(2) === 0;
    const count = usesFormulas ? this.forms.length : this.decisionCount;
    const length = 1 + this.random.below(Math.min(count, 8));
    const first = usesFormulas ? count - length : this.random.below(Math.min(count - length, 8 - length) + 1);
    const forms = Array.from({ length }, (_form, at) =>
      usesFormulas ? this.forms[first + at] : this.decisionForm(first + at),
    );
    const letter = usesFormulas ? 'D' : 'A';
    return { text: `${letter}${first + 1}:${letter}${first + length}`, forms, first };
  }

  private constant(): { readonly text: string; readonly value: number } {
    const row = this.random.below(8);
    switch (this.random.below(5)) {
      case 0:
        return { text: `B${row + 1}`, value: this.constants[row] };
      case 1:
        return { text: `MAX(B${row + 1},1)`, value: Math.max(this.constants[row], 1) };
      case 2:
        return { text: 'Quarter', value: 0.25 };
      case 3:
        return { text: 'FirstRate', value: this.constants[0] };
      default: {
        const value = this.random.amount();
        return { text: value < 0 ? `(${value})` : String(value), value };
      }
    }
  }

  private formula(depth: number): Piece {
    if (depth === 0) {
      return this.cell();
    }
    const inner = (): Piece => this.formula(depth - 1);
    switch (this.random.below(21)) {
      case 0: {
        const [a, b] = [inner(), inner()];
        return { text: `${a.text}+${b.text}`, form: plus(a.form, b.form) };
      }
      case 1: {
        const [a, b] = [inner(), inner()];
        return { text: `${a.text}-(${b.text})`, form: plus(a.form, b.form, -1) };
      }
      case 2: {
        const [a, c] = [inner(), this.constant()];
        return { text: `(${a.text})*${c.text}`, form: times(a.form, c.value) };
      }
      case 3: {
        const [a, c] = [inner(), this.constant()];
        return { text: `${c.text}*(${a.text})`, form: times(a.form, c.value) };
      }
      case 4: {
        const divisor = 1 + this.random.below(9);
        const a = inner();
        return { text: `(${a.text})/${divisor}`, form: over(a.form, divisor) };
      }
      case 5: {
        const a = inner();
        return { text: `-(${a.text})%`, form: over(times(a.form, -1), 100) };
      }
      case 6: {
        const [a, c] = [inner(), this.constant()];
        return { text: `${c.text}-(${a.text})`, form: plus(this.constantForm(c.value), a.form, -1) };
      }
      case 7: {
        const [range, c] = [this.run(), this.constant()];
        const sum = plus(total(range.forms), this.constantForm(c.value));
        return { text: `SUM(${range.text},${c.text})`, form: sum };
      }
      case 8: {
        const range = this.run();
        return { text: `AVERAGE(${range.text})`, form: over(total(range.forms), range.forms.length) };
      }
      case 9: {
        const range = this.run();
        const factors = range.forms.map(() => this.random.amount());
        const form = total(range.forms.map((each, at) => times(each, factors[at])));
        return { text: `SUMPRODUCT(${range.text},{${factors.join(';')}})`, form };
      }
      case 10: {
        const range = this.run();
        const factors = range.forms.map(() => this.random.amount());
        const form = total(range.forms.map((each, at) => times(each, factors[at])));
        return { text: `SUM(MMULT({${factors.join(',')}},${range.text}))`, form };
      }
      case 11: {
        const range = this.run();
        const at = this.random.below(range.forms.length);
        return { text: `INDEX(${range.text},${at + 1})`, form: range.forms[at] };
      }
      case 12: {
        const [a, b] = [inner(), inner()];
        const row = this.random.below(8);
        const holds = this.constants[row] > 0;
        return { text: `IF(B${row + 1}>0,${a.text},${b.text})`, form: holds ? a.form : b.form };
      }
      case 13: {
        const [a, b] = [inner(), inner()];
        const which = this.random.below(2);
        return { text: `CHOOSE(${which + 1},${a.text},${b.text})`, form: [a, b][which].form };
      }
      case 14: {
        const a = inner();
        return { text: `IFERROR(${a.text},0)`, form: a.form };
      }
      case 15: {
        const [a, c] = [inner(), this.constant()];
        return {
          text: `LET(x,${a.text},x*${c.text}+x)`,
          form: plus(times(a.form, c.value), a.form),
        };
      }
      case 16: {
        const count = Math.min(this.decisionCount, 8);
        const wanted = this.texts[this.random.below(8)];
        const chosen = Array.from({ length: count }, (_form, at) => at).filter(
          (at) => this.texts[at] === wanted,
        );
        const form = total([this.constantForm(0), ...chosen.map((at) => this.decisionForm(at))]);
        return { text: `SUMIF(C1:C${count},"${wanted}",A1:A${count})`, form };
      }
      case 17: {
        const form = total(this.decisions.map((_cell, at) => this.decisionForm(at)));
        return { text: 'SUM(Made)', form };
      }
      case 18: {
        const at = this.random.below(this.decisionCount);
        return { text: `OFFSET(A1,${at},0)`, form: this.decisionForm(at) };
      }
      case 19:
        return { text: 'Other!A1', form: times(this.decisionForm(0), 2) };
      default: {
        const a = inner();
        return { text: `N(${a.text})+0*(${a.text})`, form: a.form };
      }
    }
  }
}

function writtenOut(form: AffineForm, { definingRows }: Linearization, decisionCount: number): number[] {
  const dense = new Array<number>(decisionCount + 1).fill(0);
  const pending: [AffineForm, number][] = [[form, 1]];
  for (let next = pending.pop(); next !== undefined; next = pending.pop()) {
    const [part, factor] = next;
    dense[0] += factor * part.constant;
    part.variables.forEach((variable, at) => {
      const coefficient = factor * part.coefficients[at];
      if (variable < decisionCount) {
        dense[variable + 1] += coefficient;
      } else {
        pending.push([definingRows[variable - decisionCount].form, coefficient]);
      }
    });
  }
  return dense;
}

/** Relative to the largest number of the form expected: what rounding in two orders makes of it. */
const tolerance = 1e-9;

function largest(values: readonly number[]): number {
  return values.reduce((size, value) => Math.max(size, Math.abs(value)), 1);
}

function expectForm(actual: readonly number[], expected: Form): void {
  const gap = largest(expected) * tolerance;
  actual.forEach((value, term) => expect(Math.abs(value - expected[term])).toBeLessThanOrEqual(gap));
}

describe.each(seeds)('seed %d', (seed) => {
  const random = randomNumbers(seed);
  const sheets = Array.from(
    { length: workbooksPerSeed },
    () => new RandomSheet(random, 4 + random.below(24)),
  );

  it('every formula has the form that algebra gives it', () => {
    for (const sheet of sheets) {
      const { decisions, targets, workbook, decisionCount } = sheet;
      const linearization = linearize({ workbook, decisions, targets, now });
      linearization.readings.forEach((reading, at) => {
        if (reading.kind !== 'affine') {
          throw new Error(`${sheet.formulas[at]}: ${JSON.stringify(reading)}`);
        }
        expectForm(writtenOut(reading.form, linearization, decisionCount), sheet.forms[at]);
      });
    }
  });

  it('recalculated at a random plan, every formula gives what its form gives', () => {
    for (const sheet of sheets) {
      const plan = sheet.decisions.map(() => random.amount() * 7);
      const changes = new Map(sheet.decisions.map((cell, at) => [formatCellAddress(cell), plan[at]]));
      const { values, notRecalculated } = recalculate(sheet.workbook, changes, now);
      expect(notRecalculated).toEqual([]);
      const byCell = new Map(values.map(({ cell, value }) => [formatCellAddress(cell), value]));
      sheet.targets.forEach((cell, at) => {
        const form = sheet.forms[at];
        const terms = [form[0], ...plan.map((value, decision) => value * form[decision + 1])];
        const expected = terms.reduce((sum, term) => sum + term, 0);
        const value = byCell.get(formatCellAddress(cell));
        expect(Math.abs((value as number) - expected)).toBeLessThanOrEqual(
          tolerance * largest([...form, ...terms]),
        );
      });
    }
  });

  it('a formula that is spoilt is caught and named, and nothing that builds on it is read', () => {
    for (const sheet of sheets) {
      const row = random.below(sheet.formulaCount) + 1;
      const [text, by] = spoilt[random.below(spoilt.length)];
      const cells = { ...sheet.cells, [`D${row}`]: `=(${sheet.formulas[row - 1]})+${text}` };
      const workbook = MemoryWorkbook.of({
        sheets: { Plan: cells, Other: { A1: '=Plan!A1*2' } },
        names: { Made: `Plan!$A$1:$A$${sheet.decisionCount}`, FirstRate: 'Plan!$B$1', Quarter: '0.25' },
      }).snapshot();
      const linearization = linearize({ workbook, decisions: sheet.decisions, targets: sheet.targets, now });
      linearization.readings.forEach((reading, at) => {
        if (at + 1 === row) {
          expect(reading).toMatchObject({
            kind: 'refused',
            issues: [{ code: 'not-affine', cell: sheet.targets[at], facts: { by } }],
          });
        } else if (reading.kind === 'refused') {
          expect(at + 1).toBeGreaterThan(row);
          expect(reading.issues).toMatchObject([{ cell: sheet.targets[row - 1] }]);
        } else {
          // It does not build on the spoilt cell, so that its form is what it was.
          expect(reading.kind).toBe('affine');
          const form = (reading as Extract<typeof reading, { kind: 'affine' }>).form;
          expectForm(writtenOut(form, linearization, sheet.decisionCount), sheet.forms[at]);
        }
      });
    }
  });
});

/** What spoils a formula, and the operator or function that must be named. */
const spoilt: readonly (readonly [string, string])[] = [
  ['A1*A2', '*'],
  ['A1/A2', '/'],
  ['A1^2', '^'],
  ['(A1>3)', '>'],
  ['IF(A2,1,2)', 'IF'],
  ['MAX(A1,A2)', 'MAX'],
  ['MIN(Made)', 'MIN'],
  ['ROUND(A1,0)', 'ROUND'],
  ['INT(A2)', 'INT'],
  ['ABS(A1)', 'ABS'],
  ['COUNT(Made)', 'COUNT'],
  ['COUNTIF(Made,">0")', 'COUNTIF'],
  ['SUMIF(Made,">0")', 'SUMIF'],
  ['SUMPRODUCT(Made,Made)', 'SUMPRODUCT'],
  ['SUMSQ(Made)', 'SUMSQ'],
  ['LEN(A1)', 'LEN'],
  ['VALUE(A1&"")', '&'],
  ['MATCH(1,Made,0)', 'MATCH'],
  ['MOD(A1,2)', 'MOD'],
  ['LARGE(Made,1)', 'LARGE'],
  ['STDEV.P(Made)', 'STDEV.P'],
  ['ISNUMBER(A1)', 'ISNUMBER'],
  ['INDEX(B1:B8,A1)', 'INDEX'],
  ['N(A1=A2)', '='],
];
