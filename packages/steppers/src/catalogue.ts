import { fromGauss, fromRadau } from "./family/collocation.ts";
import { fromExtrapolation } from "./family/extrapolation.ts";
import { fromHermite } from "./family/hermite.ts";
import { fromAdams, fromGaussJackson } from "./family/multistep.ts";
import { fromNystrom, fromNystromPair } from "./family/nystrom.ts";
import { fromPair, fromTableau } from "./family/runge-kutta.ts";
import { fromComposition, fromSplitting } from "./family/splitting.ts";
import { fromLogarithmicLeapfrog, fromSundman } from "./family/time-transformed.ts";
import { gaussLegendre } from "./methods/collocation/gauss-legendre.ts";
import { gaussRadau15 } from "./methods/collocation/gauss-radau-15.ts";
import { hermite4 } from "./methods/hermite/hermite-4.ts";
import { hasEmbedded } from "./methods/method.ts";
import { adamsBashforthMoulton } from "./methods/multistep/adams-bashforth-moulton.ts";
import { gaussJackson8 } from "./methods/multistep/gauss-jackson-8.ts";
import { logarithmicLeapfrog } from "./methods/time-transformed/logarithmic-leapfrog.ts";
import { compositions, extrapolations, nystromTableaus, splittings, sundmans, tableaus } from "./registry.ts";
import type { Stepper } from "./stepper.ts";

/** Every built-in stepper, family by family. */
export const catalogue: readonly Stepper[] = [
  ...tableaus.map(fromTableau),
  ...tableaus.filter(hasEmbedded).map(fromPair),
  ...nystromTableaus.map(fromNystrom),
  ...nystromTableaus.filter(hasEmbedded).map(fromNystromPair),
  ...splittings.map(fromSplitting),
  ...compositions.flatMap(fromComposition),
  ...gaussLegendre.map(fromGauss),
  ...adamsBashforthMoulton.map(fromAdams),
  fromGaussJackson(gaussJackson8),
  ...extrapolations.flatMap(fromExtrapolation),
  fromRadau(gaussRadau15),
  fromHermite(hermite4),
  fromLogarithmicLeapfrog(logarithmicLeapfrog),
  ...sundmans.map(fromSundman),
];

/** Other usual names of steppers in the catalogue. */
const aliases: ReadonlyMap<string, string> = new Map([
  ["implicit-midpoint", "gauss-legendre-2"],
  ["yoshida-4", "forest-ruth-4"],
  ["yoshida-4-kdk", "forest-ruth-4-kdk"],
]);

const byId: ReadonlyMap<string, Stepper> = new Map(catalogue.map((stepper) => [stepper.id, stepper]));

/** The built-in stepper of that id or other usual name, if there is one. */
export function findStepper(id: string): Stepper | undefined {
  return byId.get(aliases.get(id) ?? id);
}
