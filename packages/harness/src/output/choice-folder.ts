import { writeFile } from "node:fs/promises";
import { join } from "node:path";
import type { Reading } from "../choose/measure.ts";
import type { ChoiceEvidence } from "../report/evidence.ts";
import { writeReport } from "../report/write-report.ts";
import { writeFolder } from "./result-folder.ts";
import { scoresCsv } from "./scores-csv.ts";
import { scoresNdjson } from "./scores-ndjson.ts";

/** Writes the result folder of a choice: result, evidence, scores and report. */
export async function writeChoiceFolder(
  directory: string,
  evidence: ChoiceEvidence,
  readings: readonly Reading[],
): Promise<string> {
  const scores = readings.map(({ score }) => score);
  return writeFolder(directory, async (staging) => {
    await writeFile(join(staging, "result.json"), `${JSON.stringify(evidence.choice, null, 2)}\n`);
    await writeFile(join(staging, "evidence.json"), `${JSON.stringify(evidence)}\n`);
    await writeFile(join(staging, "scores.ndjson"), scoresNdjson(scores));
    await writeFile(join(staging, "scores.csv"), scoresCsv(scores));
    await writeReport(staging, evidence);
  });
}
