import { ok, refuse } from '../../result';
import { balanced } from './brackets';
import { placeOf, plain, sliceOf, type PlainText } from './characters';
import { looksLabelled, readCoefficients, readLabelled } from './coefficients';
import { cutDelay } from './delay-suffix';
import { readExpression } from './expression';
import { withoutFractionBar } from './fraction-bar';
import { looksLikeGainZerosPoles, readGainZerosPoles } from './gain-zeros-poles';
import { readJsonPlant } from './json';
import { readTimeS } from './numbers';
import { looksLikeParameters, readParameters } from './parameters';
import type { Notation, ParsedPlant, RawPlant, TextResult } from './types';
import { commonFactorWarning, validatePlant } from './validate';

export { plantToText } from './format';
export type { Notation, ParsedPlant, PlantTextCode } from './types';
export { validatePlant } from './validate';

const LONGEST = 2000;
/** `G(s) =`, `Y(s)/U(s) =` and the like before an expression. */
const LEFT_SIDE =
  /^\s*\p{L}\w{0,7}\s*(?:\(\s*s\s*\)\s*(?:\/\s*\p{L}\w{0,7}\s*\(\s*s\s*\)\s*)?)?=\s*(?=[^=\s])/u;

type Read = readonly [Notation, TextResult<RawPlant>];

function withoutLeftSide(source: PlainText): PlainText {
  return sliceOf(source, LEFT_SIDE.exec(source.text)?.[0].length ?? 0);
}

/** Adds the dead time that stands behind the plant: `, delay 3`. */
function delayed(read: TextResult<RawPlant>, delay: PlainText | undefined): TextResult<RawPlant> {
  if (!read.ok || !delay) return read;
  const deadTimeS = readTimeS(delay);
  if (!deadTimeS.ok) return deadTimeS;
  const deadTime = placeOf(delay, 0);
  if (read.value.deadTimeS !== 0)
    return refuse(
      'AMBIGUOUS',
      'The dead time is stated twice. State it as e^(-θ s) or behind, not both.',
      deadTime,
    );
  return ok({ ...read.value, deadTimeS: deadTimeS.value, places: { ...read.value.places, deadTime } });
}

function readAs(source: PlainText, typed: string): Read {
  if (/^\s*\{\s*["}]/.test(source.text)) return ['json', readJsonPlant(typed)];
  const brackets = balanced(source);
  if (!brackets.ok) return ['expression', brackets];
  if (looksLabelled(source.text)) return ['coefficients', readLabelled(source)];
  if (looksLikeGainZerosPoles(source.text)) return ['gain-zeros-poles', readGainZerosPoles(source)];
  if (looksLikeParameters(source.text)) return ['parameters', readParameters(source)];
  const { body, delay } = cutDelay(withoutFractionBar(withoutLeftSide(withoutEnd(source))));
  const lists = readCoefficients(body);
  if (lists) return ['coefficients', delayed(lists, delay)];
  return ['expression', delayed(readExpression(body), delay)];
}

function withoutEnd(source: PlainText): PlainText {
  return sliceOf(source, 0, source.text.replace(/[;\s]+$/, '').length);
}

/**
 * Reads a plant from a text in any accepted notation: two coefficient lists, an expression in s, named parameters,
 * gain with zeros and poles, or JSON. Coefficients stay as typed; nothing is cancelled or normalised.
 *
 * Products may be implied (`10s+1`, `2(s+1)`); a fraction of two numbers before a symbol or bracket is one number
 * (`1/2 s` is 0.5 s), any other implied product binds closer than a division (`2/(10s+1)(5s+1)` has both brackets
 * below), but a dead time behind a fraction belongs to all of it (`2/(10s+1) e^(-3s)`). What can be meant in two ways
 * is warned about, or refused where no reading is the usual one.
 *
 * @param typed at most 2000 characters; times in seconds unless a unit (ms, us, min, h) stands behind
 * @returns the plant with its notation and warnings; or a code with a sentence and, where it can be told, the place in
 *   the text. Never throws.
 */
export function parsePlantText(typed: string): TextResult<ParsedPlant> {
  if (typed.trim() === '')
    return refuse('EMPTY', 'There is no plant yet. Paste coefficients or an expression in s.', 0);
  if (typed.length > LONGEST)
    return refuse('TOO_LONG', `The text has ${typed.length} characters; up to ${LONGEST} are read.`, LONGEST);
  const [notation, read] = readAs(plain(typed), typed);
  if (!read.ok) return read;
  const { num, den, deadTimeS, places, warnings = [] } = read.value;
  const valid = validatePlant(num, den, deadTimeS, places);
  if (!valid.ok)
    return valid.code === 'IMPROPER' && warnings.length > 0
      ? { ...valid, message: `${valid.message} ${warnings.join(' ')}` }
      : valid;
  const common = commonFactorWarning(valid.value);
  return ok({
    plant: valid.value,
    notation,
    warnings: common ? [...warnings, common] : warnings,
  });
}
