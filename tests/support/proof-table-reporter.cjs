/**
 * After `npm run prove`: writes tests/properties/PROVED.md, a row a test of the long seeded suites, so that what was
 * last proved in full stands in the repository.
 */
const { writeFileSync } = require('node:fs');
const path = require('node:path');

const root = path.resolve(__dirname, '..', '..');
const rooms = ['tests/properties/', 'tests/suite/'];

module.exports = class ProofTableReporter {
  onRunComplete(_contexts, results) {
    const rows = results.testResults
      .map((file) => ({
        file: path.relative(root, file.testFilePath).split(path.sep).join('/'),
        tests: file.testResults,
      }))
      .filter(({ file }) => rooms.some((room) => file.startsWith(room)))
      .sort((a, b) => a.file.localeCompare(b.file, 'en'))
      .flatMap(({ file, tests }) =>
        tests.map(
          (test) =>
            `| ${file.replace(/^tests\//, '')} | ${test.fullName.replaceAll('|', '\\|')} | ${test.status} |`,
        ),
      );
    const text = [
      '# Proved in full',
      '',
      `${new Date().toISOString().slice(0, 10)}, Node ${process.version}. Written by \`npm run prove\`, which runs every case of the suites below; \`npm test\` runs a first share.`,
      '',
      '| suite | what holds | end |',
      '| --- | --- | --- |',
      ...rows,
      '',
    ].join('\n');
    writeFileSync(path.join(root, 'tests', 'properties', 'PROVED.md'), text);
  }

  getLastError() {
    return undefined;
  }
};
