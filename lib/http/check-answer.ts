import type { Margins } from '../control/types';
import type { Verdict } from '../requirement';
import type { LoadResponse, LoopCheck, SetpointResponse } from '../sim/types';

/** The names that the public API fixes for the figures of a check. */
function marginsAnswer(m: Margins) {
  return {
    gainMargin: m.gainMargin,
    gainMarginDb: m.gainMarginDb,
    gainMarginLow: m.gainMarginLow,
    phaseCrossover: m.phaseCrossover,
    phaseCrossoverLow: m.phaseCrossoverLow,
    phaseMargin: m.phaseMarginDeg,
    gainCrossover: m.gainCrossover,
    delayMargin: m.delayMarginS,
    delayMarginFrequency: m.delayMarginFrequency,
    ms: m.ms,
    msFrequency: m.msFrequency,
    mt: m.mt,
    mtFrequency: m.mtFrequency,
  };
}

function setpointAnswer(r: SetpointResponse) {
  const { final, steadyError, iae, ise, itae, controlPeak, totalVariation, t, y, u } = r;
  return {
    horizon: r.horizonS,
    final,
    overshoot: r.overshootPct,
    peakTime: r.peakTimeS,
    riseTime: r.riseTimeS,
    settlingTime: r.settlingTimeS,
    steadyError,
    iae,
    ise,
    itae,
    controlPeak,
    totalVariation,
    t,
    y,
    u,
  };
}

function loadAnswer(r: LoadResponse) {
  const { peak, final, iae, t, y, u } = r;
  return {
    horizon: r.horizonS,
    peak,
    peakTime: r.peakTimeS,
    final,
    recoveryTime: r.recoveryTimeS,
    iae,
    t,
    y,
    u,
  };
}

export function verdictAnswer(verdict: Verdict) {
  return {
    pass: verdict.pass,
    sentence: verdict.sentence,
    items: verdict.items.map(({ requirement, limit, value, room, pass, loadCase }) => ({
      requirement,
      limit,
      value,
      room,
      pass,
      ...(loadCase === undefined ? {} : { loadCase }),
    })),
  };
}

export function checkAnswer(check: LoopCheck) {
  return {
    stable: check.stable,
    margins: marginsAnswer(check.margins),
    setpoint: check.setpoint && setpointAnswer(check.setpoint),
    load: check.load && loadAnswer(check.load),
    engines: check.engines,
    warnings: check.warnings,
  };
}
