/**
 * The fault matrix as tables for people.
 */
import { faultCodes, roundTripsOf, type FaultEnd, type FaultOutcome, type Operation } from './fault-matrix';

/** Where the tables stand, from the top of the checkout. */
export const faultTablePath = 'tests/office-host/FAULTS.md';

const operations = Object.keys(roundTripsOf) as Operation[];

export function faultTable(outcomes: readonly FaultOutcome[]): string {
  return [
    '# What becomes of the workbook when Excel fails',
    '',
    'Every error of Excel at every round trip, once and lasting, each before, midway and after the batch that it breaks.',
    'Written by `npx tsx tests/office-host/write-fault-table.ts`; a test holds it to what happens.',
    '',
    '- **refused**: nothing was touched.',
    '- **taken back**: the write had begun; the workbook is as it was, and the same plan can be written again.',
    '- **kept**: some cells may be between. The journal is kept, lists them, and finishes or puts back once Excel answers.',
    '- **done**: the work was done in spite of it.',
    '',
    '## Ends',
    '',
    'Once / lasting, by round trip.',
    '',
    ...endsTable(outcomes),
    '',
    '## Sentences',
    '',
    'As they stand where a read is refused; `Retry` where trying again makes sense.',
    '',
    ...sentenceTable(outcomes),
    '',
    'A write that was taken back adds: *The workbook is as it was.* One whose journal is kept is told like this:',
    '',
    `> ${sentenceOfKept(outcomes)}`,
    '',
  ].join('\n');
}

function endsTable(outcomes: readonly FaultOutcome[]): string[] {
  const columns = operations.flatMap((operation) =>
    Array.from({ length: roundTripsOf[operation] }, (_, position) => ({
      operation,
      roundTrip: position + 1,
    })),
  );
  return table(
    ['Error', ...columns.map(({ operation, roundTrip }) => `${operation} ${roundTrip}`)],
    faultCodes.map((code) => [
      code,
      ...columns.map(({ operation, roundTrip }) => {
        const end = (isLasting: boolean): FaultEnd =>
          outcomes.find(
            (outcome) =>
              outcome.code === code &&
              outcome.operation === operation &&
              outcome.roundTrip === roundTrip &&
              outcome.isLasting === isLasting,
          )!.end;
        return end(false) === end(true) ? end(false) : `${end(false)} / ${end(true)}`;
      }),
    ]),
  );
}

function sentenceTable(outcomes: readonly FaultOutcome[]): string[] {
  return table(
    ['Error', 'Code', 'Retry', 'Sentence'],
    faultCodes.map((code) => {
      const told = outcomes.find(
        (outcome) => outcome.code === code && outcome.operation === 'read' && outcome.end === 'refused',
      )!;
      return [code, told.errorCode ?? '', told.canRetry ? 'Retry' : '', told.sentence];
    }),
  );
}

function sentenceOfKept(outcomes: readonly FaultOutcome[]): string {
  return outcomes.find(({ operation, end }) => operation === 'write' && end === 'kept')!.sentence;
}

/** Aligned, so that it reads as text too. */
function table(headings: readonly string[], rows: readonly (readonly string[])[]): string[] {
  const widths = headings.map((heading, column) =>
    Math.max(heading.length, ...rows.map((row) => row[column].length)),
  );
  const line = (cells: readonly string[]): string =>
    `| ${cells.map((cell, column) => cell.padEnd(widths[column])).join(' | ')} |`;
  return [line(headings), line(widths.map((width) => '-'.repeat(width))), ...rows.map(line)];
}
