import { z } from "zod";
import { LIMIT_KEYS } from "../choose/choice.ts";
import type { Scenario } from "./scenario.ts";

const finite = z.number();
const positive = finite.positive();

const range = (value: z.ZodType<number>) =>
  z.union([value, z.strictObject({ from: value, to: value })], { error: "must be a number or { from, to }" });

const eccentricity = finite.min(0).lt(1);

const orbit = z.strictObject({
  name: z.string().min(1).max(60),
  count: z.int().positive().optional(),
  semiMajorAxisKm: range(positive).optional(),
  eccentricity: range(eccentricity).optional(),
  periapsisRadiusKm: range(positive).optional(),
  apoapsisRadiusKm: range(positive).optional(),
  periapsisAltitudeKm: range(finite).optional(),
  apoapsisAltitudeKm: range(finite).optional(),
});

const limit = z.strictObject({
  ...(Object.fromEntries(LIMIT_KEYS.map((key) => [key, positive.optional()])) as Record<
    (typeof LIMIT_KEYS)[number],
    z.ZodOptional<typeof positive>
  >),
  withinDays: positive.optional(),
});

const duration = z.union([z.strictObject({ days: positive }), z.strictObject({ orbits: positive })], {
  error: 'must be { "days": number } or { "orbits": number }',
});

/** The scenario file as written; what ties fields together is checked in `parse-scenario.ts`. */
export const scenarioSchema: z.ZodType<Scenario> = z.strictObject({
  format: z.literal("perigauge-scenario/1"),
  title: z.string().min(1).max(200),
  gravitationalParameterKm3S2: positive,
  bodyRadiusKm: positive.optional(),
  orbits: z.array(orbit).min(1),
  start: z
    .union([z.enum(["any", "periapsis", "apoapsis"]), finite], {
      error: 'must be "any", "periapsis", "apoapsis" or a true anomaly in degrees',
    })
    .optional(),
  duration,
  limits: z.array(limit).min(1),
  integrationShare: positive.max(1).optional(),
  massRatio: positive.max(1).optional(),
  restartsPerDay: finite.min(0).optional(),
  designFactor: finite.min(1).optional(),
  step: z
    .strictObject({ maxSeconds: positive.optional(), multipleOfSeconds: positive.optional() })
    .optional(),
  require: z
    .strictObject({
      fixedStep: z.boolean().optional(),
      symplectic: z.boolean().optional(),
      timeReversible: z.boolean().optional(),
      explicit: z.boolean().optional(),
      selfStarting: z.boolean().optional(),
      denseOutput: z.boolean().optional(),
      evaluationsPerOrbit: positive.optional(),
    })
    .optional(),
  current: z
    .strictObject({
      stepper: z.string(),
      stepSeconds: positive.optional(),
      tolerance: positive.lt(1).optional(),
    })
    .optional(),
  evaluationMicroseconds: positive.optional(),
  steppers: z.array(z.string()).min(1).optional(),
});

/** JSON Schema (draft 2020-12) of the scenario file, as published in `schemas/scenario.schema.json`. */
export function scenarioJsonSchema(): object {
  return { title: "perigauge scenario, format 1", ...z.toJSONSchema(scenarioSchema, { io: "input" }) };
}
