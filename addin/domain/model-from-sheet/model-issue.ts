/**
 * Everything that can be wrong with a plan on a sheet, as data. The sentence is made in one place (pane/messages.ts).
 */
import type { CellAddress } from '../sheet/cell-address';

export type IssueSeverity = 'error' | 'warning';

export interface ModelIssue {
  /** Stable, kebab-case: `missing-sense`, `unknown-relation`, … (the list stands in addin/SPEC.md). */
  readonly code: string;
  readonly severity: IssueSeverity;
  /** The cell itself; null where the issue has none (the facts then name the role, such as Sense). */
  readonly cell: CellAddress | null;
  /** What the sentence is made of: numbers, texts, cells as text. */
  readonly facts: Readonly<Record<string, string | number | readonly string[]>>;
}
