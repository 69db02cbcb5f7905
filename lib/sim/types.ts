import type { Margins } from '../control/types';

/** Metrics of a unit set-point step from rest, over [0, horizonS]. Definitions in lib/sim/metrics. */
export interface SetpointResponse {
  readonly horizonS: number;
  readonly final: number;
  readonly overshootPct: number;
  readonly peakTimeS: number | null;
  readonly riseTimeS: number | null;
  readonly settlingTimeS: number | null;
  readonly steadyError: number;
  readonly iae: number;
  readonly ise: number;
  readonly itae: number;
  readonly controlPeak: number;
  readonly totalVariation: number;
  readonly t: Float64Array;
  readonly y: Float64Array;
  readonly u: Float64Array;
}

/** Metrics of a unit load step at the plant input (before the dead time), set-point 0. */
export interface LoadResponse {
  readonly horizonS: number;
  readonly peak: number;
  readonly peakTimeS: number | null;
  readonly final: number;
  readonly recoveryTimeS: number | null;
  readonly iae: number;
  readonly t: Float64Array;
  readonly y: Float64Array;
  readonly u: Float64Array;
}

/** How far the two engines agree: largest difference of y over both responses, relative to the peak of |y|. */
export interface EngineAgreement {
  readonly agreement: number;
  readonly engines: readonly string[];
}

/** One loop checked: stability first; everything that has no meaning for an unstable loop is null. */
export interface LoopCheck {
  readonly stable: boolean;
  readonly margins: Margins;
  readonly setpoint: SetpointResponse | null;
  readonly load: LoadResponse | null;
  /** Null when only one engine ran (the live preview). */
  readonly engines: EngineAgreement | null;
  /** Sentences for the reader, e.g. that the horizon could not be made long enough. */
  readonly warnings: readonly string[];
}
