/** Runs once when the web starts, before the first request: a wrong environment stops it here, not at a visitor. */
export async function register(): Promise<void> {
  if (process.env.NEXT_RUNTIME !== 'nodejs') return;
  const { environment } = await import('./lib/env');
  environment();
}
