/**
 * The pure ring's answer for an outcome that is expected to happen: a value, or a closed code with one sentence.
 * Misuse (a wrong type, a value outside the stated range) throws RangeError or TypeError instead.
 */
export type Result<T, Code extends string = string> =
  | { readonly ok: true; readonly value: T }
  | { readonly ok: false; readonly code: Code; readonly message: string; readonly at?: number };

export function ok<T>(value: T): { ok: true; value: T } {
  return { ok: true, value };
}

/** A refusal: `code` for the program, `message` for the person, `at` the position in a text where it went wrong. */
export function refuse<Code extends string>(
  code: Code,
  message: string,
  at?: number,
): { ok: false; code: Code; message: string; at?: number } {
  return at === undefined ? { ok: false, code, message } : { ok: false, code, message, at };
}
