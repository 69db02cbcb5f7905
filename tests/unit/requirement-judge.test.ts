/** Expected verdicts are worked out by hand from the stated limits; the figures are those of an invented loop. */
import { describe, expect, it } from 'vitest';
import type { Margins } from '../../lib/control/types';
import { judge, judgeLoadCases, REQUIREMENT_ITEMS, type Requirement } from '../../lib/requirement';
import type { LoadResponse, LoopCheck, SetpointResponse } from '../../lib/sim/types';

const none = new Float64Array(0);
const margins: Margins = {
  gainMargin: 2.69,
  gainMarginDb: 8.6,
  gainMarginLow: 0,
  phaseCrossover: 30,
  phaseCrossoverLow: null,
  phaseMarginDeg: 51.6,
  gainCrossover: 12,
  delayMarginS: 0.075,
  delayMarginFrequency: 12,
  ms: 1.87,
  msFrequency: 20,
  mt: 1.2,
  mtFrequency: 10,
};
const setpoint: SetpointResponse = {
  horizonS: 2,
  final: 1,
  overshootPct: 16.8,
  peakTimeS: 0.1,
  riseTimeS: 0.05,
  settlingTimeS: 0.187,
  steadyError: 0,
  iae: 0.1,
  ise: 0.1,
  itae: 0.1,
  controlPeak: -4,
  totalVariation: 8,
  t: none,
  y: none,
  u: none,
};
const load: LoadResponse = {
  horizonS: 2,
  peak: -0.49,
  peakTimeS: 0.1,
  final: 0,
  recoveryTimeS: 0.4,
  iae: 0.1,
  t: none,
  y: none,
  u: none,
};
const good: LoopCheck = { stable: true, margins, setpoint, load, engines: null, warnings: [] };
const unstable: LoopCheck = {
  ...good,
  stable: false,
  margins: { ...margins, gainMargin: 0.8, phaseMarginDeg: null, delayMarginS: null, ms: null, mt: null },
  setpoint: null,
  load: null,
};

const requirement: Requirement = {
  overshootMax: 20,
  settlingTimeMax: 0.25,
  riseTimeMax: 0.06,
  gainMarginMin: 2.5,
  phaseMarginMin: 45,
  msMax: 1.9,
  delayMarginMin: 0.05,
  loadPeakMax: 0.6,
  loadRecoveryMax: 0.5,
  controlPeakMax: 4,
};

describe('judge', () => {
  it('reads every limit and gives the room left, in the order of the table', () => {
    const verdict = judge(requirement, good);
    expect(verdict.pass).toBe(true);
    expect(verdict.items.map(({ requirement: key }) => key)).toEqual(REQUIREMENT_ITEMS.map(({ key }) => key));
    const rooms = [3.2, 0.063, 0.01, 0.19, 6.6, 0.03, 0.025, 0.11, 0.1, 0];
    verdict.items.forEach((item, index) => expect(item.room).toBeCloseTo(rooms[index], 12));
    expect(verdict.items[0].sentence).toBe('Overshoot is 16.8 %, at most 20 % allowed: room 3.2 %.');
    expect(verdict.items[4].sentence).toBe('Phase margin is 51.6°, at least 45° asked: room 6.6°.');
    expect(verdict.sentence).toMatch(
      /^Meets the requirement\. All 10 limits held; tightest: Control peak is 4/,
    );
  });

  it('judges load peak and control peak by size, whatever their sign', () => {
    const verdict = judge({ loadPeakMax: 0.4, controlPeakMax: 3 }, good);
    expect(verdict.items.map(({ value, pass }) => [value, pass])).toEqual([
      [0.49, false],
      [4, false],
    ]);
  });

  it('names what is missed and by how much', () => {
    const verdict = judge({ ...requirement, msMax: 1.8, gainMarginMin: 3 }, good);
    expect(verdict.pass).toBe(false);
    expect(verdict.sentence).toBe(
      'Does not meet the requirement: 2 of 10 limits missed. Gain margin is 2.69, at least 3 asked: short by 0.31. ' +
        'Sensitivity peak is 1.87, at most 1.8 allowed: over by 0.07.',
    );
  });

  it('lets infinite margins pass and has no verdict without limits', () => {
    const calm = {
      ...good,
      margins: { ...margins, gainMargin: Infinity, phaseMarginDeg: Infinity, delayMarginS: Infinity },
    };
    const verdict = judge({ gainMarginMin: 2, phaseMarginMin: 60, delayMarginMin: 1 }, calm);
    expect(verdict.pass).toBe(true);
    expect(verdict.items.every(({ room }) => room === Infinity)).toBe(true);
    expect(judge({}, good)).toMatchObject({ pass: null, items: [] });
  });

  it('says unstable first and gives no figures then', () => {
    const verdict = judge({ gainMarginMin: 0.5, overshootMax: 20 }, unstable);
    expect(verdict.pass).toBe(false);
    expect(verdict.sentence).toMatch(/^The loop is unstable/);
    for (const item of verdict.items) expect(item).toMatchObject({ value: null, room: null, pass: false });
    expect(judge({}, unstable).pass).toBe(false);
  });

  it('fails a limit whose figure does not exist, and says why', () => {
    const drifting = { ...good, setpoint: { ...setpoint, settlingTimeS: null } };
    const [item] = judge({ settlingTimeMax: 1 }, drifting).items;
    expect(item).toMatchObject({ value: null, pass: false });
    expect(item.sentence).toBe(
      'Settling time: it does not settle within the time computed; at most 1 s allowed.',
    );
  });

  it('allows numerical noise, not more', () => {
    const overshooting = (overshootPct: number) => ({ ...good, setpoint: { ...setpoint, overshootPct } });
    expect(judge({ overshootMax: 0 }, overshooting(1e-9)).pass).toBe(true);
    expect(judge({ overshootMax: 0 }, overshooting(1e-3)).pass).toBe(false);
    expect(judge({ overshootMax: 10 }, overshooting(10.001)).pass).toBe(false);
  });

  it('refuses limits that are no limits', () => {
    expect(() => judge({ msMax: NaN }, good)).toThrow(RangeError);
    expect(() => judge({ overshootMax: -1 }, good)).toThrow(
      'overshootMax must be a finite number of 0 or more',
    );
    expect(() => judge({ msMax: Infinity }, good)).toThrow(RangeError);
  });
});

describe('judgeLoadCases', () => {
  const full = {
    ...good,
    setpoint: { ...setpoint, overshootPct: 19.9 },
    margins: { ...margins, phaseMarginDeg: 60 },
  };

  it('lets the worst load case decide and names it for each item', () => {
    const limits: Requirement = { overshootMax: 20, phaseMarginMin: 45 };
    const verdict = judgeLoadCases(limits, [
      { name: 'empty', check: good },
      { name: 'full', check: full },
    ]);
    expect(verdict.worst).toEqual({ name: 'full', index: 1 });
    expect(verdict.verdict.pass).toBe(true);
    expect(verdict.verdict.items.map(({ loadCase, value }) => [loadCase, value])).toEqual([
      ['full', 19.9],
      ['empty', 51.6],
    ]);
    expect(verdict.perCase.map(({ name }) => name)).toEqual(['empty', 'full']);
    expect(verdict.verdict.sentence).toMatch(/^Worst of 2 load cases is "full"\. Meets the requirement/);
  });

  it('takes an unstable case as the worst', () => {
    const failing = { ...good, setpoint: { ...setpoint, settlingTimeS: null } };
    const verdict = judgeLoadCases({ settlingTimeMax: 1 }, [
      { name: 'warm', check: failing },
      { name: 'cold', check: unstable },
    ]);
    expect(verdict.worst).toEqual({ name: 'cold', index: 1 });
    expect(verdict.verdict.pass).toBe(false);
    expect(verdict.verdict.items[0].loadCase).toBe('cold');
    expect(verdict.verdict.sentence).toMatch(/^Load case "cold": The loop is unstable/);
  });

  it('goes by the sensitivity peak when no limit is stated', () => {
    const nervous = { ...good, margins: { ...margins, ms: 2.4 } };
    const verdict = judgeLoadCases({}, [
      { name: 'a', check: good },
      { name: 'b', check: nervous },
    ]);
    expect(verdict.worst.name).toBe('b');
    expect(verdict.verdict.pass).toBeNull();
    expect(() => judgeLoadCases({}, [])).toThrow(RangeError);
  });
});
