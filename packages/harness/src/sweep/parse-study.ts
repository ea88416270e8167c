import { InvalidInputError, mustBe } from "../errors.ts";
import { readJson } from "../text/read-json.ts";
import { firstFinding } from "../text/schema-findings.ts";
import type { Study, Values } from "./study.ts";
import { studySchema } from "./study-schema.ts";

/** @throws InvalidInputError where the file cannot be read or is not a study: one line, where and what was expected. */
export async function readStudy(file: string): Promise<Study> {
  return parseStudy(await readJson(file));
}

/** @throws InvalidInputError for the first thing that is wrong. */
export function parseStudy(value: unknown): Study {
  const parsed = studySchema.safeParse(value);
  if (!parsed.success) throw firstFinding("study", parsed.error, value);
  const study = parsed.data;
  for (const field of ["eccentricities", "stepsPerOrbit", "tolerances"] as const) {
    const values = study[field];
    if (values !== undefined) checkRange(`study.${field}`, values);
  }
  if (new Set(study.steppers).size < study.steppers.length)
    throw new InvalidInputError("study.steppers: names a stepper twice");
  return study;
}

function checkRange(where: string, values: Values): void {
  if (!("from" in values)) return;
  if (values.spacing === "log" && !(values.from > 0 && values.to > 0))
    throw mustBe(where, "above 0 at both ends where spacing is log", values.from);
}
