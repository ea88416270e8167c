import { MEASURES, type MeasureSummary, type Score } from "../score/score.ts";

const FIELDS = [
  "stepper",
  "eccentricity",
  "stepsPerOrbit",
  "step",
  "tolerance",
  "maxStep",
  "orbits",
  "startAnomalyDeg",
  "summation",
  "steps",
  "evaluations",
  "evaluationsPerOrbit",
] as const;
const SUMMARIES: readonly (keyof MeasureSummary)[] = [
  "max",
  "rms",
  "final",
  "driftPerOrbit",
  "growthExponent",
];

/** Scores as CSV (RFC 4180): one line a cell, a measure's summaries as `phase.max` and so on; empty where a field is null. */
export function scoresCsv(scores: readonly Score[]): string {
  const head = [
    ...FIELDS,
    ...MEASURES.flatMap((name) => SUMMARIES.map((summary) => `${name}.${summary}`)),
    "ended",
  ];
  const lines = scores.map((score) =>
    [
      ...FIELDS.map((field) => score[field]),
      ...MEASURES.flatMap((name) => SUMMARIES.map((summary) => score[name][summary])),
      score.ended.status === "completed" ? "completed" : `diverged: ${score.ended.reason}`,
    ]
      .map((value) => (value === null ? "" : String(value)))
      .join(","),
  );
  return `${[head.join(","), ...lines].join("\r\n")}\r\n`;
}
