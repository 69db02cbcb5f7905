export type ErrorCode =
  | 'MALFORMED'
  | 'UNAUTHENTICATED'
  | 'FORBIDDEN'
  | 'NOT_FOUND'
  | 'CONFLICT'
  | 'TOO_LARGE'
  | 'WRONG_MEDIA_TYPE'
  | 'INVALID'
  | 'TOO_MANY';

export interface FieldError {
  readonly path: string;
  readonly message: string;
}

/** The one error that services throw: a closed code for the program, a sentence for the person. */
export class FettleError extends Error {
  readonly fields?: readonly FieldError[];
  readonly retryAfterS?: number;

  constructor(
    readonly code: ErrorCode,
    message: string,
    more: { fields?: readonly FieldError[]; retryAfterS?: number } = {},
  ) {
    super(message);
    this.name = 'FettleError';
    this.fields = more.fields;
    this.retryAfterS = more.retryAfterS;
  }
}

export function notFound(what: string): FettleError {
  return new FettleError('NOT_FOUND', `There is no such ${what}.`);
}
