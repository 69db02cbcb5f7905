// What CI runs: every suite, then the static checks. Counts both into one closing line.
import { mkdtempSync, readdirSync, cpSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { installPackages } from './lib/packages.mjs';
import { command, root } from './lib/processes.mjs';
import { run, say } from './lib/say.mjs';

const CHECKS = {
  lint: ['npm', ['run', '--silent', 'lint']],
  format: ['npm', ['run', '--silent', 'format:check']],
  types: ['npm', ['run', '--silent', 'typecheck']],
  'dead code': ['npm', ['run', '--silent', 'deadcode']],
  imports: ['npm', ['run', '--silent', 'imports']],
};

/** The migrations must be those of the schema: drawing them up again may add nothing. */
async function schemaDrift() {
  const folder = mkdtempSync(join(tmpdir(), 'fettle-drift-'));
  try {
    const out = join(folder, 'migrations');
    cpSync(join(root, 'db', 'migrations'), out, { recursive: true });
    const before = readdirSync(out).length;
    const args = [
      'drizzle-kit',
      'generate',
      '--dialect',
      'postgresql',
      '--schema',
      './db/schema/*.ts',
      '--out',
      out,
    ];
    const { code, output } = await command('npx', args, { quiet: true });
    const clean = code === 0 && readdirSync(out).length === before;
    if (!clean) say(output);
    return clean;
  } finally {
    rmSync(folder, { recursive: true, force: true });
  }
}

async function main() {
  await installPackages();
  const tests = await command('npm', ['test', '--silent'], {
    quiet: true,
    stdio: ['ignore', 'pipe', 'inherit'],
  });
  process.stdout.write(tests.output);
  const [, testsPassed = '0', testsFailed = '1'] =
    /(\d+) passed, (\d+) failed\s*$/.exec(tests.output.trim()) ?? [];
  let passed = Number(testsPassed);
  let failed = Number(testsFailed);
  if (tests.code !== 0 && failed === 0) failed = 1;
  say('\n== static checks ==');
  const outcomes = [];
  for (const [name, [program, args]] of Object.entries(CHECKS)) {
    const { code, output } = await command(program, args, { quiet: true });
    if (code !== 0) say(output);
    outcomes.push([name, code === 0]);
  }
  outcomes.push(['schema drift', await schemaDrift()]);
  for (const [name, good] of outcomes) {
    say(`${name}: ${good ? 'passed' : 'failed'}`);
    if (good) passed += 1;
    else failed += 1;
  }
  say(`${passed} passed, ${failed} failed`);
  return failed === 0 ? 0 : 1;
}

await run(main);
