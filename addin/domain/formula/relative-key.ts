/**
 * The key under which formulas share one syntax tree: the text with every cell reference written as its distance
 * from the formula's cell. Two formulas with one key mean the same, each seen from its own cell.
 *
 * Sharing is worth it: a column of 100,000 filled-down formulas is parsed once and not 100,000 times.
 */
import { columnOfLetters, maximumColumnCount, maximumRowCount } from '../sheet/cell-address';

export interface RelativeKey {
  readonly key: string;
  /** References that were written as distances. The parsed tree must hold as many, or the key is not to be used. */
  readonly referenceCount: number;
}

const quote = '"'.charCodeAt(0);
const apostrophe = "'".charCodeAt(0);
const openBracket = '['.charCodeAt(0);
const closeBracket = ']'.charCodeAt(0);
const dollar = '$'.charCodeAt(0);

/** Two characters that no formula holds: before a row or column that is a distance, and before one that is not. */
const distanceMark = '\u0001';
const absoluteMark = '\u0002';

export function relativeKey(text: string, row: number, column: number): RelativeKey {
  let key = '';
  let copiedTo = 0;
  let referenceCount = 0;
  let at = 0;
  while (at < text.length) {
    const code = text.charCodeAt(at);
    if (code === quote || code === apostrophe) {
      at = endOfQuoted(text, at, code);
    } else if (code === openBracket) {
      at = endOfBracket(text, at);
    } else if (isDigit(code) || code === 46) {
      at = endOfNumber(text, at);
    } else if (isWordCharacter(code)) {
      const end = endOfWord(text, at);
      const reference = referenceKey(text, at, end, row, column);
      if (reference !== undefined) {
        key += text.slice(copiedTo, at) + reference;
        copiedTo = end;
        referenceCount++;
      }
      at = end;
    } else {
      at++;
    }
  }
  return { key: copiedTo === 0 ? text : key + text.slice(copiedTo), referenceCount };
}

/** The word as a distance, or undefined where it is no reference to a single cell. */
function referenceKey(
  text: string,
  start: number,
  end: number,
  row: number,
  column: number,
): string | undefined {
  // A name before a bracket is a function, before `!` a sheet, before `[` a table.
  const next = end < text.length ? text[end] : '';
  if (end - start > 12 || next === '(' || next === '!' || next === '[') {
    return undefined;
  }
  let at = start;
  const columnIsAbsolute = text.charCodeAt(at) === dollar;
  if (columnIsAbsolute) {
    at++;
  }
  const lettersFrom = at;
  while (at < end && isLetter(text.charCodeAt(at))) {
    at++;
  }
  const lettersTo = at;
  const rowIsAbsolute = text.charCodeAt(at) === dollar;
  if (rowIsAbsolute) {
    at++;
  }
  const digitsFrom = at;
  while (at < end && isDigit(text.charCodeAt(at))) {
    at++;
  }
  if (at !== end || digitsFrom === end || lettersTo === lettersFrom || lettersTo - lettersFrom > 3) {
    return undefined;
  }
  const referredRow = Number(text.slice(digitsFrom, end)) - 1;
  const referredColumn = columnOfLetters(text.slice(lettersFrom, lettersTo));
  if (referredRow < 0 || referredRow >= maximumRowCount || referredColumn >= maximumColumnCount) {
    return undefined;
  }
  return (
    (rowIsAbsolute ? absoluteMark + String(referredRow) : distanceMark + String(referredRow - row)) +
    (columnIsAbsolute
      ? absoluteMark + String(referredColumn)
      : distanceMark + String(referredColumn - column))
  );
}

function endOfQuoted(text: string, start: number, mark: number): number {
  let at = start + 1;
  while (at < text.length) {
    if (text.charCodeAt(at) === mark) {
      if (text.charCodeAt(at + 1) !== mark) {
        return at + 1;
      }
      at++;
    }
    at++;
  }
  return at;
}

/** Past the bracket that closes this one; an apostrophe takes the meaning from the character behind it. */
function endOfBracket(text: string, start: number): number {
  let depth = 0;
  let at = start;
  while (at < text.length) {
    const code = text.charCodeAt(at);
    if (code === apostrophe) {
      at++;
    } else if (code === openBracket) {
      depth++;
    } else if (code === closeBracket && --depth === 0) {
      return at + 1;
    }
    at++;
  }
  return at;
}

function endOfNumber(text: string, start: number): number {
  let at = start;
  while (at < text.length && (isDigit(text.charCodeAt(at)) || text[at] === '.')) {
    at++;
  }
  const exponent = /^[eE][+-]?\d+/.exec(text.slice(at, at + 6));
  return exponent === null ? at : at + exponent[0].length;
}

function endOfWord(text: string, start: number): number {
  let at = start;
  while (at < text.length && isWordCharacter(text.charCodeAt(at))) {
    at++;
  }
  return at;
}

function isDigit(code: number): boolean {
  return code >= 48 && code <= 57;
}

function isLetter(code: number): boolean {
  return (code >= 65 && code <= 90) || (code >= 97 && code <= 122);
}

/** Letters, digits and what else a name or reference may hold: `$ . ? \ _` and everything beyond ASCII. */
function isWordCharacter(code: number): boolean {
  return (
    isLetter(code) ||
    isDigit(code) ||
    code === dollar ||
    code === 46 ||
    code === 63 ||
    code === 92 ||
    code === 95 ||
    code > 127
  );
}
