import { join } from "node:path";
import { InvalidInputError } from "../errors.ts";
import { readJson } from "../text/read-json.ts";
import { firstFinding } from "../text/schema-findings.ts";
import type { ChoiceEvidence } from "./evidence.ts";
import { evidenceSchema } from "./evidence-schema.ts";

/**
 * The evidence of a result that `choose --out` wrote into the folder.
 *
 * @throws InvalidInputError where there is none, or where it lacks what a report is drawn from: the first such field, and how to get it.
 */
export async function readEvidence(directory: string): Promise<ChoiceEvidence> {
  const file = join(directory, "evidence.json");
  const stored = await readJson(file);
  const checked = evidenceSchema.safeParse(stored);
  // What is drawn is the file as it stands, in its own order of fields.
  if (checked.success) return stored as ChoiceEvidence;
  const { message } = firstFinding(file, checked.error, stored);
  throw new InvalidInputError(`${message}; ${remedy(stored, directory)}`);
}

function remedy(stored: unknown, directory: string): string {
  const provenance = (stored as { choice?: { provenance?: { version?: unknown; command?: unknown } } } | null)
    ?.choice?.provenance;
  if (typeof provenance?.command !== "string") return "not a result of choose that can be drawn again";
  return `a result of another version (${String(provenance.version)}): run it again with ${provenance.command} --out ${directory}`;
}
