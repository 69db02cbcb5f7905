import { formatNumber } from '../../units';

/** What is known about the place where a number was typed; each part lets one more kind of mix-up be told. */
export interface MixUpContext {
  /** The numbers that belong in the other fields, by label. */
  readonly others?: Readonly<Record<string, number>>;
  readonly sampleTimeS?: number;
  readonly inputSpan?: number;
  readonly outputSpan?: number;
  /** Proportional gain of the loop, in its own units. */
  readonly kp?: number;
}

interface Suspect {
  /** What would have been typed by this mistake. */
  readonly typed: number;
  readonly sentence: string;
}

/** Share by which a typed number may differ from a suspect: typed numbers are rounded to about three digits. */
const LIKENESS = 0.005;

/**
 * Names the mistake that would turn the expected number into the one that was typed: a field swapped, minutes for
 * seconds, a time for a rate, a band for a gain, the span ratio, the gain or the sample time left in or out, a decimal
 * mark displaced, a sign lost.
 *
 * @param typed the number entered
 * @param expected the number that should stand there
 * @param context what else is known
 * @returns one or two sentences, the likeliest mistake first; null when the numbers agree or nothing fits
 */
export function explainMixUp(typed: number, expected: number, context: MixUpContext = {}): string | null {
  if (!Number.isFinite(typed) || !Number.isFinite(expected) || alike(typed, expected)) return null;
  const found = suspects(expected, context).filter((suspect) => alike(typed, suspect.typed));
  if (found.length === 0) return null;
  const sentences = [...new Set(found.map(({ sentence }) => sentence))].slice(0, 2);
  return sentences.join(' Or: ');
}

function alike(one: number, other: number): boolean {
  return one === other || Math.abs(one - other) <= LIKENESS * Math.min(Math.abs(one), Math.abs(other));
}

/** Every mistake that is known, the likeliest first. */
function suspects(expected: number, context: MixUpContext): Suspect[] {
  return [
    ...swaps(context),
    { typed: -expected, sentence: 'The size is right, the sign is not.' },
    {
      typed: expected * 60,
      sentence: 'It is 60 times too large: seconds where minutes belong (or per minute for per second).',
    },
    {
      typed: expected / 60,
      sentence: 'It is 60 times too small: minutes where seconds belong (or per second for per minute).',
    },
    {
      typed: expected * 3600,
      sentence: 'It is 3600 times too large: seconds where hours belong (or per hour for per second).',
    },
    {
      typed: expected / 3600,
      sentence: 'It is 3600 times too small: hours where seconds belong (or per second for per hour).',
    },
    {
      typed: 100 / expected,
      sentence: 'It is 100 divided by the value: a proportional band and a gain are mixed up.',
    },
    {
      typed: 1 / expected,
      sentence:
        'It is 1 divided by the value: a time and a rate (time per repeat and repeats per time) are mixed up.',
    },
    {
      typed: 60 / expected,
      sentence: 'It is 60 divided by the value: seconds and repeats per minute are mixed up.',
    },
    {
      typed: 3600 / expected,
      sentence: 'It is 3600 divided by the value: seconds and repeats per hour are mixed up.',
    },
    ...spanSuspects(expected, context),
    ...gainSuspects(expected, context),
    ...sampleSuspects(expected, context),
    ...[10, 100, 1000].flatMap((factor) => [
      {
        typed: expected * factor,
        sentence: `It is ${factor} times too large: is the decimal mark in the right place?`,
      },
      {
        typed: expected / factor,
        sentence: `It is ${factor} times too small: is the decimal mark in the right place?`,
      },
    ]),
  ];
}

function swaps({ others = {} }: MixUpContext): Suspect[] {
  return Object.entries(others).map(([label, value]) => ({
    typed: value,
    sentence: `It is the value of "${label}": are two fields swapped?`,
  }));
}

function spanSuspects(expected: number, { inputSpan, outputSpan }: MixUpContext): Suspect[] {
  if (!inputSpan || !outputSpan) return [];
  const ratio = inputSpan / outputSpan;
  const shown = formatNumber(ratio, { significant: 3 });
  return [
    {
      typed: expected / ratio,
      sentence: `The ratio of the spans (${shown}) is left out: units per unit where % per % belongs.`,
    },
    {
      typed: expected * ratio,
      sentence: `The ratio of the spans (${shown}) is in it: % per % where units per unit belong.`,
    },
  ];
}

function gainSuspects(expected: number, { kp }: MixUpContext): Suspect[] {
  if (!kp) return [];
  return [
    {
      typed: expected / kp,
      sentence:
        'It is the value divided by the proportional gain: the ideal and the parallel form are mixed up.',
    },
    {
      typed: expected * kp,
      sentence: 'It is the value times the proportional gain: the ideal and the parallel form are mixed up.',
    },
    {
      typed: kp / expected,
      sentence:
        'It is the proportional gain divided by the value: an integral time and an integral gain are mixed up.',
    },
  ];
}

function sampleSuspects(expected: number, { sampleTimeS }: MixUpContext): Suspect[] {
  if (!sampleTimeS) return [];
  return [
    {
      typed: expected * sampleTimeS,
      sentence: 'The sample time is in it: a value per sample where one per second belongs.',
    },
    {
      typed: expected / sampleTimeS,
      sentence: 'The sample time is left out: a value per second where one per sample belongs.',
    },
  ];
}
