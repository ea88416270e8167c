import { chmod, mkdir, mkdtemp, rename, rm } from "node:fs/promises";
import { join } from "node:path";
import { InvalidInputError } from "../errors.ts";
import type { ChoiceEvidence } from "./evidence.ts";
import { readEvidence } from "./read-evidence.ts";
import { writeReport } from "./write-report.ts";

/**
 * Draws the report of a stored result again, in its folder, without running anything: page and charts are replaced once all are written.
 *
 * @throws InvalidInputError where the folder holds no evidence that can be drawn, or cannot be written
 */
export async function redrawReport(directory: string): Promise<ChoiceEvidence> {
  const evidence = await readEvidence(directory);
  const staging = await makeStaging(directory);
  const drawn = join(staging, "drawn");
  try {
    await mkdir(drawn);
    await writeReport(drawn, evidence);
    const charts = join(directory, "charts");
    // A folder cannot be renamed over one that holds files: the old charts step aside first.
    await rename(charts, join(staging, "old")).catch(ignoreMissing);
    await rename(join(drawn, "charts"), charts);
    await chmod(charts, 0o777 & ~process.umask());
    await rename(join(drawn, "report.html"), join(directory, "report.html"));
  } finally {
    await rm(staging, { recursive: true, force: true });
  }
  return evidence;
}

async function makeStaging(directory: string): Promise<string> {
  try {
    return await mkdtemp(join(directory, ".report-"));
  } catch (error) {
    throw new InvalidInputError(
      `${directory}: cannot be written (${(error as NodeJS.ErrnoException).code ?? "unknown"})`,
    );
  }
}

function ignoreMissing(error: NodeJS.ErrnoException): void {
  if (error.code !== "ENOENT") throw error;
}
