// Prepares everything and runs the suites: unit, reference, db, browser. `npm test -- unit db` runs some of them.
import { installPackages } from './lib/packages.mjs';
import { run, say, Sentence } from './lib/say.mjs';
import { runSuites, SUITES } from './lib/suites.mjs';

function wantedSuites() {
  const named = process.argv.slice(2).filter((word) => !word.startsWith('-'));
  const unknown = named.find((name) => !SUITES.includes(name));
  if (unknown) throw new Sentence(`There is no suite “${unknown}”; there are ${SUITES.join(', ')}.`);
  return SUITES.filter((name) => named.length === 0 || named.includes(name));
}

async function main() {
  const suites = wantedSuites();
  await installPackages();
  const { passed, failed } = await runSuites(suites);
  say(`${passed} passed, ${failed} failed`);
  return failed === 0 ? 0 : 1;
}

await run(main);
