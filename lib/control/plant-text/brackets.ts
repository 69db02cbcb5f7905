import { ok, refuse } from '../../result';
import { placeOf, type PlainText } from './characters';
import type { TextResult } from './types';

const DEEPEST = 60;
const CLOSING: Readonly<Record<string, string>> = { '(': ')', '[': ']', '{': '}' };

/** The first bracket without a partner of its kind; nesting deeper than anyone writes is refused too. */
export function balanced(source: PlainText): TextResult<null> {
  const open: { at: number; closing: string }[] = [];
  for (let i = 0; i < source.text.length; i += 1) {
    const character = source.text[i];
    const closing = CLOSING[character];
    if (closing !== undefined) {
      open.push({ at: i, closing });
      if (open.length > DEEPEST)
        return refuse(
          'SYNTAX',
          `Brackets are nested more than ${DEEPEST} deep. Multiply some of them out.`,
          placeOf(source, i),
        );
    }
    if (character !== ')' && character !== ']' && character !== '}') continue;
    const last = open.pop();
    if (last === undefined)
      return refuse(
        'UNBALANCED_BRACKET',
        `This “${character}” closes a bracket that was never opened. Take it out, or open it.`,
        placeOf(source, i),
      );
    if (last.closing !== character)
      return refuse(
        'UNBALANCED_BRACKET',
        `A “${last.closing}” is needed here, not “${character}”.`,
        placeOf(source, i),
      );
  }
  const last = open.pop();
  return last === undefined
    ? ok(null)
    : refuse(
        'UNBALANCED_BRACKET',
        `This bracket is opened but never closed. Add “${last.closing}”.`,
        placeOf(source, last.at),
      );
}
