import { MemoryWorkbook } from '../../../../addin/adapters/memory/memory-workbook';
import {
  findPlan,
  listPlans,
  nameOfRole,
  namesOfPlan,
  readRoleName,
} from '../../../../addin/domain/model-from-sheet/naming-convention';

function named(name: string) {
  return { name, scope: null, formula: 'Plan!$A$1', isHidden: false };
}

function workbookWith(names: readonly string[], localNames: Record<string, readonly string[]> = {}) {
  const toRecord = (list: readonly string[]) => Object.fromEntries(list.map((name) => [name, 'Plan!$A$1']));
  return MemoryWorkbook.of({
    sheets: { Plan: {}, 'Week 2': {}, Costs: {} },
    names: toRecord(names),
    localNames: Object.fromEntries(
      Object.entries(localNames).map(([sheet, list]) => [sheet, toRecord(list)]),
    ),
  }).snapshot();
}

describe('names of a plan', () => {
  it.each([
    ['Week.Decision', 'Week', '.', 'Decision', 1, false],
    ['week_DECISION12', 'week', '_', 'Decision', 12, true],
    ['Week.Decision1', 'Week', '.', 'Decision', 1, true],
    ['North.Plant_A.LeastRun2', 'North.Plant_A', '.', 'LeastRun', 2, true],
    ['Decision.Decision', 'Decision', '.', 'Decision', 1, false],
    ['Week.DecisionLabel', 'Week', '.', 'DecisionLabel', 1, false],
  ] as const)('AD-1 %s is taken apart', (name, prefix, separator, role, number, isNumbered) => {
    expect(readRoleName(named(name))).toMatchObject({ prefix, separator, role, number, isNumbered });
  });

  it.each([
    'Decision',
    'WeekDecision',
    'Week.Decisions',
    'Week.Decision0',
    '.Decision',
    'Week.Optimum',
    'Week.Rate',
  ])('AD-2 %s is none of the statement', (name) => {
    expect(readRoleName(named(name))).toBeUndefined();
  });

  it('writes the name of a role as the plan writes its names', () => {
    expect(nameOfRole({ prefix: 'Week', separator: '_' }, 'Lower')).toBe('Week_Lower');
    expect(nameOfRole({ prefix: 'Week', separator: '.' }, 'Lower', 3)).toBe('Week.Lower3');
  });
});

describe('plans of a workbook', () => {
  it('AD-3 are the prefixes that have decision cells', () => {
    const workbook = workbookWith(['Week.Decision', 'Week.Sense', 'Month.Objective', 'Month.Sense', 'Rate']);
    expect(listPlans(workbook).map((plan) => plan.name)).toEqual(['Week']);
  });

  it('AD-1 are told apart without regard to case, and keep the spelling of their first decision block', () => {
    const workbook = workbookWith(['WEEK.Decision2', 'Week.Decision', 'week_Sense', 'Autumn_Decision']);
    expect(listPlans(workbook)).toEqual([
      { name: 'Autumn', prefix: 'Autumn', separator: '_', scope: null },
      { name: 'Week', prefix: 'Week', separator: '.', scope: null },
    ]);
    expect(namesOfPlan(workbook, findPlan(workbook, ' WEEK ')!).map((name) => name.definedName.name)).toEqual(
      ['Week.Decision', 'week_Sense', 'WEEK.Decision2'],
    );
  });

  it('AD-4 of sheet-local names follow those of workbook scope, in the order of the tabs', () => {
    const workbook = workbookWith(['Week.Decision', 'Week.Sense'], {
      Costs: ['Blend.Decision'],
      'Week 2': ['Week.Decision'],
    });
    expect(listPlans(workbook).map((plan) => plan.name)).toEqual(['Week', 'Week @ Week 2', 'Blend @ Costs']);
  });

  it('AD-4 a sheet-local plan borrows no name of workbook scope, nor the other way about', () => {
    const workbook = workbookWith(['Week.Decision', 'Week.Sense'], {
      'Week 2': ['Week.Decision', 'Week.Upper'],
    });
    const rolesOf = (name: string) =>
      namesOfPlan(workbook, findPlan(workbook, name)!).map((roleName) => roleName.role);
    expect(rolesOf('week @ week 2')).toEqual(['Decision', 'Upper']);
    expect(rolesOf('Week')).toEqual(['Decision', 'Sense']);
  });
});
