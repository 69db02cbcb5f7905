/** The limits that a loop must meet. Every one is optional; a missing limit is not judged. */
export interface Requirement {
  /** Largest overshoot of a set-point step, % of the final value. */
  readonly overshootMax?: number;
  /** Longest time to stay within 2 % of the final value after a set-point step, s. */
  readonly settlingTimeMax?: number;
  /** Longest rise from 10 % to 90 % of the final value, s. */
  readonly riseTimeMax?: number;
  /** Least gain margin as a ratio (2 is 6.02 dB). */
  readonly gainMarginMin?: number;
  /** Least phase margin, degrees. */
  readonly phaseMarginMin?: number;
  /** Largest peak of the sensitivity. */
  readonly msMax?: number;
  /** Least delay margin, s. */
  readonly delayMarginMin?: number;
  /** Largest deviation |y| after a unit load step, in the input unit per output unit. */
  readonly loadPeakMax?: number;
  /** Longest recovery from a unit load step, s. */
  readonly loadRecoveryMax?: number;
  /** Largest |u| after a unit set-point step, in the output unit per input unit. */
  readonly controlPeakMax?: number;
}

export type RequirementKey = keyof Requirement;

/** What a limit is measured in: %, s, a ratio without unit, degrees, input per output unit, output per input unit. */
export type RequirementUnit =
  'percent' | 'seconds' | 'ratio' | 'degrees' | 'input-per-output' | 'output-per-input';

export interface VerdictItem {
  readonly requirement: RequirementKey;
  readonly label: string;
  readonly limit: number;
  /** Null when the loop is unstable or the figure is not defined (it never settles, say). */
  readonly value: number | null;
  /** What is left to the limit, in the unit of the limit; negative when it is exceeded. */
  readonly room: number | null;
  /** room/|limit|. */
  readonly relativeRoom: number | null;
  readonly pass: boolean;
  /** E.g. 'Overshoot is 16.8 %, at most 20 % allowed: room 3.2 %.' */
  readonly sentence: string;
  /** With several load cases: the one that decides this item. */
  readonly loadCase?: string;
}

export interface Verdict {
  /** Null when no limit is stated; an unstable loop never passes. */
  readonly pass: boolean | null;
  readonly items: readonly VerdictItem[];
  readonly sentence: string;
}
