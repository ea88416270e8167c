// Analyses
export { type LongRun, longRun } from "./analyse/long-run.ts";
export {
  type ObservedOrder,
  type OrderResult,
  type OrderStudy,
  observeOrders,
} from "./analyse/observed-orders.ts";

// Choosing
export { type Choice, LIMIT_KEYS, type LimitKey, type RankedStepper } from "./choose/choice.ts";
export { type ChoiceRun, type ChooseOptions, chooseStepper } from "./choose/choose-stepper.ts";
export { gatherEvidence } from "./choose/gather-evidence.ts";
// Command line
export { describeChoice } from "./cli/describe-choice.ts";
export { buildProgram } from "./cli/program.ts";
export { EXIT, runCommandLine } from "./cli/run-command-line.ts";
// Cells and scores
export { InvalidInputError } from "./errors.ts";
// Report
export type { Chart } from "./report/chart.ts";
export { describeCharts } from "./report/describe-charts.ts";
export type { ChoiceEvidence } from "./report/evidence.ts";
export { toSvg } from "./report/render/to-svg.ts";
export { writeReport } from "./report/write-report.ts";
export { CellPool, type PoolOptions, type PoolPlan } from "./run/cell-pool.ts";
export { type ExactOrbitKind, type ExactState, exactAtPeriods, exactAtSteps } from "./run/exact-states.ts";
export { runCell } from "./run/run-cell.ts";
export { parseScenario, readScenario } from "./scenario/parse-scenario.ts";
export type {
  NumberOrRange,
  Requirements,
  Scenario,
  ScenarioLimit,
  ScenarioOrbit,
} from "./scenario/scenario.ts";
export { scenarioJsonSchema } from "./scenario/schema.ts";
export { FULL_PLAN, type ScoringPlan } from "./score/run-scorer.ts";
export {
  type Cell,
  MEASURES,
  type MeasureName,
  type MeasureSummary,
  type Score,
  type Summation,
} from "./score/score.ts";
// Sweeps
export { gridCells, type Shard, shardOf } from "./sweep/grid.ts";
export { parseStudy, readStudy } from "./sweep/parse-study.ts";
export { runSweep, type SweepResult } from "./sweep/run-sweep.ts";
export { listValues, type Study, type Values } from "./sweep/study.ts";
export { studyJsonSchema } from "./sweep/study-schema.ts";
