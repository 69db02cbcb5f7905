import { createHash } from 'node:crypto';
import { canonicalText } from '../change';

/** SHA-256 of the canonical text of a value: the same content always gives the same digest. */
export function digestOf(value: unknown): string {
  return createHash('sha256').update(canonicalText(value)).digest('hex');
}

/** The link that binds a row to all rows before it. */
export function chainHash(previousHash: string, row: unknown): string {
  return createHash('sha256')
    .update(`${previousHash}\n${canonicalText(row)}`)
    .digest('hex');
}
