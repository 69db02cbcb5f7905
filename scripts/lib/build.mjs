import { createHash } from 'node:crypto';
import { existsSync, readdirSync, readFileSync, rmSync, statSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { packageCommand, root } from './processes.mjs';
import { say, Sentence } from './say.mjs';

/** All that the build reads or checks the types of; a change in any of it leads to another build. */
const SOURCES = [
  'app',
  'components',
  'db',
  'lib',
  'worker',
  'public',
  'instrumentation.ts',
  'proxy.ts',
  'package-lock.json',
  'next.config.mjs',
  'postcss.config.mjs',
  'tailwind.config.ts',
  'tsconfig.json',
];
const stampFile = join(root, '.next', 'fettle-stamp');

function filesUnder(path) {
  if (!existsSync(path)) return [];
  if (!statSync(path).isDirectory()) return [path];
  return readdirSync(path)
    .sort()
    .flatMap((name) => filesUnder(join(path, name)));
}

function sourceHash() {
  const hash = createHash('sha256').update(process.version);
  for (const source of SOURCES)
    for (const file of filesUnder(join(root, source)))
      hash.update(file.slice(root.length)).update(readFileSync(file));
  return hash.digest('hex');
}

/** Builds the app when the last build is of other sources. */
export async function build() {
  const wanted = sourceHash();
  if (existsSync(stampFile) && readFileSync(stampFile, 'utf8') === wanted) return;
  say('Building …');
  rmSync(stampFile, { force: true });
  const env = { ...process.env, NODE_ENV: 'production', NEXT_TELEMETRY_DISABLED: '1' };
  const { code, output } = await packageCommand('next/dist/bin/next', ['build'], { quiet: true, env });
  if (code !== 0) throw new Sentence(`The build failed:\n${output.trim().split('\n').slice(-30).join('\n')}`);
  writeFileSync(stampFile, wanted);
}
