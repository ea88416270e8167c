import { resolve } from "node:path";
import { pathToFileURL } from "node:url";
import { findStepper, type OwnStepper, ownStepper, type Stepper } from "@perigauge/steppers";
import { InvalidInputError } from "../errors.ts";

/**
 * Steppers of one's own, from modules that export them (by any name, or as the default).
 *
 * @throws InvalidInputError where a file cannot be loaded, exports no stepper, or reuses an id of the catalogue
 */
export async function loadOwnSteppers(files: readonly string[]): Promise<Stepper[]> {
  const steppers: Stepper[] = [];
  for (const file of files) {
    let module: Record<string, unknown>;
    try {
      module = (await import(pathToFileURL(resolve(file)).href)) as Record<string, unknown>;
    } catch (error) {
      const reason = error instanceof Error ? error.message.split("\n")[0] : String(error);
      throw new InvalidInputError(`${file}: cannot be loaded as a module (${reason})`);
    }
    const found = [...new Set(Object.values(module))].filter(isOwnStepper);
    if (found.length === 0) {
      throw new InvalidInputError(
        `${file}: must export an object with an id and a function step(q, v, h, acceleration)`,
      );
    }
    for (const own of found) {
      if (findStepper(own.id) !== undefined || steppers.some(({ id }) => id === own.id)) {
        throw new InvalidInputError(`${file}: the id "${own.id}" is taken already`);
      }
      steppers.push(ownStepper(guarded(own, file)));
    }
  }
  return steppers;
}

/** What a stepper of one's own throws is wrong input, and says where it came from. */
function guarded(own: OwnStepper, file: string): OwnStepper {
  return {
    id: own.id,
    step: (q, v, h, acceleration) => {
      try {
        own.step(q, v, h, acceleration);
      } catch (error) {
        const reason = error instanceof Error ? error.message.split("\n")[0] : String(error);
        throw new InvalidInputError(`${file}: the step of "${own.id}" failed (${reason})`);
      }
    },
  };
}

function isOwnStepper(value: unknown): value is OwnStepper {
  return (
    typeof value === "object" &&
    value !== null &&
    typeof (value as OwnStepper).id === "string" &&
    /^[a-z0-9][a-z0-9-]*$/.test((value as OwnStepper).id) &&
    typeof (value as OwnStepper).step === "function"
  );
}
