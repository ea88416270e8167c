import { MEASURES, type MeasureName, type Score } from "../score/score.ts";

/** Scores as NDJSON, one a line, each without the measures that it does not have: in a search most are not asked for. */
export function scoresNdjson(scores: readonly Score[]): string {
  return scores.map((score) => `${JSON.stringify(measuredOnly(score))}\n`).join("");
}

function measuredOnly(score: Score): object {
  return Object.fromEntries(
    Object.entries(score).filter(
      ([name]) => !MEASURES.includes(name as MeasureName) || score[name as MeasureName].max !== null,
    ),
  );
}
