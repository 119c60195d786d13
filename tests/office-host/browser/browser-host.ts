/**
 * The pane inside Excel on the web, in a real browser: a page that plays Excel holds the unmodified pane in a frame,
 * and the library that the pane asks Microsoft for comes from the npm package. The workbook stays in this process.
 *
 * Nothing goes to the network: whatever is not the pane's own or the library's is refused, and listed.
 */
import { existsSync } from 'node:fs';
import path from 'node:path';
import { chromium, type Browser, type Frame, type Page } from 'playwright-core';
import { officeLibraryFolder } from '../node-host';
import type { OfficeHost } from '../office-host';
import { holdPaneFrame, type FrameSettings, type FrameWindow } from './frame-protocol';

/** The one address under which everything of the test stands. */
export const testOrigin = 'https://localhost:3443';
const excelPage = `${testOrigin}/excel-frame`;
/** Where Microsoft has the library, for every add-in. */
const libraryAddress = 'https://appsforoffice.microsoft.com/lib/1/hosted/';

export interface BrowserHostOptions {
  readonly displayLanguage?: string;
  readonly contentLanguage?: string;
  readonly width?: number;
  readonly height?: number;
}

export interface PaneInExcel {
  readonly page: Page;
  /** The pane's own frame. */
  readonly pane: Frame;
  /** Addresses that were asked for and refused. */
  readonly refused: readonly string[];
  /** Errors that no one caught, and messages of the console that are errors. */
  readonly faults: readonly string[];
  /** Presses a ribbon button that is wired to a function. */
  readonly invokeCommand: (id: string, functionName: string) => Promise<void>;
}

/** Chromium, as it runs on build machines. */
export function launchBrowser(program: string): Promise<Browser> {
  return chromium.launch({
    executablePath: program,
    args: [
      '--no-sandbox',
      '--disable-gpu',
      '--disable-quic',
      '--no-first-run',
      '--disable-background-networking',
      '--disable-component-update',
      '--disable-sync',
    ],
  });
}

/**
 * @param files the folder that the pane is built into, or how to answer for its files; asked by path from the origin
 * @param panePath `/pane.html`
 */
export async function openPaneInExcel(
  page: Page,
  host: OfficeHost,
  files: string | ((path: string) => PageFile | undefined),
  panePath: string,
  options: BrowserHostOptions = {},
): Promise<PaneInExcel> {
  const refused: string[] = [];
  const faults: string[] = [];
  page.on('pageerror', (error) => faults.push(error.message));
  page.on('console', (message) => {
    if (message.type() === 'error') faults.push(message.text());
  });
  await page.exposeFunction(
    'planrowExchange',
    async (text: string, flags: number): Promise<string | null> => {
      await host.beforeAnswer?.();
      const answer = host.exchange(text, flags) ?? null;
      // After the answer has gone out, as in the product.
      setImmediate(() => host.flushEvents());
      return answer;
    },
  );
  const fileOf = typeof files === 'string' ? (asked: string) => fileIn(files, asked) : files;
  await page.context().route('**/*', async (route) => {
    const address = route.request().url();
    if (address.startsWith(libraryAddress)) {
      const name = new URL(address).pathname.replace('/lib/1/hosted/', '');
      const file = path.join(officeLibraryFolder(), name);
      if (existsSync(file)) await route.fulfill({ path: file, contentType: 'text/javascript' });
      else await route.fulfill({ status: 404, body: '' });
    } else if (address === excelPage) {
      await route.fulfill({
        contentType: 'text/html',
        body: '<!doctype html><title>Excel</title><body style="margin:0">',
      });
    } else if (address.startsWith(`${testOrigin}/`)) {
      const file = fileOf(new URL(address).pathname);
      if (file === undefined) await route.fulfill({ status: 404, body: '' });
      else await route.fulfill(file);
    } else {
      refused.push(address);
      await route.abort();
    }
  });
  await page.goto(excelPage);
  const settings: FrameSettings = {
    paneUrl: testOrigin + panePath,
    requirementSet: host.requirementSet,
    displayLanguage: options.displayLanguage ?? 'en-US',
    contentLanguage: options.contentLanguage ?? 'en-US',
    width: options.width ?? 350,
    height: options.height ?? 640,
  };
  await page.evaluate(holdPaneFrame, settings);
  host.deliver = (event) => {
    void page.evaluate((sent) => (window as unknown as FrameWindow).planrowEvent(sent), event);
  };
  const element = await page.waitForSelector('#pane');
  const pane = (await element.contentFrame())!;
  await pane.waitForFunction(() => {
    const { Office: library, OfficeExtension: extension } = window as unknown as OfficeGlobals;
    if (library?.context?.requirements === undefined || extension === undefined) return false;
    // The library refuses what is beyond the host's requirement set.
    extension.CommonUtility._doApiNotSupportedCheck = true;
    return true;
  });
  return {
    page,
    pane,
    refused,
    faults,
    invokeCommand: (id, functionName) =>
      page.evaluate(([buttonId, name]) => (window as unknown as FrameWindow).planrowCommand(buttonId, name), [
        id,
        functionName,
      ] as const),
  };
}

interface OfficeGlobals {
  readonly Office?: { readonly context?: { readonly requirements?: unknown } };
  readonly OfficeExtension?: { readonly CommonUtility: { _doApiNotSupportedCheck: boolean } };
}

/** What the browser gets for an address. */
export interface PageFile {
  readonly path?: string;
  readonly body?: string;
  readonly contentType?: string;
  readonly headers?: Record<string, string>;
}

const contentTypes: Readonly<Record<string, string>> = {
  '.html': 'text/html',
  '.js': 'text/javascript',
  '.mjs': 'text/javascript',
  '.css': 'text/css',
  '.png': 'image/png',
  '.svg': 'image/svg+xml',
  '.json': 'application/json',
};

function fileIn(folder: string, asked: string): PageFile | undefined {
  const file = path.join(folder, path.normalize(decodeURIComponent(asked)));
  if (!file.startsWith(folder) || !existsSync(file)) return undefined;
  return { path: file, contentType: contentTypes[path.extname(file)] ?? 'application/octet-stream' };
}
