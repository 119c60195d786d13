/**
 * Why a cell cannot be read, with the chain of cells that shows it.
 */
import { formatCellAddress, type CellAddress } from '../sheet/cell-address';
import type { FormulaCell } from '../calculation/calculation-grid';
import type { DependencyGraph, GraphNode } from '../calculation/dependency-graph';
import type { NonAffineOperation, RefusalReason } from '../calculation/evaluation-refusal';
import type { FormulaIssue, Remedy } from './formula-issue';

/** Cells of a chain that are reported; a longer one is cut in its middle. */
const maximumChain = 12;

const roundingFunctions = new Set([
  ...['ROUND', 'ROUNDUP', 'ROUNDDOWN', 'INT', 'TRUNC', 'MROUND', 'EVEN', 'ODD', 'MOD', 'QUOTIENT'],
  ...['CEILING', 'CEILING.MATH', 'FLOOR', 'FLOOR.MATH'],
]);
const extremeFunctions = new Set([
  ...['MAX', 'MIN', 'MAXA', 'MINA', 'MAXIFS', 'MINIFS', 'LARGE', 'SMALL', 'ABS', 'MEDIAN'],
]);
const decidingFunctions = new Set([
  ...['IF', 'IFS', 'CHOOSE', 'SWITCH', 'AND', 'OR', 'XOR', 'NOT', 'SIGN'],
  ...['COUNT', 'COUNTA', 'COUNTBLANK', 'COUNTIF', 'COUNTIFS', 'SUMIF', 'SUMIFS', 'AVERAGEIF', 'AVERAGEIFS'],
  ...['MATCH', 'XMATCH', 'LOOKUP', 'VLOOKUP', 'HLOOKUP', 'XLOOKUP', 'FILTER', 'ISBLANK', 'ISNUMBER'],
]);

function remedyFor(operation: NonAffineOperation, by: string): Remedy {
  switch (operation) {
    case 'division':
      return 'ratio';
    case 'comparison':
    case 'condition':
      return 'yes-no';
    case 'function':
      if (roundingFunctions.has(by)) {
        return 'lot';
      }
      return extremeFunctions.has(by) ? 'row-each' : decidingFunctions.has(by) ? 'yes-no' : 'none';
    default:
      return 'none';
  }
}

export function issueOfRefusal(
  cell: FormulaCell,
  reason: RefusalReason,
  graph: DependencyGraph,
): FormulaIssue {
  const formula = `=${cell.cell.formula ?? ''}`;
  const address = cell.address;
  switch (reason.code) {
    case 'not-affine':
      return {
        code: reason.code,
        cell: address,
        facts: {
          operation: reason.operation,
          by: reason.by,
          remedy: remedyFor(reason.operation, reason.by),
          chain: chainFromDecision(graph.visit(cell)),
          formula,
        },
      };
    case 'unknown-function':
      return {
        code: reason.code,
        cell: address,
        facts: { function: reason.functionName, chain: chainFromDecision(graph.visit(cell)), formula },
      };
    case 'formula-syntax':
      return { code: reason.code, cell: address, facts: { position: reason.position ?? -1, formula } };
    case 'too-deep':
    case 'array-too-large':
      return { code: reason.code, cell: address, facts: { formula } };
    case 'external-reference':
    case 'several-sheets':
      return { code: reason.code, cell: address, facts: { reference: reason.reference, formula } };
    case 'circular-reference':
      return {
        code: reason.code,
        cell: reason.cells[0].address,
        facts: {
          cells: cutInMiddle(reason.cells.map((member) => formatCellAddress(member.address))),
          formula,
        },
      };
  }
}

export function errorValueIssue(cell: FormulaCell, error: string, graph: DependencyGraph): FormulaIssue {
  return {
    code: 'error-value',
    cell: cell.address,
    facts: {
      error,
      chain: chainFromDecision(graph.visit(cell)),
      formula: `=${cell.cell.formula ?? ''}`,
    },
  };
}

/** The shortest way from a decision cell to this cell, both ends included; just the cell where none leads there. */
export function chainFromDecision(target: GraphNode): readonly string[] {
  const cameFrom = new Map<GraphNode, GraphNode | undefined>([[target, undefined]]);
  const queue: GraphNode[] = [target];
  for (let at = 0; at < queue.length; at++) {
    const node = queue[at];
    if (node.inputs.length > 0) {
      const chain: CellAddress[] = [node.inputs[0].address];
      for (let step: GraphNode | undefined = node; step !== undefined; step = cameFrom.get(step)) {
        if (step.cell !== undefined) {
          chain.push(step.cell.address);
        }
      }
      return cutInMiddle(chain.map(formatCellAddress));
    }
    for (const precedent of node.precedents) {
      if (precedent.dependsOnInputs && !cameFrom.has(precedent)) {
        cameFrom.set(precedent, node);
        queue.push(precedent);
      }
    }
  }
  return target.cell === undefined ? [] : [formatCellAddress(target.cell.address)];
}

/** The first and the last cells say most. */
function cutInMiddle(cells: readonly string[]): readonly string[] {
  if (cells.length <= maximumChain) {
    return cells;
  }
  const half = maximumChain / 2;
  return [...cells.slice(0, half), '…', ...cells.slice(cells.length - half + 1)];
}
