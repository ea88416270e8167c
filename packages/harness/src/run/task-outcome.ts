import { InvalidInputError } from "../errors.ts";

/** What a task gives, in a form that crosses threads: an error's class does not. */
export type Outcome<T> = { readonly result: T } | { readonly wrongInput: string };

export async function outcomeOf<T>(work: () => Promise<T>): Promise<Outcome<T>> {
  try {
    return { result: await work() };
  } catch (error) {
    if (error instanceof InvalidInputError) return { wrongInput: error.message };
    throw error;
  }
}

/** @throws InvalidInputError where the task's input was wrong */
export function resultOf<T>(outcome: Outcome<T>): T {
  if ("wrongInput" in outcome) throw new InvalidInputError(outcome.wrongInput);
  return outcome.result;
}
