import { chmod, mkdir, mkdtemp, readdir, rename, rm, writeFile } from "node:fs/promises";
import { basename, dirname, join, resolve } from "node:path";
import { InvalidInputError } from "../errors.ts";
import type { Score } from "../score/score.ts";
import { scoresCsv } from "./scores-csv.ts";
import { scoresNdjson } from "./scores-ndjson.ts";

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
 * Writes a result folder. It appears whole or not at all: `fill` writes everything into a folder beside it first; an earlier result of the
 * same name is kept as `NAME.previous`.
 */
export async function writeFolder(
  directory: string,
  fill: (staging: string) => Promise<void>,
): Promise<string> {
  const target = resolve(directory);
  const staging = await mkdtemp(join(dirname(target), `.${basename(target)}-`));
  try {
    await fill(staging);
    // A temporary folder is its owner's alone; a result is as open as any new folder.
    await chmod(staging, 0o777 & ~process.umask());
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

/** Writes a result and the scores behind it. */
export async function writeResultFolder(
  directory: string,
  result: object,
  scores: readonly Score[],
): Promise<string> {
  return writeFolder(directory, async (staging) => {
    await writeFile(join(staging, "result.json"), `${JSON.stringify(result, null, 2)}\n`);
    await writeFile(join(staging, "scores.ndjson"), scoresNdjson(scores));
    await writeFile(join(staging, "scores.csv"), scoresCsv(scores));
  });
}
