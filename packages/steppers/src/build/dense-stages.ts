import { parseRow } from "../exact/coefficients.ts";
import type { NestedDenseOutput } from "../methods/method.ts";
import { ProgramBuilder } from "../program/builder.ts";
import type { Program, Value } from "../program/program.ts";
import type { Setting } from "./step-program.ts";

/**
 * The stages that dense output adds to a step. Inputs: old state, new velocity and acceleration, velocity slopes and acceleration slopes of
 * the step's `stages` stages. Outputs: the added stages' velocities, then their accelerations.
 */
export function buildDenseStages(dense: NestedDenseOutput, stages: number, setting: Setting): Program {
  const { dimension: d, force } = setting;
  const b = new ProgramBuilder(d, 4 * d + 2 * d * stages, force);
  const q = b.vector(0);
  const v = b.vector(d);
  const slopesFrom = (first: number): Value[][] =>
    Array.from({ length: stages }, (_, i) => b.vector(first + i * d));
  const velocity = [...slopesFrom(4 * d), b.vector(2 * d)];
  const acceleration = [...slopesFrom(4 * d + stages * d), b.vector(3 * d)];
  const shifted = (base: readonly Value[], row: string, slopes: readonly Value[][]): Value[] =>
    base.map((value, k) => {
      const along = slopes.map((slope) => slope[k]!);
      return b.add(value, b.mul(b.step, b.weightedSum(parseRow(row), along)!));
    });
  for (const row of dense.stages) {
    const position = shifted(q, row, velocity);
    const stageVelocity = shifted(v, row, acceleration);
    velocity.push(stageVelocity);
    acceleration.push(b.acceleration(position));
  }
  return b.finish([...velocity.slice(stages + 1).flat(), ...acceleration.slice(stages + 1).flat()]);
}
