/**
 * Defined names, as the library sees them. A name that leads nowhere, to several areas or to a computed range has no
 * range to give, as in Excel.
 */
import { resolveName } from '../../addin/domain/formula/resolve-reference';
import { absoluteRangeText } from '../../addin/domain/sheet/cell-range';
import { HostError } from './host-error';
import type { HostSheet } from './host-sheet';
import type { HostName } from './host-workbook';
import { HostObject, type HostSession, type ObjectKind } from './object-kind';
import { rangeObject, type RangeTarget } from './range-kinds';

/** The workbook's own names, or one sheet's. */
export interface NamesTarget {
  readonly scope: HostSheet | undefined;
}

const looksLikeCell = /^([A-Za-z]{1,3}[0-9]{1,7}|[Rr]([0-9]*([Cc][0-9]*)?)?|[Cc][0-9]*)$/;

function nameObject({ scope }: NamesTarget, session: HostSession, key: unknown): HostObject {
  const name = session.workbook.findName(String(key), scope);
  if (name === undefined) throw new HostError('ItemNotFound', 'NamedItemCollection.getItem');
  return HostObject.of(namedItemKind, name);
}

export const namedItemCollectionKind: ObjectKind<NamesTarget> = {
  name: 'NamedItemCollection',
  items: ({ scope }, { workbook }) =>
    workbook.namesOf(scope).map((name) => HostObject.of(namedItemKind, name)),
  methods: {
    GetItem: nameObject,
    GetItemOrNullObject: ({ scope }, { workbook }, key) => {
      const name = workbook.findName(String(key), scope);
      return name === undefined ? null : HostObject.of(namedItemKind, name);
    },
    GetCount: ({ scope }, { workbook }) => workbook.namesOf(scope).length,
    Add: ({ scope }, session, key, reference, comment) => {
      const name = String(key);
      session.refuseWrite(undefined, 'NamedItemCollection.add');
      if (!/^[\p{L}_\\][\p{L}\p{M}\p{N}_.\\?]*$/u.test(name) || looksLikeCell.test(name)) {
        throw new HostError('InvalidArgument', 'NamedItemCollection.add');
      }
      if (session.workbook.findName(name, scope) !== undefined) {
        throw new HostError('ItemAlreadyExists', 'NamedItemCollection.add');
      }
      const added = session.workbook.addName(
        name,
        scope,
        formulaOf(reference),
        typeof comment === 'string' ? comment : '',
      );
      return HostObject.of(namedItemKind, added);
    },
  },
};

function formulaOf(reference: unknown): string {
  if (reference instanceof HostObject) {
    const range = reference.target as RangeTarget;
    return absoluteRangeText({ ...range, sheet: range.sheet.name });
  }
  return String(reference).replace(/^=/, '');
}

function rangeOfName(name: HostName, session: HostSession): HostObject | undefined {
  const { workbook } = session;
  const resolution = resolveName(workbook.snapshot(), {
    name: name.name,
    scope: name.scope?.name ?? null,
    formula: name.formula,
    isHidden: !name.isVisible,
  });
  if (resolution.kind !== 'ranges' || resolution.ranges.length !== 1) return undefined;
  const [range] = resolution.ranges;
  return rangeObject(workbook.sheetNamed(range.sheet)!, range);
}

const namedItemKind: ObjectKind<HostName> = {
  name: 'NamedItem',
  identity: ({ name, scope }) => ({ _Id: `${scope?.id ?? ''}${name}` }),
  get: {
    _Id: ({ name, scope }) => `${scope?.id ?? ''}${name}`,
    Name: ({ name }) => name,
    Formula: ({ formula }) => `=${formula}`,
    Visible: ({ isVisible }) => isVisible,
    Comment: ({ comment }) => comment,
    Scope: ({ scope }) => (scope === undefined ? 'Workbook' : 'Worksheet'),
    Type: (name, session) => (rangeOfName(name, session) === undefined ? 'Error' : 'Range'),
  },
  set: {
    Formula: (name, formula, session) => {
      session.refuseWrite(undefined, 'NamedItem.formula');
      name.formula = String(formula).replace(/^=/, '');
      session.workbook.structureChanged();
    },
    Visible: (name, isVisible, session) => {
      session.refuseWrite(undefined, 'NamedItem.visible');
      name.isVisible = isVisible === true;
    },
    Comment: (name, comment) => {
      name.comment = String(comment);
    },
  },
  methods: {
    GetRange: (name, session) => {
      const range = rangeOfName(name, session);
      if (range === undefined) throw new HostError('InvalidOperation', 'NamedItem.getRange');
      return range;
    },
    GetRangeOrNullObject: (name, session) => rangeOfName(name, session) ?? null,
    Delete: (name, session) => {
      session.refuseWrite(undefined, 'NamedItem.delete');
      session.workbook.deleteName(name);
      return null;
    },
  },
};
