/**
 * The workbook itself and what hangs on it directly: its sheets, the application, custom XML parts, settings.
 */
import { HostError } from './host-error';
import type { HostXmlPart } from './host-workbook';
import { namedItemCollectionKind } from './name-kinds';
import { HostObject, type HostSession, type ObjectKind } from './object-kind';
import { areasObject, rangeObject } from './range-kinds';
import { wholeWorkbookTarget } from './wire-protocol';
import { eventMethods, tableCollectionKind, worksheetKind } from './worksheet-kinds';

/** Things of which there is one a workbook have no target of their own. */
type Only = null;

export const workbookKind: ObjectKind<Only> = {
  name: 'Workbook',
  get: { Name: () => 'Week.xlsx', ReadOnly: (_, { workbook }) => workbook.isReadOnly, IsDirty: () => false },
  objects: {
    Worksheets: () => HostObject.of(worksheetCollectionKind, null),
    Names: () => HostObject.of(namedItemCollectionKind, { scope: undefined }),
    Tables: () => HostObject.of(tableCollectionKind, { sheet: undefined }),
    Application: () => HostObject.of(applicationKind, null),
    CustomXmlParts: () => HostObject.of(customXmlPartCollectionKind, null),
    Protection: () => HostObject.of(workbookProtectionKind, null),
    Settings: () => HostObject.of(settingCollectionKind, null),
    Functions: () => HostObject.of(functionsKind, null),
    _Runtime: () => HostObject.of(runtimeKind, null),
  },
  methods: {
    GetSelectedRange: (_, { workbook }) => {
      const { sheet, ranges } = workbook.selection;
      if (ranges.length !== 1) throw new HostError('InvalidSelection', 'Workbook.getSelectedRange');
      return rangeObject(sheet, ranges[0]);
    },
    GetSelectedRanges: (_, { workbook }) => areasObject(workbook.selection.sheet, workbook.selection.ranges),
    GetActiveCell: (_, { workbook }) => {
      const { sheet, ranges } = workbook.selection;
      const [{ top, left }] = ranges;
      return rangeObject(sheet, { top, left, bottom: top, right: left });
    },
    _RemoveReference: (_, { references }, id) => {
      references.delete(String(id));
      return null;
    },
  },
};

/** What the library reports to when it has loaded. */
export const internalServiceKind: ObjectKind<Only> = {
  name: 'Microsoft.InternalService.AddinInternalService',
  methods: { NotifyActionHandlerReady: () => null },
};

function sheetObject(session: HostSession, key: unknown): HostObject {
  const sheet = session.workbook.findSheet(String(key));
  if (sheet === undefined) throw new HostError('ItemNotFound', 'WorksheetCollection.getItem');
  return HostObject.of(worksheetKind, sheet);
}

const worksheetCollectionKind: ObjectKind<Only> = {
  name: 'WorksheetCollection',
  items: (_, { workbook }) => workbook.sheets.map((sheet) => HostObject.of(worksheetKind, sheet)),
  methods: {
    GetItem: (_, session, key) => sheetObject(session, key),
    GetItemOrNullObject: (_, { workbook }, key) => {
      const sheet = workbook.findSheet(String(key));
      return sheet === undefined ? null : HostObject.of(worksheetKind, sheet);
    },
    GetCount: (_, { workbook }) => workbook.sheets.length,
    GetActiveWorksheet: (_, { workbook }) => HostObject.of(worksheetKind, workbook.selection.sheet),
    Add: (_, session, name) => {
      session.refuseWrite(undefined, 'WorksheetCollection.add');
      const { workbook } = session;
      if (workbook.isStructureProtected) throw new HostError('AccessDenied', 'WorksheetCollection.add');
      const wanted = typeof name === 'string' ? name : `Sheet${workbook.sheets.length + 1}`;
      if (workbook.sheetNamed(wanted) !== undefined) {
        throw new HostError('ItemAlreadyExists', 'WorksheetCollection.add');
      }
      return HostObject.of(worksheetKind, workbook.addSheet(wanted));
    },
    ...eventMethods<Only>(() => wholeWorkbookTarget),
  },
};

const applicationKind: ObjectKind<Only> = {
  name: 'Application',
  get: {
    CalculationMode: (_, { workbook }) => workbook.calculationMode,
    CalculationState: () => 'Done',
  },
  set: {
    CalculationMode: (_, mode, { workbook }) => {
      workbook.calculationMode = mode as typeof workbook.calculationMode;
    },
  },
  methods: {
    Calculate: (_, { workbook }) => {
      workbook.calculate('all');
      return null;
    },
    SuspendScreenUpdatingUntilNextSync: () => null,
    SuspendApiCalculationUntilNextSync: () => null,
  },
};

const runtimeKind: ObjectKind<Only> = {
  name: 'Runtime',
  get: { EnableEvents: () => true },
};

const workbookProtectionKind: ObjectKind<Only> = {
  name: 'WorkbookProtection',
  get: { Protected: (_, { workbook }) => workbook.isStructureProtected },
};

const namespaceOf = (xml: string): string => /<[^>!?]*?\sxmlns="([^"]*)"/.exec(xml)?.[1] ?? '';

const customXmlPartCollectionKind: ObjectKind<Only> = {
  name: 'CustomXmlPartCollection',
  items: (_, { workbook }) => workbook.xmlParts.map((part) => HostObject.of(customXmlPartKind, part)),
  methods: {
    GetItem: (_, session, key) => xmlPartObject(session, key),
    GetByNamespace: (_, __, namespace) =>
      HostObject.of(customXmlPartScopedCollectionKind, { namespace: String(namespace) }),
    Add: (_, session, xml) => {
      session.refuseWrite(undefined, 'CustomXmlPartCollection.add');
      return HostObject.of(customXmlPartKind, session.workbook.addXmlPart(wellFormed(xml)));
    },
  },
};

function xmlPartObject({ workbook }: HostSession, key: unknown): HostObject {
  const part = workbook.xmlParts.find(({ id }) => id === key);
  if (part === undefined) throw new HostError('ItemNotFound', 'CustomXmlPartCollection.getItem');
  return HostObject.of(customXmlPartKind, part);
}

const customXmlPartScopedCollectionKind: ObjectKind<{ readonly namespace: string }> = {
  name: 'CustomXmlPartScopedCollection',
  items: (target, { workbook }) =>
    workbook.xmlParts
      .filter(({ xml }) => namespaceOf(xml) === target.namespace)
      .map((part) => HostObject.of(customXmlPartKind, part)),
  methods: {
    GetItem: (_target, session, key) => xmlPartObject(session, key),
    GetOnlyItemOrNullObject: (target, { workbook }) => {
      const found = workbook.xmlParts.filter(({ xml }) => namespaceOf(xml) === target.namespace);
      return found.length === 1 ? HostObject.of(customXmlPartKind, found[0]) : null;
    },
    GetCount: (target, { workbook }) =>
      workbook.xmlParts.filter(({ xml }) => namespaceOf(xml) === target.namespace).length,
  },
};

/** Only what a part must not be: text that no XML parser takes. */
function wellFormed(xml: unknown): string {
  const text = String(xml);
  const isElement = /^(<\?xml[^>]*\?>\s*)?<([\w:]+)(\s[^>]*)?>[^<]*<\/\2>\s*$/.test(text);
  if (!isElement || /&(?!amp;|lt;|gt;|quot;|apos;|#)/.test(text)) {
    throw new HostError('InvalidArgument', 'CustomXmlPart.setXml');
  }
  return text;
}

const customXmlPartKind: ObjectKind<HostXmlPart> = {
  name: 'CustomXmlPart',
  identity: ({ id }) => ({ Id: id }),
  get: { Id: ({ id }) => id, NamespaceUri: ({ xml }) => namespaceOf(xml) },
  methods: {
    GetXml: ({ xml }) => xml,
    SetXml: (part, session, xml) => {
      session.refuseWrite(undefined, 'CustomXmlPart.setXml');
      part.xml = wellFormed(xml);
      return null;
    },
    Delete: (part, session) => {
      session.refuseWrite(undefined, 'CustomXmlPart.delete');
      const { xmlParts } = session.workbook;
      xmlParts.splice(xmlParts.indexOf(part), 1);
      return null;
    },
  },
};

interface SettingTarget {
  readonly key: string;
}

const settingCollectionKind: ObjectKind<Only> = {
  name: 'SettingCollection',
  items: (_, { workbook }) => [...workbook.settings.keys()].map((key) => HostObject.of(settingKind, { key })),
  methods: {
    GetItem: (_, session, key) => settingObject(session, key),
    GetItemOrNullObject: (_, { workbook }, key) =>
      workbook.settings.has(String(key)) ? HostObject.of(settingKind, { key: String(key) }) : null,
    Add: (_, session, key, value) => {
      session.refuseWrite(undefined, 'SettingCollection.add');
      session.workbook.settings.set(String(key), value);
      return HostObject.of(settingKind, { key: String(key) });
    },
  },
};

function settingObject({ workbook }: HostSession, key: unknown): HostObject {
  if (!workbook.settings.has(String(key))) throw new HostError('ItemNotFound', 'SettingCollection.getItem');
  return HostObject.of(settingKind, { key: String(key) });
}

const settingKind: ObjectKind<SettingTarget> = {
  name: 'Setting',
  identity: ({ key }) => ({ _Id: key }),
  get: { Key: ({ key }) => key, Value: ({ key }, { workbook }) => workbook.settings.get(key) },
  set: {
    Value: ({ key }, value, session) => {
      session.refuseWrite(undefined, 'Setting.value');
      session.workbook.settings.set(key, value);
    },
  },
  methods: {
    Delete: ({ key }, { workbook }) => {
      workbook.settings.delete(key);
      return null;
    },
  },
};

/** Worksheet functions called by name. DATE alone: its result tells how the workbook counts days. */
const functionsKind: ObjectKind<Only> = {
  name: 'Functions',
  methods: {
    Date: (_, { workbook }, year, month, day) => {
      const days = Date.UTC(year as number, (month as number) - 1, day as number) / 86_400_000;
      const serial = days + 25_569 - (workbook.usesDates1904 ? 1462 : 0);
      return HostObject.of(functionResultKind, serial);
    },
  },
};

const functionResultKind: ObjectKind<number> = {
  name: 'FunctionResult',
  get: { Value: (value) => value, Error: () => null },
};
