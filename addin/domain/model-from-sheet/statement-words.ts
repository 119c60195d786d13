/**
 * The words a planner types into cells: relations, senses, `free`, and numbers that are only text.
 */
import type { PlanSense, Relation } from './sheet-model';

const relationSpellings = new Map<string, Relation>([
  ['<=', '<='],
  ['=<', '<='],
  ['≤', '<='],
  ['atmost', '<='],
  ['>=', '>='],
  ['=>', '>='],
  ['≥', '>='],
  ['atleast', '>='],
  ['=', '='],
  ['==', '='],
  ['exactly', '='],
]);

const senseSpellings = new Map<string, PlanSense>(
  (['minimise', 'maximise'] as const).flatMap((sense) => [
    [sense, sense],
    [sense.replace('ise', 'ize'), sense],
    [sense.slice(0, 3), sense],
  ]),
);

/** Lower case, no blanks of any kind. */
function condensed(text: string): string {
  return text.replace(/[\s\u00a0\u200b\ufeff]+/g, '').toLowerCase();
}

/** The relation, `strict` for a bare `<` or `>` (which no plan can keep apart from `<=`), undefined for anything else. */
export function readRelation(text: string): Relation | 'strict' | undefined {
  const word = condensed(text);
  return word === '<' || word === '>' ? 'strict' : relationSpellings.get(word);
}

export function readSense(text: string): PlanSense | undefined {
  return senseSpellings.get(condensed(text));
}

/** Whether a lower bound's text says that there is none. */
export function saysFree(text: string): boolean {
  return condensed(text) === 'free';
}

/** Whether a text holds nothing that is seen. */
export function isBlankText(text: string): boolean {
  return condensed(text) === '';
}

/** Whether a text would be taken for an amount by a reader: digits with signs, separators, a currency or percent. */
export function looksLikeNumber(text: string): boolean {
  const bare = condensed(text).replace(/^'/, '');
  return /^[+\-−(]?\p{Sc}?[+\-−]?(\d[\d.,'’]*|[.,]\d+)(e[+-]?\d+)?%?\p{Sc}?\)?$/u.test(bare);
}
