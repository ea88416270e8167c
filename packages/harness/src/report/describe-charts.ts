import type { Chart } from "./chart.ts";
import { atOneEccentricity } from "./charts/at-one-eccentricity.ts";
import { costBars } from "./charts/cost-bars.ts";
import { errorAgainstCost } from "./charts/error-against-cost.ts";
import { errorPlanes } from "./charts/error-planes.ts";
import { historyCharts } from "./charts/history-charts.ts";
import { margins } from "./charts/margins.ts";
import { orbitPlane } from "./charts/orbit-plane.ts";
import { stepBands } from "./charts/step-bands.ts";
import { againstEccentricity, againstSteps } from "./charts/survey-charts.ts";
import { oscillationChart, periodChart } from "./charts/within-orbit-charts.ts";
import type { ChoiceEvidence } from "./evidence.ts";
import { chooseLooks } from "./look/stepper-look.ts";

/**
 * Every chart the evidence allows, in the order of the page. Pure: the same evidence gives the same specifications. A chart whose data are
 * missing (nothing ranked, no long run) is left out.
 */
export function describeCharts(evidence: ChoiceEvidence): Chart[] {
  const looks = chooseLooks(evidence);
  return [
    evidence.costPoints.length > 0 ? errorAgainstCost(evidence, looks) : null,
    costBars(evidence),
    margins(evidence),
    stepBands(evidence),
    ...historyCharts(evidence, looks),
    oscillationChart(evidence, looks),
    periodChart(evidence, looks),
    ...errorPlanes(evidence),
    atOneEccentricity(evidence, looks),
    ...againstEccentricity(evidence, looks),
    ...againstSteps(evidence, looks),
    orbitPlane(evidence),
  ].filter((chart) => chart !== null);
}
