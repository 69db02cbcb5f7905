import type { LoopCheck } from '../sim/types';
import type { RequirementKey, RequirementUnit } from './types';

export interface RequirementItem {
  readonly key: RequirementKey;
  readonly label: string;
  readonly kind: 'max' | 'min';
  readonly unit: RequirementUnit;
  /** The figure of a stable loop that the limit is laid against; null when it is not defined. */
  readonly read: (check: LoopCheck) => number | null;
  /** What the limit asks for, for the reader who does not tune loops. */
  readonly meaning: string;
  /** What a missing figure of a stable loop says about it. */
  readonly missing: string;
}

const absolute = (value: number | undefined): number | null => (value === undefined ? null : Math.abs(value));

/** Every limit that can be stated, in the order in which a worksheet shows them. */
export const REQUIREMENT_ITEMS: readonly RequirementItem[] = [
  {
    key: 'overshootMax',
    label: 'Overshoot',
    kind: 'max',
    unit: 'percent',
    read: (check) => check.setpoint?.overshootPct ?? null,
    meaning: 'How far the measurement may run past its final value after a set-point step.',
    missing: 'the set-point response has no final value',
  },
  {
    key: 'settlingTimeMax',
    label: 'Settling time',
    kind: 'max',
    unit: 'seconds',
    read: (check) => check.setpoint?.settlingTimeS ?? null,
    meaning:
      'How long it may take after a set-point step until the measurement stays within 2 % of its final value.',
    missing: 'it does not settle within the time computed',
  },
  {
    key: 'riseTimeMax',
    label: 'Rise time',
    kind: 'max',
    unit: 'seconds',
    read: (check) => check.setpoint?.riseTimeS ?? null,
    meaning: 'How long the measurement may take from 10 % to 90 % of its final value after a set-point step.',
    missing: 'it does not reach 90 % within the time computed',
  },
  {
    key: 'gainMarginMin',
    label: 'Gain margin',
    kind: 'min',
    unit: 'ratio',
    read: (check) => check.margins.gainMargin,
    meaning: 'By what factor the loop gain must be able to grow before the loop becomes unstable.',
    missing: 'the margin is not defined',
  },
  {
    key: 'phaseMarginMin',
    label: 'Phase margin',
    kind: 'min',
    unit: 'degrees',
    read: (check) => check.margins.phaseMarginDeg,
    meaning: 'How much extra lag the loop must be able to take before it becomes unstable.',
    missing: 'the margin is not defined',
  },
  {
    key: 'msMax',
    label: 'Sensitivity peak',
    kind: 'max',
    unit: 'ratio',
    read: (check) => check.margins.ms,
    meaning:
      'How much the loop may amplify a disturbance at its worst frequency; 1 is none, below 2 is common practice.',
    missing: 'the peak is not defined',
  },
  {
    key: 'delayMarginMin',
    label: 'Delay margin',
    kind: 'min',
    unit: 'seconds',
    read: (check) => check.margins.delayMarginS,
    meaning: 'How much extra dead time the loop must be able to take before it becomes unstable.',
    missing: 'the margin is not defined',
  },
  {
    key: 'loadPeakMax',
    label: 'Load peak',
    kind: 'max',
    unit: 'input-per-output',
    read: (check) => absolute(check.load?.peak),
    meaning: 'How far the measurement may be pushed, up or down, by a load step of one output unit.',
    missing: 'the load response is not defined',
  },
  {
    key: 'loadRecoveryMax',
    label: 'Load recovery',
    kind: 'max',
    unit: 'seconds',
    read: (check) => check.load?.recoveryTimeS ?? null,
    meaning: 'How long the measurement may take to come back after a load step.',
    missing: 'it does not recover within the time computed',
  },
  {
    key: 'controlPeakMax',
    label: 'Control peak',
    kind: 'max',
    unit: 'output-per-input',
    read: (check) => absolute(check.setpoint?.controlPeak),
    meaning: 'How far the output may swing for a set-point step of one unit of the measurement.',
    missing: 'the set-point response is not defined',
  },
];
