import { ok, refuse } from '../../result';
import { placeOf, sliceOf, type PlainText } from './characters';
import type { TextResult } from './types';

/** A part of a text behind its label, without the punctuation that ends it. */
export interface Section<Kind extends string> {
  readonly kind: Kind;
  readonly label: string;
  readonly labelPlace: number;
  readonly part: PlainText;
}

/**
 * Cuts a text at its labels: `num: 2; den: 10 1`. Each label may stand once and nothing may stand before the first.
 *
 * @param label a global expression whose first group is the label's word
 * @param kindOf what a word stands for; undefined for a word that is none of these labels
 * @returns the sections in their order; a text without a label has none
 */
export function sectionsOf<Kind extends string>(
  source: PlainText,
  label: RegExp,
  kindOf: (word: string) => Kind | undefined,
  known: string,
): TextResult<Section<Kind>[]> {
  const labels = [...source.text.matchAll(label)];
  const sections: Section<Kind>[] = [];
  const lead = source.text.slice(0, labels[0]?.index).search(/\S/);
  if (lead >= 0)
    return refuse('SYNTAX', `This stands before the first label. Use ${known}.`, placeOf(source, lead));
  for (const [number, match] of labels.entries()) {
    const kind = kindOf(match[1]);
    const labelPlace = placeOf(source, match.index);
    const word = match[1].slice(0, 30);
    if (kind === undefined)
      return refuse('UNKNOWN_SYMBOL', `“${word}” is not known here. Use ${known}.`, labelPlace);
    if (sections.some((section) => section.kind === kind))
      return refuse('AMBIGUOUS', `“${word}” is stated twice. State it once.`, labelPlace);
    const from = match.index + match[0].length;
    const body = source.text.slice(from, labels[number + 1]?.index);
    const part = sliceOf(source, from, from + body.replace(/[,;\s]+$/, '').length);
    sections.push({ kind, label: match[1], labelPlace, part });
  }
  return ok(sections);
}

export function sectionFor<Kind extends string>(
  sections: readonly Section<Kind>[],
  kind: Kind,
): Section<Kind> | undefined {
  return sections.find((section) => section.kind === kind);
}
