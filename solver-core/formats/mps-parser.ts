/**
 * Walks through the lines of an MPS text in one of its two forms and states to an MpsStatement what each line says.
 *
 * A line that starts with a star, or is blank, is passed over. A line that starts in column 1 opens a section; every
 * other line is data of the section that is open. Reading ends at ENDATA.
 */
import type { Sense } from '../linear-program/linear-program';
import type { MpsErrorCode } from './mps-errors';
import { MpsSyntaxError } from './mps-errors';
import type { DataLine } from './mps-fields';
import { cutFixedFields, FreeFields, parseMpsNumber } from './mps-fields';
import type { BoundType, RowType } from './mps-statement';
import { MpsStatement } from './mps-statement';

export type MpsForm = 'free' | 'fixed';

type Section = 'NAME' | 'OBJSENSE' | 'ROWS' | 'COLUMNS' | 'RHS' | 'RANGES' | 'BOUNDS';

const sections: readonly string[] = ['NAME', 'OBJSENSE', 'ROWS', 'COLUMNS', 'RHS', 'RANGES', 'BOUNDS'];

/** Sections that state what this solver has no answer to, and what that is. */
const refusedSections: Readonly<Record<string, string>> = {
  QUADOBJ: 'quadratic terms',
  QMATRIX: 'quadratic terms',
  QSECTION: 'quadratic terms',
  QCMATRIX: 'quadratic terms',
  CSECTION: 'cones',
  SOS: 'special ordered sets',
  SOS1: 'special ordered sets',
  SOS2: 'special ordered sets',
  SETS: 'special ordered sets',
  INDICATORS: 'indicator rows',
  GENCONS: 'general constraints',
  PWLOBJ: 'piecewise costs',
  LAZYCONS: 'rows to be added later',
  USERCUTS: 'cuts',
};

/** The types of bounds, and whether each needs a number. */
const boundTypes: Readonly<Record<string, boolean>> = {
  UP: true, LO: true, FX: true, LI: true, UI: true, FR: false, MI: false, PL: false, BV: false,
}; // prettier-ignore

/**
 * Reads a text to its ENDATA.
 * @throws MpsSyntaxError at the first line that is not understood
 */
export function parseMps(text: string, form: MpsForm): { statement: MpsStatement; lastLine: number } {
  const parser = new Parser(text, form);
  return { statement: parser.statement, lastLine: parser.parse() };
}

class Parser {
  readonly statement = new MpsStatement();
  private readonly fields: FreeFields;
  private section: Section | undefined;
  private readonly opened = new Set<string>();
  private currentColumn: string | undefined;
  private isBetweenMarkers = false;
  /** The set that counts in each section: the first one named there. */
  private readonly firstSets = new Map<Section, string>();

  // What a line of COLUMNS, RHS or RANGES says: a column or set, and up to two pairs of a row and a number.
  private head = '';
  private pairCount = 0;
  private readonly pairRows: [string, string] = ['', ''];
  private readonly pairNumbers: [string, string] = ['', ''];

  constructor(
    private readonly text: string,
    private readonly form: MpsForm,
  ) {
    this.fields = new FreeFields(text);
  }

  /** @returns the number of the line with ENDATA */
  parse(): number {
    const { text } = this;
    let lineNumber = 0;
    for (let start = 0; start < text.length;) {
      lineNumber++;
      const newline = text.indexOf('\n', start);
      const next = newline < 0 ? text.length : newline + 1;
      let end = newline < 0 ? text.length : newline;
      while (end > start && text.charCodeAt(end - 1) <= 32) end--;
      const first = text.charCodeAt(start);
      if (end > start && first !== starCode) {
        const line: DataLine = { number: lineNumber, start, end };
        if (first > 32) {
          if (this.openSection(line)) return lineNumber;
        } else {
          this.readData(line);
        }
      }
      start = next;
    }
    throw fault('missing-end', Math.max(lineNumber, 1), 'the text ends without ENDATA; it may be cut off.');
  }

  /** @returns true at ENDATA */
  private openSection(line: DataLine): boolean {
    const [word, ...rest] = this.text.slice(line.start, line.end).split(/\s+/);
    const keyword = word.toUpperCase();
    if (keyword === 'ENDATA') {
      this.checkSectionsAtEnd(line);
      return true;
    }
    if (this.section === 'OBJSENSE' && senseOf(keyword) !== undefined) {
      this.setSense(keyword, line);
      return false;
    }
    if (keyword in refusedSections) {
      throw fault(
        'refused-section',
        line.number,
        `section ${keyword} states ${refusedSections[keyword]}, which are not solved here.`,
      );
    }
    if (!sections.includes(keyword)) {
      throw fault(
        'unknown-section',
        line.number,
        `"${excerpt(word)}" is no section of an MPS file (data lines start with a blank).`,
      );
    }
    const section = keyword as Section;
    this.checkSectionOrder(section, line);
    this.opened.add(section);
    this.section = section;
    if (section === 'NAME') {
      this.statement.name = rest[0] ?? '';
    } else if (section === 'OBJSENSE' && rest.length > 0) {
      this.setSense(rest[0], line);
    }
    return false;
  }

  private checkSectionOrder(section: Section, line: DataLine): void {
    if (this.opened.has(section)) {
      throw fault('section-order', line.number, `section ${section} stands here a second time.`);
    }
    const needed =
      section === 'COLUMNS'
        ? 'ROWS'
        : section === 'RHS' || section === 'RANGES' || section === 'BOUNDS'
          ? 'COLUMNS'
          : undefined;
    if (needed !== undefined && !this.opened.has(needed)) {
      throw fault('section-order', line.number, `section ${section} needs ${needed} before it.`);
    }
  }

  private checkSectionsAtEnd(line: DataLine): void {
    for (const section of ['ROWS', 'COLUMNS']) {
      if (!this.opened.has(section)) {
        throw fault('missing-section', line.number, `the text ends without a section ${section}.`);
      }
    }
  }

  private setSense(word: string, line: DataLine): void {
    const sense = senseOf(word);
    if (sense === undefined) {
      throw fault(
        'bad-sense',
        line.number,
        `the objective's sense must be MAX or MIN, not "${excerpt(word)}".`,
      );
    }
    this.statement.sense = sense;
  }

  private readData(line: DataLine): void {
    switch (this.section) {
      case 'ROWS':
        return this.readRow(line);
      case 'COLUMNS':
        return this.readColumnEntries(line);
      case 'RHS':
      case 'RANGES':
        return this.readSetEntries(this.section, line);
      case 'BOUNDS':
        return this.readBound(line);
      case 'OBJSENSE':
        return this.setSense(this.text.slice(line.start, line.end).trim(), line);
      case 'NAME':
      case undefined:
        throw fault('section-order', line.number, 'data stands before any section that could hold it.');
    }
  }

  private readRow(line: DataLine): void {
    let type: string;
    let name: string;
    if (this.form === 'free') {
      this.fields.cut(line);
      if (this.fields.count !== 2) {
        throw fault('wrong-fields', line.number, 'a line of ROWS holds a type and a name.');
      }
      type = this.fields.field(0);
      name = this.fields.field(1);
    } else {
      [type, name] = cutFixedFields(this.text, line);
      if (name === '') {
        throw fault('wrong-fields', line.number, 'a line of ROWS holds a type and a name.');
      }
    }
    type = type.toUpperCase();
    if (!isRowType(type)) {
      throw fault('unknown-type', line.number, `a row is of type N, L, G or E, not "${excerpt(type)}".`);
    }
    this.statement.addRow(type, name, line.number);
  }

  private readColumnEntries(line: DataLine): void {
    this.cutPairs(line, false);
    if (this.pairRows[0] === "'MARKER'") {
      return this.readMarker(line);
    }
    if (this.head !== this.currentColumn) {
      this.currentColumn = this.head;
      this.statement.addColumn(this.head, this.isBetweenMarkers, line.number);
    }
    for (let pair = 0; pair < this.pairCount; pair++) {
      const value = this.number(this.pairNumbers[pair], line);
      if (!Number.isFinite(value)) {
        throw fault('not-a-number', line.number, `the entry in row "${this.pairRows[pair]}" must be finite.`);
      }
      this.statement.addEntry(this.pairRows[pair], value, line.number);
    }
  }

  private readMarker(line: DataLine): void {
    const text = this.text.slice(line.start, line.end);
    const isStart = text.includes("'INTORG'");
    if (!isStart && !text.includes("'INTEND'")) {
      throw fault('bad-marker', line.number, 'a marker must say INTORG or INTEND; no others are read.');
    }
    if (isStart === this.isBetweenMarkers) {
      throw fault(
        'bad-marker',
        line.number,
        isStart ? 'a second INTORG stands here before an INTEND.' : 'an INTEND stands here without INTORG.',
      );
    }
    this.isBetweenMarkers = isStart;
  }

  private readSetEntries(section: 'RHS' | 'RANGES', line: DataLine): void {
    this.cutPairs(line, true);
    if (!this.isFirstSet(section, this.head, line)) {
      return;
    }
    for (let pair = 0; pair < this.pairCount; pair++) {
      const value = this.number(this.pairNumbers[pair], line);
      if (section === 'RHS') {
        this.statement.setRightSide(this.pairRows[pair], value, line.number);
      } else {
        this.statement.setRange(this.pairRows[pair], value, line.number);
      }
    }
  }

  private readBound(line: DataLine): void {
    const [statedType, set, column, number] =
      this.form === 'free' ? this.freeBoundFields(line) : cutFixedFields(this.text, line);
    const type = statedType.toUpperCase();
    if (type === 'SC' || type === 'SI') {
      throw fault(
        'refused-bound',
        line.number,
        `column "${column}" is semi-continuous (${type}), which is not solved here.`,
      );
    }
    if (!Object.hasOwn(boundTypes, type)) {
      throw fault('unknown-type', line.number, `"${excerpt(statedType)}" is no type of bound.`);
    }
    if (this.isFirstSet('BOUNDS', set, line)) {
      const value = boundTypes[type] ? this.number(number, line) : 0;
      this.statement.setBound(type as BoundType, column, value, line.number);
    }
  }

  /** Type, set, column and number of a line of BOUNDS, where set and, for some types, number may be left out. */
  private freeBoundFields(line: DataLine): readonly [string, string, string, string] {
    const { fields, statement } = this;
    fields.cut(line);
    const type = fields.field(0);
    const needsNumber = boundTypes[type.toUpperCase()] ?? true;
    if (fields.count === 4) {
      return [type, fields.field(1), fields.field(2), fields.field(3)];
    }
    if (fields.count === 3) {
      const isWithoutSet =
        needsNumber || (!statement.hasColumn(fields.field(2)) && statement.hasColumn(fields.field(1)));
      return isWithoutSet
        ? [type, '', fields.field(1), fields.field(2)]
        : [type, fields.field(1), fields.field(2), ''];
    }
    if (fields.count === 2 && !needsNumber) {
      return [type, '', fields.field(1), ''];
    }
    throw fault('wrong-fields', line.number, 'a line of BOUNDS holds a type, a set, a column and a number.');
  }

  // hot: once a line of COLUMNS
  /** Cuts a line into its head and pairs. The head may be left out where it names a set. */
  private cutPairs(line: DataLine, isHeadOptional: boolean): void {
    if (this.form === 'fixed') {
      return this.cutFixedPairs(line, isHeadOptional);
    }
    const { fields, pairRows, pairNumbers } = this;
    fields.cut(line);
    const first = isHeadOptional && fields.count % 2 === 0 ? 0 : 1;
    const count = fields.count - first;
    if (count !== 2 && count !== 4) {
      throw fault(
        'wrong-fields',
        line.number,
        `the line has ${fields.count} fields; a name and one or two pairs of a row and a number were expected.`,
      );
    }
    this.head = first === 0 ? '' : fields.field(0);
    this.pairCount = count / 2;
    pairRows[0] = fields.field(first);
    pairNumbers[0] = fields.field(first + 1);
    if (count === 4) {
      pairRows[1] = fields.field(first + 2);
      pairNumbers[1] = fields.field(first + 3);
    }
  }

  private cutFixedPairs(line: DataLine, isHeadOptional: boolean): void {
    const [, head, firstRow, firstNumber, secondRow, secondNumber] = cutFixedFields(this.text, line);
    if ((head === '' && !isHeadOptional) || firstRow === '') {
      throw fault('wrong-fields', line.number, 'the names do not stand where the fixed form has them.');
    }
    this.head = head;
    this.pairCount = secondRow === '' && secondNumber === '' ? 1 : 2;
    this.pairRows[0] = firstRow;
    this.pairNumbers[0] = firstNumber;
    this.pairRows[1] = secondRow;
    this.pairNumbers[1] = secondNumber;
  }

  /** Does the line belong to the set that counts? One without a name for its set always does. */
  private isFirstSet(section: Section, set: string, line: DataLine): boolean {
    if (set === '') {
      return true;
    }
    const first = this.firstSets.get(section);
    if (first === undefined) {
      this.firstSets.set(section, set);
      return true;
    }
    if (first !== set) {
      this.statement.warnings.add('ignored-set', line.number, set);
      return false;
    }
    return true;
  }

  private number(field: string, line: DataLine): number {
    const value = parseMpsNumber(field);
    if (value === undefined) {
      throw fault(
        'not-a-number',
        line.number,
        field === '' ? 'a number is missing.' : `"${excerpt(field)}" is not a number.`,
      );
    }
    return value;
  }
}

const starCode = 42;

function isRowType(type: string): type is RowType {
  return type === 'N' || type === 'L' || type === 'G' || type === 'E';
}

function senseOf(word: string): Sense | undefined {
  switch (word.toUpperCase()) {
    case 'MAX':
    case 'MAXIMIZE':
    case 'MAXIMISE':
      return 'maximise';
    case 'MIN':
    case 'MINIMIZE':
    case 'MINIMISE':
      return 'minimise';
    default:
      return undefined;
  }
}

/** What a text says, short enough for a sentence. */
function excerpt(text: string): string {
  return text.length <= 40 ? text : `${text.slice(0, 40)}…`;
}

function fault(code: MpsErrorCode, line: number, sentence: string): MpsSyntaxError {
  return new MpsSyntaxError(code, line, sentence);
}
