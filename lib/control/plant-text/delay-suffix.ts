import { sliceOf, type PlainText } from './characters';

/** Each run of blanks can be matched in one way only, so that long ones cost no more than their length. */
const SUFFIX =
  /(?<=[,;\s])((?:delay|dead[\s_-]?time|theta|θ)(?![\p{L}])(?:\s*[:=])?\s*)((?:[+-]\s*)?[\d.,]+(?:e[+-]?\d+)?(?:\s*(?:s|sec|ms|us|μs|min|h))?)\s*$/iu;

export interface WithDelay {
  readonly body: PlainText;
  /** The number behind `delay`, with its unit. */
  readonly delay?: PlainText;
}

/** Takes `, delay 3` from the end of a text. */
export function cutDelay(source: PlainText): WithDelay {
  const suffix = SUFFIX.exec(source.text);
  if (!suffix) return { body: source };
  const from = suffix.index + suffix[1].length;
  let end = suffix.index;
  while (end > 0 && /[,;\s]/.test(source.text[end - 1])) end -= 1;
  return {
    body: sliceOf(source, 0, end),
    delay: sliceOf(source, from, from + suffix[2].length),
  };
}
