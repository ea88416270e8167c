import { dormandNystrom12 } from "../methods/nystrom/dormand-nystrom-12.ts";
import type { ProgramBuilder } from "../program/builder.ts";
import type { Value } from "../program/program.ts";
import { writeNystromStep } from "./nystrom.ts";

/** Velocity and acceleration at a point of the past. */
export interface PastPoint {
  readonly velocity: readonly Value[];
  readonly acceleration: readonly Value[];
}

/**
 * Start-up of a multistep method: the present point and those at -h, -2h, ..., found by going back with a Nystrom method of order 12 and
 * the same step, which is more accurate than what it starts. The first step is then a step like any other. `b` must be backward.
 */
export function writePast(b: ProgramBuilder, points: number): PastPoint[] {
  let q = b.vector(0);
  let v = b.vector(b.dimension);
  let acceleration = b.acceleration(q);
  const past: PastPoint[] = [{ velocity: v, acceleration }];
  while (past.length < points) {
    const next = writeNystromStep(b, dormandNystrom12, q, v, acceleration);
    q = next.position;
    v = next.velocity;
    acceleration = b.acceleration(q);
    past.push({ velocity: v, acceleration });
  }
  return past;
}
