import { type Candidate, type ChoiceContext, runFull } from "./candidate.ts";
import { pointAt } from "./fleet.ts";
import { type Reading, type Sample, sameSample, worst } from "./measure.ts";

const MOST_ROUNDS = 6;
/** Refining ends when the worst case moves by less than this share. */
const SETTLED = 0.02;
const FIRST_PARAMETER_STEP = 1 / 16;
const FIRST_ANGLE_STEP = 7.5;

/**
 * Looks for a worse case between the samples: neighbours of the worst in eccentricity (or whatever the orbit's ranges free) and in start
 * anomaly, at half the spacing each round, until the worst moves by less than 2 %. What it finds joins the candidate's samples. Returns
 * the readings given and those made.
 */
export async function refineSamples(
  context: ChoiceContext,
  candidate: Candidate,
  fineness: number,
  given: readonly Reading[],
): Promise<Reading[]> {
  const readings = [...given];
  const anyStart = (context.scenario.start ?? "any") === "any";
  let parameterStep = FIRST_PARAMETER_STEP;
  let angleStep = FIRST_ANGLE_STEP;
  for (let round = 0; round < MOST_ROUNDS; round++) {
    const before = worst(readings);
    if (!Number.isFinite(before.ratio)) break;
    const near = neighbours(context, before.sample, parameterStep, anyStart ? angleStep : 0);
    const fresh = near.filter((sample) => !candidate.samples.some((known) => sameSample(known, sample)));
    if (fresh.length === 0) break;
    readings.push(...(await runFull(context, candidate, fresh, fineness)));
    const after = worst(readings);
    if (after !== before) candidate.samples.push(after.sample);
    if (after.ratio <= before.ratio * (1 + SETTLED) && round > 0) break;
    parameterStep /= 2;
    angleStep /= 2;
  }
  return readings;
}

function neighbours(
  { fleet }: ChoiceContext,
  { point, startAnomalyDeg }: Sample,
  parameterStep: number,
  angleStep: number,
): Sample[] {
  const free = fleet.orbits[point.orbitIndex]?.sampler.parameters ?? 0;
  const samples: Sample[] = [];
  for (let axis = 0; axis < free; axis++) {
    for (const sign of [-1, 1]) {
      const parameters: [number, number] = [...point.parameters];
      parameters[axis] = (parameters[axis] as number) + sign * parameterStep;
      if ((parameters[axis] as number) < 0 || (parameters[axis] as number) > 1) continue;
      samples.push({ point: pointAt(fleet, point.orbitIndex, ...parameters), startAnomalyDeg });
    }
  }
  if (angleStep > 0) {
    for (const sign of [-1, 1]) samples.push({ point, startAnomalyDeg: startAnomalyDeg + sign * angleStep });
  }
  return samples;
}
