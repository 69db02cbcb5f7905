/**
 * Runs once when the web starts, before the first request: a wrong environment ends it here, with its sentences. Thrown
 * on, the error would leave a server that answers every visitor with 500.
 */
export async function register(): Promise<void> {
  if (process.env.NEXT_RUNTIME !== 'nodejs') return;
  const { environment, EnvironmentError } = await import('./lib/env');
  try {
    environment();
  } catch (error) {
    if (!(error instanceof EnvironmentError)) throw error;
    process.stderr.write(`${error.message}\n`);
    process.exit(1);
  }
}
