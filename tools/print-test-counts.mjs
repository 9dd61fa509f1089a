/** `node tools/print-test-counts.mjs RESULTS.json`: the closing line of a test run, from its JSON report. */
import { readFileSync } from 'node:fs';

const [file] = process.argv.slice(2);
let report;
try {
  report = JSON.parse(readFileSync(file, 'utf8'));
} catch (error) {
  console.error(`no test report in ${file}: ${error.message}`);
  console.log('0 passed, 0 failed, 0 skipped');
  process.exit(1);
}
// A file that fails to load has no tests to count; it is one failure all the same.
const brokenFiles = report.testResults.filter(
  (result) => result.status === 'failed' && result.assertionResults.length === 0,
).length;
const failed = report.numFailedTests + brokenFiles;
console.log(
  `${report.numPassedTests} passed, ${failed} failed, ${report.numPendingTests + report.numTodoTests} skipped`,
);
process.exit(failed === 0 && report.numPassedTests > 0 ? 0 : 1);
