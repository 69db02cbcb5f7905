import { formatNumber, formatQuantity, formatTimeS } from '../units';
import type { LoopCheck } from '../sim/types';
import { REQUIREMENT_ITEMS, type RequirementItem } from './items';
import type { Requirement, RequirementUnit, Verdict, VerdictItem } from './types';

/**
 * A figure counts as within its limit when it exceeds it by no more than this share of the limit (of 1 for the limit
 * 0): the engines compute to about 1e-8, and an overshoot of 1e-9 % is not an overshoot.
 */
const NUMERICAL_TOLERANCE = 1e-6;

/**
 * Lays a checked loop against the limits of a requirement.
 *
 * A maximum holds when value ≤ limit, a minimum when value ≥ limit. room is what is left, in the unit of the limit,
 * relativeRoom the same over |limit|. An infinite margin passes. The load peak and the control peak are judged by size.
 *
 * @param requirement any of the limits, finite and ≥ 0
 * @param check the loop as checked
 * @returns pass = null when no limit is stated and the loop is stable; an unstable loop fails whatever is stated
 * @throws RangeError for a limit that is not a finite number ≥ 0
 */
export function judge(requirement: Requirement, check: LoopCheck): Verdict {
  const items = REQUIREMENT_ITEMS.flatMap((item) => {
    const limit = requirement[item.key];
    return limit === undefined ? [] : [judgeItem(item, limit, check)];
  });
  const pass = !check.stable ? false : items.length === 0 ? null : items.every((item) => item.pass);
  return { pass, items, sentence: check.stable ? summary(items) : unstableSentence(items) };
}

function judgeItem(item: RequirementItem, limit: number, check: LoopCheck): VerdictItem {
  if (!Number.isFinite(limit) || limit < 0) {
    throw new RangeError(`${item.key} must be a finite number of 0 or more, not ${limit}`);
  }
  const about = { requirement: item.key, label: item.label, limit };
  const value = check.stable ? item.read(check) : null;
  if (value === null || Number.isNaN(value)) {
    const reason = check.stable ? item.missing : 'the loop is unstable';
    const sentence = `${item.label}: ${reason}; ${limitText(item, limit)}.`;
    return { ...about, value: null, room: null, relativeRoom: null, pass: false, sentence };
  }
  const room = item.kind === 'max' ? limit - value : value - limit;
  const scale = limit || 1;
  const pass = room >= -NUMERICAL_TOLERANCE * scale;
  return {
    ...about,
    value,
    room,
    relativeRoom: room / scale,
    pass,
    sentence: itemSentence(item, limit, value, room, pass),
  };
}

function itemSentence(
  item: RequirementItem,
  limit: number,
  value: number,
  room: number,
  pass: boolean,
): string {
  const amount = formatLimit(item.unit, Math.abs(room));
  const distance = pass ? `room ${amount}` : item.kind === 'max' ? `over by ${amount}` : `short by ${amount}`;
  return `${item.label} is ${formatLimit(item.unit, value)}, ${limitText(item, limit)}: ${distance}.`;
}

function limitText(item: RequirementItem, limit: number): string {
  return `${item.kind === 'max' ? 'at most' : 'at least'} ${formatLimit(item.unit, limit)} ${item.kind === 'max' ? 'allowed' : 'asked'}`;
}

function summary(items: readonly VerdictItem[]): string {
  if (items.length === 0)
    return 'The loop is stable. No limit is stated, so there is nothing to judge it by.';
  const failed = items.filter((item) => !item.pass);
  const limits = items.length === 1 ? 'The one limit stated' : `All ${items.length} limits`;
  if (failed.length === 0) {
    const tightest = items.reduce((least, item) => (roomOf(item) < roomOf(least) ? item : least));
    return `Meets the requirement. ${limits} held; tightest: ${tightest.sentence}`;
  }
  return `Does not meet the requirement: ${failed.length} of ${items.length} ${items.length === 1 ? 'limit' : 'limits'} missed. ${failed.map((item) => item.sentence).join(' ')}`;
}

function unstableSentence(items: readonly VerdictItem[]): string {
  const consequence = items.length > 0 ? ' No limit can be met.' : '';
  return `The loop is unstable: it would swing ever wider or run away.${consequence}`;
}

/** Least for an item without a value, so that it counts as the tightest. */
export function roomOf(item: VerdictItem): number {
  return item.relativeRoom ?? -Infinity;
}

/** A figure in the unit of its limit; quantities of the axis stand bare, their unit belongs to the axis. */
function formatLimit(unit: RequirementUnit, value: number): string {
  switch (unit) {
    case 'percent':
      return formatQuantity(value, '%', { significant: 3 });
    case 'seconds':
      return formatTimeS(value);
    case 'degrees':
      return formatQuantity(value, '°', { significant: 3 });
    case 'ratio':
    case 'input-per-output':
    case 'output-per-input':
      return formatNumber(value, { significant: 3 });
  }
}
