import { ok, refuse } from '../../result';
import {
  constant,
  exponentialOf,
  negative,
  numberOf,
  power,
  product,
  quotient,
  S,
  sum,
  type Rational,
} from './rational';
import type { TextResult } from './types';

/** The parts of a parsed tree that a plant may be made of; everything else is refused. */
export interface Node {
  readonly type: string;
  readonly value?: unknown;
  readonly name?: string;
  readonly fn?: unknown;
  readonly op?: string;
  readonly implicit?: boolean;
  readonly args?: readonly Node[];
  readonly content?: Node;
}

/** More operators under one another than anyone writes. */
const DEEPEST_TREE = 500;

function functionName({ fn }: Node): string {
  return typeof fn === 'object' && fn !== null && 'name' in fn ? String(fn.name) : String(fn);
}

function isImpliedProduct({ op, implicit }: Node): boolean {
  return op === '*' && implicit === true;
}

function isExponential(node: Node): boolean {
  if (node.type === 'FunctionNode') return true;
  const base = node.op === '^' ? node.args?.[0] : undefined;
  return base !== undefined && (isExponential(base) || (base.type === 'SymbolNode' && base.name === 'e'));
}

/** Whether an exponential stands anywhere in a term. */
function holdsExponential(node: Node): boolean {
  if (isExponential(node)) return true;
  return [...(node.args ?? []), ...(node.content ? [node.content] : [])].some(holdsExponential);
}

/** The factors of an implied product such as (10s+1)(5s+1)s. */
function impliedFactors(node: Node): Node[] {
  const factors: Node[] = [];
  let rest = node;
  for (; isImpliedProduct(rest) && rest.args; rest = rest.args[0]) factors.unshift(rest.args[1]);
  return [rest, ...factors];
}

function notRational(): TextResult<never> {
  return refuse(
    'NOT_RATIONAL',
    'This is not a ratio of polynomials in s. Use numbers, s, + − · / ^, brackets and e^(-θ s).',
  );
}

/** A refusal at the place of what it is about. */
function placed(result: TextResult<Rational>, at: number): TextResult<Rational> {
  return result.ok || result.at !== undefined ? result : { ...result, at };
}

/** Works out the tree of an expression by the rules of fractions; nothing of it is evaluated by the parser's library. */
export class TreeReader {
  private readonly notes = new Set<string>();
  /** How many numbers and symbols have been read: the tree is walked in the order of the text. */
  private leaf = 0;
  private exponentialPlace: number | undefined;

  /** @param leaves places of the numbers and symbols in their order */
  constructor(private readonly leaves: readonly number[]) {}

  /** Where the last exponential begins. */
  get deadTimePlace(): number | undefined {
    return this.exponentialPlace;
  }

  /** Sentences for what a reader could take the other way. */
  get warnings(): string[] {
    return [...this.notes];
  }

  read(node: Node | undefined, depth = 0): TextResult<Rational> {
    if (depth > DEEPEST_TREE)
      return refuse(
        'SYNTAX',
        `More than ${DEEPEST_TREE} operators follow each other. Multiply some of them out.`,
      );
    switch (node?.type) {
      case 'ConstantNode':
        this.leaf += 1;
        return typeof node.value === 'number' && Number.isFinite(node.value)
          ? ok(constant(node.value))
          : refuse(
              'NOT_FINITE',
              'This number is too large to compute with. Use another unit.',
              this.leaves[this.leaf - 1],
            );
      case 'SymbolNode':
        this.leaf += 1;
        if (node.name === 's') return ok(S);
        return node.name === 'pi' ? ok(constant(Math.PI)) : notRational();
      case 'ParenthesisNode':
        return this.read(node.content, depth + 1);
      case 'FunctionNode':
        return functionName(node) === 'exp' && node.args?.length === 1
          ? this.exponential(node.args[0], depth, this.leaves[this.leaf])
          : notRational();
      case 'OperatorNode':
        return this.operator(node, depth);
      default:
        return notRational();
    }
  }

  private exponential(exponent: Node, depth: number, place: number): TextResult<Rational> {
    this.exponentialPlace = place;
    const read = this.read(exponent, depth + 1);
    return read.ok ? placed(exponentialOf(read.value), place) : read;
  }

  private operator(node: Node, depth: number): TextResult<Rational> {
    const [first, second] = node.args ?? [];
    if (node.op === '^' && first?.type === 'SymbolNode' && first.name === 'e') {
      const place = this.leaves[this.leaf];
      this.leaf += 1;
      return this.exponential(second, depth, place);
    }
    const a = this.read(first, depth + 1);
    if (!a.ok) return a;
    if (second === undefined) {
      if (node.op === '-') return ok(negative(a.value));
      return node.op === '+' ? a : notRational();
    }
    const place = this.leaves[this.leaf];
    const b = this.read(second, depth + 1);
    return b.ok ? placed(this.combined(a.value, b.value, node, second), place) : b;
  }

  private combined(a: Rational, b: Rational, node: Node, second: Node): TextResult<Rational> {
    switch (node.op) {
      case '+':
        return sum(a, b);
      case '-':
        return sum(a, negative(b));
      case '*':
        this.noteFraction(node);
        return product(a, b);
      case '/':
        return this.fraction(a, b, second);
      case '^':
        return this.power(a, b);
      default:
        return notRational();
    }
  }

  private power(base: Rational, exponent: Rational): TextResult<Rational> {
    const number = numberOf(exponent);
    return number === null
      ? refuse(
          'NOT_RATIONAL',
          'A power must be a whole number; s can’t stand in an exponent, but for e^(-θ s).',
        )
      : power(base, number);
  }

  /**
   * An implied product below a stroke is all of it the denominator, but for a dead time at its end: in
   * 2/(10s+1) e^(-3s) that can only belong to the whole fraction. One in the denominator's own brackets stays there.
   */
  private fraction(a: Rational, b: Rational, below: Node): TextResult<Rational> {
    if (!isImpliedProduct(below)) return quotient(a, b);
    const factors = impliedFactors(below);
    const last = factors.findLastIndex((factor) => !isExponential(factor));
    const denominator = last < 0 ? factors : factors.slice(0, last + 1);
    if (denominator.length > 1)
      this.notes.add(
        'Factors that follow each other behind “/” without a sign are all read as the denominator. Put “·” before what is not.',
      );
    return quotient(a, denominator.some(holdsExponential) ? b : { ...b, deadTimeS: -b.deadTimeS });
  }

  /** 1/2 s is half of s. */
  private noteFraction(node: Node): void {
    const fraction = isImpliedProduct(node) ? impliedFactors(node)[0] : undefined;
    const below = fraction?.op === '/' ? fraction.args?.[1] : undefined;
    if (below?.type !== 'ConstantNode' || impliedFactors(node).slice(1).every(isExponential)) return;
    this.notes.add(
      `The fraction before “/${String(below.value)}” and that number are read as one factor of what follows. Put brackets around the denominator if more belongs to it.`,
    );
  }
}
