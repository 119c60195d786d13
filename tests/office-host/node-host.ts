/**
 * The genuine Office.js library, unmodified, in Node, speaking to an OfficeHost instead of Excel.
 *
 * The library's build for Excel on the web takes a native bridge where it finds one: two functions that pass JSON. A
 * few objects of a browser's window must be there while it loads; nothing of the library is changed. It checks its
 * own requirement sets, so that a member beyond the host's set fails here as it would there.
 */
import { readFileSync } from 'node:fs';
import { createRequire } from 'node:module';
import path from 'node:path';
import type { WorkbookSnapshot } from '../../addin/domain/sheet/sheet-snapshot';
import { HostWorkbook } from './host-workbook';
import { OfficeHost, type OfficeHostOptions } from './office-host';
import type { EventMessage } from './wire-protocol';

interface Bridge {
  /** Set by the library. */
  onMessageFromHost?: (text: string) => void;
  sendMessageToHost(text: string): void;
}

interface BridgeRequest {
  readonly id: number;
  readonly flags: number;
  readonly message: { readonly body: unknown };
}

interface LibraryGlobals {
  Excel: typeof Excel;
  OSF: { _OfficeAppFactory: { getContext: () => unknown } };
  OfficeExtension: { CommonUtility: { _doApiNotSupportedCheck: boolean } };
}

const messageTypes = { response: 2, event: 3 };
/** Category of events among the host's messages. */
const eventCategory = 65_536;

let current: OfficeHost | undefined;
let bridge: Bridge | undefined;

/** The library's folder of builds. */
export function officeLibraryFolder(): string {
  const require = createRequire(path.join(process.cwd(), 'package.json'));
  return path.join(path.dirname(require.resolve('@microsoft/office-js/package.json')), 'dist');
}

/**
 * Opens a workbook in a host of its own and lets the library of this process speak to it. The library is loaded once;
 * a host started later takes the place of the one before.
 */
export function startOfficeHost(workbook: WorkbookSnapshot, options: OfficeHostOptions = {}): OfficeHost {
  const host = new OfficeHost(HostWorkbook.of(workbook), options);
  current = host;
  bridge ??= loadLibrary();
  host.deliver = (event) => bridge!.onMessageFromHost?.(eventMessage(event));
  return host;
}

function loadLibrary(): Bridge {
  const made: Bridge = {
    sendMessageToHost(text) {
      const host = current!;
      const request = JSON.parse(text) as BridgeRequest;
      const answer = (): void => {
        const body = host.exchange(JSON.stringify(request.message.body), request.flags);
        if (body === undefined) return;
        const message = { statusCode: 200, headers: {}, body };
        made.onMessageFromHost?.(JSON.stringify({ id: request.id, type: messageTypes.response, message }));
        host.flushEvents();
      };
      if (host.beforeAnswer === undefined) queueMicrotask(answer);
      else void host.beforeAnswer().then(answer);
    },
  };
  standInForWindow(made);
  const folder = officeLibraryFolder();
  // Evaluated in this realm: the library tells plain objects by their prototype.
  const evaluate = eval;
  evaluate('window.Type = Function; Type.registerNamespace = (name) => { window[name] ??= {}; };');
  evaluate('Type.prototype.registerClass = () => undefined;');
  for (const file of ['en-us/office_strings.js', 'excel-web-16.00.js']) {
    evaluate(`${readFileSync(path.join(folder, file), 'utf8')}\n//# sourceURL=${file}`);
  }
  const library = globalThis as unknown as LibraryGlobals;
  library.OfficeExtension.CommonUtility._doApiNotSupportedCheck = true;
  const isSetSupported = (set: string, version?: string): boolean => current!.supports(set, version);
  const context = {
    requirements: { isSetSupported },
    platform: 'OfficeOnline',
    host: 'Excel',
    get officeTheme(): unknown {
      return current!.officeTheme;
    },
  };
  library.OSF._OfficeAppFactory = { getContext: () => context };
  return made;
}

/** What the library looks for in a browser while it loads. */
function standInForWindow(made: Bridge): void {
  const nothing = (): undefined => undefined;
  const element = (): object => ({
    style: {},
    setAttribute: nothing,
    appendChild: nothing,
    getElementsByTagName: () => [],
    href: '',
  });
  const origin = 'https://localhost';
  const standIns = {
    _richApiNativeBridge: made,
    navigator: { userAgent: 'node', appVersion: '', language: 'en-US' },
    location: { href: `${origin}/`, origin, protocol: 'https:', host: 'localhost', search: '', hash: '' },
    document: {
      domain: 'localhost',
      cookie: '',
      URL: `${origin}/`,
      createElement: element,
      getElementsByTagName: () => [],
      addEventListener: nothing,
      documentElement: element(),
      body: element(),
      head: element(),
    },
    addEventListener: nothing,
    removeEventListener: nothing,
    name: '',
    history: {},
    external: {},
    window: globalThis,
    self: globalThis,
    top: globalThis,
    parent: globalThis,
  };
  for (const [name, value] of Object.entries(standIns)) {
    Object.defineProperty(globalThis, name, { value, configurable: true, writable: true });
  }
}

function eventMessage({ messageType, targetId, content }: EventMessage): string {
  const entry = {
    messageCategory: eventCategory,
    messageType,
    targetId,
    message: JSON.stringify(content),
  };
  return JSON.stringify({ type: messageTypes.event, controlId: '', message: { entries: [entry] } });
}
