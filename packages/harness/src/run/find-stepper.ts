import { catalogue, findStepper, type Stepper } from "@perigauge/steppers";
import { InvalidInputError } from "../errors.ts";

/** @throws InvalidInputError with the nearest id where there is none of that name. */
export function requireStepper(where: string, id: string, own: readonly Stepper[] = []): Stepper {
  const found = own.find((stepper) => stepper.id === id) ?? findStepper(id);
  if (found === undefined) throw unknownStepper(where, id, own);
  return found;
}

export function unknownStepper(where: string, id: string, own: readonly Stepper[] = []): InvalidInputError {
  const ids = [...own, ...catalogue].map((stepper) => stepper.id);
  const nearest = ids.toSorted((a, b) => editDistance(id, a) - editDistance(id, b))[0] as string;
  const hint = editDistance(id, nearest) <= Math.max(2, id.length / 2) ? `; did you mean ${nearest}?` : "";
  return new InvalidInputError(`${where}: unknown stepper "${id}"${hint} (perigauge steppers lists them)`);
}

/** Levenshtein distance (Levenshtein 1966). */
function editDistance(a: string, b: string): number {
  let row = Array.from({ length: b.length + 1 }, (_, j) => j);
  for (let i = 1; i <= a.length; i++) {
    const next = [i];
    for (let j = 1; j <= b.length; j++) {
      const swap = (row[j - 1] as number) + (a[i - 1] === b[j - 1] ? 0 : 1);
      next.push(Math.min(swap, (row[j] as number) + 1, (next[j - 1] as number) + 1));
    }
    row = next;
  }
  return row[b.length] as number;
}
