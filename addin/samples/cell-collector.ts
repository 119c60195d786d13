/**
 * Collects the cells of a sample sheet as it is written down, row after row.
 */
import type { CellLook, SampleCell } from './sample-workbook';

export interface CellCollector {
  readonly cells: Map<string, SampleCell>;
  readonly put: (name: string, value: number | string, look: CellLook, note?: string) => void;
  /** @param value what is stored beside the formula */
  readonly putFormula: (name: string, formula: string, value: number | string, look: CellLook) => void;
  /** Cells that only have a look. */
  readonly paint: (names: readonly string[], look: CellLook) => void;
}

export function collectCells(): CellCollector {
  const cells = new Map<string, SampleCell>();
  return {
    cells,
    put: (name, value, look, note) => {
      cells.set(name, note === undefined ? { value, look } : { value, look, note });
    },
    putFormula: (name, formula, value, look) => {
      cells.set(name, { value, formula, look });
    },
    paint: (names, look) => {
      names.forEach((name) => cells.set(name, { value: null, look }));
    },
  };
}
