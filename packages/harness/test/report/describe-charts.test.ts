import { describe, expect, it } from "vitest";
import type { Chart } from "../../src/report/chart.ts";
import { fittedOrders } from "../../src/report/charts/convergence-layers.ts";
import { growthSlope } from "../../src/report/charts/growth-slopes.ts";
import { stepsThatHold } from "../../src/report/charts/plane-rows.ts";
import { describeCharts } from "../../src/report/describe-charts.ts";
import type { ChoiceEvidence, History, PlaneCell } from "../../src/report/evidence.ts";
import { chooseLooks } from "../../src/report/look/stepper-look.ts";
import { compileSpec, toSvg } from "../../src/report/render/to-svg.ts";
import { formatCount, formatNumber } from "../../src/report/text/number.ts";
import { inventedEvidence } from "./invented-evidence.ts";

const NAMES = [
  "error-against-cost",
  "cost-to-hold-the-limits",
  "margins",
  "step-bands",
  "energy-over-time",
  "phase-over-time",
  "along-track-over-time",
  "energy-within-an-orbit",
  "period-orbit-by-orbit",
  "error-plane-1",
  "error-plane-2",
  "error-plane-3",
  "error-plane-4",
  "error-plane-5",
  "error-plane-6",
  "error-at-one-eccentricity",
  "phase-against-eccentricity",
  "energy-against-eccentricity",
  "period-against-eccentricity",
  "phase-against-steps",
  "energy-against-steps",
  "period-against-steps",
  "orbit-in-the-plane",
];

function chart(evidence: ChoiceEvidence, name: string): Chart {
  const found = describeCharts(evidence).find((candidate) => candidate.name === name);
  if (found === undefined) throw new Error(`no chart ${name}`);
  return found;
}

describe("charts of a choice", () => {
  it.each([7, 60, 73])("are all there for %i steppers, and compile without a warning", (steppers) => {
    const charts = describeCharts(inventedEvidence({ steppers }));
    expect(charts.map(({ name }) => name)).toEqual(NAMES);
    for (const { spec } of charts) expect(compileSpec(spec).marks?.length).toBeGreaterThan(0);
  });

  it("leave out what there is no data for when nothing qualifies", () => {
    const names = describeCharts(inventedEvidence({ qualifies: false })).map(({ name }) => name);
    expect(names).not.toContain("cost-to-hold-the-limits");
    expect(names).not.toContain("step-bands");
    expect(names).toContain("error-against-cost");
  });

  it("survive evidence without points", () => {
    const evidence = inventedEvidence();
    const bare: ChoiceEvidence = {
      ...evidence,
      choice: { ...evidence.choice, choice: null, ranking: [], current: null },
      costPoints: [],
      survey: { ...evidence.survey, againstEccentricity: [], againstStep: [], plane: undefined },
      histories: [],
      track: { ...evidence.track, exact: [], numerical: [] },
    };
    expect(describeCharts(bare)).toEqual([]);
  });

  it("give the same bytes for the same evidence, in whatever order they are drawn", async () => {
    const [first, second] = [describeCharts(inventedEvidence()), describeCharts(inventedEvidence())];
    expect(JSON.stringify(second)).toBe(JSON.stringify(first));
    const forward = [];
    for (const one of first) forward.push(await toSvg(one));
    const backward = [];
    for (const one of [...second].reverse()) backward.unshift(await toSvg(one));
    expect(backward).toEqual(forward);
  });
});

describe("titles follow the data", () => {
  it("cost: the choice's own evaluations, and the runner-up's ratio", () => {
    const evidence = inventedEvidence();
    const [first, second] = evidence.choice.ranking;
    const { title } = chart(evidence, "error-against-cost");
    expect(title).toContain(first!.stepper);
    expect(title).toContain(formatCount(first!.evaluationsPerOrbit));
    expect(title).toContain(second!.stepper);
    expect(title).toContain(formatNumber(second!.evaluationsTotal / first!.evaluationsTotal, 2));
  });

  it("cost: the choice by its id, though an extrapolated stepper comes before it", () => {
    const evidence = inventedEvidence();
    const [first, second, ...rest] = evidence.choice.ranking;
    const ranking = [{ ...first!, evidence: "extrapolated" as const }, second!, ...rest];
    const changed = { ...evidence, choice: { ...evidence.choice, ranking, choice: second!.stepper } };
    expect(chart(changed, "error-against-cost").title).toMatch(
      new RegExp(`^${second!.stepper} holds every limit with `),
    );
    expect(chart(changed, "cost-to-hold-the-limits").title).toMatch(new RegExp(`^${second!.stepper} `));
  });

  it("margins: the tightest limit of the choice and its factor", () => {
    const evidence = inventedEvidence();
    const tightest = Object.values(evidence.choice.ranking[0]!.errors).sort(
      (a, b) => a.factor - b.factor,
    )[0]!;
    const { title } = chart(evidence, "margins");
    expect(title).toContain("time of periapsis passage");
    expect(title).toContain(formatNumber(tightest.factor, 2));
  });

  it("steps: doubling them divides a pure power law of order 5 by 32", () => {
    expect(chart(inventedEvidence(), "phase-against-steps").title).toContain(
      "by 32 (median above the rounding floor)",
    );
  });

  it("eccentricity: a stepper that took more evaluations is not compared at equal cost", () => {
    const evidence = inventedEvidence();
    const flatter = evidence.survey.againstEccentricity.map((point) =>
      point.stepper === "leapfrog"
        ? { ...point, phase: 1e-15, evaluationsPerOrbit: 3 * evidence.survey.evaluationsPerOrbit }
        : point,
    );
    const survey = { ...evidence.survey, againstEccentricity: flatter };
    const { title, description } = chart({ ...evidence, survey }, "phase-against-eccentricity");
    expect(title).not.toContain("leapfrog");
    expect(description).toContain("are left out of the finding");
  });

  it("duration: errors that stay level are said to", () => {
    expect(chart(inventedEvidence(), "energy-over-time").title).toMatch(
      /grows .*; it stays level for leapfrog$/,
    );
  });

  it("duration: the day the track leaves its limit", () => {
    const evidence = inventedEvidence();
    const today = evidence.histories.find(({ role }) => role === "current")!;
    const day = today.points.find(({ alongTrackKm }) => alongTrackKm > 2)!.days;
    expect(chart(evidence, "along-track-over-time").title).toContain(
      `${today.stepper} passes the limit by day ${formatNumber(day, 2)}`,
    );
  });

  it("heat map: the steps per orbit at which the invented power law meets the limit", () => {
    const evidence = inventedEvidence();
    const plane = evidence.survey.plane!;
    // Error over limit = 10⁵ (c/100) (hardness / 8N)^p, straight in logarithms, so the crossing is exact but for the invented floor.
    const [stepper] = plane.steppers;
    expect(stepper).toBe("dormand-prince-5");
    const steps = (e: number): number =>
      (1e5 * 2e3 * 0.01) ** (1 / 5) * (30 / 8) * Math.sqrt((1 + e) / (1 - e) ** 3);
    for (const e of [0.1, 0.6, 0.8]) {
      const row = plane.cells.filter((cell) => cell.stepper === stepper && cell.eccentricity === e);
      // The floor adds 10⁻¹⁴ √N × 10⁵ = 10⁻⁷ at most to a ratio above 10⁻³: 10⁻⁴ / 5 of a step at order 5.
      expect(Math.abs(stepsThatHold(row)! / steps(e) - 1)).toBeLessThan(2e-5);
    }
    expect(chart(evidence, "error-plane-1").title).toContain(
      `from ${formatNumber(steps(0.6), 2)} steps per orbit on at e = 0.6`,
    );
  });

  it("contour: null where the finest cell breaks, the finer cell where the coarser left the orbit, the coarsest where all hold", () => {
    const [cell] = inventedEvidence().survey.plane!.cells;
    const row = (...ratios: (number | null)[]): PlaneCell[] =>
      ratios.map((ratio, i) => ({ ...cell!, stepsPerOrbit: 10 * 2 ** i, ratio }));
    expect(stepsThatHold(row(4, 2, 1.5))).toBeNull();
    expect(stepsThatHold(row(null, 0.5, 0.1))).toBe(20);
    expect(stepsThatHold(row(0.9, 0.5))).toBe(10);
    expect(stepsThatHold(row(0.5, 4, 0.25))).toBeCloseTo(20 * Math.SQRT2, 10);
  });

  it("growth: a history of a pure power of time gives that power, and one that bends gives none", () => {
    const [first] = inventedEvidence().histories;
    const power = (exponent: (orbit: number) => number): History => ({
      ...first!,
      points: Array.from({ length: 200 }, (_, i) => {
        const orbit = 1000 ** (i / 199);
        return { ...first!.points[0]!, orbit, days: orbit / 4, phaseRad: 1e-9 * orbit ** exponent(orbit) };
      }),
    });
    expect(
      growthSlope(
        power(() => 2),
        "phaseRad",
      ),
    ).toBeCloseTo(2, 10);
    expect(
      growthSlope(
        power(() => 0),
        "phaseRad",
      ),
    ).toBeCloseTo(0, 10);
    expect(
      growthSlope(
        power((orbit) => (orbit < 300 ? 1 : 2)),
        "phaseRad",
      ),
    ).toBeNull();
  });

  it("convergence: the order of an invented power law, or none where there is too little of it", () => {
    const evidence = inventedEvidence();
    const ladder = [50, 75, 100, 150, 200, 300, 400];
    const againstStep = ladder.map((n) => ({
      ...evidence.survey.againstStep.find(({ stepper }) => stepper === "rk4")!,
      stepsPerOrbit: n,
      phase: 10 * n ** -4,
    }));
    const of = (points: typeof againstStep): number | null | undefined =>
      fittedOrders(
        { ...evidence.survey, againstStep: points },
        "phase",
        chooseLooks(evidence),
        ({ stepsPerOrbit }) => stepsPerOrbit,
      )[0]?.order;
    expect(of(againstStep)).toBeCloseTo(4, 8);
    expect(of(againstStep.slice(0, 3))).toBeNull();
  });

  it("a mass ratio draws both bodies about the barycentre", () => {
    const evidence = inventedEvidence();
    const scenario = { ...evidence.choice.scenario, massRatio: 0.25 };
    const { spec, note } = chart(
      { ...evidence, choice: { ...evidence.choice, scenario } },
      "orbit-in-the-plane",
    );
    const { values } = (
      spec as unknown as { data: { values: { what: string; body: string; index: number; xKm: number }[] } }
    ).data;
    const at = (body: string): number =>
      values.find((row) => row.what === "exact" && row.body === body && row.index === 0)!.xKm;
    // m1 r1 + m2 r2 = 0 with m2 = m1 / 4, and r2 - r1 is the relative orbit; rows carry seven digits.
    expect(at("heavier body") / (0.25 * at("lighter body"))).toBeCloseTo(-1, 6);
    expect((at("lighter body") - at("heavier body")) / evidence.track.exact[0]!.xKm).toBeCloseTo(1, 6);
    expect(note).toContain("barycentre");
  });

  it("nothing qualifies: says so and names the nearest", () => {
    const { title } = chart(inventedEvidence({ qualifies: false }), "error-against-cost");
    expect(title).toMatch(/^No stepper tried holds every limit/);
  });

  it("every chart has words of its own for those who cannot see it", () => {
    const charts = describeCharts(inventedEvidence());
    expect(new Set(charts.map(({ title }) => title)).size).toBe(charts.length);
    for (const { description, title } of charts) {
      expect(description.length).toBeGreaterThan(80);
      expect(`${title} ${description}`).not.toMatch(/undefined|NaN|null|Infinity/);
    }
  });
});

describe("looks", () => {
  it("highlight the choice first, then today's, at most eight in all", () => {
    const evidence = inventedEvidence({ steppers: 60 });
    const { highlighted, muted } = chooseLooks(evidence);
    expect(highlighted.map(({ stepper }) => stepper).slice(0, 2)).toEqual([evidence.choice.choice, "rk4"]);
    expect(highlighted).toHaveLength(8);
    expect(highlighted.length + muted.length).toBe(60);
    expect(new Set(highlighted.map(({ shape }) => shape)).size).toBe(8);
    expect(new Set(highlighted.map(({ dash }) => dash.join())).size).toBe(8);
  });
});

describe("drawings", () => {
  it("carry their finding and text alternative, and no long digits", async () => {
    const one = chart(inventedEvidence(), "margins");
    const svg = await toSvg(one);
    expect(svg).toContain(`<title>${one.title}</title>`);
    expect(svg).toContain('role="img"');
    expect(svg).not.toMatch(/(?:d|transform)="[^"]*\.\d{3}/);
  });

  it("label logarithmic axes as they are, rounding no text", async () => {
    const svg = await toSvg(chart(inventedEvidence({ steppers: 60 }), "error-against-cost"));
    expect(svg).toContain(">0.001<");
  });
});
