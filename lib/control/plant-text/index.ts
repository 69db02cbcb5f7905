import { ok, refuse } from '../../result';
import { plain, type PlainText } from './characters';
import { readCoefficients } from './coefficients';
import { readExpression } from './expression';
import { looksLikeGainZerosPoles, readGainZerosPoles } from './gain-zeros-poles';
import { readJsonPlant } from './json';
import { looksLikeParameters, readParameters } from './parameters';
import type { Notation, ParsedPlant, RawPlant, TextResult } from './types';
import { commonFactorWarning, validatePlant } from './validate';

export { plantToText } from './format';
export type { Notation, ParsedPlant, PlantTextCode } from './types';
export { validatePlant } from './validate';

const LONGEST = 2000;
/** `G(s) =` and the like before an expression. */
const LEFT_SIDE = /^\s*[A-Za-z]\w{0,3}\s*(?:\(\s*s\s*\)\s*)?=\s*(?=[^=])/;

function withoutLeftSide({ text, places }: PlainText): PlainText {
  const left = LEFT_SIDE.exec(text)?.[0].length ?? 0;
  return { text: text.slice(left), places: places.slice(left) };
}

function readAs(source: PlainText, typed: string): [Notation, TextResult<RawPlant>] {
  if (source.text.trimStart().startsWith('{')) return ['json', readJsonPlant(typed)];
  if (looksLikeGainZerosPoles(source.text)) return ['gain-zeros-poles', readGainZerosPoles(source)];
  if (looksLikeParameters(source.text)) return ['parameters', readParameters(source)];
  const right = withoutLeftSide(source);
  const lists = readCoefficients(right);
  return lists ? ['coefficients', lists] : ['expression', readExpression(right)];
}

/**
 * Reads a plant from a text in any accepted notation: two coefficient lists, an expression in s, named parameters,
 * gain with zeros and poles, or JSON. Coefficients stay as typed; nothing is cancelled or normalised.
 *
 * Products may be implied (`10s+1`, `2(s+1)`); a fraction of two numbers before a symbol or bracket is one number
 * (`1/2 s` is 0.5 s), any other implied product binds closer than a division (`2/(10s+1)(5s+1)` has both brackets
 * below). What can be meant in two ways is warned about, or refused where no reading is the usual one.
 *
 * @param typed at most 2000 characters
 * @returns the plant with its notation and warnings; or a code with a sentence and, where it can be told, the place in
 *   the text. Never throws.
 */
export function parsePlantText(typed: string): TextResult<ParsedPlant> {
  if (typed.trim() === '')
    return refuse('EMPTY', 'There is no plant yet. Paste coefficients or an expression in s.');
  if (typed.length > LONGEST)
    return refuse('TOO_LONG', `The text is longer than ${LONGEST} characters.`, LONGEST);
  const [notation, read] = readAs(plain(typed), typed);
  if (!read.ok) return read;
  const valid = validatePlant(read.value.num, read.value.den, read.value.deadTimeS);
  if (!valid.ok) return valid;
  const common = commonFactorWarning(valid.value);
  return ok({
    plant: valid.value,
    notation,
    warnings: [...(read.value.warnings ?? []), ...(common ? [common] : [])],
  });
}
