/** `npm run demo`: what the README shows is what is printed. */
import { mkdirSync, readFileSync } from 'node:fs';
import path from 'node:path';
import { checkoutFolder } from '../../support/needs';
import { WorkFolder } from '../../support/run-planrow';

/** Times and the count of iterations may change without the README being wrong. */
const withoutEffort = (line: string): boolean => !line.includes('Solved in');

const linesOf = (text: string): string[] =>
  text
    .split('\n')
    .map((line) => line.trimEnd())
    .filter(withoutEffort);

describe('the demo', () => {
  const folder = new WorkFolder();
  afterAll(() => folder.remove());

  it('prints what the README shows, line by line', () => {
    const sample = path.join('addin', 'samples', 'week-plan.xlsx');
    mkdirSync(path.join(folder.path, path.dirname(sample)), { recursive: true });
    folder.write(sample, readFileSync(path.join(checkoutFolder, sample)));
    const { exitCode, stdout } = folder.run('solve', sample);
    expect(exitCode).toBe(0);
    const readme = readFileSync(path.join(checkoutFolder, 'README.md'), 'utf8');
    const [, shown = ''] = /```text\n([\s\S]*?)```/.exec(readme) ?? [];
    expect(linesOf(stdout.trimEnd())).toEqual(linesOf(shown.trimEnd()));
  });
});
