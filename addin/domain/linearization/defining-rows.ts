/**
 * Cells that many others build on, kept as free variables with a defining row.
 *
 * Stock this week = stock last week + made − sold: written out in decisions, week 5,000 has 10,000 terms, and all
 * weeks together 50 million. So a cell whose form grows long is not written out again in the next cell; it is named
 * by a variable of its own, and `variable = form` becomes a row. Such a variable is nobody's decision and its row
 * nobody's constraint row; neither is ever shown.
 *
 * When: while formulas are read, every form of more than `longFormTerms` terms is named. Once all are read, a name
 * that is used only once is written out after all where it is used, so that a row of 500 coefficients used in one
 * place is just that row. What is used twice or more stays. Then all forms together have at most as many terms as the
 * formulas have references, whatever the chains.
 */
import type { CellAddress } from '../sheet/cell-address';
import { AffineForm } from './affine-form';

/** A cell turned into a free variable with a defining row: variable = form. */
export interface DefiningRow {
  readonly variable: number;
  /** The cell whose formula gives the form; of a running total the formula may hold more than the sum named here. */
  readonly cell: CellAddress;
  readonly form: AffineForm;
}

/** Forms of more terms than this are named. Small ones are written out wherever they are used. */
export const longFormTerms = 8;

export class NamedForms {
  private readonly cells: (() => CellAddress)[] = [];
  private readonly forms: AffineForm[] = [];

  /** @param decisionCount variables below are decisions, from here on names */
  constructor(private readonly decisionCount: number) {}

  /** How many forms are named so far. */
  get count(): number {
    return this.forms.length;
  }

  /** The form itself where it is short, otherwise its name. */
  nameIfLong(form: AffineForm, cell: () => CellAddress): AffineForm {
    if (form.variables.length <= longFormTerms) {
      return form;
    }
    this.cells.push(cell);
    this.forms.push(form);
    return AffineForm.variable(this.decisionCount + this.forms.length - 1);
  }

  /** The forms of all that is asked for, and the rows they need. Names that stay are numbered from decisionCount on. */
  settle(wanted: readonly AffineForm[]): {
    readonly forms: readonly AffineForm[];
    readonly rows: readonly DefiningRow[];
  } {
    const uses = this.countUses(wanted);
    const numbers = new Int32Array(this.forms.length).fill(-1);
    let count = this.decisionCount;
    uses.forEach((use, at) => {
      if (use > 1) {
        numbers[at] = count++;
      }
    });
    const rows: DefiningRow[] = [];
    numbers.forEach((variable, at) => {
      if (variable >= 0) {
        rows.push({ variable, cell: this.cells[at](), form: this.writtenOut(this.forms[at], numbers) });
      }
    });
    return { forms: wanted.map((form) => this.writtenOut(form, numbers)), rows };
  }

  /** How often each name stands in what is wanted, or in a form whose name is itself used. */
  private countUses(wanted: readonly AffineForm[]): Int32Array {
    const uses = new Int32Array(this.forms.length);
    const pending = [...wanted];
    while (pending.length > 0) {
      const form = pending.pop()!;
      for (const variable of form.variables) {
        const at = variable - this.decisionCount;
        if (at >= 0 && uses[at]++ === 0) {
          pending.push(this.forms[at]);
        }
      }
    }
    return uses;
  }

  /**
   * A form with its names written out, those with a number apart. A name without one is used once in all, so that no
   * form is written out twice.
   */
  private writtenOut(form: AffineForm, numbers: Int32Array): AffineForm {
    const last = form.variables.length - 1;
    if (last < 0 || form.variables[last] < this.decisionCount) {
      return form;
    }
    let constant = 0;
    const terms = new Map<number, number>();
    const pending: { readonly form: AffineForm; readonly factor: number }[] = [{ form, factor: 1 }];
    while (pending.length > 0) {
      const { form: next, factor } = pending.pop()!;
      constant += factor * next.constant;
      for (let at = 0; at < next.variables.length; at++) {
        const variable = next.variables[at];
        const coefficient = factor * next.coefficients[at];
        const name = variable - this.decisionCount;
        if (name >= 0 && numbers[name] < 0) {
          pending.push({ form: this.forms[name], factor: coefficient });
        } else {
          const kept = name < 0 ? variable : numbers[name];
          terms.set(kept, (terms.get(kept) ?? 0) + coefficient);
        }
      }
    }
    return AffineForm.fromTerms(constant, terms);
  }
}
