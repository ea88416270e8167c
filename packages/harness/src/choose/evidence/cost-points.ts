import type { CostPoint } from "../../report/evidence.ts";
import type { ChoiceRun } from "../choose-stepper.ts";
import type { Reading } from "../measure.ts";

/** Error against cost: one point for each stepper and knob value that was screened or run in full, worst over its runs. */
export function costPoints({ context, tried, choice }: ChoiceRun): CostPoint[] {
  const { measurer, fleet } = context;
  const points: CostPoint[] = [];
  for (const { candidate, screening } of tried) {
    const { stepper, knob } = candidate;
    const identity = { stepper: stepper.id, title: stepper.title, symplectic: stepper.symplectic };
    const longest = new Map<number, (typeof screening.tried)[number]>();
    for (const screened of screening.tried) longest.set(screened.fineness, screened);
    for (const screened of longest.values()) {
      if (!Number.isFinite(screened.ratio)) continue;
      const binding = screened.worst.reduce((a, b) =>
        b.value / b.limit.limit > a.value / a.limit.limit ? b : a,
      );
      const { stepsPerOrbit, tolerance } = knob.physical(screened.fineness);
      points.push({
        ...identity,
        stepsPerOrbit,
        tolerance,
        evaluationsPerOrbit: screened.evaluationsPerOrbit,
        worstRatio: screened.ratio,
        bindingLimit: binding.limit.id,
        evidence: "extrapolated",
      });
    }
    const full = measurer.readings.filter(
      (reading) =>
        reading.cell.stepper === stepper.id && measurer.isFull(reading) && Number.isFinite(reading.ratio),
    );
    for (const readings of groupByKnob(full, fleet.shortestPeriodSeconds).values()) {
      const worst = readings.reduce((a, b) => (b.ratio > a.ratio ? b : a));
      const index = worst.limits.reduce(
        (best, { value }, i) =>
          value / (measurer.limits[i]?.limit ?? 1) >
          (worst.limits[best]?.value ?? 0) / (measurer.limits[best]?.limit ?? 1)
            ? i
            : best,
        0,
      );
      points.push({
        ...identity,
        stepsPerOrbit:
          worst.cell.step === undefined ? null : stepsOfShortest(worst, fleet.shortestPeriodSeconds),
        tolerance: worst.cell.tolerance ?? null,
        evaluationsPerOrbit: Math.max(
          ...readings.map(
            ({ score, sample }) =>
              (score.evaluationsPerOrbit * fleet.shortestPeriodSeconds) / sample.point.periodSeconds,
          ),
        ),
        worstRatio: worst.ratio,
        bindingLimit: measurer.limits[index]?.id ?? "",
        evidence: "run",
      });
    }
  }
  const order = new Map(
    [...choice.ranking.map(({ stepper }) => stepper), ...choice.excluded.map(({ stepper }) => stepper)].map(
      (id, i) => [id, i],
    ),
  );
  return points.toSorted(
    (a, b) =>
      (order.get(a.stepper) ?? 0) - (order.get(b.stepper) ?? 0) ||
      a.evidence.localeCompare(b.evidence) ||
      a.evaluationsPerOrbit - b.evaluationsPerOrbit,
  );
}

/** Readings of one stepper by step in seconds (to 6 digits) or tolerance. */
function groupByKnob(readings: readonly Reading[], shortestPeriodSeconds: number): Map<string, Reading[]> {
  const groups = new Map<string, Reading[]>();
  for (const reading of readings) {
    const key =
      reading.cell.step === undefined
        ? `tolerance ${reading.cell.tolerance}`
        : stepsOfShortest(reading, shortestPeriodSeconds).toPrecision(6);
    groups.set(key, [...(groups.get(key) ?? []), reading]);
  }
  // A value that only one or two cells were run at (whole steps per orbit of one orbit) is no worst case of the fleet.
  return new Map([...groups].filter(([, group]) => group.length >= 3));
}

function stepsOfShortest({ cell, sample }: Reading, shortestPeriodSeconds: number): number {
  return shortestPeriodSeconds / ((cell.step as number) / sample.point.meanMotion);
}
