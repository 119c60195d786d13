/**
 * How a type of the object model is described to the batch executor: its properties, the objects it leads to, its
 * methods and, for collections, its items. Names are as on the wire, so PascalCase.
 */
import type { CellRange } from '../../addin/domain/sheet/cell-range';
import type { HostSheet } from './host-sheet';
import type { HostWorkbook } from './host-workbook';

/** What a member may use besides its own object. */
export interface HostSession {
  readonly workbook: HostWorkbook;
  /** Ranges that the library has asked to be kept, by reference id. */
  readonly references: Map<string, HostObject>;
  /** Registered events, as `type:target`; the target is a sheet's id, or wholeWorkbookTarget. */
  readonly registeredEvents: Set<string>;
  /** Members that were used, as `Range.Values`. */
  readonly usedMembers: Set<string>;
  /** Which cells of an array formula say its text when asked for `formulas`: every one, or the first alone. */
  readonly arrayFormulasShow: 'everywhere' | 'first';
  /** @throws HostError where the workbook or the sheet takes no writes */
  refuseWrite(sheet: HostSheet | undefined, location: string): void;
  /** For events: somebody has written into these cells. */
  noteChange(range: CellRange, sheet: HostSheet): void;
}

export interface ObjectKind<T> {
  readonly name: string;
  /** Sent along whenever the object is, so that the library can find it again. */
  readonly identity?: (target: T, session: HostSession) => Readonly<Record<string, unknown>>;
  readonly get?: Readonly<Record<string, (target: T, session: HostSession) => unknown>>;
  readonly set?: Readonly<Record<string, (target: T, value: unknown, session: HostSession) => void>>;
  readonly objects?: Readonly<Record<string, (target: T, session: HostSession) => HostObject | null>>;
  /** A HostObject, null for a null object, or a plain value. GetItem serves where the library uses an index too. */
  readonly methods?: Readonly<
    Record<string, (target: T, session: HostSession, ...args: unknown[]) => unknown>
  >;
  readonly items?: (target: T, session: HostSession) => readonly HostObject[];
}

/** An object of some kind, whose members can be used without knowing which. */
export class HostObject {
  private constructor(
    readonly kind: ObjectKind<unknown>,
    readonly target: unknown,
  ) {}

  static of<T>(kind: ObjectKind<T>, target: T): HostObject {
    return new HostObject(kind as ObjectKind<unknown>, target);
  }
}
