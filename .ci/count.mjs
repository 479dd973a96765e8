// Prints the closing line from vitest's JSON report: N passed, N failed, N skipped.
import { readFileSync } from 'node:fs';

let report = { numPassedTests: 0, numFailedTests: 0, numPendingTests: 0 };
try {
  report = JSON.parse(readFileSync(process.argv[2], 'utf8'));
} catch {
  console.log('the tests did not run to their end');
}
const { numPassedTests: passed, numFailedTests: failed, numPendingTests: pending, numTodoTests: todo = 0 } = report;
console.log(`${passed} passed, ${failed} failed, ${pending + todo} skipped`);
