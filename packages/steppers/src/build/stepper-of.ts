import { parseRow } from "../exact/coefficients.ts";
import { toDouble } from "../exact/rational.ts";
import type { EmbeddedTableau, Published, Splitting, Tableau } from "../methods/method.ts";
import { fixedStep, type ProgramStepper } from "../run/fixed-step.ts";
import { type PairStepper, variableStep } from "../run/variable-step.ts";
import { buildRungeKutta, buildRungeKuttaPair, liveStages } from "./runge-kutta.ts";
import { buildSplitting, operationsOf } from "./splitting.ts";

const published = ({ id, title, order, source, note }: Published): Published => ({
  id,
  title,
  order,
  source,
  ...(note === undefined ? {} : { note }),
});

const notGeometric = { symplectic: false, timeReversible: false, explicit: true } as const;

/** A fixed-step stepper from an explicit Runge-Kutta tableau. */
export function fromTableau(method: Tableau): ProgramStepper {
  const live = liveStages(method.a.map(parseRow), parseRow(method.b));
  const stages = live.filter(Boolean).length;
  const claims = { ...published(method), ...notGeometric, family: "runge-kutta", stages } as const;
  return fixedStep(claims, (setting) => buildRungeKutta(method, setting));
}

/** The variable-step stepper of a tableau that has an embedded formula. */
export function fromPair(method: EmbeddedTableau): PairStepper {
  const { embedded, dense } = method;
  const claims = {
    ...published(method),
    ...notGeometric,
    id: embedded.id,
    title: embedded.title,
    family: "runge-kutta",
    stages: method.a.length,
    embeddedOrder: embedded.order,
  } as const;
  const rows = dense?.rows.map((row) => parseRow(row).map(toDouble)) ?? null;
  return variableStep(claims, (setting) => buildRungeKuttaPair(method, embedded, setting), rows);
}

/** A fixed-step stepper from a splitting; stages are its kicks. */
export function fromSplitting(method: Splitting): ProgramStepper {
  const claims = {
    ...published(method),
    family: "symplectic-splitting",
    symplectic: true,
    timeReversible: method.symmetric,
    explicit: true,
    stages: operationsOf(method).filter(({ kind }) => kind === "kick").length,
  } as const;
  return fixedStep(claims, (setting) => buildSplitting(method, setting));
}
