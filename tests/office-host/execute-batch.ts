/**
 * Carries out one batch of the library on the workbook: action by action, each object found by its path. The first
 * action that fails ends the batch; what was done before it stays done.
 */
import { HostError } from './host-error';
import { HostObject, type HostSession } from './object-kind';
import {
  actionTypes,
  pathTypes,
  type Action,
  type ArgumentInfo,
  type BatchRequest,
  type BatchResponse,
  type QueryInfo,
} from './wire-protocol';
import { internalServiceKind, workbookKind } from './workbook-kinds';

/** @param breaksBefore an error to be met before the action of this position */
export function executeBatch(
  request: BatchRequest,
  session: HostSession,
  breaksBefore?: { readonly position: number; readonly error: HostError },
): BatchResponse {
  const batch = new Batch(request, session);
  const results: { ActionId: number; Value: unknown }[] = [];
  let position = 0;
  try {
    for (const action of request.Actions) {
      if (position === breaksBefore?.position) throw breaksBefore.error;
      results.push({ ActionId: action.Id, Value: batch.perform(action) ?? null });
      position++;
    }
    if (breaksBefore !== undefined && breaksBefore.position >= position) throw breaksBefore.error;
    return { Results: results };
  } catch (error) {
    if (!(error instanceof HostError)) throw error;
    return {
      Results: results,
      Error: {
        Code: error.code,
        Message: error.message,
        Location: error.location,
        // The library looks the failed statement up, so it must be one of the batch.
        ActionIndex: Math.min(position, request.Actions.length - 1),
        HttpStatusCode: 400,
      },
    };
  }
}

class Batch {
  /** Objects found so far, by the id of their path; null for null objects. */
  private readonly found = new Map<number, HostObject | null>();

  constructor(
    private readonly request: BatchRequest,
    private readonly session: HostSession,
  ) {}

  perform(action: Action): unknown {
    if (action.ActionType === actionTypes.trace) return null;
    const object = this.objectAt(action.ObjectPathId);
    switch (action.ActionType) {
      case actionTypes.instantiate:
        return object === null ? null : this.identityOf(object);
      case actionTypes.query:
        return object === null ? null : this.query(object, action.QueryInfo ?? {});
      case actionTypes.setProperty:
        if (object !== null) this.setProperty(object, action);
        return null;
      case actionTypes.method: {
        if (object === null) return null;
        const result = this.call(object, action.Name, action.ArgumentInfo);
        return result instanceof HostObject ? this.identityOf(result) : result;
      }
      default:
        throw new HostError('UnsupportedOperation', `action type ${action.ActionType}`);
    }
  }

  private objectAt(pathId: number): HostObject | null {
    const known = this.found.get(pathId);
    if (known !== undefined) return known;
    const object = this.find(pathId);
    this.found.set(pathId, object);
    return object;
  }

  private find(pathId: number): HostObject | null {
    const path = this.request.ObjectPaths[String(pathId)];
    switch (path.ObjectPathType) {
      case pathTypes.global:
        return HostObject.of(workbookKind, null);
      case pathTypes.newObject:
        if (path.Name !== internalServiceKind.name) throw new HostError('ApiNotFound', path.Name);
        return HostObject.of(internalServiceKind, null);
      case pathTypes.nullObject:
        return null;
      case pathTypes.referenceId: {
        const kept = this.session.references.get(path.Name);
        if (kept === undefined) throw new HostError('InvalidReference');
        return kept;
      }
    }
    const parent = path.ParentObjectPathId === undefined ? null : this.objectAt(path.ParentObjectPathId);
    if (parent === null) return null;
    switch (path.ObjectPathType) {
      case pathTypes.property: {
        const lead = parent.kind.objects?.[path.Name];
        if (lead === undefined) throw unknownMember(parent, path.Name);
        return lead(parent.target, this.session);
      }
      case pathTypes.method: {
        const result = this.call(parent, path.Name, path.ArgumentInfo);
        if (result !== null && !(result instanceof HostObject)) throw unknownMember(parent, path.Name);
        return result;
      }
      case pathTypes.indexer: {
        const [key] = this.argumentsOf(path.ArgumentInfo);
        const getItem = parent.kind.methods?.GetItem;
        const item = getItem?.(parent.target, this.session, key);
        if (!(item instanceof HostObject)) throw unknownMember(parent, 'getItem');
        return item;
      }
      default:
        throw new HostError('InvalidObjectPath', path.Name);
    }
  }

  private call(object: HostObject, name: string, info: ArgumentInfo | undefined): unknown {
    const method = object.kind.methods?.[name];
    if (method === undefined) throw unknownMember(object, name);
    this.session.usedMembers.add(`${object.kind.name}.${name}`);
    return method(object.target, this.session, ...this.argumentsOf(info));
  }

  private setProperty(object: HostObject, action: Action): void {
    const setter = object.kind.set?.[action.Name];
    if (setter === undefined) throw unknownMember(object, action.Name);
    setter(object.target, this.argumentsOf(action.ArgumentInfo)[0], this.session);
  }

  private argumentsOf(info: ArgumentInfo | undefined): readonly unknown[] {
    const references = info?.ReferencedObjectPathIds;
    return (info?.Arguments ?? []).map((value, position) => {
      const pathId = references?.[position];
      return typeof pathId === 'number' && pathId > 0 ? this.objectAt(pathId) : value;
    });
  }

  private identityOf(object: HostObject): Readonly<Record<string, unknown>> {
    return object.kind.identity?.(object.target, this.session) ?? {};
  }

  private query(object: HostObject, { Select: select = [] }: QueryInfo): Record<string, unknown> {
    if (object.kind.items === undefined) return this.pick(object, select);
    const inner = select
      .filter((path) => path.toLowerCase() !== 'items')
      .map((path) => path.replace(/^items\//i, ''));
    const items = object.kind.items(object.target, this.session);
    return { ...this.identityOf(object), _Items: items.map((item) => this.pick(item, inner)) };
  }

  /** The properties asked for, or all where none is named; `format/wrapText` asks the object that Format leads to. */
  private pick(object: HostObject, select: readonly string[]): Record<string, unknown> {
    const { kind, target } = object;
    const picked: Record<string, unknown> = { ...this.identityOf(object) };
    const byLead = new Map<string, string[]>();
    for (const path of select.length === 0 ? Object.keys(kind.get ?? {}) : select) {
      const [first, ...rest] = path.split('/');
      if (rest.length > 0) {
        byLead.set(first, [...(byLead.get(first) ?? []), rest.join('/')]);
        continue;
      }
      const name = memberNamed(kind.get, first);
      if (name !== undefined) {
        this.session.usedMembers.add(`${kind.name}.${name}`);
        picked[name] = kind.get![name](target, this.session);
      } else if (memberNamed(kind.objects, first) !== undefined) byLead.set(first, []);
      else throw unknownMember(object, first);
    }
    for (const [lead, paths] of byLead) {
      const name = memberNamed(kind.objects, lead);
      if (name === undefined) throw unknownMember(object, lead);
      const inner = kind.objects![name](target, this.session);
      picked[name] = inner === null ? null : this.query(inner, { Select: paths });
    }
    return picked;
  }
}

/** Properties are asked for in the caller's spelling. */
function memberNamed(
  members: Readonly<Record<string, unknown>> | undefined,
  name: string,
): string | undefined {
  const wanted = name.toLowerCase();
  return Object.keys(members ?? {}).find((member) => member.toLowerCase() === wanted);
}

function unknownMember(object: HostObject, name: string): HostError {
  return new HostError('ApiNotFound', `${object.kind.name}.${name}`);
}
