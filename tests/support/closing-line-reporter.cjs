/** Prints one closing line for the whole run, in the plain form that CI reads. */
module.exports = class ClosingLineReporter {
  onRunComplete(_contexts, results) {
    // A test file that could not be loaded counts as one failed test.
    const failed = results.numFailedTests + results.numRuntimeErrorTestSuites;
    const skipped = results.numPendingTests > 0 ? `, ${results.numPendingTests} skipped` : '';
    process.stdout.write(`\n${results.numPassedTests} passed, ${failed} failed${skipped}\n`);
  }

  getLastError() {
    return undefined;
  }
};
