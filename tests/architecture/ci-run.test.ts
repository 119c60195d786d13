/** What .ci/run makes of its steps, with stand-ins for npm and the programs that it would install. */
import { spawnSync } from 'node:child_process';
import { copyFileSync, mkdirSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { checkoutFolder } from '../support/needs';

let folder = '';

/** Answers each step as the environment tells it. */
const standInForNpm = `#!/usr/bin/env bash
case "$*" in
  ci) exit "$STEP_CI" ;;
  test) printf 'a test\\n\\n%s\\n\\nTests: as jest sums them up\\n' "$COUNTS"; exit "$STEP_TEST" ;;
  'run --silent lint') exit "$STEP_LINT" ;;
  'run --silent types') exit "$STEP_TYPES" ;;
esac
exit 99
`;

beforeAll(() => {
  folder = mkdtempSync(path.join(tmpdir(), 'planrow-ci-'));
  mkdirSync(path.join(folder, '.ci'));
  mkdirSync(path.join(folder, 'programs'));
  copyFileSync(path.join(checkoutFolder, '.ci', 'run'), path.join(folder, '.ci', 'run'));
  writeFileSync(path.join(folder, 'programs', 'npm'), standInForNpm, { mode: 0o755 });
  for (const program of ['apt-get', 'chromium', 'soffice', 'openssl']) {
    writeFileSync(path.join(folder, 'programs', program), '#!/usr/bin/env bash\n', { mode: 0o755 });
  }
});

afterAll(() => {
  rmSync(folder, { recursive: true, force: true });
});

function run(steps: { ci?: number; test?: number; lint?: number; types?: number; counts: string }): {
  exitCode: number | null;
  lastLine: string | undefined;
} {
  const result = spawnSync('bash', [path.join(folder, '.ci', 'run')], {
    encoding: 'utf8',
    env: {
      ...process.env,
      PATH: `${path.join(folder, 'programs')}${path.delimiter}${process.env.PATH ?? ''}`,
      STEP_CI: String(steps.ci ?? 0),
      STEP_TEST: String(steps.test ?? 0),
      STEP_LINT: String(steps.lint ?? 0),
      STEP_TYPES: String(steps.types ?? 0),
      COUNTS: steps.counts,
    },
  });
  return { exitCode: result.status, lastLine: result.stdout.trimEnd().split('\n').at(-1) };
}

describe('.ci/run', () => {
  it('adds lint and types to the tests as one each, and ends with the count alone on its line', () => {
    expect(run({ counts: '10 passed, 0 failed, 2 skipped' })).toEqual({
      exitCode: 0,
      lastLine: '12 passed, 0 failed, 2 skipped',
    });
    expect(run({ counts: '10 passed, 0 failed' }).lastLine).toBe('12 passed, 0 failed');
  });

  it('fails when a test fails', () => {
    expect(run({ test: 1, counts: '8 passed, 2 failed' })).toEqual({
      exitCode: 1,
      lastLine: '10 passed, 2 failed',
    });
  });

  it('fails when lint or types fail', () => {
    expect(run({ lint: 1, counts: '10 passed, 0 failed' })).toEqual({
      exitCode: 1,
      lastLine: '11 passed, 1 failed',
    });
    expect(run({ types: 2, counts: '10 passed, 0 failed' })).toEqual({
      exitCode: 1,
      lastLine: '11 passed, 1 failed',
    });
  });

  it('fails when no test ran', () => {
    expect(run({ counts: '0 passed, 0 failed' })).toEqual({ exitCode: 1, lastLine: '2 passed, 1 failed' });
  });

  it('fails when the tests ended before they were counted', () => {
    expect(run({ ci: 1, counts: '' })).toEqual({ exitCode: 1, lastLine: '0 passed, 1 failed' });
    expect(run({ test: 134, counts: '' })).toEqual({ exitCode: 1, lastLine: '0 passed, 1 failed' });
  });

  it('fails when the tests end with an error though none failed', () => {
    expect(run({ test: 1, counts: '10 passed, 0 failed' })).toEqual({
      exitCode: 1,
      lastLine: '12 passed, 1 failed',
    });
  });
});
