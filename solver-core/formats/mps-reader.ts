/**
 * MPS text → LinearProgram, in the free or the fixed form; loud on what it cannot represent.
 *
 * Which form a text is in is not said in it. The free form is tried first; only names that hold blanks make it fail,
 * and then its fields do not come out right. Such a text is read again in the fixed form. When both fail, the reading
 * that came further tells what is wrong.
 *
 * Source of the format: IBM (1976), "Mathematical Programming System Extended/370 (MPSX/370) Program Reference
 * Manual"; the free form, OBJSENSE and the bound types LI, UI, BV as in common use since. Which reading was taken
 * where practice differs is told in mps-statement.ts.
 */
import type { LinearProgram } from '../linear-program/linear-program';
import type { MpsWarning } from './mps-errors';
import { MpsSyntaxError } from './mps-errors';
import { parseMps } from './mps-parser';

/** A problem, and what its reader should know about how it was read. */
export interface MpsReading {
  readonly problem: LinearProgram;
  readonly warnings: readonly MpsWarning[];
}

/**
 * The problem that a text states.
 * @throws MpsSyntaxError with the line and one sentence, when the text is not understood
 * @throws InvalidProblemError when bounds cross or no number can meet them
 */
export function readMps(text: string): LinearProgram {
  return readMpsWithWarnings(text).problem;
}

/** As readMps, with the warnings. */
export function readMpsWithWarnings(text: string): MpsReading {
  const plain = withPlainLineEnds(text);
  const { statement, lastLine } = parseInEitherForm(plain);
  const problem = statement.toLinearProgram(lastLine);
  return { problem, warnings: statement.warnings.list() };
}

function parseInEitherForm(text: string): ReturnType<typeof parseMps> {
  try {
    return parseMps(text, 'free');
  } catch (freeFault) {
    if (!(freeFault instanceof MpsSyntaxError) || !mayComeFromBlanksInNames(freeFault)) {
      throw freeFault;
    }
    try {
      return parseMps(text, 'fixed');
    } catch (fixedFault) {
      throw fixedFault instanceof MpsSyntaxError && fixedFault.line > freeFault.line ? fixedFault : freeFault;
    }
  }
}

/** Could a name that holds blanks have led the free form to this? */
function mayComeFromBlanksInNames({ code }: MpsSyntaxError): boolean {
  switch (code) {
    case 'wrong-fields':
    case 'not-a-number':
    case 'unknown-row':
    case 'unknown-column':
    case 'repeated-row':
    case 'repeated-column':
    case 'repeated-entry':
    case 'repeated-bound':
      return true;
    default:
      return false;
  }
}

/** Without a byte order mark, and with line feeds where the text has carriage returns alone. */
function withPlainLineEnds(text: string): string {
  const start = text.charCodeAt(0) === 0xfeff ? text.slice(1) : text;
  return start.includes('\n') ? start : start.replaceAll('\r', '\n');
}
