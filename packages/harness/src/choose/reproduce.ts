import type { Cell } from "../score/score.ts";

/** The command that runs a cell again; every number is printed so that it reads back to the same double. */
export function scoreCommand(cell: Cell, horizonOrbits: number | null = null): string {
  const knob =
    cell.tolerance !== undefined
      ? `--tolerance ${cell.tolerance}${cell.maxStep === undefined ? "" : ` --max-step ${cell.maxStep}`}`
      : cell.step !== undefined
        ? `--step ${cell.step}`
        : `--steps-per-orbit ${cell.stepsPerOrbit}`;
  const summation = cell.summation === "plain" ? "" : ` --summation ${cell.summation}`;
  return `perigauge score --stepper ${cell.stepper} --eccentricity ${cell.eccentricity} ${knob} --orbits ${horizonOrbits ?? cell.orbits} --start ${cell.startAnomalyDeg}${summation}`;
}
