import { mkdir, mkdtemp, readdir, rename, rm, writeFile } from "node:fs/promises";
import { basename, dirname, join, resolve } from "node:path";
import type { Reading } from "../choose/measure.ts";
import { InvalidInputError } from "../errors.ts";
import type { ChoiceEvidence } from "../report/evidence.ts";
import { writeReport } from "../report/write-report.ts";
import { MEASURES, type MeasureName, type Score } from "../score/score.ts";
import { scoresCsv } from "./scores-csv.ts";

/**
 * Makes sure, before the work starts, that a result can be written there.
 *
 * @throws InvalidInputError where the folder holds something other than an earlier result
 */
export async function prepareFolder(directory: string): Promise<void> {
  const parent = dirname(resolve(directory));
  try {
    await mkdir(parent, { recursive: true });
  } catch (error) {
    throw new InvalidInputError(
      `--out ${directory}: cannot be made (${(error as NodeJS.ErrnoException).code})`,
    );
  }
  const entries = await entriesOf(directory);
  if (entries !== null && entries.length > 0 && !entries.includes("result.json")) {
    throw new InvalidInputError(
      `--out ${directory}: holds something other than an earlier result; name an empty or new folder`,
    );
  }
}

async function entriesOf(directory: string): Promise<string[] | null> {
  try {
    return await readdir(directory);
  } catch (error) {
    if ((error as NodeJS.ErrnoException).code === "ENOENT") return null;
    throw new InvalidInputError(`--out ${directory}: is not a folder that can be written`);
  }
}

/**
 * Writes the result folder of a choice. It appears whole or not at all: everything is written beside it first; an earlier result of the
 * same name is kept as `NAME.previous`.
 */
export async function writeChoiceFolder(
  directory: string,
  evidence: ChoiceEvidence,
  readings: readonly Reading[],
): Promise<string> {
  const target = resolve(directory);
  const staging = await mkdtemp(join(dirname(target), `.${basename(target)}-`));
  try {
    const scores = readings.map(({ score }) => score);
    await writeFile(join(staging, "result.json"), `${JSON.stringify(evidence.choice, null, 2)}\n`);
    await writeFile(join(staging, "evidence.json"), `${JSON.stringify(evidence)}\n`);
    await writeFile(
      join(staging, "scores.ndjson"),
      scores.map((score) => `${JSON.stringify(measuredOnly(score))}\n`).join(""),
    );
    await writeFile(join(staging, "scores.csv"), scoresCsv(scores));
    await writeReport(staging, evidence);
    if ((await entriesOf(target)) !== null) {
      await rm(`${target}.previous`, { recursive: true, force: true });
      await rename(target, `${target}.previous`);
    }
    await rename(staging, target);
  } catch (error) {
    await rm(staging, { recursive: true, force: true });
    throw error;
  }
  return directory;
}

/** A score without the measures that were not asked for: in a search most are not. */
function measuredOnly(score: Score): object {
  return Object.fromEntries(
    Object.entries(score).filter(
      ([name]) => !MEASURES.includes(name as MeasureName) || score[name as MeasureName].max !== null,
    ),
  );
}
