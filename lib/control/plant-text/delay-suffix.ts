import { sliceOf, type PlainText } from './characters';

const SUFFIX =
  /[,;\s]+((?:delay|dead[\s_-]?time|theta|θ)(?![\p{L}])\s*[:=]?\s*)([+-]?\s*[\d.,]+(?:e[+-]?\d+)?\s*(?:s|sec|ms|us|μs|min|h)?)\s*$/iu;

export interface WithDelay {
  readonly body: PlainText;
  /** The number behind `delay`, with its unit. */
  readonly delay?: PlainText;
}

/** Takes `, delay 3` from the end of a text. */
export function cutDelay(source: PlainText): WithDelay {
  const suffix = SUFFIX.exec(source.text);
  if (!suffix) return { body: source };
  const from = suffix.index + suffix[0].indexOf(suffix[1]) + suffix[1].length;
  return {
    body: sliceOf(source, 0, suffix.index),
    delay: sliceOf(source, from, from + suffix[2].length),
  };
}
