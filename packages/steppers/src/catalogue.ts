import { fromPair, fromSplitting, fromTableau } from "./build/stepper-of.ts";
import { dormandPrince5 } from "./methods/runge-kutta/dormand-prince-5.ts";
import { explicitEuler } from "./methods/runge-kutta/explicit-euler.ts";
import { rk4 } from "./methods/runge-kutta/rk4.ts";
import { leapfrog, velocityVerlet } from "./methods/splitting/second-order.ts";
import { symplecticEuler } from "./methods/splitting/symplectic-euler.ts";
import type { Stepper } from "./stepper.ts";

/** Every built-in stepper. A new method is one data file and one line here. */
export const catalogue: readonly Stepper[] = [
  fromTableau(explicitEuler),
  fromTableau(rk4),
  fromTableau(dormandPrince5),
  fromPair(dormandPrince5),
  fromSplitting(symplecticEuler),
  fromSplitting(leapfrog),
  fromSplitting(velocityVerlet),
];

const byId: ReadonlyMap<string, Stepper> = new Map(catalogue.map((stepper) => [stepper.id, stepper]));

/** The built-in stepper of that id, if there is one. */
export function findStepper(id: string): Stepper | undefined {
  return byId.get(id);
}
