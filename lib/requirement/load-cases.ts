import type { LoopCheck } from '../sim/types';
import { judge, roomOf } from './judge';
import type { Requirement, Verdict, VerdictItem } from './types';

export interface LoadCaseCheck {
  readonly name: string;
  readonly check: LoopCheck;
}

export interface LoadCaseVerdict {
  readonly perCase: readonly { readonly name: string; readonly verdict: Verdict }[];
  /** The load case that decides. */
  readonly worst: { readonly name: string; readonly index: number };
  /** Each item as in the load case that leaves it the least room, with that case's name. */
  readonly verdict: Verdict;
}

/**
 * Judges one gain set over all load cases of its axis: the worst decides. An unstable case is the worst; otherwise it
 * is the one with the least relative room in any item, and where no limit is stated the one with the largest
 * sensitivity peak. The first of equals is named.
 *
 * @param requirement any of the limits, finite and ≥ 0
 * @param cases at least one
 * @throws RangeError without a case, or for a limit that is not a finite number ≥ 0
 */
export function judgeLoadCases(requirement: Requirement, cases: readonly LoadCaseCheck[]): LoadCaseVerdict {
  if (cases.length === 0) throw new RangeError('cases must hold at least one load case');
  const perCase = cases.map(({ name, check }) => ({ name, verdict: judge(requirement, check) }));
  const index = indexOfLeast(cases.map(({ check }, at) => rank(check, perCase[at].verdict)));
  const worst = { name: cases[index].name, index };
  // The case that decides comes first, so that it is named where others are as bad.
  const worstFirst = [perCase[index], ...perCase.filter((_, at) => at !== index)];
  const items = worstFirst[0].verdict.items.map((_, at) => worstItem(worstFirst, at));
  const { pass } = perCase[index].verdict;
  return {
    perCase,
    worst,
    verdict: { pass, items, sentence: sentenceOf(cases, worst, perCase[index].verdict) },
  };
}

/** Smaller is worse: unstable, then a figure missing, then the least room. */
function rank(check: LoopCheck, verdict: Verdict): readonly [number, number] {
  if (!check.stable) return [0, 0];
  if (verdict.items.length === 0) return [1, -(check.margins.ms ?? Infinity)];
  return [1, Math.min(...verdict.items.map(roomOf))];
}

function indexOfLeast(ranks: readonly (readonly [number, number])[]): number {
  let least = 0;
  ranks.forEach(([stable, room], index) => {
    const [leastStable, leastRoom] = ranks[least];
    if (stable < leastStable || (stable === leastStable && room < leastRoom)) least = index;
  });
  return least;
}

function worstItem(perCase: LoadCaseVerdict['perCase'], at: number): VerdictItem {
  const named = perCase.map(({ name, verdict }) => ({ ...verdict.items[at], loadCase: name }));
  return named.reduce((worst, item) => (roomOf(item) < roomOf(worst) ? item : worst));
}

function sentenceOf(
  cases: readonly LoadCaseCheck[],
  worst: LoadCaseVerdict['worst'],
  verdict: Verdict,
): string {
  if (cases.length === 1) return verdict.sentence;
  const unstable = cases.filter(({ check }) => !check.stable).map(({ name }) => `"${name}"`);
  if (unstable.length > 0) return `Load case ${unstable.join(', ')}: ${verdict.sentence}`;
  return `Worst of ${cases.length} load cases is "${worst.name}". ${verdict.sentence}`;
}
