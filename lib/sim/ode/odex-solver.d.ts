/** The part of the package odex 2 that this engine uses: Hairer and Wanner's extrapolation method ODEX. */

/** Interpolates component `index` at x within the step just taken; valid only inside the callback. */
export type DenseOutput = (index: number, x: number) => number;

/** 0 the end was reached, 1 more than maxSteps steps, 2 the callback returned false. */
export type Outcome = 0 | 1 | 2;

export class Solver {
  constructor(dimension: number);
  maxSteps: number;
  initialStepSize: number;
  /** 0 stands for the whole interval. */
  maxStepSize: number;
  maxExtrapolationColumns: number;
  /** How many derivatives of a step are tested for instability. */
  stabilityCheckCount: number;
  denseOutput: boolean;
  denseComponents: number[];
  relativeTolerance: number | number[];
  absoluteTolerance: number | number[];
  solve(
    derivative: (x: number, y: number[]) => number[],
    x: number,
    y0: number[],
    xEnd: number,
    afterStep?: (step: number, from: number, to: number, y: number[], dense?: DenseOutput) => boolean | void,
  ): { y: number[]; outcome: Outcome | undefined; nStep: number; nEval: number; nReject: number };
}
