/**
 * The parts of the statement: fields opened, filled from the selection or by typing, pointed elsewhere, taken away.
 */
import { resolveReferenceText } from '../domain/formula/resolve-reference';
import type { PlanListing } from '../domain/model-from-sheet/naming-convention';
import type { WritePlan } from '../domain/results-to-sheet/write-plan';
import { referenceOfSelection } from '../domain/statement-to-sheet/reference-of-selection';
import {
  removePart,
  setCommonRelation,
  setPart,
  setSense,
  withStatementWrites,
  writeRelation,
} from '../domain/statement-to-sheet/statement-edits';
import { paneTexts, partLabel } from '../wording/pane-texts';
import type { Updated } from './pane-events';
import { isSamePart, type PaneState, type PartKey, type Question } from './pane-state';
import {
  announced,
  begin,
  idle,
  isBusy,
  only,
  withWorkbook,
  writeStatement,
  type EventOf,
} from './update-steps';

export type StatementEvent = EventOf<
  | 'field-added'
  | 'selection-wanted'
  | 'selection-read'
  | 'reference-typed'
  | 'part-removed'
  | 'extension-pressed'
  | 'sense-picked'
  | 'common-relation-picked'
  | 'relation-picked'
  | 'statement-written'
>;

export function updateStatement(state: PaneState, event: StatementEvent): Updated {
  if (event.kind === 'statement-written') {
    return afterStatementWrites(state, event.writes, event.next);
  }
  if (event.kind === 'selection-read') {
    return afterSelectionRead(state, event);
  }
  const { workbook, chosen } = state;
  if (workbook === null || chosen === null || isBusy(state)) {
    return only(state);
  }
  const plan = chosen.listing;
  switch (event.kind) {
    case 'field-added':
      return only({ ...state, openFields: [...state.openFields, event.part] });
    case 'selection-wanted':
      return { state, commands: [{ kind: 'read-selection', part: event.part }] };
    case 'reference-typed': {
      const text = event.text.trim().replace(/^=/, '');
      const home = chosen.sheets.at(0) ?? workbook.sheets.at(0)?.name ?? null;
      const resolved = resolveReferenceText(workbook, text, home);
      if (resolved.kind === 'ranges') {
        // Typed without a sheet, it means the plan's own; the name must say so.
        const isWhole = resolveReferenceText(workbook, text, null).kind === 'ranges';
        const reference = isWhole ? text : (referenceOfSelection(workbook, resolved.ranges) ?? text);
        return pointPart(state, event.part, reference);
      }
      return resolved.kind === 'computed'
        ? pointPart(state, event.part, text)
        : only({ ...state, fieldFault: { part: event.part, kind: 'not-cells' } });
    }
    case 'part-removed': {
      const openFields = state.openFields.filter((part) => !isSamePart(part, event.part));
      const closed = { ...state, openFields, fieldFault: null };
      const writes = removePart(workbook, plan, event.part.role, event.part.number);
      return writes.length === 0 ? only(closed) : writeStatement(closed, writes);
    }
    case 'extension-pressed':
      return writeStatement(state, event.writes);
    case 'sense-picked':
      return writeStatement(state, setSense(plan, event.sense));
    case 'common-relation-picked':
      return writeStatement(state, setCommonRelation(plan, event.number, event.relation));
    case 'relation-picked':
      return writeStatement(state, writeRelation(event.cell, event.relation));
  }
}

function afterSelectionRead(state: PaneState, { part, ranges }: EventOf<'selection-read'>): Updated {
  const seen = { ...state, selected: ranges };
  if (part === null || state.workbook === null || state.chosen === null || isBusy(state)) {
    return only(seen);
  }
  const reference = referenceOfSelection(state.workbook, ranges);
  return reference === undefined
    ? only(announced({ ...seen, fieldFault: { part, kind: 'nothing-selected' } }, paneTexts.nothingSelected))
    : pointPart(seen, part, reference);
}

/** A part that has its cells already is pointed elsewhere only when the planner has seen both. */
function pointPart(state: PaneState, part: PartKey, reference: string): Updated {
  const { chosen } = state;
  const stated = chosen?.parts.find((one) => isSamePart(one, part));
  const clean: PaneState = { ...state, fieldFault: null };
  if (chosen === null || stated?.formula.trim() === reference) {
    return only(clean);
  }
  if (stated !== undefined && stated.reading.kind !== 'dead') {
    const question: Question = { kind: 'point-elsewhere', part, from: stated.formula, to: reference };
    // The answer of the host comes late: whoever has gone on to the sheet is told, and not called back.
    const said = [
      paneTexts.pointElsewhere,
      paneTexts.pointFrom(question.from),
      paneTexts.pointTo(question.to),
    ];
    return only(announced({ ...clean, question }, said.join(' ')));
  }
  return writeStatement(clean, setPart(chosen.listing, part.role, part.number, reference));
}

function afterStatementWrites(state: PaneState, writes: WritePlan, next: PlanListing | null): Updated {
  if (state.workbook === null) {
    return only({ ...state, activity: idle });
  }
  const seen = withWorkbook({ ...state, activity: idle }, withStatementWrites(state.workbook, writes), next);
  const chosen = seen.chosen ?? seen.plans.at(0) ?? null;
  const stated = chosen?.parts ?? [];
  const openFields = state.openFields.filter((part) => !stated.some((one) => isSamePart(one, part)));
  const written = writes.flatMap((write) => (write.kind === 'name' ? [write.name] : []));
  const part = stated.find(({ name }) => written.length === 1 && name === written[0]);
  const changed: PaneState = { ...seen, chosen, openFields, check: null };
  // A relation was typed into a cell: the workbook must be read again to see it.
  if (writes.some(({ kind }) => kind === 'value') && chosen !== null) {
    return begin(changed, { kind: 'checking' }, { kind: 'check', planName: chosen.listing.name });
  }
  return only(
    part === undefined
      ? changed
      : announced(changed, paneTexts.statementSaved(partLabel(part.role, part.number))),
  );
}
