/** A failure that a person can do something about: one plain sentence, and the program ends. */
export class Sentence extends Error {}

export function say(text) {
  process.stdout.write(`${text}\n`);
}

/** Runs a program's main function; what can be told in a sentence is told in one. */
export async function run(main) {
  try {
    process.exitCode = (await main()) ?? 0;
  } catch (error) {
    if (!(error instanceof Sentence)) throw error;
    process.stderr.write(`${error.message}\n`);
    process.exitCode = 1;
  }
}
