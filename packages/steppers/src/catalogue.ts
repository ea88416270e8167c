import {
  fromComposition,
  fromNystrom,
  fromNystromPair,
  fromPair,
  fromSplitting,
  fromTableau,
} from "./build/stepper-of.ts";
import { hasEmbedded } from "./methods/method.ts";
import { compositions, nystromTableaus, splittings, tableaus } from "./registry.ts";
import type { Stepper } from "./stepper.ts";

/** Every built-in stepper, family by family. */
export const catalogue: readonly Stepper[] = [
  ...tableaus.map(fromTableau),
  ...tableaus.filter(hasEmbedded).map(fromPair),
  ...nystromTableaus.map(fromNystrom),
  ...nystromTableaus.filter(hasEmbedded).map(fromNystromPair),
  ...splittings.map(fromSplitting),
  ...compositions.flatMap(fromComposition),
];

/** Other usual names of steppers in the catalogue. */
const aliases: ReadonlyMap<string, string> = new Map([
  ["yoshida-4", "forest-ruth-4"],
  ["yoshida-4-kdk", "forest-ruth-4-kdk"],
]);

const byId: ReadonlyMap<string, Stepper> = new Map(catalogue.map((stepper) => [stepper.id, stepper]));

/** The built-in stepper of that id or other usual name, if there is one. */
export function findStepper(id: string): Stepper | undefined {
  return byId.get(aliases.get(id) ?? id);
}
