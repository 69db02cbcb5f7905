/** What the API says when it refuses: RFC 9457 problem details. */
export interface Problem {
  title: string;
  detail: string;
  status: number;
  errors: { path: string; message: string }[];
}

export type Answer<T> = { ok: true; value: T } | { ok: false; problem: Problem };

function asProblem(status: number, body: unknown): Problem {
  const given = (typeof body === 'object' && body !== null ? body : {}) as Partial<Problem>;
  return {
    status,
    title: given.title ?? 'That did not work',
    detail: given.detail ?? 'The server gave no reason. Nothing was kept; try again.',
    errors: Array.isArray(given.errors) ? given.errors : [],
  };
}

/**
 * Sends one request to the API of the page's own server. A post carries an idempotency key, so that pressing a
 * button twice, or a repeated request after a lost answer, does the thing once.
 */
export async function callApi<T>(
  method: 'GET' | 'POST' | 'PATCH' | 'PUT' | 'DELETE',
  path: string,
  body?: unknown,
  key?: string,
): Promise<Answer<T>> {
  try {
    const response = await fetch(`/api/v1${path}`, {
      method,
      headers: {
        accept: 'application/json',
        ...(body === undefined ? {} : { 'content-type': 'application/json' }),
        ...(method === 'POST' ? { 'idempotency-key': key ?? crypto.randomUUID() } : {}),
      },
      body: body === undefined ? undefined : JSON.stringify(body),
    });
    const json: unknown = response.status === 204 ? null : await response.json().catch(() => null);
    return response.ok
      ? { ok: true, value: json as T }
      : { ok: false, problem: asProblem(response.status, json) };
  } catch {
    return {
      ok: false,
      problem: {
        status: 0,
        title: 'No connection',
        detail:
          'The server could not be reached. What you typed is still here; try again when the network is back.',
        errors: [],
      },
    };
  }
}

/** The API writes infinite values as "inf". */
export function toApiNumber(value: number): number | 'inf' {
  return Number.isFinite(value) ? value : 'inf';
}
