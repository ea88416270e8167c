import { COLLISION_SHARE } from "../score/run-end.ts";
import type { LaneRun } from "./lane-run.ts";
import type { scoreRows } from "./memory-map.ts";

/** What a lane's rows of scoring hold at the start of a run; the mask of being alive is set apart. */
export function startValues({
  orbit,
  scorer,
  start,
}: LaneRun): Readonly<Record<keyof typeof scoreRows, number>> {
  const energy0 = orbit.energy.hi;
  const momentum0 = orbit.angularMomentum.hi;
  const collision = COLLISION_SHARE * (1 - scorer.eccentricity);
  const [x, y, vx, vy] = start as unknown as readonly [number, number, number, number];
  return {
    step: 0,
    alive: 0,
    lastAlive: 0,
    // On a circular orbit the start itself is the direction that is passed.
    side: scorer.circular ? x * y - y * x : x * vx + y * vy,
    energy0,
    energyScale: 1 / Math.abs(energy0),
    momentum0,
    momentumScale: 1 / Math.abs(momentum0),
    apsisX: orbit.eccentricityX.hi,
    apsisY: orbit.eccentricityY.hi,
    collision2: collision * collision,
    startX: x,
    startY: y,
    phase: 0,
    apsis: 0,
    uncertain: 0,
    inverse: 0,
    momentum: 0,
  };
}
