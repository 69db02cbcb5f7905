const REPLACEMENTS: Readonly<Record<string, string>> = {
  '−': '-',
  '–': '-',
  '—': '-',
  '·': '*',
  '⋅': '*',
  '×': '*',
  '∙': '*',
  '÷': '/',
  '∕': '/',
  '⁄': '/',
  '\u00a0': ' ',
  '\u2009': ' ',
  '\u202f': ' ',
  '\r': ' ',
};

const SUPERSCRIPTS = '⁰¹²³⁴⁵⁶⁷⁸⁹';

/** A text in plain characters, and for each of them its place in the text as it was typed. */
export interface PlainText {
  readonly text: string;
  readonly places: readonly number[];
}

function superscriptRun(text: string, from: number): string {
  let digits = text[from] === '⁻' ? '-' : '';
  for (let i = from + digits.length; i < text.length && SUPERSCRIPTS.includes(text[i]); i += 1)
    digits += String(SUPERSCRIPTS.indexOf(text[i]));
  return digits;
}

/** Unicode minus, dots, crosses and raised digits in plain characters. */
export function plain(typed: string): PlainText {
  let text = '';
  const places: number[] = [];
  const write = (written: string, at: number) => {
    for (const character of written) {
      text += character;
      places.push(at);
    }
  };
  for (let i = 0; i < typed.length; i += 1) {
    const raised = typed[i] === '⁻' || SUPERSCRIPTS.includes(typed[i]) ? superscriptRun(typed, i) : '';
    if (raised && raised !== '-') {
      write(`^(${raised})`, i);
      i += raised.length - 1;
    } else write(REPLACEMENTS[typed[i]] ?? typed[i], i);
  }
  return { text, places };
}

/** Place in the typed text of a place in the plain one. */
export function placeOf({ places }: PlainText, at: number): number {
  if (places.length === 0) return 0;
  return at < places.length ? places[Math.max(0, at)] : places[places.length - 1] + 1;
}
