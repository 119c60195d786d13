/** The rule by which a test may count as skipped (tests/support/needs.ts). */
import { fateOfTest, findNeeds, itNeeds, pathOfNeed } from '../support/needs';

const nothingInstalled = findNeeds({ PATH: '', PLANROW_LP: '/nowhere' });

describe('what a test needs beyond npm ci', () => {
  it('is looked for where the environment says', () => {
    expect(nothingInstalled.lpFolder.path).toBeUndefined();
    expect(nothingInstalled.libreOffice.path).toBeUndefined();
    expect(findNeeds({ PATH: '', PLANROW_LP: __dirname }).lpFolder.path).toBe(__dirname);
  });

  it('counts as skipped on a desk and fails on the build machine when a package manager could bring it', () => {
    expect(fateOfTest(nothingInstalled.libreOffice, false)).toBe('skip');
    expect(fateOfTest(nothingInstalled.libreOffice, true)).toBe('fail');
  });

  it('may be missing on the build machine only where it is a shared folder', () => {
    expect(fateOfTest(nothingInstalled.lpFolder, true)).toBe('skip');
    const optional = Object.entries(nothingInstalled).filter(
      ([, need]) => need.isOptionalInContinuousIntegration,
    );
    expect(optional.map(([name]) => name)).toEqual(['lpFolder', 'sheetFixtures']);
  });

  it('runs whenever it is there', () => {
    const there = { ...nothingInstalled.libreOffice, path: '/usr/bin/soffice' };
    expect([fateOfTest(there, false), fateOfTest(there, true)]).toEqual(['run', 'run']);
  });

  itNeeds('openssl', 'is found with its path', () => {
    expect(pathOfNeed('openssl')).toMatch(/openssl$/);
  });
});
