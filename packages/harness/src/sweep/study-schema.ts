import { z } from "zod";
import type { Study } from "./study.ts";

const finite = z.number();
const positive = finite.positive();

const values = (value: z.ZodType<number>) =>
  z.union(
    [
      z.array(value).min(1),
      z.strictObject({
        from: value,
        to: value,
        count: z.int().min(2).max(100_000),
        spacing: z.enum(["linear", "log"]).optional(),
      }),
    ],
    { error: "must be a list of numbers or { from, to, count, spacing }, each number within its bounds" },
  );

/** The study file as written; what ties fields together is checked in `parse-study.ts`. */
export const studySchema: z.ZodType<Study> = z.strictObject({
  format: z.literal("perigauge-study/1"),
  title: z.string().min(1).max(200).optional(),
  steppers: z.array(z.string()).min(1),
  eccentricities: values(finite.min(0).lt(1)),
  stepsPerOrbit: values(positive).optional(),
  tolerances: values(positive.lt(1)).optional(),
  orbits: positive.optional(),
  starts: z
    .array(
      z.union([z.enum(["periapsis", "apoapsis"]), finite], {
        error: 'must be "periapsis", "apoapsis" or a true anomaly in degrees',
      }),
    )
    .min(1)
    .optional(),
  summations: z
    .array(z.enum(["plain", "compensated"]))
    .min(1)
    .optional(),
});

/** JSON Schema (draft 2020-12) of the study file, as published in `schemas/study.schema.json`. */
export function studyJsonSchema(): object {
  return { title: "perigauge study, format 1", ...z.toJSONSchema(studySchema, { io: "input" }) };
}
