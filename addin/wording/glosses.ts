/**
 * The trade's words that a planner may not know, each with a gloss of at most six words that stands beside it.
 */
export type GlossedTerm =
  | 'decision cell'
  | 'objective'
  | 'left side'
  | 'right side'
  | 'lower bound'
  | 'upper bound'
  | 'lot'
  | 'least run'
  | 'optimum'
  | 'before'
  | 'slack'
  | 'dual value'
  | 'reduced cost'
  | 'binding'
  | 'feasible'
  | 'infeasible'
  | 'unbounded';

const glosses: Readonly<Record<GlossedTerm, string>> = {
  'decision cell': 'an amount to be found',
  objective: 'what the plan makes best',
  'left side': 'what the plan uses or makes',
  'right side': 'the limit it is held to',
  'lower bound': 'the least that is allowed',
  'upper bound': 'the most that is allowed',
  lot: 'amounts come in multiples of it',
  'least run': 'nothing, or at least this',
  optimum: 'best amount',
  before: 'what the cell held',
  slack: 'left over',
  'dual value': 'worth of one more',
  'reduced cost': 'what adding one would change',
  binding: 'nothing left over',
  feasible: 'keeps every limit',
  infeasible: 'no plan keeps every limit',
  unbounded: 'can be bettered without end',
};

export function glossOf(term: GlossedTerm): string {
  return glosses[term];
}

/** `Slack (left over)`: the term with its gloss, as a label. */
export function termWithGloss(term: GlossedTerm): string {
  return `${term.charAt(0).toUpperCase()}${term.slice(1)} (${glosses[term]})`;
}
