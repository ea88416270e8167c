/** What is used of the general-purpose library `odex`, which ships sources that this project's compiler settings refuse. */
export declare class Solver {
  constructor(dimension: number);
  absoluteTolerance: number | number[];
  relativeTolerance: number | number[];
  maxSteps: number;
  initialStepSize: number;
  denseOutput: boolean;
  solve(
    derivative: (t: number, y: number[]) => number[],
    start: number,
    y0: number[],
    end: number,
  ): { readonly y: number[]; readonly outcome: number; readonly nStep: number; readonly nEval: number };
}
