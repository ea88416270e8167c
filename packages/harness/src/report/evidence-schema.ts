import { z } from "zod";
import type { ChoiceEvidence } from "./evidence.ts";

const text = z.string();
const number = z.number();
/** What is not finite cannot be written as JSON and comes back as null. */
const numberOrNull = number.nullable();
const flag = z.boolean();

const limitErrors = z.record(
  text,
  z.object({
    value: numberOrNull,
    limit: number,
    factor: number,
    orbit: text,
    eccentricity: number,
    startAnomalyDeg: number,
    atOrbit: number,
    withinDays: numberOrNull,
    uncertaintyFactor: number,
    command: text,
  }),
);

const ranked = z.object({
  stepper: text,
  title: text,
  symplectic: flag,
  stepSeconds: numberOrNull,
  stepsPerOrbit: numberOrNull,
  tolerance: numberOrNull,
  evaluationsPerOrbit: number,
  evaluationsTotal: number,
  errors: limitErrors,
  margin: number,
  bindingLimit: text.nullable(),
  band: z.object({ from: number, to: number, cellsRun: number }).nullable(),
  cliff: z
    .object({ stepSeconds: numberOrNull, tolerance: numberOrNull, ratio: number, reason: text })
    .nullable(),
  floor: z.object({ stepSeconds: numberOrNull, tolerance: numberOrNull }).nullable(),
  evidence: z.enum(["run", "extrapolated"]),
  why: text,
});

const choice = z.object({
  format: z.literal("perigauge-choice/1"),
  scenario: z.object({
    title: text,
    orbits: z.array(z.object({ name: text })),
    duration: z.union([z.object({ days: number }), z.object({ orbits: number })], {
      error: "must give days or orbits",
    }),
    limits: z.array(z.object({})),
  }),
  choice: text.nullable(),
  ranking: z.array(ranked),
  current: ranked.extend({ enough: flag, costAgainstChoice: numberOrNull }).nullable(),
  excluded: z.array(
    z.object({
      stepper: text,
      reason: text,
      limit: text.nullable(),
      value: numberOrNull,
      allowed: numberOrNull,
    }),
  ),
  whatWouldHaveToGive: z.array(text),
  explanation: text,
  sensitivity: z.array(
    z.object({
      change: text,
      stepper: text.nullable(),
      stepSeconds: numberOrNull,
      stepsPerOrbit: numberOrNull,
      tolerance: numberOrNull,
      evaluationsPerOrbit: numberOrNull,
    }),
  ),
  handOver: z
    .object({
      days: number,
      orbits: number,
      orbit: text,
      eccentricity: number,
      startAnomalyDeg: number,
      stepSeconds: number,
      halfStepDifferenceKm: number,
      closureKm: number,
    })
    .nullable(),
  bodies: z.object({ massRatio: number, heavierShare: number, lighterShare: number }).nullable(),
  cautions: z.array(text),
  provenance: z.object({
    version: text,
    node: text,
    command: text,
    seed: number,
    digest: text,
    cellsRun: number,
    seconds: z.object({ screening: number, search: number, verification: number, total: number }),
  }),
});

const surveyPoint = z.object({
  stepper: text,
  title: text,
  symplectic: flag,
  eccentricity: number,
  stepsPerOrbit: numberOrNull,
  tolerance: numberOrNull,
  meanStepsPerOrbit: number.optional(),
  evaluationsPerOrbit: number,
  phase: numberOrNull,
  energy: numberOrNull,
  period: numberOrNull,
  ended: z.enum(["completed", "diverged"]),
  command: text,
});

const plane = z.object({
  orbits: number,
  semiMajorAxisKm: number,
  steppers: z.array(text),
  eccentricities: z.array(number),
  stepsPerOrbit: z.array(number),
  cells: z.array(
    z.object({
      stepper: text,
      eccentricity: number,
      stepsPerOrbit: number,
      evaluationsPerOrbit: number,
      phase: numberOrNull,
      ratio: numberOrNull,
      bindingLimit: text.nullable(),
      command: text,
    }),
  ),
});

const place = z.object({ xKm: number, yKm: number });

/** What a stored evidence must hold to be drawn again; fields beyond are let be. */
export const evidenceSchema: z.ZodType<unknown> = z.object({
  choice,
  costPoints: z.array(
    z.object({
      stepper: text,
      title: text,
      symplectic: flag,
      stepsPerOrbit: numberOrNull,
      tolerance: numberOrNull,
      evaluationsPerOrbit: number,
      worstRatio: number,
      bindingLimit: text,
      evidence: z.enum(["run", "extrapolated"]),
    }),
  ),
  survey: z.object({
    orbits: number,
    startAnomalyDeg: number,
    evaluationsPerOrbit: number,
    againstEccentricity: z.array(surveyPoint),
    eccentricity: number,
    againstStep: z.array(surveyPoint),
    plane: plane.optional(),
  }),
  histories: z.array(
    z.object({
      stepper: text,
      title: text,
      symplectic: flag,
      role: z.enum(["choice", "rival", "current"]),
      label: text,
      orbit: text,
      eccentricity: number,
      startAnomalyDeg: number,
      command: text,
      points: z.array(
        z.object({
          orbit: number,
          days: number,
          energyRelative: numberOrNull,
          phaseRad: numberOrNull,
          alongTrackKm: numberOrNull,
        }),
      ),
      periods: z.array(z.object({ orbit: number, periodRelative: number })).optional(),
      oscillation: z
        .object({
          periapsisAtOrbit: numberOrNull,
          points: z.array(z.object({ orbit: number, energyRelative: numberOrNull })),
        })
        .optional(),
    }),
  ),
  track: z.object({
    orbit: text,
    eccentricity: number,
    bodyRadiusKm: numberOrNull,
    exact: z.array(place),
    numerical: z.array(place.extend({ step: number })),
    stepper: text,
  }),
});

/** The evidence as it comes back from its file: a report is drawn from this, the first time too. */
export function asStored(evidence: ChoiceEvidence): ChoiceEvidence {
  return JSON.parse(JSON.stringify(evidence)) as ChoiceEvidence;
}
