import { isDeepStrictEqual } from 'node:util';
import { InvalidProblemError } from '../../../solver-core/control/solver-errors';
import { MpsSyntaxError, type MpsErrorCode } from '../../../solver-core/formats/mps-errors';
import { readMps, readMpsWithWarnings } from '../../../solver-core/formats/mps-reader';
import type { LinearProgram } from '../../../solver-core/linear-program/linear-program';
import { loadHighsOnce } from '../../oracles/highs-reference';
import { itNeeds } from '../../support/needs';
import { readReferenceText, referenceProblems } from '../../support/reference-problems';
import { shareOf } from '../../support/share';

/** A small problem; each part may be replaced. */
function mps(
  parts: { head?: string; rows?: string; columns?: string; rhs?: string; tail?: string } = {},
): string {
  return `${parts.head ?? 'NAME week'}
ROWS
${parts.rows ?? ' N profit\n L kiln\n G orders\n E glaze'}
COLUMNS
${parts.columns ?? ' tiles profit 3 kiln 2\n tiles orders 1\n bowls profit 5 kiln 4\n bowls glaze 1'}
${parts.rhs ?? 'RHS\n RHS kiln 40 orders 5\n RHS glaze 2'}
${parts.tail ?? 'ENDATA'}
`;
}

function bounds(text: string, columns?: string): [lower: number, upper: number][] {
  const problem = readMps(
    mps({ tail: `BOUNDS\n${text}\nENDATA`, ...(columns === undefined ? {} : { columns }) }),
  );
  return Array.from(problem.columnLower, (lower, column) => [lower, problem.columnUpper[column]]);
}

function rowBounds(problem: LinearProgram): Record<string, [number, number]> {
  return Object.fromEntries(
    problem.rowNames.map((name, row) => [name, [problem.rowLower[row], problem.rowUpper[row]]]),
  );
}

describe('readMps', () => {
  it('SC-40 reads rows, columns, right sides and the objective', () => {
    const problem = readMps(mps());
    expect(problem).toMatchObject({
      name: 'week',
      sense: 'minimise',
      objectiveName: 'profit',
      objectiveConstant: 0,
    });
    expect(problem.columnNames).toEqual(['tiles', 'bowls']);
    expect(Array.from(problem.cost)).toEqual([3, 5]);
    expect(rowBounds(problem)).toEqual({ kiln: [-Infinity, 40], orders: [5, Infinity], glaze: [2, 2] });
    expect(Array.from(problem.matrix.value)).toEqual([2, 1, 4, 1]);
    expect(Array.from(problem.matrix.rowIndex)).toEqual([0, 1, 0, 2]);
  });

  it('SC-41 reads the fixed form where names hold blanks, and blanks in them as they are', () => {
    const text = [
      'NAME          WEEK PLAN',
      'ROWS',
      ' N  PROFIT',
      ' L  KILN 1',
      ' G  KILN 2',
      'COLUMNS',
      '    TILE A    PROFIT         3.        KILN 1         2.',
      '    TILE A    KILN 2         1.5',
      '    TILE B    PROFIT         5.        KILN 1         4.',
      'RHS',
      '    RHS       KILN 1        40.        KILN 2         5.',
      'RANGES',
      '    RNG       KILN 2         3.',
      'BOUNDS',
      ' UP BND       TILE A        12.',
      ' FR BND       TILE B',
      'ENDATA',
    ].join('\n');
    const problem = readMps(text);
    expect(problem.columnNames).toEqual(['TILE A', 'TILE B']);
    expect(rowBounds(problem)).toEqual({ 'KILN 1': [-Infinity, 40], 'KILN 2': [5, 8] });
    expect(Array.from(problem.columnUpper)).toEqual([12, Infinity]);
    expect(Array.from(problem.columnLower)).toEqual([0, -Infinity]);
  });

  it('SC-42 passes over comments, blank lines, carriage returns and a byte order mark', () => {
    const text = `\ufeff* a comment\n${mps().replace('ROWS', '\n* more\n   \nROWS')}trailing words after the end`;
    expect(readMps(text.replaceAll('\n', '\r\n'))).toEqual(readMps(mps()));
    expect(readMps(mps().replaceAll('\n', '\r'))).toEqual(readMps(mps()));
    expect(readMps(mps().replaceAll(' tiles ', '\ttiles\t'))).toEqual(readMps(mps()));
  });

  it('SC-43 takes the objective constant as minus the right side of the objective row', () => {
    expect(readMps(mps({ rhs: 'RHS\n RHS profit -7.5' })).objectiveConstant).toBe(7.5);
    expect(readMps(mps({ rhs: 'RHS\n RHS profit 7.5 kiln 3' })).objectiveConstant).toBe(-7.5);
    expect(Object.is(readMps(mps({ rhs: 'RHS\n RHS profit 0' })).objectiveConstant, 0)).toBe(true);
  });

  it('SC-44 reads the sense in a section, on its line, and at the margin', () => {
    for (const word of ['MAX', 'max', 'MAXIMIZE', 'MAXIMISE']) {
      expect(readMps(mps({ head: `NAME w\nOBJSENSE\n    ${word}` })).sense).toBe('maximise');
      expect(readMps(mps({ head: `NAME w\nOBJSENSE ${word}` })).sense).toBe('maximise');
      expect(readMps(mps({ head: `NAME w\nOBJSENSE\n${word}` })).sense).toBe('maximise');
    }
    expect(readMps(mps({ head: 'OBJSENSE MIN\nNAME w' })).sense).toBe('minimise');
  });

  it('SC-45 reads ranges: width on L and G, by its sign on E', () => {
    const ranged = (text: string): Record<string, [number, number]> =>
      rowBounds(readMps(mps({ tail: `RANGES\n${text}\nENDATA` })));
    expect(ranged(' R kiln 4 orders -3\n R glaze 2.5')).toEqual({
      kiln: [36, 40],
      orders: [5, 8],
      glaze: [2, 4.5],
    });
    expect(ranged(' R glaze -2.5')).toMatchObject({ glaze: [-0.5, 2] });
    expect(ranged(' R glaze 0')).toMatchObject({ glaze: [2, 2] });
    expect(ranged(' R kiln 1e30')).toMatchObject({ kiln: [-Infinity, 40] });
  });

  it('SC-46 reads every kind of bound, with and without the name of the set', () => {
    expect(bounds(' UP B tiles 9')).toEqual([
      [0, 9],
      [0, Infinity],
    ]);
    expect(bounds(' UP tiles 9\n LO bowls -2')).toEqual([
      [0, 9],
      [-2, Infinity],
    ]);
    expect(bounds(' FX B tiles 4\n FR B bowls')).toEqual([
      [4, 4],
      [-Infinity, Infinity],
    ]);
    expect(bounds(' FR bowls\n MI tiles')).toEqual([
      [-Infinity, Infinity],
      [-Infinity, Infinity],
    ]);
    expect(bounds(' MI B tiles\n UP B tiles 3\n PL B bowls')).toEqual([
      [-Infinity, 3],
      [0, Infinity],
    ]);
    expect(bounds(' FR B tiles 0\n MI bowls 0')).toEqual([
      [-Infinity, Infinity],
      [-Infinity, Infinity],
    ]);
    const whole = readMps(mps({ tail: 'BOUNDS\n BV B tiles\n LI B bowls 2\n UI B bowls 8\nENDATA' }));
    expect(Array.from(whole.isInteger)).toEqual([1, 1]);
    expect([Array.from(whole.columnLower), Array.from(whole.columnUpper)]).toEqual([
      [0, 2],
      [1, 8],
    ]);
  });

  it('SC-47 takes a bound or right side of 1e30 and more as infinite', () => {
    expect(bounds(' UP B tiles 1e30\n LO B bowls -1e31')).toEqual([
      [0, Infinity],
      [-Infinity, Infinity],
    ]);
    expect(bounds(' UP B tiles inf\n LO B bowls -Infinity')).toEqual([
      [0, Infinity],
      [-Infinity, Infinity],
    ]);
    expect(rowBounds(readMps(mps({ rhs: 'RHS\n R kiln 1e30' }))).kiln).toEqual([-Infinity, Infinity]);
    expect(bounds(' UP B tiles 9.9e29')[0]).toEqual([0, 9.9e29]);
  });

  it('SC-48 takes the lower bound away where only a negative upper one is given, and says so', () => {
    const { problem, warnings } = readMpsWithWarnings(mps({ tail: 'BOUNDS\n UP B tiles -3\nENDATA' }));
    expect([problem.columnLower[0], problem.columnUpper[0]]).toEqual([-Infinity, -3]);
    expect(warnings).toMatchObject([
      { code: 'negative-upper-bound', message: expect.stringContaining('tiles') as string },
    ]);
    expect(bounds(' UP B tiles -3\n LO B tiles -9')[0]).toEqual([-9, -3]);
    expect(bounds(' UP B tiles 0')[0]).toEqual([0, 0]);
  });

  it('SC-49 reads whole-number columns between markers, as 0 or 1 where no bounds are given', () => {
    const columns = ` M1 'MARKER' 'INTORG'\n tiles profit 3\n bowls profit 5\n M2 'MARKER' 'INTEND'\n cups kiln 1`;
    const { problem, warnings } = readMpsWithWarnings(
      mps({ columns, tail: 'BOUNDS\n UP B bowls 8\nENDATA' }),
    );
    expect(Array.from(problem.isInteger)).toEqual([1, 1, 0]);
    expect(Array.from(problem.columnUpper)).toEqual([1, 8, Infinity]);
    expect(warnings.map(({ code }) => code)).toEqual(['integer-without-bounds']);
  });

  it('SC-50 leaves out further N rows, later sets and ranges on N rows, and says so once each', () => {
    const { problem, warnings } = readMpsWithWarnings(
      mps({
        rows: ' N profit\n L kiln\n N weight\n N volume',
        columns: ' tiles profit 3 kiln 2\n tiles weight 7 volume 8',
        rhs: 'RHS\n A kiln 40 weight 2\n B kiln 50\nRANGES\n A profit 3\n A kiln 4',
      }),
    );
    expect(problem.rowNames).toEqual(['kiln']);
    expect(rowBounds(problem)).toEqual({ kiln: [36, 40] });
    expect(warnings.map(({ code }) => code)).toEqual(['ignored-free-row', 'ignored-set', 'ignored-range']);
    expect(warnings[0].message).toContain('"weight" is a further N row and is left out (and 1 more like it)');
  });

  it('SC-51 reads numbers as written: signs, points, exponents of either letter', () => {
    const { cost } = readMps(
      mps({
        rows: ' N profit',
        columns: ' a profit +.5\n b profit -5.\n c profit 1D+2\n d profit 2.5e-3\n e profit 1E2',
        rhs: 'RHS',
      }),
    );
    expect(Array.from(cost)).toEqual([0.5, -5, 100, 0.0025, 100]);
  });

  it('drops explicit zeros but keeps their columns', () => {
    const problem = readMps(mps({ columns: ' tiles kiln 0\n bowls profit 0' }));
    expect(problem.columnCount).toBe(2);
    expect(problem.matrix.value.length).toBe(0);
  });

  it('reads a problem without an objective, with a warning', () => {
    const { problem, warnings } = readMpsWithWarnings(
      mps({ rows: ' L kiln', columns: ' tiles kiln 2', rhs: 'RHS' }),
    );
    expect(Array.from(problem.cost)).toEqual([0]);
    expect(warnings.map(({ code }) => code)).toEqual(['no-objective']);
  });

  it('leaves crossing bounds to be refused as an invalid problem, by name', () => {
    expect(() => bounds(' LO B tiles 5\n UP B tiles 4')).toThrow(InvalidProblemError);
    expect(() => bounds(' LO B tiles 5\n UP B tiles 4')).toThrow(
      /Column "tiles" has the lower bound 5 above/,
    );
  });

  const faults: readonly [what: string, text: string, code: MpsErrorCode, line: number, words: string][] = [
    ['an empty text', '', 'missing-end', 1, 'without ENDATA'],
    ['no ENDATA', mps({ tail: '' }), 'missing-end', 15, 'it may be cut off'],
    ['no ROWS', 'NAME x\nENDATA\n', 'missing-section', 2, 'ROWS'],
    ['no COLUMNS', 'NAME x\nROWS\n N profit\nENDATA\n', 'missing-section', 4, 'COLUMNS'],
    ['an unknown section', mps({ head: 'NAME w\nNOTES' }), 'unknown-section', 2, '"NOTES" is no section'],
    ['quadratic terms', mps({ tail: 'QUADOBJ\n tiles tiles 2\nENDATA' }), 'refused-section', 15, 'quadratic'],
    ['special ordered sets', mps({ tail: 'SOS1\nENDATA' }), 'refused-section', 15, 'special ordered sets'],
    ['a section twice', mps({ tail: 'RHS\nENDATA' }), 'section-order', 15, 'second time'],
    ['right sides before columns', 'ROWS\n N p\nRHS\nENDATA\n', 'section-order', 3, 'COLUMNS before it'],
    ['data before a section', ' tiles 3\nENDATA\n', 'section-order', 1, 'before any section'],
    ['an unknown row type', mps({ rows: ' X profit' }), 'unknown-type', 3, 'N, L, G or E'],
    ['a row twice', mps({ rows: ' N profit\n L kiln\n G kiln' }), 'repeated-row', 5, '"kiln"'],
    ['a row line with too much', mps({ rows: ' N profit extra' }), 'wrong-fields', 3, 'a type and a name'],
    ['a row that is not there', mps({ columns: ' tiles oven 3' }), 'unknown-row', 8, '"oven" is not in ROWS'],
    [
      'an entry twice',
      mps({ columns: ' tiles kiln 3 kiln 4' }),
      'repeated-entry',
      8,
      'two entries in row "kiln"',
    ],
    ['a cost twice', mps({ columns: ' tiles profit 3\n tiles profit 4' }), 'repeated-entry', 9, '"profit"'],
    [
      'a column that comes back',
      mps({ columns: ' a kiln 3\n b kiln 4\n a orders 5' }),
      'repeated-column',
      10,
      '"a" comes back',
    ],
    ['NaN as an entry', mps({ columns: ' tiles kiln NaN' }), 'not-a-number', 8, '"NaN" is not a number'],
    ['a word as an entry', mps({ columns: ' tiles kiln much' }), 'not-a-number', 8, '"much"'],
    ['a hexadecimal number', mps({ columns: ' tiles kiln 0x1F' }), 'not-a-number', 8, '"0x1F"'],
    ['an infinite entry', mps({ columns: ' tiles kiln 1e999' }), 'not-a-number', 8, 'must be finite'],
    ['an entry that is cut off', mps({ columns: ' tiles kiln' }), 'wrong-fields', 8, '2 fields'],
    ['NaN as a right side', mps({ rhs: 'RHS\n RHS kiln nan' }), 'not-a-number', 13, '"nan"'],
    ['a right side twice', mps({ rhs: 'RHS\n RHS kiln 1 kiln 2' }), 'repeated-entry', 13, 'two right sides'],
    ['a right side of no row', mps({ rhs: 'RHS\n RHS oven 1' }), 'unknown-row', 13, '"oven"'],
    ['an infinite objective constant', mps({ rhs: 'RHS\n RHS profit inf' }), 'not-a-number', 13, 'finite'],
    [
      'a range twice',
      mps({ tail: 'RANGES\n R kiln 1\n R kiln 2\nENDATA' }),
      'repeated-entry',
      17,
      'two ranges',
    ],
    [
      'a bound on no column',
      mps({ tail: 'BOUNDS\n UP B cups 1\nENDATA' }),
      'unknown-column',
      16,
      '"cups" is not in COLUMNS',
    ],
    ['an unknown kind of bound', mps({ tail: 'BOUNDS\n XX B tiles 1\nENDATA' }), 'unknown-type', 16, '"XX"'],
    [
      'a semi-continuous column',
      mps({ tail: 'BOUNDS\n SC B tiles 9\nENDATA' }),
      'refused-bound',
      16,
      'semi-continuous',
    ],
    [
      'a bound twice',
      mps({ tail: 'BOUNDS\n UP B tiles 1\n UP B tiles 2\nENDATA' }),
      'repeated-bound',
      17,
      'two UP bounds',
    ],
    ['a bound without a number', mps({ tail: 'BOUNDS\n UP tiles\nENDATA' }), 'wrong-fields', 16, 'a number'],
    ['a sense that is none', mps({ head: 'NAME w\nOBJSENSE best' }), 'bad-sense', 2, 'MAX or MIN'],
    ['an unknown marker', mps({ columns: " M 'MARKER' 'SOSORG'" }), 'bad-marker', 8, 'INTORG or INTEND'],
    [
      'a marker that ends nothing',
      mps({ columns: " M 'MARKER' 'INTEND'" }),
      'bad-marker',
      8,
      'without INTORG',
    ],
  ];
  it.each(faults)('SC-52 refuses %s with the line and one sentence', (_, text, code, line, words) => {
    let refusal: unknown;
    try {
      readMps(text);
    } catch (fault) {
      refusal = fault;
    }
    expect(refusal).toBeInstanceOf(MpsSyntaxError);
    const { message, ...rest } = refusal as MpsSyntaxError;
    expect(rest).toMatchObject({ code, line });
    expect((refusal as Error).message).toContain(words);
    expect((refusal as Error).message).toMatch(/^Line \d+: [^\n]+\.$/);
    expect(message).not.toContain('undefined');
  });

  it('keeps sentences short when the text is not MPS at all', () => {
    expect(() => readMps(`PK\u0003\u0004${'x'.repeat(5000)}`)).toThrow(/^Line 1: "PK.{38}…" is no section/s);
  });

  itNeeds(
    'lpFolder',
    'reads every shared problem to the arrays that HiGHS reads',
    async () => {
      const highs = await loadHighsOnce();
      const different: string[] = [];
      for (const set of ['netlib', 'kennington', 'infeas', 'misc', 'mip'] as const) {
        const problems = referenceProblems(set);
        for (const { name } of problems.slice(0, shareOf(problems.length, 12))) {
          const text = readReferenceText(set, name);
          const model = highs.createModel({ format: 'mps', data: new TextEncoder().encode(text) });
          const theirs = model.getModel('csc');
          model.dispose();
          const ours = readMps(text);
          const same = (a: unknown, b: unknown): boolean => isDeepStrictEqual(a, b);
          const isSame =
            same(ours.cost, theirs.colCost) &&
            same(ours.columnLower, theirs.colLower) &&
            same(ours.columnUpper, theirs.colUpper) &&
            same(ours.rowLower, theirs.rowLower) &&
            same(ours.rowUpper, theirs.rowUpper) &&
            ours.objectiveConstant === theirs.offset &&
            ours.matrix.value.length === theirs.matrix.values.length;
          if (!isSame) different.push(`${set}/${name}`);
        }
      }
      // That file has several sets of bounds: HiGHS applies them all, we the first, as the format says.
      expect(different).toEqual(['infeas/greenbea']);
    },
    60_000,
  );
});
