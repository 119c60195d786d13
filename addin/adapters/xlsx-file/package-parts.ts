/**
 * The parts of a package, found as the standard says: by relationships and content types, never by fixed names
 * (ECMA-376 Part 2, §6.5 relationships, §7.2.3 content types).
 */
import { damagedFile, excerpt } from './file-faults';
import { decodeXml, type XmlText } from './xml-encoding';
import { attributeOf, type XmlSource } from './xml-events';
import { childrenOf, parseXmlTree, type XmlNode } from './xml-tree';
import type { ZipArchive } from './zip-archive';

export const relationshipsNamespace: ReadonlySet<string> = new Set([
  'http://schemas.openxmlformats.org/package/2006/relationships',
]);
export const contentTypesNamespace: ReadonlySet<string> = new Set([
  'http://schemas.openxmlformats.org/package/2006/content-types',
]);
export const contentTypesPart = '[Content_Types].xml';

export interface Relationship {
  readonly id: string;
  /** The type in full, and its last segment: `worksheet`, `sharedStrings`. */
  readonly type: string;
  readonly kind: string;
  /** Name of the part it leads to; undefined where it leads out of the package. */
  readonly target: string | undefined;
}

export class PackageParts {
  private readonly relationships = new Map<string, readonly Relationship[]>();

  private constructor(
    readonly archive: ZipArchive,
    private readonly defaults: ReadonlyMap<string, string>,
    private readonly overrides: ReadonlyMap<string, string>,
  ) {}

  /** @throws WorkbookError where the content types are missing or broken */
  static async open(archive: ZipArchive): Promise<PackageParts> {
    const defaults = new Map<string, string>();
    const overrides = new Map<string, string>();
    const root = parseXmlTree(await readSource(archive, contentTypesPart));
    for (const node of childrenOf(root, 'Default', contentTypesNamespace)) {
      defaults.set(
        (attributeOf(node.tag, 'Extension') ?? '').toLowerCase(),
        attributeOf(node.tag, 'ContentType') ?? '',
      );
    }
    for (const node of childrenOf(root, 'Override', contentTypesNamespace)) {
      const part = (attributeOf(node.tag, 'PartName') ?? '').replace(/^\//, '').toLowerCase();
      overrides.set(part, attributeOf(node.tag, 'ContentType') ?? '');
    }
    return new PackageParts(archive, defaults, overrides);
  }

  get fileName(): string {
    return this.archive.fileName;
  }

  has(part: string): boolean {
    return this.archive.has(part);
  }

  contentTypeOf(part: string): string {
    const extension = part.slice(part.lastIndexOf('.') + 1).toLowerCase();
    return this.overrides.get(part.toLowerCase()) ?? this.defaults.get(extension) ?? '';
  }

  /** A part's text. @throws WorkbookError where it is missing or no text */
  readText(part: string): Promise<XmlText & XmlSource> {
    return readSource(this.archive, part);
  }

  /** A small part as a tree. */
  async readTree(part: string): Promise<XmlNode> {
    return parseXmlTree(await this.readText(part));
  }

  /** The relationships of a part; of the package itself for an empty name. A part without any has an empty list. */
  async relationshipsOf(part: string): Promise<readonly Relationship[]> {
    let known = this.relationships.get(part);
    if (known === undefined) {
      known = await this.readRelationships(part);
      this.relationships.set(part, known);
    }
    return known;
  }

  private async readRelationships(part: string): Promise<readonly Relationship[]> {
    const relationshipsPart = relationshipsPartOf(part);
    if (!this.has(relationshipsPart)) return [];
    const root = await this.readTree(relationshipsPart);
    return childrenOf(root, 'Relationship', relationshipsNamespace).map((node) => {
      const type = attributeOf(node.tag, 'Type') ?? '';
      const isExternal = attributeOf(node.tag, 'TargetMode')?.toLowerCase() === 'external';
      return {
        id: attributeOf(node.tag, 'Id') ?? '',
        type,
        kind: type.slice(type.lastIndexOf('/') + 1),
        target: isExternal ? undefined : this.resolveTarget(part, attributeOf(node.tag, 'Target') ?? ''),
      };
    });
  }

  /** A target is a reference relative to its source; some writers leave it unescaped, so both forms are tried. */
  private resolveTarget(source: string, target: string): string {
    const path = target.replace(/[#?].*$/, '').replaceAll('\\', '/');
    const segments = path.startsWith('/') ? [] : source.split('/').slice(0, -1);
    for (const segment of path.split('/')) {
      if (segment === '..') segments.pop();
      else if (segment !== '' && segment !== '.') segments.push(segment);
    }
    const name = segments.join('/');
    if (this.archive.exactName(name) !== undefined) return this.archive.exactName(name)!;
    try {
      const decoded = decodeURIComponent(name);
      return this.archive.exactName(decoded) ?? name;
    } catch {
      // Not an escaped name after all: it stays as it is written.
      return name;
    }
  }
}

/** `xl/_rels/workbook.xml.rels` for `xl/workbook.xml`. */
export function relationshipsPartOf(part: string): string {
  const slash = part.lastIndexOf('/') + 1;
  return `${part.slice(0, slash)}_rels/${part.slice(slash)}.rels`;
}

/** A target as it is written in the relationships of `source`: absolute, so that it holds wherever they stand. */
export function absoluteTarget(part: string): string {
  return `/${part}`;
}

async function readSource(archive: ZipArchive, part: string): Promise<XmlText & XmlSource> {
  if (!archive.has(part)) throw damagedFile(archive.fileName, `its part ${excerpt(part)} is missing`);
  const decoded = decodeXml(await archive.read(part), part, archive.fileName);
  return { ...decoded, part: archive.exactName(part) ?? part, fileName: archive.fileName };
}
