import { ok, refuse } from '../../result';
import type { PlainText } from './characters';
import { monic, readRoots, type Root } from './complex-roots';
import { commaMeaning, readSingle, readTimeS } from './numbers';
import { sectionFor, sectionsOf } from './sections';
import { HIGHEST_ORDER, type RawPlant, type TextResult } from './types';

const LABEL =
  /(?<![\p{L}\d_])(gain|k|zeros?|z|poles?|p|delay|dead[\s_-]?time|theta|θ)(?![\p{L}\d_])\s*[:=]?/giu;

type Kind = 'gain' | 'zeros' | 'poles' | 'delay';

function kindOf(label: string): Kind {
  const word = label.toLowerCase();
  if (word.startsWith('z')) return 'zeros';
  if (word.startsWith('p')) return 'poles';
  return word === 'gain' || word === 'k' ? 'gain' : 'delay';
}

/** `P = 2/(10s+1)`: P may also be the name of the plant. */
const NAMED_PLANT = /^\s*P\s*=[^=:]*(?:\d|[-+*/(^]\s*)s(?![\p{L}\d_])[^=:]*$/u;

/** Whether a text names zeros or poles. */
export function looksLikeGainZerosPoles(text: string): boolean {
  if (NAMED_PLANT.test(text) && !/(gain|zero|pole|delay|time)/i.test(text)) return false;
  return /(?<![\p{L}\d_])((pole|zero)s?(?![\p{L}\d_])|[pz]\s*[:=])/iu.test(text);
}

/** The plant gain·Π(s − z)/Π(s − p)·e^(-θ s); the gain is the factor before the monic ratio, not the steady gain. */
export function plantOfRoots(
  gain: number,
  zeros: readonly Root[],
  poles: readonly Root[],
  deadTimeS: number,
): TextResult<RawPlant> {
  if (Math.max(zeros.length, poles.length) > HIGHEST_ORDER)
    return refuse(
      'ORDER_TOO_HIGH',
      `There are ${Math.max(zeros.length, poles.length)} zeros or poles; up to ${HIGHEST_ORDER} can be handled.`,
    );
  const num = monic(zeros);
  if (!num.ok) return num;
  const den = monic(poles);
  return den.ok ? ok({ num: num.value.map((c) => c * gain), den: den.value, deadTimeS }) : den;
}

/** `gain 2; zeros -1; poles -2 -3±4i; delay 0.5`, in any order. */
export function readGainZerosPoles(source: PlainText): TextResult<RawPlant> {
  const cut = sectionsOf(source, LABEL, kindOf, 'gain, zeros, poles and delay');
  if (!cut.ok) return cut;
  const section = (kind: Kind) => sectionFor(cut.value, kind);
  const nothing: PlainText = { text: '', places: [] };
  const poleList = section('poles');
  if (!poleList) return refuse('SYNTAX', 'The poles are missing. Write poles none for a plant without any.');
  const zeroPart = section('zeros')?.part ?? nothing;
  const commas = commaMeaning([zeroPart.text, poleList.part.text]);
  const zeros = readRoots(zeroPart, commas);
  if (!zeros.ok) return zeros;
  const poles = readRoots(poleList.part, commas);
  if (!poles.ok) return poles;
  const gainSection = section('gain');
  const gain = gainSection ? readSingle(gainSection.part) : ok(1);
  if (!gain.ok) return gain;
  const delay = section('delay');
  const deadTimeS = delay ? readTimeS(delay.part) : ok(0);
  if (!deadTimeS.ok) return deadTimeS;
  const plant = plantOfRoots(gain.value, zeros.value, poles.value, deadTimeS.value);
  if (!plant.ok) return plant;
  const places = { num: section('zeros')?.labelPlace, den: poleList.labelPlace, deadTime: delay?.labelPlace };
  return ok({ ...plant.value, places });
}
