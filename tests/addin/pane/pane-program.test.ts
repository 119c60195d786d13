/**
 * The pane without its page: what a planner presses, what becomes of it in the workbook, and what is said. The plan is
 * the small one of tile-works.ts; its best: kiln hours 120 = floor + 1.5 border, border 40 (12 a m² for 1.5 h beats
 * 6.5 for 1), so floor 60, contribution 6.5·60 + 12·40 = 870, by hand.
 */
import { tileWorkbook } from '../domain/model-from-sheet/tile-works';
import { findAddedRows } from '../../../addin/domain/statement-to-sheet/find-added-rows';
import { WorkbookError } from '../../../addin/ports/workbook';
import { PlanEngineError } from '../../../addin/ports/plan-engine';
import type { PartKey } from '../../../addin/pane/pane-state';
import { inlineEngine, paneAtWork, rangeOf } from './pane-at-work';

const part = (role: PartKey['role'], number = 1): PartKey => ({ role, number });
const solve = { kind: 'solve-pressed' } as const;

describe('opening', () => {
  it('reads the workbook and shows the plan of the sheet in front', async () => {
    const pane = await paneAtWork(
      tileWorkbook({
        names: { 'Alpha.Decision': 'Other!$A$1' },
        otherSheets: { Other: { A1: 1 } },
      }),
    );
    expect(pane.state().plans.map(({ listing }) => listing.name)).toEqual(['Alpha', 'Week']);
    expect(pane.state().chosen?.listing.name).toBe('Week');
    expect(pane.state().activity).toEqual({ kind: 'idle' });
  });

  it('solves at once where the ribbon’s Solve opened it', async () => {
    const pane = await paneAtWork(tileWorkbook(), { command: 'solve' });
    expect(pane.state().result?.outcome).toMatchObject({ status: 'optimal', objective: 870 });
    expect(pane.value('Plan!B2')).toBe(60);
  });

  it('asks which plan is meant where several stand on the sheet, and begins nothing', async () => {
    const pane = await paneAtWork(tileWorkbook({ names: { 'Alpha.Decision': 'Plan!$B$2' } }), {
      command: 'solve',
    });
    expect(pane.state().result).toBeNull();
    expect(pane.said).toEqual(['Several plans stand on this sheet. Choose one, then press Solve.']);
  });

  it('puts back at once where the ribbon’s Put back opened it', async () => {
    const workbook = tileWorkbook();
    await paneAtWork(workbook, { command: 'solve' });
    const pane = await paneAtWork(workbook, { command: 'put-back' });
    expect([pane.value('Plan!B2'), pane.value('Plan!B3')]).toEqual([10, null]);
  });
});

describe('stating a plan from scratch', () => {
  it('takes the selection part by part, creates the names and solves', async () => {
    const pane = await paneAtWork(
      tileWorkbook({
        names: Object.fromEntries(
          ['Decision', 'Objective', 'Sense', 'Constraint', 'Lower', 'Upper'].map((role) => [
            `Week.${role}`,
            null,
          ]),
        ),
      }),
    );
    expect(pane.state().chosen).toBeNull();
    await pane.press({ kind: 'name-asked', purpose: 'new' });
    await pane.press({ kind: 'name-typed', text: 'AB1' });
    await pane.press({ kind: 'question-confirmed' });
    expect(pane.state().question).toMatchObject({ kind: 'name', fault: 'like-a-cell' });
    await pane.press({ kind: 'name-typed', text: 'Mix' });
    await pane.press({ kind: 'question-confirmed' });
    expect(pane.state().chosen?.listing.name).toBe('Mix');

    const cells = { Decision: 'B2:B4', Objective: 'B11', Constraint: 'B7:D9', Lower: 'D2:D4' } as const;
    for (const [role, range] of Object.entries(cells)) {
      await pane.select(`Plan!${range}`);
      await pane.press({ kind: 'selection-wanted', part: part(role as PartKey['role']) });
    }
    await pane.press({ kind: 'reference-typed', part: part('Upper'), text: 'E2:E4' });
    const names = pane.workbook.snapshot().names.map(({ name, formula }) => `${name} ${formula}`);
    expect(names.sort()).toEqual([
      'Mix.Constraint Plan!$B$7:$D$9',
      'Mix.Decision Plan!$B$2:$B$4',
      'Mix.Lower Plan!$D$2:$D$4',
      'Mix.Objective Plan!$B$11',
      'Mix.Sense "maximise"',
      'Mix.Upper Plan!$E$2:$E$4',
    ]);
    expect(pane.said).toContain('Decision cells set.');
    const { result } = await pane.press(solve);
    expect(result?.outcome).toMatchObject({ status: 'optimal', objective: 870, objectiveBefore: 65 });
  });

  it('says so where nothing is selected, and where the text typed is no reference', async () => {
    const pane = await paneAtWork(tileWorkbook());
    await pane.press({ kind: 'selection-wanted', part: part('Decision') });
    expect(pane.state().fieldFault).toEqual({ part: part('Decision'), kind: 'nothing-selected' });
    await pane.press({ kind: 'reference-typed', part: part('Lower'), text: 'here and there' });
    expect(pane.state().fieldFault).toEqual({ part: part('Lower'), kind: 'not-cells' });
  });

  it('shows old and new cells before a part is pointed elsewhere, and keeps the old ones on demand', async () => {
    const pane = await paneAtWork(tileWorkbook());
    await pane.select('Plan!B2:B3');
    await pane.press({ kind: 'selection-wanted', part: part('Decision') });
    expect(pane.state().question).toEqual({
      kind: 'point-elsewhere',
      part: part('Decision'),
      from: 'Plan!$B$2:$B$4',
      to: 'Plan!$B$2:$B$3',
    });
    expect(pane.said.at(-1)).toBe('Point it at other cells? Now: Plan!$B$2:$B$4 Then: Plan!$B$2:$B$3');
    await pane.press({ kind: 'question-cancelled' });
    const decision = () => pane.state().chosen?.parts.find(({ role }) => role === 'Decision')?.formula;
    expect(decision()).toBe('Plan!$B$2:$B$4');
    await pane.press({ kind: 'selection-wanted', part: part('Decision') });
    await pane.press({ kind: 'question-confirmed' });
    expect(decision()).toBe('Plan!$B$2:$B$3');
  });

  it('picks sense and one relation for all rows from lists, in the names themselves', async () => {
    const pane = await paneAtWork(tileWorkbook({ names: { 'Week.Sense': null } }));
    await pane.press({ kind: 'sense-picked', sense: 'minimise' });
    await pane.press({ kind: 'common-relation-picked', number: 2, relation: '>=' });
    const formulas = Object.fromEntries(pane.workbook.snapshot().names.map((n) => [n.name, n.formula]));
    expect(formulas).toMatchObject({ 'Week.Sense': '"minimise"', 'Week.Relation2': '">="' });
  });

  it('takes in rows that were added under a block, all names together', async () => {
    const pane = await paneAtWork(
      tileWorkbook({ cells: { A5: [['Skirting', null, 7, null, 60, 0.4, 1.1]] } }),
    );
    const [added] = findAddedRows(pane.state().workbook!, pane.state().chosen!);
    await pane.press({ kind: 'extension-pressed', writes: added.writes });
    const formulas = pane.state().chosen!.parts.map(({ name, formula }) => `${name} ${formula}`);
    expect(formulas).toContain('Week.Decision Plan!$B$2:$B$5');
    expect(formulas).toContain('Week.Upper Plan!$E$2:$E$5');
  });

  it('takes a part away, and closes a field that was opened for nothing', async () => {
    const pane = await paneAtWork(tileWorkbook());
    await pane.press({ kind: 'part-removed', part: part('Upper') });
    expect(pane.workbook.snapshot().names.some(({ name }) => name === 'Week.Upper')).toBe(false);
    await pane.press({ kind: 'field-added', part: part('Decision', 2) });
    expect(pane.state().openFields).toEqual([part('Decision', 2)]);
    await pane.press({ kind: 'part-removed', part: part('Decision', 2) });
    expect(pane.state().openFields).toEqual([]);
  });
});

describe('whole plans', () => {
  it('are duplicated, renamed and deleted, and the right one is at hand afterwards', async () => {
    const pane = await paneAtWork(tileWorkbook());
    const atHand = () => pane.state().chosen?.listing.name;
    await pane.press({ kind: 'name-asked', purpose: 'duplicate' });
    expect(pane.state().question).toMatchObject({ text: 'Week2' });
    await pane.press({ kind: 'question-confirmed' });
    expect(atHand()).toBe('Week2');
    await pane.press({ kind: 'name-asked', purpose: 'rename' });
    await pane.press({ kind: 'name-typed', text: 'Rush' });
    await pane.press({ kind: 'question-confirmed' });
    expect(atHand()).toBe('Rush');
    await pane.press({ kind: 'deletion-asked' });
    await pane.press({ kind: 'question-confirmed' });
    expect(atHand()).toBe('Week');
    expect(pane.state().plans.map(({ listing }) => listing.name)).toEqual(['Week']);
  });

  it('leave nothing of their results to one another', async () => {
    const pane = await paneAtWork(tileWorkbook({ names: { 'Alpha.Decision': 'Plan!$B$2' } }));
    await pane.press({ kind: 'plan-chosen', name: 'Week' });
    await pane.press(solve);
    await pane.press({ kind: 'plan-chosen', name: 'Alpha' });
    expect(pane.state()).toMatchObject({ result: null, check: null, view: 'statement' });
  });
});

describe('checking', () => {
  it('lists what is wrong; a relation picked for its cell is typed there and the plan is checked again', async () => {
    const pane = await paneAtWork(tileWorkbook({ cells: { C7: null } }));
    await pane.press({ kind: 'check-pressed' });
    expect(pane.state().check?.issues).toMatchObject([{ code: 'missing-relation', severity: 'error' }]);
    expect(pane.said.at(-1)).toBe('What to mend: 1 error.');
    await pane.press({
      kind: 'relation-picked',
      cell: { sheet: 'Plan', row: 6, column: 2 },
      relation: '<=',
    });
    expect(pane.value('Plan!C7')).toBe('<=');
    expect(pane.state().check).toMatchObject({ issues: [], size: { decisions: 3, constraints: 3 } });
  });

  it('shows an issue’s cell on the sheet', async () => {
    const pane = await paneAtWork(tileWorkbook());
    await pane.press({ kind: 'ranges-pressed', ranges: [rangeOf('Plan!C7')] });
    expect(await pane.host.selection.selected()).toEqual([rangeOf('Plan!C7')]);
  });
});

describe('solving', () => {
  it('writes the plan and tells what it comes to', async () => {
    const pane = await paneAtWork(tileWorkbook());
    const { result, view } = await pane.press(solve);
    expect(view).toBe('result');
    expect(result).toMatchObject({ isWritten: true, putBack: null });
    expect(pane.said.at(-1)).toBe(
      'Optimal: no other plan within these limits does better. Objective 870. 1 of 3 constraint rows is binding.',
    );
    expect(pane.state().chosen?.canPutBack).toBe(true);
    expect(pane.state().isOutdated).toBe(false);
  });

  it('does one thing at a time: a second press while solving begins nothing', async () => {
    let solves = 0;
    const pane = await paneAtWork(tileWorkbook(), {
      engine: {
        check: (request) => inlineEngine.check(request),
        putBack: (request) => inlineEngine.putBack(request),
        solve: (request, events) => {
          solves++;
          return inlineEngine.solve(request, events);
        },
      },
    });
    pane.begin(solve);
    pane.begin(solve);
    pane.begin({ kind: 'check-pressed' });
    await pane.rest();
    expect(solves).toBe(1);
  });

  it('can be stopped, and writes nothing then', async () => {
    const pane = await paneAtWork(tileWorkbook());
    pane.begin(solve);
    pane.begin({ kind: 'stop-pressed' });
    expect(pane.state().activity).toMatchObject({ kind: 'solving', isStopping: true });
    await pane.rest();
    expect(pane.said.at(-1)).toBe('Stopped. Nothing was written.');
    expect(pane.value('Plan!B2')).toBe(10);
  });

  it('an invalid plan shows its issues instead', async () => {
    const pane = await paneAtWork(tileWorkbook({ cells: { D7: 'eighty' } }));
    const { view, check, result } = await pane.press(solve);
    expect({ view, result }).toEqual({ view: 'statement', result: null });
    expect(check?.issues).toMatchObject([{ code: 'text-for-number' }]);
  });

  it('an infeasible plan is told and nothing is written', async () => {
    const pane = await paneAtWork(tileWorkbook({ cells: { D9: 100 } }));
    const { result } = await pane.press(solve);
    expect(result).toMatchObject({ isWritten: false, outcome: { status: 'infeasible', writes: null } });
    expect(pane.said.at(-1)).toMatch(/^Infeasible: /);
  });

  it('leaves the decision cells alone where that was asked for', async () => {
    const pane = await paneAtWork(tileWorkbook());
    await pane.press({ kind: 'keep-decisions-switched', isOn: true });
    const { result } = await pane.press(solve);
    expect(result?.outcome.writes?.decisionCount).toBe(0);
    expect(pane.value('Plan!B2')).toBe(10);
    expect(pane.state().chosen?.canPutBack).toBe(false);
  });

  it('says when the workbook has changed since', async () => {
    const pane = await paneAtWork(tileWorkbook());
    await pane.press(solve);
    await pane.host.changeByOthers([
      { kind: 'value', cell: { sheet: 'Plan', row: 6, column: 3 }, value: 60 },
    ]);
    expect(pane.state().isOutdated).toBe(true);
    await pane.press(solve);
    expect(pane.state().isOutdated).toBe(false);
  });
});

describe('a workbook that does not let us write', () => {
  it('under a filter the result stays, and is written once the filter is cleared', async () => {
    const pane = await paneAtWork(tileWorkbook({ filteredSheets: ['Plan'] }));
    await pane.press(solve);
    expect(pane.state().failure).toMatchObject({ code: 'filtered', sheets: ['Plan'] });
    expect(pane.state().result).toMatchObject({ isWritten: false, outcome: { objective: 870 } });
    expect(pane.value('Plan!B2')).toBe(10);
    await pane.press({ kind: 'write-pressed' });
    expect(pane.state()).toMatchObject({ failure: null, result: { isWritten: true } });
    expect(pane.value('Plan!B2')).toBe(60);
  });

  it('on a protected sheet the result stays in the pane, with a sentence', async () => {
    const pane = await paneAtWork(tileWorkbook({ protectedSheets: ['Plan'] }));
    await pane.press(solve);
    expect(pane.state().failure?.code).toBe('protected-sheet');
    expect(pane.said.at(-1)).toContain('is protected');
    expect(pane.state().result?.isWritten).toBe(false);
  });

  it('changed by others between reading and writing: nothing is written, and Try again solves anew', async () => {
    const workbook = tileWorkbook();
    let isFirst = true;
    const pane = await paneAtWork(workbook, {
      engine: {
        ...inlineEngine,
        check: (request) => inlineEngine.check(request),
        putBack: (request) => inlineEngine.putBack(request),
        solve: (request, events) => {
          if (isFirst) {
            isFirst = false;
            void workbook.apply([{ kind: 'value', cell: { sheet: 'Plan', row: 7, column: 3 }, value: 60 }]);
          }
          return inlineEngine.solve(request, events);
        },
      },
    });
    await pane.press(solve);
    expect(pane.state().failure?.code).toBe('changed-meanwhile');
    expect(pane.value('Plan!B2')).toBe(10);
    await pane.press({ kind: 'retry-pressed' });
    // Kiln hours 60 = 1.5·40: border alone, 480. By hand.
    expect(pane.state()).toMatchObject({ failure: null, result: { outcome: { objective: 480 } } });
  });

  it('while a cell is being edited it says so, and Try again does what was wanted', async () => {
    const workbook = tileWorkbook();
    let isEditing = true;
    const pane = await paneAtWork(workbook, {
      host: {
        workbook: {
          read: () =>
            isEditing
              ? Promise.reject(
                  new WorkbookError('editing-cell', 'Finish editing the cell first.', { canRetry: true }),
                )
              : workbook.read(),
          apply: (plan) => workbook.apply(plan),
        },
      },
    });
    expect(pane.state().failure?.sentence).toBe('Finish editing the cell first.');
    isEditing = false;
    await pane.press({ kind: 'retry-pressed' });
    expect(pane.state()).toMatchObject({ failure: null, chosen: { listing: { name: 'Week' } } });
  });

  it.each(['finish', 'put-back'] as const)(
    'a write that broke off lists the cells between, and offers to %s',
    async (way) => {
      const ends: string[] = [];
      const workbook = tileWorkbook();
      const pane = await paneAtWork(workbook, {
        host: {
          workbook: {
            read: () => workbook.read(),
            apply: () =>
              Promise.reject(new WorkbookError('half-written', 'Excel stopped answering in the middle.')),
          },
          journal: {
            unfinished: () => [rangeOf('Plan!B2:B3')],
            finish: () => Promise.resolve(void ends.push('finish')),
            putBack: () => Promise.resolve(void ends.push('put-back')),
          },
        },
      });
      await pane.press(solve);
      expect(pane.state().failure).toMatchObject({
        code: 'half-written',
        ranges: [rangeOf('Plan!B2:B3')],
      });
      await pane.press({ kind: 'journal-pressed', way });
      expect(ends).toEqual([way]);
      expect(pane.state()).toMatchObject({ failure: null, result: { isWritten: way === 'finish' } });
    },
  );

  it('a fault of ours is told as ours', async () => {
    const pane = await paneAtWork(tileWorkbook(), {
      engine: {
        check: () => Promise.reject(new PlanEngineError('crashed', 'no such row')),
        putBack: () => Promise.reject(new PlanEngineError('lost', 'gone')),
        solve: () => ({ outcome: Promise.reject(new TypeError('x is undefined')), stop: () => undefined }),
      },
    });
    await pane.press({ kind: 'check-pressed' });
    expect(pane.state().failure?.sentence).toContain('our fault and not that of your workbook (no such row)');
    await pane.press(solve);
    expect(pane.state().failure?.sentence).toContain('x is undefined');
    await pane.press({ kind: 'put-back-pressed' });
    expect(pane.state().failure).toMatchObject({ retry: { kind: 'put-back' } });
    await pane.press({ kind: 'failure-closed' });
    expect(pane.state().failure).toBeNull();
  });
});

describe('putting back', () => {
  it('restores what the decision cells held, leaves what was changed since, and says both', async () => {
    const pane = await paneAtWork(tileWorkbook());
    await pane.press(solve);
    await pane.host.changeByOthers([
      { kind: 'value', cell: { sheet: 'Plan', row: 3, column: 1 }, value: 33 },
    ]);
    await pane.press({ kind: 'put-back-pressed' });
    expect(['Plan!B2', 'Plan!B3', 'Plan!B4'].map(pane.value)).toEqual([10, null, 33]);
    expect(pane.said.at(-1)).toBe(
      '2 decision cells hold again what they held before. Changed since the solve, and left as it is: Plan!B4.',
    );
    expect(pane.state().chosen?.canPutBack).toBe(false);
  });

  it('says so where there is nothing to put back', async () => {
    const pane = await paneAtWork(tileWorkbook());
    await pane.press({ kind: 'put-back-pressed' });
    expect(pane.said.at(-1)).toBe('Nothing was written that could be put back.');
  });
});
