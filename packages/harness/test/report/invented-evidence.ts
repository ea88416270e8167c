import type { Choice, LimitErrors, RankedStepper } from "../../src/choose/choice.ts";
import type {
  ChoiceEvidence,
  CostPoint,
  History,
  SurveyPlane,
  SurveyPoint,
} from "../../src/report/evidence.ts";

/**
 * INVENTED evidence for tests of the report: every number comes from a formula below and says nothing about any stepper. Errors follow
 * c N^-p down to a floor; costs, margins and histories follow from that.
 */
export interface Invention {
  /** How many steppers; their ids are those of the seven first ones, then made up. */
  readonly steppers?: number;
  /** False: none qualifies. */
  readonly qualifies?: boolean;
  readonly title?: string;
  readonly id?: string;
}

interface Invented {
  readonly stepper: string;
  readonly title: string;
  readonly symplectic: boolean;
  readonly order: number;
  readonly stages: number;
  readonly constant: number;
  readonly variable: boolean;
}

const KNOWN: readonly [string, string, boolean, number, number, number][] = [
  ["dormand-prince-5", "Dormand–Prince of order 5, fixed step", false, 5, 6, 2e3],
  ["rk4", "Classical Runge–Kutta", false, 4, 4, 6e3],
  ["leapfrog", "Leapfrog, drift-kick-drift", true, 2, 1, 2e3],
  ["velocity-verlet", "Velocity Verlet, kick-drift-kick", true, 2, 1, 3.1e3],
  ["dormand-prince-54", "Dormand–Prince 5(4), variable step", false, 5, 6, 3e2],
  ["symplectic-euler", "Symplectic Euler", true, 1, 1, 4e2],
  ["explicit-euler", "Explicit Euler", false, 1, 1, 9e3],
];

export function inventedEvidence(invention: Invention = {}): ChoiceEvidence {
  const {
    steppers: count = 7,
    qualifies = true,
    title = "Invented satellites (made-up numbers)",
  } = invention;
  const steppers = inventSteppers(count, invention.id);
  const ranked = steppers
    .map((stepper) => rank(stepper, qualifies))
    .filter((candidate) => candidate.evaluationsPerOrbit < 60_000)
    .sort((a, b) => a.evaluationsTotal - b.evaluationsTotal);
  const ranking = qualifies ? ranked : [];
  const chosen = ranking[0];
  const today = steppers.find((stepper) => stepper.stepper === "rk4") ?? steppers[0]!;
  const rival = steppers.find((s) => s.symplectic !== (chosen?.symplectic ?? false)) ?? steppers[0]!;
  const choice: Choice = {
    format: "perigauge-choice/1",
    scenario: {
      format: "perigauge-scenario/1",
      title,
      gravitationalParameterKm3S2: 398600.4418,
      bodyRadiusKm: 6378.137,
      orbits: [
        { name: "inner", count: 2, periapsisAltitudeKm: 800, apoapsisAltitudeKm: { from: 18500, to: 19000 } },
        { name: "outer", count: 2, semiMajorAxisKm: 16400, eccentricity: 0.56 },
      ],
      duration: { days: 60 },
      limits: [
        { alongTrackKm: 2 },
        { timingSeconds: 0.15 },
        { semiMajorAxisM: 1 },
        { alongTrackKm: 0.5, withinDays: 7 },
      ],
      designFactor: 2,
      step: { maxSeconds: 60, multipleOfSeconds: 5 },
      current: { stepper: "rk4", stepSeconds: 30 },
    },
    choice: chosen?.stepper ?? null,
    ranking,
    current: {
      ...rank(today, true),
      stepSeconds: 30,
      margin: 0.047,
      errors: errorsOf(today.stepper, 0.047),
      enough: false,
      costAgainstChoice: chosen === undefined ? null : 1.37,
      why: "20 times over the limit on position along the track",
    },
    excluded: steppers
      .filter((stepper) => !ranking.some((candidate) => candidate.stepper === stepper.stepper))
      .map((stepper, index) => ({
        stepper: stepper.stepper,
        reason:
          index % 2 === 0
            ? "needs more force evaluations per orbit than allowed"
            : "breaks a limit at every step tried",
        limit: index % 2 === 0 ? "evaluationsPerOrbit" : "alongTrackKm",
        value: index % 2 === 0 ? 61_234 * (index + 1) : 41.7,
        allowed: index % 2 === 0 ? 5000 : 2,
      })),
    whatWouldHaveToGive: qualifies
      ? []
      : [
          "position along the track: 2 km would have to become 6.1 km for dormand-prince-5 at 5 s",
          "or the budget of force evaluations per orbit would have to rise from 5 000 to 14 300",
        ],
    explanation: "An invented paragraph on why this one wins.",
    sensitivity: [
      {
        change: "as asked",
        stepper: chosen?.stepper ?? null,
        stepSeconds: 60,
        stepsPerOrbit: 336.6,
        tolerance: null,
        evaluationsPerOrbit: 2020,
        evidence: "extrapolated",
      },
      {
        change: "limits 10 times tighter",
        stepper: null,
        stepSeconds: null,
        stepsPerOrbit: null,
        tolerance: null,
        evaluationsPerOrbit: null,
        evidence: "extrapolated",
      },
    ],
    handOver: qualifies
      ? {
          days: 7,
          orbits: 29.2,
          orbit: "inner",
          eccentricity: 0.551943821,
          startAnomalyDeg: 30,
          stepSeconds: 60,
          halfStepDifferenceKm: 0.0321,
          closureKm: 1.23e-5,
        }
      : null,
    bodies: qualifies ? { massRatio: 0.5, heavierShare: 1 / 3, lighterShare: 2 / 3 } : null,
    cautions: [
      "rk4 at whole numbers of steps per orbit below 180 can resonate; the band was run at offsets.",
    ],
    provenance: {
      version: "0.0.0-invented",
      node: "v20.0.0",
      command: "perigauge choose invented.json --out reports/invented",
      seed: 20240229,
      digest: "0123456789abcdef".repeat(4),
      cellsRun: 4321,
      seconds: { screening: 3.2, search: 21.5, verification: 40.25, sensitivity: 1.2, total: 66.1 },
    },
  };
  return {
    choice,
    costPoints: steppers.flatMap(costPointsOf),
    survey: {
      orbits: 10,
      startAnomalyDeg: 0,
      evaluationsPerOrbit: 2000,
      eccentricity: 0.58,
      againstEccentricity: steppers.flatMap((stepper) =>
        [0, 0.05, 0.1, 0.2, 0.3, 0.4, 0.5, 0.6, 0.7, 0.8, 0.9].map((e) =>
          surveyPoint(stepper, e, 2000 / stepper.stages),
        ),
      ),
      againstStep: steppers.flatMap((stepper) =>
        [50, 100, 200, 400, 800, 1600, 3200].map((n) => surveyPoint(stepper, 0.58, n)),
      ),
      plane: planeOf(steppers.filter(({ variable }) => !variable).slice(0, 6)),
    },
    histories: [
      ...(chosen === undefined ? [] : [historyOf(chosen.stepper, chosen.symplectic, "choice", 1e-5)]),
      historyOf(rival.stepper, rival.symplectic, "rival", 3e-5),
      historyOf("rk4", false, "current", 1e-3),
    ],
    track: trackOf(chosen?.stepper ?? rival.stepper),
  };
}

function inventSteppers(count: number, hostileId: string | undefined): Invented[] {
  const invented = Array.from({ length: count }, (_, index): Invented => {
    const known = KNOWN[index];
    if (known !== undefined) {
      const [stepper, title, symplectic, order, stages, constant] = known;
      return { stepper, title, symplectic, order, stages, constant, variable: stepper.endsWith("54") };
    }
    const order = 2 + 2 * (index % 5);
    const symplectic = index % 3 !== 0;
    return {
      stepper: `invented-${symplectic ? "splitting" : "nystrom"}-${order}-${index}`,
      title: `Invented method ${index} of order ${order}`,
      symplectic,
      order,
      stages: 1 + ((index * 7) % 13) + order,
      constant: 10 ** (order * 0.9 + ((index * 13) % 7) / 4),
      variable: index % 11 === 0,
    };
  });
  return hostileId === undefined ? invented : [{ ...invented[0]!, stepper: hostileId }, ...invented.slice(1)];
}

/** Largest error over its limit at n steps per orbit. */
function ratioAt(stepper: Invented, n: number): number {
  return 400 * stepper.constant * n ** -stepper.order * 30 ** (stepper.order - 1) + 2e-5 * Math.sqrt(n);
}

function rank(stepper: Invented, qualifies: boolean): RankedStepper {
  const n = Math.ceil((800 * stepper.constant * 30 ** (stepper.order - 1)) ** (1 / stepper.order));
  const stepSeconds = stepper.variable ? null : Math.max(0.001, Number((21_000 / n).toPrecision(3)));
  const margin = qualifies ? 2 + ((n * 37) % 11) / 10 : 0.4;
  const evaluationsPerOrbit = n * stepper.stages;
  return {
    stepper: stepper.stepper,
    title: stepper.title,
    symplectic: stepper.symplectic,
    stepSeconds,
    stepsPerOrbit: stepper.variable ? null : n,
    tolerance: stepper.variable ? 3.2e-11 : null,
    evaluationsPerOrbit,
    evaluationsTotal: evaluationsPerOrbit * 4 * 247,
    errors: errorsOf(stepper.stepper, margin),
    margin,
    bindingLimit: "timingSeconds",
    band:
      stepSeconds === null
        ? { from: 3.2e-11, to: 3.2e-12, cellsRun: 208 }
        : { from: stepSeconds, to: stepSeconds * 0.5, cellsRun: 1664 },
    cliff: {
      stepSeconds: stepSeconds === null ? null : stepSeconds * 1.31,
      tolerance: stepSeconds === null ? 9.1e-11 : null,
      ratio: 1.31,
      reason: stepper.stepper === "rk4" ? "capped" : "fails beyond",
    },
    floor: null,
    evidence: stepper.order > 8 ? "extrapolated" : "run",
    why: "holds every limit over the whole band",
  };
}

function errorsOf(stepper: string, margin: number): LimitErrors {
  const cells: [string, number, number, number | null][] = [
    ["alongTrackKm", 2, 1.4, null],
    ["timingSeconds", 0.15, 1, null],
    ["semiMajorAxisM", 1, 31, null],
    ["alongTrackKm@7", 0.5, 3.3, 7],
  ];
  return Object.fromEntries(
    cells.map(([key, limit, ease, withinDays], index) => {
      const factor = margin * ease;
      const eccentricity = 0.551943821 + 0.001 * index;
      return [
        key,
        {
          value: limit / factor,
          limit,
          factor,
          orbit: index % 2 === 0 ? "inner" : "outer",
          eccentricity,
          startAnomalyDeg: 30 * index,
          atOrbit: withinDays === null ? 246.5 : 28.75,
          withinDays,
          uncertaintyFactor: 1,
          command: `perigauge score --stepper ${stepper} --eccentricity ${eccentricity} --steps-per-orbit 700.1234567890123 --orbits 247 --start ${30 * index}`,
        },
      ];
    }),
  );
}

function costPointsOf(stepper: Invented): CostPoint[] {
  return [0.25, 0.35, 0.5, 0.7, 1, 1.4, 2].map((scale) => {
    const n = scale * Math.ceil((800 * stepper.constant * 30 ** (stepper.order - 1)) ** (1 / stepper.order));
    return {
      stepper: stepper.stepper,
      title: stepper.title,
      symplectic: stepper.symplectic,
      stepsPerOrbit: stepper.variable ? null : n,
      tolerance: stepper.variable ? 1e-9 / scale ** 5 : null,
      evaluationsPerOrbit: n * stepper.stages,
      worstRatio: ratioAt(stepper, n),
      bindingLimit: "alongTrackKm",
      evidence: "run",
    };
  });
}

function surveyPoint(stepper: Invented, eccentricity: number, n: number): SurveyPoint {
  const hardness = 30 * Math.sqrt((1 + eccentricity) / (1 - eccentricity) ** 3);
  const error = stepper.constant * 0.01 * (hardness / (8 * n)) ** stepper.order + 1e-14 * Math.sqrt(n);
  const diverged = error > 3;
  return {
    stepper: stepper.stepper,
    title: stepper.title,
    symplectic: stepper.symplectic,
    eccentricity,
    stepsPerOrbit: stepper.variable ? null : n,
    tolerance: stepper.variable ? n ** -3 : null,
    meanStepsPerOrbit: n,
    evaluationsPerOrbit: n * stepper.stages,
    phase: diverged ? null : error,
    energy: diverged ? null : error * 0.02,
    period: diverged || eccentricity === 0 ? null : error * 0.1,
    ended: diverged ? "diverged" : "completed",
    command: `perigauge score --stepper ${stepper.stepper} --eccentricity ${eccentricity} --steps-per-orbit ${n} --orbits 10`,
  };
}

/** The limit is a phase error of 10⁻⁵. */
function planeOf(steppers: readonly Invented[]): SurveyPlane {
  const eccentricities = [0.1, 0.2, 0.3, 0.4, 0.5, 0.6, 0.7, 0.8, 0.9];
  const stepsPerOrbit = Array.from({ length: 9 }, (_, i) => 20 * 2 ** i + 0.3);
  return {
    orbits: 10,
    semiMajorAxisKm: 15_928,
    steppers: steppers.map(({ stepper }) => stepper),
    eccentricities,
    stepsPerOrbit,
    cells: steppers.flatMap((stepper) =>
      eccentricities.flatMap((e) =>
        stepsPerOrbit.map((n) => {
          const { phase, evaluationsPerOrbit, command } = surveyPoint(stepper, e, n);
          return {
            stepper: stepper.stepper,
            eccentricity: e,
            stepsPerOrbit: n,
            evaluationsPerOrbit,
            phase,
            ratio: phase === null ? null : phase * 1e5,
            bindingLimit: phase === null ? null : "phaseRad",
            command,
          };
        }),
      ),
    ),
  };
}

function historyOf(stepper: string, symplectic: boolean, role: History["role"], size: number): History {
  const growth = symplectic ? 1 : 2;
  return {
    stepper,
    title: stepper,
    symplectic,
    role,
    label: `${stepper}, ${role === "choice" ? "the choice" : role === "rival" ? "best of the other kind" : "used today at 30 s"}`,
    orbit: "inner",
    eccentricity: 0.551943821,
    startAnomalyDeg: 30,
    command: `perigauge score --stepper ${stepper} --eccentricity 0.5519438210 --steps-per-orbit 700 --orbits 247 --start 30`,
    points: Array.from({ length: 60 }, (_, index) => {
      const orbit = 10 ** ((Math.log10(247) * index) / 59);
      const wave = 1 + 0.05 * Math.sin(3 * index);
      const phaseRad = size * (orbit / 247) ** growth * wave;
      return {
        orbit,
        days: (orbit / 247) * 60,
        energyRelative: symplectic ? size * 1e-4 * wave : size * 1e-4 * (orbit / 247) * wave,
        phaseRad,
        alongTrackKm: phaseRad * 16_000,
      };
    }),
    periods: Array.from({ length: 246 }, (_, index) => ({
      orbit: index + 1.9,
      periodRelative: -size * 1e-3 * (symplectic ? 1 : index + 1),
    })),
    oscillation: {
      periapsisAtOrbit: 0.96,
      points: Array.from({ length: 100 }, (_, index) => ({
        orbit: index / 100,
        energyRelative:
          size * 1e-4 * (Math.sin((2 * Math.PI * index) / 100) + (symplectic ? 0 : index / 200)),
      })),
    },
  };
}

function trackOf(stepper: string): ChoiceEvidence["track"] {
  const [a, e] = [15_928, 0.551943821];
  const at = (eccentricAnomaly: number): { xKm: number; yKm: number } => ({
    xKm: a * (Math.cos(eccentricAnomaly) - e),
    yKm: a * Math.sqrt(1 - e * e) * Math.sin(eccentricAnomaly),
  });
  return {
    orbit: "inner",
    eccentricity: e,
    bodyRadiusKm: 6378.137,
    exact: Array.from({ length: 361 }, (_, index) => at((2 * Math.PI * index) / 360)),
    numerical: Array.from({ length: 200 }, (_, step) => {
      const meanAnomaly = (2 * Math.PI * step) / 200;
      let anomaly = meanAnomaly;
      for (let turn = 0; turn < 50; turn++) anomaly = meanAnomaly + e * Math.sin(anomaly);
      return { ...at(anomaly), step };
    }),
    stepper,
  };
}
