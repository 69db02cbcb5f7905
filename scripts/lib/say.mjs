import { stopSignal } from './stop-signal.mjs';

/** A failure that a person can do something about: one plain sentence, and the program ends. */
export class Sentence extends Error {}

export function say(text) {
  process.stdout.write(`${text}\n`);
}

/** What the operating system refused, as a sentence; null for an error that is a fault of ours. */
function systemSentence(error) {
  const place = error.path ?? error.address ?? error.syscall;
  if (error.code === 'EACCES' || error.code === 'EPERM')
    return `There is no permission for ${place}; start as the user that it belongs to.`;
  if (error.code === 'ENOSPC') return `The disk is full (${place}).`;
  if (error.code === 'EROFS') return `${place} can’t be written: its file system is read-only.`;
  return null;
}

/** Runs a program's main function; what can be told in a sentence is told in one. */
export async function run(main) {
  // A reader that goes away (a closed terminal, a pipe into `head`) must not keep us from cleaning up.
  for (const stream of [process.stdout, process.stderr]) stream.on('error', () => undefined);
  try {
    process.exitCode = (await main()) ?? 0;
  } catch (error) {
    process.exitCode = stopSignal.aborted ? 130 : 1;
    if (stopSignal.aborted) return;
    const sentence = error instanceof Sentence ? error.message : systemSentence(error);
    process.stderr.write(`${sentence ?? error.stack}\n`);
  }
}
