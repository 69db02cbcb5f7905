const REPLACEMENTS: Readonly<Record<string, string>> = {
  '−': '-',
  '–': '-',
  '—': '-',
  '‐': '-',
  '‑': '-',
  '﹣': '-',
  '-': '-',
  '─': '-',
  '·': '*',
  '⋅': '*',
  '×': '*',
  '∙': '*',
  '•': '*',
  '÷': '/',
  '∕': '/',
  '⁄': '/',
  '\u00a0': ' ',
  '\u2007': ' ',
  '\u2009': ' ',
  '\u202f': ' ',
  '\r': ' ',
  µ: 'μ',
  '₀': '0',
  '₁': '1',
  '₂': '2',
  '₃': '3',
  ₙ: 'n',
};

/** Raised characters: powers, and the exponent of a dead time as in e⁻³ˢ. */
const RAISED: Readonly<Record<string, string>> = {
  '⁰': '0',
  '¹': '1',
  '²': '2',
  '³': '3',
  '⁴': '4',
  '⁵': '5',
  '⁶': '6',
  '⁷': '7',
  '⁸': '8',
  '⁹': '9',
  '⁻': '-',
  '⁺': '+',
  ˢ: 's',
};

/** A text in plain characters, and for each of them its place in the text as it was typed. */
export interface PlainText {
  readonly text: string;
  readonly places: readonly number[];
}

/** A text that is put together of pieces which each remember where they were typed. */
export class TextWriter {
  private text = '';
  private readonly places: number[] = [];

  /** Writes characters that all stand for the one typed at `place`. */
  write(characters: string, place: number): void {
    if (this.isRepeatedBlank(characters)) return;
    for (let i = 0; i < characters.length; i += 1) this.places.push(place);
    this.text += characters;
  }

  /** A blank behind another says nothing, and long runs of them would be searched over and over. */
  private isRepeatedBlank(characters: string): boolean {
    const last = this.text.at(-1) ?? '';
    if (characters === ' ' || characters === '\t') return /^\s$/.test(last);
    return characters === '\n' && (last === '\n' || (last === ' ' && this.text.at(-2) === '\n'));
  }

  finish(): PlainText {
    return { text: this.text, places: this.places };
  }
}

/** Unicode minus signs, dots, crosses, lowered and raised characters in plain ones; `**` becomes `^`. */
export function plain(typed: string): PlainText {
  const writer = new TextWriter();
  for (let i = 0; i < typed.length; i += 1) {
    let raised = '';
    while (i + raised.length < typed.length && RAISED[typed[i + raised.length]] !== undefined)
      raised += RAISED[typed[i + raised.length]];
    if (raised !== '') {
      writer.write(`^(${raised})`, i);
      i += raised.length - 1;
    } else if (typed.startsWith('**', i)) {
      writer.write('^', i);
      i += 1;
    } else writer.write(REPLACEMENTS[typed[i]] ?? typed[i], i);
  }
  return writer.finish();
}

/** Place in the typed text of a place in the plain one. */
export function placeOf({ places }: PlainText, at: number): number {
  if (places.length === 0) return 0;
  return at < places.length ? places[Math.max(0, at)] : places[places.length - 1] + 1;
}

/** A part of a text that keeps its places. */
export function sliceOf({ text, places }: PlainText, from: number, to?: number): PlainText {
  return { text: text.slice(from, to), places: places.slice(from, to) };
}
