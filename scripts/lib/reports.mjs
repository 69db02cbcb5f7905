import { existsSync, readFileSync } from 'node:fs';

/** A JSON report that a test runner wrote; null when there is none that can be read. */
export function readReport(file) {
  if (!existsSync(file)) return null;
  try {
    return JSON.parse(readFileSync(file, 'utf8'));
  } catch {
    return null;
  }
}

/** Counts of a suite. One that ran nothing has failed: nothing was tested. So has one whose runner says so. */
export function counted(passed = 0, failed = 0, code = 1) {
  const isBad = code !== 0 || passed + failed === 0;
  return { passed, failed: failed === 0 && isBad ? 1 : failed };
}
