import { create, parseDependencies, type MathNode } from 'mathjs/number';
import { ok, refuse } from '../../result';
import { placeOf, type PlainText } from './characters';
import { tokenised } from './expression-tokens';
import { TreeReader, type Node } from './expression-tree';
import { readDecimal } from './numbers';
import { expanded } from './rational';
import type { RawPlant, TextResult } from './types';

// Only the parser: nothing of it can evaluate anything.
const { parse } = create(parseDependencies);

/** Decimal commas as points, where the text has no points; any bracket as a round one. */
function roundAndPointed(source: PlainText): TextResult<PlainText> {
  const text = source.text.replace(/[[{]/g, '(').replace(/[\]}]/g, ')');
  if (text.includes('.')) return ok({ ...source, text });
  for (const { 0: number, index } of text.matchAll(/\d+,\d+/g)) {
    const read = readDecimal(number, placeOf(source, index));
    if (!read.ok) return read;
  }
  return ok({ ...source, text: text.replace(/(\d),(?=\d)/g, '$1.') });
}

function treeOf(tokens: PlainText): TextResult<Node> {
  let tree: MathNode;
  try {
    tree = parse(tokens.text);
  } catch (error) {
    const character =
      typeof error === 'object' && error !== null && 'char' in error ? Number(error.char) : NaN;
    const at = Number.isFinite(character) ? character - 1 : tokens.text.length;
    return refuse(
      'SYNTAX',
      at >= tokens.text.trimEnd().length
        ? 'The expression ends too early: a number, s or a bracket is missing at the end.'
        : `“${tokens.text[at]}” can’t stand here: a number, s or a bracket is missing before it, or an operator.`,
      placeOf(tokens, at),
    );
  }
  return ok(tree as unknown as Node);
}

/** An expression in s, with implied products and one dead time e^(-θ s). */
export function readExpression(source: PlainText): TextResult<RawPlant> {
  const pointed = roundAndPointed(source);
  if (!pointed.ok) return pointed;
  const tokens = tokenised(pointed.value);
  if (!tokens.ok) return tokens;
  const tree = treeOf(tokens.value);
  if (!tree.ok) return tree;
  const reader = new TreeReader(tokens.value.leaves);
  const read = reader.read(tree.value);
  if (!read.ok) return read;
  const { num, den, deadTimeS } = read.value;
  const begin = placeOf(source, Math.max(0, source.text.search(/\S/)));
  const places = { num: begin, den: begin, deadTime: reader.deadTimePlace };
  return ok({
    num: expanded(num),
    den: expanded(den),
    deadTimeS,
    warnings: [...tokens.value.warnings, ...reader.warnings],
    places,
  });
}
