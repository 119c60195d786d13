/**
 * A plan's names, resolved to the ranges they refer to: what is declared, what is missing, what refers to nothing.
 * No cell is read here.
 */
import { resolveName } from '../formula/resolve-reference';
import type { WorkbookSnapshot } from '../sheet/sheet-snapshot';
import {
  firstCellOf,
  isConstant,
  repeatsCells,
  type BlockDeclaration,
  type Declared,
  type ModelDeclaration,
  type NamedArea,
  type PartsDeclaration,
} from './model-declaration';
import { statementIssue, type StatementIssue } from './model-issue';
import {
  nameOfRole,
  namesOfPlan,
  type PlanListing,
  type RoleName,
  type StatementRole,
} from './naming-convention';

export interface DeclarationReading {
  readonly declaration: ModelDeclaration;
  /** Whether every decision block is known: without that, no formula of the plan can be judged. */
  readonly knowsDecisions: boolean;
  readonly issues: readonly StatementIssue[];
}

export function readDeclaration(workbook: WorkbookSnapshot, plan: PlanListing): DeclarationReading {
  return new DeclarationReader(workbook, plan).read();
}

class DeclarationReader {
  private readonly issues: StatementIssue[] = [];
  private readonly names: ReadonlyMap<StatementRole, ReadonlyMap<number, RoleName>>;

  constructor(
    private readonly workbook: WorkbookSnapshot,
    private readonly plan: PlanListing,
  ) {
    this.names = this.namesByRole();
  }

  read(): DeclarationReading {
    const decisions = this.areas('Decision');
    const knowsDecisions = this.checkDecisionNumbers() && decisions.length === this.named('Decision').size;
    const constraints = this.constraints();
    const objective = this.objective();
    const declaration: ModelDeclaration = {
      plan: this.plan,
      decisions,
      objective,
      knowsObjective: objective.length > 0 && objective.length === this.named('Objective').size,
      sense: this.sense(),
      constraints,
      lower: this.areasForBlocks('Lower'),
      upper: this.areasForBlocks('Upper'),
      lot: this.areasForBlocks('Lot'),
      leastRun: this.areasForBlocks('LeastRun'),
      decisionLabels: this.areasForBlocks('DecisionLabel'),
      constraintLabels: this.constraintLabels(constraints),
    };
    return { declaration, knowsDecisions, issues: this.issues };
  }

  /** Two names that say the same, such as `Week.Lower` and `Week_Lower`, are an error; the first one is read on. */
  private namesByRole(): Map<StatementRole, Map<number, RoleName>> {
    const names = new Map<StatementRole, Map<number, RoleName>>();
    for (const roleName of namesOfPlan(this.workbook, this.plan)) {
      const ofRole = names.get(roleName.role) ?? new Map<number, RoleName>();
      names.set(roleName.role, ofRole);
      const rival = ofRole.get(roleName.number);
      if (rival === undefined) {
        ofRole.set(roleName.number, roleName);
      } else {
        const both = [rival.definedName.name, roleName.definedName.name];
        this.issues.push(statementIssue('duplicate-name', null, { names: both }));
      }
    }
    return names;
  }

  private named(role: StatementRole): ReadonlyMap<number, RoleName> {
    return this.names.get(role) ?? new Map<number, RoleName>();
  }

  private nameOf(role: StatementRole, number = 1): string {
    return this.named(role).get(number)?.definedName.name ?? nameOfRole(this.plan, role, number);
  }

  private checkDecisionNumbers(): boolean {
    const numbers = [...this.named('Decision').keys()];
    if (!numbers.includes(1)) {
      const facts = { plan: this.plan.name, name: this.nameOf('Decision') };
      this.issues.push(statementIssue('missing-decision', null, facts));
      return false;
    }
    return this.checkNumbering(numbers, (number) => this.nameOf('Decision', number));
  }

  /** Numbers must run 1, 2, 3 … */
  private checkNumbering(numbers: readonly number[], nameOf: (number: number) => string): boolean {
    const sorted = [...numbers].sort((a, b) => a - b);
    const gap = sorted.findIndex((number, i) => number !== i + 1);
    if (gap >= 0) {
      const facts = { name: nameOf(gap + 1), present: nameOf(sorted[gap]) };
      this.issues.push(statementIssue('numbering-gap', null, facts));
    }
    return gap < 0;
  }

  /** What a name declares; reports and gives undefined where it refers to no cells. */
  private resolve(roleName: RoleName): Declared | undefined {
    const { definedName, number, isNumbered } = roleName;
    const { name } = definedName;
    const resolution = resolveName(this.workbook, definedName);
    switch (resolution.kind) {
      case 'ranges': {
        const area = { name, number, isNumbered, ranges: resolution.ranges };
        if (roleName.role !== 'Decision' && repeatsCells(area)) {
          this.issues.push(statementIssue('repeated-cells', firstCellOf(area), { name }));
          return undefined;
        }
        return area;
      }
      case 'constant':
        return { name, number, text: String(resolution.value) };
      case 'dead':
        this.issues.push(statementIssue('dead-name', null, { name }));
        return undefined;
      case 'external':
        this.issues.push(statementIssue('external-name', null, { name }));
        return undefined;
      case 'unknown':
        this.issues.push(statementIssue('unknown-name-target', null, { name, what: resolution.what }));
        return undefined;
      case 'computed':
        this.issues.push(statementIssue('computed-name', null, { name, function: resolution.functionName }));
        return undefined;
      case 'not-a-range':
        this.issues.push(statementIssue('not-a-range', null, { name }));
        return undefined;
    }
  }

  private area(roleName: RoleName): NamedArea | undefined {
    const declared = this.resolve(roleName);
    if (declared !== undefined && isConstant(declared)) {
      this.issues.push(statementIssue('not-a-range', null, { name: declared.name }));
      return undefined;
    }
    return declared;
  }

  private areas(role: StatementRole): NamedArea[] {
    return [...this.named(role).values()]
      .map((roleName) => this.area(roleName))
      .filter((area): area is NamedArea => area !== undefined);
  }

  /** The areas of a role that goes by decision blocks; one for a further block that is not there is an error. */
  private areasForBlocks(role: StatementRole): NamedArea[] {
    for (const [number, { definedName }] of this.named(role)) {
      if (number > 1 && !this.named('Decision').has(number)) {
        const facts = { name: definedName.name, block: this.nameOf('Decision', number) };
        this.issues.push(statementIssue('name-without-block', null, facts));
      }
    }
    return this.areas(role);
  }

  private objective(): NamedArea[] {
    if (!this.named('Objective').has(1)) {
      this.issues.push(statementIssue('missing-objective', null, { name: this.nameOf('Objective') }));
    }
    return this.areasForBlocks('Objective');
  }

  private sense(): Declared | null {
    const senses = this.named('Sense');
    for (const [number, { definedName }] of senses) {
      if (number !== 1) {
        const facts = { name: definedName.name, block: this.nameOf('Sense') };
        this.issues.push(statementIssue('name-without-block', null, facts));
      }
    }
    const roleName = senses.get(1);
    if (roleName === undefined) {
      this.issues.push(statementIssue('missing-sense', null, { name: this.nameOf('Sense') }));
      return null;
    }
    return this.resolve(roleName) ?? null;
  }

  private constraints(): (BlockDeclaration | PartsDeclaration)[] {
    const blocks = this.named('Constraint');
    const partsNumbers = new Set(
      [...this.named('Left').keys(), ...this.named('Relation').keys(), ...this.named('Right').keys()].sort(
        (a, b) => a - b,
      ),
    );
    const numbers = new Set([...blocks.keys(), ...partsNumbers]);
    this.checkNumbering([...numbers], (number) =>
      this.nameOf(partsNumbers.has(number) && !blocks.has(number) ? 'Left' : 'Constraint', number),
    );

    const declarations: (BlockDeclaration | PartsDeclaration)[] = [];
    for (const [number, roleName] of blocks) {
      const block = this.area(roleName);
      if (block !== undefined) {
        declarations.push({ kind: 'block', number, block });
      }
    }
    for (const written of partsNumbers) {
      const number = blocks.has(written) ? Math.max(...numbers) + 1 : written;
      numbers.add(number);
      const parts = this.parts(written);
      if (parts !== undefined) {
        declarations.push({ ...parts, number });
      }
    }
    return declarations.sort((a, b) => a.number - b.number);
  }

  private parts(number: number): PartsDeclaration | undefined {
    const roles = ['Left', 'Relation', 'Right'] as const;
    const present = roles.filter((role) => this.named(role).has(number));
    for (const role of roles) {
      if (!present.includes(role)) {
        const facts = { name: this.nameOf(role, number), present: this.nameOf(present[0], number) };
        this.issues.push(statementIssue('missing-part', null, facts));
      }
    }
    const left = this.named('Left').get(number);
    const relation = this.named('Relation').get(number);
    const right = this.named('Right').get(number);
    const leftArea = left && this.area(left);
    const relationDeclared = relation && this.resolve(relation);
    const rightArea = right && this.area(right);
    if (leftArea === undefined || relationDeclared === undefined || rightArea === undefined) {
      return undefined;
    }
    return { kind: 'parts', number, left: leftArea, relation: relationDeclared, right: rightArea };
  }

  private constraintLabels(constraints: readonly { readonly number: number }[]): NamedArea[] {
    const labels = this.named('ConstraintLabel');
    const hasFaultySet = constraints.length < this.named('Constraint').size + this.named('Left').size;
    for (const [number, { definedName }] of labels) {
      if (!hasFaultySet && !constraints.some((set) => set.number === number)) {
        const facts = { name: definedName.name, block: this.nameOf('Constraint', number) };
        this.issues.push(statementIssue('name-without-block', null, facts));
      }
    }
    return this.areas('ConstraintLabel');
  }
}
