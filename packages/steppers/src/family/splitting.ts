import { compose } from "../build/composition.ts";
import { buildSplitting, operationsOf, type SplittingOperation } from "../build/splitting.ts";
import type { Composition, Published, Splitting } from "../methods/method.ts";
import { fixedStep, type ProgramStepper } from "../run/fixed-step.ts";
import { published } from "./claims.ts";

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
