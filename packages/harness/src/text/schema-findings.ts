import type { z } from "zod";
import { describeValue, InvalidInputError } from "../errors.ts";

/** The first thing a schema finds wrong with a value, in one line that begins with the name of the whole. */
export function firstFinding(name: string, error: z.ZodError, value: unknown): InvalidInputError {
  return new InvalidInputError(describeFinding(name, error.issues[0] as z.core.$ZodIssue, value));
}

function describeFinding(name: string, issue: z.core.$ZodIssue, root: unknown): string {
  const where = issue.path.reduce<string>(
    (path, key) => (typeof key === "number" ? `${path}[${key}]` : `${path}.${String(key)}`),
    name,
  );
  const value = issue.path.reduce<unknown>(
    (inner, key) => (inner as Record<PropertyKey, unknown> | undefined)?.[key as PropertyKey],
    root,
  );
  if (issue.code === "unrecognized_keys")
    return `${where}: unknown field ${issue.keys.map(describeValue).join(", ")}`;
  if (value === undefined) return `${where}: is missing (${expectation(issue)})`;
  return `${where}: ${expectation(issue)}, got ${describeValue(value)}`;
}

function expectation(issue: z.core.$ZodIssue): string {
  switch (issue.code) {
    case "invalid_type":
      return `must be ${article(issue.expected)}`;
    case "invalid_value":
      return `must be ${issue.values.map(describeValue).join(" or ")}`;
    case "too_small":
      return issue.origin === "array" || issue.origin === "string"
        ? "must not be empty"
        : `must be ${issue.inclusive ? "at least" : "greater than"} ${issue.minimum}`;
    case "too_big":
      return issue.origin === "array" || issue.origin === "string"
        ? `must be at most ${issue.maximum} long`
        : `must be ${issue.inclusive ? "at most" : "less than"} ${issue.maximum}`;
    default:
      return issue.message;
  }
}

function article(kind: string): string {
  if (kind === "int") return "a whole number";
  return /^[aeio]/.test(kind) ? `an ${kind}` : `a ${kind}`;
}
