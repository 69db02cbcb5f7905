interface Failure {
  readonly message?: string;
  readonly code?: string;
  readonly cause?: unknown;
}

/** The error at the bottom: what PostgreSQL said, not the query that the mapper wrapped around it. */
function rootCause(error: unknown): Failure {
  const failure = error as Failure;
  return failure.cause instanceof Error ? rootCause(failure.cause) : failure;
}

/** Does some work and tells how it went in one line of JSON, for the script that started this one. */
export async function tell(work: () => Promise<unknown>): Promise<void> {
  try {
    const value = await work();
    process.stdout.write(`\n${JSON.stringify({ ok: true, value })}\n`);
  } catch (error) {
    const { message, code } = rootCause(error);
    process.stdout.write(`\n${JSON.stringify({ ok: false, code, message })}\n`);
    process.exitCode = 1;
  }
}
