import type { LoopEquations } from './loop-equations';
import { Solver, type DenseOutput } from './odex-solver';
import { NODE_FRACTIONS, Solution } from './pieces';

export interface StepperSettings {
  /** End of the response in the dimensionless time. */
  readonly end: number;
  /** Longest step; 0 for no bound. */
  readonly longestStep: number;
  /** Error of one step, in units of the signal scale. */
  readonly tolerance: number;
  /** Most work, in evaluations of the equations. */
  readonly budget: number;
}

/** One run of the solver: what the plant gets, what counts as controller output, and where the run may have to stop. */
export interface Run {
  readonly end: number;
  readonly inputAt: (x: number) => number;
  readonly output: () => number;
  /** The moment within a step at which the equations change, or its end; `resolveAt` solves the loop within the step. */
  readonly stopWithin?: (from: number, to: number, resolveAt: (x: number) => ArrayLike<number>) => number;
}

/** A response above this times the signal scale has left every useful range; an unstable loop gets there. */
const DIVERGED_ABOVE = 1e12;

/** Copying a step costs about as much as this many evaluations. */
const STEP_WORK = 20;

/** Relative length of a run below which it is passed over. */
const ROUNDING = 4e-15;

const LAST_NODE = NODE_FRACTIONS.length - 1;

/** Drives the solver run by run and copies every step of it into the solution. */
export class Stepper {
  readonly solution = new Solution();
  state: number[];
  x = 0;
  private work = 0;
  private readonly solver: Solver;
  private readonly standstill: number[];
  private readonly nodeState: number[];
  private readonly yNodes = new Float64Array(NODE_FRACTIONS.length);
  private readonly outputNodes = new Float64Array(NODE_FRACTIONS.length);

  constructor(
    private readonly equations: LoopEquations,
    private readonly settings: StepperSettings,
  ) {
    this.state = new Array<number>(equations.dimension).fill(0);
    this.nodeState = this.state.slice();
    this.standstill = this.state.slice();
    this.solver = new Solver(equations.dimension);
    this.solver.relativeTolerance = settings.tolerance;
    this.solver.absoluteTolerance = settings.tolerance;
    this.solver.maxStepSize = settings.longestStep;
    this.solver.maxSteps = settings.budget;
    this.solver.initialStepSize = settings.end * 1e-5;
    // Its test compares two derivatives only and takes the noise of a loop at rest for instability.
    this.solver.stabilityCheckCount = 0;
    this.solver.denseOutput = true;
    // Where a run can stop within a step, the whole state is needed there.
    this.solver.denseComponents = equations.limited ? this.state.map((_, index) => index) : equations.visible;
  }

  get overBudget(): boolean {
    return this.work > this.settings.budget;
  }

  get diverged(): boolean {
    return !(this.solution.peak < DIVERGED_ABOVE);
  }

  /** Integrates from where the last run ended to `run.end`, or to the moment at which the run has to stop. */
  advance(run: Run): void {
    // The solver takes a run shorter than the rounding of its time for done.
    if (run.end - this.x <= ROUNDING * run.end) {
      this.x = run.end;
      return;
    }
    this.solver.solve(
      (x, state) => {
        this.work += 1;
        // Beyond the budget the solver is led to its next accepted step, where the run ends.
        return this.overBudget ? this.standstill : this.equations.derivative(state, run.inputAt(x));
      },
      this.x,
      this.state,
      run.end,
      (_, from, to, state, dense) => {
        // Before the first step there is nothing to keep; a step of no length would go on for ever.
        if (!dense) return true;
        return to > from && this.keepStep(run, from, to, state, dense);
      },
    );
  }

  private keepStep(run: Run, from: number, to: number, state: number[], dense: DenseOutput): boolean {
    const { equations, solution } = this;
    this.work += STEP_WORK;
    const resolveAt = (x: number): number[] => {
      for (const index of equations.visible) this.nodeState[index] = dense(index, x);
      equations.resolve(this.nodeState, run.inputAt(x));
      return this.nodeState;
    };
    const reached = run.stopWithin ? run.stopWithin(from, to, resolveAt) : to;
    const reachedState = reached < to ? state.map((_, index) => dense(index, reached)) : state;
    for (let j = 0; j <= LAST_NODE; j += 1) {
      if (j === 0) equations.resolve(this.state, run.inputAt(from));
      else if (j === LAST_NODE) equations.resolve(reachedState, run.inputAt(reached));
      else resolveAt(from + NODE_FRACTIONS[j] * (reached - from));
      this.yNodes[j] = equations.y;
      this.outputNodes[j] = run.output();
    }
    solution.append(from, reached, this.yNodes, this.outputNodes);
    this.state = reachedState;
    this.x = reached;
    // The last step of a run is cut short; the next run starts with the size of the one before.
    if (to < run.end) this.solver.initialStepSize = to - from;
    return reached === to && !this.overBudget && !this.diverged;
  }
}
