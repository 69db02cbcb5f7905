import { FettleError } from '../errors';

const UNIQUE_VIOLATION = '23505';

function postgresCode(error: unknown): string | undefined {
  if (typeof error !== 'object' || error === null) return undefined;
  const { code, cause } = error as { code?: unknown; cause?: unknown };
  return typeof code === 'string' ? code : postgresCode(cause);
}

/** Runs a write; when the database says that a name is taken, tells it as a conflict at that field. */
export async function taken<T>(message: string, path: string, write: () => Promise<T>): Promise<T> {
  try {
    return await write();
  } catch (error) {
    if (postgresCode(error) !== UNIQUE_VIOLATION) throw error;
    throw new FettleError('CONFLICT', message, { fields: [{ path, message }] });
  }
}
