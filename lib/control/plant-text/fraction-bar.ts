import { sliceOf, TextWriter, type PlainText } from './characters';

const BAR = /^[^\S\n]*(?:[\p{L}]\w{0,7}\s*(?:\(\s*s\s*\))?\s*=)?[^\S\n]*-{2,}[^\S\n]*$/mu;

function copy(writer: TextWriter, part: PlainText): void {
  for (let i = 0; i < part.text.length; i += 1) writer.write(part.text[i], part.places[i]);
}

/** A fraction over three lines, with a bar of dashes between them, on one line: `(above)/(below)`. */
export function withoutFractionBar(source: PlainText): PlainText {
  const bar = BAR.exec(source.text);
  if (!bar) return source;
  const above = sliceOf(source, 0, bar.index);
  const below = sliceOf(source, bar.index + bar[0].length);
  if (above.text.trim() === '' || below.text.trim() === '') return source;
  const writer = new TextWriter();
  writer.write('(', above.places[0]);
  copy(writer, above);
  writer.write(')/(', source.places[bar.index]);
  copy(writer, below);
  writer.write(')', below.places[below.places.length - 1]);
  return writer.finish();
}
