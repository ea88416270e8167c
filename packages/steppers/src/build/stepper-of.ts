import { parseRow } from "../exact/coefficients.ts";
import { type Rational, toDouble } from "../exact/rational.ts";
import type {
  Collocation,
  Composition,
  EmbeddedNystrom,
  EmbeddedTableau,
  Extrapolation,
  Multistep,
  NystromTableau,
  Published,
  Splitting,
  Sundman,
  Tableau,
} from "../methods/method.ts";
import { type Dense, nystromInterpolant, rungeKuttaInterpolant } from "../run/dense.ts";
import { fixedStep, type ProgramStepper } from "../run/fixed-step.ts";
import { type ImplicitStepper, implicitStep, variableCollocation } from "../run/implicit.ts";
import type { CollocationInDoubles } from "../run/radau.ts";
import { type PairStepper, variableStep } from "../run/variable-step.ts";
import { buildAdams } from "./adams.ts";
import { buildCollocation, type CollocationRows, gaussRows, inDoubles, radauRows } from "./collocation.ts";
import { compose } from "./composition.ts";
import { denseRows } from "./dense-rows.ts";
import { buildDenseStages } from "./dense-stages.ts";
import { buildExtrapolation, buildExtrapolationPair } from "./extrapolation.ts";
import { buildGaussJackson } from "./gauss-jackson.ts";
import { buildHermite } from "./hermite.ts";
import { buildLogarithmicLeapfrog } from "./logarithmic-leapfrog.ts";
import { buildNystrom, buildNystromPair } from "./nystrom.ts";
import { buildRungeKutta, buildRungeKuttaPair, liveStages } from "./runge-kutta.ts";
import { buildSplitting, operationsOf, type SplittingOperation } from "./splitting.ts";
import type { BuildStep } from "./step-program.ts";
import { buildSundman } from "./sundman.ts";

const published = ({ id, title, order, source, note }: Published): Published => ({
  id,
  title,
  order,
  source,
  ...(note === undefined ? {} : { note }),
});

const notGeometric = { symplectic: false, timeReversible: false, explicit: true } as const;
const rounded = (rows: readonly (readonly Rational[])[]): number[][] => rows.map((row) => row.map(toDouble));

/** A fixed-step stepper from an explicit Runge-Kutta tableau. */
export function fromTableau(method: Tableau): ProgramStepper {
  return fixedStep(
    {
      ...published(method),
      ...notGeometric,
      family: "runge-kutta",
      stages: () => liveStages(method.a.map(parseRow), parseRow(method.b)).filter(Boolean).length,
    },
    (setting) => buildRungeKutta(method, setting),
  );
}

/** The variable-step stepper of a tableau that has an embedded formula. */
export function fromPair(method: EmbeddedTableau): PairStepper {
  const { embedded, dense } = method;
  const swapped = embedded.advances === true;
  return variableStep(
    {
      ...published(method),
      ...notGeometric,
      id: embedded.id,
      title: embedded.title,
      family: "runge-kutta",
      order: swapped ? embedded.order : method.order,
      embeddedOrder: swapped ? method.order : embedded.order,
      stages: () => method.a.length,
    },
    (setting) => buildRungeKuttaPair(method, setting),
    dense === undefined ? null : () => rungeKuttaDense(dense, method),
  );
}

function rungeKuttaDense(dense: NonNullable<Tableau["dense"]>, method: Tableau): Dense {
  return {
    order: dense.order,
    interpolate: rungeKuttaInterpolant(rounded(denseRows(dense, parseRow(method.b)))),
    stages: "rows" in dense ? null : (setting) => buildDenseStages(dense, method.a.length, setting),
  };
}

/** A fixed-step stepper from a Nystrom tableau. */
export function fromNystrom(method: NystromTableau): ProgramStepper {
  return fixedStep(
    { ...published(method), ...notGeometric, family: "runge-kutta-nystrom", stages: () => method.a.length },
    (setting) => buildNystrom(method, setting),
  );
}

/** The variable-step stepper of a Nystrom tableau that has an embedded formula. */
export function fromNystromPair(method: EmbeddedNystrom): PairStepper {
  const { embedded, dense } = method;
  return variableStep(
    {
      ...published(method),
      ...notGeometric,
      id: embedded.id,
      title: embedded.title,
      family: "runge-kutta-nystrom",
      embeddedOrder: embedded.order,
      stages: () => method.a.length,
    },
    (setting) => buildNystromPair(method, setting),
    dense === undefined
      ? null
      : () => ({
          order: dense.order,
          interpolate: nystromInterpolant(
            rounded(dense.position.map(parseRow)),
            rounded(dense.velocity.map(parseRow)),
          ),
          stages: null,
        }),
  );
}

/** A fixed-step stepper from a splitting; its stages are its kicks. */
export function fromSplitting(method: Splitting): ProgramStepper {
  const { order, genericOrder = order } = method;
  const note = `Order ${order} where kinetic energy is quadratic in the velocity, as here; order ${genericOrder} for any two flows.`;
  const noted = genericOrder < order ? { ...method, note } : method;
  return splittingStepper(noted, method.symmetric, () => operationsOf(method));
}

/** Two fixed-step steppers from a composition: over leapfrog, and over velocity Verlet with `-kdk` after the id. */
export function fromComposition(method: Composition): readonly [ProgramStepper, ProgramStepper] {
  const kdk = { ...method, id: `${method.id}-kdk`, title: `${method.title}, kick–drift–kick` };
  return [
    splittingStepper(method, true, () => compose(method, "drift")),
    splittingStepper(kdk, true, () => compose(method, "kick")),
  ];
}

function splittingStepper(
  method: Published,
  timeReversible: boolean,
  operations: () => readonly SplittingOperation[],
): ProgramStepper {
  return fixedStep(
    {
      ...published(method),
      family: "symplectic-splitting",
      symplectic: true,
      timeReversible,
      explicit: true,
      stages: () => operations().filter(({ kind }) => kind === "kick").length,
    },
    (setting) => buildSplitting(operations(), setting),
  );
}

/** The Adams predictor-corrector. */
export function fromAdams(method: Multistep): ProgramStepper {
  return multistepStepper(method, (setting) => buildAdams(method, setting));
}

/** The second-sum method of Gauss and Jackson. */
export function fromGaussJackson(method: Multistep): ProgramStepper {
  return multistepStepper(method, (setting) => buildGaussJackson(method, setting));
}

function multistepStepper(method: Multistep, build: BuildStep): ProgramStepper {
  const claims = { ...published(method), ...notGeometric, family: "multistep" } as const;
  return fixedStep({ ...claims, stages: () => method.backValues, selfStarting: false }, build);
}

/** Extrapolation with a fixed number of columns: of fixed step, and of variable step with the last two columns compared. */
export function fromExtrapolation(method: Extrapolation): readonly [ProgramStepper, PairStepper] {
  const claims = { ...published(method), ...notGeometric, family: "extrapolation" } as const;
  const stages = (): number => parseRow(method.sequence).length;
  return [
    fixedStep({ ...claims, stages }, (setting) => buildExtrapolation(method, setting)),
    variableStep(
      { ...claims, ...method.variable, embeddedOrder: method.order - 2, stages },
      (setting) => buildExtrapolationPair(method, setting),
      null,
    ),
  ];
}

export function fromHermite(method: Published): ProgramStepper {
  const claims = { ...published(method), ...notGeometric, family: "hermite", needsJerk: true } as const;
  return fixedStep({ ...claims, stages: () => 1 }, buildHermite);
}

export function fromLogarithmicLeapfrog(method: Published): ProgramStepper {
  const claims = { ...published(method), family: "time-transformed", explicit: true, uneven: true } as const;
  return fixedStep(
    { ...claims, symplectic: true, timeReversible: true, stages: () => 1 },
    buildLogarithmicLeapfrog,
  );
}

/** A Runge-Kutta method with steps proportional to the distance. */
export function fromSundman(method: Sundman): ProgramStepper {
  const { a, b } = method.tableau;
  const claims = { ...published(method), ...notGeometric, family: "time-transformed", uneven: true } as const;
  return fixedStep(
    { ...claims, stages: () => liveStages(a.map(parseRow), parseRow(b)).filter(Boolean).length },
    (setting) => buildSundman(method.tableau, setting),
  );
}

/** Gauss collocation, solved by fixed-point iteration. */
export function fromGauss(method: Collocation): ImplicitStepper {
  const claims = { ...published(method), family: "implicit-symplectic", explicit: false } as const;
  let rows: CollocationRows | undefined;
  return implicitStep(
    { ...claims, symplectic: true, timeReversible: true, stages: () => parseRow(method.nodes).length },
    (setting) => {
      rows ??= gaussRows(method);
      return buildCollocation(rows, setting);
    },
  );
}

/** Everhart's collocation in variable step. */
export function fromRadau(method: Collocation): ImplicitStepper {
  const claims = { ...published(method), ...notGeometric, family: "collocation", explicit: false } as const;
  let rows: CollocationRows | undefined;
  let numbers: CollocationInDoubles | undefined;
  return variableCollocation(
    { ...claims, stages: () => parseRow(method.nodes).length },
    (setting) => {
      rows ??= radauRows(method);
      return buildCollocation(rows, setting);
    },
    () => {
      numbers ??= inDoubles(method);
      return numbers;
    },
  );
}
