/** Plans stated, duplicated, renamed and deleted by names alone. What is expected was written down by hand. */
import { MemoryWorkbook } from '../../../../addin/adapters/memory/memory-workbook';
import { findPlan, listPlans } from '../../../../addin/domain/model-from-sheet/naming-convention';
import { describePlan, describePlans } from '../../../../addin/domain/statement-to-sheet/describe-plans';
import {
  deletePlan,
  duplicatePlan,
  findPlanNameFault,
  freePlanName,
  newPlanListing,
  removePart,
  renamePlan,
  setPart,
  setSense,
  suggestedPlanName,
  usersOfPlanNames,
  withStatementWrites,
  writeRelation,
} from '../../../../addin/domain/statement-to-sheet/statement-edits';
import { tileWorkbook } from '../model-from-sheet/tile-works';

const listingOf = (workbook: MemoryWorkbook, name: string) => findPlan(workbook.snapshot(), name)!;

describe('describing plans', () => {
  it('says for each part what its name refers to, in the order of a statement', () => {
    const [week] = describePlans(tileWorkbook().snapshot());
    expect(week.parts.map(({ name }) => name)).toEqual([
      'Week.Decision',
      'Week.Objective',
      'Week.Sense',
      'Week.Constraint',
      'Week.Lower',
      'Week.Upper',
    ]);
    expect(week.parts[0].reading).toMatchObject({ kind: 'cells', cellCount: 3 });
    expect(week.parts[2].reading).toMatchObject({ kind: 'cells', cellCount: 1, text: 'maximise' });
    expect(week).toMatchObject({ sense: 'maximise', sheets: ['Plan'], canPutBack: false });
  });

  it('knows dead, computed and constant names apart', () => {
    const workbook = tileWorkbook({
      names: {
        'Week.Sense': '"min"',
        'Week.Lower': '#REF!',
        'Week.Upper': 'OFFSET(Plan!$A$1,1,4,3,1)',
      },
    });
    const [week] = describePlans(workbook.snapshot());
    const kinds = Object.fromEntries(week.parts.map(({ role, reading }) => [role, reading.kind]));
    expect(kinds).toMatchObject({ Sense: 'constant', Lower: 'dead', Upper: 'computed' });
    expect(week.sense).toBe('minimise');
  });
});

describe('stating a plan', () => {
  it('creates a name for each part, and shows them before there are decision cells', async () => {
    const workbook = MemoryWorkbook.of({ sheets: { Plan: { A1: 1 } } });
    const plan = newPlanListing('Mix');
    const writes = [...setSense(plan, 'minimise'), ...setPart(plan, 'Objective', 1, 'Plan!$A$1')];
    const shown = withStatementWrites(workbook.snapshot(), writes);
    await workbook.apply(writes);
    expect(workbook.snapshot().names).toEqual(shown.names);
    expect(listPlans(workbook.snapshot())).toEqual([]);
    expect(describePlan(workbook.snapshot(), plan).parts.map(({ name }) => name)).toEqual([
      'Mix.Objective',
      'Mix.Sense',
    ]);
  });

  it('points a part elsewhere and takes it away again, in whichever spelling it is written', async () => {
    const workbook = tileWorkbook({ names: { 'Week.Upper': null, Week_Upper1: 'Plan!$E$2:$E$4' } });
    await workbook.apply(removePart(workbook.snapshot(), listingOf(workbook, 'Week'), 'Upper', 1));
    expect(workbook.snapshot().names.some(({ name }) => name === 'Week_Upper1')).toBe(false);
  });

  it('types a relation as a text, so that it is never taken for a formula', async () => {
    const workbook = tileWorkbook();
    await workbook.apply(writeRelation({ sheet: 'Plan', row: 6, column: 2 }, '='));
    expect(workbook.snapshot().sheets[0].cell(6, 2)).toMatchObject({ value: '=', formula: undefined });
  });
});

describe('the name of a plan', () => {
  const workbook = tileWorkbook().snapshot();

  it.each([
    ['', 'blank'],
    ['Week two', 'characters'],
    ['2nd', 'characters'],
    ['Week.', 'characters'],
    ['AB12', 'like-a-cell'],
    ['R1C1', 'like-a-cell'],
    ['Week.Decision', 'ends-in-part'],
    ['week', 'taken'],
    ['x'.repeat(201), 'too-long'],
  ] as const)('%s will not do: %s', (name, fault) => {
    expect(findPlanNameFault(workbook, name)).toBe(fault);
  });

  it.each(['Next', 'Brennofen_2', 'Größe', ' Week2 ', '_plan'])('%s will do', (name) => {
    expect(findPlanNameFault(workbook, name)).toBeNull();
  });

  it('may be written in another case by the plan itself', () => {
    const own = listPlans(workbook)[0];
    expect(findPlanNameFault(workbook, 'WEEK', own)).toBeNull();
  });

  it('is suggested so that it is free and no cell', () => {
    expect(freePlanName(workbook, 'Week')).toBe('Week2');
    expect(freePlanName(workbook, 'Mix')).toBe('Mix_2');
    expect(suggestedPlanName(workbook, 'Week')).toBe('Week2');
    expect(suggestedPlanName(workbook, 'Next')).toBe('Next');
  });
});

describe('whole plans', () => {
  const record = JSON.stringify({
    version: 1,
    plans: {
      week: {
        columns: [{ name: 'week.optimum', heading: 'Optimum', values: [1] }],
        decisions: [{ block: 1, before: [null], written: [1] }],
      },
    },
  });
  const solved = () =>
    tileWorkbook({
      names: { 'Week.Optimum': 'Plan!$J$2:$J$4', Other: 'SUM(Week.Optimum)' },
      cells: { L1: '=SUM(week.optimum)', L2: '="Week.Optimum"' },
      record,
    });

  it('are duplicated with their statement and without their results', async () => {
    const workbook = solved();
    await workbook.apply(duplicatePlan(workbook.snapshot(), listingOf(workbook, 'Week'), 'Next'));
    const names = workbook.snapshot().names.map(({ name }) => name);
    expect(names).toContain('Next.Decision');
    expect(names).not.toContain('Next.Optimum');
    expect(listPlans(workbook.snapshot()).map(({ name }) => name)).toEqual(['Next', 'Week']);
  });

  it('are renamed with their results and their record', async () => {
    const workbook = solved();
    await workbook.apply(renamePlan(workbook.snapshot(), listingOf(workbook, 'Week'), 'Next'));
    const { names, record: renamed } = workbook.snapshot();
    expect(names.filter(({ name }) => name.startsWith('Week'))).toEqual([]);
    expect(names.map(({ name }) => name)).toContain('Next.Optimum');
    expect(JSON.parse(renamed!)).toMatchObject({ plans: { next: { columns: [{ name: 'next.optimum' }] } } });
  });

  it('are renamed in another case only', async () => {
    const workbook = solved();
    await workbook.apply(renamePlan(workbook.snapshot(), listingOf(workbook, 'Week'), 'WEEK'));
    expect(listPlans(workbook.snapshot()).map(({ name }) => name)).toEqual(['WEEK']);
  });

  it('are deleted with all their names and their record, and leave the cells', async () => {
    const workbook = solved();
    const before = workbook.snapshot().sheets[0].cell(1, 1);
    await workbook.apply(deletePlan(workbook.snapshot(), listingOf(workbook, 'Week')));
    expect(workbook.snapshot().names.map(({ name }) => name)).toEqual(['Other']);
    expect(JSON.parse(workbook.snapshot().record!)).toEqual({ version: 1, plans: {} });
    expect(workbook.snapshot().sheets[0].cell(1, 1)).toEqual(before);
  });

  it('say which formulas use their names; a text in quotation marks does not', () => {
    const workbook = solved();
    expect(usersOfPlanNames(workbook.snapshot(), listingOf(workbook, 'Week'))).toEqual(['Plan!L1', 'Other']);
  });

  it('of one sheet stay on that sheet', async () => {
    const workbook = tileWorkbook({
      localNames: { Plan: { 'Local.Decision': 'Plan!$B$2:$B$4' } },
    });
    await workbook.apply(renamePlan(workbook.snapshot(), listingOf(workbook, 'Local @ Plan'), 'Own'));
    expect(listPlans(workbook.snapshot()).map(({ name }) => name)).toEqual(['Week', 'Own @ Plan']);
  });
});
