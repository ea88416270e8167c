import type { Stepper } from "@perigauge/steppers";
import { InvalidInputError } from "../errors.ts";
import { resolveCell } from "../run/resolve-cell.ts";
import type { Cell } from "../score/score.ts";
import { listValues, type Study } from "./study.ts";

/** A part of a grid: cells I, I + N, I + 2N, ... counted from 1. */
export interface Shard {
  readonly index: number;
  readonly of: number;
}

const MOST_CELLS = 1_000_000;

/**
 * The cells of a study, in the order stepper, eccentricity, start, summation, step or tolerance, the last running fastest. Steppers of fixed
 * step take the steps per orbit, the others the tolerances.
 *
 * @throws InvalidInputError where a stepper has no step or tolerance to take, or a cell cannot be run
 */
export function gridCells(study: Study, steppers: readonly Stepper[]): Cell[] {
  const eccentricities = listValues(study.eccentricities);
  const starts = (study.starts ?? ["periapsis"]).map((start) =>
    start === "periapsis" ? 0 : start === "apoapsis" ? 180 : start,
  );
  const summations = study.summations ?? ["plain"];
  const cells: Cell[] = [];
  for (const stepper of steppers) {
    const knobs = knobsOf(study, stepper);
    for (const eccentricity of eccentricities) {
      for (const startAnomalyDeg of starts) {
        for (const summation of summations) {
          for (const knob of knobs) {
            const orbits = study.orbits ?? 10;
            const cell = {
              stepper: stepper.id,
              eccentricity,
              ...knob,
              orbits,
              startAnomalyDeg,
              summation,
            };
            resolveCell(cell, stepper);
            cells.push(cell);
            if (cells.length > MOST_CELLS)
              throw new InvalidInputError(`the grid has more than ${MOST_CELLS} cells`);
          }
        }
      }
    }
  }
  return cells;
}

function knobsOf(study: Study, stepper: Stepper): Pick<Cell, "stepsPerOrbit" | "tolerance">[] {
  if (stepper.knob === "step") {
    if (study.stepsPerOrbit === undefined)
      throw new InvalidInputError(`${stepper.id}: takes steps per orbit, and the grid gives none`);
    return listValues(study.stepsPerOrbit).map((stepsPerOrbit) => ({ stepsPerOrbit }));
  }
  if (study.tolerances === undefined)
    throw new InvalidInputError(`${stepper.id}: takes a tolerance, and the grid gives none`);
  return listValues(study.tolerances).map((tolerance) => ({ tolerance }));
}

/** The cells of one shard; the shards of a grid share no cell and leave none out. */
export function shardOf<T>(cells: readonly T[], { index, of }: Shard): T[] {
  return cells.filter((_, i) => i % of === index - 1);
}
