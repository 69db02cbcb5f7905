// What CI runs: every suite, then the static checks. Counts both into one closing line.
import { cpSync, mkdirSync, mkdtempSync, readdirSync, rmSync } from 'node:fs';
import { join, relative } from 'node:path';
import { installPackages } from './lib/packages.mjs';
import { command, packageCommand, root } from './lib/processes.mjs';
import { run, say } from './lib/say.mjs';
import { runSuites, SUITES } from './lib/suites.mjs';

/** Name of a check, and the script of package.json that does it. */
const CHECKS = {
  lint: 'lint',
  format: 'format:check',
  types: 'typecheck',
  'dead code': 'deadcode',
  imports: 'imports',
};

async function script(name) {
  const { code, output } = await command('npm', ['run', '--silent', name], { quiet: true });
  if (code !== 0) say(output);
  return code === 0;
}

/** The migrations must be those of the schema: drawing them up again may add nothing. */
async function schemaDrift() {
  const data = join(root, '.data');
  mkdirSync(data, { recursive: true });
  const folder = mkdtempSync(join(data, 'drift-'));
  try {
    cpSync(join(root, 'db', 'migrations'), folder, { recursive: true });
    const before = readdirSync(folder).length;
    // drizzle-kit takes a path from here only, not one from the root.
    const args = ['generate', '--dialect=postgresql', '--schema=./db/schema/*.ts'];
    const { code, output } = await packageCommand(
      'drizzle-kit/bin.cjs',
      [...args, `--out=./${relative(root, folder)}`],
      { quiet: true },
    );
    const isClean = code === 0 && readdirSync(folder).length === before && /nothing to migrate/.test(output);
    if (!isClean) say(output);
    return isClean;
  } finally {
    rmSync(folder, { recursive: true, force: true });
  }
}

async function main() {
  await installPackages();
  let { passed, failed } = await runSuites(SUITES);
  say('\n== static checks ==');
  const outcomes = {};
  for (const [name, does] of Object.entries(CHECKS)) outcomes[name] = await script(does);
  outcomes['schema drift'] = await schemaDrift();
  for (const [name, isGood] of Object.entries(outcomes)) {
    say(`${name}: ${isGood ? 'as it should be' : 'WRONG, see above'}`);
    if (isGood) passed += 1;
    else failed += 1;
  }
  say(`${passed} passed, ${failed} failed`);
  return failed === 0 ? 0 : 1;
}

await run(main);
