import { z } from 'zod';

const KINDS: Readonly<Record<string, string>> = {
  string: 'a text',
  number: 'a number',
  int: 'a whole number',
  boolean: 'true or false',
  array: 'a list',
  object: 'an object with named fields',
  record: 'an object with named fields',
};

const FORMATS: Readonly<Record<string, string>> = {
  uuid: 'Give an id as this service handed it out.',
  email: 'Give an e-mail address.',
  datetime: 'Give date and time as 2026-12-24T18:00:00Z.',
  url: 'Give an address that begins with https:// or http://.',
};

/** What would be right, as a sentence, where a schema has no words of its own. */
export function plainWords(issue: z.core.$ZodRawIssue): string | undefined {
  switch (issue.code) {
    case 'invalid_type':
      return wrongKind(issue.expected, issue.input);
    case 'too_small':
      return tooSmall(issue);
    case 'too_big':
      return tooBig(issue);
    case 'invalid_format':
      return FORMATS[issue.format] ?? 'This is not written as it should be.';
    case 'invalid_value':
      return issue.values.length === 1
        ? `This must be ${String(issue.values[0])}.`
        : `Give one of ${issue.values.map(String).join(', ')}.`;
    case 'unrecognized_keys':
      return `There is no field “${issue.keys[0].slice(0, 60)}” here.`;
    case 'invalid_key':
      return 'A field here has a name that is not known.';
    case 'invalid_union':
      return 'This has none of the shapes that are taken here.';
    default:
      return undefined;
  }
}

function wrongKind(expected: string, input: unknown): string {
  const wanted = KINDS[expected] ?? expected;
  if (input === undefined) return `This is missing; give ${wanted}.`;
  return `Give ${wanted}.`;
}

const COUNTED: Readonly<Record<string, string>> = { string: 'characters', array: 'items', set: 'items' };

type Limit<Issue extends { origin: string; inclusive?: boolean }, Name extends keyof Issue> = Pick<
  Issue,
  'origin' | 'inclusive' | Name
>;

function tooSmall({ origin, minimum, inclusive }: Limit<z.core.$ZodIssueTooSmall, 'minimum'>): string {
  const counted = COUNTED[origin];
  if (counted) return `This needs ${minimum} ${counted} or more.`;
  return inclusive === false ? `This must be above ${minimum}.` : `This must be ${minimum} or more.`;
}

function tooBig({ origin, maximum, inclusive }: Limit<z.core.$ZodIssueTooBig, 'maximum'>): string {
  const counted = COUNTED[origin];
  if (counted) return `This may have ${maximum} ${counted} at most.`;
  return inclusive === false ? `This must be below ${maximum}.` : `This must be ${maximum} or less.`;
}

z.config({ customError: plainWords });
