import { create, parseDependencies, type MathNode } from 'mathjs/number';
import { ok, refuse } from '../../result';
import { placeOf, type PlainText } from './characters';
import {
  constant,
  exponentialOf,
  isConstant,
  negative,
  power,
  product,
  quotient,
  S,
  sum,
  type Rational,
} from './rational';
import type { RawPlant, TextResult } from './types';

// Only the parser: nothing of it can evaluate anything.
const { parse } = create(parseDependencies);

const DEEPEST = 60;

/** The parts of a parsed tree that a plant may be made of; everything else is refused. */
interface Node {
  readonly type: string;
  readonly value?: unknown;
  readonly name?: string;
  readonly fn?: unknown;
  readonly op?: string;
  readonly args?: readonly Node[];
  readonly content?: Node;
}

function nameOf({ fn }: Node): string {
  if (typeof fn === 'string') return fn;
  return typeof fn === 'object' && fn !== null && 'name' in fn ? String(fn.name) : '';
}

class Reader {
  constructor(private readonly source: PlainText) {}

  read(node: Node): TextResult<Rational> {
    switch (node.type) {
      case 'ConstantNode':
        return typeof node.value === 'number' && Number.isFinite(node.value)
          ? ok(constant(node.value))
          : refuse('NOT_FINITE', `${String(node.value)} is not a finite number.`);
      case 'SymbolNode':
        return this.symbol(node.name ?? '');
      case 'ParenthesisNode':
        return this.read(node.content as Node);
      case 'OperatorNode':
        return this.operator(node);
      case 'FunctionNode':
        return this.call(node);
      default:
        return refuse(
          'NOT_RATIONAL',
          'This is not a ratio of polynomials in s. Use numbers, s, + − · / ^, brackets and e^(-θ s).',
        );
    }
  }

  private symbol(name: string): TextResult<Rational> {
    if (name === 's') return ok(S);
    if (name === 'pi' || name === 'π') return ok(constant(Math.PI));
    const at = this.source.text.search(
      new RegExp(`(^|[^\\p{L}_])${escapeForSearch(name)}(?![\\p{L}\\d_])`, 'u'),
    );
    const place = at < 0 ? undefined : placeOf(this.source, this.source.text.indexOf(name, at));
    const hint =
      name === 'e' ? ' Write a dead time as e^(-3 s).' : ' Numbers and s alone may stand in an expression.';
    return refuse('UNKNOWN_SYMBOL', `“${name.slice(0, 30)}” is not known here.${hint}`, place);
  }

  private operator(node: Node): TextResult<Rational> {
    const [first, second] = node.args ?? [];
    if (node.op === '^' && first?.type === 'SymbolNode' && first.name === 'e') {
      const exponent = this.read(second);
      return exponent.ok ? exponentialOf(exponent.value) : exponent;
    }
    const a = this.read(first);
    if (!a.ok) return a;
    if (second === undefined) {
      if (node.op === '-') return ok(negative(a.value));
      return node.op === '+' ? a : notRational(node.op);
    }
    const b = this.read(second);
    if (!b.ok) return b;
    switch (node.op) {
      case '+':
        return sum(a.value, b.value);
      case '-':
        return sum(a.value, negative(b.value));
      case '*':
        return product(a.value, b.value);
      case '/':
        return quotient(a.value, b.value);
      case '^':
        return isConstant(b.value)
          ? power(a.value, b.value.num[0] / b.value.den[0])
          : refuse(
              'NOT_RATIONAL',
              'A power must be a whole number; s can’t stand in an exponent, but for e^(-θ s).',
            );
      default:
        return notRational(node.op);
    }
  }

  private call(node: Node): TextResult<Rational> {
    const name = nameOf(node);
    const args = node.args ?? [];
    // A bracket right after s or a number is a product, whatever the parser makes of it: s(s+1).
    if ((name === 's' || name === 'pi') && args.length === 1) {
      const factor = this.read(args[0]);
      const symbol = this.symbol(name);
      if (!factor.ok) return factor;
      return symbol.ok ? product(symbol.value, factor.value) : symbol;
    }
    if (name !== 'exp' || args.length !== 1) return this.symbol(name);
    const exponent = this.read(args[0]);
    return exponent.ok ? exponentialOf(exponent.value) : exponent;
  }
}

function notRational(op: string | undefined): TextResult<Rational> {
  return refuse('NOT_RATIONAL', `“${op ?? ''}” can’t stand in a plant. Use + − · / ^ and brackets.`);
}

function escapeForSearch(name: string): string {
  return name.replace(/[.*+?^${}()|[\]\\]/g, '\\$&');
}

/** The first bracket without a partner; nesting deeper than anyone writes counts as one. */
function bracketProblem(source: PlainText): TextResult<null> {
  const open: number[] = [];
  for (let i = 0; i < source.text.length; i += 1) {
    if (source.text[i] === '(') open.push(i);
    if (open.length > DEEPEST)
      return refuse('SYNTAX', `Brackets are nested more than ${DEEPEST} deep.`, placeOf(source, i));
    if (source.text[i] === ')' && open.pop() === undefined)
      return refuse(
        'UNBALANCED_BRACKET',
        'A bracket is closed here that was never opened.',
        placeOf(source, i),
      );
  }
  const last = open.pop();
  return last === undefined
    ? ok(null)
    : refuse('UNBALANCED_BRACKET', 'This bracket is opened but never closed.', placeOf(source, last));
}

/** Sentences for what a reader could take the other way. */
function readingWarnings(text: string): string[] {
  const warnings: string[] = [];
  const fraction = /(\d[\d.]*)\s*\/\s*(\d[\d.]*)\s*(?:\*\s*)?(?=[s(])/.exec(text);
  if (fraction && !text.includes('*' + fraction[0]))
    warnings.push(
      `${fraction[1]}/${fraction[2]} is read as one number before what follows it; bracket the denominator if it is not.`,
    );
  if (/\/\s*\([^()]*\)\s*\(/.test(text))
    warnings.push('Brackets that follow each other after “/” are all read as the denominator.');
  return warnings;
}

/** Anything but these can't stand in a plant, and would be a string, a list or an assignment to the parser. */
const STRANGE = /[^\p{L}\d\s.+\-*/^()_]/u;

/** An expression in s, with implied products and one dead time e^(-θ s). */
export function readExpression(source: PlainText): TextResult<RawPlant> {
  const decimal = /\d,\d/.test(source.text) && !source.text.includes('.');
  const text = (decimal ? source.text.replace(/(\d),(?=\d)/g, '$1.') : source.text).replace(/\n/g, ' ');
  const strange = STRANGE.exec(text);
  if (strange)
    return refuse(
      'SYNTAX',
      `“${strange[0]}” can’t stand in an expression in s.`,
      placeOf(source, strange.index),
    );
  const balanced = bracketProblem(source);
  if (!balanced.ok) return balanced;
  let tree: MathNode;
  try {
    tree = parse(text);
  } catch (error) {
    const at =
      typeof error === 'object' && error !== null && 'char' in error ? Number(error.char) - 1 : text.length;
    return refuse(
      'SYNTAX',
      'The expression can’t be read from here on: something is missing or left over.',
      placeOf(source, at),
    );
  }
  const read = new Reader(source).read(tree as unknown as Node);
  return read.ok ? ok({ ...read.value, warnings: readingWarnings(text) }) : read;
}
