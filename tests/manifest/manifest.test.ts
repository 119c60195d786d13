/**
 * The add-in's manifest, judged offline by its structure: no schema for it is published in a package.
 * Rules from the Office Add-ins manifest reference (order of elements, four-part version, icon sizes); lengths of ids
 * and texts are from memory.
 */
import { execFileSync } from 'node:child_process';
import { existsSync, mkdtempSync, readdirSync, readFileSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { inflateSync } from 'node:zlib';
import { OfficeAddinManifest } from 'office-addin-manifest';
import { SaxesParser } from 'saxes';
import { requiredExcelApi } from '../../addin/adapters/excel-host/excel-requirements';
import { startCommandOf } from '../../addin/pane/start-command';
import { checkoutFolder } from '../support/needs';

// What the reader needs only for manifests in JSON, or to change one: ES modules, which jest's loader cannot take.
jest.mock('@microsoft/app-manifest', () => ({}));
jest.mock('uuid', () => ({}));

const manifestFolder = path.join(checkoutFolder, 'manifest');
const manifestPath = path.join(manifestFolder, 'manifest.xml');

interface Element {
  readonly name: string;
  readonly attributes: Readonly<Record<string, string>>;
  readonly children: Element[];
  text: string;
}

function parseXml(text: string): Element {
  const root: Element = { name: '', attributes: {}, children: [], text: '' };
  const open = [root];
  const parser = new SaxesParser();
  parser.on('error', (error) => {
    throw error;
  });
  parser.on('opentag', (tag) => {
    const element: Element = { name: tag.name, attributes: tag.attributes, children: [], text: '' };
    open[open.length - 1].children.push(element);
    open.push(element);
  });
  parser.on('text', (content) => {
    open[open.length - 1].text += content;
  });
  parser.on('closetag', () => {
    open.pop();
  });
  parser.write(text).close();
  return root.children[0];
}

function allOf(element: Element): Element[] {
  return [element, ...element.children.flatMap(allOf)];
}

const manifest = parseXml(readFileSync(manifestPath, 'utf8'));
const elements = allOf(manifest);
const named = (name: string): Element[] => elements.filter((element) => element.name === name);
const textOf = (name: string): string => named(name)[0].text;
const urls = elements
  .flatMap((element) => [
    element.attributes.DefaultValue ?? '',
    element.name === 'AppDomain' ? element.text : '',
  ])
  .filter((value) => /^\w+:/.test(value));

/** Width and height from a PNG's header, and its pixels with the filter bytes. */
function readPng(file: string): { width: number; height: number; rows: Buffer } {
  const bytes = readFileSync(file);
  const parts: Buffer[] = [];
  for (let at = 8; at < bytes.length;) {
    const length = bytes.readUInt32BE(at);
    if (bytes.toString('latin1', at + 4, at + 8) === 'IDAT') {
      parts.push(bytes.subarray(at + 8, at + 8 + length));
    }
    at += 12 + length;
  }
  return {
    width: bytes.readUInt32BE(16),
    height: bytes.readUInt32BE(20),
    rows: inflateSync(Buffer.concat(parts)),
  };
}

describe('manifest.xml', () => {
  it('is read by Microsoft’s own manifest reader as a task pane add-in for workbooks', async () => {
    const info = await OfficeAddinManifest.readManifestFile(manifestPath);
    expect(info).toMatchObject({
      displayName: 'Planrow',
      providerName: 'Planrow',
      hosts: ['Workbook'],
      officeAppType: 'TaskPaneApp',
      permissions: 'ReadWriteDocument',
      defaultLocale: 'en-US',
    });
    expect(info.id).toMatch(/^[0-9a-f]{8}-[0-9a-f]{4}-4[0-9a-f]{3}-[89ab][0-9a-f]{3}-[0-9a-f]{12}$/);
  });

  it('has its elements in the order of the reference', () => {
    expect(manifest.attributes['xsi:type']).toBe('TaskPaneApp');
    expect(manifest.children.map((child) => child.name)).toEqual([
      'Id',
      'Version',
      'ProviderName',
      'DefaultLocale',
      'DisplayName',
      'Description',
      'IconUrl',
      'HighResolutionIconUrl',
      'SupportUrl',
      'AppDomains',
      'Hosts',
      'Requirements',
      'DefaultSettings',
      'Permissions',
      'ov:VersionOverrides',
    ]);
    const overrides = named('ov:VersionOverrides')[0];
    expect(overrides.attributes['xsi:type']).toBe('VersionOverridesV1_0');
    expect(overrides.children.map((child) => child.name)).toEqual([
      'ov:Requirements',
      'ov:Hosts',
      'ov:Resources',
    ]);
  });

  it('has the version of package.json, in four parts', () => {
    const { version } = JSON.parse(readFileSync(path.join(checkoutFolder, 'package.json'), 'utf8')) as {
      version: string;
    };
    expect(textOf('Version')).toBe(`${version}.0`);
  });

  it('asks for the ExcelApi that the code asks for, for the pane and for the buttons alike', () => {
    expect(requiredExcelApi).toBe('1.9');
    const sets = [...named('Set'), ...named('bt:Set')].map((set) => set.attributes);
    expect(sets).toEqual([
      { Name: 'ExcelApi', MinVersion: '1.9' },
      { Name: 'ExcelApi', MinVersion: '1.9' },
    ]);
  });

  it('has https addresses only, all of one origin, so that moving it is one change', () => {
    expect(urls.length).toBeGreaterThan(8);
    const origins = new Set(urls.map((url) => new URL(url).origin));
    expect([...origins]).toHaveLength(1);
    expect([...origins][0]).toMatch(/^https:/);
    expect(textOf('AppDomain')).toBe([...origins][0]);
  });

  it('defines each resource that it names, once, and names each that it defines', () => {
    const defined = elements
      .filter(
        (element) => ['bt:Image', 'bt:Url', 'bt:String'].includes(element.name) && 'id' in element.attributes,
      )
      .map((element) => element.attributes.id);
    const used = elements
      .filter((element) => 'resid' in element.attributes)
      .map((element) => element.attributes.resid);
    expect(new Set(defined).size).toBe(defined.length);
    expect([...new Set(used)].sort()).toEqual([...defined].sort());
    expect(defined.filter((id) => id.length > 32)).toEqual([]);
  });

  it('keeps its texts short enough for where they are shown', () => {
    const tooLong = (list: string, limit: number): string[] =>
      named(list)
        .flatMap((element) => element.children)
        .map((element) => element.attributes.DefaultValue)
        .filter((text) => text.length > limit);
    expect(tooLong('bt:ShortStrings', 125)).toEqual([]);
    expect(tooLong('bt:LongStrings', 250)).toEqual([]);
    expect(named('Description')[0].attributes.DefaultValue.length).toBeLessThanOrEqual(250);
  });

  it('opens the same page from the button as from the list of add-ins', () => {
    const pane = named('bt:Url').find((url) => url.attributes.id === 'Pane.Url');
    expect(pane?.attributes.DefaultValue).toBe(named('SourceLocation')[0].attributes.DefaultValue);
  });
});

describe('the buttons', () => {
  const controls = named('ov:Control');
  const urlOf = (resid: string): URL => {
    const found = named('bt:Url').find((url) => url.attributes.id === resid);
    return new URL(found!.attributes.DefaultValue);
  };
  const actionOf = (control: Element): Element => control.children.find(({ name }) => name === 'ov:Action')!;
  const within = (element: Element, name: string): Element =>
    element.children.find((child) => child.name === name)!;

  it('have ids of their own, and all open the one pane', () => {
    expect(controls.map(({ attributes }) => attributes.id)).toEqual([
      'Planrow.OpenPane',
      'Planrow.Solve',
      'Planrow.PutBack',
      'Planrow.OpenFromCell',
    ]);
    for (const control of controls) {
      expect(actionOf(control).attributes['xsi:type']).toBe('ShowTaskpane');
      expect(within(actionOf(control), 'ov:TaskpaneId').text).toBe('Planrow.Pane');
    }
  });

  it('each open the pane with a command that it knows', () => {
    const commands = controls.map((control) => {
      const { pathname, search } = urlOf(within(actionOf(control), 'ov:SourceLocation').attributes.resid);
      return [pathname, startCommandOf(search)];
    });
    expect(commands).toEqual([
      ['/pane.html', 'open'],
      ['/pane.html', 'solve'],
      ['/pane.html', 'put-back'],
      ['/pane.html', 'open'],
    ]);
  });

  it('have their parts in the order of the reference', () => {
    for (const control of controls) {
      expect(control.children.map(({ name }) => name)).toEqual([
        'ov:Label',
        'ov:Supertip',
        'ov:Icon',
        'ov:Action',
      ]);
    }
  });

  it('stand in the ribbon and in the menu of a cell', () => {
    expect(named('ov:ExtensionPoint').map(({ attributes }) => attributes['xsi:type'])).toEqual([
      'PrimaryCommandSurface',
      'ContextMenu',
    ]);
    expect(named('ov:OfficeMenu')[0].attributes.id).toBe('ContextMenuCell');
  });
});

describe('the manifests that are built', () => {
  const built = (file: string): string =>
    readFileSync(path.join(checkoutFolder, 'dist', 'pane', file), 'utf8');
  const settings = JSON.parse(readFileSync(path.join(manifestFolder, 'settings.json'), 'utf8')) as {
    manifestOrigin: string;
    id: string;
    productionOrigin: string;
    development: { origin: string; id: string; name: string };
  };
  const committed = readFileSync(manifestPath, 'utf8');

  it('differ from the committed one in origin alone, the one for development also in id and name', () => {
    const { development } = settings;
    const origin = process.env.PLANROW_ORIGIN ?? settings.productionOrigin;
    expect(built('manifest.xml').replaceAll(origin, settings.manifestOrigin)).toBe(committed);
    expect(built('manifest.xml')).not.toContain('localhost');
    expect(
      built('manifest-development.xml')
        .replaceAll(development.origin, settings.manifestOrigin)
        .replace(development.id, settings.id)
        .replace(development.name, 'Planrow'),
    ).toBe(committed);
    expect(built('manifest-development.xml')).toContain(development.id);
  });

  it('name only files that stand in the same folder', () => {
    const missing = urls
      .map((url) => new URL(url).pathname)
      .filter((file) => file !== '/' && !existsSync(path.join(checkoutFolder, 'dist', 'pane', file)));
    expect(missing).toEqual([]);
  });
});

describe('the icons', () => {
  it('exist in the sizes that the manifest asks for, square and of their true size', () => {
    const files = new Set(urls.filter((url) => url.includes('/icons/')).map((url) => path.basename(url)));
    expect([...files].sort()).toEqual(['icon-16.png', 'icon-32.png', 'icon-64.png', 'icon-80.png']);
    for (const file of files) {
      const size = Number(/\d+/.exec(file)?.[0]);
      const { width, height } = readPng(path.join(manifestFolder, 'icons', file));
      expect({ file, width, height }).toEqual({ file, width: size, height: size });
    }
    expect(readPng(path.join(manifestFolder, 'icons', 'icon-128.png'))).toMatchObject({
      width: 128,
      height: 128,
    });
  });

  it('are shown by the ribbon in the size that their id promises', () => {
    const shown = elements.filter((element) => element.name === 'bt:Image' && 'size' in element.attributes);
    expect(shown.map((image) => image.attributes.resid)).toEqual(
      shown.map((image) => `Icon.${image.attributes.size}`),
    );
    for (const image of named('bt:Image').filter((element) => 'id' in element.attributes)) {
      expect(image.attributes.DefaultValue).toMatch(
        new RegExp(`icon-${image.attributes.id.slice(5)}\\.png$`),
      );
    }
  });

  it('are what their script draws, pixel for pixel', () => {
    const folder = mkdtempSync(path.join(tmpdir(), 'planrow-icons-'));
    try {
      execFileSync(process.execPath, [path.join(manifestFolder, 'icons', 'draw-icons.cjs'), folder]);
      for (const file of readdirSync(folder)) {
        const drawn = readPng(path.join(folder, file));
        const committed = readPng(path.join(manifestFolder, 'icons', file));
        expect(committed.rows.equals(drawn.rows)).toBe(true);
      }
    } finally {
      rmSync(folder, { recursive: true, force: true });
    }
  });
});
