import { z } from 'zod';
import './words';

/**
 * What no record can hold or show: control characters but line ends and tabs (the database takes no NUL), halves of
 * Unicode characters, and the marks that turn the direction of a line, by which a text could read other than it is.
 */
const UNSHOWABLE = /[^\P{Cc}\n\r\t]|\p{Cs}|[\u202A-\u202E\u2066-\u2069]/u;
const LINE_END = /[\n\r\t]/;

export function isShowable(text: string): boolean {
  return !UNSHOWABLE.test(text);
}

export const NOT_SHOWABLE = 'This holds characters that cannot be shown; type it again without them.';

/** A text of several lines. @param most characters @param missing what to say when it is empty; without it, it may be */
export function paragraph(most: number, missing?: string) {
  const text = z.string().trim().max(most).refine(isShowable, NOT_SHOWABLE);
  return missing === undefined ? text : text.min(1, missing);
}

/** A text of one line: a name, a tag, a unit. */
export function line(most: number, missing?: string) {
  return paragraph(most, missing).refine((text) => !LINE_END.test(text), 'This must be one line.');
}

const MOMENT = 'Give date and time as 2026-12-24T18:00:00Z.';

/** A moment with its offset; what lies before this product was thought of is a slip of the year. */
export const moment = z.iso
  .datetime({ offset: true, error: MOMENT })
  .refine((text) => Date.parse(text) >= Date.UTC(2000, 0), MOMENT);

/** The version of a row that an edit started from; the column is a 32-bit integer and one more must fit. */
export const rowVersion = z.int().min(1).max(2_147_483_646);
